import * as tf from '@tensorflow/tfjs';
import { ParameterError } from '../errors.js';
import { valuesAreChecked } from '../tensor/backend.js';
import {
  describe,
  type ParameterValue,
  positionText,
  requireKnownKeys,
  shapeText,
} from '../tensor/checks.js';
import type { Transform } from '../tensor/formula.js';
import { type Operand, operandData, operandFrom } from '../tensor/operand.js';

/** An open interval that a parameter's numbers must lie in. */
export interface Domain {
  readonly words: string;
  readonly above: number;
  readonly below: number;
}

/** Any finite number. */
export const finite: Domain = {
  words: 'finite',
  above: Number.NEGATIVE_INFINITY,
  below: Number.POSITIVE_INFINITY,
};
/** A finite number above zero. */
export const aboveZero: Domain = { words: 'positive', above: 0, below: Number.POSITIVE_INFINITY };
/** A finite number from zero. */
export const fromZero: Domain = {
  words: 'zero or more',
  above: -Number.MIN_VALUE,
  below: Number.POSITIVE_INFINITY,
};
/** A logarithm of a scale or rate: its exponential must fit a double, with room for a square root's reciprocal. */
export const logarithmic: Domain = { words: 'between -700 and 700', above: -700, below: 700 };
/** A logarithm of a squared scale. */
export const logarithmicSquare: Domain = { words: 'between -1400 and 1400', above: -1400, below: 1400 };
/** Strictly between zero and one. */
export const insideUnit: Domain = { words: 'strictly between 0 and 1', above: 0, below: 1 };

/** From zero to one, both included. */
export const unitClosed: Domain = {
  words: 'from 0 to 1',
  above: -Number.MIN_VALUE,
  below: 1 + Number.EPSILON,
};

/** What to do about a logarithm that no longer fits. */
export const runaway =
  'a network that gives such values has diverged: clip its output, or lower the learning rate';

/** One way to give a parameter: its domain, the transform to the form that formulas read, and the usual cure. */
export interface Form {
  readonly domain: Domain;
  readonly transform?: Transform;
  readonly fix?: string;
  /** A value to show where something else than numbers was given; 1 unless it is named. */
  readonly example?: string;
}

/** The ways to give each parameter of a family, by option name; the first is the one that formulas read. */
export type ParameterForms = Readonly<Record<string, Readonly<Record<string, Form>>>>;

/**
 * Reads a family's options: exactly one form of each parameter, checked, in the family's order. `elsewhere` are the
 * family's other parametrizations, whose names are known but not read.
 */
export function readParameters(
  family: string,
  forms: ParameterForms,
  options: object,
  elsewhere: readonly ParameterForms[] = [],
): Record<string, Operand> {
  requireKnownKeys(family, options, [...new Set([forms, ...elsewhere].flatMap(namesOf))]);
  const given = options as Record<string, ParameterValue | undefined>;
  const result: Record<string, Operand> = {};
  for (const [parameter, ways] of Object.entries(forms)) {
    const used = Object.keys(ways).filter((name) => given[name] !== undefined);
    if (used.length !== 1) {
      const names = Object.keys(ways);
      const what =
        names.length === 1 ? `${names[0]} must be given` : `exactly one of ${names.join(', ')} must be given`;
      throw new ParameterError(
        `${family}: ${what}; got ${used.length === 0 ? 'none' : used.join(' and ')}; pass ${family}({ ${example(forms)} })`,
      );
    }
    const name = used[0]!;
    const form = ways[name]!;
    const operand = operandFrom(family, name, given[name]!, form.transform, form.example);
    checkDomain(family, name, form, operand);
    result[parameter] = operand;
  }
  return result;
}

/** The options' names: a complete choice of them first, then the other ways to give each parameter. */
function namesOf(forms: ParameterForms): string[] {
  const ways = Object.values(forms).map(Object.keys);
  return [...ways.map(([first]) => first!), ...ways.flat()];
}

function example(forms: ParameterForms): string {
  return Object.values(forms)
    .map((ways) => Object.keys(ways)[0])
    .join(', ');
}

/** The names under which options give a family's parameters, such as `mean and logVariance`. */
export function givenNames(forms: ParameterForms, options: object): string {
  const given = options as Record<string, unknown>;
  return Object.values(forms)
    .flatMap((ways) => Object.keys(ways).filter((name) => given[name] !== undefined))
    .join(' and ');
}

/** Refuses a name that is not a parameter's. */
export function requireParameterName(where: string, name: unknown, known: readonly string[]): void {
  if (typeof name === 'string' && known.includes(name)) return;
  throw new ParameterError(
    `${where}: name must be one of ${known.join(', ')}; got ${describe(name)}; ask for the form that the formulas read`,
  );
}

/** Throws where a parameter's numbers leave its domain, naming the first and where it stands. */
export function checkDomain(family: string, name: string, form: Form, operand: Operand): void {
  if (operand.source instanceof tf.Tensor && !valuesAreChecked()) return;
  const data = operandData(operand);
  const at = firstOutside(data, form.domain);
  if (at < 0) return;
  const where =
    operand.shape.length === 0
      ? ''
      : ` at ${positionText(at, operand.shape)} (shape ${shapeText(operand.shape)})`;
  const value = data[at]!;
  const { words } = form.domain;
  // What is not a number at all is not cured by another parametrization.
  const broken = Number.isNaN(value) || (!Number.isFinite(value) && form.fix !== runaway);
  const asked = broken && words !== finite.words ? `${words} and finite` : words;
  const fix = broken ? 'look for the division or logarithm that made it' : (form.fix ?? 'mend the value');
  throw new ParameterError(`${family}: ${name} must be ${asked}; got ${value}${where}; ${fix}`);
}

function firstOutside(data: Float32Array, { above, below }: Domain): number {
  for (let i = 0; i < data.length; i++) {
    const v = data[i]!;
    if (!(v > above && v < below)) return i;
  }
  return -1;
}
