"""Arguments for positive families with a scale and a shape, and formulas that several of them share."""
import itertools

import mpmath
from mpmath import mpf

from dual import Dual, log
from machinery import f32, fence, step
from points import LARGEST, SHARES, SMALLEST, SPREADS, near, share, spread
from scalar import constant


def shape(d):
    return d.log_uniform(0.6, 25) if d.random.random() < 0.88 else d.log_uniform(1e-6, 1e6)


def scale(d):
    return d.log_uniform(0.05, 20) if d.random.random() < 0.88 else spread(d)


def times_exp(s, power):
    """s e^power, held inside float32."""
    logarithm = mpmath.log(mpf(s)) + power
    return max(SMALLEST, f32(mpmath.exp(max(-104, min(89, logarithm)))))


def by_log(low, high, far_low, far_high):
    """x, scale, shape with t = shape log(x / scale) in the first range mostly, in the second at times."""
    def make(d):
        s, k = scale(d), shape(d)
        kind = d.random.random()
        t = d.random.uniform(low, high) if kind < 0.85 else d.random.uniform(far_low, far_high)
        return times_exp(s, t / k), s, k
    return make


SHAPES = [1e-6, 0.01, 0.5, step(1.0, -1), 1.0, step(1.0, 1), 2.0, 3.6, 150.0, 1e6]


def by_log_corners(steps):
    at = [(times_exp(s, t / k), s, k) for s, k, t in itertools.product((1.0, 3.7), map(f32, SHAPES), steps)]
    far = [(x, f32(s), f32(k)) for x, s, k in itertools.product((SMALLEST, 1e-20, LARGEST), (SMALLEST, 1.0, LARGEST), (0.01, 1.0, 30.0))]
    close = [(step(f32(s), n), f32(s), f32(k)) for s in (1.0, 0.3) for k in (1.5, 1e6) for n in (-64, -3, -1, 0, 1, 8)]
    return at + close + far


PAIRED = list(itertools.product((1.0, 3.7, 1e-20, 1e20), map(f32, SHAPES)))
AT_P = (lambda d: (share(d), scale(d), shape(d)),
        [(p, f32(s), f32(k)) for p in SHARES for s, k in ((1.0, 1.0), (3.7, 2.5), (1e-20, 0.01), (1e20, 1e6), (1.0, 1e-6), (0.3, 40.0))]
        + [(p, 1.0, f32(k)) for p in fence(1 - mpmath.exp(-1), mpmath.exp(-1), 0.5, steps=(0, 1, 2, 8)) for k in (1e-6, 0.7)])
AT_BOTH = (lambda d: (scale(d), shape(d)), PAIRED + [(1.0, k) for k in fence(1, 2, 4, 1000, 2.166229, 0.5, steps=(0, 1, 3, 64))])


def two_shaped(d):
    """Scale and shape twice: equal, close or far."""
    s, k = scale(d), shape(d)
    t, m = near(d, s, s / max(k, 1e-3) / 3), near(d, k, k)
    t = max(SMALLEST, t) if t is not None else times_exp(s, mpf(d.random.uniform(-4, 4)) / min(max(k, mpf('0.1')), 1000))
    m = max(1e-6, m) if m is not None else shape(d)
    return s, k, t, m


TWO_SHAPED = ([(f32(s), f32(k), f32(s * (1 + e)), f32(k * (1 + g))) for s, k in ((0.3, 2.5), (1.0, 1.0), (50.0, 0.2))
               for e in (0.0, 1e-6, -3e-4) for g in (0.0, 1e-6, -1e-3, 0.501, -0.501)]
              + [(1.0, f32(k), 1.0, f32(m)) for k, m in itertools.product((1e-3, 0.5, 1.0, 30.0), repeat=2)])


def log_ratio(x, s):
    return log(x / s)


def held(t, most):
    """t, no higher than where its exponential leaves every format."""
    return t if t.value < most else t.chain(mpf(most), mpf(1))


def nothing(value, like):
    return [constant(value, like)]


def log_gamma(x):
    return x.chain(mpmath.loggamma(x.value), mpmath.digamma(x.value))


def gamma(x):
    value = mpmath.gamma(x.value)
    return x.chain(value, value * mpmath.digamma(x.value))


def tan(x):
    value = mpmath.tan(x.value)
    return x.chain(value, 1 + value ** 2)


def sin(x):
    return x.chain(mpmath.sin(x.value), mpmath.cos(x.value))


def cos(x):
    return x.chain(mpmath.cos(x.value), -mpmath.sin(x.value))


def atan(x):
    return x.chain(mpmath.atan(x.value), 1 / (1 + x.value ** 2))


def erf(x):
    return x.chain(mpmath.erf(x.value), 2 / mpmath.sqrt(mpmath.pi) * mpmath.exp(-x.value ** 2))


def erfc(x):
    """Zero where it leaves every format."""
    if x.value > 100:
        return x * 0
    return x.chain(mpmath.erfc(x.value), -2 / mpmath.sqrt(mpmath.pi) * mpmath.exp(-x.value ** 2))
