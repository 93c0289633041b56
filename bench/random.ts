import { type FillName, fill } from '../src/random/fill.js';
import {
  betaDraws,
  categoricalDraws,
  gammaDraws,
  logGammaDraws,
  noise,
  poissonDraws,
} from '../src/random/noise.js';
import { permutationArray, stream, wordsOf } from '../src/random/stream.js';
import { compareApart, processorTime } from './measure.js';
import { python } from './python.js';
import type { Row } from './row.js';

const n = 1_000_000;
const rounds = 10;
const s = stream('bench');
const out = new Float32Array(n);
const filled = (value: number) => new Float32Array(n).fill(value);
const logits = Float32Array.from({ length: n }, (_, i) => Math.sin(i));
const into = (name: FillName, ...parameters: Float32Array[]) => {
  return () => fill(wordsOf('bench', s), name, out, { parameters });
};

/** Name, what to time, NumPy's counterpart, its name, and the ratio to reach. */
type Law = readonly [what: string, work: () => unknown, numpy: string, peer: string, target?: number];

/**
 * The samplers alone: into an array that exists. A new array of this size costs about 2 ns an element, since its
 * pages are handed out by the system one by one; NumPy, which frees an array at once, gets the same pages again.
 */
function alone(): Law[] {
  const [single, double] = ['NumPy, float32', 'NumPy, float64'];
  return [
    ['normal', into('fillNormal'), 'g.standard_normal(out=o64)', double, 1 / 3],
    ['normal', into('fillNormal'), 'g.standard_normal(out=o32, dtype=f)', single, 1 / 3],
    ['exponential', into('fillExponential'), 'g.standard_exponential(out=o64)', double, 1 / 2],
    ['exponential', into('fillExponential'), 'g.standard_exponential(out=o32, dtype=f)', single, 1 / 2],
    ...[0.1, 0.3, 3].flatMap((shape): Law[] => {
      const work = into('fillGamma', filled(shape));
      return [
        [`gamma ${shape}`, work, `g.standard_gamma(${shape}, out=o64)`, double, 1],
        [`gamma ${shape}`, work, `g.standard_gamma(${shape}, out=o32, dtype=f)`, single, 1],
      ];
    }),
    ...[
      [2, 3],
      [0.5, 0.5],
    ].map(([a, b]): Law => {
      return [
        `beta ${a}, ${b}`,
        into('fillBeta', filled(a!), filled(b!)),
        `g.beta(${a}, ${b}, n)`,
        double,
        1,
      ];
    }),
  ];
}

/** As called: each time a new array, filled from parameters for each element; NumPy's float32 where it has that. */
function called(): Law[] {
  const law = (what: string, work: () => unknown, numpy: string): Law => [what, work, numpy, 'NumPy'];
  return [
    law('uniform', () => noise(s, 'uniform', n), 'g.random(n, dtype=f)'),
    law('normal', () => noise(s, 'normal', n), 'g.standard_normal(n, dtype=f)'),
    law('exponential', () => noise(s, 'exponential', n), 'g.standard_exponential(n, dtype=f)'),
    law('laplace', () => noise(s, 'laplace', n), 'g.laplace(size=n)'),
    law('logistic', () => noise(s, 'logistic', n), 'g.logistic(size=n)'),
    law('gumbel', () => noise(s, 'gumbel', n), 'g.gumbel(size=n)'),
    law('cauchy', () => noise(s, 'cauchy', n), 'g.standard_cauchy(n)'),
    law('permutation', () => permutationArray(s, n), 'g.permutation(n)'),
    ...[0.1, 3, 30, 1e6].map((rate) => {
      const rates = filled(rate);
      return law(`poisson ${rate}`, () => poissonDraws(s, rates), `g.poisson(np.full(n, ${rate}))`);
    }),
    ...[0.1, 3].flatMap((shape) => {
      const shapes = filled(shape);
      const numpy = `g.standard_gamma(np.full(n, ${shape}, f), dtype=f)`;
      return [
        law(`gamma ${shape}`, () => gammaDraws(s, shapes), numpy),
        law(`log gamma ${shape}`, () => logGammaDraws(s, shapes), `np.log(${numpy})`),
      ];
    }),
    ...[
      [2, 3],
      [0.5, 0.5],
    ].map(([a, b]) => {
      const [as, bs] = [filled(a!), filled(b!)];
      return law(`beta ${a}, ${b}`, () => betaDraws(s, as, bs), `g.beta(np.full(n, ${a}), np.full(n, ${b}))`);
    }),
    // Per logit: NumPy has no categorical draw by rows; this is its usual spelling.
    law(
      'categorical, 10 a row',
      () => categoricalDraws(s, logits, 10),
      '(lambda w: (w < g.random((n // 10, 1)) * w[:, -1:]).sum(1))(np.cumsum(np.exp(l - l.max(1, keepdims=True)), 1))',
    ),
  ];
}

/** Nanoseconds a draw in bulk, beside NumPy's generator; no rows where NumPy is missing. */
export function* randomDraws(): Generator<Row> {
  for (const [section, laws] of [
    ['Random draws in bulk, 1e6 at a time, into an array that exists', alone()],
    ['Random draws in bulk, 1e6 at a time, a new array each time', called()],
  ] as const) {
    for (const [what, work, code, peer, target] of laws) {
      // Twice in turn, so that whatever else the machine does meets both.
      const [own, others]: [number[], number[]] = [[], []];
      for (let turn = 0; turn < 2; turn++) {
        const times = numpy(code);
        if (!times) return;
        others.push(...times);
        own.push(...measured(work));
      }
      yield {
        section,
        what,
        peer,
        backend: '',
        unit: 'ns a draw',
        comparison: compareApart(own, others),
        ...(target === undefined ? {} : { target }),
      };
    }
  }
}

function measured(work: () => unknown): number[] {
  const samples: number[] = [];
  for (let i = -5; i < rounds; i++) {
    const start = processorTime();
    work();
    if (i >= 0) samples.push(((processorTime() - start) * 1e6) / n);
  }
  return samples;
}

function numpy(code: string): number[] | undefined {
  return python(`
import json, time
import numpy as np
n, f = ${n}, np.float32
g = np.random.default_rng(1)
l = np.sin(np.arange(n, dtype=f)).reshape(-1, 10)
o32, o64 = np.zeros(n, f), np.zeros(n)
samples = []
np.seterr(divide='ignore')
for i in range(${rounds + 2}):
    start = time.process_time()
    ${code}
    samples.append((time.process_time() - start) / n * 1e9)
print(json.dumps(samples[2:]))
`);
}
