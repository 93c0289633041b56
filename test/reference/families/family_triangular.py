"""The triangular distribution by its textbook formulas."""
from mpmath import mpf

from dual import log, sigmoid, sqrt, square
from machinery import f32, fence, step
from points import LARGEST, SHARES, SMALLEST, center, interval, share, within
from scalar import MINUS_INFINITY, constant

PARAMETERS = {'lower': ['lower'], 'peak': ['peak'], 'upper': ['upper']}
DIGITS = {'': 240}


def log_density(x, a, c, b):
    if x.value == c.value:
        return [constant(1, a) * 0 + log(constant(2, a)) - log(b - a)]
    if not a.value < x.value < b.value:
        return [constant(MINUS_INFINITY, a)]
    if x.value < c.value:
        return [log(constant(2, a)), log((x - a) / (c - a)), -log(b - a)]
    return [log(constant(2, a)), log((b - x) / (b - c)), -log(b - a)]


def lower_share(x, a, c, b):
    if x.value < c.value:
        return square(x - a) / ((b - a) * (c - a))
    return 1 - square(b - x) / ((b - a) * (b - c))


def held(x, a, b, value, below, above):
    return [value() if a.value < x.value < b.value else constant(below if x.value <= a.value else above, a)]


def cdf(x, a, c, b):
    return held(x, a, b, lambda: lower_share(x, a, c, b), 0, 1)


def survival(x, a, c, b):
    return held(x, a, b, lambda: 1 - lower_share(x, a, c, b), 1, 0)


def log_cdf(x, a, c, b):
    return held(x, a, b, lambda: log(lower_share(x, a, c, b)), MINUS_INFINITY, 0)


def log_survival(x, a, c, b):
    return held(x, a, b, lambda: log(1 - lower_share(x, a, c, b)), 0, MINUS_INFINITY)


def point(p, q, a, c, b):
    if (p * (b - a)).value <= (c - a).value:
        near, far = [a, sqrt(p * (b - a) * (c - a))], None
        t = near[1] / (b - a)
    else:
        far = [b, -sqrt(q * (b - a) * (b - c))]
        t = 1 + far[1] / (b - a)
    # The two parts of a point from the nearer end.
    if t.value < 0.5:
        return [a, (b - a) * t]
    return [b, (b - a) * (t - 1)]


def quantile(p, a, c, b):
    return point(p, 1 - p, a, c, b)


def upper_quantile(p, a, c, b):
    return point(1 - p, p, a, c, b)


def draw(noise, a, c, b):
    return point(sigmoid(noise), sigmoid(-noise), a, c, b)


THREE, AT_X, AT_P = 'lower peak upper', 'x lower peak upper', 'p lower peak upper'
FUNCTIONS = {
    'logDensity': ('triangularLogDensity', log_density, AT_X, AT_X),
    'cdf': ('triangularCdf', cdf, AT_X, AT_X),
    'survival': ('triangularSurvival', survival, AT_X, AT_X),
    'logCdf': ('triangularLogCdf', log_cdf, AT_X, AT_X),
    'logSurvival': ('triangularLogSurvival', log_survival, AT_X, AT_X),
    'quantile': ('triangularQuantile', quantile, AT_P, AT_P),
    'upperQuantile': ('triangularUpperQuantile', upper_quantile, AT_P, AT_P),
    'draw': ('triangularDraw', draw, AT_X, THREE),
    'mean': ('triangularMean', lambda a, c, b: [a / 3, c / 3, b / 3], THREE, THREE),
    'mode': ('identity', lambda c: [c], 'peak', 'peak'),
    'variance': ('triangularVariance', lambda a, c, b: [(square(c - a) + square(b - c) + (c - a) * (b - c)) / 18], THREE, THREE),
    'entropy': ('triangularEntropy', lambda a, c, b: [log(b - a), constant(mpf(1) / 2, a), -log(constant(2, a))],
                THREE, 'lower upper'),
}


def triangle(d):
    a, b = interval(d)
    kind = d.random.random()
    c = a if kind < 0.1 else b if kind < 0.2 else within(d, a, b)
    return a, c, b


def inside(d):
    a, c, b = triangle(d)
    x = within(d, a, b)
    return x, a, c, b


CORNERS = [(0.0, 0.0, 1.0), (0.0, 1.0, 1.0), (-1.0, 0.0, 1.0), (0.0, SMALLEST, 1.0), (0.0, step(1.0, -1), 1.0), (-LARGEST, 0.0, LARGEST),
           (0.0, SMALLEST, LARGEST), (0.0, SMALLEST, 3e-45), (1.0, step(1.0, 1), step(1.0, 2)), (-3.0, 1e-20, 1e38), (2.0, 2.5, 4.0)]
XS = ([(x, *t) for t in CORNERS for x in (t[1], f32(t[0] / 2 + t[2] / 2), step(t[0], 1), step(t[2], -1), t[0], t[2]) if x not in (t[0], t[2]) or x != t[1]]
      + [(step(f32(x), n), 0.0, 1.0, 4.0) for x in (0.5, 1.4142135, 1.0) for n in (-8, -1, 1, 8)]
      + [(-1.0, 0.0, 0.5, 1.0), (2.0, 0.0, 0.5, 1.0), (-LARGEST, 0.0, 0.5, 1.0)])
NOISES = [0.0, 1e-30, -1e-7, 0.5, -0.5, 5.0, -5.0, 17.0, -18.0, 60.0, -90.0]
# The middle, where the derivative in the peak has no sign.
EVEN = [(-1.0, 0.0, 1.0), (-LARGEST, 0.0, LARGEST)]
SIDES = [t for t in CORNERS if t not in EVEN] + [(0.0, f32(c * b), f32(b)) for c in (0.1, 0.25, 0.49, 0.51, 0.9) for b in (1.0, 2.0, 2.0 * 2.718281828 ** -0.5, 1e-30, 1e30)]
SIDES += [(f32(-1 - k), f32(0.25 * k), f32(3 + k * k)) for k in range(30)]
POINTS = {
    **{n: (inside, XS) for n in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    **{n: (lambda d: (share(d), *triangle(d)), [(p, *c) for p in SHARES for c in CORNERS]) for n in ('quantile', 'upperQuantile')},
    'draw': (lambda d: (d.uniform(-15, 15), *triangle(d)), [(n, *c) for n in NOISES for c in CORNERS]),
    'mean': (triangle, SIDES + EVEN), 'variance': (triangle, SIDES + EVEN),
    'mode': (lambda d: (center(d),), [(c,) for c in fence(0, 1, -1, 1e30, 16777216, -5, 1e-30)]),
    'entropy': (triangle, SIDES + [(0.0, 0.0, b) for b in fence(1.2130613)]),
}
