import * as tf from '@tensorflow/tfjs';
import { elbo, type Stream, train } from 'leadline';
import type { Dataset } from './dataset.js';
import type { SpectrumModel } from './model.js';

/** The bound at one moment of training, in nats per row. */
export interface CurvePoint {
  readonly step: number;
  /** The mean over the batches since the point before, of rows trained on. */
  readonly training: number;
  readonly heldOut: number;
}

/** What is told to whoever watches. */
export interface Watched {
  readonly step: number;
  readonly steps: number;
  /** Seconds. */
  readonly timeLeft: number;
  /** Present after the steps at which held-out rows were looked at. */
  readonly point?: CurvePoint;
}

const fastest = 3e-3;
const points = 50;

/** Trains model and recognizer together, by Adam with a rate that falls to zero along half a cosine wave. */
export async function fitModel(
  model: SpectrumModel,
  { training, heldOut }: Dataset,
  steps: number,
  stream: Stream,
  watch: (moment: Watched) => void,
): Promise<CurvePoint[]> {
  const optimizer = tf.train.adam(fastest);
  const every = Math.max(1, Math.floor(steps / points));
  const curve: CurvePoint[] = [];
  let sum = 0;
  let since = 0;
  const run = train({
    bound: elbo(model.generative, model.recognizer),
    data: { x: training.x },
    optimizer,
    stream,
    steps,
    clip: 1000,
    heldOut: { data: { x: heldOut.x }, every },
  });
  for await (const { step, bound, timeLeft, heldOut: evaluated } of run) {
    Object.assign(optimizer, { learningRate: fastest * 0.5 * (1 + Math.cos((Math.PI * step) / steps)) });
    sum += bound;
    since++;
    if (!evaluated) {
      watch({ step, steps, timeLeft });
      continue;
    }
    const point = { step, training: sum / since, heldOut: evaluated.bound };
    curve.push(point);
    sum = 0;
    since = 0;
    watch({ step, steps, timeLeft, point });
  }
  optimizer.dispose();
  return curve;
}
