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
  const count = Math.min(shown, order.length);
  const titled = Array.from({ length: count }, (_, k) => {
    const i = order[Math.round((k * (order.length - 1)) / Math.max(1, count - 1))]!;
    const row = `${noun === 'row' ? '' : `${noun} in `}row ${heldOut.numbers[i]}`;
    return {
      title: first ? `${row}, ${first[0]} ${Number(first[1][i]!.toPrecision(3))}` : row,
      bands: rebuilt[i]!,
    };
  });
  const specs = {
    'learning-curve.svg': learningCurve(curve, noun, nouns),
    'latent-map.svg': latentMap(heldOut, findings, nouns),
    'reconstructions.svg': reconstructions(titled, bandAxis(bands), valueTitle, nouns),
  };
  return Promise.all(
    Object.entries(specs).map(async ([name, spec]) => ({ name, ...(await renderSvg(spec)) })),
  );
}
