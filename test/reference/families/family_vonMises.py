"""The von Mises distribution by its Fourier series and by quadrature."""
import itertools

import mpmath
from mpmath import mp, mpf

from dual import Dual, square
from group_bessel import ratio, scaled
from group_von_mises import angle, density, law
from machinery import f32, fence, step
from points import center
from scalar import EXP, constant

PARAMETERS = {'location': ['location'], 'concentration': ['concentration', 'logConcentration']}
FORMS = {'logConcentration': EXP}
DIGITS = {'': 50, 'logDensity': 150, 'mode': 60, 'mean': 60}
LIMITS = {'logConcentration': (-30.0, 25.0)}


def complement(k):
    """1 - A(k) and its slope."""
    with mp.workdps(mp.dps + 10 + 3 * int(abs(mpmath.log10(k)))):
        a = ratio(k)
        return 1 - a, -(1 - a / k - a * a)


def log_normalizer(k):
    """log(2 pi exp(-k) I0(k))."""
    v = k.value
    return k.chain(mpmath.log(2 * mpmath.pi * scaled(0, v)), -complement(v)[0])


def half_sine(d):
    """sin(d / 2)."""
    with mp.workdps(mp.dps + 45):
        return d.chain(mpmath.sin(d.value / 2), mpmath.cos(d.value / 2) / 2)


def log_density(x, location, k):
    return [-2 * k * square(half_sine(x - location)), -log_normalizer(k)]


def turned(x, location):
    """The distance in [-pi, pi] and its slopes."""
    d = x - location
    with mp.workdps(mp.dps + 45):
        v = d.value
        if abs(v) > mpmath.pi:
            v -= 2 * mpmath.pi * mpmath.nint(v / (2 * mpmath.pi))
    return Dual(v, d.slopes)


def side(x, location, k, sign, in_log):
    d = turned(x, location)
    v = sign * d.value
    beyond, part, slope = law(abs(v), k.value)
    below = beyond if v <= 0 else 1 - beyond
    height = density(v, k.value)
    in_k = -slope * height if v <= 0 else slope * height
    slopes = [sign * height * a + in_k * b for a, b in zip(d.slopes, k.slopes)]
    if not in_log:
        return [Dual(below, slopes)]
    logarithm = mpmath.log(beyond) if v <= 0 else mpmath.log1p(-beyond)
    return [Dual(logarithm, [s / below for s in slopes])]


def draw(x, location, k):
    d = turned(x, location)
    moved = law(abs(d.value), k.value)[2] * (1 if d.value < 0 else -1)
    return [Dual(x.value, [a + moved * b for a, b in zip(location.slopes, k.slopes)])]


def point(p, location, k, sign):
    q = p.value
    if q == 0.5:
        s, way = mpf(0), 1
    else:
        s, way = (angle(q, k.value), -1) if q < 0.5 else (angle(1 - q, k.value), 1)
    moved = 0 if s == 0 else -way * law(s, k.value)[2]
    in_p = 1 / density(s, k.value)
    return [location, Dual(sign * way * s, [sign * (in_p * a + moved * b) for a, b in zip(p.slopes, k.slopes)])]


def variance(k):
    value, slope = complement(k.value)
    return [k.chain(value, slope)]


def entropy(k):
    c, slope = complement(k.value)
    normal = log_normalizer(k)
    # The slopes of the two parts cancel.
    return [Dual(normal.value, [0 * s for s in normal.slopes]), k.chain(k.value * c, k.value * slope)]


def kl(a, k, b, l):
    with mp.workdps(mp.dps + 60):
        c, slope = complement(k.value)
        mean = Dual(1 - c, [-slope * s for s in k.slopes])
        first = 2 * l * mean * square(half_sine(a - b))
        v = (log_normalizer(l).value - log_normalizer(k).value) + c * (l.value - k.value)
        in_l = c - complement(l.value)[0]
        in_k = slope * (l.value - k.value)
        second = Dual(v, [in_k * s + in_l * t for s, t in zip(k.slopes, l.slopes)])
        total = first + second
    return [total]


WITH_X, WITH_P, ALL = 'x location concentration', 'p location concentration', 'location concentration'
FOUR = 'location concentration otherLocation otherConcentration'
FUNCTIONS = {
    'logDensity': ('vonMisesLogDensity', log_density, WITH_X, WITH_X),
    'cdf': ('vonMisesCdf', lambda *a: side(*a, 1, False), WITH_X, WITH_X),
    'survival': ('vonMisesSurvival', lambda *a: [Dual(v.value, v.slopes) for v in side(*a, -1, False)], WITH_X, WITH_X),
    'logCdf': ('vonMisesLogCdf', lambda *a: side(*a, 1, True), WITH_X, WITH_X),
    'logSurvival': ('vonMisesLogSurvival', lambda *a: side(*a, -1, True), WITH_X, WITH_X),
    'draw': ('vonMisesDraw', draw, WITH_X, ALL),
    'quantile': ('vonMisesQuantile', lambda *a: point(*a, 1), WITH_P, WITH_P),
    'upperQuantile': ('vonMisesUpperQuantile', lambda *a: point(*a, -1), WITH_P, WITH_P),
    'mean': ('identity', lambda l: [l], 'location', 'location'),
    'mode': ('identity', lambda l: [l], 'location', 'location'),
    'variance': ('vonMisesVariance', variance, 'concentration', 'concentration'),
    'entropy': ('vonMisesEntropy', entropy, 'concentration', 'concentration'),
    'kl': ('vonMisesKl', kl, FOUR, FOUR),
}


def concentration(d):
    kind = d.random.random()
    return d.log_uniform(1e-2, 300) if kind < 0.6 else d.log_uniform(1e-6, 1e9) if kind < 0.95 else d.log_uniform(1e-12, 1e12)


def around(d):
    """An angle within the arc about its location."""
    while True:
        k, l = concentration(d), d.uniform(-3, 3) if d.random.random() < 0.6 else 0.0
        wide = min(3.14, 12 / k ** 0.5) if d.random.random() < 0.75 else 3.14
        x = f32(l + (d.uniform(-wide, wide) if d.random.random() < 0.9 else d.sign() * d.log_uniform(1e-20, 3)))
        if 0 < abs(x - l) < 3.1415925:
            return x, l, k


def anywhere(d):
    x, l, k = around(d)
    return (x if d.random.random() < 0.7 else d.real()), (l if d.random.random() < 0.8 else d.real()), k


KS = (1e-6, 0.3, 5.0, 29.999998, 30.0, 100.0, 1e4, 1e8)
LAST = 3.1415925025939941
CORNERS = [(f32(x), 0.0, k) for k in KS for x in (1e-20, -1e-20, 0.5, -0.5, 1.9999999, -2.0, LAST, -LAST)]
CORNERS += [(f32(x), l, k) for k in (0.5, 40.0) for x, l in ((3.0, -3.0), (-3.0, 2.5), (100.0, 0.7), (0.5, 40.0), (-7.0, 0.25))]
FAR_AWAY = [(x, l, 2.0) for x, l in ((1e30, 1.0), (1e10, 0.3), (3.0, 1e20), (1e-40, 0.0), (6.2831855, 0.0), (3.4e38, -1e-20))]
SHARES_AT = [(p, l, k) for k in (1e-3, 1.0, 30.0, 1e3, 1e8) for l in (0.0, 0.7) for p in
             (1e-30, 1e-4, 0.15, 0.5, f32(0.49999997), f32(0.50000006), 0.84, 1 - 2.0 ** -24)]


def share_at(d):
    while True:
        p, k = d.probability(), concentration(d)
        if k > 1e-10:
            return p, d.uniform(-3, 3), k


def pair(d):
    k = concentration(d)
    kind = d.random.random()
    l = f32(k * (1 + d.sign() * d.log_uniform(1e-7, 0.5))) if kind < 0.6 else concentration(d)
    a = d.uniform(-3, 3)
    gap = d.sign() * d.log_uniform(1e-7, 1) if d.random.random() < 0.6 else d.uniform(-3, 3)
    return a, k, f32(a + gap), l


PAIRS = [(0.5, k, f32(0.5 + g), f32(k * r)) for k in (1e-3, 0.9, 1.9, 25.0, 1e5) for g in (0.0, 1e-6, 0.1)
         for r in (1 + 1e-6, 1 - 1e-3, 0.49, 0.51, 2.1)]
ONE = [(k,) for k in fence(30, 1, 1e-3, 1e3, steps=(0, 1, 2, 3, 8, 21, 64))] + [(10.0 ** e,) for e in range(-12, 13)]
POINTS = {
    'logDensity': (anywhere, CORNERS + FAR_AWAY),
    **{name: (around, CORNERS) for name in ('cdf', 'survival', 'logCdf', 'logSurvival', 'draw')},
    **{name: (share_at, SHARES_AT) for name in ('quantile', 'upperQuantile')},
    **{name: (lambda d: (center(d),), [(c,) for c in fence(0, 1, -1, 1e30, 16777216, -5, 1e-30)]) for name in ('mean', 'mode')},
    **{name: (lambda d: (concentration(d),), [(f32(k),) for (k,) in ONE]) for name in ('variance', 'entropy')},
    'kl': (pair, PAIRS),
}
