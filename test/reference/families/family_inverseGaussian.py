"""The inverse Gaussian distribution by its distribution function Phi(a) + exp(2 shape / mean) Phi(-b)."""
import itertools

import mpmath
from mpmath import mp, mpf

from dual import Dual, log, log1p, sqrt, square
from machinery import f32, fence, step
from points import LARGEST, SHARES, SMALLEST, share, spread, scale_pair, with_shares
from scalar import EXP, MINUS_INFINITY, constant

PARAMETERS = {'mean': ['mean', 'logMean'], 'shape': ['shape', 'logShape']}
FORMS = {'logMean': EXP, 'logShape': EXP}
# Arguments of both functions reach 1e170 where a parameter is given by a far logarithm.
DIGITS = {'': 420, 'logDensity': 420, 'kl': 420, 'mean': 60, 'variance': 60, 'mode': 1900}


def scaled_erfc(y):
    """exp(y^2) erfc(y) and its derivative, by their asymptotic series far out."""
    v = y.value
    if v > 36:
        term, total, slope, k = mpf(1), mpf(1), mpf(0), 0
        while abs(term) > mpf(10) ** (-mp.dps - 5):
            k += 1
            term *= -(2 * k - 1) / (2 * v * v)
            total += term
            slope += term
        root = mpmath.sqrt(mpmath.pi)
        return y.chain(total / (v * root), 2 / root * slope)
    e = mpmath.exp(v * v) * mpmath.erfc(v)
    return y.chain(e, 2 * v * e - 2 / mpmath.sqrt(mpmath.pi))


def places(x, mean, shape):
    t = x / mean - 1
    half = square(t) * shape / x / 2
    c = sqrt(shape / x / 2)
    return c * t, c * (t + 2), half


def exp_minus(half):
    if half.value > 4000:
        return half.chain(mpf(0), mpf(0))
    e = mpmath.exp(-half.value)
    return half.chain(e, -e)


def shares(x, mean, shape):
    """exp(a^2/2) times the share on the side of x away from the mean, whether that is below, and a^2/2."""
    a, b, half = places(x, mean, shape)
    if x.value < mean.value:
        return (scaled_erfc(-a) + scaled_erfc(b)) / 2, True, half
    return (scaled_erfc(a) - scaled_erfc(b)) / 2, False, half


def cdf(x, mean, shape):
    scaled, below, half = shares(x, mean, shape)
    part = scaled * exp_minus(half)
    return [part if below else 1 - part]


def survival(x, mean, shape):
    scaled, below, half = shares(x, mean, shape)
    part = scaled * exp_minus(half)
    return [1 - part if below else part]


def log_side(x, mean, shape, wanted):
    scaled, below, half = shares(x, mean, shape)
    if below == wanted:
        return [log(scaled) - half]
    return [log1p(-(scaled * exp_minus(half)))]


def log_cdf(x, mean, shape):
    return log_side(x, mean, shape, True)


def log_survival(x, mean, shape):
    return log_side(x, mean, shape, False)


def log_density(x, mean, shape):
    if x.value <= 0:
        return [constant(MINUS_INFINITY, x)]
    return [log(shape) / 2, -log(x) * 3 / 2, constant(-mpmath.log(2 * mpmath.pi) / 2, x),
            -square(x / mean - 1) * shape / x / 2]


def flat(v):
    """The number alone."""
    return Dual(v, [mpf(0)])


def solved(p, mean, shape, below):
    """x by Newton's method in log x on the logarithm of the smaller share, at rising precision."""
    q = p.value
    if q > 0.5:
        q, below = 1 - q, not below
    m, s = mean.value, shape.value
    digits = mp.dps
    # Where Phi(a) is the share.
    with mp.workdps(30):
        z = -mpmath.sqrt(2) * mpmath.erfinv(1 - 2 * q) if q > 1e-3 else -mpmath.sqrt(-2 * mpmath.log(q))
        v = (z if below else -z) * mpmath.sqrt(m / s) / 2
        u = mpmath.log(m) + 2 * mpmath.asinh(v)
    goal = mpmath.log(q)
    sign = 1 if below else -1
    for at in range(400):
        x = mpmath.exp(u)
        inputs = Dual(x, [mpf(1)])
        side = log_side(inputs, flat(m), flat(s), below)[0]
        move = (goal - side.value) / (side.slopes[0] * x) if side.slopes[0] else -4 * sign
        u += max(-4, min(4, move))
        if abs(move) < mpf(10) ** (-digits / 2 - 10):
            break
    else:
        raise ArithmeticError(f'no convergence at {q} {m} {s}')
    x = mpmath.exp(u)
    whole = log_side(Dual(x, [mpf(1), mpf(0), mpf(0)]), Dual(m, [mpf(0), mpf(1), mpf(0)]),
                     Dual(s, [mpf(0), mpf(0), mpf(1)]), below)[0]
    along = whole.slopes[0]
    # The share of the other side where p was above a half.
    in_p = (1 if p.value <= 0.5 else -1) / (q * along)
    slopes = [in_p * a - whole.slopes[1] / along * b - whole.slopes[2] / along * c
              for a, b, c in zip(p.slopes, mean.slopes, shape.slopes)]
    return [Dual(x, slopes)]


def quantile(p, mean, shape):
    return solved(p, mean, shape, True)


def upper_quantile(p, mean, shape):
    return solved(p, mean, shape, False)


def draw(x, mean, shape):
    """The draw and -F_theta / p."""
    side = log_side(Dual(x.value, [mpf(1), mpf(0), mpf(0)]), Dual(mean.value, [mpf(0), mpf(1), mpf(0)]),
                    Dual(shape.value, [mpf(0), mpf(0), mpf(1)]), x.value < mean.value)[0]
    d = side.slopes
    return [Dual(x.value, [-d[1] / d[0] * b - d[2] / d[0] * c for b, c in zip(mean.slopes, shape.slopes)])]


def mode(mean, shape):
    q = 3 * mean / shape / 2
    return [mean * (sqrt(square(q) + 1) - q)]


def entropy(mean, shape):
    s = 2 * shape / mean
    v = s.value
    if v > 1500:
        term, total, k = 1 / v, mpf(0), 0
        while abs(term) > mpf(10) ** (-mp.dps - 5) / v:
            total += term
            k += 1
            term *= -k / v
    else:
        total = mpmath.exp(v) * mpmath.e1(v)
    return [log(mean) * 3 / 2, -log(shape) / 2, constant((mpmath.log(2 * mpmath.pi) + 1) / 2, mean),
            s.chain(total, total - 1 / v) * (-3) / 2]


def kl(m, s, n, t):
    return [t / s / 2, constant(-mpf(1) / 2, s), -log(t / s) / 2, t * square((m - n) / n) / m / 2]


THREE, BOTH = 'x mean shape', 'mean shape'
AT_P = 'p mean shape'
FOUR = 'mean shape otherMean otherShape'
FUNCTIONS = {
    'logDensity': ('inverseGaussianLogDensity', log_density, THREE, THREE),
    'cdf': ('inverseGaussianCdf', cdf, THREE, THREE),
    'survival': ('inverseGaussianSurvival', survival, THREE, THREE),
    'logCdf': ('inverseGaussianLogCdf', log_cdf, THREE, THREE),
    'logSurvival': ('inverseGaussianLogSurvival', log_survival, THREE, THREE),
    'draw': ('inverseGaussianDraw', draw, THREE, BOTH),
    'quantile': ('inverseGaussianQuantile', quantile, AT_P, AT_P),
    'upperQuantile': ('inverseGaussianUpperQuantile', upper_quantile, AT_P, AT_P),
    'mean': ('identity', lambda m: [m], 'mean', 'mean'),
    'variance': ('inverseGaussianVariance', lambda m, s: [m * m * m / s], BOTH, BOTH),
    'mode': ('inverseGaussianMode', mode, BOTH, BOTH),
    'entropy': ('inverseGaussianEntropy', entropy, BOTH, BOTH),
    'kl': ('inverseGaussianKl', kl, FOUR, FOUR),
}


def member(d):
    mean = spread(d)
    kind = d.random.random()
    return mean, max(SMALLEST, f32(mean * d.log_uniform(1e-2, 1e2) if kind < 0.5 else mean * d.log_uniform(1e-6, 1e6)))


def at_point(d):
    """x at a share of the law or so, or anywhere."""
    mean, shape = member(d)
    kind = d.random.random()
    if kind < 0.75:
        v = d.random.gauss(0, 3) * (mean / shape) ** 0.5 / 2
        x = mean * (v + (1 + v * v) ** 0.5) ** 2 if v > 0 else mean / ((1 + v * v) ** 0.5 - v) ** 2
    elif kind < 0.9:
        x = mean * d.log_uniform(1e-4, 1e4)
    else:
        x = d.positive()
    return max(SMALLEST, f32(x)), mean, shape


MEMBERS = [(1.0, 1.0), (1.0, 1e-3), (1.0, 1e-6), (1.0, 1e3), (1.0, 1e6), (3.7, 2.0), (1e-20, 1e20), (1e20, 1e-20),
           (SMALLEST, 1.0), (LARGEST, 1.0)]
CORNERS = [(f32(m * r), m, s) for m, s in MEMBERS[:7] for r in (1e-6, 0.1, 0.7, 1.0, 1.4, 10.0, 1e6)]
CORNERS += [(step(f32(m), n), m, s) for m, s in MEMBERS[:5] for n in (1, -1, 64)]
CORNERS += [(x, m, s) for x, (m, s) in itertools.product((SMALLEST, 1e-20, 1.0, 1e20, LARGEST), MEMBERS[4:])]
# The scaled functions change their way at 6, 10 and 1e6, and where erfcx drops by a thousandth.
CORNERS += [(f32(c), 1.0, s) for s in (1.0, 1e-4, 1e4) for c in (1e-3, 8e-3, 0.013, 0.02, 2e5, 1.9e3, 1e-6)]
TWO = list(MEMBERS)
TWO += [(c, 1.0) for c in fence(2 / 3, 2, 1.6)[:24]] + [(1.0, c) for c in fence(0.5, 0.7, 0.03, 6)[:40]]


def pair(d):
    (m, n), (s, t) = scale_pair(d), scale_pair(d)
    return m, s, n, t


PAIRS = [(m, s, n, t) for m, s, n, t in itertools.product((1.0, 1e-3, 1e10), (1.0, 1e5), (1.0, step(1.0, 1), 3.0), (1.0, step(1.0, 3), 0.4))]
PAIRS += [(f32(2.3), f32(s), f32(2.3 * (1 + a)), f32(s * (1 + b))) for s in (0.1, 7.0) for a in (0.0, 1e-6, -1e-3) for b in (1e-6, -2e-7, 1e-3, 1.0)]
POINTS = {
    **{name: (at_point, CORNERS) for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    # Beside a far logarithm the derivative in the shape itself leaves the doubles where x is huge or tiny.
    'draw': (at_point, [c for c in CORNERS if 1e-10 < c[0] < 1e30]),
    **{name: (lambda d: (share(d), *member(d)), with_shares(MEMBERS[:8])) for name in ('quantile', 'upperQuantile')},
    'mean': (lambda d: (spread(d),), [(c,) for c in fence(1, 1e30, 16777216, 1e-30, 3)]),
    **{name: (member, TWO) for name in ('variance', 'mode', 'entropy')},
    'kl': (pair, PAIRS),
}
