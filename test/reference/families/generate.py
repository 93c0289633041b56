#!/usr/bin/env python3
"""Writes the reference values of the scalar families: every function of every family in every parametrization,
with its first derivatives, at random and adversarial float32 arguments. mpmath at two precisions, which must agree to 25 digits.

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
import scalar
from dual import variables
from machinery import text

HERE = os.path.dirname(os.path.abspath(__file__))
OWN = sorted(name[7:-3] for name in os.listdir(HERE) if name.startswith('family_') and name.endswith('.py'))
TAILS = ('survival', 'logCdf', 'logSurvival', 'upperQuantile')
FUNCTIONS, SPREADS, DIGITS, JOINTS = dict(scalar.FUNCTIONS), dict(scalar.SPREADS), {}, {}
SINGLE, FIRST_FORMS = set(), set()
form = scalar.form


def load(family):
    """A family with a file of its own: see family_gumbel.py."""
    module = __import__('family_' + family)
    FUNCTIONS[family], SPREADS[family] = module.FUNCTIONS, module.PARAMETERS
    points.POINTS[family] = module.POINTS
    scalar.FORMS.update({f'{family}.{name}': entry for name, entry in getattr(module, 'FORMS', {}).items()})
    points.FAR.update({(family, name): logs for name, logs in getattr(module, 'FAR', {}).items()})
    FIRST_FORMS.update((family, function) for function in getattr(module, 'FIRST_FORMS', ()))
    if getattr(module, 'ONE_BY_ONE', False):
        SINGLE.add(family)
    points.LIMITS.update({f'{family}.{name}': ends for name, ends in getattr(module, 'LIMITS', {}).items()})
    DIGITS[family] = getattr(module, 'DIGITS', {})
    JOINTS[family] = getattr(module, 'JOINTS', [])


def digits(family, function):
    """Two precisions. The families without a file of their own are so cheap that theirs are high for every function."""
    tail = function in TAILS
    low = DIGITS[family].get(function, DIGITS[family].get('', 60)) if family in DIGITS else 150 if tail else 420
    return low, low + (40 if family in DIGITS else 80)


def unprefixed(name):
    return name[5].lower() + name[6:] if name.startswith('other') else name


def prefixed(name):
    return 'other' + name[0].upper() + name[1:]


def parametrizations(family, natural):
    """Every choice of forms, or those with one parameter in another form than the first; both sides of a divergence
    take the same."""
    own = [n for n in natural if not n.startswith('other')]
    for chosen in itertools.product(*[SPREADS[family].get(n, [n]) for n in own]):
        if family in SINGLE and sum(c != SPREADS[family].get(n, [n])[0] for c, n in zip(chosen, own)) > 1:
            continue
        by_name = dict(zip(own, chosen))
        yield [prefixed(by_name[unprefixed(n)]) if n.startswith('other') else by_name[n] for n in natural]


def value_and_slopes(family, names, formula, args):
    inputs = variables(args)
    terms = formula(*[form(family, unprefixed(n))[1](v) for n, v in zip(names, inputs)])
    columns = [[t.value for t in terms]] + [[t.slopes[k] for t in terms] for k in range(len(args))]
    return [(mpmath.fsum(c), mpmath.fsum(c, absolute=True)) for c in columns]


def agreed(family, function, names, formula, args):
    few, many = digits(family, function)
    with mp.workdps(few):
        low = value_and_slopes(family, names, formula, args)
    with mp.workdps(many):
        high = value_and_slopes(family, names, formula, args)
    with mp.workdps(60):
        for (a, _), (b, size) in zip(low, high):
            size = max(size, abs(high[0][0]))
            # Terms that cancel to the last digit leave a zero, and float32 ends at 1e-45.
            if max(abs(a), abs(b)) < mpf(10) ** (20 - few) * size or max(abs(a), abs(b)) < mpf(10) ** -50:
                continue
            # Far outside the doubles the exponent may take the digits, and only the sign is wanted.
            if abs(a) < mpf(10) ** -400 and abs(b) < mpf(10) ** -400:
                continue
            if abs(a) > mpf(10) ** 400 and abs(b) > mpf(10) ** 400 and (a > 0) == (b > 0):
                continue
            if not abs(a - b) <= mpf(10) ** -25 * abs(b):
                raise ArithmeticError(f'{family} {names} {args}: the two precisions give {a} and {b}')
    return high


def record(family, function, names, kernel, formula, natural, partials, rows_at, joint=False):
    wanted = [k for k, n in enumerate(natural) if n in partials]
    rows = []
    for args in rows_at:
        columns = agreed(family, function, names, formula, args)
        columns = [columns[0]] + [columns[1 + k] for k in wanted]
        with mp.workdps(40):
            sizes = ['0' if s <= 1.001 * abs(v) else '%.3g' % float(min(s, 1e300)) for v, s in columns]
        written = text if family not in DIGITS else short
        rows.append('[' + ', '.join(['%.9g' % a for a in args] + [written(v) for v, _ in columns] + sizes) + ']')
    head = {
        'function': function, 'kernel': kernel, 'arguments': names,
        'transforms': [None if joint else form(family, unprefixed(n))[0] for n in names],
        'partials': [names[k] for k in wanted], **({'joint': True} if joint else {}),
    }
    print(f'{family}.{function}({", ".join(names)}): {len(rows)} points', flush=True)
    return json.dumps(head)[:-1] + ', "rows": [\n' + ',\n'.join(rows) + ']}'


def short(value):
    """Thirteen digits: 1e-13 of a value is 1e-6 float32 units."""
    full = text(value)
    return full if full.startswith('"') or len(full) < 15 else '%.13g' % float(full)


def plain(family):
    for function, (kernel, formula, natural, partials) in FUNCTIONS[family].items():
        natural = natural.split()
        for at, names in enumerate(parametrizations(family, natural)):
            if at > 0 and (family, function) in FIRST_FORMS:
                break
            # Behind a transform the formula is the same; fewer points show that the transform is applied.
            tail = function in TAILS
            few = {'count': 45, 'corners': 25} if at > 0 and (family in DIGITS or tail) else {}
            yield record(family, function, names, kernel, formula, natural, partials.split(),
                         points.points(family, function, names, **few))


def joint(family):
    """Every function once more in the parametrizations that give several parameters together."""
    for front, inputs, convert, made in JOINTS[family]:
        inputs = inputs.split()
        for function, (kernel, formula, natural, partials) in FUNCTIONS[family].items():
            natural, partials = natural.split(), partials.split()
            own = [n for n in natural if n not in ('x', 'p')]
            if function == 'kl' or not own:
                continue
            lead = [n for n in natural if n in ('x', 'p')]
            names = lead + inputs

            def converted(*args, lead=lead, own=own, formula=formula):
                found = dict(zip(lead, args)) | convert(*args[len(lead):])
                return formula(*[found[n] for n in lead + own])
            rows = made(family, function, lead)
            yield record(family, function, names, front + kernel[len(family):], converted, names,
                         [n for n in lead if n in partials] + inputs, rows, joint=True)


def write(family):
    if family in OWN:
        load(family)
    records = list(plain(family)) + (list(joint(family)) if family in OWN else [])
    with open(os.path.join(HERE, family + '.json'), 'w') as file:
        file.write('[\n' + ',\n'.join(records) + '\n]\n')


for family in sys.argv[1:] or list(scalar.FUNCTIONS) + OWN:
    write(family)
