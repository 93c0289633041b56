import * as tf from '@tensorflow/tfjs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { composed, digamma, gammaP, lift, sigmoid } from '../../src/index.js';

// The cpu backend under an accelerator's name: what the library asks is the name alone.
beforeAll(async () => {
  tf.copyRegisteredKernels('cpu', 'webgpu');
  tf.registerBackend('webgpu', tf.findBackendFactory('cpu'));
  await tf.setBackend('webgpu');
});
afterAll(async () => {
  await tf.setBackend('cpu');
  tf.removeBackend('webgpu');
});

describe('on an accelerator', () => {
  it('a formula without a form in tensor operations runs by its kernel, with its derivative', () => {
    tf.tidy(() => {
      expect(tf.getBackend()).toBe('webgpu');
      expect(digamma(tf.scalar(1)).dataSync()[0]).toBe(Math.fround(-0.5772156649015329));
      expect(
        tf
          .grad((x) => digamma(x))(tf.scalar(1))
          .dataSync()[0],
      ).toBe(Math.fround(Math.PI ** 2 / 6));
      // P(1, x) = 1 − e^−x.
      expect(gammaP(1, tf.tensor1d([2])).dataSync()[0]).toBe(Math.fround(-Math.expm1(-2)));
    });
  });

  it('inside composed it still says that it has none', () => {
    tf.tidy(() => {
      expect(() => composed(() => digamma(tf.scalar(1)))).toThrow(
        'digamma: it must be evaluated by its kernel, outside composed(…); got composed(…), and it has no form in tensor operations; move it out of composed',
      );
    });
  });

  it('a lifted formula without a composed function runs by its numbers, one with it by that', () => {
    let composedCalls = 0;
    const plain = { name: 'double', value: (x: number) => 2 * x, partials: [() => 2] };
    const both = lift({
      ...plain,
      composed: (x: tf.Tensor) => {
        composedCalls++;
        return tf.mul(2, x);
      },
    });
    tf.tidy(() => {
      const bare = lift(plain);
      expect(bare([1, 4]).arraySync()).toEqual([2, 8]);
      expect(() => composed(() => bare([1, 4]))).toThrow(
        'double: the formula must have a composed form here; got none; give lift a composed function over tensors',
      );
      expect(both([1, 4]).arraySync()).toEqual([2, 8]);
    });
    expect(composedCalls).toBe(1);
  });

  it('a formula with a form in tensor operations runs by that: it has a second derivative', () => {
    tf.tidy(() => {
      const second = tf
        .grad((x) => tf.grad((y) => sigmoid(y))(x))(tf.scalar(1))
        .dataSync()[0]!;
      const s = 1 / (1 + Math.exp(-1));
      expect(Math.abs(second - s * (1 - s) * (1 - 2 * s))).toBeLessThan(1e-6);
    });
  });
});
