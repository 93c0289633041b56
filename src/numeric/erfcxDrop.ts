import { SQRT_PI } from './constants.js';
import { erfcx, erfcx_x } from './errorFunction.js';

/**
 * erfcx(u) − erfcx(u + h) for u > −2 and h ≥ 0, with relative accuracy.
 *
 * Written out where h is not small against 1 + |u|. Elsewhere twice Taylor's odd terms about the middle, of which the
 * third derivative is the last that counts: by erfcx′ = 2x erfcx − 2/√π, and beyond 10 by its asymptotic series
 * (DLMF 7.12.1). From 1e6 on h / (√π u (u + h)), the leading term.
 */
export function erfcxDrop(u: number, h: number): number {
  if (u > 1.0e6) return u === Infinity ? 0.0 : 1.0 / (SQRT_PI * u * (1.0 + u / h));
  if (h > 1.0e-3 * (1.0 + Math.abs(u))) return erfcx(u) - erfcx(u + h);
  const m = u + 0.5 * h;
  const first = erfcx_x(m);
  let third = 0.0;
  if (m > 10.0) {
    const s = 1.0 / (m * m);
    third = ((-6.0 + s * (30.0 - s * (157.5 - 945.0 * s))) * s * s) / SQRT_PI;
  } else {
    const second = 2.0 * (erfcx(m) + m * first);
    third = 4.0 * first + 2.0 * m * second;
  }
  return -h * (first + (h * h * third) / 24.0);
}
