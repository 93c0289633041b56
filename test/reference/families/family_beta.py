"""The beta distribution by its textbook formulas; incomplete beta functions by series and quadrature."""
import mpmath
from mpmath import mp, mpf

import gamma_law as g
import incomplete_beta as incomplete
from dual import Dual, exp, log, log1p
from machinery import Draws, f32, fence, step
from points import SHARES, SMALLEST, share
from scalar import constant, log_2pi

PARAMETERS = {'alpha': ['alpha', 'logAlpha'], 'beta': ['beta', 'logBeta']}
FORMS = {'logAlpha': g.FORMS['logShape'], 'logBeta': g.FORMS['logShape']}
ONE_BY_ONE = True
# Slow ones, in the first form of each parameter alone.
FIRST_FORMS = ('quantile', 'upperQuantile', 'drawLog', 'drawLogOdds')
LOGS = [9.0, -9.0, 4.0943446, 2.3025851, -5.0, 0.5, -0.001]
FAR = {'logAlpha': LOGS, 'logBeta': LOGS}
DIGITS = {'': 45, 'mode': 90, 'mean': 90, 'variance': 90, 'entropy': 90, 'kl': 90}


def log_beta(a, b):
    n = a.value + b.value
    value = mpmath.loggamma(a.value) + mpmath.loggamma(b.value) - mpmath.loggamma(n)
    psi = mpmath.digamma(n)
    p, q = mpmath.digamma(a.value) - psi, mpmath.digamma(b.value) - psi
    return Dual(value, [p * s + q * t for s, t in zip(a.slopes, b.slopes)])


def log_density(x, a, b):
    """For large shapes with the large parts of log B taken out, as they say nothing of what may cancel."""
    with mp.workdps(mp.dps + 70):
        y = 1 - x
        if min(a.value, b.value) < 10:
            return [(a - 1) * log(x), (b - 1) * log(y), -log_beta(a, b)]
        n = a + b
        return [a * log(n * x / a) - (n * x - a), b * log(n * y / b) - (n * y - b), g.stirling(n), -g.stirling(a),
                -g.stirling(b), log(a * b / n) / 2, constant(-log_2pi() / 2, x), -log(x), -log(y)]


def shares(x, a, b):
    log_i, log_j, in_a, in_b, scale = incomplete.incomplete_beta(a.value, b.value, x.value)
    with mp.workdps(mp.dps + 60):
        density = mpmath.exp(scale) / (x.value * (1 - x.value))
    slopes = [in_a * s + in_b * t + density * u for s, t, u in zip(a.slopes, b.slopes, x.slopes)]
    return log_i, log_j, slopes


def cdf(x, a, b):
    log_i, _, slopes = shares(x, a, b)
    return [Dual(mpmath.exp(log_i), slopes)]


def survival(x, a, b):
    _, log_j, slopes = shares(x, a, b)
    return [Dual(mpmath.exp(log_j), [-s for s in slopes])]


def log_cdf(x, a, b):
    log_i, _, slopes = shares(x, a, b)
    return [Dual(log_i, [s / mpmath.exp(log_i) for s in slopes])]


def log_survival(x, a, b):
    _, log_j, slopes = shares(x, a, b)
    return [Dual(log_j, [-s / mpmath.exp(log_j) for s in slopes])]


def odds_slopes(odds, a, b):
    """How log odds move with the shapes at a fixed share, and with the share."""
    x, y = 1 / (1 + mpmath.exp(-odds)), 1 / (1 + mpmath.exp(odds))
    _, _, in_a, in_b, scale = incomplete.incomplete_beta(a.value, b.value, x, y)
    d = mpmath.exp(scale)
    return x, y, -in_a / d, -in_b / d, 1 / d


def quantile(p, a, b):
    x, y, in_a, in_b, in_p = odds_slopes(incomplete.log_odds_quantile(a.value, b.value, p.value), a, b)
    return [Dual(x, [x * y * (in_a * s + in_b * t + in_p * u) for s, t, u in zip(a.slopes, b.slopes, p.slopes)])]


def upper_quantile(p, a, b):
    x, y, in_b, in_a, in_p = odds_slopes(incomplete.log_odds_quantile(b.value, a.value, p.value), b, a)
    return [Dual(y, [-x * y * (in_a * s + in_b * t + in_p * u) for s, t, u in zip(a.slopes, b.slopes, p.slopes)])]


def moved(x, odds, factor, a, b):
    """A draw's value, and in its place the slopes; `factor` is its derivative in the log odds."""
    u, y, in_a, in_b, _ = odds_slopes(odds, a, b)
    by = factor(u, y)
    return [Dual(x.value, [r + by * (in_a * s + in_b * t) for r, s, t in zip(x.slopes, a.slopes, b.slopes)])]


def draw(x, a, b):
    with mp.workdps(mp.dps + 60):
        odds = mpmath.log(x.value) - mpmath.log1p(-x.value)
    return moved(x, odds, lambda u, y: u * y, a, b)


def log_draw(x, a, b):
    with mp.workdps(mp.dps + 60):
        odds = x.value - mpmath.log(-mpmath.expm1(x.value))
    return moved(x, odds, lambda u, y: y, a, b)


def odds_draw(x, a, b):
    return moved(x, x.value, lambda u, y: 1, a, b)


def mode(a, b):
    if a.value > 1 and b.value > 1:
        return [(a - 1) / (a + b - 2)]
    return [constant(1 if a.value > b.value else 0, a)]


def kl(a, b, c, d):
    n, m = a + b, c + d
    psi = g.digamma(n)
    return [log_beta(c, d), -log_beta(a, b), (a - c) * (g.digamma(a) - psi), (b - d) * (g.digamma(b) - psi)]


def entropy(a, b):
    return [-t for t in kl(a, b, constant(1, a), constant(1, a))]


def shape(d):
    kind = d.random.random()
    return d.log_uniform(0.2, 20) if kind < 0.5 else d.log_uniform(1e-3, 1e3) if kind < 0.85 else d.log_uniform(1e-6, 1e6)


def shapes(d):
    """Two shapes for which the reference is not too slow."""
    a, b = shape(d), shape(d)
    return (a, b) if max(a, b) < 3e4 or min(a, b) > 1e5 else (d.log_uniform(0.3, 30), b if b < 3e4 else a if a < 3e4 else 1e3)


def inside(x):
    return min(1 - 2.0 ** -24, max(SMALLEST, f32(x)))


def variate(d, a, b):
    kind = d.random.random()
    n = a + b
    if kind < 0.6:
        return inside(a / n + d.random.gauss(0, 2) * (a * b / (n * n * (n + 1))) ** 0.5)
    if kind < 0.8:
        return inside(float(d.log_uniform(1e-3, 1)) * a / n)
    return d.probability()


def placed(d):
    a, b = shapes(d)
    return variate(d, a, b), a, b


PAIRS = [(1e-6, 1e-6), (1e-3, 0.01), (0.3, 0.7), (1.0, 1.0), (1.0, 3.7), (2.5, 1.0), (2.5, 4.0), (0.5, 300.0), (9.999, 10.0), (10.0, 10.0),
         (30.0, 29.99), (40.0, 7.0), (60.0, 60.0), (1e3, 2e3), (3e5, 1e6)]
CORNERS = [(inside(a / (a + b) + k * (a * b / (a + b) ** 2 / (a + b + 1)) ** 0.5), f32(a), f32(b)) for a, b in PAIRS for k in (-4, -0.1, 0, 1, 6)]
CORNERS += [(x, f32(a), f32(b)) for a, b in PAIRS[1:8] for x in (SMALLEST, 1e-20, 0.7, step(1.0, -1))]
CORNERS += [(inside(x), f32(a), f32(b)) for a, b in ((2.5, 4.0), (60.0, 60.0), (1e3, 2e3)) for c in (a / (a + b), (a - 1) / (a + b - 2)) for x in fence(c, steps=(0, 1, 8))]
WITH_SHARES = [(p, f32(a), f32(b)) for p in SHARES[::2] for a, b in PAIRS[1:]]
ONE = list(dict.fromkeys((f32(a * u), f32(b * v)) for a, b in PAIRS for u, v in ((1, 1), (1.001, 1), (3, 0.5), (1, 1 + 1e-6), (0.9, 1.1))))
MODES = [(a, b) for a, b in ONE if a > 1 and b > 1]
MODES += [(f32(1 + 2.0 ** -k), b) for k in (1, 4, 10, 20) for b in (1.5, 3.0, 1e4, 1.0078125)]


def at_share(d):
    return (share(d), *shapes(d))


def mode_pair(d):
    a, b = shapes(d)
    return (a, b) if max(a, b) > 1 else (1 + a, b)


def two(d):
    a, b = shape(d), shape(d)
    if d.random.random() < 0.2:
        # The same mean, but for the rounding.
        by = 1 + d.sign() * float(d.log_uniform(1e-6, 0.9))
        return a, b, f32(a * by), f32(b * by)
    c, e = g.near(d, a), g.near(d, b)
    return a, b, shape(d) if c is None else c, shape(d) if e is None else e


TWO = [(f32(a), f32(b), f32(a * u), f32(b * v)) for a, b in PAIRS
       for u, v in ((1, 1), (1 + 2.0 ** -22, 1), (1 + 1e-5, 1 + 1e-5), (0.49, 0.49), (1.6, 1), (0.3, 9))]


def log_placed(d):
    x, a, b = placed(d)
    x = mpmath.log(x) if d.random.random() < 0.7 else -d.log_uniform(1e-7, 1e3 / min(1, a) ** 0.5)
    return min(f32(x), -SMALLEST), min(a, 1e3), min(b, 1e3)


def odds_placed(d):
    x, a, b = placed(d)
    x = mpmath.log(x) - mpmath.log1p(-x) if d.random.random() < 0.7 else d.sign() * d.log_uniform(1e-7, 500)
    return f32(x), min(a, 1e3), min(b, 1e3)


LOG_CORNERS = [(x, a, b) for x in (-1e-7, -0.3, -0.6931472, -40.0, -200.0) for a, b in ((1e-3, 1e-3), (0.3, 0.7), (1.0, 1.0), (0.01, 5.0), (0.5, 300.0), (2.5, 4.0), (60.0, 60.0), (100.0, 0.3))]
AT_X = (placed, CORNERS)
AT_P = (at_share, WITH_SHARES)
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival', 'draw')},
    'drawLog': (log_placed, LOG_CORNERS), 'drawLogOdds': (odds_placed, LOG_CORNERS + [(-x, a, b) for x, a, b in LOG_CORNERS]),
    'quantile': AT_P, 'upperQuantile': AT_P, 'mean': (shapes, ONE), 'variance': (shapes, ONE), 'entropy': (shapes, ONE),
    'mode': (mode_pair, MODES), 'kl': (two, TWO),
}
THREE, BOTH, FOUR = 'x alpha beta', 'alpha beta', 'alpha beta otherAlpha otherBeta'
FUNCTIONS = {
    'logDensity': ('betaLogDensity', log_density, THREE, THREE),
    'cdf': ('betaCdf', cdf, THREE, THREE), 'survival': ('betaSurvival', survival, THREE, THREE),
    'logCdf': ('betaLogCdf', log_cdf, THREE, THREE), 'logSurvival': ('betaLogSurvival', log_survival, THREE, THREE),
    'quantile': ('betaQuantile', quantile, 'p alpha beta', 'p alpha beta'),
    'upperQuantile': ('betaUpperQuantile', upper_quantile, 'p alpha beta', 'p alpha beta'),
    'mean': ('betaMean', lambda a, b: [a / (a + b)], BOTH, BOTH),
    'variance': ('betaVariance', lambda a, b: [a * b / ((a + b) * (a + b) * (a + b + 1))], BOTH, BOTH),
    'mode': ('betaMode', mode, BOTH, BOTH), 'entropy': ('betaEntropy', entropy, BOTH, BOTH),
    'draw': ('betaDraw', draw, THREE, BOTH), 'drawLog': ('betaLogDraw', log_draw, THREE, BOTH),
    'drawLogOdds': ('betaLogOddsDraw', odds_draw, THREE, BOTH),
    'kl': ('betaKl', kl, FOUR, FOUR),
}


def convert(mean, concentration):
    return {'alpha': mean * concentration, 'beta': (1 - mean) * concentration}


def made(family, function, lead):
    """The points in alpha and beta, carried to mean and concentration."""
    make, corners = POINTS[function]
    found = Draws(f'{family} {function} mean concentration').many(70, make) + corners[::3]
    rows = [(*map(f32, row[:-2]), inside(row[-2] / (row[-2] + row[-1])), f32(row[-2] + row[-1])) for row in found]
    return list(dict.fromkeys(row for row in rows if 1e-6 < row[-2] < 1 - 1e-6))


JOINTS = [('betaMeanConcentration', 'mean concentration', convert, made)]
