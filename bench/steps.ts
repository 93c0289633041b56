import * as tf from '@tensorflow/tfjs';
import { stream } from '../src/index.js';
import { assembled } from './assembled.js';
import { handWritten } from './handWritten.js';
import { compare, interleave, type Repetition } from './measure.js';
import { large, type Sizes, small, type Trainable } from './network.js';
import type { Row } from './row.js';

/** A training step through the library beside the same step written by hand on tfjs. */
export function* steps(): Generator<Row> {
  if (tf.getBackend() === 'wasm') {
    yield stepRow(large, { rounds: 60 }, 1.05);
    yield stepRow(small, { rounds: 200, batch: 5, warmUp: 20 });
  } else {
    yield stepRow(large, { rounds: 7, warmUp: 1 });
    yield stepRow(small, { rounds: 20 });
  }
}

/** What K draws cost beside K times one draw. */
export function* drawGrowth(): Generator<Row> {
  const draws = 10;
  yield growthRow(small, draws, { rounds: 40, batch: 2 });
  yield growthRow(large, draws, { rounds: 20, warmUp: 1 });
}

function stepRow(sizes: Sizes, repetition: Repetition, target?: number): Row {
  return withBatch(sizes, (x) => {
    const sides = [assembled(sizes, x), handWritten(sizes, x)];
    const [own, peer] = interleave(
      sides.map((side) => side.step),
      repetition,
    );
    requireTraining(sizes, sides);
    return {
      section: 'A training step',
      what: `${sizes.name}, batch ${sizes.batch}, one draw`,
      peer: 'hand-written on tfjs',
      backend: tf.getBackend(),
      comparison: compare(own!, peer!),
      ...(target === undefined ? {} : { target }),
    };
  });
}

function growthRow(sizes: Sizes, draws: number, repetition: Repetition): Row {
  return withBatch(sizes, (x) => {
    const sides = [assembled(sizes, x, draws), assembled(sizes, x)];
    const [many, one] = interleave(
      sides.map((side) => side.step),
      repetition,
    );
    requireTraining(sizes, sides);
    return {
      section: 'Growth with the number of draws',
      what: `${sizes.name}, batch ${sizes.batch}, ${draws} draws`,
      peer: `${draws} × one draw`,
      backend: tf.getBackend(),
      comparison: compare(many!, one!, draws),
      target: 1,
    };
  });
}

/** A batch of invented binary data with some structure, so that there is something to learn. */
function withBatch(sizes: Sizes, work: (x: tf.Tensor2D) => Row): Row {
  const source = stream('bench data');
  const x = tf.tidy(() => {
    const rows = source.uniform([sizes.batch, 1]);
    return tf.less(source.uniform([sizes.batch, sizes.data]), rows).toFloat() as tf.Tensor2D;
  });
  try {
    return work(x);
  } finally {
    x.dispose();
  }
}

/** After training, the two sides must stand at losses of the same size, or they were not the same work. */
function requireTraining(sizes: Sizes, sides: readonly Trainable[]): void {
  const losses = sides.map((side) => side.loss());
  for (const side of sides) side.dispose();
  const untrained = sizes.data * Math.LN2;
  if (!losses.every((loss) => Number.isFinite(loss) && loss < untrained)) {
    throw new Error(`bench: ${sizes.name} must train; the losses ended at ${losses.join(' and ')}`);
  }
  const gap = Math.abs(losses[0]! - losses[1]!) / losses[1]!;
  if (!(gap < 0.2)) {
    throw new Error(
      `bench: both sides of ${sizes.name} must train alike; they ended at ${losses.join(' and ')}`,
    );
  }
}
