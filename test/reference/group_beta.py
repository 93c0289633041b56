"""The incomplete beta function and the derivatives of a beta draw."""
from mpmath import exp

from incomplete_beta import cost, incomplete_beta
from machinery import Draws, f32, fence, step


def shapes_and_point(d):
    while True:
        kind = d.random.random()
        if kind < 0.7:
            a, b = d.log_uniform(1e-3, 1e4), d.log_uniform(1e-3, 1e4)
        elif kind < 0.8:
            a, b = d.log_uniform(1e-30, 1), d.log_uniform(1e-30, 1)
        elif kind < 0.9:
            a, b = d.log_uniform(1e-6, 1e6), d.log_uniform(1e-6, 1e6)
        else:
            a, b = d.log_uniform(2e5, 1e10), d.log_uniform(2e5, 1e10)
        mean = a / (a + b)
        sd = (mean * (1 - mean) / (a + b + 1)) ** 0.5
        x = mean + d.random.uniform(-7, 7) * sd if kind > 0.3 else d.random.random()
        if kind > 0.7 and kind < 0.75:
            x = d.log_uniform(1e-44, 1)
        x = f32(x)
        if 0 < x < 1 and cost(a, b, x) < 5000:
            return a, b, x


SWITCHES = [
    *[(a, b, f32(a / (a + b))) for a in (29.999998, 30.0, 100.0) for b in (30.0, 29.999998, 40.0, 1000.0, 1e6)],
    *[(a, b, x) for a in (0.02, 0.9999999, 1.0) for b in (0.3, 1.5, 4.0) for x in fence(min(1.1 / b, 0.7), steps=(0, 1, 8))],
    *[(a, b, x) for a in (1.0, 3.0) for b in (1.0, 2.5, 12.0) for x in fence(a / (a + b), steps=(0, 1, 8))],
    *[(a, b, step(f32(1), -1)) for a in (1e-3, 1.0, 40.0) for b in (1e-3, 1.0, 40.0)],
    *[(a, b, 1e-44) for a in (1e-3, 1.0, 1.5) for b in (1e-3, 1.0, 40.0)],
    (1e-38, 1e-38, 0.3), (1e10, 1e10, 0.5), (1e12, 1e12, f32(0.500001)), (1e8, 3.0, step(f32(1), -1)),
]


def tables():
    points = Draws('incomplete beta').many(230, shapes_and_point) + SWITCHES
    front = [(x, a, b) for a, b, x in points]

    def at(index):
        return lambda a, b, x: incomplete_beta(a, b, x)[index]

    def share(index, sign=1, over=None):
        def formula(a, b, x):
            values = incomplete_beta(a, b, x)
            return sign * values[index] / (exp(values[over]) if over is not None else 1)
        return formula

    def density(sign=1, over=None):
        def formula(a, b, x):
            values = incomplete_beta(a, b, x)
            return sign * exp(values[4] - (values[over] if over is not None else 0)) / (x * (1 - x))
        return formula

    def draw(index):
        def formula(z, a, b):
            values = incomplete_beta(a, b, z)
            return -values[index] / exp(values[4]) * z * (1 - z)
        return formula

    return {name: (formula, chosen, 50) for name, formula, chosen in [
        ('betaI', lambda a, b, x: exp(at(0)(a, b, x)), points),
        ('betaI_a', share(2), points),
        ('betaI_b', share(3), points),
        ('betaI_x', density(), points),
        ('betaIComplement', lambda a, b, x: exp(at(1)(a, b, x)), points),
        ('betaIComplement_a', share(2, -1), points),
        ('betaIComplement_b', share(3, -1), points),
        ('betaIComplement_x', density(-1), points),
        ('logBetaI', at(0), points),
        ('logBetaI_a', share(2, 1, 0), points),
        ('logBetaI_b', share(3, 1, 0), points),
        ('logBetaI_x', density(1, 0), points),
        ('logBetaIComplement', at(1), points),
        ('logBetaIComplement_a', share(2, -1, 1), points),
        ('logBetaIComplement_b', share(3, -1, 1), points),
        ('logBetaIComplement_x', density(-1, 1), points),
        ('betaDrawDerivativeA', draw(2), front),
        ('betaDrawDerivativeB', draw(3), front),
    ]}
