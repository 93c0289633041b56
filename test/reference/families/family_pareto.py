"""The Pareto distribution by its textbook formulas."""
import mpmath
from mpmath import mpf

from dual import exp, expm1, log, log1p, square
from machinery import f32, step
from points import LARGEST, SMALLEST
from scalar import EXP, constant
from shapes import AT_BOTH, AT_P, TWO_SHAPED, by_log, by_log_corners, log_ratio, nothing, two_shaped

PARAMETERS = {'scale': ['scale', 'logScale'], 'shape': ['shape', 'logShape']}
FORMS = {'logShape': EXP}
DIGITS = {'': 420}
INFINITY = mpf('inf')


def log_density(x, scale, shape):
    if x.value < scale.value:
        return nothing(-INFINITY, x)
    return [log(shape), shape * log_ratio(scale, x), -log(x)]


def power(x, scale, shape):
    return shape * log_ratio(scale, x)


def survival(x, scale, shape):
    return nothing(1, x) if x.value < scale.value else [exp(power(x, scale, shape))]


def cdf(x, scale, shape):
    return nothing(0, x) if x.value < scale.value else [-expm1(power(x, scale, shape))]


def log_survival(x, scale, shape):
    return nothing(0, x) if x.value < scale.value else [power(x, scale, shape)]


def log_cdf(x, scale, shape):
    if x.value <= scale.value:
        return nothing(-INFINITY, x)
    t = power(x, scale, shape)
    return [log(-expm1(t)) if t.value > -100 else log1p(-exp(t))]


def quantile(p, scale, shape):
    return [scale * exp(-log1p(-p) / shape)]


def upper_quantile(p, scale, shape):
    return [scale * exp(-log(p) / shape)]


def mean(scale, shape):
    return [scale * shape / (shape - 1)] if shape.value > 1 else nothing(INFINITY, shape)


def variance(scale, shape):
    if shape.value <= 2:
        return nothing(INFINITY, shape)
    return [square(scale) * shape / (square(shape - 1) * (shape - 2))]


def kl(m, a, n, b):
    if m.value < n.value:
        return nothing(INFINITY, m)
    return [log(a / b), b * log(m / n), b / a, constant(-1, a)]


def inside(d):
    x, s, k = by_log(0, 6, 0, 120)(d)
    return max(x, s), s, k


def widening(d):
    """Mostly a second support that holds the first."""
    m, a, n, b = two_shaped(d)
    return (m, a, n, b) if m >= n or d.random.random() < 0.2 else (n, a, m, b)


# No scale of exactly 1, whose logarithm an exponential could not tell from 1e-30.
CORNERS = ([(max(x, s), s, k) for x, s, k in ((f32(0.7 * x) if x < 1e38 else x, f32(0.7 * s) if s < 1e38 else s, k)
                                              for x, s, k in by_log_corners([0.0, 1e-6, 0.6, 0.7, 3.0, 40.0, 103.0, 750.0]) if s > 1e-40)]
           + [(step(3.0, -1), 3.0, 2.0), (-1.0, 3.0, 2.0), (0.0, 3.7, 0.5), (1.0, SMALLEST, 2.0), (LARGEST, SMALLEST, 2.0)])
WIDER = ([(max(m, n), a, min(m, n), b) for m, a, n, b in ((f32(0.8 * m), a, f32(0.8 * n), b) for m, a, n, b in TWO_SHAPED)] + [(3.0, 2.0, 4.5, 2.0), (3.0, 2.0, step(3.0, 1), 3.0)]
         + [(s, 2.0, t, 3.0) for s in (2.0, 1e20, LARGEST) for t in (SMALLEST, 1e-20)])

THREE, BOTH, SHARE = 'x scale shape', 'scale shape', 'p scale shape'
FOUR = 'scale shape otherScale otherShape'
FUNCTIONS = {
    'logDensity': ('paretoLogDensity', log_density, THREE, THREE),
    'cdf': ('paretoCdf', cdf, THREE, THREE),
    'survival': ('paretoSurvival', survival, THREE, THREE),
    'logCdf': ('paretoLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('paretoLogSurvival', log_survival, THREE, THREE),
    'quantile': ('paretoQuantile', quantile, SHARE, SHARE),
    'upperQuantile': ('paretoUpperQuantile', upper_quantile, SHARE, SHARE),
    'mean': ('paretoMean', mean, BOTH, BOTH),
    'variance': ('paretoVariance', variance, BOTH, BOTH),
    'mode': ('identity', lambda s: [s], 'scale', 'scale'),
    'entropy': ('paretoEntropy', lambda s, k: [log(s), -log(k), 1 / k, constant(1, s)], BOTH, BOTH),
    'kl': ('paretoKl', kl, FOUR, FOUR),
}
POINTS = {
    **{name: (inside, CORNERS) for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    **{name: AT_BOTH for name in ('mean', 'variance', 'entropy')},
    'mode': (lambda d: AT_BOTH[0](d)[:1], list(dict.fromkeys((f32(s),) for s, _ in AT_BOTH[1])) + [(step(1.0, n),) for n in range(1, 64)]),
    'kl': (widening, WIDER),
}
