import { describe, expect, it } from 'vitest';
import { layerFaults, randomnessFaults } from './helpers/layers.js';
import { read, sourceFiles } from './helpers/repository.js';

const longest = 500;
const sources = sourceFiles().map((path) => ({ path, text: read(path) }));

describe('the sources', () => {
  it('import only from the layers before their own', () => {
    expect(sources.flatMap(({ path, text }) => layerFaults(path, text))).toEqual([]);
  });

  it('draw only from streams', () => {
    expect(sources.flatMap(({ path, text }) => randomnessFaults(path, text))).toEqual([]);
  });

  it(`stay below ${longest} lines a file`, () => {
    const tooLong = sources.filter(({ text }) => text.split('\n').length > longest);
    expect(tooLong.map(({ path }) => path)).toEqual([]);
  });
});

describe('the check of the layers', () => {
  it.each([
    [
      'src/tensor/lift.ts',
      "import { kl } from '../divergence/kl.js';",
      'tensor imports from divergence, which comes after it',
    ],
    [
      'src/tensor/lift.ts',
      "import type { Kl } from '../divergence/kl.js';",
      'tensor imports from divergence',
    ],
    ['src/tensor/lift.ts', "export { kl } from '../divergence/kl.js';", 'tensor imports from divergence'],
    [
      'src/tensor/lift.ts',
      "const kl = await import('../divergence/kl.js');",
      'tensor imports from divergence',
    ],
    ['src/tensor/lift.ts', "type Kl = import('../divergence/kl.js').Kl;", 'tensor imports from divergence'],
    ['src/numeric/gamma.ts', "import { ShapeError } from '../errors.js';", 'numeric imports from errors.ts'],
    ['src/random/stream.ts', "import { elbo } from 'leadline';", 'imports the package itself'],
    ['src/random/stream.ts', "import { root } from '../../test/root.js';", 'lies outside the layers'],
    ['src/misc/thing.ts', '', 'misc has no place in the order'],
  ])('finds the fault in %s: %s', (path, text, fault) => {
    expect(layerFaults(path, text).join('\n')).toContain(fault);
  });

  it('lets a later layer import an earlier one, and its own', () => {
    const text =
      "import '../errors.js'; import '../numeric/gamma.js'; import './other.js'; import 'seedrandom';";
    expect(layerFaults('src/random/stream.ts', text)).toEqual([]);
  });

  it.each([
    'Math.random()',
    'tf.randomNormal([2])',
    'tf.truncatedNormal([2])',
    'crypto.getRandomValues(bytes)',
  ])('finds %s', (code) => {
    expect(randomnessFaults('src/random/stream.ts', `const x = ${code};`)).toHaveLength(1);
  });

  it('lets a stream draw', () => {
    expect(
      randomnessFaults('src/random/stream.ts', 'const x = stream.normal([2]); // Math.random()'),
    ).toEqual([]);
  });
});
