import * as tf from '@tensorflow/tfjs';
import { normal, stream } from '../src/index.js';
import { compare, compareApart, interleave } from './measure.js';
import { python } from './python.js';
import type { Row } from './row.js';

const points = 1_000_000;

/** Log density and gradient of a million points, every argument full-size. */
export function density(): Row[] {
  const source = stream('bench density');
  const arguments_ = tf.tidy(() => [
    source.normal([points]),
    source.normal([points]),
    tf.add(source.uniform([points]), 0.5),
  ]);
  const own = (...[x, mean, sd]: tf.Tensor[]) => normal({ mean: mean!, sd: sd! }).logDensity(x!);
  const composed = (...[x, mean, sd]: tf.Tensor[]) =>
    tf.sub(
      tf.mul(-0.5, tf.square(tf.div(tf.sub(x!, mean!), sd!))),
      tf.add(tf.log(sd!), 0.5 * Math.log(2 * Math.PI)),
    );
  type Density = typeof own;
  const value = (f: Density) => () => tf.tidy(() => void f(...arguments_));
  const gradient = (f: Density) => {
    const both = tf.valueAndGrads(f);
    return () => tf.tidy(() => void both(arguments_));
  };
  const rounds = tf.getBackend() === 'wasm' ? 40 : 20;
  const [ownValue, ownGradient, peerValue, peerGradient] = interleave(
    [value(own), gradient(own), value(composed), gradient(composed)],
    { rounds },
  );
  tf.dispose(arguments_);

  const row = (what: string, peer: string, comparison: Row['comparison']): Row => ({
    section: 'Normal log density of 1e6 points, three full-size arguments',
    what,
    peer,
    backend: tf.getBackend(),
    comparison,
  });
  const rows = [
    row('value', 'composed of tfjs operations', compare(ownValue!, peerValue!)),
    row('value and gradient', 'composed of tfjs operations', compare(ownGradient!, peerGradient!)),
  ];
  const scipy = scipyLogDensity(rounds);
  if (scipy) {
    rows.push(row('value', 'SciPy, value alone', compareApart(ownValue!, scipy)));
    rows.push(row('value and gradient', 'SciPy, value alone', compareApart(ownGradient!, scipy)));
  }
  return rows;
}

function scipyLogDensity(rounds: number): number[] | undefined {
  return python(`
import json, time
import numpy as np
from scipy.stats import norm
g = np.random.default_rng(1)
x, m = (g.standard_normal(${points}, dtype=np.float32) for _ in range(2))
s = g.random(${points}, dtype=np.float32) + np.float32(0.5)
times = []
for i in range(${rounds} + 3):
    start = time.process_time()
    norm.logpdf(x, m, s)
    times.append(1e3 * (time.process_time() - start))
print(json.dumps(times[3:]))
`);
}
