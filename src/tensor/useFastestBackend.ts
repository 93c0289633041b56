import * as tf from '@tensorflow/tfjs';
import { EnvironmentError, ParameterError } from '../errors.js';
import { describe, requireKnownKeys } from './checks.js';

/** Options of {@link useFastestBackend}. */
export interface BackendOptions {
  /**
   * Loads the WASM backend. Left out, the package `@tensorflow/tfjs-backend-wasm` is looked for at run time,
   * which works in Node; a bundler needs to see the import: `() => import('@tensorflow/tfjs-backend-wasm')`.
   */
  readonly loadWasm?: () => Promise<unknown>;
}

/**
 * Switches tfjs to the fastest backend that a plain CPU has: wasm where it is installed, else cpu. Importing
 * the library never touches the backend; this does, on request. The wasm backend of tfjs 4.22 has no gradient
 * for the filters of two-dimensional (and so of one-dimensional) convolutions: train those on the cpu backend.
 *
 * @param options - `loadWasm` for bundled pages
 * @returns the name of the backend in use
 * @throws ParameterError for a wrong option; EnvironmentError when no backend starts.
 * @example
 * ```ts
 * import * as tf from '@tensorflow/tfjs';
 * import { useFastestBackend } from 'leadline';
 * const name = await useFastestBackend();
 * console.log(name === tf.getBackend());
 * // true
 * ```
 */
export async function useFastestBackend(options: BackendOptions = {}): Promise<'wasm' | 'cpu'> {
  requireKnownKeys('useFastestBackend', options, ['loadWasm']);
  const load = options.loadWasm ?? importWasm;
  if (typeof load !== 'function') {
    throw new ParameterError(
      `useFastestBackend: loadWasm must be a function; got ${describe(load)}; pass () => import('@tensorflow/tfjs-backend-wasm')`,
    );
  }
  const present = await load().then(
    () => true,
    () => false,
  );
  const removeAdded = watchProcessListeners();
  try {
    return await start(present);
  } finally {
    removeAdded();
  }
}

async function start(present: boolean): Promise<'wasm' | 'cpu'> {
  for (const name of present ? (['wasm', 'cpu'] as const) : (['cpu'] as const)) {
    const started = await tf.setBackend(name).catch(() => false);
    if (started) return name;
  }
  throw new EnvironmentError(
    'useFastestBackend: a tfjs backend must start; got none; import @tensorflow/tfjs, which carries the cpu backend',
  );
}

function importWasm(): Promise<unknown> {
  // A bundler that saw the name would insist on the package, which is optional.
  const name = '@tensorflow/tfjs-backend-wasm';
  return import(/* @vite-ignore */ name);
}

interface NodeProcess {
  listeners(event: string): readonly unknown[];
  removeListener(event: string, listener: unknown): void;
}

/**
 * The WASM backend's loader makes Node print its own minified source before the message of any later error
 * that is not caught. Returns a function that takes those listeners away again.
 */
function watchProcessListeners(): () => void {
  const { process } = globalThis as { process?: NodeProcess };
  const events = ['uncaughtException', 'unhandledRejection'];
  if (typeof process?.listeners !== 'function') return () => {};
  const before = events.map((event) => new Set(process.listeners(event)));
  return () => {
    events.forEach((event, k) => {
      for (const listener of process.listeners(event)) {
        if (!before[k]!.has(listener)) process.removeListener(event, listener);
      }
    });
  };
}
