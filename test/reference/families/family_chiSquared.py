"""The chi-squared distribution: a gamma distribution of half the degrees of freedom and scale 2."""
import gamma_law as g
from machinery import f32
from points import SMALLEST
from scalar import constant

# Formulas read half the degrees of freedom, the shape.
PARAMETERS = {'degreesOfFreedom': ['degreesOfFreedom']}
FORMS = {'degreesOfFreedom': ('half', lambda v: v / 2, lambda n: 2 * n)}
DIGITS = {'': 60}


def at_scale(formula):
    """The gamma's formula with scale 2, which is its last argument."""
    return lambda *args: formula(*args, constant(2, args[0]))


def twice(point):
    """A gamma's point of any scale, at scale 2: the variate goes with it."""
    x, a, s = point
    return max(SMALLEST, f32(2 * (x / s))), a


def halved(rows):
    make, corners = rows
    return (lambda d: make(d)[:-1]), list(dict.fromkeys(row[:-1] for row in corners))


def kl(a, b):
    return g.kl(a, constant(2, a), b, constant(2, a))


def placed(d):
    return twice(g.placed(d))


def log_placed(d):
    return g.log_placed(d)[:2]


def two(d):
    row = g.two(d)
    return row[0], row[2]


MORE = [(f32(a * (1 + e)),) for a in g.SHAPES for e in (0.0, 1e-6, 0.1, -0.2, 0.37)]
AT_X = (placed, [twice(row) for row in g.CORNERS])
POINTS = {
    **{name: AT_X for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival', 'draw')},
    'drawLog': (log_placed, [row[:2] for row in g.POINTS['drawLog'][1]]),
    'quantile': halved(g.POINTS['quantile']), 'upperQuantile': halved(g.POINTS['upperQuantile']),
    **{name: (lambda d: (g.shape(d),), MORE) for name in ('mean', 'variance', 'mode', 'entropy')},
    'kl': (two, [(a, f32(a * (1 + e))) for a in g.SHAPES for e in (0.0, 2.0 ** -22, -1e-5, 0.3, -0.49, -0.51, 9.0)]),
}
FREE = {'shape': 'degreesOfFreedom', 'otherShape': 'otherDegreesOfFreedom'}


def names(text):
    return ' '.join(FREE.get(n, n) for n in text.split() if n not in ('scale', 'otherScale'))


FUNCTIONS = {name: (kernel, kl if name == 'kl' else at_scale(formula), names(natural), names(partials))
             for name, (kernel, formula, natural, partials) in g.functions('gamma').items()}
