import * as tf from '@tensorflow/tfjs';
import { ParameterError, ShapeError } from '../errors.js';
import { requireStream, type Stream } from '../random/stream.js';
import { describe, requireCount, requireKnownKeys, requireTensor, shapeText } from '../tensor/checks.js';
import { glorotUniform } from './initialWeights.js';

/** Nonlinearities between the layers of a {@link multilayerPerceptron}. */
export type Activation = 'tanh' | 'relu' | 'sigmoid' | 'linear';

const activations: Record<Activation, (x: tf.Tensor2D) => tf.Tensor2D> = {
  tanh: (x) => tf.tanh(x),
  relu: (x) => tf.relu(x),
  sigmoid: (x) => tf.sigmoid(x),
  linear: (x) => x,
};

/** Options of {@link multilayerPerceptron}. */
export interface PerceptronOptions {
  /** Sizes of the layers from the input to the output, at least two. */
  readonly sizes: readonly number[];
  /** The nonlinearity after every layer but the last; `'tanh'` unless given. */
  readonly activation?: Activation;
  /** The nonlinearity after the last layer; `'linear'` unless given. */
  readonly outputActivation?: Activation;
}

/** A function from features to features with variables to train. */
export interface Network {
  (x: tf.Tensor): tf.Tensor2D;
  /** The variables, weights and biases in the order of the layers. */
  readonly variables: tf.Variable[];
  /** Frees the variables. */
  dispose(): void;
}

/**
 * A small fully connected network whose starting weights come from a stream, so that a run can be repeated.
 * For encoders and decoders of vectors; any other function of tensors, `tf.layers` models included, works as
 * well.
 *
 * Formula: each layer is activation(x W + b), W from Glorot and Bengio's uniform law, b zero.
 * Shapes: `[rows, sizes[0]]` to `[rows, sizes.at(-1)]`; leading axes beyond the rows are refused.
 * Gradient route: tfjs's own.
 *
 * @param stream - the source of the starting weights; it is advanced
 * @param options - `sizes`, `activation`, `outputActivation`
 * @throws ParameterError for wrong options; ShapeError, when called, for features of the wrong size.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { multilayerPerceptron, stream } from 'leadline';
 * const encoder = multilayerPerceptron(stream(1), { sizes: [64, 32, 4] });
 * console.log(encoder(tf.zeros([10, 64])).shape, encoder.variables.length);
 * // [ 10, 4 ] 4
 * ```
 * Source: Glorot and Bengio, AISTATS 2010, equation 16, for the starting weights.
 */
export function multilayerPerceptron(stream: Stream, options: PerceptronOptions): Network {
  const where = 'multilayerPerceptron';
  requireStream(where, stream);
  requireKnownKeys(where, options, ['sizes', 'activation', 'outputActivation']);
  const { sizes, activation = 'tanh', outputActivation = 'linear' } = options;
  if (!Array.isArray(sizes) || sizes.length < 2) {
    throw new ParameterError(
      `${where}: sizes must be at least two layer sizes; got ${describe(sizes)}; pass for example sizes: [64, 128, 8]`,
    );
  }
  for (const size of sizes) requireCount(where, 'each of sizes', size, 1);
  for (const name of [activation, outputActivation]) {
    if (!Object.hasOwn(activations, name)) {
      throw new ParameterError(
        `${where}: activation must be one of ${Object.keys(activations).join(', ')}; got ${describe(name)}; pass one of these`,
      );
    }
  }
  const layers = sizes.slice(1).map((outputs: number, k: number) => {
    const inputs = sizes[k]!;
    const weights = tf.tidy(() =>
      tf.variable(tf.tensor2d(glorotUniform(stream, [inputs, outputs]), [inputs, outputs])),
    );
    const bias = tf.tidy(() => tf.variable(tf.zeros([outputs])));
    return { weights, bias, activate: activations[k === sizes.length - 2 ? outputActivation : activation] };
  });
  const variables = layers.flatMap(({ weights, bias }) => [weights, bias] as tf.Variable[]);
  const apply = (x: tf.Tensor): tf.Tensor2D => {
    requireTensor(where, 'x', x);
    if (x.shape.length !== 2 || x.shape[1] !== sizes[0]) {
      throw new ShapeError(
        `${where}: x must be [rows, ${sizes[0]}]; got ${shapeText(x.shape)}; flatten each row's features, or set sizes[0]`,
      );
    }
    return tf.tidy(() =>
      layers.reduce(
        (features, { weights, bias, activate }) =>
          activate(tf.add(tf.matMul(features, weights as tf.Tensor2D), bias) as tf.Tensor2D),
        x as tf.Tensor2D,
      ),
    );
  };
  return Object.freeze(
    Object.assign(apply, {
      variables,
      dispose: () => {
        for (const variable of variables) variable.dispose();
      },
    }),
  );
}
