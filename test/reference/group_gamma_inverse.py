"""Quantiles of the gamma law, and their derivatives."""
from mpmath import digamma, exp, log, log1p, mp

from incomplete_gamma import draw_derivative, incomplete_gamma, log_quantile
from machinery import Draws, f32, fence
from group_gamma import shape_and_point


def tables():
    draws = Draws('incomplete gamma inverse')

    def shape(d):
        kind = d.random.random()
        return d.log_uniform(1e-3, 1e4) if kind < 0.8 else d.log_uniform(1e-44, 1e-3) if kind < 0.9 else \
            d.log_uniform(1e4, 1e30)

    shares = [(shape(draws), draws.probability()) for _ in range(210)]
    shares += [(a, p) for a in (1e-3, 0.1, 0.9999999, 1.0, 3.0, 60.0, 1e5) for p in
               (1.401298464324817e-45, 1e-38, 1e-4, f32(0.49999997), 0.5, f32(0.50000006), 0.75, 1 - 2.0 ** -24)]
    shares += [(1.0, p) for p in fence(0.5, 0.2, steps=(0, 1))]

    def p_point(a, p):
        return exp(log_quantile(a, log(p), log1p(-p)))

    def q_point(a, q):
        return exp(log_quantile(a, log1p(-q), log(q)))

    def slope(a, x):
        """dx/dP = 1 / density."""
        return x / (a * exp(incomplete_gamma(a, x)[3]))

    def log_p_quantile(a, l):
        return log_quantile(a, l, log(1 - exp(l)))

    # So far down P is x^a / Gamma(a + 1) to all digits.
    def log_in_shape(a, l):
        w = log_p_quantile(a, l)
        return (digamma(a + 1) - w) / a if w < -1000 else draw_derivative(exp(w), a) / exp(w)

    def log_in_share(a, l):
        w = log_p_quantile(a, l)
        return 1 / a if w < -1000 else exp(l - incomplete_gamma(a, exp(w))[3]) / a

    logs = [(shape(d), -d.log_uniform(1e-30, 1e4)) for d in [Draws('log gamma quantile')] for _ in range(220)]
    logs += [(a, l) for a in (60.0, 300.0) for l in (-1e3, -2400.0, -2.5e4)]
    logs += [(a, l) for a in (1e-3, 0.5, 3.0, 1e3) for l in fence(-log(2), -1e-10, -1e4, steps=(0, 1, 8))]
    return {
        'gammaPInverse': (p_point, shares, 60),
        'gammaPInverse_p': (lambda a, p: slope(a, p_point(a, p)), shares, 60),
        'gammaPInverse_a': (lambda a, p: draw_derivative(p_point(a, p), a), shares, 60),
        'gammaQInverse': (q_point, shares, 60),
        'gammaQInverse_q': (lambda a, q: -slope(a, q_point(a, q)), shares, 60),
        'gammaQInverse_a': (lambda a, q: draw_derivative(q_point(a, q), a), shares, 60),
        'logGammaPInverse': (log_p_quantile, logs, 80),
        'logGammaPInverse_a': (log_in_shape, logs, 80),
        'logGammaPInverse_logP': (log_in_share, logs, 80),
    }
