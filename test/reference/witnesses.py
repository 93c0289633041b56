#!/usr/bin/env python3
"""Second witnesses for the families' reference values: SciPy's and R's own functions in double precision at the same
points. Where one of them agrees to nine digits, two programs that share nothing with the generator or with each other
say the same; where neither does, the point is counted, and the reference stands on its two precisions alone.

    python3 witnesses.py > ../../docs/accuracy-witnesses.json

Needs SciPy, and Rscript (Debian's r-base-core) for R's column.
"""
import json
import os
import subprocess
import sys
import tempfile
import warnings

import numpy as np

sys.dont_write_bytecode = True
warnings.filterwarnings('ignore')
np.seterr(all='ignore')
HERE = os.path.dirname(os.path.abspath(__file__))
sys.path.insert(0, HERE)
from scipy_float32 import FAMILIES, METHODS

# R's family name and the order of its parameters, from ours; d, p and q functions.
R = {
    'normal': ('norm', 'mean, sd'), 'logNormal': ('lnorm', 'location, scale'), 'logistic': ('logis', 'location, scale'),
    'uniform': ('unif', 'lower, upper'), 'exponential': ('exp', 'rate'), 'poisson': ('pois', 'rate'),
    'cauchy': ('cauchy', 'location, scale'), 'weibull': ('weibull', 'shape, scale'),
    'gamma': ('gamma', 'shape, scale=scale'), 'erlang': ('gamma', 'shape, scale=scale'),
    'chiSquared': ('chisq', 'degreesOfFreedom'), 'beta': ('beta', 'alpha, beta'),
    'fisherF': ('f', 'numeratorDegreesOfFreedom, denominatorDegreesOfFreedom'),
    'studentT': ('t', 'degreesOfFreedom'),
}
FORMS = {
    'logDensity': ('d', 'x', 'log=TRUE'), 'cdf': ('p', 'x', ''), 'survival': ('p', 'x', 'lower.tail=FALSE'),
    'logCdf': ('p', 'x', 'log.p=TRUE'), 'logSurvival': ('p', 'x', 'lower.tail=FALSE, log.p=TRUE'),
    'quantile': ('q', 'p', ''), 'upperQuantile': ('q', 'p', 'lower.tail=FALSE'),
}


def r_values(family, function, names, columns):
    if family not in R or function not in FORMS:
        return None
    front, lead, more = FORMS[function]
    name, parameters = R[family]
    data = dict(zip(names, columns))
    if family == 'studentT':
        # R's has no location and scale.
        l, s = data.pop('location', 0.0), data.pop('scale', 1.0)
        if lead == 'x':
            data['x'] = (data['x'] - l) / s
        after = {'logDensity': lambda v: v - np.log(s), 'quantile': lambda v: l + s * v, 'upperQuantile': lambda v: l + s * v}
        after = after.get(function, lambda v: v)
    else:
        after = lambda v: v
    if not all(p.split('=')[-1].strip() in data for p in parameters.split(',')):
        return None
    with tempfile.TemporaryDirectory() as folder:
        for key, column in data.items():
            np.savetxt(os.path.join(folder, key), column, fmt='%.17g')
        reads = ''.join(f'{key} <- scan("{folder}/{key}", quiet=TRUE); ' for key in data)
        call = f'{front}{name}({lead}, {parameters}{", " + more if more else ""})'
        code = f'options(warn=-1); {reads} v <- {call}; cat(sprintf("%.17g", v), sep="\\n")'
        try:
            out = subprocess.run(['Rscript', '-e', code], capture_output=True, text=True, timeout=300).stdout
        except FileNotFoundError:
            return None
    found = np.array([float(v.replace('NaN', 'nan').replace('Inf', 'inf')) if v != 'NA' else np.nan for v in out.split()])
    return after(found) if len(found) == len(columns[0]) else None


def agrees(got, exact, sizes):
    close = np.abs(got - exact) <= 1e-9 * np.abs(exact) + 2.0 ** -48 * sizes
    return close | (got == exact) | ((np.abs(exact) < 1e-300) & (np.abs(got) < 1e-300))


rows = []
for family in FAMILIES:
    path = os.path.join(HERE, 'families', f'{family}.json')
    if not os.path.exists(path):
        continue
    own = FAMILIES[family].__code__.co_varnames
    for record in json.load(open(path)):
        names, function = record['arguments'], record['function']
        method = METHODS.get(function)
        parameters = [n for n in names if n not in 'xp']
        if method is None or any(record['transforms']) or record.get('joint') or not set(parameters) <= set(own):
            continue
        data = np.array([[float(v) for v in row] for row in record['rows']]).T
        columns, exact = list(data[:len(names)].astype(np.float32).astype(float)), data[len(names)]
        sizes = data[len(names) + 1 + len(record['partials'])]
        rest = {'location': 0.0, 'scale': 1.0, 'mean': 0.0, 'sd': 1.0, 'shape': 1.0}
        found = dict(zip(names, columns))
        given = {n: found.get(n, np.full(len(exact), rest.get(n, 1.0))) for n in own}
        name = 'logpmf' if method == 'logpdf' and family == 'poisson' else method
        witnesses = {}
        try:
            witnesses['SciPy'] = np.asarray(getattr(FAMILIES[family](**given), name)(*[found[n] for n in names if n in 'xp']))
        except Exception:
            pass
        r = r_values(family, function, names, columns)
        if r is not None:
            witnesses['R'] = r
        same = {who: agrees(v, exact, sizes) for who, v in witnesses.items()}
        if not same:
            continue
        either = np.logical_or.reduce(list(same.values()))
        rows.append({'name': f'{family}.{function}({", ".join(names)})', 'points': len(exact),
                     **{who: int(v.sum()) for who, v in same.items()}, 'either': int(either.sum())})
print('[\n' + ',\n'.join(json.dumps(row) for row in rows) + '\n]')
