import type * as tf from '@tensorflow/tfjs';
import { ParameterError, TrainingError } from '../errors.js';
import { requireStream, type Stream } from '../random/stream.js';
import { describe, requireCount, requireKnownKeys, requireNumber } from '../tensor/checks.js';
import type { DataFor } from './batchData.js';
import type { StoppingState } from './earlyStopping.js';
import type { EvaluatedBound } from './evaluateBound.js';
import type { BatchCursor } from './minibatches.js';
import { requireOptimizer } from './optimizerState.js';
import { Snapshot } from './snapshot.js';
import type { Parts, Trainable } from './trainable.js';
import type { VariableSource } from './variables.js';

/** Where a training run stands: a plain JSON value, to be kept in a checkpoint and given back as `from`. */
export type TrainingCursor = {
  /** Steps taken. */
  readonly step: number;
  readonly batches: BatchCursor;
  /** Present if the run evaluates on held-out data. */
  readonly heldOut?: StoppingState;
};

/** Data kept aside, and what to do with the bound on it. */
export interface HeldOutOptions<Data> {
  readonly data: DataFor<NoInfer<Data>>;
  /** Steps from one evaluation to the next; one pass over the training data by default. */
  readonly every?: number;
  /** Data points evaluated at a time; 500 by default. */
  readonly batchSize?: number;
  /** Stop after so many evaluations in a row without improvement; never by default. */
  readonly patience?: number;
  /** What counts as an improvement: more than so many nats per data point; 0 by default. */
  readonly margin?: number;
  /**
   * Takes the weights at each improvement, and puts them back into the variables when the run ends by its
   * steps or its patience. Keep it in the checkpoint beside the variables, so that a resumed run has it.
   */
  readonly best?: Snapshot;
}

/** What `train` needs and may be told. */
export interface TrainOptions<Data> {
  readonly bound: Trainable<Data>;
  readonly data: DataFor<NoInfer<Data>>;
  readonly optimizer: tf.Optimizer;
  /** Shuffles, draws and evaluations each use forks of it; it is not advanced. */
  readonly stream: Stream;
  /** Data points in a batch; 100 by default. */
  readonly batchSize?: number;
  /** Stop after this step, counted from the run's very beginning. */
  readonly steps?: number;
  /** Stop after this pass over the data, counted from the run's very beginning. */
  readonly epochs?: number;
  /** What to train; by default every trainable variable that the first step reaches. */
  readonly variables?: VariableSource;
  /** Scale a longer gradient down to this Euclidean norm over all variables together. */
  readonly clip?: number;
  readonly heldOut?: HeldOutOptions<Data>;
  /** Ends the run after the step under way, without an error. */
  readonly signal?: AbortSignal;
  /** Continue after this cursor, variables and optimizer having been resumed with it. */
  readonly from?: TrainingCursor;
}

/** One step's outcome, in plain numbers. */
export interface Progress {
  /** Steps taken, this one included. */
  readonly step: number;
  /** The pass over the data that the step belongs to, counted from 1. */
  readonly epoch: number;
  /** The batch's mean bound before the step, in nats per data point. */
  readonly bound: number;
  /** The bound's parts, in nats per data point. */
  readonly parts: Parts<number>;
  /** The gradient's Euclidean norm over all variables, before clipping. */
  readonly gradientNorm: number;
  /** Steps per second, over the last 100. */
  readonly rate: number;
  /** Seconds to the last step at this rate; Infinity for a run without end. */
  readonly timeLeft: number;
  /** Present after the steps that held-out data were evaluated at. */
  readonly heldOut?: EvaluatedBound & { readonly improved: boolean };
  /** Why no further step will follow, if so. */
  readonly ended?: 'steps' | 'patience';
  /** Where the run stands, for a checkpoint. */
  readonly cursor: TrainingCursor;
}

const where = 'train';

/** Refuses options that are wrong by themselves; data, variables and batches are checked where they are used. */
export function requireTrainOptions<Data>(options: TrainOptions<Data>): void {
  requireKnownKeys(where, options, [
    'bound',
    'data',
    'optimizer',
    'stream',
    'batchSize',
    'steps',
    'epochs',
    'variables',
    'clip',
    'heldOut',
    'signal',
    'from',
  ]);
  const { bound, optimizer, stream, batchSize, steps, epochs, clip, heldOut, signal, from } = options;
  if (typeof bound?.estimate !== 'function') {
    throw new TrainingError(
      `${where}: bound must have an estimate method; got ${describe(bound)}; pass for example elbo(…)`,
    );
  }
  requireOptimizer(where, optimizer);
  requireStream(where, stream);
  if (batchSize !== undefined) requireCount(where, 'batchSize', batchSize, 1);
  if (steps !== undefined) requireCount(where, 'steps', steps, 1);
  if (epochs !== undefined) requireCount(where, 'epochs', epochs, 1);
  if (clip !== undefined && !(typeof clip === 'number' && clip > 0)) {
    throw new ParameterError(
      `${where}: clip must be a positive number; got ${describe(clip)}; pass for example 10, or leave it out`,
    );
  }
  if (signal !== undefined && typeof signal?.aborted !== 'boolean') {
    throw new ParameterError(
      `${where}: signal must be an AbortSignal; got ${describe(signal)}; pass new AbortController().signal`,
    );
  }
  if (heldOut !== undefined) requireHeldOut(heldOut);
  if (from !== undefined) requireFrom(from, heldOut);
}

function requireHeldOut<Data>(heldOut: HeldOutOptions<Data>): void {
  const name = 'train: heldOut';
  requireKnownKeys(name, heldOut, ['data', 'every', 'batchSize', 'patience', 'margin', 'best']);
  const { every, batchSize, patience, margin, best } = heldOut;
  if (every !== undefined) requireCount(where, 'heldOut.every', every, 1);
  if (batchSize !== undefined) requireCount(where, 'heldOut.batchSize', batchSize, 1);
  if (patience !== undefined) requireCount(where, 'heldOut.patience', patience, 1);
  if (margin !== undefined) requireNumber(where, 'heldOut.margin', margin, 0);
  if (best !== undefined && !(best instanceof Snapshot)) {
    throw new ParameterError(
      `${where}: heldOut.best must be a snapshot; got ${describe(best)}; pass snapshot(variables)`,
    );
  }
}

function requireFrom<Data>(from: TrainingCursor, heldOut: HeldOutOptions<Data> | undefined): void {
  if (typeof from !== 'object' || from === null) {
    throw new ParameterError(
      `${where}: from must be a training cursor; got ${describe(from)}; pass what progress.cursor gave`,
    );
  }
  requireCount(where, 'from.step', from.step);
  if ((from.heldOut === undefined) !== (heldOut === undefined)) {
    throw new ParameterError(
      `${where}: heldOut must be given as in the run that is continued; got ${heldOut ? 'some where that had none' : 'none where that had some'}; continue with the same options`,
    );
  }
  if (!heldOut) return;
  const { best, bestStep, waited } = from.heldOut!;
  if (best !== null) requireNumber(where, 'from.heldOut.best', best);
  requireCount(where, 'from.heldOut.bestStep', bestStep);
  requireCount(where, 'from.heldOut.waited', waited);
  if (heldOut.best && heldOut.best.step !== bestStep) {
    throw new TrainingError(
      `${where}: heldOut.best must hold the weights of step ${bestStep}; got those of step ${heldOut.best.step}; checkpoint and resume it beside the variables`,
    );
  }
}
