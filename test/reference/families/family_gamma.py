"""The gamma distribution by its textbook formulas; incomplete gamma functions by series, fraction and expansion."""
import gamma_law
from machinery import Draws, f32

PARAMETERS = {'shape': ['shape', 'logShape'], 'scale': ['scale', 'rate', 'logScale', 'logRate']}
FORMS = gamma_law.FORMS
ONE_BY_ONE = True
# Slow ones, in the first form of each parameter alone.
FIRST_FORMS = ('quantile', 'upperQuantile')
FAR = {'logShape': [0.0, -1e-7, 13.8, -13.8, 4.0943446, 2.3025851, -5.0]}
DIGITS = {'': 60}
FUNCTIONS = gamma_law.functions('gamma')
POINTS = gamma_law.POINTS


def convert(mean, dispersion):
    return {'shape': 1 / dispersion, 'scale': mean * dispersion}


def made(family, function, lead):
    """The points in shape and scale, carried to mean and dispersion."""
    make, corners = POINTS[function]
    found = Draws(f'{family} {function} mean dispersion').many(110, make) + corners[::2]
    return list(dict.fromkeys((*map(f32, row[:-2]), f32(row[-2] * row[-1]), f32(1 / row[-2])) for row in found
                              if 1e-44 < row[-2] * row[-1] < 3e38))


JOINTS = [('gammaMeanDispersion', 'mean dispersion', convert, made)]
