"""The Gumbel distribution (for maxima) by its textbook formulas."""
import mpmath
from mpmath import mpf

from dual import Dual, exp, expm1, log, log1p, square
from machinery import fence
from points import (LOCATED, ONE_SPREAD, PAIRS, SHARES, center, located, located_corners, located_pair, share, spread,
                    with_shares)
from scalar import constant

# The forms of each parameter, the one that formulas read first.
PARAMETERS = {'location': ['location'], 'scale': ['scale', 'logScale']}
# Precision of the lower of two runs, by function; '' for the others.
DIGITS = {'': 400, 'kl': 500}


def clamped(x, location, scale):
    """z, no lower than where exp(-z) leaves every format."""
    z = (x - location) / scale
    return z if z.value > -2000 else z.chain(mpf(-2000), mpf(1))


def log_density(x, location, scale):
    z = clamped(x, location, scale)
    return [-z, -exp(-z), -log(scale)]


def cdf(x, location, scale):
    rare = exp(-clamped(x, location, scale))
    return [exp(-rare) if rare.value < 5000 else 0 * rare]


def survival(x, location, scale):
    rare = exp(-clamped(x, location, scale))
    return [-expm1(-rare) if rare.value < 5000 else 0 * rare + 1]


def log_cdf(x, location, scale):
    return [-exp(-clamped(x, location, scale))]


def log_survival(x, location, scale):
    rare = exp(-clamped(x, location, scale))
    return [log(-expm1(-rare)) if rare.value < 100 else log1p(-exp(-rare)) if rare.value < 5000 else 0 * rare]


def quantile(p, location, scale):
    return [location, -scale * log(-log(p))]


def upper_quantile(p, location, scale):
    return [location, -scale * log(-log1p(-p))]


def mean(location, scale):
    return [location, scale * +mpmath.euler]


def kl(l, s, m, t):
    """With r = s / t and d = (l - m) / t: log(1/r) + gamma (r - 1) + exp(-d) Gamma(1 + r) - 1 + d."""
    r, d = s / t, (l - m) / t
    gamma = r.chain(mpmath.gamma(1 + r.value), mpmath.gamma(1 + r.value) * mpmath.digamma(1 + r.value))
    return [-log(r), mpmath.euler * (r - 1), exp(-d) * gamma, constant(-1, r), d]


BOTH, THREE = 'location scale', 'x location scale'
FOUR = 'location scale otherLocation otherScale'
# The kernel, the formula (a list of terms), its arguments, those it has a partial derivative in.
FUNCTIONS = {
    'logDensity': ('gumbelLogDensity', log_density, THREE, THREE),
    'cdf': ('gumbelCdf', cdf, THREE, THREE),
    'survival': ('gumbelSurvival', survival, THREE, THREE),
    'logCdf': ('gumbelLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('gumbelLogSurvival', log_survival, THREE, THREE),
    'quantile': ('gumbelQuantile', quantile, 'p location scale', 'p location scale'),
    'upperQuantile': ('gumbelUpperQuantile', upper_quantile, 'p location scale', 'p location scale'),
    'mean': ('gumbelMean', mean, BOTH, BOTH),
    'mode': ('identity', lambda l: [l], 'location', 'location'),
    'variance': ('gumbelVariance', lambda s: [square(s) * mpmath.pi ** 2 / 6], 'scale', 'scale'),
    'entropy': ('gumbelEntropy', lambda s: [log(s), constant(1 + mpmath.euler, s)], 'scale', 'scale'),
    'kl': ('gumbelKl', kl, FOUR, FOUR),
}

AT_X = (located, located_corners())
AT_P = (lambda d: (share(d), center(d), spread(d)),
        with_shares(LOCATED) + [(p, 0.0, 1.0) for p in fence(mpmath.exp(-1), 1 - mpmath.exp(-1))])
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    'mean': (lambda d: (center(d), spread(d)), [(l, s) for l in (0.0, 1.0, -1e20, -0.5772157) for (s,) in ONE_SPREAD]),
    'mode': (lambda d: (center(d),), [(c,) for c in fence(0, 1, -1, 1e30, 16777216, -5, 1e-30)]),
    'variance': (lambda d: (spread(d),), ONE_SPREAD), 'entropy': (lambda d: (spread(d),), ONE_SPREAD),
    'kl': (located_pair, PAIRS),
}
