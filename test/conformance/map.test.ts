import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import { LawError, lawsOfMap } from '../../src/conformance/index.js';
import { affineMap, expMap, type SmoothMap, sigmoidMap, softplusMap } from '../../src/index.js';
import { failing, plus } from './spoiled.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

describe.each([expMap(), sigmoidMap(), softplusMap(), affineMap({ shift: 1.5, stretch: -0.3 })])(
  '$name',
  (map) => {
    test.each(lawsOfMap(map, { seed: 500, runs: 20 }))('$name', ({ check }) => check());
  },
);

describe('a mistake is caught by the laws that it breaks', () => {
  const images = 'images lie in the set that it maps onto';
  const undoes = 'invert undoes apply';
  const volume = 'the log volume is the logarithm of the slope';
  const slopes = 'its derivatives are right';
  const rises = 'it rises or falls as it says';
  const shapes = 'shapes are kept';
  const leak = 'nothing leaks';
  const right = softplusMap();
  const kept: tf.Tensor[] = [];
  test.each<[string, Partial<SmoothMap>, string[]]>([
    ['nothing', {}, []],
    [
      'a log volume off by a hundredth',
      { logVolume: (z) => tf.tidy(() => plus(right.logVolume(z), 0.01)) },
      [volume],
    ],
    [
      'an inverse off by a hundredth',
      { invert: (x) => tf.tidy(() => plus(right.invert(x), 0.01)) },
      [undoes],
    ],
    ['images below zero', { apply: (z) => tf.tidy(() => plus(right.apply(z), -1)) }, [images, undoes]],
    ['a wrong direction', { rising: false }, [rises]],
    [
      'a cut gradient',
      {
        apply: (z) =>
          tf.tidy(() =>
            tf.customGrad((v) => ({
              value: right.apply(v as tf.Tensor),
              gradFunc: (dy) => tf.mul(dy as tf.Tensor, 0.5),
            }))(z),
          ),
      },
      [slopes, volume],
    ],
    [
      'one axis too many',
      { logVolume: (z) => tf.tidy(() => tf.expandDims(right.logVolume(z), 0)) },
      [shapes],
    ],
    [
      'a tensor left behind',
      {
        logVolume: (z) => {
          kept.push(tf.scalar(1));
          return right.logVolume(z);
        },
      },
      [leak],
    ],
  ])('%s', async (_what, spoil, expected) => {
    const found = await failing(lawsOfMap({ ...right, ...spoil }, { seed: 501 }));
    expect([...found.keys()].sort()).toEqual(expected.sort());
    tf.dispose(kept);
  });
});

test('a failing law says what to look at and how to replay it', async () => {
  const laws = lawsOfMap({ ...expMap(), logVolume: (z) => plus(z, 1) }, { seed: 3 });
  const told = await laws[2]!.check().catch((error: unknown) => error);
  expect(told).toBeInstanceOf(LawError);
  expect((told as LawError).message).toMatch(
    /^expMap: the log volume at \S+ must be the logarithm of the derivative of apply; got \S+, expected .*; look at logVolume, or the gradient of apply; parameters .*, seed 3, path /,
  );
});

test('what is no map is refused', () => {
  expect(() => lawsOfMap({ apply: 1 } as never)).toThrow(
    'lawsOfMap: map must have apply, invert and logVolume; got an object with keys apply; pass for example expMap()',
  );
});
