import * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { isScalar, type ScalarDistribution } from '../distributions/scalarFamily.js';
import { broadcastShapes } from '../kernels/layout.js';
import { applyFormula } from '../tensor/apply.js';
import { composedExp, composedSigmoid, composedSoftplus } from '../tensor/composedMath.js';
import { type Formula, kernel } from '../tensor/formula.js';
import { addKl, type ClosedKlPairs } from './registry.js';

// Closed divergences of scalar families. Each formula reads q's parameters, then p's, in the families' order.
// Sources: the normal, exponential and Poisson forms in Kullback, Information Theory and Statistics (1959),
// chapters 2 and 9; the Laplace, uniform and Bernoulli ones by direct integration. The accurate arrangements
// of each stand beside the double-precision formulas.

function add(pair: keyof ClosedKlPairs, formula: Formula): void {
  addKl(pair, (q, p, fold) => {
    const [a, b] = [scalar(q), scalar(p)];
    const shape = broadcastShapes('kl', [a.arrayShape, b.arrayShape]);
    return applyFormula('kl', formula, [...Object.values(a.operands), ...Object.values(b.operands)], {
      shape,
      fold,
    });
  });
}

function scalar(d: Distribution): ScalarDistribution {
  if (!isScalar(d)) throw new TypeError(`kl: ${d.family} is not a scalar family`);
  return d;
}

const normalKl = kernel('normalKl', (m, s, n, t) => {
  const r = tf.square(tf.div(s!, t!));
  const d = tf.square(tf.div(tf.sub(m!, n!), t!));
  return tf.mul(0.5, tf.sub(tf.add(r, d), tf.add(1, tf.log(r))));
});

/** Registers the closed forms. */
export function registerScalarKl(): void {
  add('normal|normal', normalKl);
  // The divergence does not change under the exponential map.
  add('logNormal|logNormal', normalKl);
  add(
    'laplace|laplace',
    kernel('laplaceKl', (l, s, m, t) => {
      const gap = tf.abs(tf.sub(l!, m!));
      const r = tf.div(s!, t!);
      return tf.sub(
        tf.add(tf.div(gap, t!), tf.mul(r, composedExp(tf.neg(tf.div(gap, s!))))),
        tf.add(1, tf.log(r)),
      );
    }),
  );
  add(
    'uniform|uniform',
    kernel('uniformKl', (a, b, c, d) =>
      tf.where(
        tf.logicalAnd(tf.greaterEqual(a!, c!), tf.lessEqual(b!, d!)),
        tf.sub(tf.log(tf.sub(d!, c!)), tf.log(tf.sub(b!, a!))),
        tf.fill(broadcastShapes('kl', [a!.shape, b!.shape, c!.shape, d!.shape]), Number.POSITIVE_INFINITY),
      ),
    ),
  );
  add(
    'exponential|exponential',
    kernel('exponentialKl', (r, s) => {
      const ratio = tf.div(s!, r!);
      return tf.sub(ratio, tf.add(1, tf.log(ratio)));
    }),
  );
  add(
    'bernoulli|bernoulli',
    kernel('bernoulliKl', (a, b) =>
      tf.add(tf.mul(composedSigmoid(a!), tf.sub(a!, b!)), tf.sub(composedSoftplus(b!), composedSoftplus(a!))),
    ),
  );
  add(
    'poisson|poisson',
    kernel('poissonKl', (r, s) => tf.add(tf.mul(r!, tf.log(tf.div(r!, s!))), tf.sub(s!, r!))),
  );
}
