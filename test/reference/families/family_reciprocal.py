"""The reciprocal (log-uniform) distribution by its textbook formulas."""
import mpmath
from mpmath import mpf

from dual import exp, log, sigmoid, square
from machinery import f32, fence, step
from points import LARGEST, SHARES, SMALLEST, share, within
from scalar import MINUS_INFINITY, constant

PARAMETERS = {'lower': ['lower'], 'upper': ['upper']}
DIGITS = {'': 120}


def inside(x, a, b):
    return a.value < x.value < b.value


def log_density(x, a, b):
    if not a.value <= x.value <= b.value:
        return [constant(MINUS_INFINITY, a)]
    return [-log(x), -log(log(b / a))]


def held(x, a, b, value, below, above):
    return [value() if inside(x, a, b) else constant(below if x.value <= a.value else above, a)]


def cdf(x, a, b):
    return held(x, a, b, lambda: log(x / a) / log(b / a), 0, 1)


def survival(x, a, b):
    return held(x, a, b, lambda: log(b / x) / log(b / a), 1, 0)


def log_cdf(x, a, b):
    return held(x, a, b, lambda: log(log(x / a) / log(b / a)), MINUS_INFINITY, 0)


def log_survival(x, a, b):
    return held(x, a, b, lambda: log(log(b / x) / log(b / a)), 0, MINUS_INFINITY)


def quantile(p, a, b):
    return [a * exp(p * log(b / a))]


def upper_quantile(p, a, b):
    return [b * exp(-p * log(b / a))]


def draw(noise, a, b):
    return [a * exp(sigmoid(noise) * log(b / a))]


def mean(a, b):
    return [(b - a) / log(b / a)]


def variance(a, b):
    m = (b - a) / log(b / a)
    return [(square(b) - square(a)) / (2 * log(b / a)) - square(m)]


def entropy(a, b):
    return [log(log(b / a)), log(a) / 2, log(b) / 2]


def kl(a, b, c, d):
    if a.value < c.value or b.value > d.value:
        return [constant(mpf('inf'), a)]
    return [log(log(d / c)), -log(log(b / a))]


THREE, AT_P = 'x lower upper', 'p lower upper'
FUNCTIONS = {
    'logDensity': ('reciprocalLogDensity', log_density, THREE, THREE),
    'cdf': ('reciprocalCdf', cdf, THREE, THREE),
    'survival': ('reciprocalSurvival', survival, THREE, THREE),
    'logCdf': ('reciprocalLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('reciprocalLogSurvival', log_survival, THREE, THREE),
    'quantile': ('reciprocalQuantile', quantile, AT_P, AT_P),
    'upperQuantile': ('reciprocalUpperQuantile', upper_quantile, AT_P, AT_P),
    'draw': ('reciprocalDraw', draw, THREE, 'lower upper'),
    'mean': ('reciprocalMean', mean, 'lower upper', 'lower upper'),
    'mode': ('identity', lambda a: [a], 'lower', 'lower'),
    'variance': ('reciprocalVariance', variance, 'lower upper', 'lower upper'),
    'entropy': ('reciprocalEntropy', entropy, 'lower upper', 'lower upper'),
    'kl': ('reciprocalKl', kl, 'lower upper otherLower otherUpper', 'lower upper otherLower otherUpper'),
}


def bounds(d):
    a = d.positive()
    kind = d.random.random()
    if kind < 0.3:
        b = step(a, d.random.randint(1, 50))
    elif kind < 0.7:
        b = f32(a * float(d.log_uniform(1.0001, 1e3)))
    else:
        b = d.positive()
    a, b = min(a, b), max(a, b)
    return (a, b) if a < b else (a, step(a, 1))


def point(d):
    a, b = bounds(d)
    kind = d.random.random()
    if kind < 0.7:
        u = d.random.random()
        x = f32(mpmath.exp((1 - u) * mpmath.log(a) + u * mpmath.log(b)))
        return min(b, max(a, x)), a, b
    return within(d, a, b), a, b


def four(d):
    c, e = bounds(d)
    kind = d.random.random()
    if kind < 0.5:
        a, b = step(c, d.random.randint(0, 20)), step(e, -d.random.randint(0, 20))
    else:
        a, b = sorted((within(d, c, e), within(d, c, e)))
    return (a, b, c, e) if a < b else (c, e, c, e)


E = float(mpmath.e)
CORNERS = [(SMALLEST, LARGEST), (1.0, step(1.0, 1)), (SMALLEST, step(SMALLEST, 1)), (1.0, f32(E)), (0.5, 1.0), (1e-20, 1.0),
           (1.0, 1e20), (f32(0.7), f32(0.7 * 1.5)), (3e38, LARGEST), (1.0, f32(E ** 2)), (2.0, f32(2 * E))]
NARROW = ([(a, step(f32(a * E), n)) for a in (1.0, f32(0.3), 1e-20) for n in (-64, -3, -1, 0, 1, 2, 8)]
          + [(a, step(f32(a * r), n)) for a in (1.0, f32(0.7)) for r in (1.5, E ** 2, 2 / 3 + 1) for n in (-3, 0, 1, 8)])
INSIDE = ([(x, a, b) for a, b in CORNERS for x in (a, b, f32((a * b) ** 0.5))] + [(1.0, 1.0, b) for a, b in NARROW[:7]]
          + [(2.0, 1.0, f32(b)) for b in (2.5, 3.9, 4.1, 30.0)] + [(step(2.0, n), 1.0, 4.0) for n in (-8, -1, 0, 1, 8)])
OUTSIDE = [(0.5, 1.0, 2.0), (3.0, 1.0, 2.0), (-1.0, 1.0, 2.0), (0.0, 1.0, 2.0), (LARGEST, 1.0, 2.0)]
NOISES = [0.0, 1e-30, -1e-7, 0.5, -0.5, 5.0, -5.0, 17.0, -18.0, 60.0, -90.0]
POINTS = {
    **{n: (point, INSIDE + OUTSIDE) for n in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    **{n: (lambda d: (share(d), *bounds(d)), [(p, *c) for p in SHARES for c in CORNERS[:8]]) for n in ('quantile', 'upperQuantile')},
    'draw': (lambda d: (d.uniform(-15, 15), *bounds(d)), [(n, *c) for n in NOISES for c in CORNERS[:8]]),
    **{n: (bounds, CORNERS + NARROW + [(1.0, f32(r)) for r in (1.2, 1.3, 1.4285, 1.43, 1.6, 2, 5, 7.3, 7.5, 100, 1e6)]
           + [(1.0, f32(1 + 2.0 ** -k)) for k in range(1, 23)]) for n in ('mean', 'variance', 'entropy')},
    'mode': (lambda d: (d.positive(),), [(c,) for c in fence(1, 1e30, 3, 16777216, 1e-30)]),
    'kl': (four, [(a, b, a, b) for a, b in CORNERS] + [(2.0, 3.0, f32(2 - x), f32(3 + y)) for x in (0.0, 3e-7, 1e-3, 1.5, 1.9999)
                                                      for y in (0.0, 3e-7, 1e-3, 1e10, 1e38)]
           + [(1.0, 3.0, 1.5, 4.0), (1.0, 3.0, 0.5, 2.0)]
           + [(f32(2 + x), f32(3 - y), 2.0, 3.0) for x in (0.0, 2.4e-7, 1e-3, 0.4) for y in (0.0, 2.4e-7, 1e-3, 0.4)]),
}
