import type * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import {
  binary,
  count,
  interval,
  positive,
  ray,
  real,
  type Support,
  type SupportName,
  unitInterval,
} from '../support/support.js';
import { describe, type ParameterValue, requireKnownKeys } from '../tensor/checks.js';
import type { Formula } from '../tensor/formula.js';
import type {
  Distribution,
  HasCdf,
  HasEntropy,
  HasLogCdf,
  HasLogSurvival,
  HasMean,
  HasMode,
  HasQuantile,
  HasSurvival,
  HasUpperQuantile,
  HasVariance,
  Route,
} from './distribution.js';
import { type FamilyFormula, formulaFrom } from './familyFormula.js';
import { familyNames } from './familyNames.js';
import { aboveZero, type Domain, finite, fromZero, insideUnit, type ParameterForms } from './parameters.js';

/** What a parameter of a user's family may be. */
export type ParameterDomain = 'real' | 'positive' | 'nonNegative' | 'unitInterval';

const domains: Record<ParameterDomain, Domain> = {
  real: finite,
  positive: aboveZero,
  nonNegative: fromZero,
  unitInterval: insideUnit,
};

/** Scalar sets that a user's family can live on. */
export type ScalarSupport = Exclude<SupportName, 'circle' | 'categories' | 'realVector'>;

const supports: Record<ScalarSupport, Support> = {
  real,
  positive,
  unitInterval,
  interval,
  ray,
  binary,
  count,
};

/** The closed forms that a definition may have. */
export interface ClosedFormulas {
  /** The mean, from the parameters. */
  readonly mean?: FamilyFormula;
  /** The variance, from the parameters. */
  readonly variance?: FamilyFormula;
  /** The mode, from the parameters. */
  readonly mode?: FamilyFormula;
  /** The entropy in nats, from the parameters. */
  readonly entropy?: FamilyFormula;
  /** The distribution function, from the point and the parameters. */
  readonly cdf?: FamilyFormula;
  /** Its complement, accurate where it is small. */
  readonly survival?: FamilyFormula;
  /** The logarithm of the distribution function. */
  readonly logCdf?: FamilyFormula;
  /** The logarithm of the survival function. */
  readonly logSurvival?: FamilyFormula;
  /** The inverse of the distribution function, from a probability and the parameters. */
  readonly quantile?: FamilyFormula;
  /** The inverse of the survival function, from a probability and the parameters. */
  readonly upperQuantile?: FamilyFormula;
}

/** What every definition of a user's family has. */
export interface FamilyDefinition<Family extends string, Names extends string> {
  /** A name of its own, by which divergences are found. */
  readonly family: Family;
  /** The set it lives on; all real numbers unless given. */
  readonly support?: ScalarSupport;
  /** Its parameters and what each may be, in the order that formulas read them. */
  readonly parameters: { readonly [Name in Names]: ParameterDomain };
}

/** The closed forms that a family has because its definition has them. */
export type ClosedOf<Definition> = (Definition extends { mean: unknown } ? HasMean : unknown) &
  (Definition extends { variance: unknown } ? HasVariance : unknown) &
  (Definition extends { mode: unknown } ? HasMode : unknown) &
  (Definition extends { entropy: unknown } ? HasEntropy : unknown) &
  (Definition extends { cdf: unknown } ? HasCdf : unknown) &
  (Definition extends { survival: unknown } ? HasSurvival : unknown) &
  (Definition extends { logCdf: unknown } ? HasLogCdf : unknown) &
  (Definition extends { logSurvival: unknown } ? HasLogSurvival : unknown) &
  (Definition extends { quantile: unknown } ? HasQuantile : unknown) &
  (Definition extends { upperQuantile: unknown } ? HasUpperQuantile : unknown);

/** A member of a user's family. */
export type FamilyMember<
  Family extends string,
  R extends Route,
  Names extends string,
  Definition,
> = Distribution<Family, R> &
  ClosedOf<Definition> & {
    /** A parameter, differentiable. */
    parameter(name: Names): tf.Tensor;
  };

/** The factory of a user's family. */
export type FamilyFactory<Family extends string, R extends Route, Names extends string, Definition> = (
  options: {
    readonly [Name in Names]: ParameterValue;
  },
) => FamilyMember<Family, R, Names, Definition>;

/** What all routes read from a definition in the same way. */
export interface CommonParts {
  readonly support: Support;
  readonly names: readonly string[];
  readonly parameters: ParameterForms;
}

/** Checks the common part of a definition; `others` are the keys it may have beside the common ones. */
export function readDefinition(
  where: string,
  definition: FamilyDefinition<string, string>,
  others: readonly string[],
): CommonParts {
  // The compiler lets keys it does not know pass here, since it infers the definition's own type.
  requireKnownKeys(where, definition, [
    'family',
    'support',
    'parameters',
    'mean',
    'variance',
    'mode',
    'entropy',
    'cdf',
    'survival',
    'logCdf',
    'logSurvival',
    'quantile',
    'upperQuantile',
    ...others,
  ]);
  const { family, support = 'real', parameters } = definition;
  if (typeof family !== 'string' || family === '' || /[|<>]/.test(family)) {
    throw new ParameterError(
      `${where}: family must be a name without |, < and >; got ${describe(family)}; pass for example family: 'triangle'`,
    );
  }
  if (familyNames.includes(family)) {
    throw new ParameterError(
      `${where}: family must have a name of its own; got '${family}', which the library has; choose another`,
    );
  }
  if (!Object.hasOwn(supports, support)) {
    throw new ParameterError(
      `${where}: support of ${family} must be one of ${Object.keys(supports).join(', ')}; got ${describe(support)}; name one of these`,
    );
  }
  if (typeof parameters !== 'object' || parameters === null || Object.keys(parameters).length === 0) {
    throw new ParameterError(
      `${where}: parameters of ${family} must map names to domains; got ${describe(parameters)}; pass for example { location: 'real', scale: 'positive' }`,
    );
  }
  const forms: Record<string, ParameterForms[string]> = {};
  for (const [name, domain] of Object.entries(parameters)) {
    if (!Object.hasOwn(domains, domain)) {
      throw new ParameterError(
        `${where}: the domain of ${family}'s ${name} must be one of ${Object.keys(domains).join(', ')}; got ${describe(domain)}; name one of these`,
      );
    }
    forms[name] = { [name]: { domain: domains[domain] } };
  }
  return { support: supports[support], names: Object.keys(parameters), parameters: forms };
}

/** The closed forms of a definition, split into those of parameters alone and those of a point too. */
export function closedFormulas(
  where: string,
  names: readonly string[],
  given: ClosedFormulas,
): { summaries: Record<string, Formula>; functions: Record<string, Formula> } {
  const pick = (keys: readonly (keyof ClosedFormulas)[], leading: readonly string[]) =>
    Object.fromEntries(
      keys
        .filter((key) => given[key] !== undefined)
        .map((key) => [key, formulaFrom(`${where}.${key}`, [...leading, ...names], given[key])]),
    );
  return {
    summaries: pick(['mean', 'variance', 'mode', 'entropy'], []),
    functions: {
      ...pick(['cdf', 'survival', 'logCdf', 'logSurvival'], ['x']),
      ...pick(['quantile', 'upperQuantile'], ['p']),
    },
  };
}
