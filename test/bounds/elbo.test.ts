import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, test } from 'vitest';
import {
  bernoulli,
  DivergenceError,
  directed,
  elbo,
  GradientError,
  LeadlineError,
  logistic,
  ModelError,
  masked,
  normal,
  product,
  ShapeError,
  stream,
} from '../../src/index.js';
import { b, exactRecognizer, gaussianModel, logEvidence, prior, s, w, xs } from './conjugate.js';

beforeAll(async () => {
  tf.enableProdMode();
  await tf.setBackend('cpu');
});

const x = () => tf.tensor2d(xs);
const plainRecognizer = (scale: tf.Variable | number = 0.6) =>
  directed()
    .given('x')
    .latent('z', ({ x: seen }) => product(normal({ mean: tf.slice(seen, [0, 0], [-1, 2]), sd: scale })));

describe('the elbo of a linear Gaussian model', () => {
  test('equals the exact log evidence for every draw when the recognizer is the exact posterior', () => {
    // log p(x, z) − log q(z | x) is the log evidence whatever z is, so one sampled draw suffices.
    const bound = elbo(gaussianModel(), exactRecognizer(), { divergence: 'sampled' });
    const value = bound.estimate({ x: x() }, stream(11)).value.dataSync();
    // The terms are of size 10; float32 keeps seven digits.
    logEvidence().forEach((exact, i) => {
      expect(Math.abs(value[i]! - exact)).toBeLessThan(1e-5);
    });
  });

  test('with the closed divergence it equals the evidence on average, and with the exact likelihood part', () => {
    const draws = 40_000;
    const bound = elbo(gaussianModel(), exactRecognizer(), { draws, divergence: 'closed' });
    const { value, parts } = bound.estimate({ x: x() }, stream(12));
    const exact = logEvidence();
    // Var over z of the log-likelihood is below 25 here; 5 standard errors, false alarm 6e-7 a row.
    const tolerance = 5 * Math.sqrt(25 / draws);
    value.dataSync().forEach((v, i) => {
      expect(Math.abs(v - exact[i]!)).toBeLessThan(tolerance);
    });
    expect(Object.keys(parts.logLikelihood)).toEqual(['x']);
    expect(Object.keys(parts.divergence)).toEqual(['z']);
    const rebuilt = tf.sub(parts.logLikelihood.x!, parts.divergence.z!).dataSync();
    expect([...rebuilt]).toEqual([...value.dataSync()]);
  });

  test('lies below the evidence by the divergence of the recognizer from the posterior', () => {
    const { value } = elbo(gaussianModel(), plainRecognizer(), { draws: 20_000 }).estimate(
      { x: x() },
      stream(13),
    );
    logEvidence().forEach((exact, i) => {
      expect(value.dataSync()[i]!).toBeLessThan(exact);
    });
  });

  test('closed and sampled divergences estimate the same bound', () => {
    const draws = 50_000;
    const closed = elbo(gaussianModel(), plainRecognizer(), { draws, divergence: 'closed' });
    const sampled = elbo(gaussianModel(), plainRecognizer(), { draws, divergence: { z: 'sampled' } });
    const [p, q] = [closed, sampled].map((bound) =>
      bound.estimate({ x: x() }, stream(14)).parts.divergence.z!.dataSync(),
    );
    // log q − log p has variance below 4 here; 5 standard errors, false alarm 6e-7 a row.
    p!.forEach((v, i) => {
      expect(Math.abs(v - q![i]!)).toBeLessThan(5 * Math.sqrt(4 / draws));
    });
  });

  test('the surrogate has the gradient of the exact bound', () => {
    // With q = N(m, t² I) and m the first two coordinates of x, the bound's derivative in t is
    // 2/t − 2t − t Σ W² / s², exactly.
    const t = tf.variable(tf.scalar(0.6));
    const draws = 20_000;
    const bound = elbo(gaussianModel(), plainRecognizer(t), { draws });
    const { grads } = tf.variableGrads(() => bound.loss({ x: x() }, stream(15)));
    const squares = w.flat().reduce((sum, v) => sum + v * v, 0);
    const exact = -(2 / 0.6 - 2 * 0.6 - (0.6 * squares) / s ** 2);
    const got = Object.values(grads)[0]!.dataSync()[0]!;
    // The per-draw gradient's deviation is below 20; averaged over 80,000 draws, 5 standard errors.
    expect(Math.abs(got - exact)).toBeLessThan((5 * 20) / Math.sqrt(draws * xs.length));
  });
});

describe('rows', () => {
  test('several draws fold into rows, outermost, and every conditional sees one leading axis', () => {
    const seen: number[][] = [];
    const model = directed()
      .latent('z', prior)
      .observed('x', ({ z }) => {
        seen.push(z.shape);
        return product(normal({ mean: tf.matMul(z as tf.Tensor2D, tf.tensor2d(w)), sd: s }));
      });
    const recognizer = directed()
      .given('x')
      .latent('z', ({ x: given }) => {
        seen.push(given.shape);
        return product(normal({ mean: tf.slice(given, [0, 0], [-1, 2]), sd: 1 }));
      });
    const { value } = elbo(model, recognizer, { draws: 5 }).estimate({ x: x() }, stream(21));
    expect(value.shape).toEqual([4]);
    // The encoder runs once per data point however many draws there are.
    expect(seen).toEqual([
      [4, 3],
      [20, 2],
    ]);
  });

  test('K draws average K estimates of one draw', () => {
    const draws = 3;
    const many = elbo(gaussianModel(), plainRecognizer(), { draws, divergence: 'sampled' });
    const noise = stream(22);
    const value = many.estimate({ x: x() }, noise).value.dataSync();
    // The same noise by hand: [draws, rows, 2] from one stream.
    const e = stream(22).normal([draws, 4, 2]);
    const z = tf.add(tf.slice(x(), [0, 0], [-1, 2]), tf.mul(e, 0.6));
    const likelihood = tf.add(tf.matMul(tf.reshape(z, [-1, 2]) as tf.Tensor2D, tf.tensor2d(w)), b);
    const logP = tf.add(
      product(normal({ mean: tf.reshape(likelihood, [draws, 4, 3]), sd: s })).logDensity(
        tf.tile(tf.expandDims(x(), 0), [draws, 1, 1]),
      ),
      prior().logDensity(z),
    );
    const logQ = product(normal({ mean: tf.slice(x(), [0, 0], [-1, 2]), sd: 0.6 })).logDensity(z);
    const expected = tf.mean(tf.sub(logP, logQ), 0).dataSync();
    value.forEach((v, i) => {
      expect(v).toBeCloseTo(expected[i]!, 4);
    });
  });

  test('latents that depend on latents, several observed values and covariates, against direct scores', () => {
    const model = directed()
      .given('c')
      .latent('a', ({ c }) => product(normal({ mean: c, sd: 1 })))
      .latent('h', ({ a, c }) => product(normal({ mean: tf.add(a, c), sd: 0.5 })))
      .observed('x', ({ h }) => product(normal({ mean: h, sd: 0.3 })))
      .observed('y', ({ a, h }) => product(bernoulli({ logit: tf.concat([a, h], 1) })));
    // The recognizer goes the other way round: h from x, then a from h.
    const recognizer = directed()
      .given('x')
      .latent('h', ({ x: seen }) => product(normal({ mean: seen, sd: 0.4 })))
      .latent('a', ({ h }) => product(normal({ mean: h, sd: 0.9 })));
    const data = {
      c: [[0.5], [1]],
      x: [[1], [2]],
      y: [
        [1, 0],
        [1, 1],
      ],
    };
    const draws = 2;
    const { value, parts } = elbo(model, recognizer, { draws }).estimate(data, stream(23));

    const noise = stream(23);
    const [c, seen, y] = [data.c, data.x, data.y].map((v) => tf.tile(tf.tensor2d(v), [draws, 1]));
    const h = tf.add(seen!, tf.mul(tf.reshape(noise.normal([draws, 2, 1]), [-1, 1]), 0.4));
    const a = tf.add(h, tf.mul(noise.normal([draws * 2, 1]), 0.9));
    const score = (mean: tf.Tensor, sd: number, point: tf.Tensor) =>
      product(normal({ mean, sd })).logDensity(point);
    const mean = (t: tf.Tensor) => [...tf.mean(tf.reshape(t, [draws, 2]), 0).dataSync()];
    const likelihoodX = mean(score(h, 0.3, seen!));
    const likelihoodY = mean(product(bernoulli({ logit: tf.concat([a, h], 1) })).logDensity(y!));
    // The prior of h reads a, which the recognizer draws from h: only the sampled form holds for h. For a the
    // closed form holds.
    const divergenceH = mean(tf.sub(score(seen!, 0.4, h), score(tf.add(a, c!), 0.5, h)));
    const gap = tf.sub(h, c!);
    const divergenceA = mean(
      tf.reshape(tf.add(tf.mul(0.5, tf.square(gap)), (0.9 ** 2 - 1) / 2 - Math.log(0.9)), [-1]),
    );
    for (const [got, expected] of [
      [parts.logLikelihood.x, likelihoodX],
      [parts.logLikelihood.y, likelihoodY],
      [parts.divergence.h, divergenceH],
      [parts.divergence.a, divergenceA],
      [value, likelihoodX.map((v, i) => v + likelihoodY[i]! - divergenceH[i]! - divergenceA[i]!)],
    ] as const) {
      got!.dataSync().forEach((v, i) => {
        expect(v).toBeCloseTo(expected[i]!, 4);
      });
    }
  });

  test('missing rows and missing coordinates add nothing, whatever stands in their place', () => {
    const full = x();
    const whole = masked(full, tf.tensor1d([1, 0, 1, 1]));
    const gaps = tf.tensor2d([
      [1, 1, 0],
      [0, 0, 0],
      [1, 1, 1],
      [0, 1, 1],
    ]);
    const withNaN = tf.where(tf.cast(gaps, 'bool'), full, tf.fill([4, 3], Number.NaN));
    const recognizer = directed()
      .given('u')
      .latent('z', ({ u }) => product(normal({ mean: u, sd: 0.6 })));
    const u = tf.zeros([4, 2]);
    const bound = elbo(gaussianModel(), recognizer);
    const part = (data: { x: tf.Tensor | ReturnType<typeof masked>; u: tf.Tensor }) =>
      bound.estimate(data, stream(24)).parts.logLikelihood.x!.dataSync();
    const complete = part({ x: full, u });
    const rows = part({ x: whole, u });
    expect([...rows]).toEqual([complete[0], 0, complete[2], complete[3]]);
    const coordinates = part({ x: masked(withNaN, gaps), u });
    expect(coordinates.every(Number.isFinite)).toBe(true);
    expect(coordinates[1]).toBe(0);
    expect(coordinates[2]).toBeCloseTo(complete[2]!, 5);
    // Row 0 without its third coordinate, by hand.
    const e = stream(24).normal([4, 2]);
    const mean = tf.add(tf.matMul(tf.mul(e, 0.6) as tf.Tensor2D, tf.tensor2d(w)), b);
    const each = normal({ mean, sd: s }).logDensity(full).arraySync() as number[][];
    expect(coordinates[0]).toBeCloseTo(each[0]![0]! + each[0]![1]!, 5);

    // The gradient is finite although NaN stands in the missing places.
    const offset = tf.variable(tf.zeros([3]));
    const learned = directed()
      .latent('z', prior)
      .observed('x', () => product(normal({ mean: tf.tile(tf.expandDims(offset, 0), [4, 1]), sd: s })));
    const { grads } = tf.variableGrads(() =>
      elbo(learned, recognizer).loss({ x: masked(withNaN, gaps), u }, stream(25)),
    );
    expect(Object.values(grads)[0]!.dataSync().every(Number.isFinite)).toBe(true);
  });
});

describe('weight and free nats', () => {
  const estimate = (options: object) =>
    elbo(gaussianModel(), plainRecognizer(), options).estimate({ x: x() }, stream(31));
  const scalar = (t: tf.Tensor) => t.dataSync()[0]!;
  const sum = (t: tf.Tensor) => [...t.dataSync()].reduce((a, v) => a + v, 0);

  test('the surrogate carries the weight, the value stays the bound', () => {
    const plain = estimate({});
    const weighted = estimate({ divergenceWeight: 0.25 });
    expect([...weighted.value.dataSync()]).toEqual([...plain.value.dataSync()]);
    const expected = sum(plain.parts.logLikelihood.x!) - 0.25 * sum(plain.parts.divergence.z!);
    expect(scalar(weighted.surrogate)).toBeCloseTo(expected, 4);
    expect(scalar(plain.surrogate)).toBeCloseTo(sum(plain.value), 4);
  });

  test('free nats hold a latent at the allowance, with no gradient below it', () => {
    const plain = estimate({});
    const divergence = sum(plain.parts.divergence.z!) / 4;
    const likelihood = sum(plain.parts.logLikelihood.x!);
    expect(scalar(estimate({ freeNats: divergence * 2 }).surrogate)).toBeCloseTo(
      likelihood - 8 * divergence,
      3,
    );
    expect(scalar(estimate({ freeNats: { z: divergence / 2 } }).surrogate)).toBeCloseTo(
      likelihood - 4 * divergence,
      3,
    );
    const t = tf.variable(tf.scalar(0.6));
    const unused = directed()
      .latent('z', prior)
      .observed('x', () => product(normal({ mean: b, sd: s })));
    const { grads } = tf.variableGrads(() =>
      elbo(unused, plainRecognizer(t), { freeNats: 100 }).loss({ x: x() }, stream(32)),
    );
    expect(Object.values(grads)[0]!.dataSync()[0]).toBe(0);
  });
});

test('nothing leaks, with or without a gradient', () => {
  const data = { x: x() };
  const bound = elbo(gaussianModel(), plainRecognizer(), { draws: 3, divergence: 'sampled' });
  const source = stream(41);
  tf.dispose(bound.loss(data, source));
  const before = tf.memory().numTensors;
  const estimate = bound.estimate(data, source);
  expect(tf.memory().numTensors - before).toBe(4);
  tf.dispose([
    estimate.value,
    estimate.surrogate,
    estimate.parts.logLikelihood,
    estimate.parts.divergence,
  ] as never);
  expect(tf.memory().numTensors).toBe(before);
  const t = tf.variable(tf.scalar(0.5));
  const learning = elbo(gaussianModel(), plainRecognizer(t), { draws: 2 });
  const held = tf.memory().numTensors;
  const { value, grads } = tf.variableGrads(() => learning.loss(data, source));
  tf.dispose([value, ...Object.values(grads)]);
  expect(tf.memory().numTensors).toBe(held);
});

describe('wrong use', () => {
  const model = gaussianModel();
  const good = plainRecognizer();
  const refuse = (
    act: () => unknown,
    kind: abstract new (...args: never[]) => LeadlineError,
    text: string,
  ) => {
    let caught: unknown;
    try {
      act();
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(kind);
    expect(caught).toBeInstanceOf(LeadlineError);
    expect((caught as Error).message).toBe(text);
  };
  // The types refuse these programs too; here is what a JavaScript user reads.
  const any = (v: unknown) => v as never;

  test('of models', () => {
    refuse(
      () => elbo(any({}), any(good)),
      ModelError,
      'elbo: model must be a directed model; got an object with keys (none); build one with directed()',
    );
    refuse(
      () => elbo(model, any(directed().given('x'))),
      ModelError,
      "elbo: recognizer must have a latent for each latent of the model; it misses z; add .latent('z', …)",
    );
    refuse(
      () => elbo(model, any(good.latent('extra', prior))),
      ModelError,
      'elbo: recognizer must have only latents of the model; it adds extra; remove it or add it to the model',
    );
    refuse(
      () => elbo(model, any(directed().observed('x', prior).latent('z', prior))),
      ModelError,
      "elbo: recognizer must have no observed values; got x; declare them with given('x')",
    );
    refuse(
      () => elbo(any(directed().latent('z', prior)), any(good)),
      ModelError,
      "elbo: model must have at least one observed value; got none; add .observed('x', …)",
    );
    refuse(
      () => directed().latent('z', prior).latent(any('z'), prior),
      ModelError,
      "directed: names must be unique; got 'z' twice; choose another name",
    );
    refuse(
      () => directed().latent('z', any(3)),
      ModelError,
      "directed: the conditional of 'z' must be a function of the values before it; got 3; pass () => … returning a distribution",
    );
    refuse(
      () => directed().given(any('')),
      ModelError,
      "directed: the name of a given value must be a non-empty string; got the string ''; pass for example 'x'",
    );
  });

  test('of options', () => {
    const options = (o: unknown) => () => elbo(model, good, any(o));
    refuse(
      options({ draws: 0 }),
      LeadlineError,
      'elbo: draws must be a whole number of at least 1; got 0; pass for example 1',
    );
    refuse(
      options({ draws: Number.NaN }),
      LeadlineError,
      'elbo: draws must be a whole number of at least 1; got NaN; pass for example 1',
    );
    refuse(
      options({ divergence: 'exact' }),
      LeadlineError,
      "elbo: divergence must be 'closed', 'sampled' or left out; got the string 'exact' for 'z'; pass for example divergence: 'sampled'",
    );
    refuse(
      options({ divergence: { y: 'closed' } }),
      LeadlineError,
      "elbo divergence: options must be among z; got 'y'; remove or rename it",
    );
    refuse(
      options({ divergenceWeight: -1 }),
      LeadlineError,
      'elbo: divergenceWeight must be a finite number of at least 0; got -1; mend the value',
    );
    refuse(
      options({ freeNats: Number.NaN }),
      LeadlineError,
      'elbo: freeNats must be a finite number of at least 0; got NaN; mend the value',
    );
    refuse(
      options({ samples: 3 }),
      LeadlineError,
      "elbo: options must be among draws, divergence, divergenceWeight, freeNats; got 'samples'; remove or rename it",
    );
  });

  test('of data', () => {
    const bound = elbo(model, good);
    const estimate =
      (data: unknown, source: unknown = stream(1)) =>
      () =>
        bound.estimate(any(data), any(source));
    refuse(estimate({}), ModelError, "elbo: data must have a value for 'x'; got none; add x to the data");
    refuse(
      estimate({ x: x(), y: x() }),
      ModelError,
      "elbo: data must be among x; got 'y'; remove it or declare it in the model",
    );
    refuse(
      estimate(x()),
      ModelError,
      'elbo: data must be an object with one value per name; got a tensor of shape [4, 3]; pass { x }',
    );
    refuse(
      estimate({ x: 'pixels' }),
      LeadlineError,
      "elbo: x must be a tensor, nested numbers or masked(values, mask); got the string 'pixels'; give the data for 'x'",
    );
    refuse(
      estimate({ x: tf.scalar(1) }),
      ShapeError,
      "elbo: 'x' must have a leading axis of rows; got a scalar; wrap it as [value]",
    );
    refuse(
      estimate({ x: tf.zeros([4, 2]) }),
      ShapeError,
      "elbo: 'x' must have points of shape [3], as its product<normal> has; got [2]; reshape the data, or fold another number of axes with product(d, axes)",
    );
    const covariate = elbo(
      directed()
        .given('c')
        .latent('z', prior)
        .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 }))),
      directed()
        .given('x')
        .latent('z', ({ x: seen }) => product(normal({ mean: seen, sd: 1 }))),
    );
    refuse(
      () =>
        covariate.estimate(
          {
            c: [[1]],
            x: [
              [1, 2],
              [3, 4],
            ],
          },
          stream(1),
        ),
      ShapeError,
      "elbo: all values must have the same number of rows; got 1 and, for 'x', 2; slice or repeat the data",
    );
  });

  test('of conditionals', () => {
    const estimate =
      (m: unknown, r: unknown, o: unknown = {}) =>
      () =>
        elbo(any(m), any(r), any(o)).estimate(any({ x: x() }), stream(1));
    refuse(
      estimate(
        model,
        directed()
          .given('x')
          .latent('z', () => normal({ mean: tf.zeros([4, 2]), sd: 1 })),
      ),
      ShapeError,
      "elbo: the conditional of 'z' must have arrayShape [4], one member per row, or []; got [4, 2] for normal; fold the axes after the rows into the point with product(d)",
    );
    refuse(
      estimate(
        model,
        directed()
          .given('x')
          .latent('z', () => product(normal({ mean: tf.zeros([3, 2]), sd: 1 }))),
      ),
      ShapeError,
      "elbo: the conditional of 'z' must have arrayShape [4], one member per row, or []; got [3] for product<normal>; keep the leading axis of the values it read, or fold the array into one point with product(d)",
    );
    refuse(
      estimate(
        model,
        directed()
          .given('x')
          .latent(
            'z',
            any(() => 3),
          ),
      ),
      ModelError,
      "elbo: the conditional of 'z' must return a distribution; got 3; return for example product(normal({ mean, logVariance }))",
    );
    refuse(
      estimate(
        model,
        directed()
          .given('x')
          .latent(
            'z',
            any(({ y }: { y: tf.Tensor }) => product(normal({ mean: y, sd: 1 }))),
          ),
      ),
      ModelError,
      "elbo: the conditional of 'z' must read values declared before it (x); got 'y'; declare 'y' first",
    );
    refuse(
      estimate(
        directed()
          .latent('z', () => product(bernoulli({ logit: [0, 0] })))
          .observed('x', () => product(normal({ mean: b, sd: 1 }))),
        directed()
          .given('x')
          .latent('z', () => product(bernoulli({ logit: [0, 0] }))),
      ),
      GradientError,
      "elbo: the recognizer's draws must carry a gradient; got product<bernoulli> for 'z', whose route is 'none'; use a pathwise family for this latent",
    );
    refuse(
      estimate(
        model,
        directed()
          .given('x')
          .latent('z', () => product(logistic({ location: [0, 0], scale: 1 }))),
        { divergence: 'closed' },
      ),
      DivergenceError,
      "elbo: the divergence of 'z' must have a closed form; got (product<logistic>, product<normal>); pass divergence: { z: 'sampled' }, or registerKl(…)",
    );
    // A closed form would spread this prior over both coordinates.
    for (const divergence of ['closed', 'sampled'] as const) {
      refuse(
        () =>
          elbo(
            directed()
              .latent('z', () => product(normal({ mean: [0], sd: 1 })))
              .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 }))),
            directed()
              .given('x')
              .latent('z', ({ x: seen }) => product(normal({ mean: seen, sd: 1 }))),
            { divergence },
          ).estimate({ x: [[1, 2]] }, stream(1)),
        ShapeError,
        "elbo: 'z' must have points of one shape; got [1] in the model and [2] in the recognizer; give both the same sizes",
      );
    }
    refuse(
      () =>
        elbo(
          directed()
            .latent('a', () => product(normal({ mean: [0], sd: 1 })))
            .latent('h', ({ a }) => product(normal({ mean: a, sd: 1 })))
            .observed('x', ({ h }) => product(normal({ mean: h, sd: 1 }))),
          directed()
            .given('x')
            .latent('h', ({ x: seen }) => product(normal({ mean: seen, sd: 1 })))
            .latent('a', ({ h }) => product(normal({ mean: h, sd: 1 }))),
          { divergence: 'closed' },
        ).estimate({ x: [[1]] }, stream(1)),
      DivergenceError,
      "elbo: the divergence of 'h' must be sampled, since its prior reads 'a', which the recognizer draws from 'h'; got 'closed'; pass divergence: { h: 'sampled' }",
    );
  });
});
