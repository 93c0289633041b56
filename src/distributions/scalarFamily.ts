import * as tf from '@tensorflow/tfjs';
import { broadcastShapes, sizeOf } from '../kernels/layout.js';
import { type NoiseKind, noise } from '../random/noise.js';
import { requireStream, type Stream } from '../random/stream.js';
import type { Support } from '../support/support.js';
import { applyFormula } from '../tensor/apply.js';
import { requireTensor } from '../tensor/checks.js';
import { floatsOf, tensorOf } from '../tensor/engine.js';
import { type Formula, kernel } from '../tensor/formula.js';
import { detachedOperand, type Operand } from '../tensor/operand.js';
import { type Distribution, drawShape, drawThenScore, type Route } from './distribution.js';
import { givenNames, type ParameterForms, readParameters, requireParameterName } from './parameters.js';

/** Everything a scalar family is: its formulas, by name. Each formula names the parameters it reads. */
export interface ScalarDefinition<Family extends string, R extends Route> {
  readonly family: Family;
  readonly route: R;
  readonly support: Support;
  readonly parameters: ParameterForms;
  /** Reads `x`, then parameters. */
  readonly logDensity: Formula;
  /**
   * A formula of standard noise and parameters; or an exact sampler over the broadcast parameters, and the
   * formula that carries what it drew to the draw and its gradient.
   */
  readonly draw:
    | { readonly noise: NoiseKind; readonly formula: Formula }
    | {
        readonly sampler: (stream: Stream, parameters: Record<string, Float32Array>) => Float32Array;
        readonly formula?: Formula;
      };
  /** Formulas of the parameters alone. */
  readonly summaries?: Readonly<Record<string, Formula>>;
  /** Formulas of an argument, then parameters. */
  readonly functions?: Readonly<Record<string, Formula>>;
  /** Checks across parameters, such as an order between them. */
  check?(parameters: Record<string, Operand>): void;
}

/** What the library's own parts may ask of a scalar distribution beyond its public face. */
export interface ScalarDistribution<Family extends string = string, R extends Route = Route>
  extends Distribution<Family, R> {
  readonly operands: Readonly<Record<string, Operand>>;
  /** Log density summed over the last `axes` axes of the broadcast array, in one pass. */
  foldedLogDensity(x: tf.Tensor, axes: number): tf.Tensor;
  /** A parameter, in the form that the family's formulas read, as a differentiable tensor. */
  parameter(name: string): tf.Tensor;
}

/** Whether a distribution is made by {@link scalarFamily}. */
export function isScalar(d: Distribution): d is ScalarDistribution {
  return 'operands' in d && 'foldedLogDensity' in d;
}

const identity = kernel('identity', (v) => v.clone());

/** Makes a family's factory from its definition. */
export function scalarFamily<Family extends string, R extends Route>(
  definition: ScalarDefinition<Family, R>,
): (options: object) => ScalarDistribution<Family, R> {
  const { family, parameters } = definition;
  return (options) => {
    const operands = readParameters(family, parameters, options);
    const arrayShape = broadcastShapes(
      family,
      Object.values(operands).map((o) => o.shape),
      givenNames(parameters, options),
    );
    definition.check?.(operands);
    return member(definition, operands, Object.freeze(arrayShape));
  };
}

function member<Family extends string, R extends Route>(
  definition: ScalarDefinition<Family, R>,
  operands: Record<string, Operand>,
  arrayShape: readonly number[],
): ScalarDistribution<Family, R> {
  const { family, route, support } = definition;
  // A formula's leading arguments (a point, noise) are given; the rest are parameters, found by name.
  const pick = (formula: Formula, given: readonly Operand[]): Operand[] => [
    ...given,
    ...formula.parameters.slice(given.length).map((name) => operands[name]!),
  ];
  const point = (name: string, x: tf.Tensor): Operand => {
    const letter = name === 'quantile' ? 'p' : 'x';
    requireTensor(`${family}.${name}`, letter, x);
    broadcastShapes(`${family}.${name}`, [x.shape, arrayShape], `${letter} and the arrayShape`);
    return { shape: x.shape, source: x, transform: undefined, constant: false };
  };
  const score = (x: tf.Tensor, fold: number): tf.Tensor =>
    applyFormula(
      `${family}.logDensity`,
      definition.logDensity,
      pick(definition.logDensity, [point('logDensity', x)]),
      { shape: arrayShape, fold },
    );

  const draw = (stream: Stream, count?: number): tf.Tensor => {
    requireStream(`${family}.draw`, stream);
    const shape = drawShape(`${family}.draw`, count, arrayShape);
    const how = definition.draw;
    const source =
      'noise' in how ? noise(stream, how.noise, sizeOf(shape)) : how.sampler(stream, spread(shape));
    if (!how.formula) return tensorOf(source, shape);
    const drawn = pick(how.formula, [{ shape, source, transform: undefined, constant: true }]);
    return applyFormula(
      `${family}.draw`,
      how.formula,
      route === 'pathwise' ? drawn : drawn.map(detachedOperand),
      { shape },
    );
  };
  const spread = (shape: readonly number[]): Record<string, Float32Array> =>
    Object.fromEntries(
      Object.entries(operands).map(([name, o]) => [name, broadcastValues(family, o, shape)]),
    );

  const methods: Record<string, unknown> = {};
  for (const [name, formula] of Object.entries(definition.summaries ?? {})) {
    methods[name] = () =>
      applyFormula(`${family}.${name}`, formula, pick(formula, []), { shape: arrayShape });
  }
  for (const [name, formula] of Object.entries(definition.functions ?? {})) {
    methods[name] = (x: tf.Tensor) =>
      applyFormula(`${family}.${name}`, formula, pick(formula, [point(name, x)]), { shape: arrayShape });
  }
  return Object.freeze({
    family,
    route,
    support,
    arrayShape,
    pointShape: Object.freeze([]),
    operands,
    draw,
    drawScored: drawThenScore(draw, (x) => score(x, 0)),
    logDensity: (x: tf.Tensor) => score(x, 0),
    foldedLogDensity: score,
    parameter: (name: string) => {
      requireParameterName(`${family}.parameter`, name, Object.keys(operands));
      const operand = operands[name]!;
      return applyFormula(`${family}.parameter`, identity, [operand], { shape: operand.shape });
    },
    detached: () =>
      member(
        definition,
        Object.fromEntries(Object.entries(operands).map(([name, o]) => [name, detachedOperand(o)])),
        arrayShape,
      ),
    ...methods,
  }) as unknown as ScalarDistribution<Family, R>;
}

/** A parameter's numbers in the formulas' form, broadcast to `shape`. */
function broadcastValues(family: string, operand: Operand, shape: readonly number[]): Float32Array {
  return tf.tidy(() => floatsOf(applyFormula(family, identity, [detachedOperand(operand)], { shape })));
}
