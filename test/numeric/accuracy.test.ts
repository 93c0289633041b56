import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { crossingTerms, groups, numericFunctions, readReference, worst } from './reference.js';
import { score, ulp32 } from './ulp.js';

const functions = await numericFunctions();
const covered = new Map(groups().flatMap((group) => [...readReference(group)]));

// Half a unit is the rounding to float32; a hundredth is what the double precision formula may add. The second
// is asserted by itself as well, since few points lie so near a rounding boundary that the first would show it.
const bar = 0.51;
const share = 0.01;

describe('special functions against mpmath', () => {
  for (const [name, points] of covered) {
    it(`${name} is within ${bar} float32 units at ${points.length} points`, () => {
      const formula = functions.get(name);
      expect(formula, `no file of src/numeric exports ${name}`).toBeDefined();
      expect(points.length).toBeGreaterThanOrEqual(260);
      for (const [limit, rounded] of [
        [bar, true],
        [share, false],
      ] as const) {
        const { error, args, got, exact } = worst(formula!, points, rounded, crossingTerms[name]);
        expect(error, `at (${args.join(', ')}): got ${got}, exact ${exact}`).toBeLessThanOrEqual(limit);
      }
    });
  }
});

describe('coverage', () => {
  it('every kernel that src/numeric defines, and every partial, has reference values', () => {
    const folder = join(import.meta.dirname, '../../src/numeric');
    const kernels = readdirSync(folder)
      .filter((name) => name.endsWith('.ts'))
      .flatMap((name) =>
        [...readFileSync(join(folder, name), 'utf8').matchAll(/@kernel[\s\S]*?export function (\w+)/g)].map(
          (m) => m[1]!,
        ),
      );
    expect(kernels.length).toBeGreaterThan(15);
    const wanted = [...functions.keys()].filter((name) =>
      kernels.some((kernel) => name === kernel || name.startsWith(`${kernel}_`)),
    );
    expect(wanted.filter((name) => !covered.has(name))).toEqual([]);
  });
});

describe('the score', () => {
  it('measures in float32 spacings, with the subnormal spacing at the bottom and infinity at the top', () => {
    expect(ulp32(1)).toBe(2 ** -23);
    expect(ulp32(0.9999999)).toBe(2 ** -24);
    expect(ulp32(1e-45)).toBe(2 ** -149);
    expect(ulp32(3.5e38)).toBe(2 ** 104);
    expect(score(1 + 2 ** -23, 1)).toBe(1);
    expect(score(Math.fround(0.1), 0.1)).toBeLessThan(0.5);
    expect(score(Infinity, 3.5e38)).toBe(0);
    expect(score(-Infinity, 3.5e38)).toBe(Infinity);
    expect(score(3.4028234663852886e38, 3.5e38)).toBe(Infinity);
    expect(score(Infinity, 3.4e38)).toBe(Infinity);
    expect(score(NaN, 1)).toBe(Infinity);
    expect(score(0, Number('1e-2000'))).toBe(0);
  });
});
