"""Functions of one argument."""
from mpmath import (cos, digamma, erf, erfc, exp, expm1, inf, isinf, log, log1p, loggamma, mp, mpf, pi, polygamma,
                    sqrt)

from machinery import HUGE, TINY, Draws, fence


def log_phi(x):
    return log1p(-erfc(x / sqrt(2)) / 2) if x > 0 else log(erfc(-x / sqrt(2)) / 2)


def phi(x):
    return exp(-x * x / 2) / sqrt(2 * pi)


def mills(x):
    """phi / Phi."""
    return phi(x) / (erfc(-x / sqrt(2)) / 2)


def quantile_from_log(l):
    """Newton's method on log Phi, in the tail where it is safe; the upper tail by symmetry."""
    if l > -log(2):
        # Solve in the upper tail: the logarithm of the complement.
        return -quantile_from_log(log(-expm1(l)))
    x = -sqrt(-2 * l) if l < -3 else mpf(-1) if l < -1 else mpf(0)
    for _ in range(200):
        move = (log_phi(x) - l) / mills(x)
        x -= move
        if abs(move) <= mpf(10) ** (12 - mp.dps) * (1 + abs(x)):
            return x
    raise ArithmeticError(f'no convergence at {l}')


def log_gamma(x):
    return loggamma(x).real


def erfcx(x):
    return exp(x * x) * erfc(x)


def tables():
    def points(name, count, make, *adversarial):
        return Draws(name).many(count, make) + [p for group in adversarial for p in group]

    both = TINY + [-t for t in TINY] + [0.0]
    tables = {}

    def add(name, formula, make, *adversarial, count=220, digits=160):
        tables[name] = (formula, points(name, count, make, *adversarial), digits)

    def moderate(d):
        return d.real() if d.random.random() < 0.5 else d.uniform(-120, 90)

    far = [-3.4028234663852886e38, -1e20, -1e5, 1e5, 1e20, 3.4028234663852886e38]
    bends = fence(0.5, -0.5, 1, -1, 16.6, -16.6, -103.9, -87.3, 88.7)
    add('softplus', lambda x: log1p(exp(x)), moderate, both, far, bends)
    add('softplus_x', lambda x: 1 / (1 + exp(-x)), moderate, both, far, bends)
    add('sigmoid', lambda x: 1 / (1 + exp(-x)), moderate, both, far, bends)
    add('sigmoid_x', lambda x: exp(-abs(x)) / (1 + exp(-abs(x))) ** 2, moderate, both, far, bends)
    add('logSigmoid', lambda x: -log1p(exp(-x)), moderate, both, far, bends)
    add('logSigmoid_x', lambda x: 1 / (1 + exp(x)), moderate, both, far, bends)
    zero = fence(log(2), 0.5, 0.9, 16.6, 88.7)
    add('softplusInverse', lambda x: log(expm1(x)), lambda d: d.positive(), TINY, HUGE, zero)
    add('softplusInverse_x', lambda x: -1 / expm1(-x), lambda d: d.positive(), TINY, HUGE, zero)
    minus = [-t for t in TINY + HUGE]
    ends = fence(-log(2), -1, -16.6, -36.7, -87.3, -103.9)
    add('log1mexp', lambda x: log1p(-exp(x)) if x < -1 else log(-expm1(x)), lambda d: -d.positive(), minus, ends)
    add('log1mexp_x', lambda x: -1 / expm1(-x), lambda d: -d.positive(), minus, ends)
    add('log1pmx', lambda x: log1p(x) - x, lambda d: d.positive() if d.random.random() < 0.5 else d.uniform(-1, 1),
        TINY, HUGE, fence(-0.37, 0.6, 1, -0.999), digits=250)
    add('log1pmx_x', lambda x: -x / (1 + x), lambda d: d.positive() if d.random.random() < 0.5 else d.uniform(-1, 1),
        TINY, HUGE, fence(-0.37, 0.6, 1, -0.999))

    add('exponentialRemainder', lambda x: expm1(x) - x, moderate, both, bends, digits=250)

    # A tenth of the points at negative arguments, where only the absolute error is small near the zeros.
    def gamma_domain(d):
        return d.uniform(-12, 0) if d.random.random() < 0.1 else d.positive()

    roots = fence(0.5, 1, 1.5, 2, 2.5, 3, 10)
    add('logGamma', log_gamma, gamma_domain, TINY, HUGE, roots)
    add('logGamma_x', digamma, gamma_domain, TINY, HUGE, roots)
    add('logGamma1p', lambda x: log_gamma(1 + x), lambda d: d.positive(), TINY, fence(0.5, -0.5, 1, 1.5, 9))
    add('logGamma1p_x', lambda x: digamma(1 + x), lambda d: d.positive(), TINY, fence(0.5, -0.5, 1, 1.5, 9))
    poles = fence(0.5, 1, 1.5, 2.5, 6, 1.44, 1.48, 1.4616321449683622)
    add('digamma', digamma, gamma_domain, TINY, HUGE, poles)
    add('digamma_x', lambda x: polygamma(1, x), gamma_domain, TINY, HUGE, poles)
    add('digammaMinusLog', lambda x: digamma(x) - log(x), lambda d: d.positive(), TINY, HUGE, poles)
    add('digammaMinusLog_x', lambda x: polygamma(1, x) - 1 / x, lambda d: d.positive(), TINY, HUGE, poles,
        fence(7, 8))
    steps = fence(0.5, 1, 2, 7, 8, 9, 10)
    add('trigamma', lambda x: polygamma(1, x), gamma_domain, TINY, HUGE, steps)
    add('trigamma_x', lambda x: polygamma(2, x), gamma_domain, TINY, HUGE, steps)
    add('tetragamma', lambda x: polygamma(2, x), gamma_domain, TINY, HUGE, steps)
    orders = fence(0.5, 1, 1.5, 5, 6, 15)
    add('stirlingError', lambda n: log_gamma(n + 1) - (n + mpf(1) / 2) * log(n) + n - log(2 * pi) / 2,
        lambda d: d.positive(), TINY, HUGE, orders)
    add('stirlingError_n', lambda n: digamma(n) + 1 / (2 * n) - log(n), lambda d: d.positive(), TINY, HUGE, orders,
        digits=250)

    def bell(d):
        return d.real() if d.random.random() < 0.3 else d.uniform(-12, 12)

    errors = fence(0.5, -0.5, 1, -1, 6, 9.19, 10.05, -9.3)
    edge = both + [1e8, 2e8, 1e20, 3.4028234663852886e38, -27.0, -28.0, -1e10]
    add('erf', erf, bell, edge, errors)
    add('erf_x', lambda x: 2 / sqrt(pi) * exp(-x * x), bell, edge, errors)
    add('erfc', erfc, bell, edge, errors)
    add('erfc_x', lambda x: -2 / sqrt(pi) * exp(-x * x), bell, edge, errors)
    add('erfcx', erfcx, bell, edge, errors)
    add('erfcx_x', lambda x: 2 * x * erfcx(x) - 2 / sqrt(pi), bell, edge, errors, digits=250)
    sides = fence(-0.7, 1.4, -1, 5, 0.67448, -5.6, 5.6, -13, -14.1)
    add('normalCdf', lambda x: erfc(-x / sqrt(2)) / 2, bell, edge, sides)
    add('normalCdf_x', phi, bell, edge, sides)
    add('normalDensity', phi, bell, edge, sides)
    add('logNormalCdf', log_phi, bell, edge, sides)
    add('logNormalCdf_x', mills, bell, edge, sides)
    add('logNormalCdfDerivative', mills, bell, edge, sides)
    add('logNormalCdfDerivative_x', lambda x: -mills(x) * (x + mills(x)), bell, edge, sides, fence(-4), digits=250)

    shares = fence(0.075, 0.1353, 0.2, 0.8, 0.8647, 0.925) + fence(0.5) + [1 - 2.0 ** -24, 1.401298464324817e-45]

    def quantile(p):
        return quantile_from_log(log(p))

    add('normalQuantile', quantile, lambda d: d.probability(), TINY, shares, digits=100)
    add('normalQuantile_x', lambda p: 1 / phi(quantile(p)), lambda d: d.probability(), TINY, shares, digits=100)
    logs = fence(-log(2), -1.6, -0.223, -2, -0.14541) + [-t for t in TINY + HUGE] + [-1e5, -1e10]
    add('normalQuantileFromLog', quantile_from_log, lambda d: -d.positive(), logs, digits=100)
    add('normalQuantileFromLog_x', lambda l: 1 / mills(quantile_from_log(l)), lambda d: -d.positive(), logs,
        digits=100)
    return tables
