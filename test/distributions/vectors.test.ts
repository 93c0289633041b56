import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import * as tf from '@tensorflow/tfjs';
import { describe, expect, it } from 'vitest';
import { categorical, type Distribution, kl, multivariateNormal } from '../../src/index.js';
import { score, ulp32 } from '../numeric/ulp.js';

interface Slopes {
  readonly exact: readonly (number | string)[];
  readonly sizes: readonly number[];
}
interface Case {
  readonly [input: string]: unknown;
  readonly exact: number | string;
  readonly size: number;
  readonly slopes: Record<string, Slopes>;
}

function cases(name: string): Record<string, Case[]> {
  return JSON.parse(readFileSync(join(import.meta.dirname, `../reference/vectors/${name}.json`), 'utf8'));
}

const bar = 0.51;

/** The error in float32 units, or nothing where it is within `allowed`. */
function unitsOff(got: number, exact: number, allowed: number): number {
  if (Math.abs(got - exact) <= allowed) return 0;
  return got === exact ? 0 : score(got, exact);
}

/** Runs every case, value and derivatives; `allowance` is the share of the terms' sizes that may be lost. */
function compare(
  all: readonly Case[],
  evaluate: (inputs: Record<string, tf.Tensor>, c: Case) => tf.Tensor,
  shapeOf: (input: string, c: Case) => number[],
  allowed: (c: Case, exact: number, size: number, slope: boolean) => number,
  spread: (input: string, flat: readonly number[]) => Float32Array = (_, flat) => Float32Array.from(flat),
  gathered: (input: string, full: ArrayLike<number>) => number[] = (_, full) => Array.from(full),
): void {
  let worst = { error: 0, text: '' };
  for (const c of all) {
    tf.tidy(() => {
      const names = Object.keys(c.slopes);
      const inputs: Record<string, tf.Tensor> = Object.fromEntries(
        names.map((name) => [name, tf.tensor(spread(name, c[name] as number[]), shapeOf(name, c))]),
      );
      const note = (what: string, got: number, exact: number, size: number, slope: boolean): void => {
        const error = unitsOff(got, exact, allowed(c, exact, size, slope));
        if (!(error <= worst.error)) {
          const given = Object.fromEntries([...names, 'x', 'kind'].map((n) => [n, c[n]]));
          worst = { error, text: `${what} of ${JSON.stringify(given)}: got ${got}, exact ${exact}` };
        }
      };
      note('value', evaluate(inputs, c).dataSync()[0]!, Number(c.exact), c.size, false);
      for (const name of names) {
        const along = (t: tf.Tensor): tf.Tensor => evaluate({ ...inputs, [name]: t }, c).sum();
        const gradient = gathered(name, tf.grad(along)(inputs[name]!).dataSync());
        const { exact, sizes } = c.slopes[name]!;
        expect(gradient.length).toBe(exact.length);
        exact.forEach((e, i) => {
          note(`derivative ${i} in ${name}`, gradient[i]!, Number(e), sizes[i]!, true);
        });
      }
    });
  }
  expect(worst.error, worst.text).toBeLessThanOrEqual(bar);
}

describe('categorical against mpmath', () => {
  const tables = cases('categorical');
  const vector = (_input: string, c: Case): number[] => [((c.logits ?? c.probabilities) as number[]).length];
  for (const form of ['logits', 'probabilities'] as const) {
    const make = (t: tf.Tensor): Distribution =>
      form === 'logits' ? categorical({ logits: t }) : categorical({ probabilities: t });

    it(`log density by ${form}`, () => {
      const all = tables[`logDensity ${form}`]!;
      expect(all.length).toBeGreaterThan(150);
      compare(
        all,
        (inputs, c) => make(inputs[form]!).logDensity(tf.scalar(c.x as number)),
        vector,
        (_c, _exact, size) => 2 ** -50 * size,
      );
    });

    it(`entropy by ${form}`, () => {
      compare(
        tables[`entropy ${form}`]!,
        (inputs) => (make(inputs[form]!) as ReturnType<typeof categorical>).entropy(),
        vector,
        // A derivative is a sum over all categories that crosses zero where they are alike.
        (_c, _exact, size, slope) => (slope ? 2 ** -50 * (size + 1) : 0),
      );
    });

    it(`divergence by ${form}`, () => {
      const all = tables[`kl ${form}`]!;
      expect(all.length).toBeGreaterThan(100);
      compare(
        all,
        (inputs) =>
          (kl as (q: Distribution, p: Distribution) => tf.Tensor)(make(inputs[form]!), make(inputs.other!)),
        vector,
        (_c, exact, size, slope) => (slope ? 2 ** -50 * size : Math.abs(exact) < 1e-12 ? 1e-18 : 0),
      );
    });
  }
});

/** A lower triangle, row by row, as a square matrix; above the diagonal stands what must not be read. */
function square(flat: readonly number[]): Float32Array {
  const d = Math.round((Math.sqrt(8 * flat.length + 1) - 1) / 2);
  const out = new Float32Array(d * d).fill(77);
  let at = 0;
  for (let r = 0; r < d; r++) for (let c = 0; c <= r; c++) out[r * d + c] = flat[at++]!;
  return out;
}

function triangle(full: ArrayLike<number>): number[] {
  const d = Math.round(Math.sqrt(full.length));
  const out: number[] = [];
  for (let r = 0; r < d; r++) {
    for (let c = 0; c < d; c++) {
      if (c <= r) out.push(full[r * d + c]!);
      else expect(full[r * d + c], 'nothing above the diagonal is read').toBe(0);
    }
  }
  return out;
}

describe('multivariate normal against mpmath', () => {
  const tables = cases('multivariateNormal');
  const isFactor = (input: string): boolean => /factor/i.test(input);
  const shapeOf = (input: string, c: Case): number[] => {
    const d = (c.mean as number[]).length;
    return isFactor(input) ? [d, d] : [d];
  };
  const spread = (input: string, flat: readonly number[]): Float32Array =>
    isFactor(input) ? square(flat) : Float32Array.from(flat);
  const gathered = (input: string, full: ArrayLike<number>): number[] =>
    isFactor(input) ? triangle(full) : Array.from(full);

  it.each(['plain', 'stretched', 'thin'])('log density, %s factors', (kind) => {
    compare(
      tables.logDensity!.filter((c) => c.kind === kind),
      ({ x, mean, factor }) => multivariateNormal({ mean: mean!, covarianceFactor: factor! }).logDensity(x!),
      shapeOf,
      (_c, _exact, size) => 2 ** -50 * size,
      spread,
      gathered,
    );
  });

  it.each(['plain', 'stretched', 'thin'])('divergence, %s factors', (kind) => {
    compare(
      tables.kl!.filter((c) => c.kind === kind),
      ({ mean, factor, otherMean, otherFactor }) =>
        kl(
          multivariateNormal({ mean: mean!, covarianceFactor: factor! }),
          multivariateNormal({ mean: otherMean!, covarianceFactor: otherFactor! }),
        ),
      shapeOf,
      (_c, _exact, size, slope) => (slope ? 2 ** -50 * size : 0),
      spread,
      gathered,
    );
  });
});

it('the score counts a missing derivative', () => {
  expect(unitsOff(0, 1, 0)).toBeGreaterThan(1e6);
  expect(unitsOff(Number.NaN, 1, 0)).toBe(Number.POSITIVE_INFINITY);
  expect(ulp32(1)).toBe(2 ** -23);
});
