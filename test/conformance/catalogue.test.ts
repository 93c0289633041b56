import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import { lawsOfDistribution, lawsOfKl } from '../../src/conformance/index.js';
import * as library from '../../src/index.js';
import { catalogue, vectors } from './catalogue.js';
import { factoriesOf } from './factories.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

test('every factory of a distribution that the library exports stands in the catalogue', () => {
  const factories = factoriesOf('src/index.ts');
  expect(factories).toContain('normal');
  expect(factories.filter((name) => !(name in catalogue) && !(name in vectors))).toEqual([]);
  expect(Object.keys({ ...catalogue, ...vectors }).filter((name) => !factories.includes(name))).toEqual([]);
});

describe.each(Object.entries({ ...catalogue, ...vectors }))(
  '%s',
  (name, { factory, parametrizations, invalid }) => {
    test('is the family that it is listed as', () => {
      expect(factory).toBe(new Map<string, unknown>(Object.entries(library)).get(name));
    });

    describe.each(parametrizations.map((arbitrary, k) => ({ k, arbitrary })))(
      'parametrization $k',
      ({ k, arbitrary }) => {
        const options = { seed: 300 + k, ...(k === 0 ? { invalid } : {}) };
        const laws = lawsOfDistribution(
          factory as (options: object) => library.Distribution,
          arbitrary,
          options,
        );
        test.each(laws)('$name', ({ check }) => check());
      },
    );
  },
);

describe.each(Object.entries(catalogue).filter(([, { divergence }]) => divergence))(
  'the divergence of %s',
  (_name, { factory: given, parametrizations, others }) => {
    const factory = given as (options: object) => library.Distribution;
    const q = { factory, arbitraryParameters: parametrizations[0]! };
    const p = { factory, arbitraryParameters: others ?? parametrizations[0]! };
    test.each(lawsOfKl(q, p, { seed: 400 }))('$name', ({ check }) => check());
  },
);

test('only families without a closed form lack their divergence in the catalogue', () => {
  const lacking = Object.keys(catalogue).filter((name) => !catalogue[name]!.divergence);
  expect(lacking.filter((name) => library.hasClosedKl(name, name))).toEqual([]);
});
