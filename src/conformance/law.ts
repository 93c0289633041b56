import * as tf from '@tensorflow/tfjs';
import * as fc from 'fast-check';
import { ParameterError } from '../errors.js';
import { describe, requireCount, requireKnownKeys } from '../tensor/checks.js';
import { LawError, Violation } from './lawError.js';

/** A named check. It needs no test runner: it returns, or rejects with a {@link LawError}. */
export interface Law {
  /** The family and the law, for example `normal: the log density integrates to one`. */
  readonly name: string;
  /** Tries the law on random parameters. */
  check(): Promise<void>;
}

/** How laws are tried. */
export interface LawOptions {
  /** Seed of the random parameters and of every stream; 20260 unless given. */
  readonly seed?: number;
  /** How many random parameters each law is tried on; 6 unless given. */
  readonly runs?: number;
}

/** What all laws of one subject share. */
export interface Setting {
  readonly title: string;
  readonly seed: number;
  readonly runs: number;
}

/** How often a failing law is tried on simpler parameters. */
const shrinkBudget = 60;

/** The options, completed. */
export function readSetting(where: string, title: string, options: LawOptions, more: string[]): Setting {
  requireKnownKeys(where, options, ['seed', 'runs', ...more]);
  const { seed = 20260, runs = 6 } = options;
  if (!Number.isSafeInteger(seed)) {
    throw new ParameterError(
      `${where}: seed must be a whole number; got ${describe(seed)}; pass for example 1`,
    );
  }
  requireCount(where, 'runs', runs, 1);
  return { title, seed, runs };
}

/** A law over random values: `property` throws a {@link Violation} where it does not hold. */
export function law<T>(
  setting: Setting,
  name: string,
  arbitrary: fc.Arbitrary<T>,
  property: (value: T) => void,
): Law {
  const { title, seed, runs } = setting;
  return {
    name: `${title}: ${name}`,
    async check() {
      await tf.ready();
      let left = Number.POSITIVE_INFINITY;
      const limited = fc.property(arbitrary, (value) => {
        if (left <= 0) return;
        try {
          property(value);
          left--;
        } catch (error) {
          left = Math.min(left, shrinkBudget) - 1;
          throw error;
        }
      });
      const result = fc.check(limited, { seed, numRuns: runs });
      if (!result.failed) return;
      const parameters = fc.stringify(result.counterexample?.[0]);
      throw lawError(
        title,
        name,
        result.errorInstance,
        `parameters ${parameters} (shrunk ${result.numShrinks} times), seed ${seed}, path ${result.counterexamplePath}`,
      );
    },
  };
}

/** A law that depends on no random parameters. */
export function fixedLaw(setting: Setting, name: string, property: () => void): Law {
  return {
    name: `${setting.title}: ${name}`,
    async check() {
      await tf.ready();
      try {
        property();
      } catch (error) {
        throw lawError(setting.title, name, error, `seed ${setting.seed}`);
      }
    },
  };
}

function lawError(title: string, name: string, cause: unknown, circumstances: string): LawError {
  const what =
    cause instanceof Violation
      ? cause.message
      : `${name}: it must hold; got ${cause instanceof Error ? `${cause.name}: ${cause.message}` : describe(cause)}; look at what throws`;
  return new LawError(`${title}: ${what}; ${circumstances}`, { cause });
}
