import * as tf from '@tensorflow/tfjs';
import { beforeAll, expect, test } from 'vitest';
import { composed, kl, multivariateNormal, stream } from '../../src/index.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

test('composed: means of more array axes than the factors have', () => {
  const noise = stream(91);
  const factor = tf.add(tf.mul(noise.uniform([2, 3, 3]), 0.3), tf.eye(3));
  const q = multivariateNormal({ mean: noise.normal([5, 2, 3]), covarianceFactor: factor });
  const p = multivariateNormal({
    mean: [0, 0.5, 1],
    covarianceFactor: tf.add(factor, tf.mul(tf.eye(3), 0.5)),
  });
  const exact = kl(q, p);
  expect(exact.shape).toEqual([5, 2]);
  const got = composed(() => kl(q, p)).dataSync();
  exact.dataSync().forEach((v, i) => {
    // Float32 operations in a row, on terms of the size of the divergence.
    expect(Math.abs(got[i]! - v)).toBeLessThan(1e-5 * Math.max(1, v));
  });
});
