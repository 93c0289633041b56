/** The packing line's bands: 64 of them, every 5 nm from 700 nm. */
export const wavelengths: readonly number[] = Array.from({ length: 64 }, (_, k) => 700 + 5 * k);

/** What decides a fruit's spectrum, and what the line does not see. */
export interface Causes {
  /** From 0, green, to 1, ripe. */
  readonly ripeness: number;
  /** Percent of the mass. */
  readonly water: number;
  /** Severity from 0, none, to 1. */
  readonly bruise: number;
  /** How far light goes under the skin, in mm. */
  readonly depth: number;
}

const peak = (at: number, center: number, width: number) => Math.exp(-0.5 * ((at - center) / width) ** 2);

/**
 * The absorbance at one wavelength in nm, before noise. Invented, though the places of the bands are the usual
 * ones: the tail of chlorophyll below 700 nm, sugar near 910 nm, water near 740 and 970 nm.
 */
export function absorbance(at: number, { ripeness, water, bruise, depth }: Causes): number {
  const chlorophyll = 0.9 * Math.exp(-3 * ripeness) * peak(at, 680, 28);
  const sugar = (0.08 + 0.3 * ripeness ** 2) * peak(at, 910, 24);
  // Juice from broken cells absorbs a little below where bound water does.
  const wet = (1 + 0.08 * (water - 84)) * (0.55 * peak(at, 970 - 12 * bruise, 32) + 0.15 * peak(at, 742, 18));
  const browning = 0.45 * bruise * Math.exp((700 - at) / 130);
  // The less deep light goes, the more of it the skin throws back.
  const skin = 0.25 * (8 / depth);
  return skin + (depth / 8) * (chlorophyll + sugar + wet) + browning;
}

/** The sensor's noise, as a standard deviation in absorbance: more towards both ends of its range. */
export function sensorNoise(at: number): number {
  return 0.012 + 0.02 * ((at - 857.5) / 157.5) ** 2;
}
