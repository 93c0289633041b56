"""The continuous Bernoulli distribution by its textbook formulas, read for log odds that are not positive: those of
1 − x have the other sign."""
import itertools

from mpmath import mpf

from dual import exp, expm1, log, log1p, sigmoid
from machinery import f32, fence, step
from points import LOGIT_PAIRS, LOGITS, SHARES, SMALLEST, logit, logit_pair, share
from scalar import MINUS_INFINITY, constant

PARAMETERS = {'logit': ['logit', 'probability']}
DIGITS = {'': 300, 'kl': 460}


def held(y):
    """An exponent, no lower than where it leaves every format."""
    return y if y.value > -20000 else y.chain(mpf(-20000), mpf(0))


def normalizer(l):
    """log((exp(l) − 1) / l) for l ≤ 0."""
    if l.value == 0:
        return l / 2
    return log(expm1(held(l)) / l)


def log_density(x, l):
    if not 0 <= x.value <= 1:
        return [constant(MINUS_INFINITY, l)]
    return [l * x, -normalizer(l)] if l.value <= 0 else [-l * (1 - x), -normalizer(-l)]


def below(x, l):
    """The share below x for l ≤ 0."""
    if l.value == 0:
        return x + l * (x * x - x) / 2
    return expm1(held(l * x)) / expm1(held(l))


def above(x, l):
    """The share above x for l ≤ 0."""
    if l.value == 0:
        return 1 - below(x, l)
    return exp(held(l * x)) * expm1(held(l * (1 - x))) / expm1(held(l))


def log_below(x, l):
    share = below(x, l)
    return log(share) if share.value < 0.5 else log1p(-above(x, l))


def log_above(x, l):
    if l.value == 0 or (l * x).value > -20000:
        return log(above(x, l))
    return l * x + log(expm1(held(l * (1 - x))) / expm1(held(l)))


def at(x, l, low, high, value):
    return [value() if 0 < x.value < 1 else constant(low if x.value <= 0 else high, l)]


def cdf(x, l):
    return at(x, l, 0, 1, lambda: below(x, l) if l.value <= 0 else above(1 - x, -l))


def survival(x, l):
    return at(x, l, 1, 0, lambda: above(x, l) if l.value <= 0 else below(1 - x, -l))


def log_cdf(x, l):
    return at(x, l, MINUS_INFINITY, 0, lambda: log_below(x, l) if l.value <= 0 else log_above(1 - x, -l))


def log_survival(x, l):
    return at(x, l, 0, MINUS_INFINITY, lambda: log_above(x, l) if l.value <= 0 else log_below(1 - x, -l))


def point(p, q, l):
    """From the share below for l ≤ 0."""
    if l.value == 0:
        return p + l * p * q / 2
    if l.value < 0:
        return log(q + p * exp(held(l))) / l
    return 1 + log(p + q * exp(held(-l))) / l


def mean(l):
    if l.value == 0:
        return l / 12 + mpf(1) / 2
    return -1 / l - 1 / expm1(-l) if -20000 < l.value < 0 else -1 / l if l.value < 0 else 1 - mean(-l)


def variance(l):
    if l.value == 0:
        return l * 0 + mpf(1) / 12
    e = exp(held(l)) if l.value < 0 else exp(held(-l))
    return 1 / (l * l) - e / ((1 - e) * (1 - e))


def entropy(l):
    l = l if l.value <= 0 else -l
    return [normalizer(l) - l * mean(l)]


def draw(noise, l):
    x = point(sigmoid(noise), sigmoid(-noise), l)
    return [x.chain(min(max(x.value, mpf(2) ** -149), 1 - mpf(2) ** -24), mpf(1))]


def kl(l, m):
    if l.value > 0:
        l, m = -l, -m
    other = normalizer(m) if m.value <= 0 else m + normalizer(-m)
    return [other, -normalizer(l), -(m - l) * mean(l)]


AT_X, AT_P, ONE = 'x logit', 'p logit', 'logit'
FUNCTIONS = {
    'logDensity': ('continuousBernoulliLogDensity', log_density, AT_X, AT_X),
    'cdf': ('continuousBernoulliCdf', cdf, AT_X, AT_X),
    'survival': ('continuousBernoulliSurvival', survival, AT_X, AT_X),
    'logCdf': ('continuousBernoulliLogCdf', log_cdf, AT_X, AT_X),
    'logSurvival': ('continuousBernoulliLogSurvival', log_survival, AT_X, AT_X),
    'quantile': ('continuousBernoulliQuantile', lambda p, l: [point(p, 1 - p, l)], AT_P, AT_P),
    'upperQuantile': ('continuousBernoulliUpperQuantile', lambda p, l: [point(1 - p, p, l)], AT_P, AT_P),
    'draw': ('continuousBernoulliDraw', draw, AT_X, ONE),
    'mean': ('continuousBernoulliMean', lambda l: [mean(l)], ONE, ONE),
    'variance': ('continuousBernoulliVariance', lambda l: [variance(l)], ONE, ONE),
    'mode': ('continuousBernoulliMode', lambda l: [constant(1 if l.value > 0 else 0 if l.value < 0 else mpf(1) / 2, l)], ONE, ONE),
    'entropy': ('continuousBernoulliEntropy', entropy, ONE, ONE),
    'kl': ('continuousBernoulliKl', kl, 'logit otherLogit', 'logit otherLogit'),
}


def inside(d):
    kind = d.random.random()
    if kind < 0.6:
        return d.uniform(0, 1)
    return d.log_uniform(1.5e-45, 1) if kind < 0.8 else f32(1 - d.random.randint(1, 2000) * 2.0 ** -24)


def at_x(d):
    return min(step(1.0, -1), max(SMALLEST, inside(d))), logit(d)


XS = list(itertools.product((SMALLEST, 1e-20, 0.25, step(0.5, -1), 0.5, step(0.5, 1), step(1.0, -1)), LOGITS[::2]))
OUTSIDE = [(-1.0, 2.0), (2.0, -3.0), (step(1.0, 1), 0.5)]
NOISES = [0.0, 1e-30, -1e-7, 0.5, -0.5, 5.0, -17.0, 60.0, -90.0]
FENCES = [(l,) for l in LOGITS + fence(1, -1, 1e-3, 5, 20)]
POINTS = {
    **{n: (at_x, XS + OUTSIDE) for n in ('logDensity', 'cdf', 'survival', 'logCdf', 'logSurvival')},
    **{n: (lambda d: (share(d), logit(d)), [(p, l) for p in SHARES for l in LOGITS[::3]]) for n in ('quantile', 'upperQuantile')},
    'draw': (lambda d: (d.uniform(-15, 15), logit(d)), [(n, l) for n in NOISES for l in LOGITS[::3]]),
    **{n: (lambda d: (logit(d),), FENCES) for n in ('mean', 'variance', 'mode', 'entropy')},
    'kl': (logit_pair, LOGIT_PAIRS),
}
