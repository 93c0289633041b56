"""The log-logistic distribution by its textbook formulas, with t = shape log(x / scale)."""
import mpmath
from mpmath import mpf

from dual import exp, log, log1p, sigmoid, softplus, square
from machinery import f32
from scalar import EXP, constant
from shapes import AT_BOTH, AT_P, by_log, by_log_corners, log_ratio, nothing, sin

PARAMETERS = {'scale': ['scale', 'logScale'], 'shape': ['shape', 'logShape']}
FORMS = {'logShape': EXP}
DIGITS = {'': 420}
INFINITY = mpf('inf')


def log_odds(x, scale, shape):
    return shape * log_ratio(x, scale)


def log_density(x, scale, shape):
    if x.value <= 0:
        return nothing(-INFINITY, x)
    t = log_odds(x, scale, shape)
    t = t if t.value > 0 else -t
    return [log(shape), -log(x), -t - 2 * log1p(exp(-t))]


def small_sigmoid(t):
    """Without the exponential of a large number."""
    return exp(t) / (1 + exp(t)) if t.value < 0 else sigmoid(t)


def cdf(x, scale, shape):
    return nothing(0, x) if x.value <= 0 else [small_sigmoid(log_odds(x, scale, shape))]


def survival(x, scale, shape):
    return nothing(1, x) if x.value <= 0 else [small_sigmoid(-log_odds(x, scale, shape))]


def log_cdf(x, scale, shape):
    return nothing(-INFINITY, x) if x.value <= 0 else [-softplus(-log_odds(x, scale, shape))]


def log_survival(x, scale, shape):
    return nothing(0, x) if x.value <= 0 else [-softplus(log_odds(x, scale, shape))]


def quantile(p, scale, shape):
    return [scale * exp((log(p) - log1p(-p)) / shape)]


def upper_quantile(p, scale, shape):
    return [scale * exp((log1p(-p) - log(p)) / shape)]


def mean(scale, shape):
    if shape.value <= 1:
        return nothing(INFINITY, shape)
    b = mpmath.pi / shape
    return [scale * b / sin(b)]


def variance(scale, shape):
    if shape.value <= 2:
        return nothing(INFINITY, shape)
    b = mpmath.pi / shape
    return [square(scale) * (2 * b / sin(2 * b) - square(b / sin(b)))]


def mode(scale, shape):
    return [scale * exp(log((shape - 1) / (shape + 1)) / shape)] if shape.value > 1 else nothing(0, scale)


THREE, BOTH, SHARE = 'x scale shape', 'scale shape', 'p scale shape'
FUNCTIONS = {
    'logDensity': ('logLogisticLogDensity', log_density, THREE, THREE),
    'cdf': ('logLogisticCdf', cdf, THREE, THREE),
    'survival': ('logLogisticSurvival', survival, THREE, THREE),
    'logCdf': ('logLogisticLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('logLogisticLogSurvival', log_survival, THREE, THREE),
    'quantile': ('logLogisticQuantile', quantile, SHARE, SHARE),
    'upperQuantile': ('logLogisticUpperQuantile', upper_quantile, SHARE, SHARE),
    'mean': ('logLogisticMean', mean, BOTH, BOTH),
    'variance': ('logLogisticVariance', variance, BOTH, BOTH),
    'mode': ('logLogisticMode', mode, BOTH, BOTH),
    'entropy': ('logLogisticEntropy', lambda s, k: [log(s), -log(k), constant(2, s)], BOTH, BOTH),
}
STEPS = [-3000.0, -105.0, -37.0, -1.0, 0.0, 1e-6, 0.7, 17.0, 89.0, 1200.0]
AT_X = (by_log(-8, 8, -110, 110), by_log_corners(STEPS) + [(-1.0, 1.0, 2.0), (f32(-1e-30), 2.0, 0.5)])
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    **{name: AT_BOTH for name in ('mean', 'variance', 'mode', 'entropy')},
}
