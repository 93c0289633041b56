import * as tf from '@tensorflow/tfjs';
import type { Distribution } from '../distributions/distribution.js';
import { isProduct } from '../distributions/product.js';
import { LeadlineError, ModelError, ShapeError } from '../errors.js';
import { sameShape } from '../kernels/layout.js';
import type { Stream } from '../random/stream.js';
import { describe, shapeText } from '../tensor/checks.js';
import type { DataValue } from './data.js';
import { splitMasked, spreadRows } from './masked.js';
import { type ModelNode, requireRows } from './node.js';

/** A value in a pass: with one row per data point, or one per draw and data point (draws outermost). */
interface Entry {
  readonly tensor: tf.Tensor;
  readonly expanded: boolean;
  readonly mask?: tf.Tensor | undefined;
}

/** A conditional evaluated: its distribution, over which rows, and which values it read. */
export interface Evaluated {
  readonly distribution: Distribution;
  /** One member per data point, per draw and data point, or one for all. */
  readonly rows: 'data' | 'expanded' | 'shared';
  readonly reads: ReadonlySet<string>;
}

/** Thrown inside a conditional that reads a drawn value before its rows were expanded; caught in the pass. */
class NeedsExpansion extends Error {}

// Which nodes turned out to read drawn values, so that they are evaluated once from the second pass on.
const readsDraws = new WeakSet<ModelNode>();

/**
 * One walk through directed models with a number of draws per data point. It folds draws into rows, so that
 * conditionals see one leading axis only, and unfolds what comes back; a conditional that reads data alone is
 * evaluated once per data point, however many draws there are.
 */
export class Pass {
  readonly #where: string;
  readonly #draws: number;
  #rows: number | undefined;
  readonly #entries = new Map<string, Entry>();

  constructor(where: string, draws: number, rows?: number) {
    this.#where = where;
    this.#draws = draws;
    this.#rows = rows;
  }

  /** The number of data points. */
  get dataRows(): number {
    if (this.#rows === undefined) {
      throw new ModelError(
        `${this.#where}: the data must tell the number of rows; got no values; give at least one observed or given value`,
      );
    }
    return this.#rows;
  }

  /** Takes in data for the given names; each must be there, and all must have the same number of rows. */
  addData(names: readonly string[], data: Readonly<Record<string, DataValue>>): void {
    if (typeof data !== 'object' || data === null || data instanceof tf.Tensor || Array.isArray(data)) {
      throw new ModelError(
        `${this.#where}: data must be an object with one value per name; got ${describe(data)}; pass { ${names.join(', ')} }`,
      );
    }
    for (const name of Object.keys(data)) {
      if (!names.includes(name)) {
        throw new ModelError(
          `${this.#where}: data must be among ${names.join(', ') || '(none)'}; got '${name}'; remove it or declare it in the model`,
        );
      }
    }
    for (const name of names) {
      if (data[name] === undefined) {
        throw new ModelError(
          `${this.#where}: data must have a value for '${name}'; got ${Object.keys(data).join(', ') || 'none'}; add ${name} to the data`,
        );
      }
      const { values, mask } = splitMasked(this.#where, name, data[name]);
      const rows = values.shape[0];
      if (rows === undefined) {
        throw new ShapeError(
          `${this.#where}: '${name}' must have a leading axis of rows; got a scalar; wrap it as [value]`,
        );
      }
      if (rows === 0) {
        throw new ShapeError(
          `${this.#where}: '${name}' must have at least one row; got shape ${shapeText(values.shape)}; skip empty batches`,
        );
      }
      this.#rows ??= rows;
      if (rows !== this.#rows) {
        throw new ShapeError(
          `${this.#where}: all values must have the same number of rows; got ${this.#rows} and, for '${name}', ${rows}; slice or repeat the data`,
        );
      }
      this.#entries.set(name, { tensor: values, expanded: false, mask });
    }
  }

  /** Evaluates a node's conditional, over data rows where it reads data alone. */
  evaluate(node: ModelNode, expand = false): Evaluated {
    if (this.#draws === 1) return this.#attempt(node, true);
    if (!expand && !readsDraws.has(node)) {
      try {
        return this.#attempt(node, false);
      } catch (error) {
        if (!(error instanceof NeedsExpansion)) throw error;
        readsDraws.add(node);
      }
    }
    return this.#attempt(node, true);
  }

  #attempt(node: ModelNode, expand: boolean): Evaluated {
    const reads = new Set<string>();
    const values = new Proxy(Object.create(null) as Record<string, tf.Tensor>, {
      get: (_target, key) => {
        if (typeof key !== 'string') return undefined;
        if (!node.before.includes(key)) {
          throw new ModelError(
            `${this.#where}: the conditional of '${node.name}' must read values declared before it (${node.before.join(', ') || 'none'}); got '${key}'; declare '${key}' first`,
          );
        }
        reads.add(key);
        return this.#read(key, expand);
      },
      ownKeys: () => [...node.before],
      has: (_target, key) => node.before.includes(key as string),
      getOwnPropertyDescriptor: (_target, key) =>
        node.before.includes(key as string)
          ? { enumerable: true, configurable: true, value: this.#read(key as string, expand) }
          : undefined,
    });
    const rows = this.dataRows * (expand ? this.#draws : 1);
    const distribution = requireRows(this.#where, node, this.#call(node, values), rows);
    const own = distribution.arrayShape[0];
    const shared = own === undefined || (own === 1 && rows !== 1);
    return { distribution, rows: shared ? 'shared' : expand ? 'expanded' : 'data', reads };
  }

  /** Runs a node's conditional; an error of this library inside it then says which node's it was. */
  #call(node: ModelNode, values: Record<string, tf.Tensor>): unknown {
    try {
      return node.conditional!(values);
    } catch (error) {
      if (error instanceof LeadlineError && !error.message.startsWith(`${this.#where}: `)) {
        const plain = error.message;
        error.message = `${this.#where}: in the conditional of '${node.name}': ${plain}`;
        if (error.stack) error.stack = error.stack.replace(plain, () => error.message);
      }
      throw error;
    }
  }

  #read(name: string, expand: boolean): tf.Tensor {
    const entry = this.#entries.get(name);
    if (!entry) {
      throw new ModelError(`${this.#where}: '${name}' must have a value here; got none; add it to the data`);
    }
    if (!expand) {
      if (entry.expanded) throw new NeedsExpansion();
      return entry.tensor;
    }
    return this.#expanded(entry);
  }

  #expanded(entry: Entry): tf.Tensor {
    return entry.expanded ? entry.tensor : this.#repeat(entry.tensor);
  }

  #repeat(tensor: tf.Tensor): tf.Tensor {
    if (this.#draws === 1) return tensor;
    return tf.tile(tensor, [this.#draws, ...new Array<number>(tensor.shape.length - 1).fill(1)]);
  }

  /** Draws a node's value, one per row, and keeps it under the node's name. */
  draw(node: ModelNode, { distribution, rows }: Evaluated, stream: Stream): tf.Tensor {
    const total = this.dataRows * this.#draws;
    let value: tf.Tensor;
    if (rows === 'expanded') value = distribution.draw(stream);
    else if (rows === 'data')
      value = foldRows(distribution.draw(stream, this.#draws), distribution.pointShape, total);
    else value = foldRows(distribution.draw(stream, total), distribution.pointShape, total);
    this.set(node.name, value);
    return value;
  }

  /** Keeps a value that has one row per draw and data point. */
  set(name: string, value: tf.Tensor): void {
    this.#entries.set(name, { tensor: value, expanded: true });
  }

  /**
   * The log density of a node's value: `[draws × data points]`, or `[data points]` where neither the value
   * nor its distribution depends on a draw.
   */
  logDensity(node: ModelNode, { distribution, rows }: Evaluated): tf.Tensor {
    const entry = this.#entries.get(node.name);
    if (!entry) {
      throw new ModelError(
        `${this.#where}: '${node.name}' must have a value here; got none; add ${node.name} to the data`,
      );
    }
    this.#requirePoint(node, distribution, entry);
    if (entry.mask) {
      const value = rows === 'expanded' ? this.#expanded(entry) : entry.tensor;
      const mask = rows === 'expanded' ? this.#repeat(entry.mask) : entry.mask;
      return maskedLogDensity(this.#where, node, distribution, value, mask);
    }
    if (rows === 'data' && entry.expanded && this.#draws > 1) {
      // One member per data point scores all its draws: draws stand in front, as a plain broadcast axis.
      const unfolded = tf.reshape(entry.tensor, [this.#draws, this.dataRows, ...distribution.pointShape]);
      return tf.reshape(distribution.logDensity(unfolded), [this.#draws * this.dataRows]);
    }
    const value = rows === 'expanded' ? this.#expanded(entry) : entry.tensor;
    return distribution.logDensity(value);
  }

  #requirePoint(node: ModelNode, distribution: Distribution, entry: Entry): void {
    const point = entry.tensor.shape.slice(1);
    const expected = distribution.pointShape;
    if (sameShape(point, expected)) return;
    throw new ShapeError(
      `${this.#where}: '${node.name}' must have points of shape ${shapeText(expected)}, as its ${distribution.family} has; got ${shapeText(point)}; reshape the data, or fold another number of axes with product(d, axes)`,
    );
  }

  /** Averages over draws: `[draws × data points]` or `[data points]` to `[data points]`. */
  meanOverDraws(term: tf.Tensor): tf.Tensor {
    if (term.shape.length === 0 || term.shape[0] === 1)
      return tf.broadcastTo(tf.reshape(term, []), [this.dataRows]);
    if (this.#draws === 1 || term.shape[0] === this.dataRows) return term;
    return tf.mean(tf.reshape(term, [this.#draws, this.dataRows]), 0);
  }
}

/** `[draws, rows, …point]` or `[total, …point]` to `[total, …point]`. */
function foldRows(value: tf.Tensor, pointShape: readonly number[], total: number): tf.Tensor {
  return tf.reshape(value, [total, ...pointShape]);
}

function maskedLogDensity(
  where: string,
  node: ModelNode,
  distribution: Distribution,
  value: tf.Tensor,
  mask: tf.Tensor,
): tf.Tensor {
  if (mask.shape.length === 1) {
    const density = distribution.logDensity(value);
    return tf.where(mask, density, tf.zerosLike(density));
  }
  if (isProduct(distribution) && distribution.axes >= value.shape.length - 1) {
    const density = distribution.base.logDensity(value);
    const kept = tf.where(spreadLike(mask, density), density, tf.zerosLike(density));
    return tf.sum(
      kept,
      Array.from({ length: distribution.axes }, (_, i) => kept.shape.length - distribution.axes + i),
    );
  }
  throw new ModelError(
    `${where}: '${node.name}' must be a product of scalar coordinates for single ones to be missing; got ${distribution.family}; mask whole rows with a [rows] mask`,
  );
}

function spreadLike(mask: tf.Tensor, like: tf.Tensor): tf.Tensor {
  return mask.shape.length === like.shape.length ? mask : spreadRows(mask, like.shape);
}
