import { Violation } from '../lawError.js';
import { logDensityAt, type Subject } from '../subject.js';

const far = [-3e38, 3e38, Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY];
const negative = [-1e-38, -0.5, -1, -40, -3e38, Number.NEGATIVE_INFINITY];
const broken = [0.5, 2.5, 1e-38, 1 - 2 ** -24, Number.POSITIVE_INFINITY];

/** Points that no support of the name holds. */
const outsidePoints: Readonly<Record<string, readonly number[]>> = {
  real: [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
  interval: far,
  ray: [-3e38, Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
  positive: [...negative, Number.POSITIVE_INFINITY],
  unitInterval: [...negative, 1 + 2 ** -23, 2, 3e38, Number.POSITIVE_INFINITY],
  circle: [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY],
  binary: [...negative, ...broken, 2],
  count: [...negative, ...broken],
  categories: [...negative, ...broken, 3e38],
};

const anywhere = [0, 1e-38, 1e-6, 0.5, 1 - 2 ** -24, 1, 1 + 2 ** -23, 2, 1e6, -1e-6, -1, -1e6, ...far];

/** The log density is −∞ outside the support and NaN nowhere. */
export function outside(subject: Subject): void {
  const { d } = subject;
  const beyond = outsidePoints[d.support.name]!;
  logDensityAt(d, beyond).forEach((v, i) => {
    if (v === Number.NEGATIVE_INFINITY) return;
    throw new Violation(
      `the log density outside the support, at ${beyond[i]}, must be −∞`,
      v,
      '-Infinity',
      'the first test in logDensity: it must fail there before any arithmetic',
    );
  });
  logDensityAt(d, anywhere).forEach((v, i) => {
    if (!Number.isNaN(v)) return;
    throw new Violation(
      `the log density at ${anywhere[i]} must not be NaN`,
      v,
      'a number or an infinity',
      'logDensity: a difference of infinities, or zero times one',
    );
  });
}
