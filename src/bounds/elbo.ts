import * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { ParameterError } from '../errors.js';
import type { DirectedModel, ModelData } from '../models/directed.js';
import { Pass } from '../models/pass.js';
import { requireStream, type Stream } from '../random/stream.js';
import { describe, requireCount, requireKnownKeys, requireNumber } from '../tensor/checks.js';
import type { Bound, BoundEstimate } from './bound.js';
import {
  type DivergenceChoice,
  type LatentPair,
  latentDivergence,
  requirePathwise,
} from './latentDivergence.js';
import { type ClosedWhereAll, type Covers, type Pairing, type Pathwise, pairUp } from './pairing.js';

type Nodes = Readonly<Record<string, Distribution>>;

/** Options of {@link elbo}. */
export interface ElboOptions<Latent extends Nodes = Nodes, Recognized extends Nodes = Nodes> {
  /** Draws from the recognizer per data point; 1 unless given. */
  readonly draws?: number;
  /**
   * How each latent's divergence is computed, for all or by name. Left out: in closed form where one exists
   * and holds, else sampled.
   */
  readonly divergence?:
    | 'sampled'
    | ClosedWhereAll<Latent, Recognized>
    | { readonly [K in keyof Latent]?: DivergenceChoice };
  /** Weight of the divergence in the surrogate; 1 unless given. The reported value is the bound all the same. */
  readonly divergenceWeight?: number;
  /** Nats that each latent may use, on average over the data points, before the surrogate counts them. */
  readonly freeNats?: number | { readonly [K in keyof Latent]?: number };
}

const optionNames = ['draws', 'divergence', 'divergenceWeight', 'freeNats'];

/**
 * The evidence lower bound, with the pathwise gradient: the objective that trains a model and its recognizer
 * together. Use it as the first choice wherever every latent is pathwise.
 *
 * Formula, per data point: E_q[Σ log p(observed | …)] − Σ KL(q(latent) ‖ p(latent)) ≤ log evidence. The
 * expectation is estimated from `draws` draws; each divergence is taken in closed form where one exists and
 * holds, else estimated from the same draws. With `divergenceWeight` w and `freeNats` λ the surrogate is
 * Σ log p − w Σ max(λ, mean divergence), while `value` stays the bound itself.
 *
 * Shapes: `value` and every part are `[dataPoints]`, in nats; `surrogate` is a scalar, summed over data
 * points. Gradient route: pathwise, for the variables of both models. K draws cost at most K times one.
 *
 * @param model - the generative model
 * @param recognizer - a directed model over the same latents, given the observed values
 * @param options - draws, divergence, divergenceWeight, freeNats
 * @throws ModelError when the recognizer does not fit the model or data are missing; GradientError when a
 *   latent is not pathwise; DivergenceError when a closed divergence is asked for that does not hold;
 *   ParameterError for an option out of range; ShapeError when a conditional returns the wrong shape.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { directed, elbo, normal, product, stream } from 'leadline';
 * // z ~ N(0, 1), x | z ~ N(z, 1); the exact posterior N(x/2, 1/2) makes the bound the evidence, N(0, 2).
 * const model = directed()
 *   .latent('z', () => product(normal({ mean: [0], sd: 1 })))
 *   .observed('x', ({ z }) => product(normal({ mean: z, sd: 1 })));
 * const recognizer = directed()
 *   .given('x')
 *   .latent('z', ({ x }) => product(normal({ mean: tf.div(x, 2), variance: 0.5 })));
 * const bound = elbo(model, recognizer, { draws: 20_000 });
 * const { value } = bound.estimate({ x: tf.tensor2d([[1]]) }, stream(3));
 * console.log(Math.abs(value.dataSync()[0]! - -1.5155) < 0.02);
 * // true
 * ```
 * Source: Jordan, Ghahramani, Jaakkola and Saul, Machine Learning 37 (1999), equation 49; the pathwise
 * gradient: Rezende, Mohamed and Wierstra, arXiv 1401.4082 (2014), equations 9 to 14; free nats: Kingma et
 * al., arXiv 1606.04934 (2016), equation 15.
 */
export function elbo<
  Given extends string,
  Latent extends Nodes,
  Observed extends Nodes,
  Told extends string,
  Recognized extends Nodes,
  Seen extends Nodes,
>(
  model: DirectedModel<Given, Latent, Observed>,
  recognizer: DirectedModel<Told, Recognized, Seen> & Covers<Latent, Recognized, Seen> & Pathwise<Recognized>,
  options: ElboOptions<Latent, Recognized> = {},
): Bound<
  ModelData<Given | (keyof Observed & string) | Told>,
  keyof Observed & string,
  keyof Latent & string
> {
  const pairing = pairUp('elbo', model, recognizer);
  const settings = readOptions(pairing, options);
  const estimate = (data: object, stream: Stream): BoundEstimate => {
    requireStream('elbo', stream);
    return tf.tidy(() => ({ ...estimateOnce(pairing, settings, data, stream) }) as never) as BoundEstimate;
  };
  return Object.freeze({
    estimate,
    loss: (data: object, stream: Stream) =>
      tf.tidy(() => {
        const { value, surrogate } = estimate(data, stream);
        return tf.div(surrogate, -value.shape[0]);
      }) as tf.Scalar,
  });
}

interface Settings {
  readonly draws: number;
  readonly weight: number;
  choice(latent: string): DivergenceChoice | undefined;
  free(latent: string): number;
}

function readOptions(pairing: Pairing, options: object): Settings {
  requireKnownKeys('elbo', options, optionNames);
  const {
    draws = 1,
    divergence,
    divergenceWeight: weight = 1,
    freeNats = 0,
  } = options as {
    draws?: number;
    divergence?: DivergenceChoice | Record<string, DivergenceChoice>;
    divergenceWeight?: number;
    freeNats?: number | Record<string, number>;
  };
  requireCount('elbo', 'draws', draws, 1);
  requireNumber('elbo', 'divergenceWeight', weight, 0);
  const names = pairing.latents.map((latent) => latent.name);
  if (typeof divergence === 'object') requireKnownKeys('elbo divergence', divergence, names);
  if (typeof freeNats === 'object') requireKnownKeys('elbo freeNats', freeNats, names);
  const choice = (name: string) => (typeof divergence === 'object' ? divergence[name] : divergence);
  const free = (name: string) => (typeof freeNats === 'object' ? (freeNats[name] ?? 0) : freeNats);
  for (const name of names) {
    const chosen: unknown = choice(name);
    if (chosen !== undefined && chosen !== 'closed' && chosen !== 'sampled') {
      throw new ParameterError(
        `elbo: divergence must be 'closed', 'sampled' or left out; got ${describe(chosen)} for '${name}'; pass for example divergence: 'sampled'`,
      );
    }
    requireNumber('elbo', 'freeNats', free(name), 0);
  }
  return { draws, weight, choice, free };
}

function estimateOnce(pairing: Pairing, settings: Settings, data: object, stream: Stream): BoundEstimate {
  const pass = new Pass('elbo', settings.draws);
  pass.addData(pairing.dataNames, data as Record<string, never>);

  const drawnFrom = new Map<string, Set<string>>();
  const pairs = pairing.latents.map(({ name, model, recognizer }) => {
    const evaluated = pass.evaluate(recognizer);
    requirePathwise(name, evaluated);
    pass.draw(recognizer, evaluated, stream);
    // Everything this draw depends on, directly or through other draws.
    const ancestors = new Set(evaluated.reads);
    for (const read of evaluated.reads) for (const far of drawnFrom.get(read) ?? []) ancestors.add(far);
    drawnFrom.set(name, ancestors);
    return { name, modelNode: model, recognizerNode: recognizer, recognizer: evaluated };
  });

  const logLikelihood: Record<string, tf.Tensor1D> = {};
  for (const node of pairing.observed) {
    logLikelihood[node.name] = pass.meanOverDraws(pass.logDensity(node, pass.evaluate(node))) as tf.Tensor1D;
  }
  const divergence: Record<string, tf.Tensor1D> = {};
  for (const half of pairs) {
    const pair: LatentPair = { ...half, model: pass.evaluate(half.modelNode) };
    const descendants = new Set(
      [...drawnFrom].flatMap(([name, from]) => (from.has(pair.name) ? [name] : [])),
    );
    divergence[pair.name] = latentDivergence(
      pass,
      pair,
      descendants,
      settings.choice(pair.name),
    ) as tf.Tensor1D;
  }

  const [first, ...others] = Object.values(logLikelihood) as [tf.Tensor, ...tf.Tensor[]];
  const likelihood = others.reduce((sum, term) => tf.add(sum, term), first);
  const divergences = Object.values<tf.Tensor>(divergence);
  // Never the very tensor that also stands in the parts, so that either may be disposed alone.
  const value =
    divergences.length === 0
      ? likelihood.clone()
      : divergences.reduce((rest, term) => tf.sub(rest, term), likelihood);
  return {
    value: value as tf.Tensor1D,
    surrogate: surrogateOf(settings, value, likelihood, divergence),
    parts: { logLikelihood, divergence },
  };
}

function surrogateOf(
  { weight, free }: Settings,
  value: tf.Tensor,
  likelihood: tf.Tensor,
  divergence: Readonly<Record<string, tf.Tensor>>,
): tf.Scalar {
  const names = Object.keys(divergence);
  if (weight === 1 && names.every((name) => free(name) === 0)) return tf.sum(value);
  return names.reduce<tf.Tensor>((rest, name) => {
    const term = divergence[name]!;
    const counted =
      free(name) === 0 ? tf.sum(term) : tf.mul(tf.maximum(tf.mean(term), free(name)), term.shape[0]!);
    return tf.sub(rest, tf.mul(counted, weight));
  }, tf.sum(likelihood)) as tf.Scalar;
}
