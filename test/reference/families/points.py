"""Arguments for the families' reference values: random ones in the natural parameters, and adversarial ones."""
import itertools
import os
import sys

import mpmath
from mpmath import mpf

sys.path.insert(0, os.path.join(os.path.dirname(os.path.abspath(__file__)), '..'))

from machinery import Draws, f32, fence, step
from scalar import form

LARGEST = 3.4028234663852886e38
SMALLEST = 1.401298464324817e-45

SPREADS = [SMALLEST, 1.1754943508222875e-38, 1e-20, 1e-3, 1.0, step(1.0, 1), step(1.0, -1), 3.7, 1e3, 1e20, LARGEST]
CENTERS = [0.0, -0.0, 1.0, -2.5, SMALLEST, -1e-20, 1e6, -1e20, LARGEST, -LARGEST]
SHARES = [SMALLEST, 1e-38, 1e-10, 0.02, 0.25, step(0.5, -1), 0.5, step(0.5, 1), 0.75, 0.98, 1 - 2.0 ** -20, 1 - 2.0 ** -24]
# Standardized distances at which formulas switch or underflow.
STEPS = [0.0, 1e-30, 1e-7, 0.5, -0.5, 0.7, 1.0, -1.0, 1.4, 1.5434046, -1.5434046, 5.0, -5.0, -13.5, 14.0, 37.0, -38.0, 87.0, -88.0,
         103.5, -104.0, 150.0, 1e3, -1e3, 1e10, -1e25]
# Logarithms of scales far beyond float32, up to where the double itself ends.
FAR_LOGS = [0.0, 1e-30, -1e-7, 50.0, -50.0, 100.0, -100.0, 350.0, -350.0, 650.0, -650.0, 699.0, -699.0]

# Other such logarithms, by family and name.
FAR = {}


def raw(family, name, natural):
    """The float32 in this form that stands nearest to a natural value, kept inside the form's domain."""
    with mpmath.workdps(60):
        _, _, inverse = form(family, name)
        if form(family, name)[0] is None:
            return f32(natural)
        value = inverse(mpf(natural))
        if name.startswith('log'):
            limit = 1399 if name == 'logVariance' else 699
            return f32(max(-limit, min(limit, value)))
        if name == 'probability':
            return max(SMALLEST, min(1 - 2.0 ** -24, f32(value)))
        return max(SMALLEST, f32(value))


def spread(d):
    kind = d.random.random()
    return d.log_uniform(1e-2, 1e2) if kind < 0.6 else d.positive()


def center(d):
    return d.uniform(-5, 5) if d.random.random() < 0.5 else d.real()


def standard(d):
    kind = d.random.random()
    if kind < 0.5:
        return d.uniform(-6, 6)
    if kind < 0.8:
        return d.sign() * d.log_uniform(1e-7, 50)
    return d.sign() * d.log_uniform(1e-30, 1e30)


def located(d):
    """x, location, scale with x a few scales away."""
    l, s = center(d), spread(d)
    return f32(l + s * standard(d)), l, s


def located_corners():
    return ([(f32(l + s * z), l, s) for l, s in ((0.0, 1.0), (0.0, 3.7), (-2.5, 1e-3), (0.0, 1e-45), (0.0, 1e30)) for z in STEPS]
            + [(x, l, s) for x, l, s in itertools.product((0.0, 1.0, -LARGEST), (0.0, LARGEST), (SMALLEST, 1.0, LARGEST))])


def positive_located(d):
    """The same for a quantity whose logarithm has location and scale."""
    l = d.uniform(-60, 60) if d.random.random() < 0.5 else center(d)
    s = spread(d)
    x = d.positive() if d.random.random() < 0.3 else mpmath.exp(max(-103, min(88, l + s * standard(d))))
    return max(SMALLEST, f32(x)), l, s


def positive_corners():
    xs = [SMALLEST, 1e-20, step(1.0, -1), 1.0, step(1.0, 1), 2.0, 1e20, LARGEST]
    return list(itertools.product(xs, (0.0, 1.0, -2.5, 50.0), (1e-3, 1.0, 20.0)))


def share(d):
    return d.probability()


def interval(d):
    """Two bounds, some of them close together or very unlike in size."""
    kind = d.random.random()
    a = center(d)
    if kind < 0.3:
        return a, step(a, d.random.randint(1, 50))
    if kind < 0.5:
        return -d.positive(), d.positive()
    b = center(d)
    return (min(a, b), max(a, b)) if a != b else (a, step(a, 1))


INTERVALS = [(-LARGEST, LARGEST), (0.0, SMALLEST), (-SMALLEST, SMALLEST), (1e-20, 1.0), (-1e-20, 1.0), (SMALLEST, 1.0), (0.0, 1.0),
             (0.0, step(1.0, 1)), (0.0, step(1.0, -1)), (1.0, step(1.0, 1)), (1e30, step(f32(1e30), 1)), (-3.0, 1e38), (0.0, LARGEST)]
# Widths next to one, whose logarithm vanishes, at places where upper − lower is and is not exact.
INTERVALS += [(f32(a), step(f32(1 + a), n)) for a in (0.0, 1e-9, -1e-9, 1e-12, -1e-30, 1e-40, 0.3, -0.7, 5.0) for n in (0, 1, -1, 8, -64)]


def within(d, a, b):
    kind = d.random.random()
    if kind < 0.15:
        return step(a, d.random.randint(0, 3)) if step(a, 3) <= b else a
    if kind < 0.3:
        return step(b, -d.random.randint(0, 3)) if step(b, -3) >= a else b
    return min(b, max(a, f32(a + (b - a) * d.random.random())))


def near(d, n, scale):
    """A second value beside n: equal, close or far."""
    kind = d.random.random()
    if kind < 0.45:
        return f32(n + scale * d.sign() * d.log_uniform(1e-7, 1))
    if kind < 0.5:
        return n
    return None


def scale_pair(d):
    s = spread(d)
    t = near(d, s, s)
    return s, max(SMALLEST, t) if t is not None else spread(d)


def located_pair(d):
    l, (s, t) = center(d), scale_pair(d)
    m = near(d, l, s)
    return l, s, (m if m is not None else center(d)), t


PAIRS = ([(0.0, s, 0.0, t) for s, t in itertools.product(SPREADS[::2], SPREADS[::2])]
         + [(l, 1.0, m, 1.0) for l, m in itertools.product((0.0, 1.0, -1e20, LARGEST), (0.0, step(1.0, 1), 1e-20, -LARGEST))]
         + [(f32(0.3), f32(s), f32(0.3 + d), f32(s * (1 + e))) for s in (0.01, 1.0, 50.0) for d in (0.0, 1e-6, 3e-4)
            for e in (0.0, 1e-6, -1e-6, 1e-3, 0.5)])


def interval_pair(d):
    c, e = interval(d)
    kind = d.random.random()
    if kind < 0.4:
        a, b = step(c, d.random.randint(0, 20)), step(e, -d.random.randint(0, 20))
    else:
        a, b = sorted((within(d, c, e), within(d, c, e)))
    return (a, b, c, e) if a < b else (c, e, c, e)


def logit(d):
    kind = d.random.random()
    return d.uniform(-10, 10) if kind < 0.5 else d.uniform(-110, 110) if kind < 0.75 else d.real()


LOGITS = [0.0, SMALLEST, -SMALLEST, 1e-20, -1e-7, 0.5, -0.5, 16.6, -17.4, 36.8, -37.0, 88.7, -88.8, 103.9, -104.1, 745.0, -746.0,
          1e5, -1e20, LARGEST, -LARGEST, step(1.0, 1), step(1.0, -1)]


def logit_pair(d):
    a = logit(d)
    b = near(d, a, max(1e-3, min(abs(a), 10.0)))
    return a, b if b is not None else logit(d)


NEAR_HALF = SHARES + fence(0.5, 0.25, 0.75, 0.1, 1e-3, steps=(0, 1, 2, 3, 8, 21, 64, 1000))


LOGIT_PAIRS = (list(itertools.product(LOGITS[::3], LOGITS[::4]))
               + [(f32(a), f32(a + e)) for a in (-90.0, -20.0, -1.0, 0.0, 0.7, 15.0, 80.0) for e in (0.0, 1e-6, -1e-5, 1e-3, 0.999, 1.001)])


def counted(d):
    """x and rate: near each other, far apart, small and huge counts."""
    kind = d.random.random()
    rate = d.log_uniform(1e-2, 1e4) if kind < 0.6 else d.log_uniform(1e-30, 1e15)
    x = rate + d.random.gauss(0, 3) * rate ** 0.5 if d.random.random() < 0.6 else d.log_uniform(0.5, 1e8)
    return f32(max(0.0, float(int(x)))), rate


COUNTS = list(itertools.product((0.0, 1.0, 2.0, 10.0, 15.0, 16.0, 1e3, 16777216.0, 1e12, LARGEST), (SMALLEST, 1e-20, 0.5, 1.0, 1e3, 1e12, LARGEST)))
COUNTS += [(x, step(f32(x), n)) for x in (1.0, 7.0, 1e3, 16777216.0, 1e12) for n in (-8, -1, 0, 1, 8)]


def rate_point(d):
    """x and rate of an exponential."""
    rate = spread(d)
    kind = d.random.random()
    x = abs(standard(d)) / rate if kind < 0.6 else d.positive()
    return f32(x), rate


RATES = [(f32(x / r), r) for r in (1.0, 3.7, 1e-20, 1e20) for x in (0.0, 1e-30, 1e-7, 0.3, 1.0, 17.0, 88.0, 104.0, 1e5)]
RATES += [(x, r) for x, r in itertools.product((0.0, SMALLEST, LARGEST), (SMALLEST, step(1.0, 1), LARGEST))]
# log rate = rate · x.
RATES += [(f32(mpmath.log(r) / r), f32(r)) for r in (1.5, 2.0, 2.7182817, 3.0, 7.0, 50.0, 1e3)]


def with_shares(corners):
    return [(p, *c) for p in SHARES for c in corners]


LOCATED = [(0.0, 1.0), (1.0, step(1.0, 1)), (-2.5, 1e-3), (1e6, 1e3), (0.0, SMALLEST), (-LARGEST, LARGEST)]
# Locations at which location + scale · quantile(p) nearly vanishes.
MODERATE = [(0.0, 1.0), (1.0, 0.5), (-2.5, 3.0), (50.0, 0.1), (-80.0, 2.0), (0.0, 20.0)]
ONE_SPREAD = [(s,) for s in SPREADS] + [(s,) for s in fence(1, 2, 0.2419707, 0.18393972, 0.13533528, steps=(0, 1, 2, 3, 8, 21, 64))]
ONE_CENTER = [(c,) for c in CENTERS] + [(c,) for c in fence(1, -1, 1e30, 16777216, steps=(0, 1, 2, 3, 8, 21, 64))]


def scale_draw(d):
    return (spread(d),)


def center_draw(d):
    return (center(d),)


def moderate_located(d):
    return d.uniform(-40, 40), d.log_uniform(1e-3, 6)


MODERATES = [(l, s) for l in (0.0, 1.0, -2.5, 60.0, -60.0, 1e-20, 80.0) for s in (1e-20, 1e-3, 0.5, 1.0, step(1.0, 1), 2.0, 6.0, 9.0, 13.0, 1e3)]

def few_counted(d):
    """Counts that can be summed one by one."""
    rate = d.log_uniform(1e-3, 3e3) if d.random.random() < 0.8 else d.log_uniform(1e-30, 1e-3)
    x = max(0.0, rate + d.random.gauss(0, 4) * rate ** 0.5)
    return f32(x if d.random.random() < 0.3 else int(x)), rate


FEW_COUNTS = list(itertools.product((0.0, 0.5, step(1.0, -1), 1.0, 2.0, 10.0, 15.0, 16.0, 100.0, 999.0), (SMALLEST, 1e-20, 0.5, 1.0, step(1.0, 1), 10.0, 104.0, 1e3)))

# What each function is evaluated at: a maker of random points and the adversarial ones, in natural parameters.
POINTS = {
    'normal': {
        'logDensity': (located, located_corners()), 'cdf': (located, located_corners()),
        'quantile': (lambda d: (share(d), center(d), spread(d)), with_shares(LOCATED)),
        'mean': (center_draw, ONE_CENTER), 'mode': (center_draw, ONE_CENTER), 'variance': (scale_draw, ONE_SPREAD),
        'entropy': (scale_draw, ONE_SPREAD), 'kl': (located_pair, PAIRS),
    },
    'uniform': {
        'logDensity': (lambda d: (lambda i: (within(d, *i), *i))(interval(d)),
                       [(x, *i) for i in INTERVALS for x in (i[0], i[1], (i[0] + i[1]) / 2)]
                       + [(f32(x), 0.0, f32(b)) for x in (0.1, 0.7) for b in (0.8, 1.0, 1.5, 2.0, 30.0)]
                       + [(0.5, f32(a), step(1.0, n)) for a in (1e-9, -1e-9, 1e-12, -1e-30) for n in (0, 1, -1)]),
        'cdf': (lambda d: (lambda i: (within(d, *i), *i))(interval(d)),
                [(x, *i) for i in INTERVALS for x in (i[0], i[1], (i[0] + i[1]) / 2, step(i[0], 1), step(i[1], -1))]),
        'quantile': (lambda d: (share(d), *interval(d)), with_shares(INTERVALS)),
        'mean': (interval, INTERVALS), 'variance': (interval, INTERVALS), 'entropy': (interval, INTERVALS),
        'kl': (interval_pair, [(*i, *i) for i in INTERVALS] + [(0.0, 1.0, f32(-x), f32(1 + y)) for x in (0.0, 1e-30, 1e-7, 1e-3, 1e30)
                                                            for y in (0.0, 1.2e-7, 1e-3, 1.0, 1e10, 1e38)]
               + [(f32(2 + x), f32(3 - y), 2.0, 3.0) for x in (0.0, 2.4e-7, 1e-3, 0.4) for y in (0.0, 2.4e-7, 1e-3, 0.4)]),
    },
    'exponential': {
        **{name: (rate_point, RATES) for name in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
        **{name: (lambda d: (share(d), spread(d)), with_shares([(s,) for s in SPREADS]))
           for name in ('quantile', 'upperQuantile')},
        **{name: (scale_draw, ONE_SPREAD) for name in ('mean', 'variance', 'mode', 'entropy')},
        'kl': (scale_pair, [(s, t) for _, s, _, t in PAIRS]),
    },
    'bernoulli': {
        'logDensity': (lambda d: (d.choice((0.0, 1.0)), logit(d)), [(x, l) for x in (0.0, 1.0) for l in LOGITS] + [(x, l) for x in (0.0, 1.0) for l in fence(1, -1, steps=(2, 3, 8))]),
        'cdf': (lambda d: (d.uniform(-0.5, 1.5), logit(d)), [(x, l) for x in (-1.0, 0.0, step(1.0, -1), 1.0) for l in LOGITS]),
        **{name: (lambda d: (logit(d),), [(l,) for l in LOGITS + fence(1, -1, 1e-3, 5, 20, steps=(1, 2, 3, 8, 21))])
           for name in ('mean', 'variance', 'mode', 'entropy')},
        'kl': (logit_pair, LOGIT_PAIRS),
    },
    'poisson': {
        'logDensity': (counted, COUNTS), 'cdf': (few_counted, FEW_COUNTS),
        **{name: (scale_draw, ONE_SPREAD) for name in ('mean', 'variance', 'mode')},
        'kl': (scale_pair, [(s, t) for _, s, _, t in PAIRS]),
    },
}
for family in ('laplace', 'logistic'):
    POINTS[family] = POINTS['normal']
POINTS['logNormal'] = {
    'logDensity': (positive_located, positive_corners()), 'cdf': (positive_located, positive_corners()),
    'quantile': (lambda d: (share(d), *moderate_located(d)), with_shares(MODERATE)),
    **{name: (moderate_located, MODERATES) for name in ('mean', 'mode', 'variance')},
    'entropy': (lambda d: (center(d), spread(d)), MODERATES + [(f32(-1.4189385), s) for s in (1.0, step(1.0, 1), step(1.0, -1))]),
    'kl': POINTS['normal']['kl'],
}
for family in ('normal', 'laplace', 'logistic', 'logNormal', 'uniform'):
    POINTS[family].update({name: POINTS[family]['cdf'] for name in ('survival', 'logCdf', 'logSurvival')})
    POINTS[family]['upperQuantile'] = POINTS[family]['quantile']


# Ends of the domain of a logarithm, where it is not the usual one.
LIMITS = {}


def points(family, function, names, count=220, corners=None):
    """Arguments in the given forms, by name: 'x' and 'p' as they are, parameters through their inverse."""
    make, adversarial = POINTS[family][function]
    step_by = max(1, len(adversarial) // corners) if corners else 1
    adversarial = list(adversarial)[::step_by]
    plain = [n[5].lower() + n[6:] if n.startswith('other') else n for n in names]
    found = Draws(f'{family} {function} {" ".join(names)}').many(count, make) + adversarial
    rows = [tuple(f32(v) if n in 'xp' else raw(family, n, v) for n, v in zip(plain, point)) for point in found]
    for at, name in enumerate(plain):
        if name == 'probability':
            for p, row in zip(NEAR_HALF, rows[count:] * 2):
                rows.append(row[:at] + (f32(p),) + row[at + 1:])
    # Logarithms beyond what float32 could hold after the transform: beside the first adversarial points.
    for at, name in enumerate(plain):
        if name.startswith('log') and name != 'logit' and not (family == 'poisson' and function == 'cdf'):
            # Shapes are held to 1e-6 … 1e6.
            held = [0.0, 1e-7, -1e-7, 13.5, -13.5] if name == 'logShape' else FAR_LOGS
            low, high = LIMITS.get(f'{family}.{function}.{name}', LIMITS.get(f'{family}.{name}', (-1400, 1400)))
            for far, row in zip(FAR.get((family, name), held) * 3, rows[count:]):
                far = max(low, min(high, far))
                rows.append(row[:at] + (f32(2 * far if name == 'logVariance' else far),) + row[at + 1:])
    return list(dict.fromkeys(rows))
