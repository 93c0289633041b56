import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { formulas } from '../../src/kernels/generated/formulas.js';
import { composed } from '../../src/tensor/composed.js';
import { entries } from '../families/entry.js';
import {
  families,
  kernelArguments,
  placeOf,
  publicFunction,
  type Reference,
  references,
  titleOf,
} from './families.js';

type Scalar = (...values: number[]) => number;
type Kernels = Record<string, { value: Scalar; partials: readonly (Scalar | undefined)[] }>;
const kernels = formulas as unknown as Kernels;

// A handful of float32 operations in a row: so many roundings of the terms, and of each argument's effect.
const roundings: Record<string, number> = {
  normal: 16,
  logNormal: 16,
  laplace: 8,
  logistic: 12,
  uniform: 8,
  exponential: 8,
  bernoulli: 16,
  poisson: 24,
  ...Object.fromEntries(Object.entries(entries).map(([family, entry]) => [family, entry.roundings])),
};
const unit = 2 ** -24;

/** Where float32 operations can be expected to follow: nothing huge, tiny or out of their range. */
function moderate(reference: Reference): number[] {
  const rows: number[] = [];
  for (let i = 0; i < reference.exact[0]!.length; i++) {
    const args = reference.columns.map((c, k) => {
      const transform = reference.transforms[k];
      return Math.abs(transform ? kernels[transform]!.value(c[i]!) : c[i]!);
    });
    const results = reference.exact.map((c) => Math.abs(c[i]!));
    const fits = (v: number, low: number, high: number): boolean => v === 0 || (v > low && v < high);
    if (args.every((v) => fits(v, 1e-4, 60)) && results.every((v) => fits(v, 1e-8, 1e8))) rows.push(i);
  }
  return rows;
}

/** How far a function moves, per relative change, when each argument changes in turn. */
function moved(args: readonly number[], f: (args: readonly number[]) => number): number {
  const still = f(args);
  return args.reduce((sum, _, k) => {
    const change = Math.abs(f(args.map((v, j) => (j === k ? v * (1 + 2 ** -20) : v))) - still) * 2 ** 20;
    return Number.isFinite(change) ? sum + change : sum;
  }, 0);
}

/** How far a result moves when each argument is rounded once more. */
function effect(reference: Reference, row: number, which: number): number {
  const kernel = kernels[reference.kernel]!;
  const partial = which === 0 ? -1 : reference.arguments.indexOf(reference.partials[which - 1]!);
  const own = partial < 0 ? kernel.value : kernel.partials[placeOf(reference, partial)]!;
  const f: Scalar = (...args) => own(...kernelArguments(reference, args));
  const raw = reference.columns.map((c) => c[row]!);
  const natural = (given: readonly number[]): number[] =>
    given.map((v, k) => {
      const transform = reference.transforms[k];
      return transform ? kernels[transform]!.value(v) : v;
    });
  const transform = partial < 0 ? undefined : reference.transforms[partial];
  const slope = (given: readonly number[]): number =>
    transform ? kernels[transform]!.partials[0]!(given[partial]!) : 1;
  // The arguments as given, and the parameters that are made of them.
  return (
    moved(raw, (given) => f(...natural(given)) * slope(given)) +
    moved(natural(raw), (given) => f(...given) * slope(raw))
  );
}

/** The second derivative; zeros where the first does not depend on the argument, which tfjs calls an error. */
function secondOf(first: (t: tf.Tensor) => tf.Tensor, at: tf.Tensor): ArrayLike<number> {
  try {
    return tf
      .grad((t) => first(t).sum())(at)
      .dataSync();
  } catch (error) {
    if (
      !(error instanceof Error) ||
      !error.message.startsWith('Cannot compute gradient of y=f(x) with respect to x')
    ) {
      throw error;
    }
    return new Float32Array(at.size);
  }
}

// Their draws' implicit derivatives come from the kernel everywhere.
const missing = [
  'poisson.cdf',
  ...Object.entries(entries).flatMap(([family, { kernelOnly = [] }]) =>
    [...kernelOnly, 'draw', 'drawLog', 'drawLogOdds'].map((name) => `${family}.${name}`),
  ),
];

describe.each(families)('%s from tensor operations', (family) => {
  for (const reference of references(family)) {
    if (missing.includes(`${family}.${reference.function}`)) continue;
    const rows = moderate(reference);

    it(`${titleOf(reference)} agrees with mpmath, value and derivatives`, () => {
      expect(rows.length).toBeGreaterThan(20);
      tf.tidy(() => {
        const f = publicFunction(reference);
        const tensors = reference.columns.map((c) => tf.tensor1d(rows.map((i) => c[i]!)));
        const results = [composed(() => f(...tensors))];
        for (const name of reference.partials) {
          const k = reference.arguments.indexOf(name);
          const along = (t: tf.Tensor): tf.Tensor =>
            composed(() => f(...tensors.map((other, j) => (j === k ? t : other)))).sum();
          results.push(tf.grad(along)(tensors[k]!));
        }
        let worst = { error: 0, text: '' };
        results.forEach((tensor, which) => {
          const got = tensor.dataSync();
          rows.forEach((row, i) => {
            const exact = reference.exact[which]![row]!;
            // Between zero and one a derivative in log odds crosses zero with terms of the value's size.
            const terms = family === 'bernoulli' && which > 0 ? Math.abs(reference.exact[0]![row]!) : 0;
            const sizes = reference.sizes[which]![row]! + terms;
            const size = Math.abs(exact) + sizes + effect(reference, row, which);
            const allowed = unit * size + 1e-37;
            const error = got[i] === exact ? 0 : Math.abs(got[i]! - exact) / allowed;
            if (!(error <= worst.error)) {
              const args = reference.columns.map((c, k) => `${reference.arguments[k]} ${c[row]}`).join(', ');
              worst = { error, text: `result ${which} at ${args}: got ${got[i]}, exact ${exact}` };
            }
          });
        });
        expect(worst.error, worst.text).toBeLessThanOrEqual(roundings[family]!);
      });
    });
  }

  for (const reference of references(family).filter((r) => r.transforms.every((t) => t === null))) {
    if (missing.includes(`${family}.${reference.function}`) || reference.kernel === 'identity') continue;

    it(`${titleOf(reference)} has its second derivatives`, () => {
      const rows = moderate(reference).slice(0, 40);
      const kernel = kernels[reference.kernel]!;
      let compared = 0;
      tf.tidy(() => {
        const f = publicFunction(reference);
        const tensors = reference.columns.map((c) => tf.tensor1d(rows.map((i) => c[i]!)));
        for (const name of reference.partials) {
          const k = reference.arguments.indexOf(name);
          const first = (t: tf.Tensor): tf.Tensor =>
            tf.grad((u) => composed(() => f(...tensors.map((other, j) => (j === k ? u : other)))).sum())(t);
          const got = secondOf(first, tensors[k]!);
          rows.forEach((row, i) => {
            const args = reference.columns.map((c) => c[row]!);
            const h = 1e-5 * Math.max(Math.abs(args[k]!), 1e-3);
            const slopeOf = (given: readonly number[]): number => {
              const at = (step: number): number =>
                kernel.partials[k]!(...given.map((v, j) => (j === k ? v + step : v)));
              return (at(h) - at(-h)) / (2 * h);
            };
            const slope = (step: number): number =>
              kernel.partials[k]!(...args.map((v, j) => (j === k ? v + step : v)));
            const exact = (slope(h) - slope(-h)) / (2 * h);
            const sides = [(slope(h) - slope(0)) / h, (slope(0) - slope(-h)) / h] as const;
            const scale = Math.max(Math.abs(exact), Math.abs(slope(0) / (args[k]! || 1)), 1e-6);
            // Across a kink or a support's end the difference quotient means nothing.
            const closer = (slope(h / 2) - slope(-h / 2)) / h;
            const kink = Math.max(Math.abs(sides[0] - sides[1]), Math.abs(exact - closer));
            if (!(kink < 0.01 * scale)) return;
            compared++;
            const what = `${name} at (${args.join(', ')}): ${got[i]}, ${exact}`;
            expect(Math.abs(got[i]! - exact), what).toBeLessThan(
              2e-3 * scale + 8 * unit * moved(args, slopeOf),
            );
          });
        }
      });
      expect(compared).toBeGreaterThan(10);
    });
  }
});
