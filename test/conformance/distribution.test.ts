import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import { beforeAll, describe, expect, test } from 'vitest';
import { type DistributionLawOptions, LawError, lawsOfDistribution } from '../../src/conformance/index.js';
import {
  type Distribution,
  exponential,
  gumbel,
  laplace,
  logistic,
  normal,
  ParameterError,
  poisson,
  product,
  stream,
} from '../../src/index.js';
import { arbitrary, bent, failing, plus, spoiled, type Whole } from './spoiled.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

const integral = 'the density integrates to one';
const followsCdf = 'draws follow the cdf';
const followsDensity = 'draws follow the density';
const inside = 'draws lie in the support';
const outside = 'the log density is −∞ outside the support and never NaN';
const inArgument = 'the derivative in the argument is right';
const inParameters = 'the derivatives in the parameters are right';
const pathwise = 'the pathwise gradient is that of the expectation';
const cdf = 'the cdf is the density summed up';
const quantile = 'the quantile inverts the cdf';
const moments = 'mean, variance and entropy are those of the density';
const momentSlopes = 'the derivatives of mean, variance and entropy are right';
const bits = 'the same stream gives the same bits';
const shapes = 'shapes broadcast';
const cuts = 'detached cuts every gradient';
const leak = 'nothing leaks';
const route = 'the route is the declared one';

/** Names of the laws that fail for a logistic distribution spoiled so. */
async function caught(
  spoil: (d: Whole) => object,
  keep?: readonly string[],
  options: DistributionLawOptions = { seed: 11, runs: 3 },
): Promise<string[]> {
  const laws = lawsOfDistribution(spoiled(logistic, spoil, keep), arbitrary, options);
  return [...(await failing(laws)).keys()].sort();
}

const counts = fc.record({ rate: fc.double({ min: 0.5, max: 9, noNaN: true }) });

test('nothing is found in what is right, under any seed', async () => {
  for (const seed of [1, 2, 3]) expect(await caught(() => ({}), undefined, { seed })).toEqual([]);
  expect(await caught(() => ({}), [])).toEqual([]);
  expect([
    ...(
      await failing(
        lawsOfDistribution(
          spoiled(poisson, () => ({})),
          counts,
        ),
      )
    ).keys(),
  ]).toEqual([]);
});

describe('a mistake is caught by the laws that it breaks, and by no others', () => {
  const state = { calls: 0 };
  const kept: tf.Tensor[] = [];
  // Each case: what is wrong, how, the laws to fail, and the closed forms that are kept.
  test.each<[string, (d: Whole) => object, string[], string[]?]>([
    [
      'a normalizer 1 % off',
      (d) => ({ logDensity: (x: tf.Tensor) => plus(d.logDensity(x), 0.01) }),
      [integral, cdf, moments],
    ],
    [
      'a normalizer 1 % off, without closed forms',
      (d) => ({ logDensity: (x: tf.Tensor) => plus(d.logDensity(x), 0.01) }),
      [integral],
      [],
    ],
    [
      'a sampler off by a tenth',
      (d) => ({ draw: (s: never, n?: number) => plus(d.draw(s, n), 0.1) }),
      [followsCdf, pathwise],
    ],
    [
      'a sampler off by a tenth, without a cdf',
      (d) => ({ draw: (s: never, n?: number) => plus(d.draw(s, n), 0.1) }),
      [followsDensity, pathwise],
      [],
    ],
    [
      'a derivative in the argument 3 % off',
      (d) => ({ logDensity: (x: tf.Tensor) => d.logDensity(bent(x, 1.03)) }),
      [inArgument],
    ],
    [
      'a derivative in the parameters 3 % off, in the argument right',
      (d) => ({
        logDensity: (x: tf.Tensor) =>
          logistic({ location: bent(d.parameter('location'), 1.03), scale: d.parameter('scale') }).logDensity(
            x,
          ),
      }),
      [inParameters],
    ],
    [
      'a draw whose gradient is half of what it should be',
      (d) => ({ draw: (s: never, n?: number) => bent(d.draw(s, n), 0.5) }),
      [pathwise],
    ],
    [
      'a pathwise route without a gradient',
      (d) => ({ draw: (s: never, n?: number) => d.detached().draw(s, n) }),
      [route, pathwise],
    ],
    ['a gradient where the route is none', () => ({ route: 'none' }), [route]],
    [
      'one tensor left behind by logDensity',
      (d) => ({
        logDensity: (x: tf.Tensor) => {
          kept.push(tf.keep(tf.scalar(1)));
          return d.logDensity(x);
        },
      }),
      [leak],
    ],
    [
      'one tensor left behind by the mean',
      (d) => ({
        mean: () => {
          kept.push(tf.keep(tf.scalar(1)));
          return d.mean();
        },
      }),
      [leak],
    ],
    [
      'a detached that cuts nothing',
      (d) => ({
        detached: () =>
          spoiled(
            () => d as never,
            () => ({}),
          )({}),
      }),
      [cuts],
    ],
    [
      'NaN at infinity',
      (d) => ({
        logDensity: (x: tf.Tensor) =>
          tf.tidy(() =>
            tf.where(tf.isInf(x), tf.fill(tf.add(x, d.mean()).shape, Number.NaN), d.logDensity(x)),
          ),
      }),
      [outside],
    ],
    [
      'a cdf 1 % off',
      (d) => ({ cdf: (x: tf.Tensor) => tf.mul(d.cdf(x), 0.99) }),
      [cdf, quantile, 'the survival function complements the cdf', 'logCdf is the logarithm of the cdf'],
    ],
    ['a quantile 1 % off', (d) => ({ quantile: (p: tf.Tensor) => tf.mul(d.quantile(p), 1.01) }), [quantile]],
    [
      'a quantile 1 % off, without a cdf',
      (d) => ({ quantile: (p: tf.Tensor) => tf.mul(d.quantile(p), 1.01) }),
      [quantile],
      ['quantile'],
    ],
    ['a mean off', (d) => ({ mean: () => plus(d.mean(), 0.02) }), [moments]],
    ['a variance 1 % off', (d) => ({ variance: () => tf.mul(d.variance(), 1.01) }), [moments]],
    ['an entropy off', (d) => ({ entropy: () => plus(d.entropy(), 0.01) }), [moments]],
    [
      'an entropy whose gradient is not its own',
      (d) => ({ entropy: () => bent(d.entropy(), 1.02) }),
      [momentSlopes],
    ],
    [
      'a sampler with a memory',
      (d) => ({
        draw: (s: never, n?: number) => plus(d.draw(s, n), (state.calls++ % 2) * 1e-3),
      }),
      [bits, cuts],
    ],
    [
      'a draw that does not look at the stream',
      (d) => ({ draw: (_s: never, n?: number) => d.draw(stream(5), n) }),
      [bits],
    ],
    [
      'a log density with an axis too many',
      (d) => ({
        logDensity: (x: tf.Tensor) =>
          tf.tidy(() => (x.rank < 2 ? d.logDensity(x) : d.logDensity(x).expandDims(0))),
      }),
      [shapes],
    ],
    ['an arrayShape that is not what it draws', () => ({ arrayShape: [] }), [shapes]],
  ])('%s', async (_title, spoil, laws, keep) => {
    expect(await caught(spoil, keep)).toEqual([...laws].sort());
    tf.dispose(kept.splice(0));
  });

  test('a density outside its support', async () => {
    const positive = spoiled(exponential, (d) => ({
      logDensity: (x: tf.Tensor) => tf.tidy(() => d.logDensity(tf.relu(x))),
    }));
    const found = await failing(lawsOfDistribution(positive, counts, { seed: 12, runs: 3 }));
    expect([...found.keys()]).toEqual([outside]);
    expect(found.get(outside)).toMatch(/the log density outside the support, at -1e-38, must be −∞; got /);
  });

  test('a draw outside its support', async () => {
    const positive = spoiled(exponential, (d) => ({
      draw: (s: never, n?: number) => tf.tidy(() => tf.mul(d.draw(s, n), -1)),
    }));
    const found = await failing(lawsOfDistribution(positive, counts, { seed: 13, runs: 3 }));
    expect([...found.keys()]).toEqual(expect.arrayContaining([inside, followsCdf]));
  });

  test('masses that do not sum to one, and half a count with mass', async () => {
    const halved = spoiled(poisson, (d) => ({ logDensity: (x: tf.Tensor) => plus(d.logDensity(x), -0.7) }));
    const found = await failing(lawsOfDistribution(halved, counts, { seed: 14, runs: 3 }));
    expect([...found.keys()].sort()).toEqual([cdf, followsDensity, moments, 'the masses sum to one'].sort());
    const between = spoiled(poisson, (d) => ({
      logDensity: (x: tf.Tensor) => tf.tidy(() => d.logDensity(tf.floor(x))),
    }));
    expect([...(await failing(lawsOfDistribution(between, counts, { seed: 15, runs: 3 }))).keys()]).toEqual([
      outside,
    ]);
  });

  test('a count drawn one too high', async () => {
    const shifted = spoiled(poisson, (d) => ({ draw: (s: never, n?: number) => plus(d.draw(s, n), 1) }));
    expect([...(await failing(lawsOfDistribution(shifted, counts, { seed: 16, runs: 3 }))).keys()]).toEqual([
      followsDensity,
    ]);
  });

  test('parameters that should be refused and are not, or by the wrong error', async () => {
    const name = 'invalid parameters throw';
    const options = (invalid: object[]): DistributionLawOptions => ({ seed: 17, runs: 1, invalid });
    expect(await caught(() => ({}), undefined, options([{ location: 0, scale: 0 }]))).toEqual([]);
    expect(await caught(() => ({}), undefined, options([{ location: 0, scale: 2 }]))).toEqual([name]);
    const loose = (given: { location: number; scale: number }) => {
      if (given.scale > 99) throw new RangeError('too wide');
      return logistic(given);
    };
    const found = await failing(
      lawsOfDistribution(loose, arbitrary, options([{ location: 0, scale: Number.POSITIVE_INFINITY }])),
    );
    expect([...found.values()]).toEqual([
      'logistic: invalid parameters must throw a LeadlineError; got RangeError: too wide, expected an error for {"location":0,"scale":"Infinity"}; look at the factory\'s checks; seed 17',
    ]);
  });
});

describe('a failing law', () => {
  const wrong = spoiled(logistic, (d) => ({ logDensity: (x: tf.Tensor) => plus(d.logDensity(x), 1) }), []);
  const law = () =>
    lawsOfDistribution(wrong, arbitrary, { seed: 18 }).find(({ name }) => name.endsWith(integral))!;

  test('tells both numbers, what to look at, simple parameters and how to replay them', async () => {
    const error = await law()
      .check()
      .then(
        () => undefined,
        (e: unknown) => e,
      );
    expect(error).toBeInstanceOf(LawError);
    expect((error as LawError).code).toBe('law');
    expect((error as LawError).message).toMatch(
      /^spoiled: the density must integrate to one; got 2\.718\d+, expected 1 ± 0\.00010; look at the normalizing terms of logDensity, and its support; parameters \{"location":0,"scale":0\.5\} \(shrunk \d+ times\), seed 18, path [\d:]+$/,
    );
  });

  test('fails in the same way twice, and leaves no tensor behind', async () => {
    const told = () => law().check().catch(String);
    const first = await told();
    const before = tf.memory().numTensors;
    expect(await told()).toBe(first);
    expect(tf.memory().numTensors).toBe(before);
  });

  test('tells what a factory throws in the midst of its domain', async () => {
    let made = 0;
    // The first member is only looked at for what the family has.
    const brittle = (options: { location: number; scale: number }): Distribution => {
      if (made++ > 0) throw new TypeError('no such scale');
      return logistic(options);
    };
    const found = await failing(lawsOfDistribution(brittle, fc.constant({ location: 0, scale: 2 })));
    expect(found.get(integral)).toMatch(
      /^logistic: the density integrates to one: it must hold; got TypeError: no such scale; look at what throws; parameters \{"location":0,"scale":2\}/,
    );
  });
});

test('a kink near a point is no wrong derivative', async () => {
  const standard = fc.constant({ location: 0, scale: 1 });
  for (let seed = 0; seed < 60; seed++) {
    const laws = lawsOfDistribution(laplace, standard, { seed, runs: 1 });
    await laws.find(({ name }) => name.endsWith(inArgument))!.check();
  }
});

describe('what is no question for the laws is refused', () => {
  const any = (v: unknown) => v as never;
  test.each([
    [
      () => lawsOfDistribution(any(3), arbitrary),
      'lawsOfDistribution: factory must be a function; got 3; pass for example normal',
    ],
    [
      () => lawsOfDistribution(normal, any({ mean: 0 })),
      'lawsOfDistribution: arbitraryParameters must be a fast-check arbitrary; got an object with keys mean; pass for example fc.record({ mean: fc.double(), … })',
    ],
    [
      () => lawsOfDistribution(normal, fc.constant({ mean: [0, 1], sd: 1 })),
      'lawsOfDistribution: arbitraryParameters must make one member; got arrayShape [2]; generate plain numbers, the laws make arrays of them',
    ],
    [
      () => lawsOfDistribution(logistic, arbitrary, { seed: 0.5 }),
      'lawsOfDistribution: seed must be a whole number; got 0.5; pass for example 1',
    ],
    [
      () => lawsOfDistribution(logistic, arbitrary, { runs: 0 }),
      'lawsOfDistribution: runs must be a whole number of at least 1; got 0; pass for example 1',
    ],
    [
      () => lawsOfDistribution(logistic, arbitrary, any({ trials: 3 })),
      "lawsOfDistribution: options must be among seed, runs, invalid; got 'trials'; remove or rename it",
    ],
  ])('%#', (act, message) => {
    expect(act).toThrow(new ParameterError(message));
  });

  test('vectors have the laws of vectors', async () => {
    const pair = (options: { mean: number[]; sd: number }) => product(normal(options));
    const laws = lawsOfDistribution(pair, fc.constant({ mean: [0, 1], sd: 1 }));
    expect(laws.map(({ name }) => name)).toEqual(
      [bits, shapes, cuts, leak, route].map((name) => `product<normal>: ${name}`),
    );
    expect([...(await failing(laws)).keys()]).toEqual([]);
  });
});

describe('a mistake in a tail is caught by its law', () => {
  test.each<[string, (d: Whole) => object, string[]]>([
    ['nothing', () => ({}), []],
    [
      'a survival function of the point before',
      (d) => ({ survival: (x: tf.Tensor) => d.survival(plus(x, -0.01)) }),
      [
        'logSurvival is the logarithm of the survival function',
        'the survival function complements the cdf',
        'the upper quantile inverts the survival function',
      ],
    ],
    [
      'a logarithm of twice the probability',
      (d) => ({ logCdf: (x: tf.Tensor) => plus(d.logCdf(x), Math.LN2) }),
      ['logCdf is the logarithm of the cdf'],
    ],
    [
      'a log survival function that gives up far out',
      (d) => ({ logSurvival: (x: tf.Tensor) => tf.maximum(d.logSurvival(x), -4) }),
      ['logSurvival is the logarithm of the survival function'],
    ],
    [
      'an upper quantile by way of 1 − p',
      (d) => ({ upperQuantile: (p: tf.Tensor) => d.quantile(tf.sub(1, p)) }),
      ['the upper quantile inverts the survival function'],
    ],
  ])('%s', async (_what, spoil, laws) => {
    const found = await failing(lawsOfDistribution(spoiled(gumbel, spoil), arbitrary, { seed: 13, runs: 3 }));
    expect([...found.keys()].sort()).toEqual(laws);
  });
});
