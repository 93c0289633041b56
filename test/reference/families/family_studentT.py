"""Student's t distribution by the incomplete beta function."""
import itertools
from functools import lru_cache

import mpmath
from mpmath import mp, mpf

from dual import Dual, log, log1p, square
from incomplete_beta import incomplete_beta, log_odds_quantile, terms
from machinery import f32, fence, step
from points import ONE_CENTER, SHARES, SMALLEST, center, spread
from scalar import EXP, constant

PARAMETERS = {
    'location': ['location'], 'scale': ['scale', 'logScale'],
    'degreesOfFreedom': ['degreesOfFreedom', 'logDegreesOfFreedom'],
}
FORMS = {'logDegreesOfFreedom': EXP}
DIGITS = {'': 50, 'logDensity': 120, 'entropy': 150, 'variance': 60, 'mean': 60}
# Quantiles of fewer degrees of freedom leave float32, and more are a normal law.
LIMITS = {'logDegreesOfFreedom': (-1.0, 20.0), 'mean.logDegreesOfFreedom': (0.75, 20.0),
          'variance.logDegreesOfFreedom': (0.75, 20.0), 'draw.logScale': (-600.0, 600.0)}


def norm(nu):
    v = nu.value
    value = mpmath.loggamma((v + 1) / 2) - mpmath.loggamma(v / 2) - mpmath.log(v * mpmath.pi) / 2
    with mp.workdps(mp.dps + 10 + 2 * int(abs(mpmath.log10(v)))):
        slope = (mpmath.digamma((v + 1) / 2) - mpmath.digamma(v / 2) - 1 / v) / 2
    return nu.chain(value, slope)


def log_density(x, location, scale, nu):
    z = (x - location) / scale
    return [norm(nu), -(nu + 1) / 2 * log1p(square(z) / nu), -log(scale)]


def standard_log_density(z, nu):
    return mpmath.loggamma((nu + 1) / 2) - mpmath.loggamma(nu / 2) - mpmath.log(nu * mpmath.pi) / 2 - \
        (nu + 1) / 2 * mpmath.log1p(z * z / nu)


def law(s, nu):
    """For s > 0: the logarithms of the shares beyond s and of the rest, and ds/dnu at a fixed share."""
    return _law(s, nu, mp.dps)


@lru_cache(maxsize=None)
def _law(s, nu, digits):
    with mp.workdps(digits + 20 + 2 * int(abs(mpmath.log10(nu)))):
        w, y = nu / (nu + s * s), s * s / (nu + s * s)
        twice, _rest, slope, _b, scale = incomplete_beta(nu / 2, mpf(1) / 2, w, y)
        return (twice - mpmath.log(2), mpmath.log1p(-mpmath.exp(twice) / 2),
                s / 2 * (slope / (2 * mpmath.exp(scale)) + 1 / nu))


def log_shares(z, nu):
    """log F, log(1 - F) and dz/dnu."""
    if z == 0:
        return -mpmath.log(2), -mpmath.log(2), mpf(0)
    beyond, within, moved = law(abs(z), nu)
    return (beyond, within, -moved) if z < 0 else (within, beyond, moved)


def side(x, location, scale, nu, which, in_log):
    z = (x - location) / scale
    found = log_shares(z.value, nu.value)
    share, moved = found[which], found[2]
    height = mpmath.exp(standard_log_density(z.value, nu.value) - (share if in_log else 0)) * (1 if which == 0 else -1)
    slopes = [height * (a - moved * b) for a, b in zip(z.slopes, nu.slopes)]
    return [Dual(share if in_log else mpmath.exp(share), slopes)]


def cdf(*args):
    return side(*args, 0, False)


def survival(*args):
    return side(*args, 1, False)


def log_cdf(*args):
    return side(*args, 0, True)


def log_survival(*args):
    return side(*args, 1, True)


def draw(x, location, scale, nu):
    z = (x - location) / scale
    moved = log_shares(z.value, nu.value)[2]
    return [Dual(x.value, [a + z.value * b + scale.value * moved * c
                           for a, b, c in zip(location.slopes, scale.slopes, nu.slopes)])]


@lru_cache(maxsize=None)
def above(p, nu, digits):
    """The s with share p < 1/2 beyond it, by Newton's method in log s on the logarithm of the share."""
    goal = mpmath.log(p)
    if nu < 100:
        v = (mpmath.log(nu) - log_odds_quantile(nu / 2, mpf(1) / 2, 2 * p)) / 2
    else:
        with mp.workdps(30):
            q = 1 - 2 * p
            v = mpmath.log(mpmath.sqrt(2) * mpmath.erfinv(q) if p > 1e-3 else mpmath.sqrt(-2 * goal))
    for _ in range(200):
        s = mpmath.exp(v)
        share = law(s, nu)[0]
        move = (share - goal) / (s * mpmath.exp(standard_log_density(s, nu) - share))
        v += max(-1, min(1, move))
        if abs(move) < mpf(10) ** (-digits / 2 - 5):
            return mpmath.exp(v)
    raise ArithmeticError(f'no convergence at {p}, {nu}')


def point(p, location, scale, nu, sign):
    q = p.value
    if q == 0.5:
        z = mpf(0)
    else:
        z = -above(q, nu.value, mp.dps) if q < 0.5 else above(1 - q, nu.value, mp.dps)
    moved = log_shares(z, nu.value)[2]
    in_p = mpmath.exp(-standard_log_density(z, nu.value))
    quantile = Dual(z * sign, [sign * (in_p * a + moved * b) for a, b in zip(p.slopes, nu.slopes)])
    return [location, scale * quantile]


def entropy(scale, nu):
    n = norm(nu)
    v = nu.value
    with mp.workdps(mp.dps + 10 + 2 * int(abs(mpmath.log10(v)))):
        d = mpmath.digamma((v + 1) / 2) - mpmath.digamma(v / 2)
        e = (mpmath.polygamma(1, (v + 1) / 2) - mpmath.polygamma(1, v / 2)) / 2
        # The slope of the whole, as its two parts cancel.
        whole = d / 2 + (v + 1) / 2 * e - n.chain(0, (d - 1 / v) / 2).slopes[0] * 0 - (d - 1 / v) / 2
    return [log(scale), nu.chain((v + 1) / 2 * d - n.value, whole)]


def variance(scale, nu):
    if nu.value <= 2:
        return [constant(mpf('inf'), nu)]
    return [square(scale) * nu / (nu - 2)]


WITH_X, WITH_P, ALL = 'x location scale degreesOfFreedom', 'p location scale degreesOfFreedom', 'location scale degreesOfFreedom'
FUNCTIONS = {
    'logDensity': ('studentTLogDensity', log_density, WITH_X, WITH_X),
    'cdf': ('studentTCdf', cdf, WITH_X, WITH_X),
    'survival': ('studentTSurvival', survival, WITH_X, WITH_X),
    'logCdf': ('studentTLogCdf', log_cdf, WITH_X, WITH_X),
    'logSurvival': ('studentTLogSurvival', log_survival, WITH_X, WITH_X),
    'draw': ('studentTDraw', draw, WITH_X, ALL),
    'quantile': ('studentTQuantile', lambda *a: point(*a, 1), WITH_P, WITH_P),
    'upperQuantile': ('studentTUpperQuantile', lambda *a: point(*a, -1), WITH_P, WITH_P),
    'mean': ('studentTMean', lambda l, s, n: [l, 0 * n], ALL, ALL),
    'mode': ('identity', lambda l: [l], 'location', 'location'),
    'variance': ('studentTVariance', variance, 'scale degreesOfFreedom', 'scale degreesOfFreedom'),
    'entropy': ('studentTEntropy', entropy, 'scale degreesOfFreedom', 'scale degreesOfFreedom'),
}


def freedom(d):
    kind = d.random.random()
    return d.log_uniform(0.1, 1e3) if kind < 0.5 else d.log_uniform(1e-3, 1e8) if kind < 0.9 else d.log_uniform(1e-6, 1e12)


def quick(x, l, s, n):
    """Whether the reference's series are short here."""
    with mp.workdps(40):
        z = (mpf(x) - mpf(l)) / mpf(s)
        if z == 0:
            return True
        n = mpf(n)
        w, y = n / (n + z * z), z * z / (n + z * z)
        return min(terms(n / 2, mpf(1) / 2, w, y), terms(mpf(1) / 2, n / 2, y, w)) < 3000


def at_point(d):
    while True:
        n, l, s = freedom(d), center(d) if d.random.random() < 0.3 else d.uniform(-5, 5), spread(d)
        z = d.uniform(-9, 9) if d.random.random() < 0.6 else d.sign() * d.log_uniform(1e-7, 1e4)
        row = f32(l + s * z), l, s, n
        if quick(*row):
            return row


def anywhere(d):
    n, l, s = freedom(d), center(d), spread(d)
    z = d.uniform(-9, 9) if d.random.random() < 0.6 else d.sign() * d.log_uniform(1e-20, 1e20)
    return f32(l + s * z), l, s, n


def at_share(d):
    while True:
        p, n = d.probability(), freedom(d)
        # Deep tails of few degrees of freedom lie beyond float32.
        if 1e-3 < n < 1e9 and (n < 300 or p > 1e-12) and not p ** (1 / n) < 1e-35:
            return p, d.uniform(-5, 5), d.log_uniform(1e-2, 1e2), n


CORNERS = [(f32(z), 0.0, 1.0, n) for n in (0.3, 2.0, 99.99999, 100.0, 1e4, 1e8) for z in
           (0.0, 1e-20, 1e-3, 0.7, -0.7, 1.0, -1.55, 1.55, 5.0, -5.0, 40.0)]
CORNERS += [(z, 0.0, 1.0, n) for n in (2.0, 500.0, 1e6) for z in fence(1.55, -1.0, steps=(0, 1, 21))]
CORNERS += [(f32(0.5 + z), 0.5, 3.7, n) for n in (1e-3, 1e-6, 7.0) for z in (-3.0, 1.0, 1e3)]
NEAR = [r for r in CORNERS if quick(*r)]
FREEDOMS = [1e-6, 1e-3, 0.3, 1.0, 1.5, 2.0, 3.0, 24.99999, 25.0, 99.99999, 100.0, 1e4, 1e8, 1e20, 1e30]
SHARE_CORNERS = [(p, l, 1.0, n) for n in (0.5, 1.0, 4.0, 99.99999, 100.0, 1e4) for l in (0.0, 1.5) for p in
                 (1e-10, 1e-4, 0.06, 0.5, f32(0.49999997), f32(0.50000006), 0.94, 1 - 2.0 ** -24)]
TWO = [(s, n) for s in (1.0, 0.25, 1e-20, 1e20) for n in FREEDOMS] + [(f32(0.24), n) for n in fence(25, 100, 4)[:30]]
POINTS = {
    # At z = 1 the derivative in the scale vanishes, and two precisions have nothing to agree on.
    'logDensity': (anywhere, [r for r in CORNERS if abs(r[0] - r[1]) != r[2]]),
    **{name: (at_point, NEAR) for name in ('cdf', 'survival', 'logCdf', 'logSurvival', 'draw')},
    **{name: (at_share, SHARE_CORNERS) for name in ('quantile', 'upperQuantile')},
    'mean': (lambda d: (center(d), spread(d), d.log_uniform(1.001, 1e8)), [(c, 1.0, n) for (c,) in ONE_CENTER for n in (1.5, 30.0)][:64]),
    'mode': (lambda d: (center(d),), ONE_CENTER),
    'variance': (lambda d: (spread(d), d.log_uniform(2.001, 1e3)), [(s, n) for s, n in TWO if n > 2]
                 + [(1.0, n) for n in fence(2) if n > 2]),
    'entropy': (lambda d: (spread(d), freedom(d)), TWO),
}
