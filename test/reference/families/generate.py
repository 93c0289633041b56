#!/usr/bin/env python3
"""Writes the reference values of the scalar families: every function of every family in every parametrization,
with its first derivatives, at random and adversarial float32 arguments. mpmath at 420 digits and again at 500.

    python3 generate.py            all families
    python3 generate.py normal     one

Needs mpmath (written with 1.3.0). A second run writes the same bytes. A row holds the arguments, the value and the
derivatives, then for each of those the sum of the sizes of its terms, or 0 where nothing cancels.
"""
import itertools
import json
import os
import sys

sys.dont_write_bytecode = True

import mpmath
from mpmath import mp, mpf

import points
from dual import variables
from machinery import text
from scalar import FUNCTIONS, SPREADS, form


def unprefixed(name):
    return name[5].lower() + name[6:] if name.startswith('other') else name


def prefixed(name):
    return 'other' + name[0].upper() + name[1:]


def parametrizations(family, natural):
    """Every choice of forms; both sides of a divergence take the same."""
    own = [n for n in natural if not n.startswith('other')]
    for chosen in itertools.product(*[SPREADS[family].get(n, [n]) for n in own]):
        by_name = dict(zip(own, chosen))
        yield [prefixed(by_name[unprefixed(n)]) if n.startswith('other') else by_name[n] for n in natural]


def value_and_slopes(family, names, formula, args):
    inputs = variables(args)
    terms = formula(*[form(family, unprefixed(n))[1](v) for n, v in zip(names, inputs)])
    columns = [[t.value for t in terms]] + [[t.slopes[k] for t in terms] for k in range(len(args))]
    return [(mpmath.fsum(c), mpmath.fsum(c, absolute=True)) for c in columns]


def agreed(family, names, formula, args):
    with mp.workdps(420):
        low = value_and_slopes(family, names, formula, args)
    with mp.workdps(500):
        high = value_and_slopes(family, names, formula, args)
    with mp.workdps(60):
        for (a, _), (b, _) in zip(low, high):
            # Far outside the doubles the exponent may take the digits, and only the sign is wanted.
            if abs(a) < mpf(10) ** -400 and abs(b) < mpf(10) ** -400:
                continue
            if abs(a) > mpf(10) ** 400 and abs(b) > mpf(10) ** 400 and (a > 0) == (b > 0):
                continue
            if not abs(a - b) <= mpf(10) ** -25 * abs(b):
                raise ArithmeticError(f'{family} {names} {args}: the two precisions give {a} and {b}')
    return high


def record(family, function, names):
    kernel, formula, natural, partials = FUNCTIONS[family][function]
    natural = natural.split()
    wanted = [k for k, n in enumerate(natural) if n in partials.split()]
    rows = []
    for args in points.points(family, function, names):
        columns = agreed(family, names, formula, args)
        columns = [columns[0]] + [columns[1 + k] for k in wanted]
        with mp.workdps(40):
            sizes = ['0' if s <= 1.001 * abs(v) else '%.3g' % float(min(s, 1e300)) for v, s in columns]
        rows.append('[' + ', '.join(['%.9g' % a for a in args] + [text(v) for v, _ in columns] + sizes) + ']')
    head = {
        'function': function, 'kernel': kernel, 'arguments': names,
        'transforms': [form(family, unprefixed(n))[0] for n in names],
        'partials': [names[k] for k in wanted],
    }
    print(f'{family}.{function}({", ".join(names)}): {len(rows)} points', flush=True)
    return json.dumps(head)[:-1] + ', "rows": [\n' + ',\n'.join(rows) + ']}'


def write(family):
    records = [record(family, function, names) for function, entry in FUNCTIONS[family].items()
               for names in parametrizations(family, entry[2].split())]
    with open(os.path.join(os.path.dirname(os.path.abspath(__file__)), family + '.json'), 'w') as file:
        file.write('[\n' + ',\n'.join(records) + '\n]\n')


for family in sys.argv[1:] or FUNCTIONS:
    write(family)
