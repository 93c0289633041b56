import { describe, expect, it } from 'vitest';
import { numericFunctions } from './reference.js';

const functions = await numericFunctions();

// The ends of each domain and beyond, from the definitions: [function, argument, value].
const edges: [string, number, number][] = [
  ['softplus', -Infinity, 0],
  ['softplus', Infinity, Infinity],
  ['softplus_x', Infinity, 1],
  ['softplusInverse', 0, -Infinity],
  ['softplusInverse', -1, NaN],
  ['softplusInverse', Infinity, Infinity],
  ['softplusInverse_x', -1, NaN],
  ['softplusInverse_x', Infinity, 1],
  ['sigmoid', -Infinity, 0],
  ['sigmoid', Infinity, 1],
  ['logSigmoid', -Infinity, -Infinity],
  ['log1mexp', 0, -Infinity],
  ['log1mexp', 1, NaN],
  ['log1mexp', -Infinity, 0],
  ['log1mexp_x', 1, NaN],
  ['log1pmx', -1, -Infinity],
  ['log1pmx', -2, NaN],
  ['log1pmx', Infinity, -Infinity],
  ['logGamma', 0, Infinity],
  ['logGamma', -3, Infinity],
  ['logGamma', 1, 0],
  ['logGamma', 2, 0],
  ['logGamma', Infinity, Infinity],
  ['digamma', 0, -Infinity],
  ['digamma', -3, NaN],
  ['digamma', Infinity, Infinity],
  ['trigamma', 0, Infinity],
  ['trigamma', -3, Infinity],
  ['trigamma', Infinity, 0],
  ['stirlingError', 0, Infinity],
  ['stirlingError', Infinity, 0],
  ['erf', -Infinity, -1],
  ['erf', Infinity, 1],
  ['erfc', -Infinity, 2],
  ['erfc', Infinity, 0],
  ['erfcx', -Infinity, Infinity],
  ['erfcx', Infinity, 0],
  ['erfcx_x', Infinity, 0],
  ['normalCdf', -Infinity, 0],
  ['normalCdf', 0, 0.5],
  ['normalCdf', Infinity, 1],
  ['logNormalCdf', -Infinity, -Infinity],
  ['logNormalCdf', Infinity, 0],
  ['logNormalCdf_x', -Infinity, Infinity],
  ['logNormalCdf_x', Infinity, 0],
  ['normalQuantile', 0, -Infinity],
  ['normalQuantile', 0.5, 0],
  ['normalQuantile', 1, Infinity],
  ['normalQuantile', -0.1, NaN],
  ['normalQuantile', 1.1, NaN],
  ['normalQuantileFromLog', -Infinity, -Infinity],
  ['normalQuantileFromLog', 0, Infinity],
  ['normalQuantileFromLog', 0.1, NaN],
];

describe('the ends of the domains', () => {
  for (const [name, x, value] of edges) {
    it(`${name}(${x}) is ${value}`, () => {
      // Adding zero makes a negative zero a positive one.
      expect(functions.get(name)!(x) + 0).toBe(value);
    });
  }

  it('NaN gives NaN, and every call ends', () => {
    for (const name of new Set(edges.map(([name]) => name))) {
      expect(functions.get(name)!(NaN), name).toBeNaN();
    }
  });

  it('the deviance is m at x = 0, infinite for an impossible count, and 0 at x = m', () => {
    const deviance = functions.get('deviance')!;
    expect(deviance(0, 2.5)).toBe(2.5);
    expect(deviance(0, 0)).toBe(0);
    expect(deviance(2, 0)).toBe(Infinity);
    expect(deviance(3.7, 3.7) + 0).toBe(0);
    expect(deviance(1, Infinity)).toBe(Infinity);
  });
});
