/** Names of the library's own families, which a user's family may not take: divergences are found by name. */
export const familyNames: readonly string[] = [
  'bernoulli',
  'categorical',
  'exponential',
  'gumbel',
  'inverseGaussian',
  'laplace',
  'logistic',
  'logNormal',
  'multivariateNormal',
  'normal',
  'poisson',
  'studentT',
  'uniform',
  'vonMises',
];
