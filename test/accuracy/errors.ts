import { formulas } from '../../src/kernels/generated/formulas.js';
import { kernelArguments, placeOf, type Reference } from '../distributions/families.js';
import { overflow, score } from '../numeric/ulp.js';

// How far the families' formulas lie from their references. Where a sum crosses zero, 2^-50 of the sizes of its terms
// is allowed, divergences excepted. Behind a change of parametrization, so is what one rounding of the double
// parameter does: 2^-52 of it.
const crossing = 2 ** -50;
const rounding = 2 ** -52;
const nudge = 2 ** -30;

type Scalar = (...values: number[]) => number;
type Kernels = Record<string, { value: Scalar; partials: readonly (Scalar | undefined)[] }>;
const kernels = formulas as unknown as Kernels;

/** The error of each result in float32 units, zero where a zero crossing allows it. */
export function errorsOf(
  reference: Reference,
  which: number,
  got: ArrayLike<number>,
  effects: Float64Array,
): Float64Array {
  const exact = reference.exact[which]!;
  const strict = reference.function === 'kl';
  return Float64Array.from(exact, (value, i) => {
    const size = strict ? 0 : reference.sizes[which]![i]!;
    if (Math.abs(got[i]! - value) <= Math.max(crossing * size, effects[i]!)) return 0;
    // Infinities are as exact as numbers.
    return Object.is(got[i]! + 0, value + 0) ? 0 : score(got[i]!, value);
  });
}

/** `x 1, scale 0.5`: the arguments of one row. */
export function argumentsText(reference: Reference, row: number): string {
  return reference.columns.map((c, k) => `${reference.arguments[k]} ${c[row]}`).join(', ');
}

/** A result as the formulas give it in double precision, and what one rounding of a transformed parameter does. */
export function insideDouble(
  reference: Reference,
  which: number,
): { doubles: Float64Array; effects: Float64Array } {
  const kernel = kernels[reference.kernel]!;
  const partial = which === 0 ? -1 : reference.arguments.indexOf(reference.partials[which - 1]!);
  const own = partial < 0 ? kernel.value : kernel.partials[placeOf(reference, partial)]!;
  const f: Scalar = (...args) => own(...kernelArguments(reference, args));
  const count = reference.exact[0]!.length;
  const [doubles, effects] = [new Float64Array(count), new Float64Array(count)];
  for (let i = 0; i < count; i++) {
    const raw = reference.columns.map((c) => c[i]!);
    const args = raw.map((v, k) => {
      const transform = reference.transforms[k];
      return transform ? kernels[transform]!.value(v) : v;
    });
    const transform = partial < 0 ? undefined : reference.transforms[partial];
    const slope = transform ? kernels[transform]!.partials[0]!(raw[partial]!) : 1;
    const value = f(...args) * slope;
    for (const [k, name] of reference.transforms.entries()) {
      if (!name) continue;
      const moved = f(...args.map((v, j) => (j === k ? v * (1 + nudge) : v))) * slope;
      if (Number.isFinite(moved - value)) effects[i]! += (Math.abs(moved - value) / nudge) * rounding;
    }
    // The rounding decides whether a value overflows, nothing before it.
    doubles[i] = Math.abs(value) >= overflow ? Math.sign(value) * Infinity : value;
  }
  return { doubles, effects };
}
