"""The half-Cauchy distribution by its textbook formulas."""
import mpmath
from mpmath import mpf

from dual import log, log1p, square
from family_rayleigh import AT_P, AT_SCALE, SCALE_PAIR, SCALED, scaled
from scalar import constant
from shapes import atan, nothing, tan

PARAMETERS = {'scale': ['scale', 'logScale']}
DIGITS = {'': 420}
MINUS_INFINITY = mpf('-inf')


def log_density(x, scale):
    if x.value < 0:
        return nothing(MINUS_INFINITY, x)
    return [constant(mpmath.log(2 / mpmath.pi), x), -log1p(square(x / scale)), -log(scale)]


def below(x, scale):
    return 2 / mpmath.pi * atan(x / scale)


def above(x, scale):
    return 2 / mpmath.pi * atan(scale / x)


def cdf(x, scale):
    return nothing(0, x) if x.value < 0 else [below(x, scale)]


def survival(x, scale):
    return nothing(1, x) if x.value < 0 else [above(x, scale) if x.value > 0 else 1 - below(x, scale)]


def log_cdf(x, scale):
    if x.value <= 0:
        return nothing(MINUS_INFINITY, x)
    return [log(below(x, scale)) if x.value < scale.value else log1p(-above(x, scale))]


def log_survival(x, scale):
    if x.value < 0:
        return nothing(0, x)
    return [log1p(-below(x, scale)) if x.value < scale.value else log(above(x, scale))]


def quantile(p, scale):
    return [scale * tan(mpmath.pi * p / 2)]


def upper_quantile(p, scale):
    return [scale / tan(mpmath.pi * p / 2)]


def kl(s, t):
    return [log(square(s + t) / (4 * s * t))]


TWO, SHARE = 'x scale', 'p scale'
FUNCTIONS = {
    'logDensity': ('halfCauchyLogDensity', log_density, TWO, TWO),
    'cdf': ('halfCauchyCdf', cdf, TWO, TWO),
    'survival': ('halfCauchySurvival', survival, TWO, TWO),
    'logCdf': ('halfCauchyLogCdf', log_cdf, TWO, TWO),
    'logSurvival': ('halfCauchyLogSurvival', log_survival, TWO, TWO),
    'quantile': ('halfCauchyQuantile', quantile, SHARE, SHARE),
    'upperQuantile': ('halfCauchyUpperQuantile', upper_quantile, SHARE, SHARE),
    'mode': ('halfCauchyMode', lambda s: [0 * s], 'scale', 'scale'),
    'entropy': ('halfCauchyEntropy', lambda s: [log(s), constant(mpmath.log(2 * mpmath.pi), s)], 'scale', 'scale'),
    'kl': ('halfCauchyKl', kl, 'scale otherScale', 'scale otherScale'),
}
POINTS = {
    **{name: (scaled, SCALED) for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    'mode': AT_SCALE, 'entropy': AT_SCALE, 'kl': SCALE_PAIR,
}
