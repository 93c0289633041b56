"""Sums and differences of numbers that are given by their logarithms."""
from mpmath import exp, expm1, log, log1p

from machinery import Draws, f32, fence


def log_add(a, b):
    return max(a, b) + log1p(exp(-abs(a - b)))


def tables():
    def pair(d):
        a = d.real() if d.random.random() < 0.3 else d.uniform(-90, 90)
        return a, f32(a + d.sign() * d.log_uniform(1e-6, 120))

    def ordered(d):
        a, b = pair(d)
        return (a, b) if a > b else (b, a) if b > a else (a, f32(a - 1 - abs(a) / 100))

    add = Draws('log add').many(220, pair)
    add += [(a, b) for a in (0.0, 1.0, -0.6931472, 80.0) for b in fence(a, a - 16.6, steps=(0, 1, 8))]
    # Sums near one: the result is near zero.
    add += [(-t, f32(log(-expm1(-t)))) for t in (1e-8, 1e-4, 0.01, 0.3, 0.6931472)]
    subtract = Draws('log subtract').many(260, ordered)
    subtract += [(1.0, b) for b in fence(0.3068528, -15.6) if b < 1]
    return {
        'logAddExp': (log_add, add, 160),
        'logAddExp_a': (lambda a, b: 1 / (1 + exp(b - a)), add, 160),
        'logAddExp_b': (lambda a, b: 1 / (1 + exp(a - b)), add, 160),
        'logSubExp': (lambda a, b: a + log1p(-exp(b - a)), subtract, 160),
        'logSubExp_a': (lambda a, b: -1 / expm1(b - a), subtract, 160),
        'logSubExp_b': (lambda a, b: -1 / expm1(a - b), subtract, 160),
    }
