import * as tf from '@tensorflow/tfjs';
import { afterAll, describe, expect, it } from 'vitest';
import { evaluateCompiled } from '../../src/kernels/evaluate.js';
import { catalogue } from '../../src/kernels/generated/catalogue.js';
import { argumentsText, errorsOf, insideDouble } from '../accuracy/errors.js';
import { score, ulp32 } from '../numeric/ulp.js';
import {
  families,
  kernelArguments,
  placeOf,
  publicFunction,
  type Reference,
  references,
  titleOf,
} from './families.js';

// Half a unit is the rounding to float32, a hundredth what the double inside may add.
const bar = 0.51;
const share = 0.01;
// log x − location, where a float32 location happens to lie within 1e-10 of log x: what the double leaves there.
const shares: Readonly<Record<string, number>> = { 'logNormal.logSurvival': 0.0102 };

function catalogueOf(name: string): { index: number; partials: readonly number[] } {
  return (catalogue as Record<string, { index: number; partials: readonly number[] }>)[name]!;
}

interface Worst {
  error: number;
  text: string;
}

/** The worst error in float32 units beyond what a zero crossing allows. */
function worst(reference: Reference, which: number, got: ArrayLike<number>, effects: Float64Array): Worst {
  let result: Worst = { error: 0, text: '' };
  errorsOf(reference, which, got, effects).forEach((error, i) => {
    if (error <= result.error) return;
    const what = `got ${got[i]}, exact ${reference.exact[which]![i]} (${error} units)`;
    result = { error, text: `at ${argumentsText(reference, i)}: ${what}` };
  });
  return result;
}

/** A draw comes from a sampler: how it moves with the parameters is the compiled kernel's, at the point given. */
const isDraw = ({ function: name }: Reference): boolean => name.startsWith('draw');

function drawSlopes(reference: Reference): ArrayLike<number>[] {
  const compiled = catalogueOf(reference.kernel);
  const own = reference.columns.map((data, k) => {
    const name = reference.transforms[k];
    return { data, shape: [data.length], transform: name ? catalogueOf(name).index : -1, name };
  });
  const places = own.map((_, k) => placeOf(reference, k));
  const operands = kernelArguments(reference, []).map((value, place) => {
    const k = places.indexOf(place);
    return k >= 0 ? own[k]! : { data: Float32Array.of(value), shape: [], transform: -1, name: undefined };
  });
  const run = (formula: number, at: number): Float32Array => {
    const own = at < 0 ? undefined : operands[at]!.name;
    return evaluateCompiled({
      owner: {},
      formula,
      operands,
      shape: [operands[0]!.data.length],
      outStrides: [1],
      outSize: operands[0]!.data.length,
      ...(own ? { chain: { derivative: catalogueOf(own).partials[0]!, operand: at } } : {}),
    }).slice();
  };
  const found = [run(compiled.index, -1)];
  for (const name of reference.partials) {
    const k = reference.arguments.indexOf(name);
    found.push(run(compiled.partials[places[k]!]!, places[k]!));
  }
  return found;
}

function functionAndSlopes(reference: Reference): ArrayLike<number>[] {
  const f = publicFunction(reference);
  const tensors = reference.columns.map((c) => tf.tensor1d(c));
  const found = [f(...tensors)];
  for (const name of reference.partials) {
    const k = reference.arguments.indexOf(name);
    const along = (t: tf.Tensor): tf.Tensor => f(...tensors.map((other, j) => (j === k ? t : other)));
    found.push(tf.grad(along)(tensors[k]!));
  }
  return found.map((t) => t.dataSync());
}

describe.each(families)('%s against mpmath', (family) => {
  const all = references(family);
  afterAll(() => tf.disposeVariables());

  for (const reference of all) {
    it(`${titleOf(reference)} and its derivatives`, () => {
      // The family's own parameters have the points in full; other forms pass through transforms and joint
      // parameters, some of whose points coincide.
      const full = reference.transforms.every((t) => t === null) && !reference.joint;
      expect(reference.exact[0]!.length).toBeGreaterThanOrEqual(full ? 260 : 60);
      const before = tf.memory().numTensors;
      tf.tidy(() => {
        const rounded = isDraw(reference) ? drawSlopes(reference) : functionAndSlopes(reference);
        rounded.forEach((got, which) => {
          const what = which === 0 ? 'value' : `derivative in ${reference.partials[which - 1]}`;
          const { doubles, effects } = insideDouble(reference, which);
          const { error, text } = worst(reference, which, got, effects);
          expect.soft(error, `${what}, rounded, ${text}`).toBeLessThanOrEqual(bar);
          const inside = worst(reference, which, doubles, effects);
          expect
            .soft(inside.error, `${what}, before the rounding, ${inside.text}`)
            .toBeLessThanOrEqual(shares[`${family}.${reference.function}`] ?? share);
        });
      });
      expect(tf.memory().numTensors).toBe(before);
    });
  }
});

it('the score of a float32 rounding is at most half', () => {
  expect(score(Math.fround(Math.PI), Math.PI)).toBeLessThanOrEqual(0.5);
  expect(ulp32(Math.PI)).toBe(2 ** -22);
});
