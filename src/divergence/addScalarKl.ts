import * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { isScalar, type ScalarDistribution } from '../distributions/scalarFamily.js';
import { broadcastShapes } from '../kernels/layout.js';
import { applyFormula } from '../tensor/apply.js';
import type { Formula } from '../tensor/formula.js';
import { addKl, type ClosedKlPairs } from './registry.js';

/**
 * Adds the closed divergence of a pair of scalar families: a formula of q's parameters, then p's, in the families'
 * order and in the form that their own formulas read; of all of them, or of those at the places `reads`.
 */
export function addScalarKl(pair: keyof ClosedKlPairs, formula: Formula, reads?: readonly number[]): void {
  addKl(pair, (q, p, fold) => {
    const [a, b] = [scalar(q), scalar(p)];
    const shape = broadcastShapes('kl', [a.arrayShape, b.arrayShape], 'the arrayShapes of q and p');
    return tf.tidy(() => {
      const operands = [...Object.values(a.naturalOperands()), ...Object.values(b.naturalOperands())];
      const read = reads ? reads.map((k) => operands[k]!) : operands;
      return applyFormula('kl', formula, read, { shape, fold });
    });
  });
}

function scalar(d: Distribution): ScalarDistribution {
  if (!isScalar(d)) throw new TypeError(`kl: ${d.family} is not a scalar family`);
  return d;
}
