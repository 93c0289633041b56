"""The half-normal distribution by its textbook formulas."""
import mpmath
from mpmath import mpf

from dual import log, log1p, probit, square
from family_rayleigh import AT_P, AT_SCALE, SCALE_PAIR, SCALED, scaled
from scalar import constant
from shapes import erf, erfc, nothing

PARAMETERS = {'scale': ['scale', 'logScale']}
DIGITS = {'': 420, 'quantile': 100, 'upperQuantile': 100}
MINUS_INFINITY = mpf('-inf')


def standard(x, scale):
    z = x / scale / mpmath.sqrt(2)
    return z if z.value < 1e9 else z.chain(mpf(10) ** 9, mpf(0))


def log_density(x, scale):
    if x.value < 0:
        return nothing(MINUS_INFINITY, x)
    return [constant(mpmath.log(2 / mpmath.pi) / 2, x), -square(x / scale) / 2, -log(scale)]


def cdf(x, scale):
    return nothing(0, x) if x.value < 0 else [erf(standard(x, scale))]


def survival(x, scale):
    return nothing(1, x) if x.value < 0 else [erfc(standard(x, scale))]


def log_cdf(x, scale):
    if x.value <= 0:
        return nothing(MINUS_INFINITY, x)
    z = standard(x, scale)
    return [log(erf(z)) if z.value < 1 else log1p(-erfc(z))]


def log_survival(x, scale):
    """log erfc(z); far out by the asymptotic series of erfc (DLMF 7.12.1)."""
    if x.value < 0:
        return nothing(0, x)
    z = x / scale / mpmath.sqrt(2)
    if z.value < 60:
        return [log(erfc(z))]
    total, term, k = mpf(1), mpf(1), 0
    while abs(term) > mpf(10) ** -(mpmath.mp.dps + 5) and k < z.value ** 2:
        k += 1
        term *= -(2 * k - 1) / (2 * z.value ** 2)
        total += term
    tail = total / (z.value * mpmath.sqrt(mpmath.pi))
    return [z.chain(-z.value ** 2 + mpmath.log(tail), -2 / mpmath.sqrt(mpmath.pi) / tail)]


def quantile(p, scale):
    return [scale * probit((1 + p) / 2)]


def upper_quantile(p, scale):
    return [-scale * probit(p / 2)]


def kl(s, t):
    v = square(s / t)
    return [v / 2, constant(-mpf(1) / 2, s), -log(v) / 2]


TWO, SHARE = 'x scale', 'p scale'
FUNCTIONS = {
    'logDensity': ('halfNormalLogDensity', log_density, TWO, TWO),
    'cdf': ('halfNormalCdf', cdf, TWO, TWO),
    'survival': ('halfNormalSurvival', survival, TWO, TWO),
    'logCdf': ('halfNormalLogCdf', log_cdf, TWO, TWO),
    'logSurvival': ('halfNormalLogSurvival', log_survival, TWO, TWO),
    'quantile': ('halfNormalQuantile', quantile, SHARE, SHARE),
    'upperQuantile': ('halfNormalUpperQuantile', upper_quantile, SHARE, SHARE),
    'mean': ('halfNormalMean', lambda s: [s * mpmath.sqrt(2 / mpmath.pi)], 'scale', 'scale'),
    'mode': ('halfNormalMode', lambda s: [0 * s], 'scale', 'scale'),
    'variance': ('halfNormalVariance', lambda s: [square(s) * (1 - 2 / mpmath.pi)], 'scale', 'scale'),
    'entropy': ('halfNormalEntropy', lambda s: [log(s), constant(mpmath.log(mpmath.pi / 2) / 2 + mpf(1) / 2, s)], 'scale', 'scale'),
    'kl': ('halfNormalKl', kl, 'scale otherScale', 'scale otherScale'),
}
POINTS = {
    **{name: (scaled, SCALED) for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    **{name: AT_SCALE for name in ('mean', 'mode', 'variance', 'entropy')},
    'kl': SCALE_PAIR,
}
