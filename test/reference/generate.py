#!/usr/bin/env python3
"""Writes the reference values that the accuracy tests read: every special function and partial derivative at
random and adversarial float32 arguments, by mpmath at no fewer than 50 digits and at two precisions.

    python3 generate.py            all groups
    python3 generate.py scalar     one group (see GROUPS)

Needs mpmath (written with 1.2.1). The points follow from literal seeds, so that a second run writes the same bytes.
"""
import importlib
import sys

sys.dont_write_bytecode = True

from machinery import write

GROUPS = ['scalar', 'transforms', 'pair', 'gamma', 'gamma_inverse', 'beta', 'beta_inverse', 'bessel', 'log_sum', 'von_mises',
          'student_t', 'skew_normal', 'exponential_integral']

for group in sys.argv[1:] or GROUPS:
    write(group, importlib.import_module('group_' + group).tables())
