import { createHash } from 'node:crypto';
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import * as tf from '@tensorflow/tfjs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { stream } from '../../src/random/stream.js';
import { checkpoint, resume } from '../../src/training/checkpoint.js';
import {
  type CheckpointContents,
  type CheckpointTargets,
  decodeCheckpoint,
  encodeCheckpoint,
} from '../../src/training/checkpointBytes.js';
import { encodeSafetensors } from '../../src/training/safetensors.js';
import { snapshot } from '../../src/training/snapshot.js';
import { bits, refusal } from './toy.js';

let folder = '';
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'checkpoint-'));
});
afterAll(() => rm(folder, { recursive: true }));

const weight = (values: number[]) => tf.variable(tf.tensor1d(values));

describe('a checkpoint', () => {
  it('is a safetensors file that another program can read and verify', async () => {
    const variables = {
      decoder: [weight([1, 2, 3]), tf.variable(tf.tensor2d([[4]]))],
      steps: tf.variable(tf.tensor1d([7, -7], 'int32'), false),
      flags: tf.variable(tf.tensor1d([true, false, true], 'bool'), false),
    };
    const path = join(folder, 'open.safetensors');
    const noise = stream(61);
    noise.normal([3]).dispose();
    await checkpoint(path, { variables, streams: { noise }, cursor: { step: 3, note: '"sha256":"' } });
    // A reader of the format's description alone.
    const file = await readFile(path);
    const length = Number(file.readBigUInt64LE(0));
    const { __metadata__: metadata, ...entries } = JSON.parse(file.subarray(8, 8 + length).toString());
    const values = (name: string) => {
      const [begin, end] = entries[name].data_offsets;
      return file.subarray(8 + length + begin, 8 + length + end);
    };
    expect(entries['variables/decoder/0']).toMatchObject({ dtype: 'F32', shape: [3] });
    expect([0, 4, 8].map((at) => values('variables/decoder/0').readFloatLE(at))).toEqual([1, 2, 3]);
    expect(entries['variables/decoder/1']).toMatchObject({ dtype: 'F32', shape: [1, 1] });
    expect(entries['variables/steps']).toMatchObject({ dtype: 'I32', shape: [2] });
    expect(values('variables/steps').readInt32LE(4)).toBe(-7);
    expect(entries['variables/flags']).toMatchObject({ dtype: 'BOOL', shape: [3] });
    expect([...values('variables/flags')]).toEqual([1, 0, 1]);
    expect(JSON.parse(metadata.state)).toEqual({
      streams: { noise: noise.save() },
      cursor: { step: 3, note: '"sha256":"' },
    });
    const blanked = Buffer.from(file.toString('latin1').replace(metadata.sha256, '0'.repeat(64)), 'latin1');
    expect(createHash('sha256').update(blanked).digest('hex')).toBe(metadata.sha256);
  });

  it('gives streams back where they stood, and replaces the file before it', async () => {
    const path = join(folder, 'streams.safetensors');
    const variables = { a: weight([1]) };
    const [one, two] = [stream(62), stream(63).fork('x')];
    one.normal([7]).dispose();
    await checkpoint(path, { variables });
    expect(await resume(path, { variables })).toEqual({ streams: {}, cursor: undefined });
    await checkpoint(path, { variables, streams: { one, two }, cursor: [1, 'a', null, { b: false }] });
    const { streams, cursor } = await resume<unknown>(path, { variables });
    expect(cursor).toEqual([1, 'a', null, { b: false }]);
    expect(bits([streams.one!.normal([5]), streams.two!.normal([5])])).toBe(
      bits([one.normal([5]), two.normal([5])]),
    );
    expect(bits([streams.two!.fork('y').normal([5])])).toBe(bits([two.fork('y').normal([5])]));
    expect((await readdir(folder)).filter((name) => name.endsWith('.unfinished'))).toEqual([]);
  });

  it('holds the values of the moment of the call, and the last of several calls wins', async () => {
    const path = join(folder, 'moment.safetensors');
    const variable = weight(new Array(5000).fill(0));
    const variables = { variable };
    const before = tf.memory().numTensors;
    const writes = [1, 2, 3, 4].map((value) => {
      tf.tidy(() => variable.assign(tf.fill([5000], value)));
      return checkpoint(path, { variables, cursor: value });
    });
    tf.tidy(() => variable.assign(tf.fill([5000], 9)));
    await Promise.all(writes);
    const { cursor } = await resume<number>(path, { variables });
    expect(variable.dataSync().every((value) => value === cursor)).toBe(true);
    expect([1, 2, 3, 4]).toContain(cursor);
    expect(tf.memory().numTensors).toBe(before);
  });

  it('keeps every bit of a float32, NaN payloads aside: infinities, −0 and subnormals', async () => {
    const odd = [
      0,
      -0,
      Number.POSITIVE_INFINITY,
      Number.NEGATIVE_INFINITY,
      1e-45,
      -1e-45,
      3.4028234663852886e38,
      Math.PI,
    ];
    const variable = weight(odd);
    const before = bits([variable]);
    const bytes = await encodeCheckpoint({ variables: { variable } });
    variable.assign(tf.zeros([8]));
    await decodeCheckpoint(bytes, { variables: { variable } });
    expect(bits([variable])).toBe(before);
  });

  it('keeps a snapshot, a tf.layers model and a function with variables', async () => {
    const make = () => {
      const model = tf.sequential({
        layers: [tf.layers.dense({ units: 2, inputShape: [3] }), tf.layers.batchNormalization()],
      });
      const layer = Object.assign(() => 0, { variables: [weight([1, 2])] });
      const best = snapshot({ model, layer });
      return { model, layer, best };
    };
    const [a, b] = [make(), make()];
    a.best.take(42);
    const bytes = await encodeCheckpoint({ variables: a });
    await decodeCheckpoint(bytes, { variables: b });
    expect(bits(b.model.getWeights())).toBe(bits(a.model.getWeights()));
    expect(b.best.step).toBe(42);
    expect(bits(b.best.variables)).toBe(bits(a.best.variables));
  });
});

it('reading does not write into the caller’s bytes, wherever they lie', async () => {
  const variables = {
    a: weight([1, 2]),
    b: tf.variable(tf.tensor1d([true, false, true], 'bool'), false),
    c: weight([3]),
  };
  const bytes = await encodeCheckpoint({ variables });
  const was = bits([variables.a, variables.b, variables.c]);
  for (const offset of [0, 1, 3]) {
    const buffer = Buffer.alloc(bytes.length + 5);
    buffer.set(bytes, offset);
    const before = buffer.toString('hex');
    tf.tidy(() => variables.a.assign(tf.zeros([2])));
    await decodeCheckpoint(buffer.subarray(offset, offset + bytes.length), { variables });
    expect(bits([variables.a, variables.b, variables.c])).toBe(was);
    expect(buffer.toString('hex')).toBe(before);
  }
});

describe('damage', () => {
  it('of any byte is found, and nothing is changed', async () => {
    const variable = weight([1, 2]);
    const optimizer = tf.train.momentum(0.1, 0.9);
    optimizer.minimize(() => tf.sum(tf.square(variable)) as tf.Scalar, false, [variable]);
    const whole = await encodeCheckpoint({ variables: { variable }, optimizer, cursor: 5 });
    variable.assign(tf.tensor1d([8, 9]));
    for (let at = 0; at < whole.length; at++) {
      for (const flip of [1, 128]) {
        const damaged = whole.slice();
        damaged[at]! ^= flip;
        const message = await refusal(() =>
          decodeCheckpoint(damaged, { variables: { variable }, optimizer }),
        );
        if (!/^CheckpointError: decodeCheckpoint: the file must (be a|match its checksum)/.test(message)) {
          expect(`byte ${at}: ${message}`).toBe('a refusal');
        }
      }
    }
    for (let length = 0; length < whole.length; length++) {
      const message = await refusal(() =>
        decodeCheckpoint(whole.subarray(0, length), { variables: { variable } }),
      );
      if (
        !/^CheckpointError: decodeCheckpoint: the file must be a whole safetensors file; got \d+ bytes/.test(
          message,
        )
      ) {
        expect(`length ${length}: ${message}`).toBe('a refusal');
      }
    }
    expect([...variable.dataSync()]).toEqual([8, 9]);
    await decodeCheckpoint(whole, { variables: { variable }, optimizer });
    expect(variable.dataSync()[0]).not.toBe(8);
  });

  it('of a value is said to be a checksum that does not match', async () => {
    const path = join(folder, 'damaged.safetensors');
    const variables = { a: weight([1]) };
    await checkpoint(path, { variables });
    const bytes = await readFile(path);
    bytes[bytes.length - 1]! ^= 1;
    await writeFile(path, bytes);
    expect(await refusal(() => resume(path, { variables }))).toMatch(
      /^CheckpointError: resume: the file must match its checksum [0-9a-f]{64}; got [0-9a-f]{64}: it is damaged; use an earlier checkpoint$/,
    );
    await writeFile(path, bytes.subarray(0, bytes.length - 2));
    expect(await refusal(() => resume(path, { variables }))).toBe(
      `CheckpointError: resume: the file must be a whole safetensors file; got ${bytes.length - 2} bytes where the header announces ${bytes.length}: truncated or damaged; use an earlier checkpoint`,
    );
  });
});

describe('a file for another model', () => {
  const saved = () => ({ variables: { a: weight([1, 2]), b: { c: tf.variable(tf.zeros([2, 2])) } } });
  const a = () => weight([5, 6]);
  const head = 'CheckpointError: decodeCheckpoint: the file must be made for these variables; got ';
  it.each<[string, () => CheckpointTargets['variables'], string]>([
    [
      'a missing name',
      () => ({ a: a(), b: { c: tf.variable(tf.zeros([2, 2])), d: a() } }),
      'no variables/b/d in the file',
    ],
    ['a name too many', () => ({ a: a() }), 'no variables/b/c here'],
    [
      'another name',
      () => ({ a: a(), b: [tf.variable(tf.zeros([2, 2]))] }),
      'no variables/b/0 in the file; no variables/b/c here',
    ],
    [
      'another shape',
      () => ({ a: a(), b: { c: tf.variable(tf.zeros([2, 3])) } }),
      'variables/b/c of shape [2, 2] in the file and [2, 3] here',
    ],
    [
      'another rank',
      () => ({ a: a(), b: { c: tf.variable(tf.zeros([4])) } }),
      'variables/b/c of shape [2, 2] in the file and [4] here',
    ],
    [
      'another type',
      () => ({ a: a(), b: { c: tf.variable(tf.zeros([2, 2], 'int32')) } }),
      'variables/b/c of type float32 in the file and int32 here',
    ],
    [
      'many differences',
      () => ({ d: a(), e: a(), f: a() }),
      'no variables/d in the file; no variables/e in the file; no variables/f in the file; and 2 more',
    ],
  ])('with %s is refused, and nothing is changed', async (_, targets, got) => {
    const bytes = await encodeCheckpoint(saved());
    const variables = targets() as Record<string, tf.Variable>;
    const before = Object.values(variables).filter((v) => v instanceof tf.Variable);
    const was = bits(before);
    expect(await refusal(() => decodeCheckpoint(bytes, { variables }))).toBe(
      `${head}${got}; resume with the model that was saved`,
    );
    expect(bits(before)).toBe(was);
  });

  it('or another optimizer is refused, and nothing is changed', async () => {
    const variable = a();
    const variables = { variable };
    const adam = tf.train.adam(0.1);
    adam.minimize(() => tf.sum(tf.square(variable)) as tf.Scalar, false, [variable]);
    const bytes = await encodeCheckpoint({ variables, optimizer: adam });
    const bare = await encodeCheckpoint({ variables });
    const rms = tf.train.rmsprop(0.1);
    variable.assign(tf.tensor1d([3, 4]));
    expect(await refusal(() => decodeCheckpoint(bytes, { variables, optimizer: rms }))).toBe(
      'CheckpointError: decodeCheckpoint: optimizer must be of the kind that was saved; got RMSProp where the file has Adam; make a Adam optimizer',
    );
    expect(await refusal(() => decodeCheckpoint(bare, { variables, optimizer: rms }))).toBe(
      'CheckpointError: decodeCheckpoint: optimizer must be of the kind that was saved; got RMSProp where the file has none; leave it out',
    );
    class Different extends tf.AdamOptimizer {
      extra = tf.variable(tf.scalar(1));
    }
    expect(
      await refusal(() => decodeCheckpoint(bytes, { variables, optimizer: new Different(0.1, 0.9, 0.999) })),
    ).toBe(`${head}no optimizer/extra in the file; resume with the model that was saved`);
    expect([...variable.dataSync()]).toEqual([3, 4]);
    await decodeCheckpoint(bytes, { variables });
    expect([...variable.dataSync()]).not.toEqual([3, 4]);
  });

  it('or of another kind is refused', async () => {
    const bytes = encodeSafetensors({ metadata: { format: 'pt' }, tensors: new Map() });
    expect(await refusal(() => decodeCheckpoint(bytes, { variables: { a: a() } }))).toBe(
      "CheckpointError: decodeCheckpoint: the file must be a 'leadline checkpoint 1'; got a safetensors file of another kind (pt); pass what checkpoint(…) wrote",
    );
    const unnamed = encodeSafetensors({ metadata: {}, tensors: new Map() });
    expect(await refusal(() => decodeCheckpoint(unnamed, { variables: { a: a() } }))).toContain(
      'another kind (unnamed)',
    );
  });
});

describe('refusals', () => {
  const variables = { a: weight([1]) };
  const text = tf.variable(tf.tensor1d(['a'], 'string'), false);
  it.each<[string, object, string]>([
    [
      'unknown keys',
      { variables, step: 3 },
      "ParameterError: checkpoint: options must be among variables, optimizer, streams, cursor; got 'step'; remove or rename it",
    ],
    [
      'no variables',
      {},
      'TrainingError: checkpoint: variables must hold tf.Variables; got undefined at the top; make one with tf.variable(…)',
    ],
    [
      'text',
      { variables: { text } },
      'CheckpointError: checkpoint: variables must be float32, int32 or bool; got string for variables/text; leave it out',
    ],
    [
      'one name twice',
      { variables: { 'a/b': variables.a, a: { b: weight([2]) } } },
      'CheckpointError: checkpoint: names must be unique; got variables/a/b twice; rename a key',
    ],
    [
      'no stream',
      { variables, streams: { s: 3 } },
      'StreamError: checkpoint: streams.s: stream must be a Stream; got a value of type number; pass stream(seed) or a fork of one',
    ],
    [
      'NaN in the cursor',
      { variables, cursor: { a: [1, Number.NaN] } },
      'ParameterError: checkpoint: cursor.a[1] must be a JSON value; got NaN; keep finite numbers, strings, booleans, null, arrays and plain objects of them',
    ],
    [
      'undefined in the cursor',
      { variables, cursor: { a: undefined } },
      'ParameterError: checkpoint: cursor.a must be a JSON value; got undefined; keep finite numbers, strings, booleans, null, arrays and plain objects of them',
    ],
    [
      'a date in the cursor',
      { variables, cursor: { a: new Date(0) } },
      'ParameterError: checkpoint: cursor.a must be a JSON value; got an instance of Date; keep finite numbers, strings, booleans, null, arrays and plain objects of them',
    ],
    [
      'no optimizer',
      { variables, optimizer: 3 },
      'TrainingError: checkpoint: optimizer must be a tfjs optimizer; got 3; make one with for example tf.train.adam(1e-3)',
    ],
  ])('checkpoint refuses %s', async (_, contents, message) => {
    const path = join(folder, 'never.safetensors');
    const before = tf.memory().numTensors;
    expect(await refusal(() => checkpoint(path, contents as CheckpointContents))).toBe(message);
    expect(tf.memory().numTensors).toBe(before);
    expect(await readdir(folder)).not.toContain('never.safetensors');
  });

  it('of paths say what the system said', async () => {
    const missing = join(folder, 'none', 'a.safetensors');
    expect(await refusal(() => checkpoint(missing, { variables }))).toMatch(
      /^CheckpointError: checkpoint: path must be writable; got .*a\.safetensors: ENOENT.*; choose a folder that exists and has room$/,
    );
    expect(await refusal(() => resume(missing, { variables }))).toMatch(
      /^CheckpointError: resume: path must be a readable checkpoint; got .*a\.safetensors: ENOENT.*; start anew where there is none yet$/,
    );
    const empty =
      "ParameterError: resume: path must be a file's path; got the string ''; pass for example 'run.safetensors'";
    expect(await refusal(() => resume('', { variables }))).toBe(empty);
    expect(await refusal(() => checkpoint(3 as never, { variables }))).toBe(
      "ParameterError: checkpoint: path must be a file's path; got 3; pass for example 'run.safetensors'",
    );
    const full = join(folder, 'folder.safetensors');
    await import('node:fs/promises').then((files) => files.mkdir(full));
    expect(await refusal(() => checkpoint(full, { variables }))).toContain(
      'CheckpointError: checkpoint: path must be writable',
    );
    expect(await readdir(folder)).not.toContain('folder.safetensors.unfinished');
  });

  it('of bytes and targets', async () => {
    expect(await refusal(() => decodeCheckpoint('a' as never, { variables }))).toBe(
      "ParameterError: decodeCheckpoint: bytes must be a Uint8Array; got the string 'a'; pass what encodeCheckpoint returned",
    );
    expect(await refusal(() => decodeCheckpoint(new Uint8Array(9), { variable: 1 } as never))).toBe(
      "ParameterError: decodeCheckpoint: options must be among variables, optimizer; got 'variable'; remove or rename it",
    );
  });
});
