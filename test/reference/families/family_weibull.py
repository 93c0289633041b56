"""The Weibull distribution by its textbook formulas, with t = shape log(x / scale) and w = exp(t)."""
import mpmath
from mpmath import mpf

from dual import exp, expm1, log, log1p, square
from machinery import f32
from scalar import EXP, constant
from shapes import AT_BOTH, AT_P, TWO_SHAPED, by_log, by_log_corners, gamma, held, log_ratio, nothing, two_shaped

PARAMETERS = {'scale': ['scale', 'logScale'], 'shape': ['shape', 'logShape']}
FORMS = {'logShape': EXP}
DIGITS = {'': 420, 'mean': 80, 'variance': 100, 'kl': 420}
MINUS_INFINITY = mpf('-inf')


def power(x, scale, shape):
    return held(shape * log_ratio(x, scale), 2000)


def log_density(x, scale, shape):
    if x.value <= 0:
        return nothing(MINUS_INFINITY, x)
    return [log(shape), -log(scale), (shape - 1) * log_ratio(x, scale), -exp(power(x, scale, shape))]


def survival(x, scale, shape):
    if x.value <= 0:
        return nothing(1, x)
    w = exp(power(x, scale, shape))
    return [exp(-w) if w.value < 5000 else 0 * w]


def cdf(x, scale, shape):
    if x.value <= 0:
        return nothing(0, x)
    w = exp(power(x, scale, shape))
    return [-expm1(-w) if w.value < 5000 else 0 * w + 1]


def log_survival(x, scale, shape):
    return nothing(0, x) if x.value <= 0 else [-exp(power(x, scale, shape))]


def log_cdf(x, scale, shape):
    if x.value <= 0:
        return nothing(MINUS_INFINITY, x)
    w = exp(power(x, scale, shape))
    return [log(-expm1(-w)) if w.value < 100 else log1p(-exp(-w)) if w.value < 5000 else 0 * w]


def quantile(p, scale, shape):
    return [scale * exp(log(-log1p(-p)) / shape)]


def upper_quantile(p, scale, shape):
    return [scale * exp(log(-log(p)) / shape)]


def variance(scale, shape):
    return [square(scale) * (gamma(1 + 2 / shape) - square(gamma(1 + 1 / shape)))]


def mode(scale, shape):
    return [scale * exp(log((shape - 1) / shape) / shape)] if shape.value > 1 else nothing(0, scale)


def kl(l1, k1, l2, k2):
    ratio = k2 * log(l1 / l2)
    return [log(k1 / k2), -ratio, -mpmath.euler * (k1 - k2) / k1, exp(ratio) * gamma(k2 / k1 + 1), constant(-1, k1)]


THREE, BOTH, SHARE = 'x scale shape', 'scale shape', 'p scale shape'
FOUR = 'scale shape otherScale otherShape'
FUNCTIONS = {
    'logDensity': ('weibullLogDensity', log_density, THREE, THREE),
    'cdf': ('weibullCdf', cdf, THREE, THREE),
    'survival': ('weibullSurvival', survival, THREE, THREE),
    'logCdf': ('weibullLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('weibullLogSurvival', log_survival, THREE, THREE),
    'quantile': ('weibullQuantile', quantile, SHARE, SHARE),
    'upperQuantile': ('weibullUpperQuantile', upper_quantile, SHARE, SHARE),
    'mean': ('weibullMean', lambda s, k: [s * gamma(1 + 1 / k)], BOTH, BOTH),
    'variance': ('weibullVariance', variance, BOTH, BOTH),
    'mode': ('weibullMode', mode, BOTH, BOTH),
    'entropy': ('weibullEntropy', lambda s, k: [mpmath.euler * (1 - 1 / k), -log(k), log(s), constant(1, s)], BOTH, BOTH),
    'kl': ('weibullKl', kl, FOUR, FOUR),
}

STEPS = [-3000.0, -105.0, -40.0, -1.0, -0.3665, 0.0, 0.3, 1.0, 4.6, 6.7]
AT_X = (by_log(-6, 1.8, -110, 7), by_log_corners(STEPS) + [(-1.0, 1.0, 2.0), (f32(-1e-30), 2.0, 0.5)])
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    **{name: AT_BOTH for name in ('mean', 'variance', 'mode', 'entropy')},
    'kl': (two_shaped, TWO_SHAPED),
}
