import { mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { basename, join, relative } from 'node:path';
import * as tf from '@tensorflow/tfjs';
import { LeadlineError, stream, useFastestBackend } from 'leadline';
import { DemoError } from './DemoError.js';
import { prepare } from './dataset.js';
import { examine } from './examine.js';
import { fitModel } from './fitModel.js';
import { generate } from './generate.js';
import { buildModel } from './model.js';
import { drawPictures } from './pictures/drawPictures.js';
import { progressDisplay } from './progress.js';
import { readCsv } from './readCsv.js';
import { coverage, reconstruct } from './reconstruct.js';
import { report, type Words } from './report.js';
import { readSettings, type Settings, usage } from './settings.js';

/** Runs the demo and returns the exit code. What the user can put right is one line on the error output. */
export async function main(args: readonly string[]): Promise<number> {
  try {
    const settings = readSettings(args);
    if (settings) await run(settings);
    else console.log(usage);
    return 0;
  } catch (error) {
    const mine = error instanceof DemoError || error instanceof LeadlineError;
    if (!mine && !(error instanceof Error && 'syscall' in error)) throw error;
    console.error(error.message);
    return 1;
  }
}

async function run(settings: Settings): Promise<void> {
  // The cpu backend of tfjs greets Node users otherwise.
  tf.enableProdMode();
  const backend = await useFastestBackend();
  const seeds = stream(settings.seed);
  const invented = settings.data === undefined;
  const words: Words = invented
    ? { noun: 'fruit', nouns: 'fruits', unit: 'absorbance' }
    : { noun: 'row', nouns: 'rows', unit: "(in the file's units)" };

  makeFolder(settings.out);
  const path = settings.data ?? join(settings.out, 'quorrels.csv');
  if (invented) writeFileSync(path, generate(seeds.fork('orchard'), settings.fruits));
  const file = basename(path);
  const table = readCsv(read(path), file, settings.ignore);
  const data = prepare(table, file, seeds.fork('split'), settings.hidden);
  const trained = data.training.x.shape[0];
  console.log(
    [
      ...(invented ? ['Quorrels on the packing line of the Fennimoss orchard (all of it invented)'] : []),
      `${near(path)}: ${trained} ${words.nouns} to train on, ${data.heldOut.x.shape[0]} held out; ${data.bands.length} columns seen, ${data.heldOut.causes.size} hidden`,
      `${settings.latents} latent dimensions, ${settings.steps} steps of ${Math.min(100, trained)} ${words.nouns}, seed ${settings.seed}, ${backend} backend`,
      '',
    ].join('\n'),
  );

  const model = buildModel(data, settings.latents, seeds);
  const display = progressDisplay(process.stdout, settings.steps, words.noun);
  const curve = await fitModel(model, data, settings.steps, seeds.fork('training'), display.show).finally(
    display.stop,
  );
  const findings = await examine(model, data, seeds.fork('examination'));
  const rebuilt = reconstruct(model, data.heldOut.x, seeds.fork('reconstruction'));
  console.log(report(data, findings, curve, coverage(rebuilt), words).join('\n'));

  const pictures = await drawPictures(
    data,
    findings,
    curve,
    rebuilt,
    words,
    invented ? 'absorbance (log 1/R)' : "value (the file's units)",
  );
  console.log('\nPictures');
  for (const { name, svg } of pictures) {
    writeFileSync(join(settings.out, name), svg);
    console.log(`  ${near(join(settings.out, name))}`);
  }
}

function makeFolder(path: string): void {
  try {
    mkdirSync(path, { recursive: true });
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    const why = code === 'EEXIST' || code === 'ENOTDIR' ? 'a file is in its place' : `${code}`;
    throw new DemoError(`demo: --out must name a folder to write to; ${path}: ${why}`);
  }
}

function read(path: string): string {
  try {
    return readFileSync(path, 'utf8');
  } catch (error) {
    const { code } = error as NodeJS.ErrnoException;
    const why =
      code === 'ENOENT' ? 'there is no such file' : code === 'EISDIR' ? 'it is a folder' : `${code}`;
    throw new DemoError(`demo: --data must name a CSV file that can be read; ${path}: ${why}`);
  }
}

/** A path as one would type it here. */
function near(path: string): string {
  const short = relative(process.cwd(), path);
  return short.startsWith('..') ? path : short;
}
