"""The gamma distribution's functions over dual numbers, for it and its relatives: a shape and a scale."""
import os
import sys

import mpmath
from mpmath import mp, mpf

sys.path.insert(0, os.path.join(os.path.dirname(os.path.abspath(__file__)), '..'))

import incomplete_gamma as incomplete
from dual import Dual, exp, log, square
from machinery import f32, fence
from points import LARGEST, SHARES, SMALLEST, share, spread
from scalar import constant, log_2pi


# The ways to give a scale and a shape.
FORMS = {
    'rate': ('reciprocal', lambda v: 1 / v, lambda n: 1 / mpf(n)),
    'logRate': ('exponentialReciprocal', lambda v: exp(-v), lambda n: -mpmath.log(n)),
    'logShape': ('exponential', exp, mpmath.log),
}


def digamma(x):
    return x.chain(mpmath.digamma(x.value), mpmath.polygamma(1, x.value))


def log_gamma(x):
    return x.chain(mpmath.loggamma(x.value), mpmath.digamma(x.value))


def stirling(x):
    """What Stirling's formula leaves of log Gamma, with the digits that it loses."""
    with mp.workdps(mp.dps + int(2 * abs(mpmath.log10(x.value))) + 10):
        v = x.value
        value = mpmath.loggamma(v) - (v - 0.5) * mpmath.log(v) + v - log_2pi() / 2
        slope = mpmath.digamma(v) - mpmath.log(v) + 1 / (2 * v)
    return x.chain(value, slope)


def log_density(x, shape, scale):
    """Near the mean with the large parts of log Gamma taken out, as they say nothing of what may cancel."""
    ratio = x / (shape * scale)
    r = x.value / (shape.value * scale.value)
    if not 1e-3 < r < 1e3:
        return [(shape - 1) * log(x / scale), -x / scale, -log_gamma(shape), -log(scale)]
    distance = ratio.chain(r - 1 - mpmath.log(r), (r - 1) / r)
    return [-shape * distance, -stirling(shape), log(shape) / 2, -log(x),
            constant(-log_2pi() / 2, x)]


def combined(value, slope_shape, slope_z, shape, z):
    return Dual(value, [slope_shape * s + slope_z * t for s, t in zip(shape.slopes, z.slopes)])


def shares(x, shape, scale):
    z = x / scale
    log_p, log_q, slope, log_d = incomplete.incomplete_gamma(shape.value, z.value)
    return log_p, log_q, slope, shape.value * mpmath.exp(log_d) / z.value, shape, z


def cdf(x, shape, scale):
    log_p, _, slope, density, *inputs = shares(x, shape, scale)
    return [combined(mpmath.exp(log_p), slope, density, *inputs)]


def survival(x, shape, scale):
    _, log_q, slope, density, *inputs = shares(x, shape, scale)
    return [combined(mpmath.exp(log_q), -slope, -density, *inputs)]


def log_cdf(x, shape, scale):
    log_p, _, slope, density, *inputs = shares(x, shape, scale)
    return [combined(log_p, slope / mpmath.exp(log_p), density / mpmath.exp(log_p), *inputs)]


def log_survival(x, shape, scale):
    _, log_q, slope, density, *inputs = shares(x, shape, scale)
    return [combined(log_q, -slope / mpmath.exp(log_q), -density / mpmath.exp(log_q), *inputs)]


def point(p, log_p, log_q, shape, scale, sign):
    z = mpmath.exp(incomplete.log_quantile(shape.value, log_p, log_q))
    _, _, slope, log_d = incomplete.incomplete_gamma(shape.value, z)
    density = shape.value * mpmath.exp(log_d) / z
    standard = Dual(z, [sign * s / density - slope / density * t for s, t in zip(p.slopes, shape.slopes)])
    return [scale * standard]


def quantile(p, shape, scale):
    return point(p, mpmath.log(p.value), mpmath.log1p(-p.value), shape, scale, 1)


def upper_quantile(p, shape, scale):
    return point(p, mpmath.log1p(-p.value), mpmath.log(p.value), shape, scale, -1)


def draw(x, shape, scale):
    """How a draw moves at a fixed uniform: its own value, and in its place the slopes."""
    z = x / scale
    slope = incomplete.draw_derivative(z.value, shape.value)
    return [Dual(x.value, [a + scale.value * slope * b + z.value * c
                           for a, b, c in zip(x.slopes, shape.slopes, scale.slopes)])]


def log_draw(x, shape, scale):
    z = mpmath.exp(x.value) / scale.value
    slope = incomplete.draw_derivative(z, shape.value) / z
    return [Dual(x.value, [a + slope * b + c / scale.value
                           for a, b, c in zip(x.slopes, shape.slopes, scale.slopes)])]


def mean(shape, scale):
    return [shape * scale]


def variance(shape, scale):
    return [shape * square(scale)]


def mode(shape, scale):
    return [(shape - 1) * scale if shape.value > 1 else shape * 0]


def entropy(shape, scale):
    """By the parts that are left of Stirling's formulas."""
    psi = digamma(shape) - log(shape)
    return [log(shape) / 2, constant(log_2pi() / 2, shape), stirling(shape), (1 - shape) * psi, log(scale)]


def kl(a, s, b, t):
    return [(a - b) * digamma(a), -log_gamma(a), log_gamma(b), b * log(t / s), a * (s - t) / t]


SHAPES = [1e-6, 1e-3, 0.01, 0.3, f32(1 - 2.0 ** -24), 1.0, f32(1 + 2.0 ** -23), 2.5, 9.999, 10.0, 30.0, 59.9, 60.0, 1e3, 1e6]


def shape(d):
    kind = d.random.random()
    return d.log_uniform(0.2, 30) if kind < 0.5 else d.log_uniform(1e-3, 1e3) if kind < 0.8 else d.log_uniform(1e-6, 1e6)


def variate(d, a):
    """A z where the law of that shape is, or in its tails."""
    kind = d.random.random()
    if kind < 0.6:
        z = a + d.random.gauss(0, 2) * a ** 0.5
        return z if z > 0 else float(mpmath.exp(-d.random.expovariate(1) / max(a, 1e-2)))
    if kind < 0.85:
        return a * float(d.log_uniform(1e-2, 8))
    return float(d.log_uniform(1e-30, 1e3))


def placed(d):
    a, s = shape(d), spread(d)
    return max(SMALLEST, f32(variate(d, a) * s)), a, s


def around(a, steps):
    """z about the middle, the mode, the switches and the tails."""
    root = a ** 0.5
    return [a + k * root for k in steps if a + k * root > 0] + [0.7 * a, 1.3 * a]


CORNERS = ([(f32(z * s), f32(a), s) for a, s in zip(SHAPES, [1.0, 3.7, 1e-3, 1.0, 1e20, 0.1, 1.0] * 3)
            for z in around(a, (-4, -0.1, 0, 0.01, 1, 9))]
           + [(x, a, s) for a in (1e-3, 0.3, 1.0, 50.0) for x, s in ((SMALLEST, 1.0), (SMALLEST, LARGEST), (1e-30, 1e-3), (87.0, 1.0), (110.0, 1.0))])
# The mean, the mode and the zero of the derivative in the shape, to a few units.
CORNERS += [(x, a, 1.0) for a in (2.5, 12.0, 59.0, 1e3, 1e6) for c in (a, a - 1, a - 0.5) for x in fence(c, steps=(0, 1, 8))]
WITH_SHARES = [(p, a, s) for p in SHARES[::2] for a, s in ((1e-3, 1.0), (0.3, 3.7), (1.0, 1e-3), (2.5, 1.0), (60.0, 1e20), (1e3, 1.0), (1e6, 0.3))]
LOGS = [(z, a, s) for a, s in ((1e-6, 1.0), (1e-3, 3.7), (1.0, 1e-3), (30.0, 1.0), (1e6, 1.0))
        for z in (-1e4, -300.0, -80.0, -40.001, -39.999, -3.0)]


def at_share(d):
    return share(d), shape(d), spread(d)


def pair(d):
    return shape(d), spread(d)


def log_placed(d):
    x, a, s = placed(d)
    return (f32(mpmath.log(x)) if d.random.random() < 0.7 else f32(-d.log_uniform(1e-3, 1e4)), a, s)


def near(d, v):
    kind = d.random.random()
    if kind < 0.6:
        return f32(v * (1 + d.sign() * d.log_uniform(1e-7, 0.9)))
    return v if kind < 0.65 else None


def two(d):
    a, s = pair(d)
    b, t = near(d, a), near(d, s)
    b = shape(d) if b is None else b
    if d.random.random() < 0.2:
        # Equal means, but for the rounding.
        return a, s, b, f32(a * s / b)
    return a, s, b, spread(d) if t is None else t


ONE = [(a, s) for a in SHAPES for s in (SMALLEST, 1.0, 3.7, 1e20)]
TWO = ([(f32(a), 1.0, f32(a * (1 + e)), f32(1 + g)) for a in (1e-6, 0.01, 0.9, 2.5, 7.9, 8.1, 100.0, 1e6)
        for e in (0.0, 2.0 ** -22, -1e-5, 0.3, -0.49, -0.51, 1.2) for g in (0.0, -1e-6)]
       + [(a, 1.0, b, 1.0) for a in (1e-6, 0.3, 7.0, 1e6) for b in (1e-6, 0.3, 9.0, 1e6)])

AT_X = (placed, CORNERS)
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival', 'draw')},
    'drawLog': (log_placed, LOGS + [(f32(mpmath.log(x)), a, s) for x, a, s in CORNERS[::2]]),
    'quantile': (at_share, WITH_SHARES), 'upperQuantile': (at_share, WITH_SHARES),
    **{name: (pair, ONE) for name in ('mean', 'variance', 'mode', 'entropy')},
    'kl': (two, TWO),
}


def functions(front):
    three, both, at_p = 'x shape scale', 'shape scale', 'p shape scale'
    capital = {'logDensity': log_density, 'cdf': cdf, 'survival': survival, 'logCdf': log_cdf, 'logSurvival': log_survival}
    name = lambda f: front + f[0].upper() + f[1:]
    return {
        **{f: (name(f), formula, three, three) for f, formula in capital.items()},
        'quantile': (name('quantile'), quantile, at_p, at_p),
        'upperQuantile': (name('upperQuantile'), upper_quantile, at_p, at_p),
        **{f: (name(f), formula, both, both)
           for f, formula in {'mean': mean, 'variance': variance, 'mode': mode, 'entropy': entropy}.items()},
        'draw': (front + 'Draw', draw, three, 'shape scale'),
        'drawLog': (front + 'LogDraw', log_draw, three, 'shape scale'),
        'kl': ('gammaKl', kl, 'shape scale otherShape otherScale', 'shape scale otherShape otherScale'),
    }
