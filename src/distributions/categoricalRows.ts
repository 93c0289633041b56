import { logRatio } from '../numeric/deviance.js';
import { type RowLogSums, rowLogSums } from '../tensor/logSumExp.js';
import type { Operand } from '../tensor/operand.js';

/**
 * A categorical parameter in double precision, row by row. The logarithm of a row's total is kept as its
 * largest part and a small rest: a sum of the two would lose what the rest says about a nearly certain label.
 */
export interface CategoricalRows {
  readonly k: number;
  /** The parameter itself: logits, or probabilities. */
  readonly raw: Float64Array;
  readonly probabilities: boolean;
  /** Normalized log probabilities. */
  readonly logs: Float64Array;
  /** Per row: the largest logit and log1p of the others' shares beside it; for probabilities their sum and 0. */
  readonly largest: Float64Array;
  readonly rest: Float64Array;
}

/** Reads an operand's numbers, `k` to a row. */
export function categoricalRows(operand: Operand, numbers: ArrayLike<number>, k: number): CategoricalRows {
  const raw = Float64Array.from(numbers);
  const probabilities = operand.transform !== undefined;
  const logs = new Float64Array(raw.length);
  const { largest, rest } = probabilities ? rowSums(raw, k) : rowLogSums(raw, k);
  for (let i = 0; i < raw.length; i++) {
    const row = Math.floor(i / k);
    logs[i] = probabilities
      ? logShare(raw, i, row * k, k, largest[row]!)
      : raw[i]! - largest[row]! - rest[row]!;
  }
  return { k, raw, probabilities, logs, largest, rest };
}

function rowSums(raw: Float64Array, k: number): RowLogSums {
  const largest = new Float64Array(raw.length / k);
  for (let i = 0; i < raw.length; i++) largest[Math.floor(i / k)]! += raw[i]!;
  return { largest, rest: new Float64Array(largest.length) };
}

/** log(p / sum) of raw number `own`; where p is most of the sum, from what the others add up to. */
function logShare(raw: Float64Array, own: number, start: number, k: number, sum: number): number {
  const p = raw[own]!;
  if (p < 0.5 * sum) return Math.log(p / sum);
  let others = 0;
  for (let i = start; i < start + k; i++) if (i !== own) others += raw[i]!;
  return -Math.log1p(others / p);
}

/** How fast the logarithm of the row's total moves with raw number `i`: its share, or 1 / the sum. */
export function totalSlope(rows: CategoricalRows, i: number): number {
  return rows.probabilities ? 1 / rows.largest[Math.floor(i / rows.k)]! : Math.exp(rows.logs[i]!);
}

/** How fast the log probability of raw number `i` moves with it. */
export function ownSlope(rows: CategoricalRows, i: number): number {
  const others = -Math.expm1(rows.logs[i]!);
  return rows.probabilities ? others / rows.raw[i]! : others;
}

/**
 * log q − log p at one category, `i` of row q and `j` of row p: from differences of the raw numbers, which are
 * exact, so that it is accurate where the two are close.
 */
export function logDifference(q: CategoricalRows, i: number, p: CategoricalRows, j: number): number {
  const [r, s] = [Math.floor(i / q.k), Math.floor(j / p.k)];
  const certain = q.logs[i]! > -0.01 && p.logs[j]! > -0.01;
  // Logarithms near zero are themselves as good as their difference can be.
  if (certain || q.probabilities !== p.probabilities) return q.logs[i]! - p.logs[j]!;
  if (q.probabilities) return logRatio(q.raw[i]!, p.raw[j]!) - logRatio(q.largest[r]!, p.largest[s]!);
  return q.raw[i]! - q.largest[r]! - (p.raw[j]! - p.largest[s]!) - (q.rest[r]! - p.rest[s]!);
}
