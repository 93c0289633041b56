import { expectation, regionOf } from '../expectation.js';
import { requireClose } from '../lawError.js';
import { numbers, type Subject } from '../subject.js';

/**
 * Mean, variance and entropy are those of the density. Within 1e-3 of the distribution's spread or of the value: the
 * integrals are taken to 1e-7 of their scale, and far tails of heavy-tailed members lie beyond float32.
 */
export function moments(subject: Subject): void {
  const { d } = subject;
  const region = d.support.discrete ? undefined : regionOf(subject);
  const look = (name: string) => `${name}, where the density integrates to one`;
  const scalar = (name: 'mean' | 'variance' | 'entropy') => numbers(() => d[name]!())[0]!;
  if (d.entropy) {
    const entropy = expectation(subject, (_x, logP) => -logP, 1e-7, region);
    requireClose(
      scalar('entropy'),
      entropy,
      1e-3 * Math.max(1, Math.abs(entropy)),
      'the entropy must be minus the mean log density',
      look('entropy'),
    );
  }
  if (!d.mean && !d.variance) return;
  if (d.support.name === 'circle') {
    circularMoments(subject);
    return;
  }
  const centre = region?.middle ?? 0;
  const scale = region?.spread ?? 1;
  const shift = expectation(subject, (x) => (x - centre) / scale, 1e-7, region) * scale;
  const square = expectation(subject, (x) => ((x - centre) / scale) ** 2, 1e-7, region) * scale * scale;
  const variance = square - shift * shift;
  if (d.mean) {
    const mean = centre + shift;
    requireClose(
      scalar('mean'),
      mean,
      1e-3 * Math.sqrt(variance) + 1e-6 * Math.abs(mean),
      'the mean must be that of the density',
      look('mean'),
    );
  }
  if (d.variance)
    requireClose(
      scalar('variance'),
      variance,
      1e-3 * variance,
      'the variance must be that of the density',
      look('variance'),
    );
}

/** Mean direction and circular variance: the argument, and one minus the length, of the mean of exp(ix). */
function circularMoments(subject: Subject): void {
  const { d } = subject;
  const region = regionOf(subject);
  const cosine = expectation(subject, Math.cos, 1e-7, region);
  const sine = expectation(subject, Math.sin, 1e-7, region);
  const length = Math.hypot(cosine, sine);
  if (d.mean) {
    const mean = numbers(() => d.mean!())[0]!;
    const miss = Math.sin(mean - Math.atan2(sine, cosine));
    requireClose(miss * length, 0, 1e-4, 'the mean direction must be that of the density', 'mean');
  }
  if (d.variance) {
    const variance = numbers(() => d.variance!())[0]!;
    requireClose(variance, 1 - length, 1e-4, 'the circular variance must be that of the density', 'variance');
  }
}
