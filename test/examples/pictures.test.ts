import { describe, expect, it } from 'vitest';
import type { Findings } from '../../docs/examples/orchard/examine.js';
import { bandAxis } from '../../docs/examples/orchard/pictures/bandAxis.js';
import { latentMap } from '../../docs/examples/orchard/pictures/latentMap.js';
import { learningCurve } from '../../docs/examples/orchard/pictures/learningCurve.js';
import { reconstructions } from '../../docs/examples/orchard/pictures/reconstructions.js';
import { renderSvg } from '../../docs/examples/orchard/pictures/renderSvg.js';

/** The texts of a picture, after making sure that nothing was wrong with it. */
async function textsOf(spec: Parameters<typeof renderSvg>[0]): Promise<string[]> {
  const { svg, complaints } = await renderSvg(spec);
  expect(complaints).toEqual([]);
  expect(svg).toMatch(/^<svg /);
  expect(svg).not.toMatch(/NaN|undefined|Infinity/);
  return [...svg.matchAll(/<text[^>]*>([^<]*)<\/text>/g)].map(([, text]) => text!);
}

function findings(latents: number, live: number): Findings {
  return {
    bound: { bound: 0, standardError: 1, parts: { logLikelihood: {}, divergence: {} }, points: 9 },
    withoutCauses: { bound: 0, standardError: 1 },
    dimensions: Array.from({ length: latents }, (_, k) => ({
      number: k + 1,
      divergence: k < live ? 1 : 0,
      alive: k < live,
    })),
    causes: new Map(),
    means: Array.from({ length: 9 }, (_, i) =>
      Float32Array.from({ length: latents }, (_, k) => Math.sin(i + k)),
    ),
    noise: Float32Array.of(1),
  };
}

const causes = new Map([
  ['ripeness', Float64Array.from({ length: 9 }, (_, i) => i / 9)],
  ['sugar', Float64Array.from({ length: 9 }, (_, i) => 9 - i)],
]);
const part = (chosen: typeof causes) => ({ causes: chosen }) as unknown as Parameters<typeof latentMap>[0];

describe('pictures', () => {
  it('draw a learning curve', async () => {
    const curve = Array.from({ length: 20 }, (_, i) => ({ step: 10 * i, training: i, heldOut: i / 2 }));
    const texts = await textsOf(learningCurve(curve, 'fruit', 'fruits'));
    expect(texts).toEqual(
      expect.arrayContaining([
        'training step',
        'bound on the log evidence (nats per fruit)',
        'fruits trained on',
        'fruits held out',
      ]),
    );
  });

  it('draw a curve that does not move', async () => {
    const curve = [1, 2].map((step) => ({ step, training: 2, heldOut: 2 }));
    await textsOf(learningCurve(curve, 'row', 'rows'));
  });

  it.each([
    ['two hidden columns', causes, 5, 3, ['ripeness (0 green – 1 ripe)', 'sugar']],
    ['no hidden column', new Map(), 5, 3, []],
    ['no live dimension', causes, 5, 0, ['sugar']],
    ['one live dimension', causes, 5, 1, ['sugar']],
  ])('draw a map with %s', async (_, hidden, latents, live, titles) => {
    const texts = await textsOf(latentMap(part(hidden), findings(latents, live), 'rows'));
    expect(texts).toEqual(expect.arrayContaining(titles));
    expect(texts.filter((text) => text.endsWith('(prior sd = 1)'))).toHaveLength(
      2 * Math.max(1, hidden.size),
    );
    expect(texts.some((text) => text.includes('Color: '))).toBe(hidden.size > 0);
  });

  it('draw the axes that go with a column most closely', async () => {
    // The third dimension is the column itself, the first its square root.
    const base = findings(3, 3);
    const means = base.means.map((_, i) => Float32Array.of(Math.sqrt(i), (-1) ** i, i));
    const hidden = new Map([['sugar', Float64Array.from(means, (row) => row[2]!)]]);
    const texts = await textsOf(latentMap(part(hidden), { ...base, means }, 'rows'));
    expect(texts.filter((text) => text.endsWith('(prior sd = 1)'))).toEqual([
      'z3 (prior sd = 1)',
      'z1 (prior sd = 1)',
    ]);
  });

  it('draw reconstructions', async () => {
    const bands = Array.from({ length: 3 }, (_, k) => ({
      measured: k,
      mean: k + 0.1,
      low: k - 1,
      high: k + 1,
    }));
    const axis = bandAxis(['700 nm', '710 nm', '720 nm']);
    const texts = await textsOf(
      reconstructions(
        [
          { title: 'fruit 1', bands },
          { title: 'fruit 2', bands },
        ],
        axis,
        'absorbance',
        'fruits',
      ),
    );
    expect(texts).toEqual(
      expect.arrayContaining([
        'fruit 1',
        'fruit 2',
        'absorbance',
        'wavelength (nm)',
        'measured',
        '95 % band',
      ]),
    );
  });
});

describe('the axis of the bands', () => {
  it.each([
    [['700 nm', '705 nm'], 'wavelength (nm)', [700, 705]],
    [['0.5', '-2'], 'column, by its header', [0.5, -2]],
    [['3 s', '4 s'], 'column, by its header (s)', [3, 4]],
    [['3 s', '4 m'], 'column, in the order of the file', [1, 2]],
    [['u', 'v'], 'column, in the order of the file', [1, 2]],
  ])('of %j', (names, title, positions) => {
    expect(bandAxis(names)).toEqual({ title, positions });
  });
});
