import * as tf from '@tensorflow/tfjs';
import type { NoiseKind } from '../random/noise.js';
import type { Stream } from '../random/stream.js';
import type { Support } from '../support/support.js';
import { choose, when } from '../tensor/composedMath.js';
import { type Formula, isKernel } from '../tensor/formula.js';
import { noComposedForm } from '../tensor/noComposedForm.js';
import type { Operand } from '../tensor/operand.js';
import type { Joint } from './joint.js';
import { affineFormula } from './locationScale.js';
import type { ParameterForms } from './parameters.js';
import { kernelName, kernelNamed, placedKernel, placedKinds } from './placed.js';
import { type ScalarDefinition, type ScalarDistribution, scalarFamily } from './scalarFamily.js';

// The routes by which the library's own families are made. Each formula is a compiled kernel named after the
// family, such as `gumbelLogDensity`; what is given here is its composed form.

type Composed = (...values: tf.Tensor[]) => tf.Tensor | number;
type Sampler = (stream: Stream, parameters: Record<string, Float32Array>) => Float32Array;

/** What has a closed form: the composed form of the family's kernel of that name, or a formula that it shares. */
type Form = Composed | Formula;

/** What a family can have beside its log density and its draw. */
export type OwnForms = Partial<
  Record<
    | 'mean'
    | 'variance'
    | 'mode'
    | 'entropy'
    | 'cdf'
    | 'survival'
    | 'logCdf'
    | 'logSurvival'
    | 'quantile'
    | 'upperQuantile',
    Form
  >
>;

interface OwnFamily<Family extends string> {
  readonly family: Family;
  /** The front of its kernels' names; the family's own name unless given. */
  readonly kernels?: string;
  readonly support: Support;
  readonly parameters: ParameterForms;
  /** Parameters that are the same for all members, such as the scale of a chi-squared. */
  readonly fixed?: Readonly<Record<string, number>>;
  /** Parametrizations that give several parameters together. */
  readonly joints?: readonly Joint[];
  readonly logDensity: Form;
  readonly forms: OwnForms;
  check?(parameters: Record<string, Operand>): void;
}

/** A family with a scale, and a location where it has a parameter of that name; composed forms are in z. */
export interface OwnLocationScale<Family extends string> extends OwnFamily<Family> {
  /** Standard noise: the standard draw itself, or what the kernel `<family>Draw` makes of it. */
  readonly draw: { readonly noise: NoiseKind | readonly NoiseKind[]; readonly composed?: Form };
}

/** A family whose draws are a function of standard noise and the parameters. */
export interface OwnQuantile<Family extends string> extends OwnFamily<Family> {
  readonly draw: { readonly noise: NoiseKind | readonly NoiseKind[]; readonly composed: Form };
}

/** A family with an exact sampler; the kernel `<family>Draw` has the draw's implicit derivatives. */
export interface OwnImplicit<Family extends string> extends OwnFamily<Family> {
  readonly sampler: Sampler;
  /** Another sampler for the draw's logarithm, whose derivatives are those of the kernel `<family>LogDraw`. */
  readonly logSampler?: Sampler;
  /** One for its log odds, whose derivatives are those of the kernel `<family>LogOddsDraw`. */
  readonly logOddsSampler?: Sampler;
  /** Whether the composed forms are the standard member's, in z. */
  readonly placed?: boolean;
}

/** A map from the real numbers, rising, in composed forms: see {@link pushforwardRoute}. */
export interface OwnMap {
  apply(z: tf.Tensor): tf.Tensor;
  /** The inverse, of points inside the image. */
  invert(x: tf.Tensor): tf.Tensor;
  /** log |dx/dz| at z. */
  logVolume(z: tf.Tensor): tf.Tensor;
  /** Whether a point lies in the image, and whether it lies above it. */
  inside(x: tf.Tensor): tf.Tensor;
  above(x: tf.Tensor): tf.Tensor;
  /** A point inside. */
  readonly somewhere: number;
}

/** A family of what a map makes of another: `base` has the composed forms of the one before the map. */
export interface OwnPushforward<Family extends string> extends Omit<OwnFamily<Family>, 'logDensity'> {
  readonly map: OwnMap;
  readonly base: {
    readonly logDensity: Composed;
    readonly draw: Composed;
    readonly cdf: Composed;
    readonly survival: Composed;
    readonly logCdf: Composed;
    readonly logSurvival: Composed;
    readonly quantile: Composed;
    readonly upperQuantile: Composed;
  };
  readonly noise: NoiseKind;
}

type Factory<Family extends string> = (options: object) => ScalarDistribution<Family, 'pathwise'>;

/** The formulas of a family: those of any member, or carried from the standard one where `located` says how. */
function formulas<Family extends string>(
  own: OwnFamily<Family>,
  located: boolean | undefined,
): Pick<ScalarDefinition<Family, 'pathwise'>, 'logDensity' | 'summaries' | 'functions'> & {
  named(name: string, form: Form): Formula;
} {
  const named = (name: string, composed: Form): Formula => {
    if (typeof composed !== 'function') return composed;
    const front = kernelName(own.kernels ?? own.family, name);
    // A special function may have the name already.
    const full = isKernel(`${front}Of`) ? `${front}Of` : front;
    return located === undefined
      ? kernelNamed(full, composed as (...values: tf.Tensor[]) => tf.Tensor)
      : placedKernel(full, placedKinds[name]!, located, composed);
  };
  const pick = (names: readonly (keyof OwnForms)[]): Record<string, Formula> =>
    Object.fromEntries(
      names.flatMap((name) => {
        const form = own.forms[name];
        return form === undefined ? [] : [[name, named(name, form)]];
      }),
    );
  return {
    logDensity: named('logDensity', own.logDensity),
    summaries: pick(['mean', 'variance', 'mode', 'entropy']),
    functions: pick(['cdf', 'survival', 'logCdf', 'logSurvival', 'quantile', 'upperQuantile']),
    named,
  };
}

function common<Family extends string>(own: OwnFamily<Family>) {
  const { family, support, parameters, fixed, joints, kernels, check } = own;
  return {
    family,
    route: 'pathwise' as const,
    support,
    parameters,
    kernels: kernels ?? family,
    ...(fixed ? { fixed } : {}),
    ...(joints ? { joints } : {}),
    ...(check ? { check } : {}),
  };
}

/** A family by its standard member: location and scale follow. */
export function locationScaleRoute<Family extends string>(own: OwnLocationScale<Family>): Factory<Family> {
  const { named, ...found } = formulas(own, 'location' in own.parameters);
  const { noise, composed } = own.draw;
  return scalarFamily({
    ...common(own),
    ...found,
    draw: { noise, formula: composed ? named('draw', composed) : affineFormula },
  });
}

/** A family by a function of noise, which is its quantile function read at the noise's probability. */
export function quantileRoute<Family extends string>(own: OwnQuantile<Family>): Factory<Family> {
  const { named, ...found } = formulas(own, undefined);
  const { noise, composed } = own.draw;
  return scalarFamily({ ...common(own), ...found, draw: { noise, formula: named('draw', composed) } });
}

/** A family by a map of another family's points: density, tails, quantiles and draws follow. */
export function pushforwardRoute<Family extends string>(own: OwnPushforward<Family>): Factory<Family> {
  const { map, base, noise, forms, ...rest } = own;
  /** Whether a point lies in the image, and what the map makes it of; of a point inside, where it does not. */
  const before = (x: tf.Tensor): { inside: tf.Tensor; z: tf.Tensor } => {
    const inside = map.inside(x);
    return { inside, z: map.invert(when(inside, x, tf.fill(x.shape, map.somewhere))) };
  };
  const tail =
    (form: Composed, below: number, above: number): Composed =>
    (x, ...parameters) => {
      const { inside, z } = before(x!);
      const ends = when(map.above(x!), tf.fill(x!.shape, above), tf.fill(x!.shape, below));
      return tf.add(
        choose(inside, form(z, ...parameters) as tf.Tensor, 0),
        choose(tf.logicalNot(inside), ends, 0),
      );
    };
  const mapped =
    (form: Composed): Composed =>
    (p, ...parameters) =>
      map.apply(form(p!, ...parameters) as tf.Tensor);
  return quantileRoute({
    ...rest,
    logDensity: (x, ...parameters) => {
      const { inside, z } = before(x!);
      const value = tf.sub(base.logDensity(z, ...parameters), map.logVolume(z));
      return choose(inside, value, Number.NEGATIVE_INFINITY);
    },
    draw: { noise, composed: mapped(base.draw) },
    forms: {
      cdf: tail(base.cdf, 0, 1),
      survival: tail(base.survival, 1, 0),
      logCdf: tail(base.logCdf, Number.NEGATIVE_INFINITY, 0),
      logSurvival: tail(base.logSurvival, 0, Number.NEGATIVE_INFINITY),
      quantile: mapped(base.quantile),
      upperQuantile: mapped(base.upperQuantile),
      ...forms,
    },
  });
}

/** A family by an exact sampler; the draw's gradient comes by implicit differentiation. */
export function implicitRoute<Family extends string>(own: OwnImplicit<Family>): Factory<Family> {
  const { named: _, ...found } = formulas(own, own.placed ? 'location' in own.parameters : undefined);
  const slope = (name: string): Formula => {
    const full = `${own.kernels ?? own.family}${name}`;
    return { ...kernelNamed(full, noComposedForm(full)), kernelAlone: true };
  };
  return scalarFamily({
    ...common(own),
    ...found,
    draw: { sampler: own.sampler, formula: slope('Draw') },
    logDraws: {
      ...(own.logSampler ? { drawLog: { sampler: own.logSampler, formula: slope('LogDraw') } } : {}),
      ...(own.logOddsSampler
        ? { drawLogOdds: { sampler: own.logOddsSampler, formula: slope('LogOddsDraw') } }
        : {}),
    },
  });
}
