"""The incomplete beta function and its derivatives in the shapes, in mpmath's arithmetic."""
from functools import lru_cache

import mpmath
from mpmath import digamma, exp, log, log1p, loggamma, mp, mpf, polygamma, quad, sqrt


def terms(a, b, x, y):
    """About how many terms the series of the lower share takes."""
    peak = max(0, ((a + b) * x - a - 1) / y)
    # The ratio of terms falls to x: like a bell curve as long as the index stays below a, geometrically beyond.
    bell = 18 * sqrt((a + peak) / y) + 150
    return float(peak + (min(150 / y, bell) if bell < a + peak else 150 / y))


def cost(a, b, x):
    if min(a, b) > 1e5:
        return 0
    with mp.workdps(60):
        x = mpf(x)
        return min(terms(mpf(a), mpf(b), x, 1 - x), terms(mpf(b), mpf(a), 1 - x, x))


def log_scale(a, b, x, y):
    return a * log(x) + b * log(y) - loggamma(a) - loggamma(b) + loggamma(a + b)


def incomplete_beta(a, b, x, y=None):
    """(log I, log(1 - I), dI/da, dI/db, log D) with D = x^a y^b / B(a, b); y = 1 - x where it is not given."""
    return _incomplete_beta(a, b, x, y, mp.dps)


@lru_cache(maxsize=None)
def _incomplete_beta(a, b, x, y, digits):
    if y is None:
        with mp.workdps(digits + 60):
            y = 1 - x
    with mp.workdps(60 + int(abs(mpmath.log10(a)) + abs(mpmath.log10(b)) + abs(mpmath.log10(a + b)))):
        scale = log_scale(a, b, x, y)
        deep = int(max(0, -scale / 2.3))
        below = a * y >= b * x
    large = min(a, b) > 1e5
    if large:
        swap, deep = not below, 0
    else:
        # The small share by itself if its series is short enough, else as the complement of the other.
        here, there = terms(a, b, x, y), terms(b, a, y, x)
        swap = not below
        if (there if swap else here) < max(4000, 2 * deep):
            deep = 0
        elif (here if swap else there) < (there if swap else here):
            swap = below
        else:
            deep = 0
    extra = 50 + deep + int(abs(mpmath.log10(a)) + abs(mpmath.log10(b)) + abs(mpmath.log10(a + b)))
    with mp.workdps(digits + extra):
        share = _quadrature if large else _series
        # Both in full from the smaller one: the other may be rounded to fewer digits.
        x, y = (1 - y, y) if y < x else (x, 1 - x)
        if swap:
            part, in_b, in_a = share(b, a, y, x, digits)
            part, in_a, in_b = part, -in_a, -in_b
        else:
            part, in_a, in_b = share(a, b, x, y, digits)
        rest = log1p(-part)
        return (rest if swap else log(part), log(part) if swap else rest, in_a, in_b, log_scale(a, b, x, y))


def _series(a, b, x, y, digits):
    """DLMF 8.17.8 and its derivatives, term by term; positive terms."""
    log_x, log_y, psi = log(x), log(y), digamma(a + b)
    in_a, in_b = log_x + psi - digamma(a + 1), log_y + psi - digamma(b)
    term, n = mpf(1), 0
    total, total_a, total_b = term, in_a, in_b
    small = mpf(10) ** -(mp.dps + 3)
    while term > small * total or (a + b + n) * x > a + 1 + n:
        up, down = 1 / (a + b + n), 1 / (a + 1 + n)
        in_a += up - down
        in_b += up
        term = term * (a + b + n) * x * down
        n += 1
        total += term
        total_a += term * in_a
        total_b += term * in_b
    front = exp(a * log_x + b * log_y - loggamma(a + 1) - loggamma(b) + loggamma(a + b))
    return front * total, front * total_a, front * total_b


def _quadrature(a, b, x, y, digits):
    """The integral over log odds, by mpmath's own rule on stretches of a standard deviation's size."""
    log_x, log_y = log(x), log(y)
    slope, curvature = a * y - b * x, (a + b) * x * y
    goal = (digits + 10) * mpf('2.4') + 20
    end = 2 * goal / (slope + sqrt(slope ** 2 + 2 * goal * curvature))
    log_ratio = log_x - log_y

    @lru_cache(maxsize=None)
    def parts(v):
        t = 1 / (1 + exp(v - log_ratio))
        log_t, log_u = log(t), log1p(-t)
        weight = exp(a * (log_t - log_x) + b * (log_u - log_y))
        return weight, weight * (log_t - log_x), weight * (log_u - log_y)

    stretches = [end * k / 6 for k in range(7)]
    whole, part_a, part_b = (quad(lambda v: parts(v)[i], stretches) for i in range(3))
    psi = digamma(a + b)
    front = exp(a * log_x + b * log_y - loggamma(a) - loggamma(b) + loggamma(a + b))
    return (front * whole, front * ((log_x + psi - digamma(a)) * whole + part_a),
            front * ((log_y + psi - digamma(b)) * whole + part_b))


def log_odds_quantile(a, b, p):
    """log(x / (1 - x)) with I_x(a, b) = p, from Newton's method on the smaller share."""
    return _log_odds_quantile(a, b, p, mp.dps)


@lru_cache(maxsize=None)
def _log_odds_quantile(a, b, p, digits):
    if p > 0.5:
        return -_log_odds_quantile(b, a, 1 - p, digits)
    with mp.workdps(digits + 15 + int(max(0, mpmath.log10(a + b)))):
        log_p = log(p)
        # A bound from the left, whence Newton's method is monotone; few digits first.
        s = (log_p + log(a) + loggamma(a) + loggamma(b) - loggamma(a + b) - log(2)) / a
        s = s - log(1 - exp(s)) if s < -log(2) else mpf(0)
        if min(a, b) > 1:
            r = sqrt(-2 * log_p)
            s = max(s, digamma(a) - digamma(b) - (r - log(r) / r) * sqrt(polygamma(1, a) + polygamma(1, b)))
        for stage, goal in ((25, 12), (mp.dps, digits)):
            with mp.workdps(stage):
                for _ in range(300):
                    log_i, scale = _share(a, b, s)
                    move = (log_p - log_i) * exp(log_i - scale)
                    s += move
                    if abs(move) * sqrt(min(a, b) + 1) < mpf(10) ** -goal * (1 + abs(s)):
                        break
                else:
                    raise ArithmeticError(f'no convergence at {a}, {b}, {p}')
        return s


def _share(a, b, s):
    log_i, _, _, _, scale = incomplete_beta(a, b, 1 / (1 + exp(-s)), 1 / (1 + exp(s)))
    return log_i, scale


# The quadrature and the series agree where both hold.
with mp.workdps(40):
    for _a, _b, _x in ((200, 150, '0.56'), (3000, 90, '0.968'), (70, 5000, '0.0139')):
        _args = mpf(_a), mpf(_b), mpf(_x)
        for _q, _s in zip(_quadrature(*_args, 1 - _args[2], 40), _series(*_args, 1 - _args[2], 40)):
            assert abs(_q - _s) < mpf(10) ** -32 * abs(_s), (_args, _q, _s)
