import * as tf from '@tensorflow/tfjs';
import { EnvironmentError, TrainingError } from '../errors.js';
import type { Stream } from '../random/stream.js';
import { shapeText } from '../tensor/checks.js';
import { forgetFailedTape } from '../tensor/engine.js';
import { findFlaw } from './diagnose.js';
import { holdState } from './heldState.js';
import { requireSlotOrder } from './optimizerState.js';
import { rescueNorm } from './rescueNorm.js';
import { listParts, type Parts, partsOf, type Trainable } from './trainable.js';
import type { NamedVariable } from './variables.js';

/** What a step is taken on. */
export interface StepInput<Data> {
  /** The step's number, for messages. */
  readonly step: number;
  readonly data: Data;
  /** Which rows of the whole data these are, for messages. */
  readonly rows: Int32Array;
  /** The step's draws, from their beginning at each call. */
  readonly draws: () => Stream;
}

/** What a step measured before it changed the variables. */
export interface StepReport {
  /** The mean bound of the batch, in nats per data point. */
  readonly bound: number;
  readonly parts: Parts<number>;
  /** The gradient's Euclidean norm over all variables, before clipping. */
  readonly gradientNorm: number;
}

/** What one backward pass gave; tensors are the holder's to dispose. */
interface Pass {
  readonly loss: tf.Scalar;
  readonly value: tf.Tensor;
  readonly parts: Parts<tf.Tensor>;
  readonly grads: tf.NamedTensorMap;
}

const where = 'train';

/** Takes gradient steps, each checked before it changes a variable. */
export class GradientStep<Data> {
  readonly #bound: Trainable<Data>;
  readonly #optimizer: tf.Optimizer;
  readonly #clip: number;
  readonly #explicit: boolean;
  #variables: readonly NamedVariable[] | undefined;

  /** Without `variables`, every trainable variable that the first step reaches. */
  constructor(
    bound: Trainable<Data>,
    optimizer: tf.Optimizer,
    variables: readonly NamedVariable[] | undefined,
    clip = Number.POSITIVE_INFINITY,
  ) {
    this.#bound = bound;
    this.#optimizer = optimizer;
    this.#variables = variables;
    this.#explicit = variables !== undefined;
    this.#clip = clip;
    if (variables)
      requireSlotOrder(
        where,
        optimizer,
        variables.map(({ variable }) => variable),
      );
  }

  /** One step: gradients, checks, clipping, update. A refused step changes nothing. */
  async take(input: StepInput<Data>): Promise<StepReport> {
    const pass = this.#backward(input);
    try {
      const variables = this.#reached(pass.grads);
      const gradients = variables.map(({ variable }) => pass.grads[variable.name]!);
      const parts = listParts(pass.parts);
      const statistics = tf.tidy(() =>
        tf.stack([
          pass.loss,
          ...[pass.value, ...parts.map(({ term }) => term)].map((term) => tf.mean(term)),
          ...gradients.map((gradient) => tf.sum(tf.square(gradient))),
        ]),
      );
      // One read-back for all checks, since on an accelerator each costs a round trip.
      const numbers = (await statistics.data()) as Float32Array;
      statistics.dispose();
      const squares = numbers.subarray(2 + parts.length);
      let norm = Math.sqrt(squares.reduce((sum, square) => sum + square, 0));
      if (!numbers.every(Number.isFinite)) {
        norm = await rescueNorm({
          ...input,
          ...pass,
          bound: this.#bound,
          clip: this.#clip,
          gradients,
          variables,
        });
      }
      await this.#update(input.step, variables, gradients, norm);
      return { bound: numbers[1]!, parts: partsOf(parts, numbers.subarray(2)), gradientNorm: norm };
    } finally {
      tf.dispose([
        pass.loss,
        pass.value,
        pass.parts.logLikelihood,
        pass.parts.divergence,
        pass.grads,
      ] as tf.TensorContainer);
    }
  }

  #backward(input: StepInput<Data>): Pass {
    let kept: Pick<Pass, 'value' | 'parts'> | undefined;
    let made: tf.Scalar | undefined;
    const loss = (): tf.Scalar => {
      const { value, surrogate, parts } = this.#bound.estimate(input.data, input.draws());
      const rows = value.shape[0];
      if (value.rank !== 1 || !rows || surrogate.size !== 1) {
        throw new TrainingError(
          `${where}: bound must estimate value as [dataPoints] and surrogate as a scalar; got shapes ${shapeText(value.shape)} and ${shapeText(surrogate.shape)}; sum the surrogate over data points`,
        );
      }
      kept = { value: tf.keep(value), parts };
      for (const { term } of listParts(parts)) tf.keep(term);
      made = tf.div(surrogate.asScalar(), -rows);
      return made;
    };
    try {
      const { value, grads } = tf.variableGrads(
        loss,
        this.#variables?.map(({ variable }) => variable),
      );
      return { ...kept!, loss: value, grads };
    } catch (cause) {
      made?.dispose();
      forgetFailedTape();
      if (kept)
        tf.dispose([kept.value, kept.parts.logLikelihood, kept.parts.divergence] as tf.TensorContainer);
      if (cause instanceof Error && /Cannot find a connection|to be trainable/.test(cause.message)) {
        throw new TrainingError(
          `${where}: bound must depend on a trainable variable; got none; use your tf.Variables inside the model's conditionals, and detach() nothing on the way`,
          { cause },
        );
      }
      const [, kernel, backend] =
        /Kernel '(.+?)' not registered for backend '(.+?)'/.exec((cause as Error)?.message ?? '') ?? [];
      if (kernel) {
        throw new EnvironmentError(
          `${where}: the backend must have every operation that the model and its gradient use; got ${backend}, which lacks ${kernel}; call await tf.setBackend('cpu') before the model is built`,
          { cause },
        );
      }
      throw cause;
    }
  }

  #reached(grads: tf.NamedTensorMap): readonly NamedVariable[] {
    if (!this.#variables) {
      const registered = tf.engine().registeredVariables;
      this.#variables = Object.keys(grads).map((name) => ({ name, variable: registered[name]! }));
      requireSlotOrder(
        where,
        this.#optimizer,
        this.#variables.map(({ variable }) => variable),
      );
    }
    const missed = this.#variables.find(({ variable }) => !grads[variable.name]);
    if (missed) {
      throw new TrainingError(
        `${where}: ${this.#explicit ? 'every one of variables' : 'every variable that the first step reached'} must be reached by the bound; got no gradient for ${missed.name}; leave it out, or use it in a conditional`,
      );
    }
    return this.#variables;
  }

  async #update(
    step: number,
    variables: readonly NamedVariable[],
    gradients: readonly tf.Tensor[],
    norm: number,
  ): Promise<void> {
    const clipped =
      norm > this.#clip ? gradients.map((gradient) => tf.mul(gradient, this.#clip / norm)) : undefined;
    const held = holdState(
      this.#optimizer,
      variables.map(({ variable }) => variable),
    );
    try {
      this.#optimizer.applyGradients(
        variables.map(({ variable }, i) => ({ name: variable.name, tensor: (clipped ?? gradients)[i]! })),
      );
      const sums = tf.tidy(() => tf.stack(variables.map(({ variable }) => tf.sum(variable))));
      const totals = await sums.data();
      sums.dispose();
      for (const [i, { name, variable }] of variables.entries()) {
        // A sum may overflow where no term does, so it only says where to look.
        const flaw = Number.isFinite(totals[i]) ? undefined : await findFlaw(variable);
        if (!flaw) continue;
        throw new TrainingError(
          `${where}: step ${step} must leave variables finite; got ${flaw.value} for ${name} from a finite gradient of norm ${norm}; no variable was changed: lower the learning rate, or give the optimizer a positive epsilon`,
        );
      }
    } catch (error) {
      held.restore();
      throw error;
    } finally {
      held.dispose();
      if (clipped) tf.dispose(clipped);
    }
  }
}
