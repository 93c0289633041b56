import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import type * as tf from '@tensorflow/tfjs';
import * as library from '../../src/index.js';
import { catalogue } from '../../src/kernels/generated/catalogue.js';
import { entries } from '../families/entry.js';

const folder = join(import.meta.dirname, '../reference/families');

/** One function of a family in one parametrization, with its reference values. */
export interface Reference {
  readonly family: string;
  readonly function: string;
  /** The compiled kernel that computes it. */
  readonly kernel: string;
  /** Names in order: `x` or `p`, then parameters as a user gives them; `other…` for the second distribution. */
  readonly arguments: readonly string[];
  readonly transforms: readonly (string | null)[];
  /** Whether the parameters are those of a joint parametrization. */
  readonly joint?: boolean;
  readonly partials: readonly string[];
  /** One column per argument, float32 exact. */
  readonly columns: readonly Float32Array[];
  /** The value, then each partial: exact values, and the sum of the sizes of their terms. */
  readonly exact: readonly Float64Array[];
  readonly sizes: readonly Float64Array[];
}

type Row = readonly (number | string)[];
type Written = Omit<Reference, 'family' | 'columns' | 'exact' | 'sizes'> & { readonly rows: readonly Row[] };

/** The families that have reference values. */
export const families = readdirSync(folder)
  .filter((name) => name.endsWith('.json'))
  .map((name) => name.replace('.json', ''));

export function references(family: string): Reference[] {
  const written = JSON.parse(readFileSync(join(folder, `${family}.json`), 'utf8')) as Written[];
  return written.map(({ rows, ...rest }) => {
    const column = (k: number): Float64Array => Float64Array.from(rows, (row) => Number(row[k]));
    const a = rest.arguments.length;
    const results = 1 + rest.partials.length;
    return {
      ...rest,
      family,
      columns: rest.arguments.map((_, k) => Float32Array.from(column(k))),
      exact: Array.from({ length: results }, (_, k) => column(a + k)),
      sizes: Array.from({ length: results }, (_, k) => column(a + results + k)),
    };
  });
}

const others: Record<string, readonly string[]> = {
  sd: ['variance', 'logVariance', 'precision'],
  scale: ['rate', 'logRate'],
  rate: ['scale', 'logScale'],
};

type Factory = (options: Record<string, tf.Tensor | number>) => library.Distribution;
type Methods = Record<string, (...x: tf.Tensor[]) => tf.Tensor>;

// What a parameter is when a function does not depend on it.
const resting: Record<string, Record<string, number>> = {
  normal: { mean: 0, sd: 1 },
  laplace: { location: 0, scale: 1 },
  logistic: { location: 0, scale: 1 },
  ...Object.fromEntries(Object.entries(entries).map(([family, { resting = {} }]) => [family, resting])),
};

function make(family: string, given: Record<string, tf.Tensor>, joint?: boolean): library.Distribution {
  const factory = (library as unknown as Record<string, Factory>)[family]!;
  // A parameter that is not given in any of its forms: `logScale` stands for `scale`.
  const asGiven = (name: string): boolean =>
    [name, `log${name[0]!.toUpperCase()}${name.slice(1)}`, ...(others[name] ?? [])].some(
      (form) => form in given,
    );
  // A joint parametrization has all its parameters.
  const rest = joint ? [] : Object.entries(resting[family] ?? {}).filter(([name]) => !asGiven(name));
  return factory({ ...Object.fromEntries(rest), ...given });
}

/** The referenced function through the public interface: from tensors in the order of `arguments`. */
export function publicFunction(reference: Reference): (...tensors: tf.Tensor[]) => tf.Tensor {
  const { family, arguments: names } = reference;
  return (...tensors) => {
    const own: Record<string, tf.Tensor> = {};
    const other: Record<string, tf.Tensor> = {};
    const points: tf.Tensor[] = [];
    names.forEach((name, k) => {
      if (name === 'x' || name === 'p') points.push(tensors[k]!);
      else if (name.startsWith('other')) other[name[5]!.toLowerCase() + name.slice(6)] = tensors[k]!;
      else own[name] = tensors[k]!;
    });
    const q = make(family, own, reference.joint);
    if (reference.function !== 'kl') {
      return (q as unknown as Methods)[reference.function]!(...points);
    }
    const kl = library.kl as (q: library.Distribution, p: library.Distribution) => tf.Tensor;
    return kl(q, make(family, other));
  };
}

/** Where each argument stands among the parameters of the kernel, which may read others that are fixed. */
function places({ family, kernel, arguments: names }: Reference): {
  all: (number | undefined)[];
  given: number[];
} {
  const fixed = entries[family]?.fixed ?? {};
  const plain = (name: string): string =>
    name.startsWith('other') ? name[5]!.toLowerCase() + name.slice(6) : name;
  const all = (catalogue as Record<string, { parameters: readonly string[] }>)[kernel]!.parameters.map(
    (name) => fixed[plain(name)],
  );
  const open = all.flatMap((value, place) => (value === undefined ? [place] : []));
  return { all, given: names.map((_, k) => open[k]!) };
}

/** The kernel's arguments: the given ones, and those that are the same for all members. */
export function kernelArguments(reference: Reference, args: readonly number[]): number[] {
  const { all, given } = places(reference);
  return all.map((value, place) => value ?? args[given.indexOf(place)]!);
}

/** Where the argument of a reference stands among the kernel's. */
export function placeOf(reference: Reference, argument: number): number {
  return places(reference).given[argument]!;
}

/** `normal.logDensity(x, mean, sd)`. */
export function titleOf(reference: Reference): string {
  return `${reference.family}.${reference.function}(${reference.arguments.join(', ')})`;
}
