import type { Distribution } from '../distributions/distribution.js';
import type { HasClosedKl } from '../divergence/registry.js';
import { ModelError } from '../errors.js';
import { DirectedModel } from '../models/directed.js';
import type { ModelNode } from '../models/node.js';
import { describe } from '../tensor/checks.js';

type Nodes = Readonly<Record<string, Distribution>>;

/** What the compiler shows for a recognizer that leaves out a latent value. */
export interface MissingLatents<Names> {
  readonly 'the recognizer must have a latent for each latent of the model; it misses': Names;
}
/** What the compiler shows for a recognizer with a latent that the model does not have. */
export interface UnknownLatents<Names> {
  readonly 'the recognizer must have only latents of the model; it adds': Names;
}
/** What the compiler shows for a recognizer with observed values. */
export interface ObservedInRecognizer<Names> {
  readonly 'a recognizer has no observed values; declare them with given(name)': Names;
}
/** What the compiler shows for a latent whose draws carry no gradient. */
export interface NotPathwise<Names> {
  readonly 'the elbo needs draws that carry a gradient; these latents have route none': Names;
}
/** What the compiler shows where closed divergences are asked for and some do not exist. */
export type NoClosedForm<Name extends string> =
  `no closed-form divergence for the latent '${Name}'; use 'sampled', or registerKl`;

type NonPathwise<L extends Nodes> = {
  [K in keyof L]: 'none' extends L[K]['route'] ? K : never;
}[keyof L];

type WithoutClosed<L extends Nodes, R extends Nodes> = {
  [K in keyof L & keyof R]: HasClosedKl<R[K]['family'], L[K]['family']> extends true ? never : K;
}[keyof L & keyof R];

/** `unknown` where a recognizer fits a model's latents, an error message otherwise. */
export type Covers<L extends Nodes, R extends Nodes, O extends Nodes> = [keyof O] extends [never]
  ? [Exclude<keyof L, keyof R>] extends [never]
    ? [Exclude<keyof R, keyof L>] extends [never]
      ? unknown
      : UnknownLatents<Exclude<keyof R, keyof L>>
    : MissingLatents<Exclude<keyof L, keyof R>>
  : ObservedInRecognizer<keyof O>;

/** `unknown` where every latent of a recognizer is pathwise, an error message otherwise. */
export type Pathwise<R extends Nodes> = [NonPathwise<R>] extends [never]
  ? unknown
  : NotPathwise<NonPathwise<R>>;

/** `'closed'` where every latent has a closed divergence, an error message otherwise. */
export type ClosedWhereAll<L extends Nodes, R extends Nodes> = [WithoutClosed<L, R>] extends [never]
  ? 'closed'
  : NoClosedForm<WithoutClosed<L, R> & string>;

/** A model and a recognizer that fit each other. */
export interface Pairing {
  /** Latents in the recognizer's order. */
  readonly latents: readonly {
    readonly name: string;
    readonly model: ModelNode;
    readonly recognizer: ModelNode;
  }[];
  readonly observed: readonly ModelNode[];
  /** Names that data must be given for. */
  readonly dataNames: readonly string[];
}

/** Checks at run time what the types check at compile time, and pairs the latents up. */
export function pairUp(where: string, model: unknown, recognizer: unknown): Pairing {
  const modelNodes = nodesOf(where, 'model', model);
  const recognizerNodes = nodesOf(where, 'recognizer', recognizer);
  const names = (nodes: readonly ModelNode[], kind: ModelNode['kind']) =>
    nodes.filter((n) => n.kind === kind).map((n) => n.name);
  const [wanted, covered] = [names(modelNodes, 'latent'), names(recognizerNodes, 'latent')];
  const observed = names(recognizerNodes, 'observed');
  if (observed.length > 0) {
    throw new ModelError(
      `${where}: recognizer must have no observed values; got ${observed.join(', ')}; declare them with given('${observed[0]}')`,
    );
  }
  const missing = wanted.filter((name) => !covered.includes(name));
  if (missing.length > 0) {
    throw new ModelError(
      `${where}: recognizer must have a latent for each latent of the model; it misses ${missing.join(', ')}; add .latent('${missing[0]}', …)`,
    );
  }
  const unknown = covered.filter((name) => !wanted.includes(name));
  if (unknown.length > 0) {
    throw new ModelError(
      `${where}: recognizer must have only latents of the model; it adds ${unknown.join(', ')}; remove it or add it to the model`,
    );
  }
  if (names(modelNodes, 'observed').length === 0) {
    throw new ModelError(
      `${where}: model must have at least one observed value; got none; add .observed('x', …)`,
    );
  }
  const find = (nodes: readonly ModelNode[], name: string) => nodes.find((n) => n.name === name)!;
  return {
    latents: covered.map((name) => ({
      name,
      model: find(modelNodes, name),
      recognizer: find(recognizerNodes, name),
    })),
    observed: modelNodes.filter((n) => n.kind === 'observed'),
    dataNames: [
      ...new Set([
        ...modelNodes.filter((n) => n.kind !== 'latent').map((n) => n.name),
        ...names(recognizerNodes, 'given'),
      ]),
    ],
  };
}

function nodesOf(where: string, role: string, model: unknown): readonly ModelNode[] {
  if (!(model instanceof DirectedModel)) {
    throw new ModelError(
      `${where}: ${role} must be a directed model; got ${describe(model)}; build one with directed()`,
    );
  }
  return model.nodes;
}
