#!/usr/bin/env python3
"""Writes the reference values of the families whose parameters are vectors: categorical and multivariate normal, by
mpmath at 150 digits and again at 200, derivatives by dual numbers.

    python3 generate.py

Needs mpmath (written with 1.3.0). A second run writes the same bytes. Every case holds its inputs as lists of float32
numbers, the value, the sum of the sizes of its terms, and per differentiable input the derivatives and the sizes of
theirs.
"""
import json
import os
import sys

sys.dont_write_bytecode = True
HERE = os.path.dirname(os.path.abspath(__file__))
sys.path[:0] = [os.path.join(HERE, '..'), os.path.join(HERE, '../families')]

import mpmath
from mpmath import mp, mpf

from dual import exp, expm1, log, square, variables
from machinery import Draws, f32, step, text


def total(terms):
    result = terms[0]
    for term in terms[1:]:
        result = result + term
    return result


def run(formula, flat):
    terms = formula(variables(flat))
    columns = [[t.value for t in terms]] + [[t.slopes[k] for t in terms] for k in range(len(flat))]
    return [(mpmath.fsum(c), mpmath.fsum(c, absolute=True)) for c in columns]


def case(inputs, formula, extra=None):
    """inputs: name -> list of floats, all differentiated; formula: lists of duals by name -> terms."""
    names = list(inputs)
    flat = [v for name in names for v in inputs[name]]

    def whole(duals):
        parts, at = {}, 0
        for name in names:
            parts[name] = duals[at:at + len(inputs[name])]
            at += len(inputs[name])
        return formula(**parts)

    with mp.workdps(150):
        low = run(whole, flat)
    with mp.workdps(200):
        high = run(whole, flat)
    with mp.workdps(60):
        for (a, _), (b, _) in zip(low, high):
            if a != b and not abs(a - b) <= mpf(10) ** -25 * abs(b) + mpf(10) ** -140:
                raise ArithmeticError(f'{inputs}: {a} {b}')
    show = lambda v: json.loads(text(v))
    size = lambda s: float('%.3g' % float(min(s, 1e300)))
    slopes, at = {}, 1
    for name in names:
        part = high[at:at + len(inputs[name])]
        slopes[name] = {'exact': [show(v) for v, _ in part], 'sizes': [size(s) for _, s in part]}
        at += len(part)
    return {**inputs, **(extra or {}), 'exact': show(high[0][0]), 'size': size(high[0][1]), 'slopes': slopes}


# ---- categorical
def log_share(values, label):
    """log softmax at one label: the differences to it, so that nothing large is left."""
    others = [exp(v - values[label]) for i, v in enumerate(values) if i != label]
    return -log(1 + total(others)) if others else 0 * values[0]


def log_probability(values, label):
    return log(values[label]) - log(total(values))


def logits_of(d, k):
    kind = d.random.random()
    if kind < 0.4:
        return [d.uniform(-4, 4) for _ in range(k)]
    if kind < 0.6:
        return [d.uniform(-80, 80) for _ in range(k)]
    if kind < 0.75:
        return [f32(1e4 + d.uniform(-3, 3)) for _ in range(k)]
    if kind < 0.9:
        return [d.real() for _ in range(k)]
    return [f32(d.uniform(-1, 1))] * k


def shares_of(d, k):
    logs = [d.uniform(-30, 0) if d.random.random() < 0.5 else d.uniform(-2, 0) for _ in range(k)]
    return normalized([mpmath.exp(v) for v in logs])


def normalized(values):
    return [f32(v / sum(values)) for v in values]


def close_to(d, values):
    size = d.log_uniform(1e-6, 1e-1)
    return [f32(v + size * d.uniform(-1, 1) * max(1.0, abs(v) * 1e-3)) for v in values]


CORNERS = [[0.0], [0.0, 0.0], [50.0, 0.0], [0.0, -90.0, 0.0], [3e38, -3e38], [1.0, step(1.0, 1)], [104.0, 0.0, -3.0], [0.0, 88.0, 89.0],
           [1e-30, 0.0, -1e-30], [16777216.0, 16777217.0], [-1e5, -1e5, -1e5 + 17.0]]
SHARE_CORNERS = [[1.0], [0.5, 0.5], [1 - 2.0 ** -24, 2.0 ** -24], [0.25, 0.5, 0.25], [1.0, 1e-38], [1.0, 1e-45, 1e-20], [0.1, 0.2, 0.7]]


def pairs(d, make, corners):
    found = []
    for k in (1, 2, 3, 5, 10):
        for _ in range(12):
            a = make(d, k)
            found.append((a, make(d, k)))
            size = d.log_uniform(1e-6, 1e-1)
            b = close_to(d, a) if make is logits_of else normalized([v * (1 + size * d.uniform(-1, 1)) for v in a])
            found.append((a, b))
    found += [(a, b) for a in corners for b in corners if len(a) == len(b)]
    return [tuple([f32(v) for v in side] for side in pair) for pair in found]


def categorical():
    d = Draws('categorical')
    result = {}
    for name, make, corners, single in (('logits', logits_of, CORNERS, log_share),
                                        ('probabilities', shares_of, SHARE_CORNERS, log_probability)):
        singles = [[f32(v) for v in c] for c in corners] + [make(d, k) for k in (1, 2, 3, 5, 10) for _ in range(15)]
        result[f'logDensity {name}'] = [
            case({name: values}, lambda **p: [single(p[name], label)], {'x': label})
            for values in singles for label in range(min(len(values), 3))]

        def entropy(**p):
            logs = [single(p[name], i) for i in range(len(p[name]))]
            return [-l * exp(l) for l in logs]

        result[f'entropy {name}'] = [case({name: values}, entropy) for values in singles]

        def divergence(**p):
            q, r = p[name], p['other']
            a = [single(q, i) for i in range(len(q))]
            b = [single(r, i) for i in range(len(r))]
            return [exp(x) * (x - y) for x, y in zip(a, b)]

        result[f'kl {name}'] = [case({name: a, 'other': b}, divergence) for a, b in pairs(d, make, corners)]
    return result


# ---- multivariate normal, the factor as its lower triangle row by row
def entry(l, r, c):
    return l[r * (r + 1) // 2 + c]


def solve(l, b):
    y = []
    for r in range(len(b)):
        y.append((b[r] - total([entry(l, r, c) * y[c] for c in range(r)] or [0 * b[r]])) / entry(l, r, r))
    return y


def normal_terms(x, mean, factor):
    y = solve(factor, [a - b for a, b in zip(x, mean)])
    return ([-square(v) / 2 for v in y] + [-log(entry(factor, i, i)) for i in range(len(x))]
            + [0 * x[0] - len(x) * mpmath.log(2 * mpmath.pi) / 2])


def normal_divergence(mean, factor, otherMean, otherFactor):
    n = len(mean)
    shift = solve(otherFactor, [a - b for a, b in zip(mean, otherMean)])
    columns = [solve(otherFactor, [entry(factor, r, c) if r >= c else 0 * mean[0] for r in range(n)]) for c in range(n)]
    return ([square(v) / 2 for v in shift] + [square(v) / 2 for column in columns for v in column]
            + [log(entry(otherFactor, i, i)) - log(entry(factor, i, i)) for i in range(n)] + [0 * mean[0] - mpf(n) / 2])


def factor_of(d, n, kind):
    low, high = {'plain': (0.3, 3), 'stretched': (1e-3, 1e3), 'thin': (1e-6, 1e-4)}[kind]
    return [d.log_uniform(low, high) if c == r and (kind != 'thin' or r == n - 1) else d.log_uniform(0.3, 3) if c == r else d.uniform(-2, 2)
            for r in range(n) for c in range(r + 1)]


def times(factor, z):
    return [sum(entry(factor, r, c) * z[c] for c in range(r + 1)) for r in range(len(z))]


def multivariate_normal():
    d = Draws('multivariate normal')
    densities, divergences = [], []
    for kind in ('plain', 'stretched', 'thin'):
        for n in (1, 2, 3, 5):
            for _ in range(18):
                factor = factor_of(d, n, kind)
                mean = [d.uniform(-3, 3) for _ in range(n)]
                x = [f32(m + v) for m, v in zip(mean, times(factor, [d.random.gauss(0, 1.5) for _ in range(n)]))]
                densities.append(case({'x': x, 'mean': mean, 'factor': factor}, lambda x, mean, factor: normal_terms(x, mean, factor), {'kind': kind}))
                near = d.random.random() < 0.5
                size = d.log_uniform(3e-7, 1e-1)
                other = [f32(v * (1 + size * d.uniform(-1, 1))) for v in factor] if near else factor_of(d, n, kind)
                other_mean = [f32(m + s) for m, s in zip(mean, times(other, [size * d.random.gauss(0, 1) for _ in range(n)]))] if near else x
                divergences.append(case({'mean': mean, 'factor': factor, 'otherMean': other_mean, 'otherFactor': other}, normal_divergence,
                                        {'kind': kind, 'near': near}))
    return {'logDensity': densities, 'kl': divergences}


# ---- log-sum-exp
def log_sum_exp():
    d = Draws('log-sum-exp')
    rows = [[f32(v) for v in r] for r in (
        [0, -88], [-1e-8, -18.42068], [-1e-4, -9.2103901], [0.0], [5, 5], [3e38, 3e38], [-3e38, 3e38], [1e-45, -1e-45], [-103, -103, -104],
        [-0.6931472, -0.6931472], [-0.69314715, -0.6931472], [-1.0986123, -1.0986123, -1.0986123], [88, 88.7], [-87.3, -88.1, 1e-30])]
    for n in (1, 2, 3, 8, 40):
        for _ in range(40):
            spread = d.choice((1, 10, 100, 1e4))
            rows.append([f32(d.uniform(-spread, spread)) for _ in range(n)])
    # Rows of probabilities that nearly sum to one, whose result nearly vanishes.
    for n in (2, 3, 8):
        for _ in range(20):
            rows.append([f32(mpmath.log(p)) for p in normalized([d.uniform(0.01, 1) for _ in range(n)])])
    return {'logSumExp': [case({'x': row}, lambda x: [log(total([exp(v) for v in x]))]) for row in rows]}


for name, make in (('categorical', categorical), ('logSumExp', log_sum_exp), ('multivariateNormal', multivariate_normal)):
    tables = make()
    print(name, {k: len(v) for k, v in tables.items()})
    with open(os.path.join(HERE, name + '.json'), 'w') as file:
        file.write('{\n' + ',\n'.join(json.dumps(k) + ': [\n' + ',\n'.join(map(json.dumps, v)) + ']' for k, v in tables.items()) + '\n}\n')
