import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import { beforeAll, expect, test } from 'vitest';
import { lawsOfKl } from '../../src/conformance/index.js';
import { DivergenceError, exponential, logistic, registerKl } from '../../src/index.js';
import { bent, failing } from './spoiled.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

const arbitraryParameters = fc.record({ rate: fc.double({ min: 0.3, max: 4, noNaN: true }) });
type Named = ReturnType<typeof exponential>;
const rate = (d: Named) => d.parameter('rate');

/** KL of two exponentials by their rates. */
function right(q: Named, p: Named): tf.Tensor {
  return tf.tidy(() => {
    const ratio = tf.div(rate(p), rate(q));
    return tf.sub(tf.sub(ratio, 1), tf.log(ratio));
  });
}

/** Names of the laws that fail for a closed form, registered under a name of its own. */
async function caught(name: string, formula: (q: Named, p: Named) => tf.Tensor): Promise<string[]> {
  registerKl(name, name, formula as never);
  const factory = (options: { rate: number }) => ({ ...exponential(options), family: name });
  const side = { factory, arbitraryParameters };
  return [...(await failing(lawsOfKl(side, side, { seed: 21, runs: 4 }))).keys()];
}

const negative = 'it is never negative';
const equals = 'it is zero for equals';
const sampled = 'it is the mean log ratio over draws';
const slopes = 'its derivatives are right';
const leak = 'nothing leaks';

test.each<[string, (q: Named, p: Named) => tf.Tensor, string[]]>([
  ['right', right, []],
  ['the wrong way round', (q, p) => right(p, q), [sampled]],
  ['negated', (q, p) => tf.tidy(() => tf.neg(right(q, p))), [negative, sampled]],
  ['a constant off', (q, p) => tf.tidy(() => tf.add(right(q, p), 0.1)), [equals, sampled]],
  ['of a wrong derivative', (q, p) => tf.tidy(() => bent(right(q, p), 1.05)), [slopes]],
  ['leaking', (q, p) => tf.sub(right(q, p), 0), [leak]],
  [
    'of a wrong shape',
    (q, p) => tf.tidy(() => right(q, p).reshape([1])),
    [negative, equals, sampled, slopes, leak],
  ],
])('a closed form that is %s', async (title, formula, laws) => {
  expect(await caught(`exponential ${title}`, formula)).toEqual(laws);
});

test('a pair without a closed form is refused', () => {
  const location = fc.record({ location: fc.constant(0), scale: fc.constant(1) });
  const side = { factory: logistic, arbitraryParameters: location };
  expect(() => lawsOfKl(side, side)).toThrow(
    new DivergenceError(
      "lawsOfKl: the pair must have a closed form; got (logistic, logistic); registerKl('logistic', 'logistic', …) one first",
    ),
  );
});
