"""Plain functions of two arguments."""
from mpmath import digamma, log, loggamma, polygamma

from machinery import HUGE, TINY, Draws, f32, fence, step


def near(d):
    """Two positive arguments, a third of them close to each other."""
    x = d.positive()
    if d.random.random() < 0.35:
        return x, f32(x * (1 + d.sign() * d.log_uniform(1e-7, 1)))
    return x, d.positive()


def tables():
    tables = {}
    corners = [(a, b) for a in TINY[:4:3] + [1.0] + HUGE[:1] for b in TINY[:4:3] + [1.0] + HUGE[:1]]
    switches = [(x, f32(x * r)) for x in (1.0, 3.7, 1e8, 1e-20) for r in fence(0.5, 1, 1.5, 2, steps=(0, 1, 8))]
    ties = [(step(f32(x), n), x) for x in (f32(7.3), 1000.0, 1e-40, 2.0) for n in (1, -1, 5, -5, 64, -64)]

    def add(name, formula, make, *adversarial, count=220, digits=300):
        points = Draws(name).many(count, make) + [p for group in adversarial for p in group]
        tables[name] = (formula, points, digits)

    add('deviance', lambda x, m: x * log(x / m) + m - x, near, corners, switches, ties)
    add('deviance_x', lambda x, m: log(x / m), near, corners, switches, ties)
    add('deviance_m', lambda x, m: 1 - x / m, near, corners, switches, ties)
    add('logRatio', lambda x, m: log(x / m), near, corners, switches, ties)
    add('logRatio_x', lambda x, m: 1 / x, near, corners, switches, ties)
    add('logRatio_m', lambda x, m: -1 / m, near, corners, switches, ties)

    def any_pair(d):
        return d.positive(), d.positive()

    def shapes(d):
        return d.log_uniform(1e-3, 1e6), d.log_uniform(1e-3, 1e6)

    def mixed(d):
        return any_pair(d) if d.random.random() < 0.4 else shapes(d)

    # Both sides of the switch at 10, and of a = b.
    tens = [(a, b) for a in (9.999999, 10.0) for b in (1e-30, 1e-3, 0.7, 9.999999, 10.0, 10.000001, 200.0, 1e8)]
    tens += [(b, a) for a, b in tens]
    halves = [(a, b) for a in fence(1, 2, steps=(0, 1, 8)) for b in (0.5, 1.0, 3.0)]
    add('logBeta', lambda a, b: loggamma(a) + loggamma(b) - loggamma(a + b), mixed, corners, tens, halves)
    add('logBeta_a', lambda a, b: digamma(a) - digamma(a + b), mixed, corners, tens, halves)
    add('logBeta_b', lambda a, b: digamma(b) - digamma(a + b), mixed, corners, tens, halves)
    eights = [(a, b) for a in fence(7, 8, 9, steps=(0, 1)) for b in (1e-30, 1e-3, 0.7, 7.5, 300.0, 1e30)]
    add('digammaDifference', lambda a, b: digamma(a + b) - digamma(a), mixed, corners, tens, eights)
    add('digammaDifference_a', lambda a, b: polygamma(1, a + b) - polygamma(1, a), mixed, corners, tens, eights)
    add('digammaDifference_b', lambda a, b: polygamma(1, a + b), mixed, corners, tens, eights)

    def small_step(d):
        return d.positive(), d.uniform(0, 1) if d.random.random() < 0.5 else d.log_uniform(1e-44, 1)

    eights = [(b, a) for b in fence(1.4616, 7, 8, steps=(0, 1, 8)) for a in (1e-30, 1e-3, 0.7, 1.0)]
    add('logGammaDifference', lambda b, a: loggamma(b + a) - loggamma(b), small_step, eights)
    add('logGammaDifference_b', lambda b, a: digamma(b + a) - digamma(b), small_step, eights)
    add('logGammaDifference_a', lambda b, a: digamma(b + a), small_step, eights)
    return tables
