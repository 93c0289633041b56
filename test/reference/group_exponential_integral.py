"""The scaled exponential integral e^x E1(x) and its derivative."""
from mpmath import e1, exp, mp, mpf

from machinery import HUGE, TINY, Draws, fence


def scaled(x):
    """Beyond 700 by the asymptotic series, to its smallest term or to all digits (DLMF 6.12.1)."""
    if x < 700:
        return exp(x) * e1(x)
    total, term, k = 1 / x, 1 / x, 0
    while abs(term) > mpf(10) ** -(mp.dps + 5) * total and k < x:
        k += 1
        term *= -k / x
        total += term
    return total


def tables():
    tables = {}
    for name, formula in (('scaledExponentialIntegral', scaled), ('scaledExponentialIntegral_x', lambda x: scaled(x) - 1 / x)):
        points = Draws(name).many(230, lambda d: d.positive()) + TINY + HUGE + fence(1, 3, 4, 30, 700)
        tables[name] = (formula, points, 160)
    return tables
