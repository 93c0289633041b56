import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { overflow, score, ulp32 } from './ulp.js';

/** One reference value: float32-exact arguments, and the value that they give, rounded to double. */
export interface Point {
  readonly args: readonly number[];
  readonly exact: number;
}

/** Every function's reference points, from test/reference/<group>.json. */
export function readReference(group: string): Map<string, readonly Point[]> {
  const path = join(import.meta.dirname, '../reference', `${group}.json`);
  const tables = JSON.parse(readFileSync(path, 'utf8')) as Record<string, (number | string)[][]>;
  return new Map(
    Object.entries(tables).map(([name, rows]) => [
      name,
      rows.map((row) => ({
        args: row.slice(0, -1).map((a) => Math.fround(Number(a))),
        exact: Number(row.at(-1)),
      })),
    ]),
  );
}

/** The files of reference values for special functions. */
export function groups(): string[] {
  return readdirSync(join(import.meta.dirname, '../reference'))
    .filter((name) => name.endsWith('.json') && name !== 'hard.json')
    .map((name) => name.replace('.json', ''));
}

export type Formula = (...args: number[]) => number;

/**
 * The sizes of the terms whose sum crosses zero, by function. The logarithm of a sum near one is a difference of two
 * equal terms, of the size of the larger argument.
 */
export const crossingTerms: Readonly<Record<string, Formula>> = {
  logAddExp: (a, b) => 2 * Math.abs(Math.max(a!, b!)),
};

/** All functions that the files of src/numeric export, families apart, by name. */
export async function numericFunctions(): Promise<Map<string, Formula>> {
  const folder = join(import.meta.dirname, '../../src/numeric');
  const functions = new Map<string, Formula>();
  for (const file of readdirSync(folder).filter((name) => name.endsWith('.ts'))) {
    const module = (await import(join(folder, file))) as Record<string, unknown>;
    for (const [name, value] of Object.entries(module)) {
      if (typeof value === 'function') functions.set(name, value as Formula);
    }
  }
  return functions;
}

/**
 * The worst of a function's errors in float32 units, and where it is: after one rounding to float32, or of the
 * double itself (except where it overflows float32). `terms` gives the size of the terms whose sum crosses zero
 * in the interior of the domain, for a function that does: 2^-50 of it is no error.
 */
export function worst(
  formula: Formula,
  points: readonly Point[],
  rounded: boolean,
  terms: Formula = () => 0,
) {
  let result = { error: 0, args: [] as readonly number[], got: NaN, exact: NaN };
  for (const { args, exact } of points) {
    const got = formula(...args);
    const allowed = (2 ** -50 * terms(...args)) / ulp32(exact);
    const error = score(rounded || Math.abs(exact) >= overflow ? Math.fround(got) : got, exact) - allowed;
    if (error > result.error) result = { error, args, got, exact };
  }
  return result;
}
