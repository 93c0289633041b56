"""The von Mises law: its distribution function, quantile and the derivative of a draw."""
from functools import lru_cache

import mpmath
from mpmath import cos, exp, log, log1p, mp, mpf, pi, quad, sin, sqrt

from group_bessel import ratio, scaled
from machinery import TINY, Draws, f32, fence, step


def law(s, k):
    """(share beyond s, share beyond s over the density, -d share / dk over the density) for 0 <= s < pi."""
    return _law(s, k, mp.dps)


@lru_cache(maxsize=None)
def _law(s, k, digits):
    return _fourier(s, k, digits) if k < 100 else _quadrature(s, k, digits)


def density(s, k):
    return exp(-2 * k * sin(s / 2) ** 2) / (2 * pi * scaled(0, k))


def _fourier(s, k, digits):
    """The Fourier series of the distribution function and its derivative in k; the ratios I_n / I_0 by Miller's
    backward recurrence, DLMF 10.74(iv)."""
    with mp.workdps(digits + 40 + int(k) + 2 * int(abs(mpmath.log10(k)))):
        count = int(k) + 2
        while count * mpmath.log10(2 * count / (mpmath.e * k)) < mp.dps + 5:
            count += 5
        ratios = [mpf(0)] * (count + 2)
        ratios[count] = mpf(10) ** -(3 * mp.dps)
        for n in range(count, 0, -1):
            ratios[n - 1] = ratios[n + 1] + 2 * n / k * ratios[n]
        ratios = [r / ratios[0] for r in ratios]
        share, slope, twice, last, wave = pi - s, mpf(0), 2 * cos(s), mpf(0), sin(s)
        for n in range(1, count):
            share -= 2 * ratios[n] * wave / n
            slope += ((ratios[n - 1] + ratios[n + 1]) / 2 - ratios[n] * ratios[1]) * wave / n
            last, wave = wave, twice * wave - last
        share, slope, p = share / (2 * pi), slope / pi, density(s, k)
        return share, share / p, slope / p


def _quadrature(s, k, digits):
    """The integral beyond s, on stretches of the density's own scale; the derivative under the integral."""
    with mp.workdps(digits + 30):
        goal = mpf('2.4') * (digits + 25)
        steep, bend = k * sin(s), k * cos(s)
        root = steep ** 2 + 2 * goal * bend
        reach = min(pi - s, mpf('1.7') * 2 * goal / (steep + sqrt(root))) if root > 0 else pi - s
        mean = ratio(k)

        @lru_cache(maxsize=None)
        def weight(t):
            return exp(-2 * k * sin(s + t / 2) * sin(t / 2))

        stretches = [reach * mpf(j) / 8 for j in range(9)]
        part = quad(weight, stretches, method='gauss-legendre')
        slope = quad(lambda t: weight(t) * (cos(s + t) - mean), stretches,
                     method='gauss-legendre')
        return part * density(s, k), part, -slope


with mp.workdps(40):
    for _s, _k in (('0.3', 99), ('0.05', 99), ('2.5', 30), ('3', 60)):
        for _f, _q in zip(_fourier(mpf(_s), mpf(_k), 40), _quadrature(mpf(_s), mpf(_k), 40)):
            assert abs(_f - _q) < mpf(10) ** -34 * abs(_q), (_s, _k, _f, _q)


def angle(p, k):
    """The s with share p <= 1/2 beyond it."""
    return _angle(p, k, mp.dps)


@lru_cache(maxsize=None)
def _angle(p, k, digits):
    low, high, s = mpf(0), +pi, min(3 / sqrt(k), mpf(1))
    # Enough digits for an angle that lies as far from pi as the share is small.
    deep = int(-mpmath.log10(p))
    for stage, goal in ((25 + deep, 10), (digits + 10 + deep, digits)):
        with mp.workdps(stage):
            for _ in range(400):
                share, part, _slope = law(s, k)
                move = part * (log(share) - log(p)) if share < mpf('0.4') else (share - p) * part / share
                if stage == 25 + deep:
                    low, high = (s, high) if move > 0 else (low, s)
                    if not low < s + move < high:
                        move = (low + high) / 2 - s
                s += move
                if abs(move) < mpf(10) ** -goal * min(s, abs(pi - s)):
                    break
            else:
                raise ArithmeticError(f'no convergence at {p}, {k}')
    return s


def concentration(d):
    kind = d.random.random()
    return d.log_uniform(1e-2, 300) if kind < 0.6 else d.log_uniform(1e-6, 1e9) if kind < 0.95 else \
        d.log_uniform(1e-30, 1e20)


def point(d):
    while True:
        k = concentration(d)
        wide = min(3.14, 12 / k ** 0.5) if d.random.random() < 0.75 else 3.14
        x = d.uniform(-wide, wide) if d.random.random() < 0.85 else d.sign() * d.log_uniform(1e-30, 3)
        if d.random.random() < 0.07:
            x = d.sign() * f32(3.1415926 - d.log_uniform(1e-7, 0.1))
        if 0 < abs(x) < 3.1415925:
            return x, k


def share(d):
    while True:
        p, k = d.probability(), concentration(d)
        if 0 < p < 1 and p != 0.5 and k > 1e-20:
            return p, k


def tables():
    last = step(f32(3.1415925), 0)
    switches = [(x, k) for k in (1e-6, 0.3, 5.0, 29.999998, 30.0, 100.0, 1e4, 1e8) for x in
                (1e-40, -1e-40, 0.5, -0.5, 1.9999999, -2.0, last, -last)]
    for k in (1e-3, 2.0, 50.0, 1e6):
        with mp.workdps(30):
            turn = mpmath.acos(ratio(mpf(k)))
        switches += [(s * x, k) for x in fence(turn, steps=(0, 1, 21)) for s in (1, -1)]
    points = Draws('von Mises').many(220, point) + switches
    shares = Draws('von Mises quantile').many(220, share)
    shares += [(p, k) for k in (1e-3, 1.0, 30.0, 1e3, 1e8) for p in
               TINY[:1] + [1e-30, 1e-4, 0.15, 0.16, f32(0.49999997), f32(0.50000006), 0.84, 1 - 2.0 ** -24]]

    def lower(x, k):
        beyond = law(abs(x), k)[0]
        return beyond if x <= 0 else 1 - beyond

    def moved(x, k):
        return law(abs(x), k)[2] * (1 if x < 0 else -1)

    # The angle keeps its own digits, which a change of sign would round away.
    def side(p, k):
        return (angle(p, k), -1) if p < 0.5 else (angle(1 - p, k), 1)

    def quantile(p, k):
        s, sign = side(p, k)
        return sign * s

    def quantile_moved(p, k):
        s, sign = side(p, k)
        return -sign * law(s, k)[2]

    return {name: (formula, chosen, 50) for name, formula, chosen in [
        ('vonMisesCdf', lower, points),
        ('vonMisesCdf_x', density, points),
        ('vonMisesCdf_concentration', lambda x, k: -density(x, k) * moved(x, k), points),
        ('vonMisesLogCdf', lambda x, k: log(lower(x, k)) if x <= 0 else log1p(-law(x, k)[0]), points),
        ('vonMisesLogCdf_x', lambda x, k: density(x, k) / lower(x, k), points),
        ('vonMisesLogCdf_concentration', lambda x, k: -density(x, k) * moved(x, k) / lower(x, k), points),
        ('vonMisesDrawDerivative', moved, points),
        ('vonMisesQuantile', quantile, shares),
        ('vonMisesQuantile_p', lambda p, k: 1 / density(side(p, k)[0], k), shares),
        ('vonMisesQuantile_concentration', quantile_moved, shares),
    ]}
