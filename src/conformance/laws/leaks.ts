import * as tf from '@tensorflow/tfjs';
import { Violation } from '../lawError.js';
import { memberFrom, parameterTensors, type Subject, streamFor } from '../subject.js';

/** Every function leaves exactly its result alive, the factory and `detached` nothing. */
export function leaks(subject: Subject): void {
  const parameters = parameterTensors(subject);
  try {
    requireLeft('the factory', 0, () => {
      memberFrom(subject, parameters);
      return undefined;
    });
    const d = memberFrom(subject, parameters);
    const stream = streamFor(subject, 'leaks');
    const x = subject.d.draw(stream, 3);
    const p = tf.tensor1d([0.2, 0.5, 0.7]);
    parameters.push(x, p);
    requireLeft('detached', 0, () => {
      d.detached();
      return undefined;
    });
    requireLeft('draw', 1, () => d.draw(stream));
    requireLeft('draw with a count', 1, () => d.draw(stream, 3));
    requireLeft('drawScored', 2, () => Object.values(d.drawScored(stream, 3)));
    requireLeft('logDensity', 1, () => d.logDensity(x));
    const score = (...given: tf.Tensor[]) => memberFrom(subject, given).logDensity(x);
    const inputs = parameters.slice(0, -2);
    requireLeft('the gradient of logDensity', inputs.length, () =>
      tf.grads(score as (...given: tf.Tensor[]) => tf.Tensor)(inputs),
    );
    for (const name of ['mean', 'variance', 'mode', 'entropy'] as const) {
      if (d[name]) requireLeft(name, 1, () => d[name]!());
    }
    for (const name of ['cdf', 'survival', 'logCdf', 'logSurvival'] as const) {
      if (d[name]) requireLeft(name, 1, () => d[name]!(x));
    }
    for (const name of ['quantile', 'upperQuantile'] as const) {
      if (d[name]) requireLeft(name, 1, () => d[name]!(p));
    }
  } finally {
    tf.dispose(parameters);
  }
}

function requireLeft(name: string, expected: number, act: () => tf.Tensor | tf.Tensor[] | undefined): void {
  const before = tf.memory().numTensors;
  const made = act();
  const left = tf.memory().numTensors - before;
  if (made) tf.dispose(made);
  if (left === expected) return;
  throw new Violation(
    `${name} must leave exactly its result alive`,
    `${left} tensors`,
    `${expected}`,
    `${name}: wrap its work in tf.tidy(() => …)`,
  );
}
