import { TrainingError } from '../errors.js';
import type { BatchData, Tensors } from './batchData.js';
import { freshStopping, judge } from './earlyStopping.js';
import { type EvaluatedBound, evaluateBound } from './evaluateBound.js';
import { GradientStep } from './GradientStep.js';
import { type Batch, minibatches } from './minibatches.js';
import { Pace } from './pace.js';
import {
  type Progress,
  requireTrainOptions,
  type TrainingCursor,
  type TrainOptions,
} from './trainOptions.js';
import { findVariables, type NamedVariable } from './variables.js';

/** How long, in milliseconds, training may keep timers, input and drawing of a page waiting. */
const longestHold = 100;

/**
 * Trains by stochastic gradients: minibatches, one gradient of the bound's surrogate per step, and an update
 * by any tfjs optimizer. An async generator, so that the loop's body is yours: print, draw, checkpoint, change
 * the learning rate, `break`.
 *
 * Each step ascends (surrogate / data points of the batch). `clip` scales a gradient g over all variables
 * together to g · min(1, clip / ‖g‖) (Pascanu, Mikolov and Bengio 2013, algorithm 1). Bounds and parts are
 * means over data points, in nats.
 *
 * tfjs hides an optimizer's rate from the types; `Object.assign(optimizer, { learningRate })` sets it inside the
 * loop. Data are tensors or arrays of shape `[rows, …]` by the names the bound reads. Step s draws from a fork of
 * the stream labelled s, pass e is shuffled by one labelled e, so a run is a function of its arguments, and
 * one continued `from` a cursor equals the uninterrupted one bit for bit.
 *
 * A step with a value that is not finite in a part, a gradient, or the updated variables throws a
 * `TrainingError` that names the node, the row and the variable, and leaves variables and optimizer as they
 * were. Other wrong arguments throw a `LeadlineError` at the first step.
 *
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { directed, elbo, normal, product, stream, train } from 'leadline';
 * const shift = tf.variable(tf.zeros([1]));
 * const model = directed()
 *   .latent('z', () => product(normal({ mean: [0], sd: 1 })))
 *   .observed('x', ({ z }) => product(normal({ mean: tf.add(z, shift), sd: 1 })));
 * const recognizer = directed()
 *   .given('x')
 *   .latent('z', ({ x }) => product(normal({ mean: tf.div(tf.sub(x, shift), 2), variance: 0.5 })));
 * const bound = elbo(model, recognizer);
 * const data = { x: [[1], [2], [3], [4]] };
 * const optimizer = tf.train.sgd(0.05);
 * for await (const { step, ended } of train({ bound, data, optimizer, stream: stream(1), steps: 300 })) {
 *   if (ended) console.log(step, ended);
 *   // 300 steps
 * }
 * console.log(Math.abs(shift.dataSync()[0]! - 2.5) < 0.3);
 * // true
 * ```
 */
export async function* train<Data>(options: TrainOptions<Data>): AsyncGenerator<Progress, void, undefined> {
  requireTrainOptions(options);
  const { bound, optimizer, stream, batchSize = 100, heldOut, signal, from } = options;
  const step = new GradientStep(bound, optimizer, trainedVariables(options), options.clip);
  const walk = minibatches(options.data as BatchData, {
    batchSize,
    stream: stream.fork('minibatches'),
    ...(options.epochs === undefined ? {} : { epochs: options.epochs }),
    ...(from === undefined ? {} : { cursor: from.batches }),
  });
  const draws = stream.fork('steps');
  const evaluationStream = stream.fork('heldOut');
  const pace = new Pace();
  const patience = heldOut?.patience ?? Number.POSITIVE_INFINITY;
  let done = from?.step ?? 0;
  let stopping = from?.heldOut ?? freshStopping;
  let ended = stopping.waited >= patience ? 'patience' : undefined;
  let breathed = pace.now();
  try {
    if (done >= (options.steps ?? Number.POSITIVE_INFINITY)) ended ??= 'steps';
    while (!ended && !signal?.aborted) {
      const next = walk.next();
      if (next.done) {
        ended = 'steps';
        break;
      }
      const batch = next.value as Batch<Tensors<Data>>;
      const number = done + 1;
      const report = await step.take({
        step: number,
        data: batch.data as Data,
        rows: batch.rows,
        draws: () => draws.fork(number),
      });
      done = number;
      const batches = Math.ceil(batch.cursor.rows / batchSize);
      let evaluated: (EvaluatedBound & { improved: boolean }) | undefined;
      if (heldOut && done % (heldOut.every ?? batches) === 0) {
        const result = await evaluateBound(bound, heldOut.data, {
          stream: evaluationStream,
          batchSize: heldOut.batchSize ?? 500,
        });
        stopping = judge(stopping, done, result.bound, heldOut.margin ?? 0);
        evaluated = { ...result, improved: stopping.bestStep === done };
        if (evaluated.improved) heldOut.best?.take(done);
      }
      const last = Math.min(
        options.steps ?? Number.POSITIVE_INFINITY,
        (options.epochs ?? Number.POSITIVE_INFINITY) * batches,
      );
      if (stopping.waited >= patience) ended = 'patience';
      else if (done >= last) ended = 'steps';
      if (pace.now() - breathed > longestHold) {
        await new Promise((resolve) => setTimeout(resolve, 0));
        breathed = pace.now();
      }
      pace.tick();
      const cursor: TrainingCursor = {
        step: done,
        batches: batch.cursor,
        ...(heldOut ? { heldOut: stopping } : {}),
      };
      yield {
        step: done,
        epoch: batch.epoch,
        ...report,
        rate: pace.rate,
        timeLeft: ended ? 0 : (last - done) / pace.rate,
        ...(evaluated ? { heldOut: evaluated } : {}),
        ...(ended ? { ended: ended as 'steps' | 'patience' } : {}),
        cursor,
      };
    }
    if (ended && heldOut?.best && stopping.best !== null) heldOut.best.restore();
  } finally {
    walk.return();
  }
}

function trainedVariables<Data>({ variables }: TrainOptions<Data>): NamedVariable[] | undefined {
  if (variables === undefined) return undefined;
  const found = findVariables('train', variables).filter(({ trainable }) => trainable);
  if (found.length === 0) {
    throw new TrainingError(
      'train: variables must hold at least one trainable variable; got none; leave out frozen models',
    );
  }
  const wrong = found.find(({ variable }) => variable.dtype !== 'float32');
  if (wrong) {
    throw new TrainingError(
      `train: trainable variables must be float32; got ${wrong.variable.dtype} for ${wrong.path}; make it with trainable set to false`,
    );
  }
  return found.map(({ path, variable }) => ({ name: path, variable }));
}
