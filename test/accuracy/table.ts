import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import { families, type Reference, references } from '../distributions/families.js';
import { crossingTerms, groups, numericFunctions, readReference } from '../numeric/reference.js';
import { score, ulp32 } from '../numeric/ulp.js';
import { argumentsText, errorsOf, insideDouble } from './errors.js';

/** How one function, or one of its derivatives, compares with its reference values. */
export interface AccuracyRow {
  /** `gamma.cdf(x, scale, shape)`, or a special function's name. */
  readonly name: string;
  /** `value`, or the argument that the derivative is in. */
  readonly result: string;
  readonly points: number;
  /** Largest and mean error in float32 units, rounded up to 1e-4. */
  readonly worst: number;
  readonly mean: number;
  /** Largest error of the double before it is rounded, two digits. */
  readonly inside: string;
  /** The arguments of the largest error. */
  readonly at: string;
}

const up = (error: number): number => Math.ceil(error * 1e4) / 1e4;

function rowOf(
  name: string,
  result: string,
  errors: ArrayLike<number>,
  inside: ArrayLike<number>,
  at: (row: number) => string,
): AccuracyRow {
  let row = 0;
  let sum = 0;
  let most = 0;
  for (let i = 0; i < errors.length; i++) {
    if (errors[i]! > errors[row]!) row = i;
    sum += errors[i]!;
    most = Math.max(most, inside[i]!);
  }
  const mean = up(sum / errors.length);
  return {
    name,
    result,
    points: errors.length,
    worst: up(errors[row]!),
    mean,
    inside: most.toExponential(1),
    at: at(row),
  };
}

/** Rows of the scalar families, from their reference values; the joint and logarithmic forms among them. */
export function familyRows(): AccuracyRow[] {
  return families.flatMap((family) => references(family).flatMap(rowsOfReference));
}

function rowsOfReference(reference: Reference): AccuracyRow[] {
  const name = `${reference.family}.${reference.function}(${reference.arguments.join(', ')})`;
  return ['value', ...reference.partials].flatMap((result, which) => {
    // A draw is what its sampler made; only its derivatives are formulas.
    if (which === 0 && /^draw/.test(reference.function)) return [];
    const { doubles, effects } = insideDouble(reference, which);
    const rounded = errorsOf(reference, which, Float32Array.from(doubles), effects);
    const inside = errorsOf(reference, which, doubles, effects);
    return [rowOf(name, result, rounded, inside, (i) => argumentsText(reference, i))];
  });
}

/** Rows of the special functions of src/numeric; a derivative has a name of its own there. */
export async function numericRows(): Promise<AccuracyRow[]> {
  const functions = await numericFunctions();
  return groups().flatMap((group) =>
    [...readReference(group)].map(([name, points]) => {
      const formula = functions.get(name)!;
      const [base, partial] = name.split('_') as [string, string | undefined];
      const errors = [true, false].map((rounded) =>
        points.map(({ args, exact }) => {
          const got = formula(...args);
          const allowed = (2 ** -50 * (crossingTerms[name]?.(...args) ?? 0)) / ulp32(exact);
          const overflows = Math.abs(exact) >= 2 ** 128 - 2 ** 103;
          return Math.max(0, score(rounded || overflows ? Math.fround(got) : got, exact) - allowed);
        }),
      );
      return rowOf(base, partial ?? 'value', errors[0]!, errors[1]!, (i) => points[i]!.args.join(', '));
    }),
  );
}

const file = join(import.meta.dirname, '../../docs/accuracy-table.json');

/** The committed rows, by name and result. */
export function committedRows(): Map<string, AccuracyRow> {
  const rows = JSON.parse(readFileSync(file, 'utf8')) as AccuracyRow[];
  return new Map(rows.map((row) => [keyOf(row), row]));
}

/** What tells one row from another. */
export function keyOf({ name, result }: AccuracyRow): string {
  return `${name}: ${result}`;
}
