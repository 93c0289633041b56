"""Owen's function and the distribution function of the skew normal law."""
from functools import lru_cache

from mpmath import atan, cos, erf, erfc, exp, log, log1p, mp, mpf, pi, quad, sqrt

from machinery import Draws, f32, fence


def thin(z, a):
    """The share of the density 2 phi(t) Phi(-a t) beyond z, for z, a >= 0."""
    return _thin(z, a, mp.dps)


@lru_cache(maxsize=None)
def _thin(z, a, digits):
    with mp.workdps(digits + 20):
        goal = mpf('2.4') * (digits + 15)
        c = sqrt(1 + a * a)
        y = c * z
        reach = 2 * goal / (y + sqrt(y * y + 2 * goal)) / c
        front = exp(-y * y / 2)
        # The exponent common to both factors is taken out, so that far tails lose nothing.
        def weight(u):
            t = z + u
            return exp((y * y - t * t) / 2) * erfc(a * t / sqrt(2))
        return front * quad(weight, [reach * mpf(j) / 8 for j in range(9)],
                            method='gauss-legendre') / sqrt(2 * pi)


def owen(h, a):
    """In the angle, on stretches of its scale; beyond a = 1 by the complementary angle (Owen 1956, equation 2.3)."""
    h, sign, a = abs(h), -1 if a < 0 else 1, abs(a)
    if a <= 1:
        return sign * _owen(h, a, mp.dps)
    first, second = erfc(h / sqrt(2)) / 2, erfc(a * h / sqrt(2)) / 2
    return sign * ((first + second) / 2 - first * second - _owen(a * h, 1 / a, mp.dps))


@lru_cache(maxsize=None)
def _owen(h, a, digits):
    with mp.workdps(digits + 20):
        end = atan(a)
        if h > 1:
            end = min(end, sqrt(5 * mpf(digits + 15)) / h)
        def weight(t):
            return exp(h * h / 2 - h * h / (2 * cos(t) ** 2))
        return exp(-h * h / 2) * quad(weight, [end * mpf(j) / 8 for j in range(9)],
                                               method='gauss-legendre') / (2 * pi)


def lower(z, a):
    if a < 0:
        return erfc(-z / sqrt(2)) - thin(-z, -a) if z < 0 else 1 - thin(z, -a)
    return thin(-z, a) if z < 0 else erf(z / sqrt(2)) + thin(z, a)


def log_lower(z, a):
    value = lower(z, a)
    return log1p(-lower(-z, -a)) if value > 0.5 else log(value)


with mp.workdps(40):
    for _z, _a in ((-1, 2), (mpf('-0.3'), mpf('0.5')), (2, 3), (mpf('1.5'), -2), (-2, mpf('-0.1'))):
        _z, _a = mpf(_z), mpf(_a)
        assert abs(lower(_z, _a) - (erfc(-_z / sqrt(2)) / 2 - 2 * owen(_z, _a))) < mpf(10) ** -35, (_z, _a)


def point(d):
    z = d.uniform(-9, 9) if d.random.random() < 0.6 else d.sign() * d.log_uniform(1e-8, 40)
    a = d.uniform(-6, 6) if d.random.random() < 0.5 else d.sign() * d.log_uniform(1e-6, 1e4)
    if d.random.random() < 0.3 and z * a < 0:
        z = f32(z / (1 + a * a) ** 0.5)
    return z, a


def tables():
    grid = [(s * z, t * a) for z in (1e-20, 0.3, 2.0, 8.0) for a in (1e-20, 0.2, 1.0, 7.0, 1e8) for s in (1, -1)
            for t in (1, -1)]
    points = Draws('skew normal').many(220, point) + grid
    pairs = Draws('owen').many(220, point) + grid + [(h, s * a) for h in (0.1, 1.5) for a in fence(1) for s in (1, -1)]

    def density(z, a):
        return exp(-z * z / 2) * erfc(-a * z / sqrt(2)) / sqrt(2 * pi)

    def in_shape(z, a):
        return -exp(-(1 + a * a) * z * z / 2) / (pi * (1 + a * a))

    return {name: (formula, chosen, 50) for name, formula, chosen in [
        ('skewNormalCdfStandard', lower, points),
        ('skewNormalCdfStandard_z', density, points),
        ('skewNormalCdfStandard_shape', in_shape, points),
        ('skewNormalSurvivalStandard', lambda z, a: lower(-z, -a), points),
        ('skewNormalSurvivalStandard_z', lambda z, a: -density(z, a), points),
        ('skewNormalSurvivalStandard_shape', lambda z, a: -in_shape(z, a), points),
        ('skewNormalLogCdfStandard', log_lower, points),
        ('skewNormalLogCdfStandard_z', lambda z, a: density(z, a) / lower(z, a), points),
        ('skewNormalLogCdfStandard_shape', lambda z, a: in_shape(z, a) / lower(z, a), points),
        ('skewNormalLogSurvivalStandard', lambda z, a: log_lower(-z, -a), points),
        ('skewNormalLogSurvivalStandard_z', lambda z, a: -density(z, a) / lower(-z, -a), points),
        ('skewNormalLogSurvivalStandard_shape', lambda z, a: -in_shape(z, a) / lower(-z, -a), points),
        ('owenT', owen, pairs),
        ('owenT_h', lambda h, a: -exp(-h * h / 2) * erf(a * h / sqrt(2)) / sqrt(2 * pi) / 2, pairs),
        ('owenT_a', lambda h, a: exp(-(1 + a * a) * h * h / 2) / (2 * pi * (1 + a * a)), pairs),
    ]}
