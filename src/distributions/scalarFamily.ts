import * as tf from '@tensorflow/tfjs';
import { broadcastShapes, sizeOf } from '../kernels/layout.js';
import { type NoiseKind, noise } from '../random/noise.js';
import { requireStream, type Stream } from '../random/stream.js';
import type { Support } from '../support/support.js';
import { applyFormula } from '../tensor/apply.js';
import { requireTensor } from '../tensor/checks.js';
import { floatsOf, tensorOf } from '../tensor/engine.js';
import { type Formula, kernel } from '../tensor/formula.js';
import { detachedOperand, type Operand, operandFrom } from '../tensor/operand.js';
import { type Distribution, drawShape, drawThenScore, type Route } from './distribution.js';
import { conversion, type Joint, jointDefinition } from './joint.js';
import { givenNames, type ParameterForms, readParameters, requireParameterName } from './parameters.js';

type Sampler = (stream: Stream, parameters: Record<string, Float32Array>) => Float32Array;

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
    | { readonly noise: NoiseKind | readonly NoiseKind[]; readonly formula: Formula }
    | { readonly sampler: Sampler; readonly formula?: Formula };
  /** Draws of functions of the draw, such as its logarithm, by method name; of the same draw for the same stream. */
  readonly logDraws?: Readonly<Record<string, { readonly sampler: Sampler; readonly formula: Formula }>>;
  /** Formulas of the parameters alone. */
  readonly summaries?: Readonly<Record<string, Formula>>;
  /** Formulas of an argument, then parameters. */
  readonly functions?: Readonly<Record<string, Formula>>;
  /** The front of the kernels' names, for joint parametrizations. */
  readonly kernels?: string;
  /** Parametrizations that give several parameters together. */
  readonly joints?: readonly Joint[];
  /** Parameters that are the same for all members. */
  readonly fixed?: Readonly<Record<string, number>>;
  /** Checks across parameters, such as an order between them. */
  check?(parameters: Record<string, Operand>): void;
}

/** What the library's own parts may ask of a scalar distribution beyond its public face. */
export interface ScalarDistribution<Family extends string = string, R extends Route = Route>
  extends Distribution<Family, R> {
  readonly operands: Readonly<Record<string, Operand>>;
  /**
   * The parameters as the family's own formulas read them, whatever the parametrization: those of a joint one are
   * computed, and rounded to float32, here. To be called inside a tidy.
   */
  naturalOperands(): Readonly<Record<string, Operand>>;
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
  const { family, joints = [], fixed = {} } = definition;
  const constants = Object.fromEntries(
    Object.entries(fixed).map(([name, value]) => [name, operandFrom(family, name, value)]),
  );
  const others = joints.map((joint) => ({ joint, definition: jointDefinition(definition, joint) }));
  return (options) => {
    const found = others.find(({ joint }) => isGiven(joint.parameters, definition.parameters, options));
    const used = found?.definition ?? definition;
    const elsewhere = joints.map((j) => j.parameters);
    const operands = readParameters(family, used.parameters, options, found ? [] : elsewhere);
    const arrayShape = broadcastShapes(
      family,
      Object.values(operands).map((o) => o.shape),
      givenNames(used.parameters, options),
    );
    definition.check?.(operands);
    return member(used, found?.joint, { ...operands, ...constants }, Object.freeze(arrayShape));
  };
}

/** Whether options speak of a joint parametrization: they name one of its parameters that the plain one lacks. */
function isGiven(joint: ParameterForms, plain: ParameterForms, options: object): boolean {
  const own = Object.values(plain).flatMap(Object.keys);
  const given = (options ?? {}) as Record<string, unknown>;
  return Object.values(joint)
    .flatMap(Object.keys)
    .some((name) => !own.includes(name) && given[name] !== undefined);
}

function member<Family extends string, R extends Route>(
  definition: ScalarDefinition<Family, R>,
  joint: Joint | undefined,
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
    const letter = name === 'quantile' || name === 'upperQuantile' ? 'p' : 'x';
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

  const drawBy =
    (name: string, how: typeof definition.draw) =>
    (stream: Stream, count?: number): tf.Tensor => {
      requireStream(`${family}.${name}`, stream);
      const shape = drawShape(`${family}.${name}`, count, arrayShape);
      const sources =
        'noise' in how
          ? [how.noise].flat().map((kind) => noise(stream, kind, sizeOf(shape)))
          : [how.sampler(stream, spread(shape))];
      if (!how.formula) return tensorOf(sources[0]!, shape);
      const drawn = pick(
        how.formula,
        sources.map((source) => ({ shape, source, transform: undefined, constant: true })),
      );
      return applyFormula(
        `${family}.${name}`,
        how.formula,
        route === 'pathwise' ? drawn : drawn.map(detachedOperand),
        { shape },
      );
    };
  const draw = drawBy('draw', definition.draw);
  const naturalOperands = (): Record<string, Operand> =>
    joint
      ? Object.fromEntries(
          Object.keys(joint.gives).map((name) => {
            const formula = conversion(joint, name);
            const value = applyFormula(family, formula, pick(formula, []));
            return [name, operandFrom(family, name, value)];
          }),
        )
      : operands;
  const spread = (shape: readonly number[]): Record<string, Float32Array> =>
    tf.tidy(() =>
      Object.fromEntries(
        Object.entries(naturalOperands()).map(([name, o]) => [name, broadcastValues(family, o, shape)]),
      ),
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
  for (const [name, how] of Object.entries(definition.logDraws ?? {})) methods[name] = drawBy(name, how);
  return Object.freeze({
    family,
    route,
    support,
    arrayShape,
    pointShape: Object.freeze([]),
    operands,
    naturalOperands,
    draw,
    drawScored: drawThenScore(draw, (x) => score(x, 0)),
    logDensity: (x: tf.Tensor) => score(x, 0),
    foldedLogDensity: score,
    parameter: (name: string) => {
      const given = Object.keys(joint?.gives ?? {});
      requireParameterName(`${family}.parameter`, name, [...new Set([...given, ...Object.keys(operands)])]);
      if (joint && given.includes(name)) {
        const formula = conversion(joint, name);
        return applyFormula(`${family}.parameter`, formula, pick(formula, []));
      }
      const operand = operands[name]!;
      return applyFormula(`${family}.parameter`, identity, [operand], { shape: operand.shape });
    },
    detached: () =>
      member(
        definition,
        joint,
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
