import { describe, expect, it } from 'vitest';
import { layerFaults } from './helpers/layers.js';
import { packageFaults } from './helpers/packages.js';
import { randomnessFaults } from './helpers/randomness.js';
import { read, sourceFiles } from './helpers/repository.js';

const longest = 500;
const manifest = JSON.parse(read('package.json'));
const sources = sourceFiles().map((path) => ({ path, text: read(path) }));

describe('the sources', () => {
  it('import only from the layers before their own', () => {
    expect(sources.flatMap(({ path, text }) => layerFaults(path, text))).toEqual([]);
  });

  it('import only packages that a user has', () => {
    expect(sources.flatMap(({ path, text }) => packageFaults(path, text, manifest))).toEqual([]);
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
    ['src/random/stream.ts', "import { root } from '../../test/errors.js';", 'lies outside the layers'],
    [
      'src/index.ts',
      "export { lawsOfKl } from './conformance/lawsOfKl.js';",
      'index.ts imports from conformance, an entry point of its own',
    ],
    ['src/misc/thing.ts', '', 'misc has no place in the order'],
  ])('finds the fault in %s: %s', (path, text, fault) => {
    expect(layerFaults(path, text).join('\n')).toContain(fault);
  });

  it('lets a later layer import an earlier one, and its own', () => {
    const text =
      "import '../errors.js'; import '../numeric/gamma.js'; import './other.js'; import 'seedrandom';";
    expect(layerFaults('src/random/stream.ts', text)).toEqual([]);
  });
});

describe('the check of packages', () => {
  const brought = {
    dependencies: { seeds: '1' },
    peerDependencies: { '@some/tensors': '1', '@some/backend': '1' },
    peerDependenciesMeta: { '@some/backend': { optional: true } },
  };

  it.each([
    ["import { x } from 'leadline';", 'leadline is not a dependency'],
    ["import { x } from 'not-there/deep';", 'not-there is not a dependency'],
    ["import { x } from 'node:fs';", 'node:fs does not exist in a browser'],
    ["import { x } from '@some/backend';", '@some/backend may not be installed'],
  ])('finds the fault in %s', (text, fault) => {
    expect(packageFaults('src/a.ts', text, brought)).toEqual([`src/a.ts:1: ${fault}`]);
  });

  it('lets a source import what is there, or defer what may not be', () => {
    const text = `import 'seeds/deep'; import '@some/tensors'; import './b.js';
      await import('@some/backend'); await import('node:fs');`;
    expect(packageFaults('src/a.ts', text, brought)).toEqual([]);
  });
});

describe('the check of packages that an entry point needs', () => {
  const brought = {
    peerDependencies: { 'fast-check': '1', '@some/backend': '1' },
    peerDependenciesMeta: { 'fast-check': { optional: true }, '@some/backend': { optional: true } },
  };

  it('lets that entry point alone import it', () => {
    const text = "import * as fc from 'fast-check';";
    expect(packageFaults('src/conformance/a.ts', text, brought)).toEqual([]);
    expect(packageFaults('src/models/a.ts', text, brought)).toEqual([
      'src/models/a.ts:1: fast-check may not be installed',
    ]);
    expect(packageFaults('src/conformance/a.ts', "import '@some/backend';", brought)).toEqual([
      'src/conformance/a.ts:1: @some/backend may not be installed',
    ]);
  });
});

describe('the check of randomness', () => {
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
