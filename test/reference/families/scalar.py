"""The scalar families by their textbook formulas. A function is a list of terms: their sum is the value, and the
sum of their sizes says how much cancels where the value crosses zero. The sources keep the relative accuracy of a
divergence all the same, so that there the sizes matter only for derivatives, behind a transform."""
import mpmath
from mpmath import mpf

from dual import (Dual, absolute, exp, expm1, log, log1p, log_gamma_constant, phi, probit, sigmoid, softplus, sqrt, square)


def log_2pi():
    return mpmath.log(2 * mpmath.pi)


def constant(value, like):
    return like * 0 + value


MINUS_INFINITY = mpf('-inf')

# The ways to give a parameter: the transform in the sources that reads it, the same here, and its inverse.
PLAIN = (None, lambda v: v, lambda n: n)
EXP = ('exponential', exp, mpmath.log)
FORMS = {
    'logSd': EXP, 'logScale': EXP, 'logRate': EXP,
    'variance': ('squareRoot', sqrt, lambda n: mpf(n) ** 2),
    'logVariance': ('expHalf', lambda v: exp(v / 2), lambda n: 2 * mpmath.log(n)),
    'precision': ('inverseSquareRoot', lambda v: 1 / sqrt(v), lambda n: 1 / mpf(n) ** 2),
    'probability': ('logOdds', lambda v: log(v) - log1p(-v), lambda n: 1 / (1 + mpmath.exp(-mpf(n)))),
    'exponential.scale': ('reciprocal', lambda v: 1 / v, lambda n: 1 / mpf(n)),
    'exponential.mean': ('reciprocal', lambda v: 1 / v, lambda n: 1 / mpf(n)),
}


def form(family, name):
    return FORMS.get(f'{family}.{name}', FORMS.get(name, PLAIN))


SPREADS = {
    'normal': {'mean': ['mean'], 'sd': ['sd', 'logSd', 'variance', 'logVariance', 'precision']},
    'logNormal': {'location': ['location'], 'scale': ['scale', 'logScale']},
    'laplace': {'location': ['location'], 'scale': ['scale', 'logScale']},
    'logistic': {'location': ['location'], 'scale': ['scale', 'logScale']},
    'uniform': {'lower': ['lower'], 'upper': ['upper']},
    'exponential': {'rate': ['rate', 'logRate', 'scale', 'mean']},
    'bernoulli': {'logit': ['logit', 'probability']},
    'poisson': {'rate': ['rate', 'logRate', 'mean']},
}


# ---- normal
def normal_log_density(x, mean, sd):
    return [-square((x - mean) / sd) / 2, -log(sd), constant(-log_2pi() / 2, sd)]


def normal_cdf(x, mean, sd):
    return [phi((x - mean) / sd)]


def normal_quantile(p, mean, sd):
    return [mean, sd * probit(p)]


def normal_kl(m, s, n, t):
    return [square(s / t) / 2, square((m - n) / t) / 2, -constant(mpf(1) / 2, s), -log(s / t)]


# ---- log-normal
def log_normal_log_density(x, location, scale):
    return [-square((log(x) - location) / scale) / 2, -log(x), -log(scale), constant(-log_2pi() / 2, scale)]


def log_normal_cdf(x, location, scale):
    return [phi((log(x) - location) / scale)]


def log_normal_variance(location, scale):
    return [expm1(square(scale)) * exp(2 * location + square(scale))]


# ---- Laplace
def laplace_log_density(x, location, scale):
    return [-absolute(x - location) / scale, -log(scale), constant(-mpmath.log(2), scale)]


def laplace_cdf(x, location, scale):
    z = (x - location) / scale
    return [exp(z) / 2] if z.value < 0 else [1 - exp(-z) / 2]


def laplace_quantile(p, location, scale):
    return [location, scale * (log(2 * p) if p.value < 0.5 else -log(2 * (1 - p)))]


def laplace_kl(l, s, m, t):
    gap = absolute(l - m)
    return [gap / t, s / t * exp(-gap / s), -constant(1, s), -log(s / t)]


# ---- logistic
def logistic_log_density(x, location, scale):
    z = (x - location) / scale
    z = z if z.value >= 0 else -z
    return [-z, -2 * log1p(exp(-z)), -log(scale)]


def logistic_cdf(x, location, scale):
    return [sigmoid((x - location) / scale)]


def logistic_quantile(p, location, scale):
    return [location, scale * (log(p) - log1p(-p))]


# ---- uniform
def inside(x, a, b):
    return a.value <= x.value <= b.value


def uniform_log_density(x, a, b):
    return [-log(b - a)] if inside(x, a, b) else [constant(MINUS_INFINITY, a)]


def uniform_cdf(x, a, b):
    if x.value <= a.value or x.value >= b.value:
        return [constant(int(x.value >= b.value), x)]
    return [(x - a) / (b - a)]


def uniform_kl(a, b, c, d):
    return [log(d - c), -log(b - a)]


# ---- exponential
def exponential_cdf(x, rate):
    return [-expm1(-rate * x)] if x.value >= 0 else [constant(0, x)]


def exponential_log_cdf(x, rate):
    if x.value <= 0:
        return [constant(MINUS_INFINITY, x)]
    return [log(-expm1(-rate * x)) if (rate * x).value < 100 else log1p(-exp(-rate * x))]


def exponential_kl(r, s):
    return [s / r, -constant(1, r), -log(s / r)]


# ---- Bernoulli
def bernoulli_log_density(x, logit):
    if x.value not in (0, 1):
        return [constant(MINUS_INFINITY, logit)]
    return [-softplus(-logit) if x.value == 1 else -softplus(logit)]


def bernoulli_entropy(logit):
    p = sigmoid(logit)
    return [softplus(-logit) * p + softplus(logit) * sigmoid(-logit)]


def bernoulli_cdf(x, logit):
    if x.value < 0 or x.value >= 1:
        return [constant(int(x.value >= 1), logit)]
    return [sigmoid(-logit)]


def bernoulli_kl(a, b):
    return [sigmoid(a) * (softplus(-b) - softplus(-a)), sigmoid(-a) * (softplus(b) - softplus(a))]


# ---- Poisson
def poisson_log_density(x, rate):
    if x.value == 0:
        return [-rate]
    return [x * log(rate) - rate - constant(log_gamma_constant(x + 1), x)]


def poisson_cdf(x, rate):
    """The sum of the masses up to x, or its complement, from the end where they are largest."""
    k, r = int(x.value), rate.value
    mass = mpmath.exp(k * mpmath.log(r) - r - mpmath.loggamma(k + 1))
    total, term, j = mpf(0), mass, k
    if k <= r:
        while j >= 0 and term > total * mpf(10) ** -(mpmath.mp.dps + 5):
            total, term, j = total + term, term * j / r, j - 1
    else:
        while term > total * mpf(10) ** -(mpmath.mp.dps + 5):
            j += 1
            term = term * r / j
            total += term
        total = 1 - total
    return [Dual(total, [-mass * s for s in rate.slopes])]


def poisson_kl(r, s):
    return [r * log(r / s), -r, s]


# ---- the tails of the symmetric families, and of the uniform
def tail_forms(family, cdf, log_cdf, standard, lead, names, suffix=''):
    """Survival, logarithms and upper quantile from the standard member's cdf, its logarithm and its quantile."""
    def z(x, l, s):
        return (lead(x) - l) / s
    x = f'x {names}'
    return {
        'survival': (f'{family}Survival{suffix}', lambda v, l, s: [cdf(-z(v, l, s))], x, x),
        'logCdf': (f'{family}LogCdf{suffix}', lambda v, l, s: [log_cdf(z(v, l, s))], x, x),
        'logSurvival': (f'{family}LogSurvival{suffix}', lambda v, l, s: [log_cdf(-z(v, l, s))], x, x),
    }


def log_phi(z):
    if z.value < -mpf(10) ** 6:
        # The first terms of the asymptotic series of the tail: the next is below 1e-60 of it.
        r = 1 / square(z)
        series = 1 - r * (1 - 3 * r * (1 - 5 * r * (1 - 7 * r * (1 - 9 * r))))
        return -square(z) / 2 - log(-z) + constant(-log_2pi() / 2, z) + log(series)
    if z.value > 5:
        tail = phi(-z)
        return log1p(-tail)
    return log(phi(z))


def laplace_standard(z):
    return exp(z) / 2 if z.value < 0 else 1 - exp(-z) / 2


def laplace_log(z):
    return z - mpmath.log(2) if z.value < 0 else log1p(-exp(-z) / 2)


def laplace_inverse(p):
    return log(2 * p) if p.value < 0.5 else -log(2 * (1 - p))


def upper(family, standard, names, suffix='', carried=None):
    formula = carried or (lambda p, l, s: [l, -s * standard(p)])
    return {'upperQuantile': (f'{family}UpperQuantile{suffix}', formula, f'p {names}', f'p {names}')}


def between(a, b, x, inside, below, above):
    return below if x.value <= a.value else above if x.value >= b.value else inside()


def uniform_survival(x, a, b):
    return [between(a, b, x, lambda: (b - x) / (b - a), constant(1, x), constant(0, x))]


def uniform_log_cdf(x, a, b):
    return [between(a, b, x, lambda: log((x - a) / (b - a)), constant(MINUS_INFINITY, x), constant(0, x))]


def uniform_log_survival(x, a, b):
    return [between(a, b, x, lambda: log((b - x) / (b - a)), constant(0, x), constant(MINUS_INFINITY, x))]


# kernel in the sources, the formula here, its arguments (natural parameters by name), the ones it has a partial in.
FUNCTIONS = {
    'normal': {
        'logDensity': ('normalLogDensity', normal_log_density, 'x mean sd', 'x mean sd'),
        'cdf': ('normalCdfOf', normal_cdf, 'x mean sd', 'x mean sd'),
        'quantile': ('normalQuantileOf', normal_quantile, 'p mean sd', 'p mean sd'),
        'mean': ('identity', lambda m: [m], 'mean', 'mean'),
        'mode': ('identity', lambda m: [m], 'mean', 'mean'),
        'variance': ('normalVariance', lambda s: [square(s)], 'sd', 'sd'),
        'entropy': ('normalEntropy', lambda s: [log(s), constant((log_2pi() + 1) / 2, s)], 'sd', 'sd'),
        'kl': ('normalKl', normal_kl, 'mean sd otherMean otherSd', 'mean sd otherMean otherSd'),
    },
    'logNormal': {
        'logDensity': ('logNormalLogDensity', log_normal_log_density, 'x location scale', 'x location scale'),
        'cdf': ('logNormalCdfOf', log_normal_cdf, 'x location scale', 'x location scale'),
        'quantile': ('logNormalQuantileOf', lambda p, l, s: [exp(l + s * probit(p))], 'p location scale',
                     'p location scale'),
        'mean': ('logNormalMean', lambda l, s: [exp(l + square(s) / 2)], 'location scale', 'location scale'),
        'mode': ('logNormalMode', lambda l, s: [exp(l - square(s))], 'location scale', 'location scale'),
        'variance': ('logNormalVariance', log_normal_variance, 'location scale', 'location scale'),
        'entropy': ('logNormalEntropy', lambda l, s: [l, log(s), constant((log_2pi() + 1) / 2, s)],
                    'location scale', 'location scale'),
        'kl': ('normalKl', normal_kl, 'location scale otherLocation otherScale',
               'location scale otherLocation otherScale'),
    },
    'laplace': {
        'logDensity': ('laplaceLogDensity', laplace_log_density, 'x location scale', 'x location scale'),
        'cdf': ('laplaceCdf', laplace_cdf, 'x location scale', 'x location scale'),
        'quantile': ('laplaceQuantile', laplace_quantile, 'p location scale', 'p location scale'),
        'mean': ('identity', lambda l: [l], 'location', 'location'),
        'mode': ('identity', lambda l: [l], 'location', 'location'),
        'variance': ('laplaceVariance', lambda s: [2 * square(s)], 'scale', 'scale'),
        'entropy': ('laplaceEntropy', lambda s: [log(s), constant(1 + mpmath.log(2), s)], 'scale', 'scale'),
        'kl': ('laplaceKl', laplace_kl, 'location scale otherLocation otherScale',
               'location scale otherLocation otherScale'),
    },
    'logistic': {
        'logDensity': ('logisticLogDensity', logistic_log_density, 'x location scale', 'x location scale'),
        'cdf': ('logisticCdf', logistic_cdf, 'x location scale', 'x location scale'),
        'quantile': ('logisticQuantile', logistic_quantile, 'p location scale', 'p location scale'),
        'mean': ('identity', lambda l: [l], 'location', 'location'),
        'mode': ('identity', lambda l: [l], 'location', 'location'),
        'variance': ('logisticVariance', lambda s: [square(s) * mpmath.pi ** 2 / 3], 'scale', 'scale'),
        'entropy': ('logisticEntropy', lambda s: [log(s), constant(2, s)], 'scale', 'scale'),
    },
    'uniform': {
        'logDensity': ('uniformLogDensity', uniform_log_density, 'x lower upper', 'x lower upper'),
        'cdf': ('uniformCdf', uniform_cdf, 'x lower upper', 'x lower upper'),
        'quantile': ('uniformQuantile', lambda p, a, b: [a * (1 - p), p * b], 'p lower upper', 'p lower upper'),
        'mean': ('uniformMean', lambda a, b: [a / 2, b / 2], 'lower upper', 'lower upper'),
        'variance': ('uniformVariance', lambda a, b: [square(b - a) / 12], 'lower upper', 'lower upper'),
        'entropy': ('uniformEntropy', lambda a, b: [log(b - a)], 'lower upper', 'lower upper'),
        'kl': ('uniformKl', uniform_kl, 'lower upper otherLower otherUpper', 'lower upper otherLower otherUpper'),
    },
    'exponential': {
        'logDensity': ('exponentialLogDensity', lambda x, r: [log(r), -r * x], 'x rate', 'x rate'),
        'cdf': ('exponentialCdf', exponential_cdf, 'x rate', 'x rate'),
        'survival': ('exponentialSurvival', lambda x, r: [exp(-r * x)], 'x rate', 'x rate'),
        'logCdf': ('exponentialLogCdf', exponential_log_cdf, 'x rate', 'x rate'),
        'logSurvival': ('exponentialLogSurvival', lambda x, r: [-r * x], 'x rate', 'x rate'),
        'quantile': ('exponentialQuantile', lambda p, r: [-log1p(-p) / r], 'p rate', 'p rate'),
        'upperQuantile': ('exponentialUpperQuantile', lambda p, r: [-log(p) / r], 'p rate', 'p rate'),
        'mean': ('reciprocal', lambda r: [1 / r], 'rate', 'rate'),
        'variance': ('exponentialVariance', lambda r: [1 / square(r)], 'rate', 'rate'),
        'mode': ('exponentialMode', lambda r: [0 * r], 'rate', 'rate'),
        'entropy': ('exponentialEntropy', lambda r: [constant(1, r), -log(r)], 'rate', 'rate'),
        'kl': ('exponentialKl', exponential_kl, 'rate otherRate', 'rate otherRate'),
    },
    'bernoulli': {
        'logDensity': ('bernoulliLogDensity', bernoulli_log_density, 'x logit', 'logit'),
        'cdf': ('bernoulliCdf', bernoulli_cdf, 'x logit', 'logit'),
        'mean': ('bernoulliMean', lambda l: [sigmoid(l)], 'logit', 'logit'),
        'variance': ('bernoulliVariance', lambda l: [sigmoid(l) * sigmoid(-l)], 'logit', 'logit'),
        'mode': ('bernoulliMode', lambda l: [constant(int(l.value > 0), l)], 'logit', 'logit'),
        'entropy': ('bernoulliEntropy', bernoulli_entropy, 'logit', 'logit'),
        'kl': ('bernoulliKl', bernoulli_kl, 'logit otherLogit', 'logit otherLogit'),
    },
    'poisson': {
        'logDensity': ('poissonLogDensity', poisson_log_density, 'x rate', 'rate'),
        'cdf': ('poissonCdf', poisson_cdf, 'x rate', 'rate'),
        'mean': ('identity', lambda r: [r], 'rate', 'rate'),
        'variance': ('identity', lambda r: [r], 'rate', 'rate'),
        'mode': ('poissonMode', lambda r: [constant(mpmath.floor(r.value), r)], 'rate', 'rate'),
        'kl': ('poissonKl', poisson_kl, 'rate otherRate', 'rate otherRate'),
    },
}

def same(x):
    return x


for family, own in {
    'normal': tail_forms('normal', phi, log_phi, probit, same, 'mean sd', 'Of') | upper('normal', probit, 'mean sd', 'Of'),
    'logNormal': tail_forms('logNormal', phi, log_phi, probit, log, 'location scale', 'Of')
    | upper('logNormal', probit, 'location scale', 'Of', lambda p, l, s: [exp(l - s * probit(p))]),
    'laplace': tail_forms('laplace', laplace_standard, laplace_log, laplace_inverse, same, 'location scale')
    | upper('laplace', laplace_inverse, 'location scale'),
    'logistic': tail_forms('logistic', sigmoid, lambda z: -softplus(-z), None, same, 'location scale')
    | upper('logistic', lambda p: log(p) - log1p(-p), 'location scale'),
    'uniform': {
        'survival': ('uniformSurvival', uniform_survival, 'x lower upper', 'x lower upper'),
        'logCdf': ('uniformLogCdf', uniform_log_cdf, 'x lower upper', 'x lower upper'),
        'logSurvival': ('uniformLogSurvival', uniform_log_survival, 'x lower upper', 'x lower upper'),
        'upperQuantile': ('uniformUpperQuantile', lambda p, a, b: [b * (1 - p), a * p], 'p lower upper', 'p lower upper'),
    },
}.items():
    FUNCTIONS[family].update(own)
