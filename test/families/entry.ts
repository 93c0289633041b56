import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type * as fc from 'fast-check';
import type * as library from '../../src/index.js';

type Scalar = (...values: number[]) => number;

/** One way to give a family's parameters, with values that it takes. */
export type Parametrization = Readonly<Record<string, number | number[] | number[][]>>;

/** Everything that the tests need to know of a scalar family beyond its formulas and its reference values. */
export interface FamilyEntry {
  readonly factory: (options: never) => library.Distribution;
  /** Every parametrization with values for which 0.5 is a point; the first is in the formulas' parameters. */
  readonly parametrizations: readonly Parametrization[];
  /** Random parameters of each parametrization, for the laws. */
  readonly arbitraries: readonly fc.Arbitrary<object>[];
  /** Options that the factory must refuse. */
  readonly invalid: readonly object[];
  /** Its divergence from another member of its family has a closed form. */
  readonly divergence: boolean;
  /** The other members for the divergence, where not just any will do. */
  readonly others?: fc.Arbitrary<object>;
  /** Three members in the formulas' parameters, and the seed of their draws. */
  readonly members: Readonly<Record<string, readonly number[]>>;
  readonly seed: number;
  /** The distribution function and the quantile in double precision, from the point and the formulas' parameters. */
  readonly cdf: Scalar;
  readonly quantile: Scalar;
  /** Members with extreme parameters, whose draws are tested too; and the survival function, accurate where small. */
  readonly extremes: readonly Readonly<Record<string, number>>[];
  readonly survival: Scalar;
  /** No mean or no variance: the pathwise gradient is tested on bounded functions alone. */
  readonly heavyTailed?: boolean;
  /** Roundings that the composed forms make, in units of 2^-24 of the terms and of the arguments' effects. */
  readonly roundings: number;
  /** Functions without a composed form. */
  readonly kernelOnly?: readonly string[];
  /** Parameters that are the same for all members, which the family's kernels read too. */
  readonly fixed?: Readonly<Record<string, number>>;
  /** What a parameter is when a function does not depend on it. */
  readonly resting?: Readonly<Record<string, number>>;
  /** What a parameter's errors ask for, a number that they refuse and the cure, where its name alone does not say. */
  readonly domains?: Readonly<Record<string, { words: string; outside?: number; fix: string }>>;
}

const files = readdirSync(import.meta.dirname).filter(
  (name) => name.endsWith('.ts') && !['entry.ts', 'parameters.ts'].includes(name),
);

/** The families that have a file of their own here, by name. */
export const entries: Readonly<Record<string, FamilyEntry>> = Object.fromEntries(
  await Promise.all(
    files.map(async (file) => {
      const module = (await import(join(import.meta.dirname, file))) as { entry: FamilyEntry };
      return [file.replace('.ts', ''), module.entry] as const;
    }),
  ),
);
