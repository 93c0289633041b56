// Nanoseconds a draw, beside NumPy's Generator (PCG64) on one thread in the same run. `npx tsx bench/random.ts`
import { spawnSync } from 'node:child_process';
import { categoricalDraws, gammaDraws, logGammaDraws, noise, poissonDraws } from '../src/random/noise.js';
import { permutationArray, stream } from '../src/random/stream.js';

const n = 1_000_000;
const rounds = 15;
const s = stream('bench');
const filled = (value: number) => new Float32Array(n).fill(value);
const rates = [0.1, 3, 30, 1e6].map((rate) => [rate, filled(rate)] as const);
const shapes = [0.1, 3].map((shape) => [shape, filled(shape)] as const);
const logits = Float32Array.from({ length: n }, (_, i) => Math.sin(i));

/** Name, what to time, and NumPy's counterpart: float32 where it has that, else its double. */
const laws: [string, () => unknown, string][] = [
  ['uniform', () => noise(s, 'uniform', n), 'g.random(n, dtype=f)'],
  ['normal', () => noise(s, 'normal', n), 'g.standard_normal(n, dtype=f)'],
  ['exponential', () => noise(s, 'exponential', n), 'g.standard_exponential(n, dtype=f)'],
  ['laplace', () => noise(s, 'laplace', n), 'g.laplace(size=n)'],
  ['logistic', () => noise(s, 'logistic', n), 'g.logistic(size=n)'],
  ['gumbel', () => noise(s, 'gumbel', n), 'g.gumbel(size=n)'],
  ['permutation', () => permutationArray(s, n), 'g.permutation(n)'],
  ...rates.map(([rate, all]): [string, () => unknown, string] => [
    `poisson ${rate}`,
    () => poissonDraws(s, all),
    `g.poisson(np.full(n, ${rate}))`,
  ]),
  ...shapes.map(([shape, all]): [string, () => unknown, string] => [
    `gamma ${shape}`,
    () => gammaDraws(s, all),
    `g.standard_gamma(np.full(n, ${shape}, f), dtype=f)`,
  ]),
  ...shapes.map(([shape, all]): [string, () => unknown, string] => [
    `log gamma ${shape}`,
    () => logGammaDraws(s, all),
    `np.log(g.standard_gamma(np.full(n, ${shape}, f), dtype=f))`,
  ]),
  // Per logit: NumPy has no categorical draw by rows; this is its usual spelling.
  [
    'categorical, 10 a row',
    () => categoricalDraws(s, logits, 10),
    '(lambda w: (w < g.random((n // 10, 1)) * w[:, -1:]).sum(1))(np.cumsum(np.exp(l - l.max(1, keepdims=True)), 1))',
  ],
];

function best(work: () => unknown): number {
  work();
  let least = Number.POSITIVE_INFINITY;
  for (let i = 0; i < rounds; i++) {
    const start = performance.now();
    work();
    least = Math.min(least, performance.now() - start);
  }
  return (least * 1e6) / n;
}

function numpy(): number[] | undefined {
  const script = `
import json, time
import numpy as np
n, f = ${n}, np.float32
g = np.random.default_rng(1)
l = np.sin(np.arange(n, dtype=f)).reshape(-1, 10)
def best(work):
    work()
    least = 1e9
    for _ in range(${rounds}):
        start = time.perf_counter()
        work()
        least = min(least, time.perf_counter() - start)
    return least / n * 1e9
np.seterr(divide='ignore')
print(json.dumps([best(work) for work in [${laws.map(([, , code]) => `lambda: ${code}`).join(', ')}]]))
`;
  const one = { OMP_NUM_THREADS: '1', OPENBLAS_NUM_THREADS: '1', MKL_NUM_THREADS: '1' };
  const run = spawnSync('/usr/bin/python3', ['-c', script], {
    encoding: 'utf8',
    env: { ...process.env, ...one },
  });
  return run.status === 0 ? JSON.parse(run.stdout) : undefined;
}

const peer = numpy();
if (peer === undefined) console.log('NumPy: not found or it failed; its columns are left out');
console.log(
  `${'law'.padEnd(24)}${'ns/draw'.padStart(9)}${peer ? `${'NumPy'.padStart(9)}${'ratio'.padStart(8)}` : ''}`,
);
for (const [i, [name, work]] of laws.entries()) {
  const own = best(work);
  const theirs = peer?.[i];
  const beside = theirs ? theirs.toFixed(2).padStart(9) + (own / theirs).toFixed(2).padStart(8) : '';
  console.log(name.padEnd(24) + own.toFixed(2).padStart(9) + beside);
}

const forks = 20_000;
const start = performance.now();
for (let i = 0; i < forks; i++) s.fork(i);
console.log(`fork: ${(((performance.now() - start) * 1000) / forks).toFixed(1)} microseconds`);
