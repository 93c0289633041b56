import * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { ModelError } from '../errors.js';
import { requireStream, type Stream } from '../random/stream.js';
import { describe, requireCount } from '../tensor/checks.js';
import type { DataValue } from './data.js';
import type { ModelNode } from './node.js';
import { Pass } from './pass.js';

/** What the compiler shows for a name that is taken. */
export type TakenName<Name extends string> =
  `the name '${Name}' is already declared in the model; choose another`;

type Fresh<Name extends string, Taken> = Name extends Taken ? TakenName<Name> : Name;
type ValuesOf<Names extends string> = { readonly [K in Names]: tf.Tensor };
type Nodes = Readonly<Record<string, Distribution>>;
type NamesOf<G extends string, L, O> = G | (keyof L & string) | (keyof O & string);

/** What a model's values, latent and observed, are given as: one tensor per name, rows first. */
export type ModelData<Names extends string> = { readonly [K in Names]: DataValue };

/**
 * A directed model: given, latent and observed values in ancestral order, each drawn from a distribution
 * that may depend on the values before it. Immutable; each method returns a longer model.
 *
 * `Given` are the names of the given values, `Latent` and `Observed` map names to distribution types.
 *
 * @example
 * ```ts
 * import { directed, normal, product } from 'leadline';
 * const model = directed().latent('z', () => product(normal({ mean: [0, 0], sd: 1 })));
 * console.log(model.nodes.map((node) => `${node.kind} ${node.name}`));
 * // [ 'latent z' ]
 * ```
 */
export class DirectedModel<
  Given extends string = never,
  Latent extends Nodes = {},
  Observed extends Nodes = {},
> {
  /** The nodes in order. */
  readonly nodes: readonly ModelNode[];
  /** Carries the types; never set. */
  declare readonly types?: { given: Given; latent: Latent; observed: Observed };

  /** @internal */
  constructor(nodes: readonly ModelNode[]) {
    this.nodes = nodes;
  }

  /**
   * Declares a value that the model is told and does not explain, such as a covariate.
   *
   * @param name - a new name
   */
  given<const Name extends string>(
    name: Fresh<Name, NamesOf<Given, Latent, Observed>>,
  ): DirectedModel<Given | Name, Latent, Observed> {
    return new DirectedModel(this.#with('given', name as string));
  }

  /**
   * Declares a hidden value.
   *
   * @param name - a new name
   * @param conditional - its distribution, from the values declared before it
   */
  latent<const Name extends string, D extends Distribution>(
    name: Fresh<Name, NamesOf<Given, Latent, Observed>>,
    conditional: (values: ValuesOf<NamesOf<Given, Latent, Observed>>) => D,
  ): DirectedModel<Given, Latent & { readonly [K in Name]: D }, Observed> {
    return new DirectedModel(this.#with('latent', name as string, conditional));
  }

  /**
   * Declares a value that data are seen of.
   *
   * @param name - a new name
   * @param conditional - its distribution, from the values declared before it
   */
  observed<const Name extends string, D extends Distribution>(
    name: Fresh<Name, NamesOf<Given, Latent, Observed>>,
    conditional: (values: ValuesOf<NamesOf<Given, Latent, Observed>>) => D,
  ): DirectedModel<Given, Latent, Observed & { readonly [K in Name]: D }> {
    return new DirectedModel(this.#with('observed', name as string, conditional));
  }

  /**
   * Draws every latent and observed value, in ancestral order.
   *
   * @param stream - the source of randomness
   * @param rows - how many rows to draw
   * @param given - the given values, `[rows, …]` each
   * @returns one tensor per latent and observed value, `[rows, …]`
   */
  simulate(
    stream: Stream,
    rows: number,
    ...given: [Given] extends [never] ? [given?: {}] : [given: ModelData<Given>]
  ): { readonly [K in (keyof Latent | keyof Observed) & string]: tf.Tensor } {
    requireStream('simulate', stream);
    requireCount('simulate', 'rows', rows, 1);
    const names = this.nodes.filter((n) => n.kind === 'given').map((n) => n.name);
    return tf.tidy(() => {
      const pass = new Pass('simulate', 1, rows);
      pass.addData(names, (given[0] ?? {}) as Record<string, DataValue>);
      const drawn: Record<string, tf.Tensor> = {};
      for (const node of this.nodes) {
        if (node.kind === 'given') continue;
        drawn[node.name] = pass.draw(node, pass.evaluate(node), stream);
      }
      return drawn;
    }) as { readonly [K in (keyof Latent | keyof Observed) & string]: tf.Tensor };
  }

  /**
   * The log density of all latent and observed values together, in nats.
   *
   * @param values - a value for every node, `[rows, …]` each; observed ones may be masked
   * @returns `[rows]`
   */
  logJoint(values: ModelData<NamesOf<Given, Latent, Observed>>): tf.Tensor1D {
    return tf.tidy(() => {
      const pass = new Pass('logJoint', 1);
      pass.addData(
        this.nodes.map((n) => n.name),
        values as Record<string, DataValue>,
      );
      const terms = this.nodes
        .filter((n) => n.kind !== 'given')
        .map((node) => pass.logDensity(node, pass.evaluate(node)));
      return terms.reduce((sum, term) => tf.add(sum, term), tf.zeros([pass.dataRows]));
    }) as tf.Tensor1D;
  }

  #with(kind: ModelNode['kind'], name: string, conditional?: unknown): ModelNode[] {
    if (typeof name !== 'string' || name === '') {
      throw new ModelError(
        `directed: the name of a ${kind} value must be a non-empty string; got ${describe(name)}; pass for example '${kind === 'latent' ? 'z' : 'x'}'`,
      );
    }
    if (this.nodes.some((node) => node.name === name)) {
      throw new ModelError(`directed: names must be unique; got '${name}' twice; choose another name`);
    }
    if (kind !== 'given' && typeof conditional !== 'function') {
      throw new ModelError(
        `directed: the conditional of '${name}' must be a function of the values before it; got ${describe(conditional)}; pass () => … returning a distribution`,
      );
    }
    const before = this.nodes.map((node) => node.name);
    const node: ModelNode =
      kind === 'given' ? { name, kind, before } : { name, kind, before, conditional: conditional as never };
    return [...this.nodes, node];
  }
}

/**
 * Starts a directed model, to which `given`, `latent` and `observed` values are added in ancestral order.
 *
 * Every value that a conditional reads or returns has one leading axis, the rows: data points, or data
 * points times draws when a bound asks for several. A conditional returns a distribution whose `arrayShape`
 * is `[rows]`, or `[]` when all rows share it. It must be a pure function of what it reads, since it may be
 * evaluated more than once per step.
 *
 * @throws ModelError, from the methods, for a name that is taken or a conditional that is not a function.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { directed, normal, product, stream } from 'leadline';
 * const model = directed()
 *   .latent('z', () => product(normal({ mean: tf.zeros([2]), sd: 1 })))
 *   .observed('x', ({ z }) => product(normal({ mean: tf.mul(z, 2), sd: 0.1 })));
 * const { z, x } = model.simulate(stream(1), 5);
 * console.log(z.shape, x.shape);
 * // [ 5, 2 ] [ 5, 2 ]
 * console.log(model.logJoint({ z, x }).shape);
 * // [ 5 ]
 * ```
 * Source: Jordan, Ghahramani, Jaakkola and Saul, Machine Learning 37 (1999), section 2.
 */
export function directed(): DirectedModel {
  return new DirectedModel([]);
}
