"""The Gompertz distribution by its textbook formulas, with the cumulated hazard H = shape (exp(rate x) - 1)."""
import itertools

import mpmath
from mpmath import mpf

from dual import exp, expm1, log, log1p
from machinery import f32, fence, step
from points import LARGEST, SHARES, SMALLEST, share
from scalar import EXP, constant
from shapes import held, nothing, scale, shape

PARAMETERS = {'shape': ['shape', 'logShape'], 'rate': ['rate', 'logRate']}
FORMS = {'logShape': EXP}
DIGITS = {'': 420, 'mean': 120, 'entropy': 120}
INFINITY = mpf('inf')


def hazard(x, shape, rate):
    return shape * expm1(held(rate * x, 4000))


def log_density(x, shape, rate):
    if x.value < 0:
        return nothing(-INFINITY, x)
    return [log(shape), log(rate), rate * x, -hazard(x, shape, rate)]


def survival(x, shape, rate):
    if x.value < 0:
        return nothing(1, x)
    h = hazard(x, shape, rate)
    return [exp(-h) if h.value < 5000 else 0 * h]


def cdf(x, shape, rate):
    if x.value < 0:
        return nothing(0, x)
    h = hazard(x, shape, rate)
    return [-expm1(-h) if h.value < 5000 else 0 * h + 1]


def log_survival(x, shape, rate):
    return nothing(0, x) if x.value < 0 else [-hazard(x, shape, rate)]


def log_cdf(x, shape, rate):
    if x.value <= 0:
        return nothing(-INFINITY, x)
    h = hazard(x, shape, rate)
    return [log(-expm1(-h)) if h.value < 100 else log1p(-exp(-h)) if h.value < 5000 else 0 * h]


def quantile(p, shape, rate):
    return [log1p(-log1p(-p) / shape) / rate]


def upper_quantile(p, shape, rate):
    return [log1p(-log(p) / shape) / rate]


def scaled_e1(x):
    """e^x E1(x) and its slope; beyond 700 by the asymptotic series to its smallest term or to all digits (DLMF 6.12.1)."""
    if x.value < 700:
        value = mpmath.exp(x.value) * mpmath.e1(x.value)
    else:
        value, term, k = 1 / x.value, 1 / x.value, 0
        while abs(term) > mpf(10) ** -(mpmath.mp.dps + 5) * value and k < x.value:
            k += 1
            term *= -k / x.value
            value += term
    return x.chain(value, value - 1 / x.value)


def mean(shape, rate):
    return [scaled_e1(shape) / rate]


def mode(shape, rate):
    return [-log(shape) / rate] if shape.value < 1 else nothing(0, shape)


def entropy(shape, rate):
    return [constant(1, shape), -log(shape), -log(rate), -scaled_e1(shape)]


def inside(d):
    """x, shape, rate at a cumulated hazard that matters mostly."""
    k, r = shape(d), scale(d)
    h = mpmath.exp(d.random.uniform(-6, 1.8) if d.random.random() < 0.75 else d.random.uniform(-60, 5))
    return max(SMALLEST, f32(mpmath.log1p(h / k) / r)), k, r


SHAPES = [1e-6, 0.02, step(1.0, -1), 1.0, step(1.0, 1), 2.9, 3.1, 150.0, 1e6]
CORNERS = ([(f32(mpmath.log1p(mpf(h) / k) / r), f32(k), f32(r)) for k, r, h in itertools.product(SHAPES, (1.0, 3.7), (1e-12, 0.3, 0.6, 0.7, 1.0, 17.0, 104.0, 760.0))]
           + [(x, f32(k), r) for x, k, r in itertools.product((SMALLEST, 1e-20, 1.0, LARGEST), (1e-3, 1.0), (1e-20, 1.0, 1e20))]
           + [(0.0, 1.0, 2.0), (-1.0, 1.0, 2.0), (-SMALLEST, 2.0, 0.5)])
AT_P = (lambda d: (share(d), shape(d), scale(d)),
        [(p, f32(k), f32(r)) for p in SHARES for k, r in ((1.0, 1.0), (2.5, 3.7), (0.01, 1e-20), (1e6, 1e20), (1e-6, 1.0), (40.0, 0.3))])
AT_BOTH = (lambda d: (shape(d), scale(d)), [(f32(k), f32(r)) for k, r in itertools.product(SHAPES, (1.0, 3.7, 1e-20, 1e20))]
           + [(k, 1.0) for k in fence(1, 3, 100, 1000, steps=(0, 1, 3, 64))])

THREE, BOTH, SHARE = 'x shape rate', 'shape rate', 'p shape rate'
FUNCTIONS = {
    'logDensity': ('gompertzLogDensity', log_density, THREE, THREE),
    'cdf': ('gompertzCdf', cdf, THREE, THREE),
    'survival': ('gompertzSurvival', survival, THREE, THREE),
    'logCdf': ('gompertzLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('gompertzLogSurvival', log_survival, THREE, THREE),
    'quantile': ('gompertzQuantile', quantile, SHARE, SHARE),
    'upperQuantile': ('gompertzUpperQuantile', upper_quantile, SHARE, SHARE),
    'mean': ('gompertzMean', mean, BOTH, BOTH),
    'mode': ('gompertzMode', mode, BOTH, BOTH),
    'entropy': ('gompertzEntropy', entropy, BOTH, BOTH),
}
POINTS = {
    **{name: (inside, CORNERS) for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': AT_P, 'upperQuantile': AT_P,
    **{name: AT_BOTH for name in ('mean', 'mode', 'entropy')},
}
