import { posix } from 'node:path';
import * as numeric from 'leadline/numeric';
import { describe, expect, it } from 'vitest';
import { importsOf } from '../project/helpers/imports.js';
import { read } from '../project/helpers/repository.js';
import { numericFunctions, readReference } from './reference.js';

/** Every file that a file reaches through its imports, itself included, and every package. */
function reachedFrom(start: string): string[] {
  const reached = new Set<string>();
  const visit = (path: string): void => {
    if (reached.has(path)) return;
    reached.add(path);
    if (!path.startsWith('src/')) return;
    for (const { specifier } of importsOf(path, read(path))) {
      const relative = specifier.startsWith('.');
      visit(relative ? posix.join(posix.dirname(path), specifier).replace(/\.js$/, '.ts') : specifier);
    }
  };
  visit(start);
  return [...reached];
}

describe('leadline/numeric', () => {
  it('reaches no tensor code and no package', () => {
    const reached = reachedFrom('src/numeric/index.ts');
    expect(reached.length).toBeGreaterThan(30);
    expect(reached.filter((path) => !path.startsWith('src/numeric/'))).toEqual([]);
    expect(reachedFrom('src/tensor/special/gamma.ts')).toContain('@tensorflow/tfjs');
  });

  it('has every partial derivative of the functions it has', async () => {
    const all = [...(await numericFunctions()).keys()];
    const names = Object.keys(numeric);
    const wanted = all.filter((name) => name.includes('_') && names.includes(name.split('_')[0]!));
    expect(wanted.length).toBeGreaterThan(80);
    expect(wanted.filter((name) => !names.includes(name))).toEqual([]);
  });

  it('has reference values for every function', () => {
    const groups = [
      'scalar',
      'pair',
      'gamma',
      'gamma_inverse',
      'beta',
      'beta_inverse',
      'bessel',
      'log_sum',
      'von_mises',
      'student_t',
      'skew_normal',
    ];
    const covered = new Set(groups.flatMap((group) => [...readReference(group).keys()]));
    expect(Object.keys(numeric).filter((name) => !covered.has(name))).toEqual([]);
  });
});
