"""The inverse gamma distribution by its textbook formulas: scale / x has a gamma distribution."""
import mpmath
from mpmath import mpf

import gamma_law as g
from dual import Dual, log, square
from machinery import f32, fence
from points import LARGEST, SMALLEST, share, spread
from scalar import constant, log_2pi

PARAMETERS = {'shape': ['shape', 'logShape'], 'scale': ['scale', 'logScale']}
FORMS = {'logShape': g.FORMS['logShape']}
ONE_BY_ONE = True
# Slow ones, in the first form of each parameter alone.
FIRST_FORMS = ('quantile', 'upperQuantile')
FAR = {'logShape': [13.8, 4.0943446, 2.3025851, 1.5, 1.1, 0.75, 1.0, 2.0]}
DIGITS = {'': 60}


def log_density(x, shape, scale):
    ratio = scale / (x * shape)
    r = scale.value / (x.value * shape.value)
    if not 1e-3 < r < 1e3:
        return [shape * log(scale / x), -scale / x, -g.log_gamma(shape), -log(x)]
    distance = ratio.chain(r - 1 - mpmath.log(r), (r - 1) / r)
    return [-shape * distance, -g.stirling(shape), log(shape) / 2, -log(x), constant(-log_2pi() / 2, x)]


def point(p, log_p, log_q, shape, scale, sign):
    one = constant(mpf(1), shape)
    return [scale / g.point(p, log_p, log_q, shape, one, sign)[0]]


def quantile(p, shape, scale):
    return point(p, mpmath.log1p(-p.value), mpmath.log(p.value), shape, scale, -1)


def upper_quantile(p, shape, scale):
    return point(p, mpmath.log(p.value), mpmath.log1p(-p.value), shape, scale, 1)


def log_slope(log_z, shape):
    z = mpmath.exp(log_z)
    return g.incomplete.draw_derivative(z, shape.value) / z


def draw(x, shape, scale):
    slope = log_slope(mpmath.log(scale.value / x.value), shape)
    return [Dual(x.value, [a + x.value * (c / scale.value - slope * b)
                           for a, b, c in zip(x.slopes, shape.slopes, scale.slopes)])]


def log_draw(x, shape, scale):
    slope = log_slope(mpmath.log(scale.value) - x.value, shape)
    return [Dual(x.value, [a + c / scale.value - slope * b
                           for a, b, c in zip(x.slopes, shape.slopes, scale.slopes)])]


def variance(shape, scale):
    return [square(scale / (shape - 1)) / (shape - 2)]


def entropy(shape, scale):
    psi = g.digamma(shape) - log(shape)
    return [-log(shape) * 1.5, constant(log_2pi() / 2, shape), g.stirling(shape), -(1 + shape) * psi, log(scale)]


def inverse(point):
    """A gamma's point z s, with its scale turned into this one's: x = t / z."""
    x, a, s = point
    t = 1 / s
    return max(SMALLEST, f32(t / (x / s))), a, f32(t)


def placed(d):
    return inverse(g.placed(d))


def log_placed(d):
    x, a, s = g.log_placed(d)
    return -x, a, s


CORNERS = [inverse((x, a, min(max(s, 1e-35), 1e35))) for x, a, s in g.CORNERS]
# The mode and the zeros of the derivatives, to a few units, where they are not the reciprocals of exact numbers.
CORNERS += [(x, a, 1.0) for a in (1e-3, 0.3, 2.5, 12.0, 1e3, 1e6) for c in (1 / a, 1 / (a + 1)) for x in fence(c, steps=(0, 1, 8))]


def with_mean(least):
    def make(d):
        a, s = g.pair(d)
        return max(a, f32(least + d.log_uniform(1e-4, 3))), s
    return make, [(a, s) for a in fence(least + 1, 30, 1e6, steps=(0, 1, 64)) + [f32(least + 2.0 ** -20), 2.5, 1e4, 9.0]
                  for s in (SMALLEST, 1e-20, 1.0, 3.7, 1e20)]


AT_X = (placed, CORNERS)
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival', 'draw')},
    'drawLog': (log_placed, [(-x, a, s) for x, a, s in g.POINTS['drawLog'][1]]),
    **{name: g.POINTS[name] for name in ('quantile', 'upperQuantile', 'mode', 'entropy', 'kl')},
    'mean': with_mean(1), 'variance': with_mean(2),
}
OF = {
    'logDensity': log_density, 'draw': draw, 'drawLog': log_draw, 'quantile': quantile, 'upperQuantile': upper_quantile,
    'cdf': lambda x, a, s: g.survival(s, a, x), 'survival': lambda x, a, s: g.cdf(s, a, x),
    'logCdf': lambda x, a, s: g.log_survival(s, a, x), 'logSurvival': lambda x, a, s: g.log_cdf(s, a, x),
    'mean': lambda a, s: [s / (a - 1)], 'variance': variance, 'mode': lambda a, s: [s / (a + 1)], 'entropy': entropy,
    'kl': lambda a, s, b, t: g.kl(a, t, b, s),
}
FUNCTIONS = {name: (kernel.replace('gammaKl', 'inverseGammaKl'), OF[name], natural, partials)
             for name, (kernel, _, natural, partials) in g.functions('inverseGamma').items()}
