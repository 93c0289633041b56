import type * as tf from '@tensorflow/tfjs';
import { type Formula, isKernel, kernel } from '../tensor/formula.js';
import type { Route } from './distribution.js';
import type { ParameterForms } from './parameters.js';
import { kernelName, kernelNamed } from './placed.js';
import type { ScalarDefinition } from './scalarFamily.js';

/**
 * A parametrization whose parameters give several of a family's own together, such as a mean and a dispersion
 * that give a shape and a scale. Every formula has a kernel of its own in it, so that nothing is rounded between.
 */
export interface Joint {
  /** The front of its kernels' names, such as `gammaMeanDispersion`. */
  readonly kernels: string;
  readonly parameters: ParameterForms;
  /** The family's own parameters from these, composed; the kernels are named `<kernels><Parameter>`. */
  readonly gives: Readonly<Record<string, (...values: tf.Tensor[]) => tf.Tensor>>;
  /** Composed forms, by kernel, where going through the family's own parameters would lose digits. */
  readonly composed?: Readonly<Record<string, (...values: tf.Tensor[]) => tf.Tensor>>;
}

/** How the family's own parameter `name` follows from the joint ones. */
export function conversion(joint: Joint, name: string): Formula {
  return kernelNamed(kernelName(joint.kernels, name), joint.gives[name]!);
}

/** The family's definition in the joint parameters. */
export function jointDefinition<Family extends string, R extends Route>(
  definition: ScalarDefinition<Family, R>,
  joint: Joint,
): ScalarDefinition<Family, R> {
  const base = definition.kernels!;
  const names = Object.keys(joint.parameters);
  const carried = (formula: Formula): Formula => {
    const name = joint.kernels + formula.name.slice(base.length);
    // A formula that reads none of the parameters is the same in all parametrizations.
    if (!isKernel(name)) return formula;
    const own = joint.composed?.[name];
    const made = kernel(name, (...values) => {
      if (own) return own(...values);
      const lead = values.length - names.length;
      const joints = values.slice(lead);
      let given = 0;
      return formula.composed(
        ...formula.parameters.map((p) => (p in joint.gives ? joint.gives[p]!(...joints) : values[given++]!)),
      );
    });
    return formula.kernelAlone ? { ...made, kernelAlone: true } : made;
  };
  const all = (found: Readonly<Record<string, Formula>> | undefined): Record<string, Formula> =>
    Object.fromEntries(Object.entries(found ?? {}).map(([name, f]) => [name, carried(f)]));
  const { draw, logDraws = {} } = definition;
  return {
    ...definition,
    parameters: joint.parameters,
    logDensity: carried(definition.logDensity),
    draw: { ...draw, ...(draw.formula ? { formula: carried(draw.formula) } : {}) } as typeof draw,
    logDraws: Object.fromEntries(
      Object.entries(logDraws).map(([name, how]) => [name, { ...how, formula: carried(how.formula) }]),
    ),
    summaries: all(definition.summaries),
    functions: all(definition.functions),
  };
}
