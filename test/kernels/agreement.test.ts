import { describe, expect, it } from 'vitest';
import { evaluateCompiled } from '../../src/kernels/evaluate.js';
import { catalogue } from '../../src/kernels/generated/catalogue.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import { ulp32 } from '../numeric/ulp.js';

type Scalar = (...values: number[]) => number;

// Every float32 that formulas tend to branch at, and the ends of the format.
const special = [
  0,
  -0,
  1,
  -1,
  0.5,
  -0.5,
  2,
  -2,
  3,
  10,
  0.25,
  0.75,
  0.2,
  0.8,
  100,
  -100,
  Math.LN2,
  -Math.LN2,
  1.4616321,
  1.401298464324817e-45,
  -1.401298464324817e-45,
  1.1754943508222875e-38,
  1e-30,
  1e-7,
  1e7,
  1e20,
  -1e20,
  88.7,
  -87.3,
  -103.9,
  709.8,
  -745.2,
  3.4028234663852886e38,
  -3.4028234663852886e38,
  Infinity,
  -Infinity,
  NaN,
  1 - 2 ** -24,
  1 + 2 ** -23,
].map(Math.fround);

/** Marsaglia's xorshift with 32 bits: enough to spread test arguments. */
function generator(seed: number): () => number {
  let state = seed;
  return () => {
    state ^= state << 13;
    state ^= state >>> 17;
    state ^= state << 5;
    return (state >>> 0) / 2 ** 32;
  };
}

/** Arguments for one formula: neighbours, powers over the whole format, moderate and special numbers. */
function points(arity: number, count: number, seed: number): Float32Array[] {
  const random = generator(seed);
  const columns = Array.from({ length: arity }, () => new Float32Array(count));
  const one = (): number => {
    const kind = random();
    if (kind < 0.25) return special[Math.floor(random() * special.length)]!;
    if (kind < 0.45) return random();
    const sign = random() < 0.25 ? -1 : 1;
    return kind < 0.8 ? sign * 10 ** (6 * random() - 3) : sign * 10 ** (83 * random() - 45);
  };
  for (let i = 0; i < count; i++) {
    for (let k = 0; k < arity; k++) {
      const close = k > 0 && random() < 0.2;
      columns[k]![i] = close ? columns[k - 1]![i]! * (1 + (random() - 0.5) * 10 ** (-7 * random())) : one();
    }
  }
  return columns;
}

const cases = Object.entries(catalogue).flatMap(([name, entry]) => {
  const scalar = formulas[name as keyof typeof formulas] as {
    value: Scalar;
    partials: readonly (Scalar | undefined)[];
  };
  const arity = entry.parameters.length;
  return [
    { title: name, index: entry.index as number, f: scalar.value as Scalar | undefined, arity },
    ...entry.parameters.map((parameter, k) => ({
      title: `${name}, derivative in ${parameter}`,
      index: entry.partials[k] as number,
      f: scalar.partials[k],
      arity,
    })),
  ];
});

/**
 * Whether a double lies so close to a boundary of float32 rounding that the last bits of Math.exp and its
 * kind, which engines and the compiled module are free to choose, may decide.
 */
function nearBoundary(value: number): boolean {
  const room = Math.max(Math.abs(value) * 1e-9, 1e-300);
  return Math.fround(value - room) < Math.fround(value + room);
}

/**
 * Whether the last bits of the arguments move the double further than it lies from what was got: no formula can tell
 * there which last bits the functions it is made of should have.
 */
function amplified(f: Scalar, args: readonly number[], double: number, got: number): boolean {
  const moved = args.map((v, k) =>
    Math.abs(f(...args.map((w, j) => (j === k ? v * (1 + 2 ** -50) : w))) - double),
  );
  return Math.abs(got - double) <= 4 * Math.max(...moved) + 0.5 * ulp32(double);
}

/** A seed of a formula's own, so that another formula beside it changes nothing. */
function seedOf(title: string): number {
  return [...title].reduce((hash, letter) => (Math.imul(hash, 31) + letter.charCodeAt(0)) | 0, 77) || 77;
}

const count = 1000;
let compared = 0;
let excused = 0;
let sensitives = 0;

describe('compiled formulas give what TypeScript gives, to the last bit', () => {
  it('covers every kernel', () => {
    expect(cases.length).toBeGreaterThan(150);
    expect(Object.keys(formulas)).toEqual(Object.keys(catalogue));
  });

  for (const { title, index, f, arity } of cases) {
    if (!f) {
      it(`${title} is missing in both`, () => expect(index).toBe(-1));
      continue;
    }
    it(title, () => {
      const columns = points(arity, count, seedOf(title));
      const got = evaluateCompiled({
        formula: index,
        operands: columns.map((data) => ({ data, shape: [count], transform: -1 })),
        shape: [count],
        outStrides: [1],
        outSize: count,
      });
      for (let i = 0; i < count; i++) {
        const args = columns.map((c) => c[i]!);
        const double = f(...args);
        compared++;
        if (Object.is(got[i], Math.fround(double))) continue;
        const what = `(${args.join(', ')}): compiled ${got[i]}, TypeScript ${double}`;
        const sensitive = amplified(f, args, double, got[i]!);
        expect(nearBoundary(double) || sensitive, what).toBe(true);
        if (sensitive) sensitives++;
        else excused++;
      }
    });
  }

  // Two doubles that differ in the last place round apart with a chance of about 2^-28, so that among these
  // points none is expected to; 8.2 million points showed none.
  it('rounding boundaries excuse at most two points', () => {
    expect(compared).toBeGreaterThan(count * 150);
    expect(excused).toBeLessThanOrEqual(2);
    // Shapes of 1e20 and more, where a last bit is worth many units: one point in fifty thousand.
    expect(sensitives).toBeLessThanOrEqual(compared / 50_000);
  });
});
