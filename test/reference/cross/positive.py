#!/usr/bin/env python3
"""Writes positive.json: divergences between positive families by quadrature with mpmath, from textbook densities, each at
two precisions that agree to 15 digits. A row holds q's parameters, p's and the divergence.

    python3 positive.py
"""
import itertools
import json
import os

import mpmath
from mpmath import exp, log, mp, mpf, pi


def exponential(rate):
    return lambda x: log(rate) - rate * x


def weibull(scale, shape):
    return lambda x: log(shape / scale) + (shape - 1) * log(x / scale) - (x / scale) ** shape


def rayleigh(scale):
    return lambda x: log(x) - 2 * log(scale) - (x / scale) ** 2 / 2


def half_normal(scale):
    return lambda x: log(2 / pi) / 2 - log(scale) - (x / scale) ** 2 / 2


def pareto(scale, shape):
    return lambda x: log(shape) + shape * log(scale) - (shape + 1) * log(x)


FAMILIES = {'exponential': (exponential, ['rate']), 'weibull': (weibull, ['scale', 'shape']), 'rayleigh': (rayleigh, ['scale']),
            'halfNormal': (half_normal, ['scale']), 'pareto': (pareto, ['scale', 'shape'])}
MEMBERS = {'exponential': [(0.25,), (1.0,), (3.0,)], 'weibull': [(0.75, 0.875), (1.0, 1.0), (1.5, 2.0), (2.0, 3.5)],
           'rayleigh': [(0.5,), (1.0,), (2.5,)], 'halfNormal': [(0.5,), (1.25,), (3.0,)],
           'pareto': [(0.5, 1.5), (1.0, 3.0), (2.0, 6.5)]}
PAIRS = [('exponential', 'weibull'), ('weibull', 'exponential'), ('rayleigh', 'weibull'), ('weibull', 'rayleigh'),
         ('halfNormal', 'exponential'), ('exponential', 'halfNormal'), ('pareto', 'exponential')]


def divergence(family, q, p, least):
    """The integral over log x, where every integrand decays fast."""
    def integrand(u):
        x = exp(u)
        logq = q(x)
        return exp(logq + u) * (logq - p(x))
    if family == 'pareto':
        return mpmath.quad(integrand, [least, least + 1, least + 3, least + 8, least + 20, least + 60, least + 200])
    return mpmath.quad(integrand, [-120, -60, -30, -15, -8, -4, -2, -1, 0, 1, 2, 3, 4, 5, 6])


def row(q, p, a, b):
    values = []
    for digits in (25, 35):
        with mp.workdps(digits):
            first = FAMILIES[q][0](*map(mpf, a))
            values.append(divergence(q, first, FAMILIES[p][0](*map(mpf, b)), log(mpf(a[0]))))
    assert abs(values[0] - values[1]) < mpf(10) ** -15, (q, p, a, b, values)
    return [*a, *b, float(values[1])]


tables = []
for q, p in PAIRS:
    rows = [row(q, p, a, b) for a, b in itertools.product(MEMBERS[q], MEMBERS[p])]
    tables.append({'q': q, 'p': p, 'parameters': FAMILIES[q][1], 'otherParameters': FAMILIES[p][1], 'rows': rows})
    print(q, p, len(rows), flush=True)
with open(os.path.join(os.path.dirname(os.path.abspath(__file__)), 'positive.json'), 'w') as file:
    heads = [json.dumps({k: v for k, v in t.items() if k != 'rows'})[:-1] + ', "rows": [\n' + ',\n'.join(map(json.dumps, t['rows'])) + ']}' for t in tables]
    file.write('[\n' + ',\n'.join(heads) + '\n]\n')
