// The log-logistic distribution in double precision: the logarithm follows a logistic distribution about log scale
// with scale 1 / shape. With L = log(x / scale) and t = shape · L the distribution function is 1 / (1 + exp(−t)).
// Source: Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 2 (1995), chapter 23, section 11.
import { PI } from '../constants.js';
import { logRatio } from '../deviance.js';
import { heldPositive } from '../heldPositive.js';
import { outside } from '../outside.js';
import { sigmoid, sigmoid_x } from '../sigmoid.js';
import { softplus } from '../softplus.js';
import { stretched } from '../stretched.js';
import { logOdds } from '../transforms.js';

function inner(x: number): boolean {
  return x > 0.0 && x < Infinity;
}

/**
 * Log density, log shape − log x − |t| − 2 log(1 + exp(−|t|)) for x > 0. At 0 its limit: +∞ below shape 1, −∞ above;
 * where it is infinite its partials are zero. @kernel
 */
export function logLogisticLogDensity(x: number, scale: number, shape: number): number {
  if (!inner(x)) {
    if (x !== 0.0) return outside(x);
    return shape < 1.0 ? Infinity : shape > 1.0 ? -Infinity : -Math.log(scale);
  }
  const t = Math.abs(shape * logRatio(x, scale));
  return Math.log(shape) - Math.log(x) - t - 2.0 * Math.log1p(Math.exp(-t));
}
export function logLogisticLogDensity_x(x: number, scale: number, shape: number): number {
  if (!inner(x)) return x === 0.0 && shape === 1.0 ? -2.0 / scale : 0.0;
  return -(1.0 + shape * Math.tanh(0.5 * shape * logRatio(x, scale))) / x;
}
export function logLogisticLogDensity_scale(x: number, scale: number, shape: number): number {
  if (!inner(x)) return x === 0.0 && shape === 1.0 ? -1.0 / scale : 0.0;
  return (shape * Math.tanh(0.5 * shape * logRatio(x, scale))) / scale;
}
export function logLogisticLogDensity_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return 1.0 / shape - l * Math.tanh(0.5 * shape * l);
}

/** Distribution function, 1 / (1 + exp(−t)). @kernel */
export function logLogisticCdf(x: number, scale: number, shape: number): number {
  return x <= 0.0 ? 0.0 : sigmoid(shape * logRatio(x, scale));
}
export function logLogisticCdf_x(x: number, scale: number, shape: number): number {
  if (!inner(x)) return x === 0.0 ? (shape < 1.0 ? Infinity : shape > 1.0 ? 0.0 : 1.0 / scale) : 0.0;
  return (sigmoid_x(shape * logRatio(x, scale)) * shape) / x;
}
export function logLogisticCdf_scale(x: number, scale: number, shape: number): number {
  return inner(x) ? (-sigmoid_x(shape * logRatio(x, scale)) * shape) / scale : 0.0;
}
export function logLogisticCdf_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return l * sigmoid_x(shape * l);
}

/** Survival function, 1 / (1 + exp(t)). @kernel */
export function logLogisticSurvival(x: number, scale: number, shape: number): number {
  return x <= 0.0 ? 1.0 : sigmoid(-shape * logRatio(x, scale));
}
export function logLogisticSurvival_x(x: number, scale: number, shape: number): number {
  return -logLogisticCdf_x(x, scale, shape);
}
export function logLogisticSurvival_scale(x: number, scale: number, shape: number): number {
  return -logLogisticCdf_scale(x, scale, shape);
}
export function logLogisticSurvival_shape(x: number, scale: number, shape: number): number {
  return -logLogisticCdf_shape(x, scale, shape);
}

/** Log distribution function, −log(1 + exp(−t)). @kernel */
export function logLogisticLogCdf(x: number, scale: number, shape: number): number {
  return x <= 0.0 ? -Infinity : -softplus(-shape * logRatio(x, scale));
}
export function logLogisticLogCdf_x(x: number, scale: number, shape: number): number {
  return inner(x) ? (sigmoid(-shape * logRatio(x, scale)) * shape) / x : 0.0;
}
export function logLogisticLogCdf_scale(x: number, scale: number, shape: number): number {
  return inner(x) ? (-sigmoid(-shape * logRatio(x, scale)) * shape) / scale : 0.0;
}
export function logLogisticLogCdf_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return l * sigmoid(-shape * l);
}

/** Log survival function, −log(1 + exp(t)). @kernel */
export function logLogisticLogSurvival(x: number, scale: number, shape: number): number {
  return x <= 0.0 ? 0.0 : -softplus(shape * logRatio(x, scale));
}
export function logLogisticLogSurvival_x(x: number, scale: number, shape: number): number {
  return inner(x) ? (-sigmoid(shape * logRatio(x, scale)) * shape) / x : 0.0;
}
export function logLogisticLogSurvival_scale(x: number, scale: number, shape: number): number {
  return inner(x) ? (sigmoid(shape * logRatio(x, scale)) * shape) / scale : 0.0;
}
export function logLogisticLogSurvival_shape(x: number, scale: number, shape: number): number {
  if (!inner(x)) return 0.0;
  const l = logRatio(x, scale);
  return -l * sigmoid(shape * l);
}

/** Quantile, scale · (p / (1 − p))^(1 / shape). @kernel */
export function logLogisticQuantile(p: number, scale: number, shape: number): number {
  return stretched(scale, logOdds(p) / shape);
}
export function logLogisticQuantile_p(p: number, scale: number, shape: number): number {
  return logLogisticQuantile(p, scale, shape) / (shape * p * (1.0 - p));
}
export function logLogisticQuantile_scale(p: number, _scale: number, shape: number): number {
  return Math.exp(logOdds(p) / shape);
}
export function logLogisticQuantile_shape(p: number, scale: number, shape: number): number {
  const y = logOdds(p) / shape;
  return (-stretched(scale, y) * y) / shape;
}

/** Upper quantile, scale · ((1 − p) / p)^(1 / shape). @kernel */
export function logLogisticUpperQuantile(p: number, scale: number, shape: number): number {
  return stretched(scale, -logOdds(p) / shape);
}
export function logLogisticUpperQuantile_p(p: number, scale: number, shape: number): number {
  return -logLogisticUpperQuantile(p, scale, shape) / (shape * p * (1.0 - p));
}
export function logLogisticUpperQuantile_scale(p: number, _scale: number, shape: number): number {
  return Math.exp(-logOdds(p) / shape);
}
export function logLogisticUpperQuantile_shape(p: number, scale: number, shape: number): number {
  const y = -logOdds(p) / shape;
  return (-stretched(scale, y) * y) / shape;
}

/** Draw, scale · exp(noise / shape) of standard logistic noise, kept positive and finite. @kernel */
export function logLogisticDraw(noise: number, scale: number, shape: number): number {
  return heldPositive(stretched(scale, noise / shape));
}
export function logLogisticDraw_scale(noise: number, _scale: number, shape: number): number {
  return Math.exp(noise / shape);
}
export function logLogisticDraw_shape(noise: number, scale: number, shape: number): number {
  const y = noise / shape;
  return (-stretched(scale, y) * y) / shape;
}

// With b = π / shape: sin b, from the distance to π where that is nearer.
function sine(shape: number): number {
  return Math.sin(shape < 2.0 ? (PI * (shape - 1.0)) / shape : PI / shape);
}
// cos b for shape ≥ 2, from the distance to its zero.
function cosine(shape: number): number {
  return shape < 4.0 ? Math.sin((PI * (shape - 2.0)) / (2.0 * shape)) : Math.cos(PI / shape);
}
// 1 − b cot b and its derivative in u = 1 / shape by their series 2 Σ ζ(2k) u^2k (DLMF 4.19.6) for u ≤ 1/4.
const zetas: number[] = [
  3.28986813369645287, 2.16464646742227638, 2.03468612396889828, 2.00815471239588868, 2.00198915025563617,
  2.0004921731066161, 2.00012249627011741, 2.0000305645188173, 2.00000763458653, 2.00000190792406775,
  2.00000047690100546, 2.0000001192163781,
];
export function tangentRest(shape: number): number {
  const u = 1.0 / shape;
  if (u > 0.25) {
    const b = PI * u;
    const cos = shape < 2.0 ? -Math.cos((PI * (shape - 1.0)) / shape) : Math.cos(b);
    return 1.0 - (b * cos) / sine(shape);
  }
  let sum = 0.0;
  for (let k = 11; k >= 0; k--) sum = zetas[k]! + u * u * sum;
  return u * u * sum;
}
function tangentRestSlope(shape: number): number {
  const u = 1.0 / shape;
  if (u > 0.25) {
    const sin = sine(shape);
    return (PI * (PI * u - sin * Math.cos(PI * u))) / (sin * sin);
  }
  let sum = 0.0;
  let even = 24.0;
  for (let k = 11; k >= 0; k--) {
    sum = even * zetas[k]! + u * u * sum;
    even -= 2.0;
  }
  return u * sum;
}

/** Mean, scale · b / sin b with b = π / shape above shape 1, infinite below. @kernel */
export function logLogisticMean(scale: number, shape: number): number {
  return shape > 1.0 ? scale * logLogisticMean_scale(scale, shape) : Infinity;
}
export function logLogisticMean_scale(_scale: number, shape: number): number {
  return shape > 1.0 ? PI / (shape * sine(shape)) : 0.0;
}
export function logLogisticMean_shape(scale: number, shape: number): number {
  return shape > 1.0 ? (-logLogisticMean(scale, shape) / shape) * tangentRest(shape) : 0.0;
}

// The variance of the standard member, 2b / sin 2b − (b / sin b)², as b (1 − b cot b) / (sin b cos b).
function standardVariance(shape: number): number {
  return ((PI / (shape * sine(shape))) * tangentRest(shape)) / cosine(shape);
}

/** Variance, scale² (2b / sin 2b − (b / sin b)²) above shape 2, infinite below. @kernel */
export function logLogisticVariance(scale: number, shape: number): number {
  return shape > 2.0 ? scale * standardVariance(shape) * scale : Infinity;
}
export function logLogisticVariance_scale(scale: number, shape: number): number {
  return shape > 2.0 ? 2.0 * scale * standardVariance(shape) : 0.0;
}
export function logLogisticVariance_shape(scale: number, shape: number): number {
  if (!(shape > 2.0)) return 0.0;
  // The logarithm's derivative in 1 / shape.
  const rest = tangentRest(shape);
  const rise = rest * shape + (PI * sine(shape)) / cosine(shape) + tangentRestSlope(shape) / rest;
  return ((-scale * standardVariance(shape)) / shape) * (rise / shape) * scale;
}

/** Mode, scale · ((shape − 1) / (shape + 1))^(1 / shape) above shape 1, else 0. @kernel */
export function logLogisticMode(scale: number, shape: number): number {
  return scale * logLogisticMode_scale(scale, shape);
}
export function logLogisticMode_scale(_scale: number, shape: number): number {
  return shape > 1.0 ? Math.exp(logRatio(shape - 1.0, shape + 1.0) / shape) : 0.0;
}
export function logLogisticMode_shape(scale: number, shape: number): number {
  if (!(shape > 1.0)) return 0.0;
  const rest = 2.0 / (shape - 1.0) / (shape + 1.0) - logRatio(shape - 1.0, shape + 1.0) / shape;
  return (logLogisticMode(scale, shape) * rest) / shape;
}

/** Entropy, log(scale / shape) + 2. @kernel */
export function logLogisticEntropy(scale: number, shape: number): number {
  return Math.log(scale) - Math.log(shape) + 2.0;
}
export function logLogisticEntropy_scale(scale: number, _shape: number): number {
  return 1.0 / scale;
}
export function logLogisticEntropy_shape(_scale: number, shape: number): number {
  return -1.0 / shape;
}
