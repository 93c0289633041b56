"""The Cauchy distribution by its textbook formulas."""
import mpmath

from dual import log, log1p, square
from machinery import fence
from points import LOCATED, ONE_SPREAD, PAIRS, located, located_corners, located_pair, center, share, spread, with_shares
from scalar import constant
from shapes import atan, tan

PARAMETERS = {'location': ['location'], 'scale': ['scale', 'logScale']}
DIGITS = {'': 420}


def log_density(x, location, scale):
    return [constant(-mpmath.log(mpmath.pi), x), -log1p(square((x - location) / scale)), -log(scale)]


def lower(z):
    """1/2 + atan(z) / pi, for z < 0 by the angle to the end."""
    return -atan(1 / z) / mpmath.pi if z.value < 0 else atan(z) / mpmath.pi + 1 / mpmath.mpf(2)


def cdf(x, location, scale):
    return [lower((x - location) / scale)]


def survival(x, location, scale):
    return [lower((location - x) / scale)]


def log_lower(z):
    return log(lower(z)) if z.value < 0 else log1p(-lower(-z)) if z.value > 0 else log(lower(z))


def log_cdf(x, location, scale):
    return [log_lower((x - location) / scale)]


def log_survival(x, location, scale):
    return [log_lower((location - x) / scale)]


def standard_quantile(p):
    return -1 / tan(mpmath.pi * p) if p.value < 0.5 else 1 / tan(mpmath.pi * (1 - p)) if p.value > 0.5 else tan(mpmath.pi * p - mpmath.pi / 2)


def quantile(p, location, scale):
    return [location, scale * standard_quantile(p)]


def upper_quantile(p, location, scale):
    return [location, -scale * standard_quantile(p)]


def kl(l, s, m, t):
    return [log((square(s + t) + square(l - m)) / (4 * s * t))]


THREE, SHARE = 'x location scale', 'p location scale'
FOUR = 'location scale otherLocation otherScale'
FUNCTIONS = {
    'logDensity': ('cauchyLogDensity', log_density, THREE, THREE),
    'cdf': ('cauchyCdf', cdf, THREE, THREE),
    'survival': ('cauchySurvival', survival, THREE, THREE),
    'logCdf': ('cauchyLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('cauchyLogSurvival', log_survival, THREE, THREE),
    'quantile': ('cauchyQuantile', quantile, SHARE, SHARE),
    'upperQuantile': ('cauchyUpperQuantile', upper_quantile, SHARE, SHARE),
    'mode': ('identity', lambda l: [l], 'location', 'location'),
    'entropy': ('cauchyEntropy', lambda s: [log(s), constant(mpmath.log(4 * mpmath.pi), s)], 'scale', 'scale'),
    'kl': ('cauchyKl', kl, FOUR, FOUR),
}
AT_X = (located, located_corners())
AT_P = (lambda d: (share(d), center(d), spread(d)),
        with_shares(LOCATED) + [(p, 0.0, 1.0) for p in fence(0.25, 0.5, 0.75)])
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    'mode': (lambda d: (center(d),), [(c,) for c in fence(0, 1, -1, 1e30, 16777216, -5, 1e-30)]),
    'entropy': (lambda d: (spread(d),), ONE_SPREAD),
    'kl': (located_pair, PAIRS),
}
