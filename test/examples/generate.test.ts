import { expect, it } from 'vitest';
import { causeNames, generate } from '../../docs/examples/orchard/generate.js';
import { readCsv } from '../../docs/examples/orchard/readCsv.js';
import { absorbance, sensorNoise, wavelengths } from '../../docs/examples/orchard/spectrum.js';
import { stream } from '../../src/random/stream.js';

const text = generate(stream('season'), 200);

it('gives the same season for the same seed, and another for another', () => {
  expect(generate(stream('season'), 200)).toBe(text);
  expect(generate(stream('other season'), 200)).not.toBe(text);
});

it('writes a file that the demo reads', () => {
  const { names, rows } = readCsv(text, 'quorrels.csv');
  expect(names).toEqual([...causeNames, ...wavelengths.map((at) => `${at} nm`)]);
  expect(rows).toHaveLength(200);
});

it('adds the noise that it says to the spectra of the causes that it says', () => {
  const { rows } = readCsv(text, 'quorrels.csv');
  let sum = 0;
  for (const [ripeness, water, bruise, depth, ...spectrum] of rows.map((row) => [...row])) {
    const causes = { ripeness: ripeness!, water: water!, bruise: bruise!, depth: depth! };
    for (const [k, at] of wavelengths.entries()) {
      sum += ((spectrum[k]! - absorbance(at, causes)) / sensorNoise(at)) ** 2;
    }
  }
  // Chi-squared with n = 12,800 degrees of freedom, standard deviation sqrt(2 n) = 160: five of them, odds 6e-7.
  // The rounding of the file, at most 5e-4 in a cause, shifts it by less than one.
  expect(Math.abs(sum - 12_800)).toBeLessThan(800);
});
