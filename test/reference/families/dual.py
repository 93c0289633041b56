"""Dual numbers over mpmath: a value and its exact first derivatives, by the rules of differentiation alone, so that
the derivatives share nothing with the ones under test."""
import mpmath
from mpmath import mp, mpf


class Dual:
    def __init__(self, value, slopes):
        self.value, self.slopes = value, tuple(slopes)

    def chain(self, value, slope):
        return Dual(value, [slope * s for s in self.slopes])

    def __neg__(self):
        return self.chain(-self.value, mpf(-1))

    def __add__(self, other):
        other = lifted(other, self)
        return Dual(self.value + other.value, [a + b for a, b in zip(self.slopes, other.slopes)])

    def __sub__(self, other):
        return self + -lifted(other, self)

    def __mul__(self, other):
        other = lifted(other, self)
        return Dual(self.value * other.value,
                    [a * other.value + self.value * b for a, b in zip(self.slopes, other.slopes)])

    def __truediv__(self, other):
        return self * reciprocal(lifted(other, self))

    def __rsub__(self, other):
        return lifted(other, self) - self

    def __rtruediv__(self, other):
        return lifted(other, self) / self

    __radd__, __rmul__ = __add__, __mul__


def lifted(x, like):
    return x if isinstance(x, Dual) else Dual(mpf(x), [mpf(0)] * len(like.slopes))


def variables(args):
    return [Dual(mpf(a), [mpf(int(i == k)) for i in range(len(args))]) for k, a in enumerate(args)]


def reciprocal(x):
    return x.chain(1 / x.value, -1 / x.value ** 2)


def exp(x):
    e = mpmath.exp(x.value)
    return x.chain(e, e)


def log(x):
    return x.chain(mpmath.log(x.value), 1 / x.value)


def sqrt(x):
    root = mpmath.sqrt(x.value)
    return x.chain(root, 1 / (2 * root))


def square(x):
    return x * x


def absolute(x):
    return x if x.value > 0 else -x if x.value < 0 else x.chain(mpf(0), mpf(0))


def log1p(x):
    return x.chain(mpmath.log1p(x.value), 1 / (1 + x.value))


def expm1(x):
    return x.chain(mpmath.expm1(x.value), mpmath.exp(x.value))


def softplus(x):
    return log1p(exp(x)) if x.value < 0 else x + log1p(exp(-x))


def sigmoid(x):
    return 1 / (1 + exp(-x))


def density(z):
    return mpmath.exp(-z * z / 2) / mpmath.sqrt(2 * mpmath.pi)


def phi(z):
    """The standard normal distribution function."""
    if abs(z.value) > mpf(10) ** 6:
        return z.chain(mpf(0) if z.value < 0 else mpf(1), mpf(0))
    return z.chain(mpmath.erfc(-z.value / mpmath.sqrt(2)) / 2, density(z.value))


def probit(p):
    """Its inverse, by Newton's method on the tail's logarithm from a double start."""
    q, sign = (p.value, 1) if p.value < 0.5 else (1 - p.value, -1)
    if q == 0.5:
        return p.chain(mpf(0), mpmath.sqrt(2 * mpmath.pi))
    z = -mpmath.sqrt(-2 * mpmath.log(q)) if q < 0.05 else mpf(-0.5)
    for _ in range(300):
        tail = mpmath.erfc(-z / mpmath.sqrt(2)) / 2
        move = (mpmath.log(tail) - mpmath.log(q)) * tail / density(z)
        z -= move
        if abs(move) <= mpf(10) ** (8 - mp.dps) * abs(z):
            return p.chain(sign * z, 1 / density(z))
    raise ArithmeticError(f'no convergence at {q}')


def log_gamma_constant(x):
    """log Gamma of a number that is not differentiated."""
    return mpmath.loggamma(x.value)
