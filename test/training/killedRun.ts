/**
 * A training run to be killed: `killedRun.ts <folder> <steps>`. Resumes what the folder holds, writes a
 * checkpoint at every third step and a line for each, and at the end the weights and everything that was
 * yielded since the last resumption.
 */
import { existsSync } from 'node:fs';
import { writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import * as tf from '@tensorflow/tfjs';
import { stream } from '../../src/random/stream.js';
import { checkpoint, resume } from '../../src/training/checkpoint.js';
import { snapshot } from '../../src/training/snapshot.js';
import { train } from '../../src/training/train.js';
import { toy, toyData } from './toy.js';

const [folder, steps] = process.argv.slice(2) as [string, string];
const path = join(folder, 'run.safetensors');
const model = toy();
const best = snapshot(model.variables);
const variables = { model: model.variables, best };
const optimizer = tf.train.adam(0.02);
const saved = existsSync(path) ? await resume(path, { variables, optimizer }) : undefined;
const root = saved?.streams.root ?? stream(71);
// A stream that the loop itself draws from must go on as well.
const coins = saved?.streams.coins ?? stream(72);
process.stdout.write(`from ${saved?.cursor?.step ?? 0}\n`);
for await (const { rate: _, timeLeft: __, ...progress } of train({
  bound: model.bound,
  data: { x: toyData(40) },
  variables: model.variables,
  optimizer,
  stream: root,
  batchSize: 16,
  steps: Number(steps),
  clip: 5,
  heldOut: { data: { x: toyData(15, 13) }, every: 4, best },
  ...(saved?.cursor ? { from: saved.cursor } : {}),
})) {
  const coin = tf.tidy(() => coins.uniform([]).arraySync());
  process.stdout.write(`${JSON.stringify({ ...progress, coin })}\n`);
  if (progress.step % 3 === 0 || progress.ended) {
    await checkpoint(path, { variables, optimizer, streams: { root, coins }, cursor: progress.cursor });
  }
}
await writeFile(
  join(folder, 'weights'),
  model.list.map((v) => Buffer.from(v.dataSync().buffer).toString('hex')).join(),
);
process.stdout.write('done\n');
