import * as tf from '@tensorflow/tfjs';
import { beforeAll, describe, expect, it } from 'vitest';
import {
  categorical,
  exponential,
  LeadlineError,
  multivariateNormal,
  normal,
  ParameterError,
  poisson,
  ShapeError,
  StreamError,
  stream,
  uniform,
} from '../../src/index.js';
import { factoriesOf } from '../conformance/factories.js';
import { entries } from '../families/entry.js';
import { call, has, type Sample, scalars, vectors } from './samples.js';

beforeAll(async () => {
  await tf.setBackend('cpu');
});

const families: Record<string, Omit<Sample, 'members'>> = { ...scalars, ...vectors };
type ErrorClass = new (message: string) => LeadlineError;

/** Runs what must throw, and compares class and text. */
function expectError(probe: () => unknown, kind: ErrorClass, text: string): void {
  let thrown: unknown;
  try {
    probe();
  } catch (error) {
    thrown = error;
  }
  expect(thrown, text).toBeInstanceOf(kind);
  expect((thrown as Error).message).toBe(text);
}

const disposed = (): tf.Tensor => {
  const t = tf.zeros([2]);
  t.dispose();
  return t;
};

it('every family that the library exports is probed here', () => {
  expect(Object.keys(families).sort()).toEqual(factoriesOf('src/index.ts').sort());
});

/** What each parameter must be, by name: the words of its domain, a value outside it and the cure. */
const lookForIt = 'look for the division or logarithm that made it';
type Domain = { words: string; outside?: number; fix: string; example?: string };
const domains: Record<string, Domain> = {
  mean: { words: 'finite', fix: '' },
  location: { words: 'finite', fix: '' },
  lower: { words: 'finite', fix: '' },
  upper: { words: 'finite', fix: '' },
  sd: {
    words: 'positive',
    outside: -0.5,
    fix: 'pass logVariance if your network can produce negative values',
  },
  variance: {
    words: 'positive',
    outside: 0,
    fix: 'pass logVariance if your network can produce negative values',
  },
  precision: {
    words: 'positive',
    outside: -2,
    fix: 'pass logVariance if your network can produce negative values',
  },
  logSd: { words: 'between -700 and 700', outside: 701, fix: 'runaway' },
  logVariance: { words: 'between -1400 and 1400', outside: -1401, fix: 'runaway' },
  logScale: { words: 'between -700 and 700', outside: -700, fix: 'runaway' },
  logRate: { words: 'between -700 and 700', outside: 700, fix: 'runaway' },
  scale: { words: 'positive', outside: 0, fix: 'pass logScale if your network can produce negative values' },
  rate: { words: 'positive', outside: -1, fix: 'pass logRate if your network can produce negative values' },
  shape: { words: 'positive', outside: -1, fix: 'pass logShape if your network can produce negative values' },
  logShape: { words: 'between -700 and 700', outside: 700, fix: 'runaway' },
  alpha: { words: 'positive', outside: -1, fix: 'pass logAlpha if your network can produce negative values' },
  beta: { words: 'positive', outside: 0, fix: 'pass logBeta if your network can produce negative values' },
  logAlpha: { words: 'between -700 and 700', outside: 700, fix: 'runaway' },
  logBeta: { words: 'between -700 and 700', outside: -700, fix: 'runaway' },
  concentration: { words: 'positive', outside: 0, fix: 'mend the value' },
  degreesOfFreedom: { words: 'positive', outside: 0, fix: 'mend the value' },
  dispersion: { words: 'positive', outside: 0, fix: 'mend the value' },
  logMean: { words: 'between -700 and 700', outside: -701, fix: 'runaway' },
  logConcentration: { words: 'between -80 and 80', outside: -81, fix: 'runaway' },
  logDegreesOfFreedom: { words: 'between -30 and 80', outside: 81, fix: 'runaway' },
  logit: { words: 'finite', fix: '' },
  probability: {
    words: 'strictly between 0 and 1',
    outside: 1,
    fix: 'pass logit, which a network can produce freely',
  },
  logits: { words: 'finite', fix: '', example: '[0, 1]' },
  probabilities: { words: 'from 0 to 1', outside: -0.5, fix: 'mend the value', example: '[0.2, 0.8]' },
  covarianceFactor: { words: 'finite', fix: '', example: '[[1, 0], [0.5, 1]]' },
};
const runaway = 'a network that gives such values has diverged: clip its output, or lower the learning rate';

function domainOf(family: string, name: string) {
  const domain: Domain = entries[family]?.domains?.[name] ?? domains[name]!;
  const rate = 'pass logRate if your network can produce negative values';
  // The mean and scale of these families are their rate by another name.
  if (family === 'exponential' && name === 'scale') return { words: 'positive', outside: 0, fix: rate };
  if ((family === 'exponential' || family === 'poisson') && name === 'mean') {
    return { words: 'positive', outside: -3, fix: rate };
  }
  if (family === 'beta' && name === 'mean') {
    return { words: 'strictly between 0 and 1', outside: 1, fix: 'mend the value' };
  }
  if (family === 'gamma' && name === 'mean') {
    return { words: 'positive', outside: 0, fix: 'mend the value' };
  }
  if (
    (family === 'studentT' && name === 'degreesOfFreedom') ||
    (family === 'vonMises' && name === 'concentration')
  ) {
    const log = `log${name[0]!.toUpperCase()}${name.slice(1)}`;
    return { words: 'positive', outside: 0, fix: `pass ${log} if your network can produce negative values` };
  }
  if (family === 'inverseGaussian' && name === 'mean') {
    return { words: 'positive', outside: 0, fix: 'pass logMean if your network can produce negative values' };
  }
  if (family === 'multivariateNormal' && name === 'mean') return { ...domain, example: '[0, 0]' };
  return domain.fix === 'runaway' ? { ...domain, fix: runaway } : domain;
}

describe.each(Object.entries(families))('%s', (family, { make, parametrizations }) => {
  const cases = parametrizations.flatMap((options) =>
    Object.keys(options).map((name) => ({ options, name })),
  );

  describe.each(cases)('$name of $options', ({ options, name }) => {
    const domain = domainOf(family, name);
    const given = (value: unknown) => () => make({ ...options, [name]: value });
    const example = domain.example ?? '1';
    const wrongType = 'a tensor, a number, nested numbers or a typed array';
    const like = (value: number): unknown => {
      const valid = options[name]!;
      if (!Array.isArray(valid)) return value;
      return Array.isArray(valid[0]) ? [[value, 0], ...valid.slice(1)] : [value, ...valid.slice(1)];
    };
    const where = ((valid) => {
      if (!Array.isArray(valid)) return '';
      return Array.isArray(valid[0]) ? ` at [0, 0] (shape [2, 2])` : ` at [0] (shape [${valid.length}])`;
    })(options[name]!);

    it.each([
      ['the string', 'one', "the string 'one'"],
      ['null', null, 'null'],
      ['a function', () => 1, 'a function'],
      ['an object', { a: 1 }, 'an object with keys a'],
      ['a truth value', true, 'true'],
    ])('refuses %s', (_title, value, got) => {
      expectError(
        given(value),
        ParameterError,
        `${family}: ${name} must be ${wrongType}; got ${got}; pass for example ${name}: ${example}`,
      );
    });

    it('refuses arrays with holes in them or something else than numbers', () => {
      expectError(
        given([[1, 2], [3]]),
        ShapeError,
        `${family}: ${name} must be a regular nested array of shape [2, 2]; got an array of 1 at depth 1; make every row equally long`,
      );
      expectError(
        given([1, 'x']),
        ParameterError,
        `${family}: ${name} must hold numbers; got the string 'x'; mend the array`,
      );
    });

    it('refuses tensors that are gone or hold no numbers', () => {
      expectError(
        given(disposed()),
        ParameterError,
        `${family}: ${name} must be alive; got a disposed tensor of shape [2]; keep it with tf.keep(…) or use it inside the same tf.tidy`,
      );
      const words = tf.tensor1d(['a']);
      expectError(
        given(words),
        ParameterError,
        `${family}: ${name} must hold real numbers; got dtype string; convert it to float32`,
      );
      words.dispose();
    });

    it('refuses numbers outside its domain, as a value or in a tensor', () => {
      const asked = domain.words === 'finite' ? 'finite' : `${domain.words} and finite`;
      expectError(
        given(like(Number.NaN)),
        ParameterError,
        `${family}: ${name} must be ${asked}; got NaN${where}; ${lookForIt}`,
      );
      const log = domain.fix === runaway;
      expectError(
        given(like(Number.POSITIVE_INFINITY)),
        ParameterError,
        `${family}: ${name} must be ${log ? domain.words : asked}; got Infinity${where}; ${log ? runaway : lookForIt}`,
      );
      if (domain.outside === undefined) return;
      const text = `${family}: ${name} must be ${domain.words}; got ${domain.outside}${where}; ${domain.fix}`;
      expectError(given(like(domain.outside)), ParameterError, text);
      tf.tidy(() => {
        const value = tf.tensor(like(domain.outside!) as tf.TensorLike);
        expectError(given(value), ParameterError, text);
      });
    });

    it('must be there', () => {
      const { [name]: _, ...rest } = options;
      const ways = waysOf(name);
      const what =
        ways.length === 1 ? `${name} must be given` : `exactly one of ${ways.join(', ')} must be given`;
      const text = `${family}: ${what}; got none; pass ${family}({ ${exampleOf(options)} })`;
      expectError(() => make(rest), ParameterError, text);
      expectError(() => make({ ...options, [name]: undefined }), ParameterError, text);
    });
  });

  /** The names under which the same parameter may be given: those that take each other's place. */
  function waysOf(name: string): string[] {
    const partners = parametrizations.find((p) => name in p)!;
    const others = Object.keys(partners).filter((n) => n !== name);
    const ways = parametrizations
      .filter((p) => others.every((n) => n in p))
      .flatMap((p) => Object.keys(p).filter((n) => !others.includes(n)));
    return parametrizations.every((p) => name in p) ? [name] : ways;
  }

  /** Parameters that are given in place of all of the first ones. */
  function isJoint(options: Sample['parametrizations'][number]): boolean {
    const names = Object.keys(options);
    return (
      names.length > 1 && !names.some((n) => n in parametrizations[0]!) && waysOf(names[0]!).length === 1
    );
  }

  function exampleOf(options = parametrizations[0]!): string {
    return Object.keys(isJoint(options) ? options : parametrizations[0]!).join(', ');
  }

  /** Every name: a complete choice first, then the other ways to give each parameter. */
  function knownNames(): string[] {
    const first = parametrizations[0]!;
    const own = parametrizations.filter((p) => !isJoint(p));
    const ways = Object.keys(first).map((_, k) => [...new Set(own.map((p) => Object.keys(p)[k]!))]);
    const joints = parametrizations.filter(isJoint).map(Object.keys);
    return [...new Set([Object.keys(first), ...ways, ...joints].flat())];
  }

  it('refuses keys that it does not know', () => {
    const known = knownNames();
    expectError(
      () => make({ ...parametrizations[0]!, sigma: 1 }),
      ParameterError,
      `${family}: options must be among ${known.join(', ')}; got 'sigma'; remove or rename it`,
    );
  });

  it.each([
    ['nothing', undefined, 'undefined'],
    ['null', null, 'null'],
    ['a number', 1, '1'],
    ['an array', [1], 'an array of 1'],
  ])('refuses %s in place of options', (_title, value, got) => {
    const known = knownNames();
    expectError(
      () => make(value as never),
      ParameterError,
      `${family}: options must be an object; got ${got}; pass { ${known.slice(0, 2).join(', ')} }`,
    );
  });

  if (parametrizations.length > 1) {
    it('refuses one parameter in two forms', () => {
      const [one, two] = parametrizations as [
        Sample['parametrizations'][number],
        Sample['parametrizations'][number],
      ];
      const first = Object.keys(one).find((n) => !(n in two))!;
      const second = Object.keys(two).find((n) => !(n in one))!;
      expectError(
        () => make({ ...one, ...two }),
        ParameterError,
        `${family}: exactly one of ${waysOf(first).join(', ')} must be given; got ${first} and ${second}; pass ${family}({ ${exampleOf()} })`,
      );
    });
  }

  describe('points', () => {
    const d = make(parametrizations[0]!);
    const methods = ['logDensity', 'cdf', 'quantile'].filter((method) => has(d, method));

    it.each(methods)('%s refuses what is no tensor of numbers', (method) => {
      const letter = method === 'quantile' ? 'p' : 'x';
      for (const [value, got] of [
        [1, '1'],
        ['a', "the string 'a'"],
        [undefined, 'undefined'],
        [[1], 'an array of 1'],
      ] as const) {
        expectError(
          () => call(d, method, value),
          ParameterError,
          `${family}.${method}: ${letter} must be a tensor; got ${got}; wrap it in tf.tensor(…)`,
        );
      }
      expectError(
        () => call(d, method, disposed()),
        ParameterError,
        `${family}.${method}: ${letter} must be alive; got a disposed tensor of shape [2]; keep it with tf.keep(…) or use it inside the same tf.tidy`,
      );
    });

    it('of NaN have no density, and nothing throws', () => {
      tf.tidy(() => {
        const x = tf.fill([2, ...d.pointShape], Number.NaN);
        expect(Array.from(d.logDensity(x).dataSync())).toEqual([Number.NaN, Number.NaN]);
        if (has(d, 'cdf')) expect(Array.from(call(d, 'cdf', x).dataSync())).toEqual([Number.NaN, Number.NaN]);
      });
    });
  });

  describe('draws', () => {
    const d = make(parametrizations[0]!);

    it.each([-1, 1.5, Number.NaN, Number.POSITIVE_INFINITY])('refuse a count of %d', (count) => {
      expectError(
        () => d.draw(stream(1), count),
        ParameterError,
        `${family}.draw: count must be a whole number of at least 0; got ${count}; pass for example 1`,
      );
    });

    it('refuse a count of another type, and one beyond reason', () => {
      expectError(
        () => d.draw(stream(1), '3' as never),
        ParameterError,
        `${family}.draw: count must be a whole number of at least 0; got the string '3'; pass for example 1`,
      );
      const per = family === 'categorical' ? 3 : family === 'multivariateNormal' ? 4 : 1;
      expectError(
        () => d.draw(stream(1), 2 ** 40),
        ParameterError,
        `${family}.draw: count must be at most ${Math.floor(2 ** 30 / per)} for arrayShape []; got ${2 ** 40}; draw in several calls`,
      );
    });

    it.each([
      [undefined, 'a value of type undefined'],
      [7, 'a value of type number'],
      [{}, 'a value of type object'],
      [null, 'null'],
    ])('refuse %s for a stream', (value, got) => {
      expectError(
        () => d.draw(value as never),
        StreamError,
        `${family}.draw: stream must be a Stream; got ${got}; pass stream(seed) or a fork of one`,
      );
    });
  });
});

describe('shapes', () => {
  it('of parameters must broadcast, and the error names them as they were given', () => {
    expectError(
      () => normal({ mean: [1, 2, 3], logVariance: [1, 2] }),
      ShapeError,
      'normal: mean and logVariance must broadcast from the right; got [3] and [2]; make the sizes of each axis equal, or 1',
    );
    expectError(
      () => uniform({ lower: [0, 1], upper: [1, 1, 3] }),
      ShapeError,
      'uniform: lower and upper must broadcast from the right; got [2] and [3]; make the sizes of each axis equal, or 1',
    );
    expectError(
      () =>
        multivariateNormal({
          mean: tf.zeros([3, 2]),
          covarianceFactor: [
            [
              [1, 0],
              [0, 1],
            ],
            [
              [1, 0],
              [0, 1],
            ],
          ],
        }),
      ShapeError,
      'multivariateNormal: the leading axes of mean and covarianceFactor must broadcast from the right; got [3] and [2]; make the sizes of each axis equal, or 1',
    );
  });

  it('of points must broadcast with the array', () => {
    tf.tidy(() => {
      const x = tf.zeros([3]);
      for (const method of ['logDensity', 'cdf', 'quantile']) {
        const letter = method === 'quantile' ? 'p' : 'x';
        expectError(
          () => call(normal({ mean: [0, 1], sd: 1 }), method, x),
          ShapeError,
          `normal.${method}: ${letter} and the arrayShape must broadcast from the right; got [3] and [2]; make the sizes of each axis equal, or 1`,
        );
      }
      expectError(
        () => categorical({ logits: tf.zeros([2, 4]) }).logDensity(x),
        ShapeError,
        'categorical.logDensity: x and the arrayShape must broadcast from the right; got [3] and [2]; make the sizes of each axis equal, or 1',
      );
      const joint = multivariateNormal({ mean: tf.zeros([4, 2]), covarianceFactor: tf.eye(2) });
      expectError(
        () => joint.logDensity(x),
        ShapeError,
        'multivariateNormal.logDensity: x must end in the point shape [2]; got shape [3]; reshape x, or fold another number of axes with product(d, axes)',
      );
      expectError(
        () => joint.logDensity(tf.zeros([5, 2])),
        ShapeError,
        'multivariateNormal.logDensity: the leading axes of x, mean and covarianceFactor must broadcast from the right; got [5] and [4] and []; make the sizes of each axis equal, or 1',
      );
    });
  });

  it('of a factor and a mean must fit, and labels must have an axis', () => {
    expectError(
      () => multivariateNormal({ mean: [0, 0], covarianceFactor: [[1]] }),
      ShapeError,
      'multivariateNormal: mean must be [..., d] and covarianceFactor [..., d, d]; got [2] and [1, 1]; give both the same d of at least 1',
    );
    expectError(
      () => multivariateNormal({ mean: 0, covarianceFactor: 1 }),
      ShapeError,
      'multivariateNormal: mean must be [..., d] and covarianceFactor [..., d, d]; got [] and []; give both the same d of at least 1',
    );
    for (const [logits, shape] of [
      [1, '[]'],
      [[], '[0]'],
    ] as const) {
      expectError(
        () => categorical({ logits: logits as number | number[] }),
        ShapeError,
        `categorical: the parameter must have a last axis of categories; got shape ${shape}; pass for example logits: [0, 0, 0]`,
      );
    }
  });
});

describe('values together', () => {
  it('a lower bound must lie below the upper one', () => {
    expectError(
      () => uniform({ lower: 1, upper: 1 }),
      ParameterError,
      'uniform: upper must be above lower; got lower 1 and upper 1; swap them or widen the interval',
    );
    expectError(
      () => uniform({ lower: tf.tensor2d([[0], [3]]), upper: [1, 2] }),
      ParameterError,
      'uniform: upper must be above lower; got lower 3 and upper 1 at [1, 0]; swap them or widen the interval',
    );
  });

  it('probabilities must sum to one', () => {
    expectError(
      () =>
        categorical({
          probabilities: [
            [0.5, 0.5],
            [0.5, 0.25],
          ],
        }),
      ParameterError,
      'categorical: probabilities must sum to 1 along the last axis; got 0.75 at [1]; divide by the sum, or pass logits',
    );
    expect(() => categorical({ probabilities: new Array(1000).fill(0.001) })).not.toThrow();
  });

  it('the diagonal of a factor must be positive', () => {
    expectError(
      () =>
        multivariateNormal({
          mean: [0, 0],
          covarianceFactor: [
            [1, 0],
            [1, -1],
          ],
        }),
      ParameterError,
      'multivariateNormal: covarianceFactor must have a positive diagonal; got -1 at row 1; take the exponential or softplus of the diagonal',
    );
    expectError(
      () => multivariateNormal({ mean: [0], covarianceFactor: [[[1]], [[0]]] }),
      ParameterError,
      'multivariateNormal: covarianceFactor must have a positive diagonal; got 0 at row 0 of matrix [1]; take the exponential or softplus of the diagonal',
    );
  });

  it('a position in a larger array is named', () => {
    const sd = tf.ones([100, 8]).bufferSync();
    sd.set(-0.25, 4, 2);
    expectError(
      () => normal({ mean: 0, sd: sd.toTensor() }),
      ParameterError,
      'normal: sd must be positive; got -0.25 at [4, 2] (shape [100, 8]); pass logVariance if your network can produce negative values',
    );
  });

  it('a rate beyond any count is not drawn from', () => {
    expectError(
      () => poisson({ rate: [1, 1e20] }).draw(stream(1)),
      ParameterError,
      'poisson.draw: rate must be at most 1000000000000000 to be drawn; got 100000002004087730000 at element 1; look for what made it so large',
    );
  });
});

describe('later', () => {
  it('a tensor that was disposed since is named', () => {
    const sd = tf.scalar(2);
    const d = normal({ mean: 0, sd });
    sd.dispose();
    tf.tidy(() => {
      const gone =
        "a distribution's parameters must be alive when it is used; got a disposed tensor of shape []; keep it with tf.keep(…), or make and use the distribution inside the same tf.tidy";
      expectError(() => d.logDensity(tf.scalar(0)), ParameterError, gone);
      expectError(() => d.draw(stream(1)), ParameterError, gone);
      expectError(() => d.variance(), ParameterError, gone);
    });
  });

  it('parameters have names', () => {
    const unknown = 'sigma' as never;
    expectError(
      () => normal({ mean: 0, sd: 1 }).parameter(unknown),
      ParameterError,
      "normal.parameter: name must be one of mean, sd; got the string 'sigma'; ask for the form that the formulas read",
    );
    expectError(
      () => multivariateNormal({ mean: [0], covarianceFactor: [[1]] }).parameter(unknown),
      ParameterError,
      "multivariateNormal.parameter: name must be one of mean, covarianceFactor; got the string 'sigma'; ask for the form that the formulas read",
    );
  });

  it('a number is checked as the float32 that it becomes', () => {
    expectError(
      () => exponential({ rate: 1e-60 }),
      ParameterError,
      'exponential: rate must be positive; got 0; pass logRate if your network can produce negative values',
    );
    expect(LeadlineError.prototype).toBeInstanceOf(Error);
  });
});
