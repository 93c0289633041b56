import * as tf from '@tensorflow/tfjs';
import { product } from '../../distributions/product.js';
import { Violation } from '../lawError.js';
import { type Member, memberFrom, numbers, parameterTensors, type Subject, streamFor } from '../subject.js';

/**
 * Parameters broadcast to `arrayShape`, `count` stands in front of it, points broadcast against it, every member of
 * an array equals the member alone, and `product` folds an axis.
 */
export function shapes(one: Subject, two: Subject): void {
  stacked(one, two);
  crossed(one, two);
}

/** Two members side by side. */
function stacked(one: Subject, two: Subject): void {
  tf.tidy(() => {
    const [a, b] = [parameterTensors(one), parameterTensors(two)];
    const alike =
      a.length === b.length &&
      a.every((t, k) => tf.util.arraysEqual(t.shape, b[k]!.shape)) &&
      sameNames(one, two);
    const both = memberFrom(
      one,
      a.map((t, k) => tf.stack([t, alike ? b[k]! : t])),
    );
    const members = [one.d, alike ? two.d : one.d];
    const { arrayShape, pointShape } = one.d;
    requireShape('arrayShape of two members', both.arrayShape, [2, ...arrayShape]);
    requireShape('pointShape of two members', both.pointShape, pointShape);
    const source = () => streamFor(one, 'shapes');
    const draw = both.draw(source());
    requireShape('draw(stream)', draw.shape, [2, ...arrayShape, ...pointShape]);
    const draws = both.draw(source(), 3);
    requireShape('draw(stream, 3)', draws.shape, [3, 2, ...arrayShape, ...pointShape]);
    const scored = both.drawScored(source(), 3);
    requireShape('drawScored(stream, 3).value', scored.value.shape, draws.shape);
    requireShape('drawScored(stream, 3).logDensity', scored.logDensity.shape, [3, 2, ...arrayShape]);
    requireShape('draw(stream, 0)', both.draw(source(), 0).shape, [0, 2, ...arrayShape, ...pointShape]);
    const score = both.logDensity(draws);
    requireShape('logDensity of three draws', score.shape, [3, 2, ...arrayShape]);
    requireMembers(
      'logDensity',
      score,
      members.map((d, k) => d.logDensity(tf.gather(draws, k, 1))),
      1,
    );
    requireShape('detached().arrayShape', both.detached().arrayShape, both.arrayShape);
    for (const name of ['mean', 'variance', 'mode', 'entropy'] as const) {
      if (!both[name]) continue;
      const value = both[name]();
      requireShape(`${name}()`, value.shape, [2, ...arrayShape, ...(name === 'entropy' ? [] : pointShape)]);
      requireMembers(
        name,
        value,
        members.map((d) => d[name]!()),
        0,
      );
    }
    if (both.cdf)
      requireMembers(
        'cdf',
        both.cdf(draws),
        members.map((d, k) => d.cdf!(tf.gather(draws, k, 1))),
        1,
      );
    const joint: Member = product(both);
    requireShape('arrayShape of product(d)', joint.arrayShape, arrayShape.length === 0 ? [] : [2]);
    if (arrayShape.length > 0) return;
    requireShape('pointShape of product(d)', joint.pointShape, [2, ...pointShape]);
    const folded = joint.logDensity(draws);
    requireShape('logDensity of product(d)', folded.shape, [3]);
    requireNear('logDensity of product(d)', folded, tf.sum(score, 1));
  });
}

/** Where all parameters are plain numbers: a row of one against a column of the others. */
function crossed(one: Subject, two: Subject): void {
  const values = Object.values(one.parameters);
  if (values.length < 2 || !sameNames(one, two) || values.some(({ shape }) => shape.length > 0)) return;
  tf.tidy(() => {
    const [a, b] = [parameterTensors(one), parameterTensors(two)];
    // Within one parameter all numbers are alike, so that no constraint between parameters is broken.
    const tensors = a.map((t, k) =>
      k === 0 ? tf.tile(t.reshape([1, 1]), [2, 1]) : tf.tile(t.reshape([1]), [3]),
    );
    const d = memberFrom(one, tensors);
    requireShape('arrayShape of [2, 1] and [3]', d.arrayShape, [2, 3]);
    requireShape('draw(stream, 4)', d.draw(streamFor(one, 'shapes'), 4).shape, [4, 2, 3]);
    const x = tf.gather(one.d.draw(streamFor(one, 'points'), 2), [0, 1]).reshape([2, 1, 1]);
    const score = d.logDensity(x);
    requireShape('logDensity of points [2, 1, 1] under [2, 3]', score.shape, [2, 2, 3]);
    requireNear('a member of [2, 3]', score, tf.tile(one.d.logDensity(x), [1, 2, 3]));
    tf.dispose(b);
  });
}

function sameNames(one: Subject, two: Subject): boolean {
  return Object.keys(one.parameters).join() === Object.keys(two.parameters).join();
}

function requireMembers(what: string, whole: tf.Tensor, parts: readonly tf.Tensor[], axis: number): void {
  parts.forEach((part, k) => {
    requireNear(`member ${k} of ${what}`, tf.gather(whole, k, axis), part);
  });
}

function requireNear(what: string, got: tf.Tensor, expected: tf.Tensor): void {
  requireShape(what, got.shape, expected.shape);
  const [a, b] = [numbers(() => got.clone()), numbers(() => expected.clone())];
  a.forEach((v, i) => {
    // Float32 sums in another order.
    if (Object.is(v, b[i]) || Math.abs(v - b[i]!) <= 1e-5 * Math.max(1, Math.abs(b[i]!))) return;
    throw new Violation(
      `${what} must equal the member alone`,
      v,
      b[i]!,
      'how parameters and points broadcast: from the right, over the array axes',
    );
  });
}

function requireShape(what: string, got: readonly number[], expected: readonly number[]): void {
  if (tf.util.arraysEqual([...got], [...expected])) return;
  throw new Violation(
    `${what} must be of shape [${expected}]`,
    `[${got}]`,
    `[${expected}]`,
    'how parameters and points broadcast: from the right, over the array axes',
  );
}
