import type { Comparison } from './measure.js';

/** One line of the report. */
export interface Row {
  readonly section: string;
  readonly what: string;
  readonly peer: string;
  readonly backend: string;
  readonly comparison: Comparison;
  /** The ratio that must not be passed, where there is one. */
  readonly target?: number;
  /** What a sample is counted in; milliseconds unless given. */
  readonly unit?: string;
}

/** A row as the console shows it while the bench runs. */
export function rowText(row: Row): string {
  const { own, peer, ratio, quartiles, leastRatio } = row.comparison;
  const digits = (x: number) => (x < 10 ? x.toFixed(2) : x.toFixed(1));
  const target = row.target === undefined ? '' : `, target ${row.target}`;
  return `${row.backend.padEnd(5)} ${row.what}: ${digits(own.median)} against ${digits(peer.median)} ${row.unit ?? 'ms'}, ratio ${ratio.toFixed(3)} (quartiles ${quartiles.map((q) => q.toFixed(3)).join(' to ')}, of minima ${leastRatio.toFixed(3)}${target})`;
}
