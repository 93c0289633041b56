#!/usr/bin/env python3
"""SciPy's float32 results at the points of the reference values: the worst error of each function in float32 units,
as JSON by row. SciPy has no derivatives in parameters; a row it has no function for is left out.

    python3 scipy_float32.py > ../../docs/accuracy-scipy.json
"""
import glob
import json
import os
import warnings

import numpy as np
import scipy
from scipy import special as sc
from scipy import stats

warnings.filterwarnings('ignore')
np.seterr(all='ignore')
HERE = os.path.dirname(os.path.abspath(__file__))
f = np.float32
OVERFLOW = 2.0 ** 128 - 2.0 ** 103


def ulp32(v):
    size = np.minimum(np.abs(v), 2.0 ** 128 - 2.0 ** 104)
    exponent = np.floor(np.log2(np.maximum(size, 2.0 ** -126)))
    exponent = np.where(2.0 ** exponent > size, np.maximum(exponent - 1, -126), exponent)
    return np.where(size < 2.0 ** -126, 2.0 ** -149, 2.0 ** (exponent - 23))


def score(got, exact):
    got = got.astype(f).astype(float)
    with np.errstate(all='ignore'):
        error = np.abs(got - exact) / ulp32(exact)
    error = np.where(np.abs(exact) >= OVERFLOW, np.where(got == np.sign(exact) * np.inf, 0, np.inf), error)
    return np.where(np.isnan(error), np.inf, error)


def written(errors):
    """The worst error, and how many results are infinite or not a number where they should not be."""
    finite = errors[np.isfinite(errors)]
    wrong = len(errors) - len(finite)
    worst = '%.3g' % np.max(finite) if len(finite) else 'none finite'
    return worst if wrong == 0 else f'{worst}, {wrong} not finite'


# SciPy's frozen distribution from the family's own parameters; float32 arrays go in.
FAMILIES = {
    'normal': lambda mean, sd: stats.norm(mean, sd),
    'logNormal': lambda location, scale: stats.lognorm(scale, 0, np.exp(location)),
    'laplace': lambda location, scale: stats.laplace(location, scale),
    'logistic': lambda location, scale: stats.logistic(location, scale),
    'uniform': lambda lower, upper: stats.uniform(lower, upper - lower),
    'exponential': lambda rate: stats.expon(0, 1 / rate),
    'poisson': lambda rate: stats.poisson(rate),
    'gumbel': lambda location, scale: stats.gumbel_r(location, scale),
    'cauchy': lambda location, scale: stats.cauchy(location, scale),
    'halfNormal': lambda scale: stats.halfnorm(0, scale),
    'halfCauchy': lambda scale: stats.halfcauchy(0, scale),
    'rayleigh': lambda scale: stats.rayleigh(0, scale),
    'weibull': lambda shape, scale: stats.weibull_min(shape, 0, scale),
    'pareto': lambda shape, scale: stats.pareto(shape, 0, scale),
    'logLogistic': lambda shape, scale: stats.fisk(shape, 0, scale),
    'gompertz': lambda shape, rate: stats.gompertz(shape, 0, 1 / rate),
    'reciprocal': lambda lower, upper: stats.loguniform(lower, upper),
    'triangular': lambda lower, peak, upper: stats.triang((peak - lower) / (upper - lower), lower, upper - lower),
    'truncatedNormal': lambda location, scale, lower, upper: stats.truncnorm(
        (lower - location) / scale, (upper - location) / scale, location, scale),
    'asymmetricLaplace': lambda location, scale, asymmetry: stats.laplace_asymmetric(asymmetry, location, scale),
    'gamma': lambda shape, scale: stats.gamma(shape, 0, scale),
    'inverseGamma': lambda shape, scale: stats.invgamma(shape, 0, scale),
    'chiSquared': lambda degreesOfFreedom: stats.chi2(degreesOfFreedom),
    'erlang': lambda shape, scale: stats.gamma(shape, 0, scale),
    'beta': lambda alpha, beta: stats.beta(alpha, beta),
    'fisherF': lambda numeratorDegreesOfFreedom, denominatorDegreesOfFreedom: stats.f(
        numeratorDegreesOfFreedom, denominatorDegreesOfFreedom),
    'vonMises': lambda location, concentration: stats.vonmises(concentration, location),
    'studentT': lambda degreesOfFreedom, location, scale: stats.t(degreesOfFreedom, location, scale),
    'skewNormal': lambda location, scale, shape: stats.skewnorm(shape, location, scale),
    'inverseGaussian': lambda mean, shape: stats.invgauss(mean / shape, 0, shape),
}
METHODS = {'logDensity': 'logpdf', 'cdf': 'cdf', 'survival': 'sf', 'logCdf': 'logcdf', 'logSurvival': 'logsf',
           'quantile': 'ppf', 'upperQuantile': 'isf', 'mean': 'mean', 'variance': 'var', 'entropy': 'entropy'}

SPECIAL = {
    'logGamma': sc.gammaln, 'digamma': sc.digamma, 'trigamma': lambda x: sc.polygamma(1, x), 'logBeta': sc.betaln,
    'erf': sc.erf, 'erfc': sc.erfc, 'erfcx': sc.erfcx, 'normalCdf': sc.ndtr, 'logNormalCdf': sc.log_ndtr,
    'normalQuantile': sc.ndtri, 'normalQuantileFromLog': sc.ndtri_exp, 'gammaP': sc.gammainc, 'gammaQ': sc.gammaincc,
    'gammaPInverse': sc.gammaincinv, 'gammaQInverse': sc.gammainccinv, 'betaI': sc.betainc, 'besselI0e': sc.i0e,
    'besselI1e': sc.i1e, 'sigmoid': sc.expit, 'logSigmoid': sc.log_expit, 'logAddExp': np.logaddexp,
    'logOdds': sc.logit, 'betaIInverse': lambda a, b, p: sc.betaincinv(a, b, p),
}

def main():
    result = {}
    for path in sorted(glob.glob(os.path.join(HERE, '*.json'))):
        if path.endswith('hard.json'):
            continue
        for name, rows in json.load(open(path)).items():
            if name not in SPECIAL:
                continue
            columns = np.array([[float(v) for v in row] for row in rows]).T
            got = np.asarray(SPECIAL[name](*[c.astype(f) for c in columns[:-1]]))
            result[f'{name}: value'] = written(score(got, columns[-1]))
    for path in sorted(glob.glob(os.path.join(HERE, 'families', '*.json'))):
        family = os.path.basename(path)[:-5]
        if family not in FAMILIES:
            continue
        own = FAMILIES[family].__code__.co_varnames
        for record in json.load(open(path)):
            method, names = METHODS.get(record['function']), record['arguments']
            lead = [n for n in names if n in 'xp']
            parameters = [n for n in names if n not in lead]
            # A function that does not read all parameters is that of a standard member in the others.
            if method is None or any(record['transforms']) or record.get('joint') or not set(parameters) <= set(own):
                continue
            columns = {n: np.array([row[k] for row in record['rows']], dtype=f) for k, n in enumerate(names)}
            count = len(record['rows'])
            exact = np.array([float(row[len(names)]) for row in record['rows']])
            rest = {'location': f(0), 'scale': f(1), 'mean': f(0), 'sd': f(1), 'shape': f(1)}
            given = {n: columns.get(n, np.full(count, rest.get(n, f(1)), dtype=f)) for n in own}
            name = 'logpmf' if method == 'logpdf' and family == 'poisson' else method
            try:
                d = FAMILIES[family](**given)
                got = np.asarray(getattr(d, name)(*[columns[n] for n in lead]))
            except Exception as error:
                result[f'{family}.{record["function"]}({", ".join(names)}): value'] = 'fails'
                continue
            sizes = np.array([float(row[len(names) + 1 + len(record['partials'])]) for row in record['rows']])
            errors = score(got, exact)
            errors = np.where(np.abs(got.astype(f).astype(float) - exact) <= 2.0 ** -50 * sizes, 0, errors)
            errors = np.where(got.astype(float) == exact, 0, errors)
            result[f'{family}.{record["function"]}({", ".join(names)}): value'] = written(errors)
    result['version'] = scipy.__version__
    print(json.dumps(result, indent=0))


if __name__ == '__main__':
    main()
