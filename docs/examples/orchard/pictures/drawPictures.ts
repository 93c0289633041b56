import type { Dataset } from '../dataset.js';
import type { Findings } from '../examine.js';
import type { CurvePoint } from '../fitModel.js';
import type { Reconstructed } from '../reconstruct.js';
import type { Words } from '../report.js';
import { bandAxis } from './bandAxis.js';
import { latentMap } from './latentMap.js';
import { learningCurve } from './learningCurve.js';
import { reconstructions } from './reconstructions.js';
import { renderSvg } from './renderSvg.js';

/** A picture to be written. */
export interface Picture {
  readonly name: string;
  readonly svg: string;
  readonly complaints: readonly string[];
}

const shown = 6;

/** All pictures of a run. */
export async function drawPictures(
  { bands, heldOut }: Dataset,
  findings: Findings,
  curve: readonly CurvePoint[],
  rebuilt: readonly Reconstructed[][],
  { noun, nouns }: Words,
  valueTitle: string,
): Promise<Picture[]> {
  const [first] = [...heldOut.causes];
  // From the lowest to the highest value of the first cause, so that they differ.
  const order = rebuilt.map((_, i) => i);
  if (first) order.sort((a, b) => first[1][a]! - first[1][b]!);
  const picked = Array.from(
    { length: Math.min(shown, order.length) },
    (_, k, last = Math.min(shown, order.length) - 1) =>
      order[Math.round((k * (order.length - 1)) / Math.max(1, last))]!,
  );
  const titled = picked.map((i) => ({
    title: `held-out ${noun} ${i + 1}${first ? `, ${first[0]} ${Number(first[1][i]!.toPrecision(3))}` : ''}`,
    bands: rebuilt[i]!,
  }));
  const specs = {
    'learning-curve.svg': learningCurve(curve, noun, nouns),
    'latent-map.svg': latentMap(heldOut, findings, nouns),
    'reconstructions.svg': reconstructions(titled, bandAxis(bands), valueTitle, nouns),
  };
  return Promise.all(
    Object.entries(specs).map(async ([name, spec]) => ({ name, ...(await renderSvg(spec)) })),
  );
}
