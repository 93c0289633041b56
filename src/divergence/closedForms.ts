import type { Distribution } from '../distributions/distribution.js';
import { registerCategoricalKl } from './categoricalKl.js';
import { registerMultivariateNormalKl } from './multivariateNormalKl.js';
import { registerAsymmetricLaplaceKl } from './own/asymmetricLaplaceKl.js';
import { registerBetaKl } from './own/betaKl.js';
import { registerContinuousBernoulliKl } from './own/continuousBernoulliKl.js';
import { registerExponentialCrossKl } from './own/exponentialCrossKl.js';
import { registerExtremeKl } from './own/extremeKl.js';
import { registerGammaKl } from './own/gammaKl.js';
import { registerInverseGaussianKl } from './own/inverseGaussianKl.js';
import { registerReciprocalKl } from './own/reciprocalKl.js';
import { registerScaleKl } from './own/scaleKl.js';
import { registerVonMisesKl } from './own/vonMisesKl.js';
import { findKl, type KlFormula } from './registry.js';
import { registerScalarKl } from './scalarKl.js';

let ready = false;

/** Registers the library's own closed forms, on first use: importing the library runs nothing. */
export function ensureClosedForms(): void {
  if (ready) return;
  ready = true;
  registerScalarKl();
  registerReciprocalKl();
  registerContinuousBernoulliKl();
  registerAsymmetricLaplaceKl();
  registerCategoricalKl();
  registerMultivariateNormalKl();
  registerScaleKl();
  registerExtremeKl();
  registerExponentialCrossKl();
  registerGammaKl();
  registerBetaKl();
  registerInverseGaussianKl();
  registerVonMisesKl();
}

/** The closed form for a pair of distributions, or `undefined`. */
export function closedKl(q: Distribution, p: Distribution): KlFormula | undefined {
  ensureClosedForms();
  return findKl(q, p);
}
