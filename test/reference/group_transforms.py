"""Changes of parametrization."""
from mpmath import exp, log, mpf, sqrt

from machinery import HUGE, TINY, Draws, fence


def tables():
    tables = {}

    def add(name, formula, make, *adversarial):
        points = Draws(name).many(220, make) + [p for group in adversarial for p in group]
        tables[name] = (formula, points, 100)

    def real(d):
        return d.real() if d.random.random() < 0.4 else d.uniform(-110, 95)

    both = TINY + [-t for t in TINY] + HUGE + [-t for t in HUGE] + [0.0]
    bends = fence(1, -1, 88.72, -87.34, -103.97)
    add('identity', lambda v: v, real, both, bends)
    add('identity_v', lambda v: mpf(1), real, both, bends)
    add('exponential', exp, real, both, bends)
    add('exponential_v', exp, real, both, bends)
    add('exponentialReciprocal', lambda v: exp(-v), real, both, bends)
    add('exponentialReciprocal_v', lambda v: -exp(-v), real, both, bends)
    add('half', lambda v: v / 2, real, both, bends)
    add('half_v', lambda v: mpf(1) / 2, real, both, bends)
    halves = fence(1, -1, 177.44, -174.67, -207.9)
    add('expHalf', lambda v: exp(v / 2), real, both, halves)
    add('expHalf_v', lambda v: exp(v / 2) / 2, real, both, halves)
    positive = TINY + HUGE
    ones = fence(1, 0.5, 2, 1e-38, 1.2e38)
    for name, formula in {
        'squareRoot': sqrt,
        'squareRoot_v': lambda v: 1 / (2 * sqrt(v)),
        'inverseSquareRoot': lambda v: 1 / sqrt(v),
        'inverseSquareRoot_v': lambda v: -1 / (2 * v * sqrt(v)),
        'reciprocal': lambda v: 1 / v,
        'reciprocal_v': lambda v: -1 / (v * v),
        'logarithm': log,
        'logarithm_v': lambda v: 1 / v,
    }.items():
        add(name, formula, lambda d: d.positive(), positive, ones)
    shares = TINY + [1 - 2.0 ** -24]
    middle = fence(0.5, 0.25, 0.75, 0.1, 0.9)
    add('logOdds', lambda v: log(v / (1 - v)), lambda d: d.probability(), shares, middle)
    add('logOdds_v', lambda v: 1 / (v * (1 - v)), lambda d: d.probability(), shares, middle)
    return tables
