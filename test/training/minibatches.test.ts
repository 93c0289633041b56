import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { stream } from '../../src/random/stream.js';
import { type BatchCursor, minibatches } from '../../src/training/minibatches.js';
import { refusal } from './toy.js';

const column = (n: number) => Array.from({ length: n }, (_, i) => [i, 10 * i]);

function walk(cursor?: BatchCursor, epochs = 3) {
  const seen: { rows: number[]; cursor: BatchCursor }[] = [];
  const options = { batchSize: 3, stream: stream(21), epochs, ...(cursor ? { cursor } : {}) };
  for (const batch of minibatches({ x: column(10) }, options)) {
    const values = batch.data.x.arraySync() as number[][];
    expect(values).toEqual([...batch.rows].map((row) => [row, 10 * row]));
    seen.push({ rows: [...batch.rows], cursor: batch.cursor });
  }
  return seen;
}

describe('the walk', () => {
  it('takes every row once a pass, in another order each time', () => {
    const seen = walk();
    expect(seen.map(({ rows }) => rows.length)).toEqual([3, 3, 3, 1, 3, 3, 3, 1, 3, 3, 3, 1]);
    const passes = [0, 4, 8].map((at) => seen.slice(at, at + 4).flatMap(({ rows }) => rows));
    for (const pass of passes)
      expect([...pass].sort((a, b) => a - b)).toEqual([0, 1, 2, 3, 4, 5, 6, 7, 8, 9]);
    expect(new Set(passes.map(String)).size).toBe(3);
  });

  it('is the same for the same stream, and does not advance it', () => {
    const shuffler = stream(21);
    const before = shuffler.save();
    for (const _ of minibatches({ x: column(10) }, { stream: shuffler, epochs: 1 }));
    expect(shuffler.save()).toEqual(before);
    expect(walk()).toEqual(walk());
  });

  it('continues from every one of its cursors, after a passage through JSON', () => {
    const seen = walk();
    for (const [i, { cursor }] of seen.entries()) {
      expect(walk(JSON.parse(JSON.stringify(cursor)))).toEqual(seen.slice(i + 1));
    }
  });

  it('keeps the order of the data without a stream, and has no end without epochs', () => {
    const rows: number[][] = [];
    for (const batch of minibatches({ x: column(5) }, { batchSize: 3 })) {
      rows.push([batch.epoch, batch.index, ...batch.rows]);
      if (rows.length === 5) break;
    }
    expect(rows).toEqual([
      [1, 0, 0, 1, 2],
      [1, 1, 3, 4],
      [2, 0, 0, 1, 2],
      [2, 1, 3, 4],
      [3, 0, 0, 1, 2],
    ]);
  });

  it('puts each row in each place equally often', () => {
    // 2,000 shuffles of 6 rows: for each place, chi-squared with 5 degrees of freedom. The sum over 5 free
    // places is chi-squared with 25; 52.62 is its 0.999 quantile (from memory), so 1 in 1,000 false alarms.
    const counts = Array.from({ length: 6 }, () => new Array<number>(6).fill(0));
    for (const batch of minibatches({ x: column(6) }, { stream: stream(907), epochs: 2000 })) {
      for (const [place, row] of batch.rows.entries()) counts[place]![row]!++;
    }
    const expected = 2000 / 6;
    const statistic = counts.flat().reduce((sum, n) => sum + (n - expected) ** 2 / expected, 0);
    // The 36 counts have fixed margins: (5/6) of the sum over places is chi-squared with 25 degrees of freedom.
    expect((statistic * 5) / 6).toBeLessThan(52.62);
  });
});

describe('entries', () => {
  it('gathers tensors of any rank and type, typed arrays, masks and nested objects', () => {
    class Marked {
      constructor(
        readonly values: tf.Tensor,
        readonly mask: tf.Tensor,
        readonly label: string,
      ) {}
      count() {
        return this.values.size;
      }
    }
    const images = tf.tensor(
      new Float32Array(24).map((_, i) => i),
      [4, 2, 3],
    );
    const mask = tf.tensor([true, false, true, false], [4], 'bool');
    const marked = new Marked(images, mask, 'kept');
    const data = {
      images,
      double: new Float64Array([1, 2, 3, 4]),
      whole: new Uint8Array([5, 6, 7, 8]),
      rows: [new Uint8Array([1, 2]), new Uint8Array([3, 4]), new Uint8Array([5, 6]), new Uint8Array([7, 8])],
      flags: [[true], [false], [true], [true]],
      masked: { values: [1, 2, 3, 4], mask: [[1], [0], [1], [0]] },
      marked,
    };
    const before = tf.memory().numTensors;
    let batches = 0;
    for (const { data: batch, index } of minibatches(data, { batchSize: 3, epochs: 1 })) {
      batches++;
      if (index === 0) continue;
      expect(batch.images.shape).toEqual([1, 2, 3]);
      expect([...batch.images.dataSync()]).toEqual([18, 19, 20, 21, 22, 23]);
      expect([batch.double.dtype, ...batch.double.dataSync()]).toEqual(['float32', 4]);
      expect([batch.whole.dtype, ...batch.whole.dataSync()]).toEqual(['int32', 8]);
      expect([batch.rows.dtype, ...batch.rows.dataSync()]).toEqual(['int32', 7, 8]);
      expect([batch.flags.dtype, ...batch.flags.dataSync()]).toEqual(['bool', 1]);
      expect([...batch.masked.values.dataSync(), ...batch.masked.mask.dataSync()]).toEqual([4, 0]);
      expect(batch.marked).toBeInstanceOf(Marked);
      expect([batch.marked.label, batch.marked.count(), batch.marked.mask.dtype]).toEqual([
        'kept',
        6,
        'bool',
      ]);
    }
    expect(batches).toBe(2);
    expect(tf.memory().numTensors).toBe(before);
    expect(images.isDisposed).toBe(false);
    tf.dispose([images, mask]);
  });

  it('leaves nothing behind after a break, an error, or inside a tidy', async () => {
    const x = tf.ones([5, 2]);
    const before = tf.memory().numTensors;
    for (const _ of minibatches({ x, y: [1, 2, 3, 4, 5] }, { batchSize: 2 })) break;
    expect(tf.memory().numTensors).toBe(before);
    await refusal(() => {
      for (const _ of minibatches({ x }, { batchSize: 2 })) throw new Error('stop');
    });
    expect(tf.memory().numTensors).toBe(before);
    await refusal(() => minibatches({ x, y: [1] }).next());
    expect(tf.memory().numTensors).toBe(before);
    const generator = minibatches({ x }, { batchSize: 2 });
    tf.tidy(() => {
      generator.next();
    });
    expect(generator.next().value!.data.x.arraySync()).toEqual([
      [1, 1],
      [1, 1],
    ]);
    generator.return();
    expect(tf.memory().numTensors).toBe(before);
    x.dispose();
  });
});

describe('refusals', () => {
  const own = { epoch: 1, index: 1, rows: 4, batchSize: 2, seed: null };
  const disposed = tf.ones([4]);
  disposed.dispose();
  const x = [1, 2, 3, 4];
  it.each<[string, unknown, unknown, string]>([
    [
      'no object',
      3,
      {},
      'ParameterError: minibatches: data must be an object of named entries; got 3; pass for example { x }',
    ],
    [
      'a bare array',
      x,
      {},
      'ParameterError: minibatches: data must be an object of named entries; got an array of 4; pass for example { x }',
    ],
    [
      'no entries',
      {},
      {},
      'ParameterError: minibatches: data must have at least one entry; got none; pass for example { x }',
    ],
    [
      'a number',
      { x: 3 },
      {},
      'ParameterError: minibatches: x must be a tensor, an array or an object of these; got 3; give it one row per data point',
    ],
    [
      'null',
      { x: null },
      {},
      'ParameterError: minibatches: x must be a tensor, an array or an object of these; got null; give it one row per data point',
    ],
    [
      'no rows',
      { x: [] },
      {},
      'ShapeError: minibatches: x must have at least one row; got shape [0]; give it a leading axis, one row per data point',
    ],
    [
      'a scalar',
      { x: { values: tf.scalar(1) } },
      {},
      'ShapeError: minibatches: x.values must have at least one row; got shape []; give it a leading axis, one row per data point',
    ],
    [
      'a disposed tensor',
      { x: disposed },
      {},
      'ParameterError: minibatches: x must be alive; got a disposed tensor of shape [4]; keep it with tf.keep(…) or use it inside the same tf.tidy',
    ],
    [
      'unequal rows',
      { x, y: { mask: [1] } },
      {},
      'ShapeError: minibatches: data must have one number of rows; got 4 in x and 1 in y.mask; give each data point one row in every entry',
    ],
    [
      'ragged typed rows',
      { x: [new Float32Array(2), new Float32Array(3)] },
      {},
      'ShapeError: minibatches: x must have rows of one length; got 2 in row 0 and 3 in row 1; make every row equally long',
    ],
    [
      'ragged rows',
      { x: [[1, 2], [3]] },
      {},
      'ShapeError: minibatches: x must be a regular nested array of shape [2, 2]; got an array of 1 at depth 1; make every row equally long',
    ],
    [
      'text',
      { x: [[1], ['a']] },
      {},
      "ParameterError: minibatches: x must hold numbers; got the string 'a'; mend the array",
    ],
    [
      'an unknown option',
      { x },
      { size: 3 },
      "ParameterError: minibatches: options must be among batchSize, stream, epochs, cursor; got 'size'; remove or rename it",
    ],
    [
      'a batch of none',
      { x },
      { batchSize: 0 },
      'ParameterError: minibatches: batchSize must be a whole number of at least 1; got 0; pass for example 1',
    ],
    [
      'NaN epochs',
      { x },
      { epochs: Number.NaN },
      'ParameterError: minibatches: epochs must be a whole number of at least 1; got NaN; pass for example 1',
    ],
    [
      'no stream',
      { x },
      { stream: 7 },
      'StreamError: minibatches: stream must be a Stream; got a value of type number; pass stream(seed) or a fork of one',
    ],
    [
      'no cursor',
      { x },
      { cursor: 7 },
      "ParameterError: minibatches: cursor must be a batch's cursor; got 7; pass what batch.cursor gave",
    ],
    [
      'a wrong epoch',
      { x },
      { batchSize: 2, cursor: { ...own, epoch: 0 } },
      'ParameterError: minibatches: cursor.epoch must be a whole number of at least 1; got 0; pass for example 1',
    ],
    [
      'a wrong index',
      { x },
      { batchSize: 2, cursor: { ...own, index: 0.5 } },
      'ParameterError: minibatches: cursor.index must be a whole number of at least 0; got 0.5; pass for example 1',
    ],
    [
      'other rows',
      { x },
      { batchSize: 2, cursor: { ...own, rows: 5 } },
      'ParameterError: minibatches: cursor must come from 4 rows in batches of 2; got one of 5 rows in batches of 2; continue with the same data and batchSize',
    ],
    [
      'another batch size',
      { x },
      { batchSize: 3, cursor: own },
      'ParameterError: minibatches: cursor must come from 4 rows in batches of 3; got one of 4 rows in batches of 2; continue with the same data and batchSize',
    ],
    [
      'another stream',
      { x },
      { batchSize: 2, stream: stream(1), cursor: own },
      'ParameterError: minibatches: cursor must come from a walk shuffled by the same stream; got one with another seed; restore the stream that was saved beside it',
    ],
  ])('refuses %s', async (_, data, options, message) => {
    const run = () => minibatches(data as { x: number[] }, options as object).next();
    expect(await refusal(run)).toBe(message);
  });
});
