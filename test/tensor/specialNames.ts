import { catalogue } from '../../src/kernels/generated/catalogue.js';
import { formulas } from '../../src/kernels/generated/formulas.js';
import { publicFunctionsOf } from './publicFunctions.js';

type Scalar = (...values: number[]) => number;

/** The public special functions, by the file of src/tensor/special that has them. */
export const specialNames = ['elementary', 'gamma', 'incompleteGamma', 'beta', 'bessel', 'normal'].flatMap(
  (file) => publicFunctionsOf('src/index.ts', `./tensor/special/${file}.js`),
);

/** The formula of a special function as an ordinary function, with its partial derivatives and parameters. */
export function scalarOf(name: string): {
  value: Scalar;
  partials: readonly Scalar[];
  parameters: readonly string[];
} {
  const all = formulas as unknown as Record<string, { value: Scalar; partials: readonly Scalar[] }>;
  const { parameters } = (catalogue as Record<string, { parameters: readonly string[] }>)[name]!;
  return { ...all[name]!, parameters };
}

/** The special functions that have no form in tensor operations. */
export const withoutComposedForm = [
  'logGamma1p',
  'digamma',
  'trigamma',
  'digammaDifference',
  'stirlingError',
  'deviance',
  'gammaP',
  'gammaQ',
  'logGammaP',
  'logGammaQ',
  'gammaPInverse',
  'gammaQInverse',
  'logGammaPInverse',
  'logBeta',
  'betaI',
  'betaIComplement',
  'logBetaI',
  'logBetaIComplement',
  'betaIInverse',
  'betaIInverseComplement',
  'besselI0e',
  'logBesselI0e',
  'besselI1e',
  'besselRatio',
  'besselRatioComplement',
  'logNormalCdfDerivative',
  'normalQuantileFromLog',
  'owenT',
];
