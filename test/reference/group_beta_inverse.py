"""Quantiles of the beta law, and their derivatives."""
from mpmath import exp

from incomplete_beta import cost, incomplete_beta, log_odds_quantile
from machinery import Draws, f32, fence, step


def shapes_and_share(d):
    while True:
        kind = d.random.random()
        if kind < 0.8:
            a, b = d.log_uniform(1e-2, 1e3), d.log_uniform(1e-2, 1e3)
        elif kind < 0.97:
            a, b = d.log_uniform(1e-30, 1), d.log_uniform(1e-30, 1)
        else:
            a, b = d.log_uniform(2e5, 1e8), d.log_uniform(2e5, 1e8)
        p = d.probability()
        if cost(a, b, min(f32(a / (a + b)), step(1.0, -1))) < 3000 and 0 < p < 1:
            return a, b, p


def tables():
    points = Draws('incomplete beta inverse').many(205, shapes_and_share)
    points += [(a, b, p) for a in (0.01, 1.0, 3.0) for b in (0.3, 1.0, 50.0) for p in
               (1.401298464324817e-45, 1e-4, f32(0.49999997), 0.5, f32(0.50000006), 1 - 2.0 ** -24)]
    points += [(1.0, 1.0, p) for p in fence(0.5, steps=(0, 1, 8))]

    def ends(a, b, p):
        s = log_odds_quantile(a, b, p)
        return 1 / (1 + exp(-s)), 1 / (1 + exp(s))

    def slope(index, sign=1):
        def formula(a, b, p):
            x, y = ends(a, b, p)
            values = incomplete_beta(a, b, x, y)
            return sign * x * y * exp(-values[4]) * (1 if index is None else -values[index])
        return formula

    return {name: (formula, points, 50) for name, formula in {
        'betaIInverse': lambda a, b, p: ends(a, b, p)[0],
        'betaIInverseComplement': lambda a, b, p: ends(a, b, p)[1],
        'betaIInverse_a': slope(2),
        'betaIInverse_b': slope(3),
        'betaIInverse_p': slope(None),
        'betaIInverseComplement_a': slope(2, -1),
        'betaIInverseComplement_b': slope(3, -1),
        'betaIInverseComplement_p': slope(None, -1),
    }.items()}
