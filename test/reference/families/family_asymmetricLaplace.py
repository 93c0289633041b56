"""The asymmetric Laplace distribution by its textbook formulas."""

from mpmath import mpf

from dual import exp, log, log1p, softplus, square
from machinery import f32, step
from points import SHARES, SMALLEST, center, located, share, spread
from scalar import constant

PARAMETERS = {'location': ['location'], 'scale': ['scale', 'logScale'], 'asymmetry': ['asymmetry']}
DIGITS = {'': 420}


def held(y):
    """An exponent, no lower than where it leaves every format."""
    return y if y.value > -5000 else y.chain(mpf(-5000), mpf(0))


def parts(x, l, s, k):
    z = (x - l) / s
    return z, (z / k if z.value < 0 else -k * z), 1 / (1 + square(k))


def log_density(x, l, s, k):
    z, e, _ = parts(x, l, s, k)
    if z.value == 0:
        e = e * 0
    return [e, -log(k + 1 / k), -log(s)]


def cdf(x, l, s, k):
    z, e, w = parts(x, l, s, k)
    return [square(k) * w * exp(held(e))] if z.value < 0 else [1 - w * exp(held(e))]


def survival(x, l, s, k):
    z, e, w = parts(x, l, s, k)
    return [1 - square(k) * w * exp(held(e))] if z.value < 0 else [w * exp(held(e))]


def log_cdf(x, l, s, k):
    z, e, w = parts(x, l, s, k)
    return [e + log(square(k) * w)] if z.value < 0 else [log1p(-w * exp(held(e)))]


def log_survival(x, l, s, k):
    z, e, w = parts(x, l, s, k)
    return [log1p(-square(k) * w * exp(held(e)))] if z.value < 0 else [e + log(w)]


def point(log_below, log_above, l, s, k):
    lower = k * (log_below + log1p(1 / square(k)))
    return [l, s * lower if lower.value < 0 else -s * (log_above + log1p(square(k))) / k]


def quantile(p, l, s, k):
    return point(log(p), log1p(-p), l, s, k)


def upper_quantile(p, l, s, k):
    return point(log1p(-p), log(p), l, s, k)


def draw(noise, l, s, k):
    return point(-softplus(-noise), -softplus(noise), l, s, k)


def kl(l, s, k, m, t, j):
    if m.value < l.value:
        l, m, k, j = -l, -m, 1 / k, 1 / j
    d, w = (m - l) / s, 1 / (1 + square(k))
    upper = w * exp(held(-k * d)) / k
    return [s / t * j * upper, s / t / j * (upper + d - 1 / k + k), constant(-1, s), -log(s / t), log((j + 1 / j) / (k + 1 / k))]


THREE, AT_X, AT_P = 'location scale asymmetry', 'x location scale asymmetry', 'p location scale asymmetry'
SIX = THREE + ' otherLocation otherScale otherAsymmetry'
FUNCTIONS = {
    'logDensity': ('asymmetricLaplaceLogDensity', log_density, AT_X, AT_X),
    'cdf': ('asymmetricLaplaceCdf', cdf, AT_X, AT_X),
    'survival': ('asymmetricLaplaceSurvival', survival, AT_X, AT_X),
    'logCdf': ('asymmetricLaplaceLogCdf', log_cdf, AT_X, AT_X),
    'logSurvival': ('asymmetricLaplaceLogSurvival', log_survival, AT_X, AT_X),
    'quantile': ('asymmetricLaplaceQuantile', quantile, AT_P, AT_P),
    'upperQuantile': ('asymmetricLaplaceUpperQuantile', upper_quantile, AT_P, AT_P),
    'draw': ('asymmetricLaplaceDraw', draw, AT_X, THREE),
    'mean': ('asymmetricLaplaceMean', lambda l, s, k: [l, s * (1 / k - k)], THREE, THREE),
    'variance': ('asymmetricLaplaceVariance', lambda s, k: [square(s) * (square(k) + 1 / square(k))], 'scale asymmetry', 'scale asymmetry'),
    'entropy': ('asymmetricLaplaceEntropy', lambda s, k: [log(s), constant(1, s) + log(k + 1 / k)], 'scale asymmetry', 'scale asymmetry'),
    'kl': ('asymmetricLaplaceKl', kl, SIX, SIX),
}


def tilt(d):
    return d.log_uniform(0.1, 10) if d.random.random() < 0.6 else d.log_uniform(1e-6, 1e6)


def at_x(d):
    return (*located(d), tilt(d))


def members(d):
    return center(d), spread(d), tilt(d)


def six(d):
    l, s, k = d.uniform(-5, 5), d.log_uniform(1e-2, 1e2), tilt(d)
    kind = d.random.random()
    if kind < 0.6:
        e = d.log_uniform(1e-6, 1)
        m, t, j = (f32(v + e * w * d.random.gauss(0, 1)) for v, w in ((l, s), (s, s / 2), (k, k / 2)))
        return l, s, k, m, max(SMALLEST, abs(t)), max(SMALLEST, abs(j))
    return l, s, k, d.uniform(-5, 5), d.log_uniform(1e-2, 1e2), tilt(d)


TILTS = [1e-6, 0.01, 0.5, step(1.0, -1), 1.0, step(1.0, 1), 2.0, 1e3, 1e6]
ZS = [0.0, 1e-30, 1e-7, 0.5, -0.5, 5.0, -5.0, 100.0, -104.0, 1e10, -1e25]
CORNERS = [(z, 0.0, 1.0, k) for z in ZS for k in TILTS[::2]] + [(f32(1e30 * z), 0.0, 1e30, k) for z in ZS[:7] for k in TILTS[1::3]]
CORNERS += [(step(f32(1 / k), n), 0.0, 1.0, k) for k in TILTS for n in (-3, 0, 1)]
ROOTS = [(step(f32(k * k / (1 + k * k)), n), 0.0, 1.0, f32(k)) for k in (0.03, 0.3, 1.0, 1.7, 9.0) for n in (-8, -1, 0, 1, 8)]
ROOTS_UP = [(step(f32(1 / (1 + k * k)), n), 0.0, 1.0, f32(k)) for k in (0.11, 0.3, 1.0, 1.7, 30.0) for n in (-8, -1, 0, 1, 8)]
MEMBERS = [(l, s, k) for l, s in ((0.0, 1.0), (1.0, 1e-3), (-1e6, 1e3)) for k in TILTS]
NOISES = [0.0, 1e-30, -1e-7, 0.5, -0.5, 5.0, -17.0, 60.0, -90.0]
WIDE = MEMBERS + [(0.0, s, f32(k)) for s in (1e-20, 1e10) for k in (0.1, 0.25, 0.7, 1.2, 1.5, 4, 7, 30, 100)] + [(0.3, 0.7, f32(1 + 2.0 ** -n)) for n in range(1, 23)]
PAIRS = [(0.0, 1.0, k, f32(d), f32(t), j) for k in (0.01, 0.5, 1.0, 3.0, 100.0) for d in (0.0, 1e-6, -1e-3, 2.0) for t in (1.0, step(1.0, 1), 0.7)
         for j in (k, f32(k * (1 + 1e-6)), f32(k * 1.5))]
PAIRS = [p for p in PAIRS if not (p[3] == 0 and p[4] == 1 and p[5] == p[2])][::2] + [(0.5, 2.0, k, 0.5, 2.0, k) for k in TILTS]
POINTS = {
    **{n: (at_x, CORNERS) for n in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    'quantile': (lambda d: (share(d), *members(d)), [(p, *c) for p in SHARES for c in MEMBERS[::4]] + ROOTS),
    'upperQuantile': (lambda d: (share(d), *members(d)), [(p, *c) for p in SHARES for c in MEMBERS[::4]] + ROOTS_UP),
    'draw': (lambda d: (d.uniform(-15, 15), *members(d)), [(n, *c) for n in NOISES for c in MEMBERS[::3]]),
    'mean': (members, WIDE),
    **{n: (lambda d: members(d)[1:], [c[1:] for c in WIDE] + [(s, k) for s in (0.5, 1.0, 2.0) for k in TILTS]) for n in ('variance', 'entropy')},
    'kl': (six, PAIRS),
}
