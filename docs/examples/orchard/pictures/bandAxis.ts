/** Where the bands stand along an axis, and what it is called. */
export interface BandAxis {
  readonly title: string;
  readonly positions: readonly number[];
}

/** Reads positions from headers such as "700 nm" or "3.5"; other headers are numbered. */
export function bandAxis(names: readonly string[]): BandAxis {
  const read = names.map((name) => /^([+-]?\d+(?:\.\d+)?)\s*(\D*)$/.exec(name));
  const units = new Set(read.map((match) => match?.[2]));
  const [unit] = units;
  if (units.size !== 1 || unit === undefined) {
    return { title: 'column, in the order of the file', positions: names.map((_, k) => k + 1) };
  }
  const title =
    unit === 'nm'
      ? 'wavelength (nm)'
      : unit === ''
        ? 'column, by its header'
        : `column, by its header (${unit})`;
  return { title, positions: read.map((match) => Number(match![1])) };
}
