import * as tf from '@tensorflow/tfjs';
import type { Stream } from 'leadline';
import { DemoError } from './DemoError.js';
import { causeNames } from './generate.js';
import type { Table } from './readCsv.js';

/** A set of rows: what the model sees, and what it does not. */
export interface Part {
  /** `[rows, bands]` */
  readonly x: tf.Tensor2D;
  /** The number of each row in the file. */
  readonly numbers: readonly number[];
  /** The columns that the model does not see, by name. */
  readonly causes: ReadonlyMap<string, Float64Array>;
}

/** A table made ready: rows to train on and rows held out. */
export interface Dataset {
  readonly bands: readonly string[];
  readonly training: Part;
  readonly heldOut: Part;
  /** The training rows' mean of each band. */
  readonly center: Float64Array;
  /** The training rows' standard deviation of each band. */
  readonly scale: Float64Array;
}

/** No more rows than this are held out: they are enough for a standard error of a few hundredths. */
const mostHeldOut = 2000;

/**
 * Sets the hidden columns apart, and a fifth of the rows, chosen by the stream.
 *
 * @param hidden - columns that the model must not see; by default the invented causes that the table has
 */
export function prepare(table: Table, file: string, stream: Stream, hidden?: readonly string[]): Dataset {
  const { names, places, rows, numbers } = table;
  const missing = hidden?.find((name) => !names.includes(name));
  if (missing !== undefined) {
    throw new DemoError(`${file}: --hidden must name columns of the header; it has no "${missing}"`);
  }
  const apart = hidden ?? causeNames.filter((name) => names.includes(name));
  const seen = names.flatMap((name, at) => (apart.includes(name) ? [] : [at]));
  if (seen.length < 2) {
    throw new DemoError(`${file}: must leave at least 2 columns for the model; got ${seen.length}`);
  }
  const order = [...tf.tidy(() => stream.permutation(rows.length).dataSync())];
  const aside = Math.min(mostHeldOut, Math.ceil(rows.length / 5));
  const training = order.slice(aside).map((i) => rows[i]!);
  const center = Float64Array.from(seen, (at) => mean(training, at));
  const scale = Float64Array.from(seen, (at, k) => spread(training, at, center[k]!));
  const still = seen.filter((_, k) => !(scale[k]! > 1e-6 * Math.abs(center[k]!)));
  if (still.length > 0) {
    const [at = 0] = still;
    const quoted = JSON.stringify(still.map((k) => names[k]).join(','));
    throw new DemoError(
      `${file}: ${places[at]}: must vary from row to row; got ${training[0]![at]} throughout; leave out such columns with --ignore ${quoted}`,
    );
  }
  const part = (chosen: readonly number[]): Part => ({
    x: tf.tensor2d(
      chosen.map((i) => seen.map((at) => rows[i]![at]!)),
      [chosen.length, seen.length],
    ),
    numbers: chosen.map((i) => numbers[i]!),
    causes: new Map(
      apart.map((name) => {
        const at = names.indexOf(name);
        return [name, Float64Array.from(chosen, (i) => rows[i]![at]!)];
      }),
    ),
  });
  return {
    bands: seen.map((at) => names[at]!),
    training: part(order.slice(aside)),
    heldOut: part(order.slice(0, aside)),
    center,
    scale,
  };
}

function mean(rows: readonly Float64Array[], at: number): number {
  return rows.reduce((sum, row) => sum + row[at]!, 0) / rows.length;
}

function spread(rows: readonly Float64Array[], at: number, center: number): number {
  return Math.sqrt(rows.reduce((sum, row) => sum + (row[at]! - center) ** 2, 0) / rows.length);
}
