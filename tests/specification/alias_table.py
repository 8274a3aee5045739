#!/usr/bin/env python3
"""The choice by weight of tests/golden/LAWS_DISCRETE.md, "categorical": all in integers."""

import math
from fractions import Fraction


def words_of_outcomes(weights):
    """How many of the 2^64 words each outcome has."""
    unit = Fraction(2) ** (math.frexp(max(weights))[1] - 1 - 94)
    whole = [math.floor(Fraction(w) / unit) for w in weights]
    total = sum(whole)
    running, before, counts = 0, 0, []
    for w in whole:
        running += w
        upto = 2 ** 64 * running // total
        counts.append(upto - before)
        before = upto
    return counts


def columns(weights):
    """(alias, threshold) of each column, and the words in a column."""
    n = len(weights)
    counts = words_of_outcomes(weights)
    size = 2 ** max(1, (n - 1).bit_length())
    full = 2 ** 64 // size
    if 2 ** 64 in counts:
        return [(counts.index(2 ** 64), 0)] * size, full
    counts += [0] * (size - n)
    table = [(j, 0) for j in range(size)]
    rich = 0
    for first in range(size):
        j = first
        while counts[j] < full:
            while counts[rich] <= full:
                rich += 1
            table[j] = rich, counts[j]
            counts[rich] -= full - counts[j]
            counts[j] = full
            if rich > first:
                break
            j = rich
    return table, full


def draw(weights, s):
    """The outcome, and whether it was a column's own."""
    table, full = columns(weights)
    own, rest = divmod(s(), full)
    alias, threshold = table[own]
    return (own, True) if rest < threshold else (alias, False)
