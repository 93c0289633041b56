"""The incomplete gamma functions and the derivative of a gamma draw."""
from mpmath import exp, log, mp

from incomplete_gamma import draw_derivative, incomplete_gamma
from machinery import TINY, Draws, f32, fence


def shape_and_point(d):
    kind = d.random.random()
    a = d.log_uniform(1e-3, 1e4) if kind < 0.75 else d.log_uniform(1e-44, 1e-3) if kind < 0.85 else \
        d.log_uniform(1e4, 1e38)
    if kind > 0.97:
        return a, d.positive()
    if d.random.random() < 0.3:
        return a, d.log_uniform(1e-6, 1e3) if a < 1e4 else d.uniform(0.76, 1.24) * a
    x = a + d.random.uniform(-7, 8) * (a ** 0.5 if a > 1 else 1)
    return (a, f32(x)) if x > 0 else (a, f32(a * d.random.random()))


SWITCHES = [
    *[(a, f32(a * r)) for a in (60.0, 59.999996, 200.0) for r in (0.7, 0.6999, 1.3, 1.3001, 1.0)],
    *[(a, x) for a in (0.02, 0.5, 0.9999999, 1.0) for x in fence(1.1, steps=(0, 1, 8))],
    *[(a, x) for a in (0.3, 1.5, 5.0, 12.0, 57.0) for x in fence(a + 1, steps=(0, 1, 8))],
    *[(f32(x), x) for x in (1e-6, 0.3, 3.0, 30.0, 61.0, 1e3, 1e6, 1e12, 1e30)],
    *[(a, x) for a in (1e-3, 0.5, 2.0) for x in TINY],
    (1e-38, 1e-38), (1e-45, 50.0), (40.0, 2.0), (3e38, 3e38), (1e10, 0.5e10), (1e10, 2e10), (2.0, 3e38),
]


def tables():
    points = Draws('incomplete gamma').many(230, shape_and_point) + SWITCHES

    def table(formula, swap=False):
        return formula, [(x, a) for a, x in points] if swap else points, 50

    def at(index):
        return lambda a, x: incomplete_gamma(a, x)[index]

    def density(a, x):
        return exp(incomplete_gamma(a, x)[3]) * a / x

    def slope(a, x):
        return incomplete_gamma(a, x)[2]

    tables = {
        'gammaP': table(lambda a, x: exp(at(0)(a, x))),
        'gammaP_a': table(slope),
        'gammaP_x': table(density),
        'gammaQ': table(lambda a, x: exp(at(1)(a, x))),
        'gammaQ_a': table(lambda a, x: -slope(a, x)),
        'gammaQ_x': table(lambda a, x: -density(a, x)),
        'logGammaP': table(at(0)),
        'logGammaP_a': table(lambda a, x: slope(a, x) / exp(at(0)(a, x))),
        'logGammaP_x': table(lambda a, x: density(a, x) / exp(at(0)(a, x))),
        'logGammaQ': table(at(1)),
        'logGammaQ_a': table(lambda a, x: -slope(a, x) / exp(at(1)(a, x))),
        'logGammaQ_x': table(lambda a, x: -density(a, x) / exp(at(1)(a, x))),
        'gammaDrawDerivative': table(draw_derivative, swap=True),
    }
    logs = [(f32(log(x)), a) for a, x in points]
    logs += [(-d.log_uniform(40, 1e30), d.log_uniform(1e-30, 1)) for d in [Draws('log gamma draws')] for _ in range(60)]
    logs += [(l, a) for a in (1e-3, 0.5, 3.0) for l in fence(-40, steps=(0, 1, 8))]

    def log_draw_derivative(l, a):
        # The extra digits keep e^l as good as the rest where l is large.
        with mp.workdps(mp.dps + 20):
            z = exp(l)
            return draw_derivative(z, a) / z

    tables['gammaLogDrawDerivative'] = (log_draw_derivative, logs, 50)
    return tables
