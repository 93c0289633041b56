"""The incomplete gamma functions and their derivative in the shape, in mpmath's arithmetic."""
from functools import lru_cache

import mpmath
from mpmath import bernoulli, digamma, erfc, exp, log, log1p, loggamma, mp, mpf, pi, sqrt


def incomplete_gamma(a, x):
    """(log P, log Q, dP/da, log D) with D = x^a e^-x / Gamma(a + 1)."""
    return _incomplete_gamma(a, x, mp.dps)


@lru_cache(maxsize=None)
def _incomplete_gamma(a, x, digits):
    if x > a + 14 * sqrt(a) + 40:
        return _fraction(a, x, digits)
    if a > 2e5 and abs(x - a) < a / 4:
        return _uniform(a, x, digits)
    return _series(a, x, digits)


def _series(a, x, digits):
    # The complement may be as small as e^-150; the derivative loses as much where P is near 1. For a tiny shape
    # Q is of its order, and so is the derivative.
    with mp.workdps(digits + 90 + int(max(0, -mpmath.log10(a)))):
        scale = a * log(x) - x - loggamma(a + 1)
        bracket = log(x) - digamma(a + 1)
        term, total, slope, n = mpf(1), mpf(1), bracket, 0
        while term > mpf(10) ** -(mp.dps + 5) * total:
            n += 1
            term = term * x / (a + n)
            bracket -= 1 / (a + n)
            total += term
            slope += term * bracket
        p = exp(scale) * total
        return scale + log(total), log1p(-p) if p < 0.5 else log(1 - p), exp(scale) * slope, scale


def _fraction(a, x, digits):
    """Legendre's fraction by the recurrence of its convergents and of their derivatives."""
    with mp.workdps(digits + 40):
        scale = a * log(x) - x - loggamma(a + 1)
        # Q = D a / (b0 + a1/(b1 + ...)): numerators u and denominators v, dashed ones differentiated in a.
        b = x + 1 - a
        u0, v0, u1, v1 = mpf(1), mpf(0), b, mpf(1)
        du0, dv0, du1, dv1 = mpf(0), mpf(0), mpf(-1), mpf(0)
        previous = None
        n = 0
        while True:
            n += 1
            b += 2
            top = n * (a - n)
            u2, v2 = b * u1 + top * u0, b * v1 + top * v0
            du2 = b * du1 - u1 + top * du0 + n * u0
            dv2 = b * dv1 - v1 + top * dv0 + n * v0
            u0, v0, u1, v1 = u1 / v2, v1 / v2, u2 / v2, mpf(1)
            du0, dv0, du1, dv1 = du1 / v2, dv1 / v2, du2 / v2, dv2 / v2
            value = (u1 / v1, du1 / v1 - u1 * dv1 / v1 ** 2)
            if previous and all(abs(s - t) <= mpf(10) ** -(digits + 20) * abs(s) for s, t in zip(value, previous)):
                break
            previous = value
        whole, slope = value
        tail = exp(scale) * a / whole
        return (log1p(-tail), scale + log(a / whole),
                -tail * (log(x) - digamma(a) - slope / whole), scale)


@lru_cache(maxsize=None)
def _temme(digits):
    """Taylor coefficients of C_k(eta), by the recurrence of DLMF 8.12.10-12."""
    with mp.workdps(digits + 30):
        size, orders = 90, 10
        alpha = [mpf(0), mpf(1)]
        for m in range(2, size):
            alpha.append((alpha[m - 1] - sum(i * alpha[i] * alpha[m + 1 - i] for i in range(2, m))) / (m + 1))
        logs = [mpf(0)] * (orders + 1)
        for k in range(1, orders):
            if 2 * k - 1 <= orders:
                logs[2 * k - 1] = bernoulli(2 * k) / (2 * k * (2 * k - 1))
        g = [mpf(1)]
        for n in range(1, orders + 1):
            g.append(sum(k * logs[k] * g[n - k] for k in range(1, n + 1)) / n)
        rows = [[(n + 2) * alpha[n + 2] - (n == 0) for n in range(size - 2)]]
        for k in range(1, orders):
            rows.append([(-1) ** k * g[k] * rows[0][n] + (n + 2) * rows[-1][n + 2] for n in range(len(rows[-1]) - 2)])
        return rows


def _uniform(a, x, digits):
    with mp.workdps(digits + 30 + int(mpmath.log10(a))):
        mu = (x - a) / a
        eta = mpmath.sign(mu) * sqrt(2 * (mu - log1p(mu)))
        ratio = mu / eta if eta else mpf(1)
        rest = slope = mpf(0)
        for k, row in enumerate(_temme(digits)):
            c = sum(v * eta ** n for n, v in enumerate(row))
            dc = sum(n * v * eta ** (n - 1) for n, v in enumerate(row) if n)
            rest += c * a ** -k
            slope -= (dc * ratio + k * c) * a ** (-k - 1)
        bell = exp(-a * eta ** 2 / 2) / sqrt(2 * pi * a)
        upper = erfc(eta * sqrt(a / 2)) / 2 + bell * rest
        lower = erfc(-eta * sqrt(a / 2)) / 2 - bell * rest
        slope = -bell * (ratio - eta / 2 + rest * (log1p(mu) - 1 / (2 * a)) + slope)
        return log(lower), log(upper), slope, a * log(x) - x - loggamma(a + 1)


def log_quantile(a, log_p, log_q):
    """log x with P = e^log_p, by Newton's method on the smaller share."""
    return _log_quantile_at(a, log_p, log_q, mp.dps)


@lru_cache(maxsize=None)
def _log_quantile_at(a, log_p, log_q, digits):
    with mp.workdps(digits + 20 + int(max(0, mpmath.log10(a)))):
        return _log_quantile(a, log_p, log_q, digits)


def _log_quantile(a, log_p, log_q, digits):
    left = (log_p + loggamma(a + 1)) / a
    if left < -2.3 * mp.dps - 10:
        return left
    lower = log_p < log_q or (a < 1 and left < -2)
    u = left
    if a >= 1:
        z = _rough_normal(log_p) if log_p < log_q else -_rough_normal(log_q)
        cube = 1 - 1 / (9 * a) + z / (3 * sqrt(a))
        if cube > 0:
            u = max(u, log(a) + 3 * log(cube))
    elif not lower:
        u = max(u, log(max(mpf(1), log(a) - loggamma(a + 1) - log_q)))
    for _ in range(200):
        x = exp(u)
        log_lower, log_upper, _, scale = incomplete_gamma(a, x)
        share = log_lower if lower else log_upper
        move = (log_p - share if lower else share - log_q) / (a * exp(scale - share))
        u = max(u + max(min(move, mpf(3)), mpf(-3)), left)
        if abs(move) * sqrt(a + 1) < mpf(10) ** -digits:
            return u
    raise ArithmeticError(f'no convergence at {a}, {log_p}')


def _rough_normal(log_p):
    r = sqrt(-2 * log_p)
    return -r + (log(r * sqrt(2 * pi)) + mpf('0.05')) / r if r > mpf('1.5') else (exp(log_p) - mpf('0.5')) * mpf('2.5')


def draw_derivative(z, a):
    """dz/da at a fixed uniform."""
    _, _, slope, scale = incomplete_gamma(a, z)
    return -slope * z / (a * exp(scale))


# The uniform expansion and the series agree where both hold, to 40 digits.
with mp.workdps(50):
    for _x in (mpf(299000), mpf(300000), mpf(301500)):
        for _u, _s in zip(_uniform(mpf(300000), _x, 50), _series(mpf(300000), _x, 50)):
            assert abs(_u - _s) < mpf(10) ** -38 * abs(_s), (_x, _u, _s)
