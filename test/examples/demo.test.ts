import { execFile } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';

const root = fileURLToPath(new URL('../../', import.meta.url));
const folder = mkdtempSync(join(tmpdir(), 'demo-'));
afterAll(() => rmSync(folder, { recursive: true, force: true }));

interface Run {
  readonly code: number;
  readonly out: string;
  readonly err: string;
}

/** Runs the demo as its npm script does. */
function demo(...args: string[]): Promise<Run> {
  return new Promise((resolve) => {
    execFile(
      process.execPath,
      ['docs/examples/demo.mjs', ...args],
      { cwd: root, timeout: 100_000, killSignal: 'SIGKILL' },
      (error, out, err) => resolve({ code: error ? Number(error.code ?? -1) : 0, out, err }),
    );
  });
}

const pictures = ['latent-map.svg', 'learning-curve.svg', 'reconstructions.svg'];

it('is what npm run demo starts', () => {
  const { scripts } = JSON.parse(readFileSync(join(root, 'package.json'), 'utf8'));
  expect(scripts.demo).toBe('node docs/examples/demo.mjs');
});

describe('a short run', () => {
  const out = join(folder, 'first');
  let run: Run;
  beforeAll(async () => {
    run = await demo('--steps', '200', '--fruits', '400', '--out', out);
  });

  it('ends well and says nothing on the error output', () => {
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
  });

  it('prints its sections and nothing else', () => {
    const pattern = [
      'Quorrels on the packing line of the Fennimoss orchard (all of it invented)',
      '*quorrels.csv: 320 fruits to train on, 80 held out; 64 columns seen, 4 hidden',
      '8 latent dimensions, 200 steps of 100 fruits, seed 1, wasm backend',
      '',
      ...[40, 80, 120, 160, 200].map((step) => `step ${step} of 200: held-out bound # nats per fruit`),
      '',
      'Held-out bound on the log evidence, in nats per fruit (80 fruits, 20 draws each)',
      '  # ± # (standard error)',
      '  # ± # for 64 columns that share no cause',
      '',
      'Divergence of each latent dimension, in nats per fruit; alive where above 0.05 on held-out fruits',
      ...Array.from({ length: 8 }, () => '  z*'),
      '  * of 8 alive',
      '',
      'Hidden columns: share of the variance that a straight-line fit on the live dimensions explains',
      ...['ripeness', 'water', 'bruise', 'depth'].map((name) => `  ${name.padEnd(12)}*# %`),
      '',
      'Noise and reconstruction',
      '  learned noise sd, over the columns: # to # absorbance',
      '  # % of the held-out measurements lie in their 95 % band',
      '',
      'Pictures',
      ...['learning-curve.svg', 'latent-map.svg', 'reconstructions.svg'].map((name) => `  *${name}`),
      '',
    ];
    const lines = run.out.split('\n');
    for (const [i, expected] of pattern.entries()) {
      const escaped = expected.replace(/[.+?^$()[\]|\\]/g, '\\$&');
      expect(lines[i]).toMatch(
        new RegExp(`^${escaped.replaceAll('*', '.*').replaceAll('#', '-?\\d+(\\.\\d+)?')}$`),
      );
    }
    expect(lines).toHaveLength(pattern.length);
  });

  it('learns more than the columns tell one by one', () => {
    const [[bound, error], [alone, aloneError]] = [...run.out.matchAll(/^ {2}(-?[\d.]+) ± ([\d.]+)/gm)].map(
      (match) => [Number(match[1]), Number(match[2])],
    ) as [[number, number], [number, number]];
    expect(bound - alone).toBeGreaterThan(3 * Math.hypot(error, aloneError));
  });

  it('calls those dimensions alive that are above the threshold, largest first', () => {
    const shown = [...run.out.matchAll(/^ {2}z\d +([\d.]+) {2}(alive|off)/gm)];
    const divergences = shown.map(([, value]) => Number(value));
    expect(divergences).toHaveLength(8);
    expect(divergences).toEqual([...divergences].sort((a, b) => b - a));
    expect(shown.map(([, , state]) => state)).toEqual(divergences.map((d) => (d > 0.05 ? 'alive' : 'off')));
    const live = divergences.filter((d) => d > 0.05).length;
    expect(run.out).toContain(`\n  ${live} of 8 alive\n`);
  });

  it('writes the pictures', () => {
    expect(readdirSync(out).sort()).toEqual([...pictures, 'quorrels.csv'].sort());
    for (const name of pictures) expect(readFileSync(join(out, name), 'utf8')).toMatch(/^<svg .*<\/svg>\n$/s);
  });

  it('comes out the same with the same seed', async () => {
    const again = join(folder, 'second');
    const second = await demo('--steps', '200', '--fruits', '400', '--out', again, '--seed', '1');
    expect(second.out.replaceAll(again, out)).toBe(run.out);
    for (const name of [...pictures, 'quorrels.csv']) {
      expect(readFileSync(join(again, name), 'utf8')).toBe(readFileSync(join(out, name), 'utf8'));
    }
  });
});

describe("a file of one's own", () => {
  it('is trained on, with other words', async () => {
    const path = join(folder, 'own.csv');
    const rows = Array.from({ length: 60 }, (_, i) =>
      [`n${i}`, i % 7, i % 5, (i % 7) + (i % 5), i % 3].join(';'),
    );
    writeFileSync(path, `name;u;v;w;taste\n${rows.join('\n')}\n`);
    const run = await demo(
      ...['--data', path, '--hidden', 'taste', '--ignore', 'name'],
      ...['--steps', '20', '--latents', '2', '--out', join(folder, 'own')],
    );
    expect(run.err).toBe('');
    expect(run.code).toBe(0);
    expect(run.out).toContain(
      ': 48 rows to train on, 12 held out; 3 columns seen, 1 hidden\n2 latent dimensions',
    );
    expect(run.out).toContain('nats per row');
    expect(run.out).not.toMatch(/fruit|quorrel|absorbance/i);
    expect(readdirSync(join(folder, 'own')).sort()).toEqual(pictures);
  });

  it('gets one line when it is wrong', async () => {
    const path = join(folder, 'wrong.csv');
    writeFileSync(path, `u,v\n${'1,2\n'.repeat(60)}3,much\n`);
    expect(await demo('--data', path, '--out', join(folder, 'wrong'))).toEqual({
      code: 1,
      out: '',
      err: 'wrong.csv: row 62, column 2 (v): must be a finite number; got "much"\n',
    });
  });

  it('gets one line when it is not there, and so does an unknown option', async () => {
    const path = join(folder, 'nowhere.csv');
    const [missing, unknown] = await Promise.all([demo('--data', path), demo('--fast')]);
    expect(missing).toEqual({
      code: 1,
      out: '',
      err: `demo: --data must name a CSV file that can be read; ${path}: there is no such file\n`,
    });
    expect(unknown).toEqual({
      code: 1,
      out: '',
      err: "demo: unknown option '--fast'; npm run demo -- --help lists the options\n",
    });
  });
});
