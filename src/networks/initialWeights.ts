import { sizeOf } from '../kernels/layout.js';
import { noise } from '../random/noise.js';
import type { Stream } from '../random/stream.js';

/**
 * Starting weights of a layer: uniform on ±√(6 / (inputs + outputs)), which keeps the size of activations
 * and gradients alike through the layers.
 *
 * The last two axes are inputs and outputs; axes before them are a convolution's window.
 * Source: Glorot and Bengio, AISTATS 2010, equation 16.
 */
export function glorotUniform(stream: Stream, shape: readonly number[]): Float32Array {
  const inputs = shape[shape.length - 2] ?? 1;
  const outputs = shape[shape.length - 1] ?? 1;
  const window = sizeOf(shape.slice(0, -2));
  const limit = Math.sqrt(6 / (window * (inputs + outputs)));
  return noise(stream, 'uniform', sizeOf(shape)).map((u) => (2 * u - 1) * limit);
}
