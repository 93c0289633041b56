"""Points, precision and output for the reference values: see generate.py."""
import json
import os
import random
import struct

import mpmath
from mpmath import mp, mpf

HERE = os.path.dirname(os.path.abspath(__file__))
OVERFLOW = mpf(2) ** 1024

TINY = [1.401298464324817e-45, 9.99994610111476e-41, 1.1754942106924411e-38, 1.1754943508222875e-38, 1e-30]
HUGE = [3.4028234663852886e38, 1e30, 1e20]


def f32(x):
    """The float32 nearest to x, as a Python float; the largest one instead of an overflow."""
    limit = 3.4028234663852886e38
    return struct.unpack('f', struct.pack('f', max(-limit, min(limit, float(x)))))[0]


def step(x, n):
    """The float32 that lies n representable steps above x."""
    bits = struct.unpack('i', struct.pack('f', x))[0]
    order = bits if bits >= 0 else -(bits & 0x7FFFFFFF)
    order += n
    bits = order if order >= 0 else (-order) | 0x80000000
    return struct.unpack('f', struct.pack('I', bits & 0xFFFFFFFF))[0]


def fence(*centers, steps=(0, 1, 2, 3, 8, 21, 64)):
    """Points around each branch switch or zero: up to 64 float32 steps to both sides."""
    return [step(f32(c), s * n) for c in centers for n in steps for s in ((1, -1) if n else (1,))]


class Draws:
    """Random float32 numbers from a literal seed that is the function's name."""

    def __init__(self, name):
        self.random = random.Random('leadline reference ' + name)

    def uniform(self, low, high):
        return f32(self.random.uniform(low, high))

    def log_uniform(self, low, high):
        return f32(mpmath.exp(self.random.uniform(float(mpmath.log(low)), float(mpmath.log(high)))))

    def sign(self):
        return self.random.choice((-1.0, 1.0))

    def choice(self, options):
        return self.random.choice(options)

    def positive(self):
        """Half over the whole range of float32, half where things happen."""
        return self.log_uniform(1.5e-45, 3.4e38) if self.random.random() < 0.4 else self.log_uniform(1e-3, 1e3)

    def real(self):
        return self.sign() * self.positive()

    def probability(self):
        kind = self.random.random()
        if kind < 0.5:
            return step(self.uniform(0, 1), 1)
        if kind < 0.8:
            return self.log_uniform(1.5e-45, 0.5)
        return f32(1 - self.random.randint(1, 2000) * 2.0 ** -24)

    def many(self, count, make):
        return [make(self) for _ in range(count)]


def evaluate(name, formula, args, digits):
    """The value at two precisions; they must agree to 25 digits."""
    values = []
    for extra in (0, 40):
        with mp.workdps(digits + extra):
            values.append(+formula(*[mpf(a) for a in args]))
    low, high = values
    with mp.workdps(60):
        if mpmath.isnan(high) or (mpmath.isinf(high) and low != high):
            raise ArithmeticError(f'{name}{args}: {low} {high}')
        # A result this small is zero in any case, and may have lost its digits to the exponent.
        if abs(low) < mpf(10) ** -400 and abs(high) < mpf(10) ** -400:
            return high
        if not mpmath.isinf(high) and abs(low - high) > mpf(10) ** -25 * abs(high):
            raise ArithmeticError(f'{name}{args}: the two precisions give {low} and {high}')
    return high


def text(value):
    with mp.workdps(40):
        if abs(value) >= OVERFLOW:
            return '"Infinity"' if value > 0 else '"-Infinity"'
        number = float(value)
        return '0' if number == 0 else repr(number)


def hard_points():
    with open(os.path.join(HERE, 'hard.json')) as file:
        return json.load(file)


def write(group, tables):
    """One file a group: {"function": [[argument, ..., value], ...]}, arguments to nine digits (float32 exact)."""
    hard = hard_points()
    parts = []
    for name, (formula, points, digits) in tables.items():
        rows, seen = [], set()
        for point in list(points) + hard.get(name, []):
            args = tuple(f32(a) for a in (point if isinstance(point, (tuple, list)) else (point,)))
            if args in seen:
                continue
            seen.add(args)
            value = evaluate(name, formula, args, digits)
            rows.append('[' + ', '.join(['%.9g' % a for a in args] + [text(value)]) + ']')
        print(f'{group}: {name} {len(rows)} points', flush=True)
        parts.append(f'"{name}": [\n' + ',\n'.join(rows) + '\n]')
    with open(os.path.join(HERE, group + '.json'), 'w') as file:
        file.write('{\n' + ',\n'.join(parts) + '\n}\n')
