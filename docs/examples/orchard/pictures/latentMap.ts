import type { TopLevelSpec } from 'vega-lite';
import type { Part } from '../dataset.js';
import type { Findings } from '../examine.js';

/** A cause with the unit it is measured in, where that is known. */
const units: Readonly<Record<string, string>> = {
  ripeness: 'ripeness (0 green – 1 ripe)',
  water: 'water (% of mass)',
  bruise: 'bruise (0 none – 1 severe)',
  depth: 'depth of light (mm)',
};

/**
 * Held-out rows where the recognizer puts them, colored by what it was never told: one panel per hidden
 * column, with the two live dimensions that go along with it most closely.
 */
export function latentMap(heldOut: Part, { means, dimensions }: Findings, nouns: string): TopLevelSpec {
  const live = dimensions.filter(({ alive }) => alive).map(({ number }) => number - 1);
  // A map needs two axes, be they alive or not.
  const axes = live.length >= 2 ? live : dimensions.slice(0, 2).map(({ number }) => number - 1);
  const causes = [...heldOut.causes].slice(0, 4);
  const side = causes.length > 1 ? 270 : 460;
  const panels = causes.map(([name, values]) => {
    const [a = 0, b = 1] = [...axes].sort((p, q) => related(means, q, values) - related(means, p, values));
    return panel(means, a, b, side, { title: units[name] ?? name, values });
  });
  if (panels.length === 0) panels.push(panel(means, axes[0]!, axes[1]!, side));
  const placed = `The ${nouns} held out, each at the mean of its posterior.`;
  return {
    title: {
      text: 'Latent map',
      subtitle: causes.length > 0 ? `${placed} Color: hidden columns, which the model never saw.` : placed,
    },
    concat: panels,
    columns: 2,
    spacing: 40,
    resolve: { scale: { color: 'independent' } },
  } as TopLevelSpec;
}

function panel(
  means: readonly Float32Array[],
  a: number,
  b: number,
  side: number,
  color?: { title: string; values: ArrayLike<number> },
) {
  const axis = (field: string, k: number) => ({
    field,
    type: 'quantitative',
    title: `z${k + 1} (prior sd = 1)`,
    scale: { zero: false },
  });
  return {
    width: side,
    height: side,
    data: { values: means.map((row, i) => ({ a: row[a]!, b: row[b]!, c: color?.values[i] ?? 0 })) },
    mark: { type: 'circle', size: 26, opacity: 0.85 },
    encoding: {
      x: axis('a', a),
      y: axis('b', b),
      color: color
        ? {
            field: 'c',
            type: 'quantitative',
            title: color.title,
            scale: { scheme: 'viridis' },
            legend: {
              orient: 'top',
              direction: 'horizontal',
              gradientLength: side,
              titlePadding: 6,
              tickCount: 4,
            },
          }
        : { value: '#0b6aa2' },
    },
  };
}

/** The squared correlation of a dimension with a cause. */
function related(means: readonly Float32Array[], k: number, values: ArrayLike<number>): number {
  const n = means.length;
  const center = (at: (i: number) => number) => means.reduce((sum, _, i) => sum + at(i), 0) / n;
  const [mz, mv] = [center((i) => means[i]![k]!), center((i) => values[i]!)];
  const together = center((i) => (means[i]![k]! - mz) * (values[i]! - mv));
  const spreads = center((i) => (means[i]![k]! - mz) ** 2) * center((i) => (values[i]! - mv) ** 2);
  return spreads > 0 ? together ** 2 / spreads : 0;
}
