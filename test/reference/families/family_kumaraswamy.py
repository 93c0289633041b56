"""The Kumaraswamy distribution by its textbook formulas."""
import itertools

import mpmath
from mpmath import mpf

from dual import exp, expm1, log, log1p
from machinery import f32, step
from points import SHARES, SMALLEST, share
from scalar import MINUS_INFINITY, constant

PARAMETERS = {'alpha': ['alpha'], 'beta': ['beta']}
DIGITS = {'': 420, 'mean': 90, 'variance': 120, 'entropy': 90}


def power(x, a):
    """log x^a, no lower than where it leaves every format."""
    y = a * log(x)
    return y if y.value > -2000 else y.chain(mpf(-2000), mpf(0))


def log1mexp(y):
    return log(-expm1(y)) if y.value > -1 else log1p(-exp(y))


def inside(x):
    return 0 < x.value < 1


def log_density(x, a, b):
    if not inside(x):
        return [constant(MINUS_INFINITY, a)]
    return [log(a), log(b), (a - 1) * log(x), (b - 1) * log1mexp(power(x, a))]


def log_survival(x, a, b):
    return b * log1mexp(power(x, a))


def clamp(l):
    return l if l.value > -2000 else l.chain(mpf(-2000), mpf(0))


def held(x, a, value, below, above):
    return [value() if inside(x) else constant(below if x.value <= 0 else above, a)]


def log_cdf(x, a, b):
    y = a * log(x)
    # Far out 1 − (1 − u)^b is b u to more than all digits.
    if y.value < -2000 and (log(b) + y).value < -1000:
        return log(b) + y
    l = log_survival(x, a, b)
    return log1mexp(l) if l.value > -2000 else l * 0


def from_log(e, a, b):
    y = log1mexp(clamp(-e / b)) / a
    return exp(y) if y.value > -2000 else y * 0


def draw(noise, a, b):
    x = from_log(noise, a, b)
    low, high = mpf(2) ** -149, 1 - mpf(2) ** -24
    return [x.chain(min(max(x.value, low), high), mpf(1))]


def log_gamma(x):
    return x.chain(mpmath.loggamma(x.value), mpmath.digamma(x.value))


def moment(s, b):
    """log of beta B(1 + s, beta)."""
    return log_gamma(1 + s) + log_gamma(1 + b) - log_gamma(1 + s + b)


def mean(a, b):
    return [exp(moment(1 / a, b))]


def variance(a, b):
    return [exp(moment(2 / a, b)) - exp(2 * moment(1 / a, b))]


def mode(a, b):
    return [exp(log((a - 1) / (a * b - 1)) / a)]


def entropy(a, b):
    h = b.chain(mpmath.digamma(1 + b.value) + mpmath.euler, mpmath.psi(1, 1 + b.value))
    return [h, -h / a, constant(1, a), -1 / b, -log(a), -log(b)]


BOTH, AT_X, AT_P = 'alpha beta', 'x alpha beta', 'p alpha beta'
FUNCTIONS = {
    'logDensity': ('kumaraswamyLogDensity', log_density, AT_X, AT_X),
    'cdf': ('kumaraswamyCdf', lambda x, a, b: held(x, a, lambda: -expm1(clamp(log_survival(x, a, b))), 0, 1), AT_X, AT_X),
    'survival': ('kumaraswamySurvival', lambda x, a, b: held(x, a, lambda: exp(clamp(log_survival(x, a, b))), 1, 0), AT_X, AT_X),
    'logCdf': ('kumaraswamyLogCdf', lambda x, a, b: held(x, a, lambda: log_cdf(x, a, b), MINUS_INFINITY, 0), AT_X, AT_X),
    'logSurvival': ('kumaraswamyLogSurvival', lambda x, a, b: held(x, a, lambda: log_survival(x, a, b), 0, MINUS_INFINITY), AT_X, AT_X),
    'quantile': ('kumaraswamyQuantile', lambda p, a, b: [from_log(-log1p(-p), a, b)], AT_P, AT_P),
    'upperQuantile': ('kumaraswamyUpperQuantile', lambda p, a, b: [from_log(-log(p), a, b)], AT_P, AT_P),
    'draw': ('kumaraswamyDraw', draw, AT_X, BOTH),
    'mean': ('kumaraswamyMean', mean, BOTH, BOTH),
    'variance': ('kumaraswamyVariance', variance, BOTH, BOTH),
    'mode': ('kumaraswamyMode', mode, BOTH, BOTH),
    'entropy': ('kumaraswamyEntropy', entropy, BOTH, BOTH),
}


def shape(d):
    return d.log_uniform(0.05, 20) if d.random.random() < 0.6 else d.log_uniform(1e-6, 1e6)


def shapes(d):
    return shape(d), shape(d)


def point(d):
    a, b = shapes(d)
    kind = d.random.random()
    if kind < 0.7:
        x = f32(mpmath.exp(mpmath.log1p(-mpmath.exp(mpmath.log(d.random.random()) / b)) / a))
    elif kind < 0.85:
        x = d.log_uniform(1.5e-45, 1)
    else:
        x = f32(1 - d.random.randint(1, 2000) * 2.0 ** -24)
    return min(step(1.0, -1), max(SMALLEST, x)), a, b


PAIRS = list(itertools.product((1e-6, 0.01, 0.5, 1.0, step(1.0, 1), 3.0, 1e3, 1e6), repeat=2))
CORNERS = [(x, a, b) for x in (SMALLEST, 1e-20, 0.25, step(1.0, -1)) for a, b in PAIRS[::3]]
OUTSIDE = [(-1.0, 2.0, 3.0), (1.5, 2.0, 3.0), (-1e-38, 0.5, 0.5), (step(1.0, 1), 0.5, 0.5)]
PEAKED = [(step(1.0, 1), step(1.0, 1)), (2.0, step(1.0, 1)), (step(1.0, 1), 2.0), (1e6, 1e6), (2.0, 1e6), (1e6, 2.0), (1.5, 1.5)]
PEAKED += [(f32(1 + 2.0 ** -k), f32(1 + 2.0 ** -j)) for k in range(0, 24, 3) for j in range(0, 24, 3)]
NOISES = [SMALLEST, 1e-20, 1e-3, 0.5, 0.6931472, 1.0, 20.0, 100.0]
POINTS = {
    **{n: (point, CORNERS + OUTSIDE) for n in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    **{n: (lambda d: (share(d), *shapes(d)), [(p, *c) for p in SHARES for c in PAIRS[::9]]) for n in ('quantile', 'upperQuantile')},
    'draw': (lambda d: (d.log_uniform(1e-6, 30), *shapes(d)), [(n, *c) for n in NOISES for c in PAIRS[::7]]),
    **{n: (shapes, PAIRS) for n in ('mean', 'variance', 'entropy')},
    'mode': (lambda d: (f32(1 + d.log_uniform(1e-5, 1e3)), f32(1 + d.log_uniform(1e-5, 1e3))), PEAKED),
}
