import type { Dataset } from './dataset.js';
import { aliveAbove, type Findings } from './examine.js';
import type { CurvePoint } from './fitModel.js';

/** What things are called. */
export interface Words {
  /** One row: fruit. */
  readonly noun: string;
  readonly nouns: string;
  /** The unit of the noise. */
  readonly unit: string;
}

/** The findings in words, line by line. */
export function report(
  { heldOut, bands }: Dataset,
  findings: Findings,
  curve: readonly CurvePoint[],
  coverage: number,
  { noun, nouns, unit }: Words,
): string[] {
  const { bound, withoutCauses, dimensions, causes, noise } = findings;
  const live = dimensions.filter(({ alive }) => alive).length;
  const widest = Math.max(...dimensions.map(({ divergence }) => divergence), aliveAbove);
  const percent = (share: number) => `${(100 * share).toFixed(1)} %`;
  const sorted = [...noise].sort((a, b) => a - b);
  return [
    '',
    `Held-out bound on the log evidence, in nats per ${noun} (${heldOut.x.shape[0]} ${nouns}, 20 draws each)`,
    `  ${bound.bound.toFixed(2)} ± ${bound.standardError.toFixed(2)} (standard error)`,
    `  ${withoutCauses.bound.toFixed(2)} ± ${withoutCauses.standardError.toFixed(2)} for ${bands.length} columns that share no cause`,
    ...overfitted(curve, bound.standardError, noun),
    '',
    `Divergence of each latent dimension, in nats per ${noun}; alive where above ${aliveAbove} on held-out ${nouns}`,
    ...dimensions.map(({ number, divergence, alive }) => {
      const bar = '█'.repeat(Math.round((24 * divergence) / widest));
      return `  z${String(number).padEnd(3)} ${divergence.toFixed(3).padStart(7)}  ${alive ? 'alive' : 'off  '}  ${bar}`.trimEnd();
    }),
    `  ${live} of ${dimensions.length} alive`,
    ...(causes.size === 0
      ? []
      : [
          '',
          'Hidden columns: share of the variance that a straight-line fit on the live dimensions explains',
          ...[...causes].map(
            ([name, share]) =>
              `  ${name.padEnd(12)} ${(Number.isNaN(share) ? 'does not vary' : percent(share)).padStart(7)}`,
          ),
        ]),
    '',
    'Noise and reconstruction',
    `  learned noise sd, over the columns: ${short(sorted[0]!)} to ${short(sorted.at(-1)!)} ${unit}`,
    `  ${percent(coverage)} of the held-out measurements lie in their 95 % band`,
  ];
}

/** Says so where training went on past the best it could do for rows it does not know. */
function overfitted(curve: readonly CurvePoint[], standardError: number, noun: string): string[] {
  const last = curve.at(-1);
  const best = curve.reduce<CurvePoint | undefined>(
    (top, point) => (top && top.heldOut >= point.heldOut ? top : point),
    undefined,
  );
  if (!last || !best || best.heldOut - last.heldOut <= 2 * standardError) return [];
  return [
    `  overfitted: it was ${best.heldOut.toFixed(2)} nats per ${noun} at step ${best.step}; use --steps ${best.step}, or more rows`,
  ];
}

function short(value: number): string {
  return String(Number(value.toPrecision(3)));
}
