import { type KernelModule, kernelModule } from '../kernels/loader.js';

/** Draws made between copies out of the module's memory: small enough to stay in a processor's cache. */
const block = 65536;

/** The compiled functions that write `n` draws at `out`, from the stream that is open. */
export type FillName =
  | 'fillUniform'
  | 'fillNormal'
  | 'fillExponential'
  | 'fillLaplace'
  | 'fillLogistic'
  | 'fillGumbel'
  | 'fillWords'
  | 'fillIntegers'
  | 'fillPermutation'
  | 'fillPoisson'
  | 'fillCategorical'
  | 'fillGamma'
  | 'fillLogGamma'
  | 'fillScaledGamma'
  | 'fillLogScaledGamma'
  | 'fillInverseGamma'
  | 'fillLogInverseGamma'
  | 'fillBeta'
  | 'fillLogBeta'
  | 'fillLogOddsBeta'
  | 'fillBetaPrime'
  | 'fillLogBetaPrime'
  | 'fillCauchy'
  | 'fillStudentT'
  | 'fillInverseGaussian'
  | 'fillVonMises';

/** Runs `work` with a stream open in the compiled module, then reads the advanced state back. */
export function withStream(words: Int32Array, work: (module: KernelModule) => void): void {
  const module = kernelModule();
  module.begin();
  const state = module.reserve(32);
  module.words.set(words, state >> 2);
  module.call.openStream!(state);
  work(module);
  module.call.closeStream!(state);
  words.set(module.words.subarray(state >> 2, (state >> 2) + 8));
}

/**
 * Draws into `out`, block by block, advancing `words`. Each array of `parameters` holds `width` float32 for
 * each draw and is passed to the compiled function, block by block as well. Where `refuse` is given they must be
 * positive and finite: it is told the first that is not, and the stream stays where it was.
 */
export function fill(
  words: Int32Array,
  name: FillName,
  out: Float32Array | Int32Array,
  extra: {
    values?: readonly number[];
    parameters?: readonly Float32Array[];
    width?: number;
    scratchBytes?: number;
    refuse?: (parameter: number, element: number) => never;
  } = {},
): void {
  const { values = [], parameters = [], width = 1, scratchBytes, refuse } = extra;
  const step = Math.max(1, Math.min(out.length, Math.floor(block / width)));
  withStream(words, (module) => {
    const at = module.reserve(4 * step);
    const from = parameters.map(() => module.reserve(4 * step * width));
    const scratch = scratchBytes ? module.reserve(scratchBytes) : 0;
    const trailing = [...from, ...values, ...(scratchBytes ? [scratch] : [])];
    const run = module.call[name]!;
    for (let done = 0; done < out.length; done += step) {
      const n = Math.min(step, out.length - done);
      parameters.forEach((array, k) => {
        module.floats.set(array.subarray(width * done, width * (done + n)), from[k]! >> 2);
        const wrong = refuse ? module.call.firstNotPositive!(from[k]!, width * n) : -1;
        if (wrong >= 0) refuse!(k, width * done + wrong);
      });
      run(at, n, ...trailing);
      const source = out instanceof Int32Array ? module.words : module.floats;
      out.set(source.subarray(at >> 2, (at >> 2) + n), done);
    }
  });
}
