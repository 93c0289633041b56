import { categoricalDraws, gammaDraws, logGammaDraws, noise, poissonDraws } from '../src/random/noise.js';
import { permutationArray, stream } from '../src/random/stream.js';
import { compareApart, processorTime } from './measure.js';
import { python } from './python.js';
import type { Row } from './row.js';

const n = 1_000_000;
const rounds = 20;
const s = stream('bench');
const filled = (value: number) => new Float32Array(n).fill(value);
const logits = Float32Array.from({ length: n }, (_, i) => Math.sin(i));

/** Name, what to time, and NumPy's counterpart: float32 where it has that, else its double. */
type Law = readonly [name: string, work: () => unknown, numpy: string];

function laws(): Law[] {
  const rates = [0.1, 3, 30, 1e6].map((rate) => [rate, filled(rate)] as const);
  const shapes = [0.1, 3].map((shape) => [shape, filled(shape)] as const);
  return [
    ['uniform', () => noise(s, 'uniform', n), 'g.random(n, dtype=f)'],
    ['normal', () => noise(s, 'normal', n), 'g.standard_normal(n, dtype=f)'],
    ['exponential', () => noise(s, 'exponential', n), 'g.standard_exponential(n, dtype=f)'],
    ['laplace', () => noise(s, 'laplace', n), 'g.laplace(size=n)'],
    ['logistic', () => noise(s, 'logistic', n), 'g.logistic(size=n)'],
    ['gumbel', () => noise(s, 'gumbel', n), 'g.gumbel(size=n)'],
    ['permutation', () => permutationArray(s, n), 'g.permutation(n)'],
    ...rates.map(
      ([rate, all]): Law => [`poisson ${rate}`, () => poissonDraws(s, all), `g.poisson(np.full(n, ${rate}))`],
    ),
    ...shapes.map(
      ([shape, all]): Law => [
        `gamma ${shape}`,
        () => gammaDraws(s, all),
        `g.standard_gamma(np.full(n, ${shape}, f), dtype=f)`,
      ],
    ),
    ...shapes.map(
      ([shape, all]): Law => [
        `log gamma ${shape}`,
        () => logGammaDraws(s, all),
        `np.log(g.standard_gamma(np.full(n, ${shape}, f), dtype=f))`,
      ],
    ),
    // Per logit: NumPy has no categorical draw by rows; this is its usual spelling.
    [
      'categorical, 10 a row',
      () => categoricalDraws(s, logits, 10),
      '(lambda w: (w < g.random((n // 10, 1)) * w[:, -1:]).sum(1))(np.cumsum(np.exp(l - l.max(1, keepdims=True)), 1))',
    ],
  ];
}

/** Nanoseconds a draw in bulk, beside NumPy's generator; no rows where NumPy is missing. */
export function randomDraws(): Row[] {
  const all = laws();
  const peer = numpy(all);
  if (!peer) return [];
  return all.map(([what, work], k): Row => {
    const own = times(work);
    return {
      section: 'Random draws in bulk, 1e6 at a time',
      what,
      peer: 'NumPy',
      backend: '',
      unit: 'ns a draw',
      comparison: compareApart(own, peer[k]!),
    };
  });
}

function times(work: () => unknown): number[] {
  const samples: number[] = [];
  for (let i = -2; i < rounds; i++) {
    const start = processorTime();
    work();
    if (i >= 0) samples.push(((processorTime() - start) * 1e6) / n);
  }
  return samples;
}

function numpy(all: readonly Law[]): number[][] | undefined {
  return python(`
import json, time
import numpy as np
n, f = ${n}, np.float32
g = np.random.default_rng(1)
l = np.sin(np.arange(n, dtype=f)).reshape(-1, 10)
def times(work):
    samples = []
    for i in range(${rounds + 2}):
        start = time.process_time()
        work()
        samples.append((time.process_time() - start) / n * 1e9)
    return samples[2:]
np.seterr(divide='ignore')
print(json.dumps([times(work) for work in [${all.map(([, , code]) => `lambda: ${code}`).join(', ')}]]))
`);
}
