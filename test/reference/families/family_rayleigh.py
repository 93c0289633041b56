"""The Rayleigh distribution by its textbook formulas."""
import itertools

import mpmath
from mpmath import mpf

from dual import exp, expm1, log, log1p, sqrt, square
from machinery import f32
from points import LARGEST, ONE_SPREAD, PAIRS, SHARES, SMALLEST, SPREADS, scale_pair, share
from scalar import constant
from shapes import nothing, scale, times_exp

PARAMETERS = {'scale': ['scale', 'logScale']}
DIGITS = {'': 420}
MINUS_INFINITY = mpf('-inf')


def half_square(x, scale):
    return square(x / scale) / 2


def log_density(x, scale):
    if x.value <= 0:
        return nothing(MINUS_INFINITY, x)
    return [log(x) - log(scale), -half_square(x, scale), -log(scale)]


def cdf(x, scale):
    if x.value <= 0:
        return nothing(0, x)
    h = half_square(x, scale)
    return [-expm1(-h) if h.value < 5000 else 0 * h + 1]


def survival(x, scale):
    if x.value <= 0:
        return nothing(1, x)
    h = half_square(x, scale)
    return [exp(-h) if h.value < 5000 else 0 * h]


def log_cdf(x, scale):
    if x.value <= 0:
        return nothing(MINUS_INFINITY, x)
    h = half_square(x, scale)
    return [log(-expm1(-h)) if h.value < 100 else log1p(-exp(-h)) if h.value < 5000 else 0 * h]


def log_survival(x, scale):
    return nothing(0, x) if x.value <= 0 else [-half_square(x, scale)]


def kl(s, t):
    v = square(s / t)
    return [v, constant(-1, s), -log(v)]


TWO, SHARE = 'x scale', 'p scale'
FUNCTIONS = {
    'logDensity': ('rayleighLogDensity', log_density, TWO, TWO),
    'cdf': ('rayleighCdf', cdf, TWO, TWO),
    'survival': ('rayleighSurvival', survival, TWO, TWO),
    'logCdf': ('rayleighLogCdf', log_cdf, TWO, TWO),
    'logSurvival': ('rayleighLogSurvival', log_survival, TWO, TWO),
    'quantile': ('rayleighQuantile', lambda p, s: [s * sqrt(-2 * log1p(-p))], SHARE, SHARE),
    'upperQuantile': ('rayleighUpperQuantile', lambda p, s: [s * sqrt(-2 * log(p))], SHARE, SHARE),
    'mean': ('rayleighMean', lambda s: [s * mpmath.sqrt(mpmath.pi / 2)], 'scale', 'scale'),
    'mode': ('rayleighMode', lambda s: [s], 'scale', 'scale'),
    'variance': ('rayleighVariance', lambda s: [square(s) * (4 - mpmath.pi) / 2], 'scale', 'scale'),
    'entropy': ('rayleighEntropy', lambda s: [log(s), constant(1 + mpmath.euler / 2 - mpmath.log(2) / 2, s)], 'scale', 'scale'),
    'kl': ('rayleighKl', kl, 'scale otherScale', 'scale otherScale'),
}


def scaled(d):
    s = scale(d)
    return times_exp(s, d.random.uniform(-4, 2) if d.random.random() < 0.75 else d.random.uniform(-60, 60)), s


# Standardized points at which formulas switch or underflow, in order of size where a logarithmic scale follows.
ZS = [1.0, 0.5, 0.7, 1.0000001, 1.1774, 1.4142135, 3.0, 14.0, 15.3, 38.7, 61.0, 1e3, 1e10, 1e-3, 1e-9, 9.999e-10, 1e-12, 1e-20]
SCALED = ([(f32(s * z), f32(s)) for s in (1.0, 3.7, 1e-3, 1e30) for z in ZS]
          + [(x, s) for x, s in itertools.product((SMALLEST, 1.0, LARGEST), (SMALLEST, 1.0, LARGEST))]
          + [(0.0, 1.0), (-1.0, 2.0), (-SMALLEST, 1.0)])
AT_P = (lambda d: (share(d), scale(d)), [(p, s) for p in SHARES for s in SPREADS])
AT_SCALE = (lambda d: (scale(d),), ONE_SPREAD)
SCALE_PAIR = (scale_pair, list(dict.fromkeys((s, t) for _, s, _, t in PAIRS)))
POINTS = {
    **{name: (scaled, SCALED) for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    **{name: AT_SCALE for name in ('mean', 'mode', 'variance', 'entropy')},
    'kl': SCALE_PAIR,
}
