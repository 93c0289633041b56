import * as tf from '@tensorflow/tfjs';
import { closedKl } from '../divergence/closedForms.js';
import { DivergenceError, GradientError, ShapeError } from '../errors.js';
import { sameShape } from '../kernels/layout.js';
import type { ModelNode } from '../models/node.js';
import type { Evaluated, Pass } from '../models/pass.js';
import { shapeText } from '../tensor/checks.js';

/** How the divergence of a latent is computed. */
export type DivergenceChoice = 'closed' | 'sampled';

/** One latent with both its conditionals evaluated. */
export interface LatentPair {
  readonly name: string;
  readonly modelNode: ModelNode;
  readonly recognizerNode: ModelNode;
  readonly model: Evaluated;
  readonly recognizer: Evaluated;
}

/**
 * The divergence of one latent, `[dataPoints]`: in closed form where it exists and holds, else from the draws.
 *
 * A closed form given the drawn parents is an unbiased estimate only while the prior reads nothing that the
 * recognizer drew from this latent: such a value carries information about the latent, and averaging over
 * the latent with that value held would be wrong.
 */
export function latentDivergence(
  pass: Pass,
  pair: LatentPair,
  descendants: ReadonlySet<string>,
  choice: DivergenceChoice | undefined,
): tf.Tensor {
  const { name, model, recognizer } = pair;
  requireSamePoints(name, recognizer.distribution.pointShape, model.distribution.pointShape);
  const formula = choice === 'sampled' ? undefined : closedKl(recognizer.distribution, model.distribution);
  const looped = [...model.reads].find((read) => descendants.has(read));
  if (choice === 'closed') {
    if (!formula) {
      throw new DivergenceError(
        `elbo: the divergence of '${name}' must have a closed form; got (${recognizer.distribution.family}, ${model.distribution.family}); pass divergence: { ${name}: 'sampled' }, or registerKl(…)`,
      );
    }
    if (looped !== undefined) {
      throw new DivergenceError(
        `elbo: the divergence of '${name}' must be sampled, since its prior reads '${looped}', which the recognizer draws from '${name}'; got 'closed'; pass divergence: { ${name}: 'sampled' }`,
      );
    }
  }
  if (formula && looped === undefined) {
    const [q, p] = sameRows(pass, pair);
    return pass.meanOverDraws(formula(q.distribution, p.distribution, 0));
  }
  const logQ = pass.logDensity(pair.recognizerNode, recognizer);
  const logP = pass.logDensity(pair.modelNode, model);
  return pass.meanOverDraws(tf.sub(logQ, logP));
}

/** A closed form would broadcast a prior of one coordinate over all those of the recognizer, without a word. */
function requireSamePoints(name: string, q: readonly number[], p: readonly number[]): void {
  if (sameShape(q, p)) return;
  throw new ShapeError(
    `elbo: '${name}' must have points of one shape; got ${shapeText(p)} in the model and ${shapeText(q)} in the recognizer; give both the same sizes`,
  );
}

/** Both conditionals over the same rows: one that was evaluated per data point is evaluated per draw where needed. */
function sameRows(pass: Pass, pair: LatentPair): [Evaluated, Evaluated] {
  const { model, recognizer } = pair;
  if (recognizer.rows === 'data' && model.rows === 'expanded') {
    return [pass.evaluate(pair.recognizerNode, true), model];
  }
  if (recognizer.rows === 'expanded' && model.rows === 'data') {
    return [recognizer, pass.evaluate(pair.modelNode, true)];
  }
  return [recognizer, model];
}

/** Refuses a latent whose draws carry no gradient: its elbo gradient would silently miss a term. */
export function requirePathwise(name: string, { distribution }: Evaluated): void {
  if (distribution.route === 'pathwise') return;
  throw new GradientError(
    `elbo: the recognizer's draws must carry a gradient; got ${distribution.family} for '${name}', whose route is 'none'; use a pathwise family for this latent`,
  );
}
