"""The modified Bessel functions of orders 0 and 1 and their ratio."""
from mpmath import besseli, exp, log, mp, mpf, pi, sqrt

from machinery import HUGE, TINY, Draws, fence


def scaled(order, x):
    """e^-x I(x) for x >= 0; beyond 1000 by the expansion in 1/x, to its smallest term or to all digits."""
    if x < 1000:
        return exp(-x) * besseli(order, x)
    term, total, k = mpf(1), mpf(1), 0
    while abs(term) > mpf(10) ** -(mp.dps + 5):
        k += 1
        term *= -mpf(4 * order ** 2 - (2 * k - 1) ** 2) / (8 * k * x)
        total += term
    return total / sqrt(2 * pi * x)


def ratio(x):
    return scaled(1, x) / scaled(0, x)


def slope(x):
    return mpf(1) / 2 if x == 0 else 1 - ratio(x) / x - ratio(x) ** 2


def scaled1_slope(x):
    # An even function of x.
    x = abs(x)
    return mpf(1) / 2 if x == 0 else scaled(0, x) - scaled(1, x) * (1 + 1 / x)


def sign(x):
    return -1 if x < 0 else 1


def tables():
    tables = {}

    def add(name, formula, make):
        points = Draws(name).many(220, make) + TINY + HUGE + [0.0]
        points += fence(1, 3.75, 7.75, 8, 29, 30, 31, 700, 1000)
        tables[name] = (formula, points, 160)

    def positive(d):
        return d.positive()

    def real(d):
        return d.real()

    add('besselI0e', lambda x: scaled(0, abs(x)), real)
    add('besselI0e_x', lambda x: sign(x) * (scaled(1, abs(x)) - scaled(0, abs(x))), real)
    add('logBesselI0e', lambda x: log(scaled(0, abs(x))), real)
    add('logBesselI0e_x', lambda x: sign(x) * (ratio(abs(x)) - 1), real)
    add('besselI1e', lambda x: sign(x) * scaled(1, abs(x)), real)
    add('besselI1e_x', scaled1_slope, real)
    add('besselRatio', ratio, positive)
    add('besselRatio_x', slope, positive)
    add('besselRatioComplement', lambda x: 1 - ratio(x), positive)
    add('besselRatioComplement_x', lambda x: -slope(x), positive)
    return tables
