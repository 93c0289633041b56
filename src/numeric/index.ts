// The double-precision scalar functions, for formulas of one's own: explicit named exports, nothing else.

export {
  besselI0e,
  besselI0e_x,
  besselI1e,
  besselI1e_x,
  besselRatio,
  besselRatio_x,
  besselRatioComplement,
  besselRatioComplement_x,
  logBesselI0e,
  logBesselI0e_x,
} from './bessel.js';
export { betaDrawDerivativeA, betaDrawDerivativeB } from './betaDraw.js';
export { deviance, deviance_m, deviance_x, logRatio, logRatio_m, logRatio_x } from './deviance.js';
export { digamma, digamma_x, digammaMinusLog, digammaMinusLog_x } from './digamma.js';
export { digammaDifference, digammaDifference_a, digammaDifference_b } from './digammaDifference.js';
export { erf, erf_x, erfc, erfc_x, erfcx, erfcx_x } from './errorFunction.js';
export { exponentialRemainder } from './exponentialRemainder.js';
export { gammaDrawDerivative, gammaLogDrawDerivative } from './gammaDraw.js';
export {
  betaI,
  betaI_a,
  betaI_b,
  betaI_x,
  betaIComplement,
  betaIComplement_a,
  betaIComplement_b,
  betaIComplement_x,
  logBetaI,
  logBetaI_a,
  logBetaI_b,
  logBetaI_x,
  logBetaIComplement,
  logBetaIComplement_a,
  logBetaIComplement_b,
  logBetaIComplement_x,
} from './incompleteBeta.js';
export {
  betaIInverse,
  betaIInverse_a,
  betaIInverse_b,
  betaIInverse_p,
  betaIInverseComplement,
  betaIInverseComplement_a,
  betaIInverseComplement_b,
  betaIInverseComplement_p,
} from './incompleteBetaInverse.js';
export {
  gammaP,
  gammaP_a,
  gammaP_x,
  gammaQ,
  gammaQ_a,
  gammaQ_x,
  logGammaP,
  logGammaP_a,
  logGammaP_x,
  logGammaQ,
  logGammaQ_a,
  logGammaQ_x,
} from './incompleteGamma.js';
export {
  gammaPInverse,
  gammaPInverse_a,
  gammaPInverse_p,
  gammaQInverse,
  gammaQInverse_a,
  gammaQInverse_q,
  logGammaPInverse,
  logGammaPInverse_a,
  logGammaPInverse_logP,
} from './incompleteGammaInverse.js';
export { log1mexp, log1mexp_x } from './log1mexp.js';
export { log1pmx, log1pmx_x } from './log1pmx.js';
export { logAddExp, logAddExp_a, logAddExp_b, logSubExp, logSubExp_a, logSubExp_b } from './logAddExp.js';
export { logBeta, logBeta_a, logBeta_b } from './logBeta.js';
export { logGamma, logGamma_x, logGamma1p, logGamma1p_x } from './logGamma.js';
export { logGammaDifference, logGammaDifference_a, logGammaDifference_b } from './logGammaDifference.js';
export {
  logNormalCdf,
  logNormalCdf_x,
  logNormalCdfDerivative,
  logNormalCdfDerivative_x,
  normalCdf,
  normalCdf_x,
  normalDensity,
} from './normalCdf.js';
export {
  normalQuantile,
  normalQuantile_x,
  normalQuantileFromLog,
  normalQuantileFromLog_x,
} from './normalQuantile.js';
export { owenT, owenT_a, owenT_h } from './owenT.js';
export { logSigmoid, logSigmoid_x, sigmoid, sigmoid_x } from './sigmoid.js';
export {
  skewNormalCdfStandard,
  skewNormalCdfStandard_shape,
  skewNormalCdfStandard_z,
  skewNormalLogCdfStandard,
  skewNormalLogCdfStandard_shape,
  skewNormalLogCdfStandard_z,
  skewNormalLogSurvivalStandard,
  skewNormalLogSurvivalStandard_shape,
  skewNormalLogSurvivalStandard_z,
  skewNormalSurvivalStandard,
  skewNormalSurvivalStandard_shape,
  skewNormalSurvivalStandard_z,
} from './skewNormal.js';
export { softplus, softplus_x, softplusInverse, softplusInverse_x } from './softplus.js';
export { stirlingError, stirlingError_n } from './stirlingError.js';
export {
  studentTCdf,
  studentTCdf_degreesOfFreedom,
  studentTCdf_z,
  studentTDrawDerivative,
  studentTLogCdf,
  studentTLogCdf_degreesOfFreedom,
  studentTLogCdf_z,
  studentTQuantile,
  studentTQuantile_degreesOfFreedom,
  studentTQuantile_p,
} from './studentT.js';
export { tetragamma, trigamma, trigamma_x } from './trigamma.js';
export {
  vonMisesCdf,
  vonMisesCdf_concentration,
  vonMisesCdf_x,
  vonMisesDrawDerivative,
  vonMisesLogCdf,
  vonMisesLogCdf_concentration,
  vonMisesLogCdf_x,
  vonMisesQuantile,
  vonMisesQuantile_concentration,
  vonMisesQuantile_p,
} from './vonMises.js';
