// The public surface: explicit named exports, nothing else.

export type { Bound, BoundEstimate, BoundParts } from './bounds/bound.js';
export { type ElboOptions, elbo } from './bounds/elbo.js';
export type { DivergenceChoice } from './bounds/latentDivergence.js';
export type {
  ClosedWhereAll,
  Covers,
  MissingLatents,
  NoClosedForm,
  NotPathwise,
  ObservedInRecognizer,
  Pathwise,
  UnknownLatents,
} from './bounds/pairing.js';
export {
  type AsymmetricLaplace,
  type AsymmetricLaplaceOptions,
  asymmetricLaplace,
} from './distributions/asymmetricLaplace.js';
export { type Bernoulli, type BernoulliOptions, bernoulli } from './distributions/bernoulli.js';
export { type Beta, type BetaOptions, beta } from './distributions/beta.js';
export { type Categorical, type CategoricalOptions, categorical } from './distributions/categorical.js';
export { type Cauchy, type CauchyOptions, cauchy } from './distributions/cauchy.js';
export { type ChiSquared, type ChiSquaredOptions, chiSquared } from './distributions/chiSquared.js';
export {
  type ContinuousBernoulli,
  type ContinuousBernoulliOptions,
  continuousBernoulli,
} from './distributions/continuousBernoulli.js';
export type {
  Distribution,
  HasCdf,
  HasContinuousForms,
  HasEntropy,
  HasLogCdf,
  HasLogDraw,
  HasLogSurvival,
  HasMean,
  HasMode,
  HasMoments,
  HasQuantile,
  HasQuantiles,
  HasSurvival,
  HasTails,
  HasUpperQuantile,
  HasVariance,
  Route,
} from './distributions/distribution.js';
export { type Exponential, type ExponentialOptions, exponential } from './distributions/exponential.js';
export type {
  ClosedFormulas,
  ClosedOf,
  FamilyDefinition,
  FamilyFactory,
  FamilyMember,
  ParameterDomain,
  ScalarSupport,
} from './distributions/familyDefinition.js';
export type { FamilyFormula, NumberFormula } from './distributions/familyFormula.js';
export { type Gamma, type GammaOptions, gamma } from './distributions/gamma.js';
export { type Gompertz, type GompertzOptions, gompertz } from './distributions/gompertz.js';
export { type Gumbel, type GumbelOptions, gumbel } from './distributions/gumbel.js';
export { type HalfCauchy, type HalfCauchyOptions, halfCauchy } from './distributions/halfCauchy.js';
export { type HalfNormal, type HalfNormalOptions, halfNormal } from './distributions/halfNormal.js';
export { type ImplicitDefinition, implicitFamily } from './distributions/implicitFamily.js';
export { type InverseGamma, type InverseGammaOptions, inverseGamma } from './distributions/inverseGamma.js';
export {
  type InverseGaussian,
  type InverseGaussianOptions,
  inverseGaussian,
} from './distributions/inverseGaussian.js';
export { type Kumaraswamy, type KumaraswamyOptions, kumaraswamy } from './distributions/kumaraswamy.js';
export { type Laplace, type LaplaceOptions, laplace } from './distributions/laplace.js';
export type { LocationScaleOptions } from './distributions/locationScale.js';
export {
  type LocationScaleDefinition,
  locationScaleFamily,
  type StandardFormula,
} from './distributions/locationScaleFamily.js';
export { type Logistic, type LogisticOptions, logistic } from './distributions/logistic.js';
export { type LogitNormal, type LogitNormalOptions, logitNormal } from './distributions/logitNormal.js';
export { type LogLogistic, type LogLogisticOptions, logLogistic } from './distributions/logLogistic.js';
export { type LogNormal, type LogNormalOptions, logNormal } from './distributions/logNormal.js';
export {
  type MultivariateNormal,
  type MultivariateNormalOptions,
  multivariateNormal,
} from './distributions/multivariateNormal.js';
export { type Normal, type NormalOptions, normal } from './distributions/normal.js';
export type { OneOf } from './distributions/oneOf.js';
export { type Pareto, type ParetoOptions, pareto } from './distributions/pareto.js';
export { type Poisson, type PoissonOptions, poisson } from './distributions/poisson.js';
export { type Product, type ProductBase, product } from './distributions/product.js';
export { type QuantileDefinition, quantileFamily } from './distributions/quantileFamily.js';
export { type Rayleigh, type RayleighOptions, rayleigh } from './distributions/rayleigh.js';
export { type Reciprocal, type ReciprocalOptions, reciprocal } from './distributions/reciprocal.js';
export type { ScaleAndShapeOptions, ScaleOptions } from './distributions/scaleAndShape.js';
export { type StudentT, type StudentTOptions, studentT } from './distributions/studentT.js';
export { type Triangular, type TriangularOptions, triangular } from './distributions/triangular.js';
export { type Uniform, type UniformOptions, uniform } from './distributions/uniform.js';
export { type VonMises, type VonMisesOptions, vonMises } from './distributions/vonMises.js';
export { type Weibull, type WeibullOptions, weibull } from './distributions/weibull.js';
export { type ClosedPartner, kl, type NoClosedKl, sampledKl } from './divergence/kl.js';
export { hasClosedKl, registerKl } from './divergence/registerKl.js';
export type { ClosedKlPairs, HasClosedKl } from './divergence/registry.js';
export {
  CheckpointError,
  DivergenceError,
  EnvironmentError,
  type ErrorCode,
  GradientError,
  LeadlineError,
  ModelError,
  ParameterError,
  ShapeError,
  StreamError,
  TrainingError,
} from './errors.js';
export { affineMap, expMap, sigmoidMap, softplusMap } from './maps/elementary.js';
export { type PushedForms, type Pushforward, pushforward } from './maps/pushforward.js';
export type { SmoothMap } from './maps/smoothMap.js';
export type { DataValue } from './models/data.js';
export { DirectedModel, directed, type ModelData, type TakenName } from './models/directed.js';
export { type Masked, masked } from './models/masked.js';
export type { Conditional, ModelNode, Values } from './models/node.js';
export { type Head, head } from './networks/head.js';
export {
  type Activation,
  multilayerPerceptron,
  type Network,
  type PerceptronOptions,
} from './networks/multilayerPerceptron.js';
export { seedWeights } from './networks/seedWeights.js';
export { restoreStream, Stream, type StreamState, stream } from './random/stream.js';
export type { Support, SupportName } from './support/support.js';
export { checkValues } from './tensor/backend.js';
export type { NestedNumbers, ParameterValue } from './tensor/checks.js';
export { composed } from './tensor/composed.js';
export { detach } from './tensor/detach.js';
export { lift, type ScalarFormula } from './tensor/lift.js';
export { logSumExp } from './tensor/logSumExp.js';
export {
  besselI0e,
  besselI1e,
  besselRatio,
  besselRatioComplement,
  logBesselI0e,
} from './tensor/special/bessel.js';
export {
  betaI,
  betaIComplement,
  betaIInverse,
  betaIInverseComplement,
  logBeta,
  logBetaI,
  logBetaIComplement,
} from './tensor/special/beta.js';
export {
  log1mexp,
  log1pmx,
  logAddExp,
  logSigmoid,
  logSubExp,
  sigmoid,
  softplus,
  softplusInverse,
} from './tensor/special/elementary.js';
export {
  deviance,
  digamma,
  digammaDifference,
  logGamma,
  logGamma1p,
  stirlingError,
  trigamma,
} from './tensor/special/gamma.js';
export {
  gammaP,
  gammaPInverse,
  gammaQ,
  gammaQInverse,
  logGammaP,
  logGammaPInverse,
  logGammaQ,
} from './tensor/special/incompleteGamma.js';
export {
  erf,
  erfc,
  erfcx,
  logNormalCdf,
  logNormalCdfDerivative,
  normalCdf,
  normalQuantile,
  normalQuantileFromLog,
  owenT,
} from './tensor/special/normal.js';
export { type BackendOptions, useFastestBackend } from './tensor/useFastestBackend.js';
export type { BatchData, BatchEntry, DataFor, NumberArray, Tensors } from './training/batchData.js';
export { checkpoint, resume } from './training/checkpoint.js';
export {
  type CheckpointContents,
  type CheckpointTargets,
  decodeCheckpoint,
  encodeCheckpoint,
  type Resumed,
} from './training/checkpointBytes.js';
export type { StoppingState } from './training/earlyStopping.js';
export { type EvaluatedBound, type EvaluateOptions, evaluateBound } from './training/evaluateBound.js';
export type { Json } from './training/json.js';
export { type Batch, type BatchCursor, type MinibatchOptions, minibatches } from './training/minibatches.js';
export { Snapshot, snapshot } from './training/snapshot.js';
export { train } from './training/train.js';
export type { Parts, Trainable } from './training/trainable.js';
export type { HeldOutOptions, Progress, TrainingCursor, TrainOptions } from './training/trainOptions.js';
export type { VariableSource } from './training/variables.js';
