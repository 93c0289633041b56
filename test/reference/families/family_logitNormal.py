"""The logit-normal distribution by its textbook formulas."""
import itertools

import mpmath
from mpmath import mpf

from dual import log, log1p, phi, probit, sigmoid, square
from machinery import f32, step
from points import PAIRS, SHARES, SMALLEST, located_pair, moderate_located, share
from scalar import MINUS_INFINITY, constant, log_2pi, normal_kl

PARAMETERS = {'location': ['location'], 'scale': ['scale', 'logScale']}
DIGITS = {'': 420, 'quantile': 120, 'upperQuantile': 120, 'kl': 420}


def inside(x):
    return 0 < x.value < 1


def standard(x, l, s):
    return (log(x) - log1p(-x) - l) / s


def held(x, like, value, below, above):
    return [value() if inside(x) else constant(below if x.value <= 0 else above, like)]


def log_density(x, l, s):
    if not inside(x):
        return [constant(MINUS_INFINITY, l)]
    return [-square(standard(x, l, s)) / 2, -log(x), -log1p(-x), -log(s), constant(-log_2pi() / 2, s)]


def log_phi(z):
    """log of the normal distribution function; far out by its asymptotic series, to all digits."""
    if z.value > -mpf(10) ** 5:
        return log(phi(z)) if z.value < 30 else log1p(-phi(-z))
    r = 1 / square(z)
    series, term = constant(1, z), constant(1, z)
    for k in range(1, 60):
        term = -term * r * (2 * k - 1)
        series = series + term
    return -square(z) / 2 - log(-z) - constant(log_2pi() / 2, z) + log(series)


def draw(noise, l, s):
    x = sigmoid(l + s * noise)
    return [x.chain(min(max(x.value, mpf(2) ** -149), 1 - mpf(2) ** -24), mpf(1))]


BOTH, AT_X, AT_P = 'location scale', 'x location scale', 'p location scale'
FUNCTIONS = {
    'logDensity': ('logitNormalLogDensity', log_density, AT_X, AT_X),
    'cdf': ('logitNormalCdf', lambda x, l, s: held(x, l, lambda: phi(standard(x, l, s)), 0, 1), AT_X, AT_X),
    'survival': ('logitNormalSurvival', lambda x, l, s: held(x, l, lambda: phi(-standard(x, l, s)), 1, 0), AT_X, AT_X),
    'logCdf': ('logitNormalLogCdf', lambda x, l, s: held(x, l, lambda: log_phi(standard(x, l, s)), MINUS_INFINITY, 0), AT_X, AT_X),
    'logSurvival': ('logitNormalLogSurvival', lambda x, l, s: held(x, l, lambda: log_phi(-standard(x, l, s)), 0, MINUS_INFINITY), AT_X, AT_X),
    'quantile': ('logitNormalQuantile', lambda p, l, s: [sigmoid(l + s * probit(p))], AT_P, AT_P),
    'upperQuantile': ('logitNormalUpperQuantile', lambda p, l, s: [sigmoid(l - s * probit(p))], AT_P, AT_P),
    'draw': ('logitNormalDraw', draw, AT_X, BOTH),
    'kl': ('normalKl', normal_kl, 'location scale otherLocation otherScale', 'location scale otherLocation otherScale'),
}


def point(d):
    l, s = moderate_located(d)
    kind = d.random.random()
    if kind < 0.6:
        v = l + s * d.random.gauss(0, 2)
        x = f32(1 / (1 + mpmath.exp(-v)))
    elif kind < 0.8:
        x = d.log_uniform(1.5e-45, 1)
    else:
        x = f32(1 - d.random.randint(1, 2000) * 2.0 ** -24)
    return min(step(1.0, -1), max(SMALLEST, x)), l, s


def near_zero(x, n):
    """A point beside the one at which z vanishes."""
    l = step(f32(mpmath.log(mpf(f32(x))) - mpmath.log1p(-mpf(f32(x)))), n)
    return f32(x), l, 1.0


XS = list(itertools.product((SMALLEST, 1e-20, 0.25, step(0.5, -1), 0.5, step(0.5, 1), step(1.0, -1)), (0.0, -2.5, 40.0), (1e-3, 1.0, 20.0)))
XS += [near_zero(x, n) for x in (1e-30, 1e-9, 0.01, 0.3, 0.6, 0.99, 0.999999) for n in (-8, -1, 0, 1, 8)]
OUTSIDE = [(-1.0, 0.0, 1.0), (0.0, 0.0, 1.0), (1.0, 0.0, 1.0), (2.0, 0.0, 1.0)]
MODERATE = [(0.0, 1.0), (1.0, 0.5), (-2.5, 3.0), (40.0, 0.1), (-80.0, 2.0), (0.0, 20.0)]
NOISES = [0.0, 1e-30, -1e-7, 0.5, -0.5, 3.0, -3.0, 6.0, -6.0]
POINTS = {
    **{n: (point, XS + OUTSIDE) for n in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    **{n: (lambda d: (share(d), *moderate_located(d)), [(p, *c) for p in SHARES for c in MODERATE]) for n in ('quantile', 'upperQuantile')},
    'draw': (lambda d: (d.uniform(-6, 6), *moderate_located(d)), [(n, *c) for n in NOISES for c in MODERATE]),
    'kl': (located_pair, PAIRS),
}
