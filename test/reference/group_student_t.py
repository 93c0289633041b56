"""Student's t law: its distribution function, quantile and the derivative of a draw."""
from functools import lru_cache

import mpmath
from mpmath import exp, log, log1p, loggamma, mp, mpf, pi, sqrt

from incomplete_beta import incomplete_beta, terms
from machinery import TINY, Draws, f32, fence


def density(z, n):
    return exp(loggamma((n + 1) / 2) - loggamma(n / 2) - log(n * pi) / 2 - (n + 1) / 2 * log1p(z * z / n))


def law(s, n):
    """(log of the share beyond s, log of its complement, ds/dn at a fixed share) for s > 0."""
    return _law(s, n, mp.dps)


@lru_cache(maxsize=None)
def _law(s, n, digits):
    # The derivative is small against its two parts for large n.
    with mp.workdps(digits + 20 + 2 * int(abs(mpmath.log10(n)))):
        w, y = n / (n + s * s), s * s / (n + s * s)
        twice, _rest, slope, _b, scale = incomplete_beta(n / 2, mpf(1) / 2, w, y)
        return twice - log(2), log1p(-exp(twice) / 2), s / 2 * (slope / (2 * exp(scale)) + 1 / n)


def quantile(p, n):
    """The s with share p < 1/2 beyond it."""
    return _quantile(p, n, mp.dps)


@lru_cache(maxsize=None)
def _quantile(p, n, digits):
    """Newton's method in log s, on the share beyond s or between 0 and s; both are concave there."""
    middle = p > 0.25
    front = log(density(mpf(0), n))
    v = log(mpf(1) / 2 - p) - front
    if not middle:
        # The power law of the far tail, and the normal law's beginning; both are good starts from either side.
        r = sqrt(-2 * log(2 * p))
        v = max(log(r) + r * r / (4 * n) if r * r < 4 * n else v,
                (front + (n - 1) / 2 * log(n) - log(p)) / n if n < 30 else v)
    for stage, goal in ((20, 6), (digits + 15, digits)):
        with mp.workdps(stage):
            for _ in range(100):
                s = exp(v)
                log_beyond = law(s, n)[0]
                slope = s * density(s, n)
                if middle:
                    between = mpf(1) / 2 - exp(log_beyond)
                    move = (log(mpf(1) / 2 - p) - log(between)) * between / slope
                else:
                    move = (log_beyond - log(p)) * exp(log_beyond) / slope
                move = max(min(move, mpf(2)), mpf(-2))
                v += move
                if abs(move) < mpf(10) ** -goal:
                    break
            else:
                raise ArithmeticError(f'no convergence at {p}, {n}')
    return exp(v)


def quick(z, n):
    """Whether the series of the reference are short here."""
    with mp.workdps(40):
        z, n = mpf(abs(z)), mpf(n)
        w, y = n / (n + z * z), z * z / (n + z * z)
        return min(terms(n / 2, mpf(1) / 2, w, y), terms(mpf(1) / 2, n / 2, y, w)) < 3000


def freedom(d):
    kind = d.random.random()
    return d.log_uniform(0.1, 1e3) if kind < 0.5 else d.log_uniform(1e-3, 1e8) if kind < 0.95 else \
        d.log_uniform(1e-6, 1e20)


def point(d):
    while True:
        n = freedom(d)
        z = d.uniform(-9, 9) if d.random.random() < 0.6 else d.sign() * d.log_uniform(1e-10, 1e4)
        if d.random.random() < 0.08:
            z = d.sign() * d.log_uniform(1e-40, 1e30)
        if z != 0 and quick(z, n):
            return z, n


def share(d):
    while True:
        p, n = d.probability(), freedom(d)
        # Deep tails of few degrees of freedom lie beyond float32.
        if 0 < p < 1 and p != 0.5 and 1e-3 < n < 1e9 and (n < 300 or p > 1e-12) and not p ** (1 / n) < 1e-35:
            return p, n


def tables():
    switches = [(s * z, n) for n in fence(100, steps=(0, 1, 8)) for z in (1e-3, 0.7, 1.5499, 1.55, 5.0, 40.0)
                for s in (1, -1)]
    switches += [(z, n) for n in (2.0, 500.0, 1e6, 1e8) for z in fence(1.55, -1.0, steps=(0, 1, 21))]
    points = Draws('student t').many(220, point) + [p for p in switches if quick(*p)]
    shares = Draws('student t quantile').many(220, share)
    shares += [(p, n) for n in (0.3, 1.0, 4.0, 99.99999, 100.0, 1e4) for p in
               TINY[:1] * (n < 200) + [1e-10, 1e-4, 0.06, f32(0.49999997), f32(0.50000006), 0.94, 1 - 2.0 ** -24]]

    def log_lower(z, n):
        return law(abs(z), n)[0 if z < 0 else 1]

    def moved(z, n):
        return law(abs(z), n)[2] * (1 if z > 0 else -1)

    def at_share(p, n):
        return -quantile(p, n) if p < 0.5 else quantile(1 - p, n)

    return {name: (formula, chosen, 50) for name, formula, chosen in [
        ('studentTCdf', lambda z, n: exp(log_lower(z, n)), points),
        ('studentTCdf_z', density, points),
        ('studentTCdf_degreesOfFreedom', lambda z, n: -density(z, n) * moved(z, n), points),
        ('studentTLogCdf', log_lower, points),
        ('studentTLogCdf_z', lambda z, n: density(z, n) / exp(log_lower(z, n)), points),
        ('studentTLogCdf_degreesOfFreedom', lambda z, n: -density(z, n) * moved(z, n) / exp(log_lower(z, n)), points),
        ('studentTDrawDerivative', moved, points),
        ('studentTQuantile', at_share, shares),
        ('studentTQuantile_p', lambda p, n: 1 / density(at_share(p, n), n), shares),
        ('studentTQuantile_degreesOfFreedom', lambda p, n: moved(at_share(p, n), n), shares),
    ]}
