#!/usr/bin/env python3
"""A second implementation of leat's discrete and multivariate laws.

It does what tests/golden/LAWS_DISCRETE.md says and shares no code with the library. Run without
arguments it checks every row of tests/golden/discrete_vectors.json; with --write it computes the
expected values and writes the file, so that the library is tested against this program and not
against itself. Every + - * / on floats is one operation on binary64; what has to be exact is done in
Python's integers and fractions.

A row's words come from a stream (seed, path, first word) or stand in it ("words", for what a stream
reaches too rarely). Lists are lists; reals are the digits of their bits; "position" counts the words
after the last value.
"""

import json
import math
import os
import sys
from fractions import Fraction
from math import floor  # exact

import alias_table
import core_maths as core
import second_implementation as base
import second_laws

M64 = base.M64
INT64_MAX = 2 ** 63 - 1


class Draw(base.Law):
    """Draws from the words of one stream; `branches` collects what was met on the way."""

    def open_unit(self):
        return float(base.unit(self.s(), "double", "open"))

    def met(self, branch):
        self.branches.add(branch)


# ---- bernoulli, geometric ----


def bernoulli(d, p):
    if p == 1:
        d.s()
        return True
    rest = Fraction(p)
    while True:
        word = d.s()
        digits = floor(rest * 2 ** 64)
        if word != digits:
            return word < digits
        rest = rest * 2 ** 64 - digits
        if rest == 0:
            d.met("equal to p")
            return False
        d.met("further digits")


def geometric(d, p):
    e = d.exponential()
    if p == 1:
        return 0
    rate = -core.log1p(-p)
    if p >= 2.0 ** -24:
        return min(floor(e / rate), INT64_MAX)
    d.met("blocks")
    factor, exponent = core.split(rate)
    m = -3 - exponent
    q = floor(e / (factor * 0.125))
    while True:
        r = d.s() >> (64 - m)
        if d.exponential() > float(r) * rate:
            k = q * 2 ** m + r
            if k > INT64_MAX:
                d.met("beyond the type")
            return min(k, INT64_MAX)
        d.met("block, rejected")


# ---- Inversion ----


def from_mass(mass):
    """The mass at 0 and the rest to 1."""
    return mass, 1.0 - mass


def from_log_mass(log_mass):
    if log_mass > -0.6875:
        rest = -core.expm1(log_mass)
        return 1.0 - rest, rest
    return from_mass(core.exp(log_mass))


def by_inversion(d, start, ratio, most):
    mass = start[0] * 2.0 ** 63
    threshold = floor(start[1] * 2.0 ** 63)
    place = d.s() >> 1
    k = 0
    while place < threshold:
        k += 1
        mass = mass * ratio(k)
        threshold -= floor(mass)
        if threshold < 2 ** 31:
            d.met("inversion, sum of the rest")
            term, total, j = mass, 0.0, k
            while True:
                j += 1
                term = term * ratio(j)
                total = total + term
                if not (term > total * 2.0 ** -56 and term > 2.0 ** -60):
                    break
            threshold = floor(total)
    return min(k, most)


# ---- Masses ----

SMALL_REMAINDERS = [float.fromhex(x) for x in (
    "0x1.4c071bcda0a5bp-4", "0x1.52a9b923ea649p-5", "0x1.c579a268d80b3p-6",
    "0x1.54a2662fd78a9p-6", "0x1.10b4e513fcbedp-6", "0x1.c6b167bebdf36p-7",
    "0x1.85d4d612e4a86p-7", "0x1.552805e7b3076p-7", "0x1.2f4871b12ab64p-7")]
ODD = [1 / 3, 1 / 5, 1 / 7, 1 / 9, 1 / 11, 1 / 13, 1 / 15, 1 / 17]


def half_log(c):
    return core.TABLES["log_gamma"]["half_log_two_pi"] + 0.5 * core.log(c)


def stirling_remainder(c):
    if c >= 10:
        i = 1.0 / c
        return i * core.polynomial(core.TABLES["log_gamma"]["stirling"], i * i)
    return SMALL_REMAINDERS[int(c) - 1]


def deviance(c, mean, difference):
    if c == 0:
        return mean
    v = difference / (c + mean)
    if abs(v) < 0.1:
        q = v * v
        series = q * core.polynomial(ODD, q)
        return v * difference + ((2.0 * c) * v) * series
    quotient = c / mean
    log = core.log(quotient) if quotient < 1e300 else core.log(c) - core.log(mean)
    return c * log - difference


def log_poisson(c, mean, difference):
    if c == 0:
        return -mean
    return -(deviance(c, mean, difference) + stirling_remainder(c)) - half_log(c)


def log_poisson_at_mean(c):
    return 0.0 if c == 0 else (0.0 - stirling_remainder(c)) - half_log(c)


# ---- Transformed rejection: poisson, binomial ----


def by_transformed_rejection(d, hat, most, log_mass):
    whole, fraction, shift, a, b, squeeze, scale = hat
    while True:
        u = d.open_unit() - 0.5
        v = d.open_unit()
        side = 0.5 - abs(u)
        x = ((2.0 * a) / side + b) * u + (fraction + shift)
        if not -2.0 ** 62 < x < 2.0 ** 62:
            d.met("rejection, out of range")
            continue
        offset = floor(x)
        k = whole + offset
        if not 0 <= k <= most or offset > 2 ** 62:
            d.met("rejection, out of range")
            continue
        if side >= 0.07 and v <= squeeze:
            d.met("rejection, squeeze")
            return k
        height = (v * scale) / (a / (side * side) + b)
        if core.log(height) <= log_mass(k, float(offset) - fraction):
            d.met("rejection, mass")
            return k
        d.met("rejection, rejected")


def poisson_count(d, mean, most):
    if mean < 10:
        return by_inversion(d, from_log_mass(-mean), lambda k: mean * (1.0 / float(k)), most)
    whole = floor(mean)
    root = math.sqrt(mean)
    b = 0.931 + 2.53 * root
    lift = 1.0 + 0.03 / root
    hat = (whole, mean - float(whole), 0.43, 0.02483 * b - 0.059, b,
           (0.9277 - 3.6224 / (b - 2.0)) / lift - 0.03 / root,
           (1.1239 + 1.1328 / (b - 3.4)) * lift)
    return by_transformed_rejection(
        d, hat, most, lambda k, difference: log_poisson(float(k), mean, difference))


def poisson(d, mean):
    return poisson_count(d, mean, INT64_MAX)


def chance_of_none(n, p):
    if n <= 32 and p >= 2.0 ** -6:
        result, square, left = 1.0, 1.0 - p, n
        while True:
            if left % 2:
                result = result * square
            left //= 2
            if not left:
                return from_mass(result)
            square = square * square
    return from_log_mass(float(n) * core.log1p(-p))


def binomial_count(d, n, p):
    """For p <= 1/2."""
    trials = float(n)
    odds = p / (1.0 - p)
    if trials * p < 10:
        return by_inversion(d, chance_of_none(n, p),
                            lambda k: (((trials + 1.0) - float(k)) * odds) * (1.0 / float(k)), n)
    high, low = core.two_product(trials, p)
    whole = floor(high)
    fraction = (high - float(whole)) + low
    root = math.sqrt(high * (1.0 - p))
    b = 1.15 + 2.53 * root
    hat = (whole, fraction, 0.5, (0.0248 * b - 0.0873) + 0.01 * p, b, 0.92 - 4.2 / b,
           (2.83 + 5.1 / b) * root)

    def cells(k, difference):
        return (log_poisson(k, trials * p, difference)
                + log_poisson(trials - k, trials * (1.0 - p), -difference))

    mode = floor(fraction + p)
    at_mode = cells(float(whole + mode), float(mode) - fraction)
    return by_transformed_rejection(
        d, hat, n, lambda k, difference: cells(float(k), difference) - at_mode)


def binomial(d, n, p):
    return n - binomial_count(d, n, 1.0 - p) if p > 0.5 else binomial_count(d, n, p)


# ---- negative_binomial ----


def unit_gamma(d, shape, law):
    """A draw of `law`, gamma or gamma_draw_log, of scale 1."""
    gammas = second_laws.Laws(d.s, "double")
    result = getattr(gammas, law)(shape, 1.0)
    d.branches |= {"gamma, " + branch for branch in gammas.branches}
    return result


def negative_binomial(d, r, p):
    rate = unit_gamma(d, r, "gamma")
    mean = core.product(rate, (1.0 - p) / p)
    if not mean < 2.0 ** 63:
        d.met("beyond the type")
        return INT64_MAX
    return poisson_count(d, mean, INT64_MAX)


# ---- hypergeometric ----

TWO_ROOT_TWO_OVER_E = float.fromhex("0x1.b72cd3f331398p+0")
THREE_LESS_TWO_ROOT_THREE_OVER_E = float.fromhex("0x1.cc3ebd3bc711ap-1")


def hypergeometric_count(d, population, marked, drawn):
    """For at most half marked and at most half drawn; all are floats of whole numbers."""
    neither = (population - marked) - drawn
    most = int(min(marked, drawn))
    if population == 0:
        d.s()
        return 0
    high, low = core.two_product(marked, drawn)
    whole = floor(high / population)
    of_whole, of_whole_low = core.two_product(float(whole), population)
    fraction = ((high - of_whole) + (low - of_whole_low)) / population
    mean = float(whole) + fraction

    def cells(k, difference):
        return (((log_poisson(k, mean, difference)
                  + log_poisson(marked - k, marked - mean, -difference))
                 + log_poisson(drawn - k, drawn - mean, -difference))
                + log_poisson(neither + k, neither + mean, difference))

    def log_mass_of_none():
        if mean == 0:
            return 0.0
        rest_marked = neither + drawn
        rest_drawn = neither + marked
        if neither == 0:
            d.met("inversion, neither is 0")
            totals = (((log_poisson_at_mean(marked) + log_poisson_at_mean(rest_marked))
                       + log_poisson_at_mean(drawn)) + log_poisson_at_mean(rest_drawn)
                      ) - log_poisson_at_mean(rest_marked + marked)
            return cells(0.0, (0.0 - float(whole)) - fraction) - totals
        deviances = ((deviance(marked, marked - mean, mean) + deviance(drawn, drawn - mean, mean))
                     + deviance(neither, neither + mean, -mean))
        remainders = ((stirling_remainder(rest_marked) - stirling_remainder(population))
                      + (stirling_remainder(rest_drawn) - stirling_remainder(neither)))
        roots = 0.5 * core.log1p(mean / neither)
        return ((remainders + roots) - deviances) - mean

    if mean < 10:
        def ratio(k):
            return ((((marked + 1.0) - float(k)) * (1.0 / float(k)))
                    * (((drawn + 1.0) - float(k)) / (float(k) + neither)))

        return by_inversion(d, from_log_mass(log_mass_of_none()), ratio, most)

    variance = ((mean * ((population - marked) / population))
                * ((population - drawn) / (population - 1.0)))
    width = TWO_ROOT_TWO_OVER_E * math.sqrt(variance + 0.5) + THREE_LESS_TWO_ROOT_THREE_OVER_E
    mode = ((marked + 1.0) / (population + 2.0)) * (drawn + 1.0)
    from_whole = floor(mode - float(whole))
    at_mode = cells(float(whole + from_whole), float(from_whole) - fraction)
    while True:
        x = d.open_unit()
        y = d.open_unit() - 0.5
        offset = floor((fraction + 0.5) + (width * y) / x)
        k = whole + offset
        if not 0 <= k <= most:
            d.met("ratio, out of range")
            continue
        share = cells(float(k), float(offset) - fraction) - at_mode
        if x * (4.0 - x) - 3.0 <= share:
            d.met("ratio, quick")
            return k
        if x * (x - share) >= 1:
            d.met("ratio, quickly rejected")
            continue
        if 2.0 * core.log(x) <= share:
            d.met("ratio, logarithm")
            return k
        d.met("ratio, rejected")


def hypergeometric(d, population, successes, draws):
    def rarer(n):
        return population - n if n > population // 2 else n

    k = hypergeometric_count(d, float(population), float(rarer(successes)), float(rarer(draws)))
    if successes > population // 2:
        k = rarer(draws) - k
    if draws > population // 2:
        k = successes - k
    return k


# ---- zipf ----


def power_integral(x, s):
    log = core.log(x)
    y = (1.0 - s) * log
    if abs(y) < 2.0 ** -30:
        return log * (1.0 + y * 0.5)
    return log * (core.expm1(y) / y)


def power_integral_inverse(a, s):
    t = (1.0 - s) * a
    if abs(t) < 2.0 ** -30:
        return core.exp(a * (1.0 - t * 0.5))
    return core.exp(core.log1p(max(t, -1.0 + 2.0 ** -53)) / (1.0 - s))


def zipf(d, s, n):
    if s == 0:
        return 1 + base.offset(n - 1, d.s)

    def mass(k):
        return core.power(k, -s)

    last = float(n)
    begin = power_integral(1.5, s) - 1.0
    end = power_integral(last + 0.5, s)
    always = 2.0 - power_integral_inverse(power_integral(2.5, s) - mass(2.0), s)
    while True:
        area = end + d.open_unit() * (begin - end)
        x = power_integral_inverse(area, s)
        if x >= 2.0 ** 44:
            word = d.s()
            k = floor(x)
            further = k.bit_length() - 44
            k = (k >> further << further) | word >> (64 - further)
            if k <= n:
                d.met("further digits")
                return k
            d.met("further digits, beyond n")
            continue
        k = float(floor(x + 0.5))
        k = 1.0 if k < 1 else last if k > last else k
        if k - x <= always:
            d.met("near")
            return int(k)
        if area >= power_integral(k + 0.5, s) - mass(k):
            d.met("by area")
            return int(k)
        d.met("rejected")


# ---- Choices ----


def categorical(d, weights):
    outcome, own = alias_table.draw(weights, d.s)
    d.met("own" if own else "alias")
    if 2 ** 64 in alias_table.words_of_outcomes(weights):
        d.met("one takes all")
    return outcome


def weighted_index(d, weights, updates):
    weights = list(weights)
    for i, w in updates:
        weights[i] = w
    leaves = 1
    while leaves < len(weights):
        leaves *= 2
    sums = [0.0] * leaves + weights + [0.0] * (leaves - len(weights))
    for node in range(leaves - 1, 0, -1):
        sums[node] = sums[2 * node] + sums[2 * node + 1]
    place = d.open_unit() * sums[1]
    node = 1
    while node < leaves:
        node *= 2
        if not place < sums[node]:
            if sums[node + 1] > 0:
                place = place - sums[node]
                node += 1
            else:
                d.met("at the very end")
    return node - leaves


# ---- Several dimensions ----


def covariance_factor(covariance):
    """The standard deviations and the columns of L."""
    n = len(covariance)
    tolerance = float(n) * 2.0 ** -45
    sd = [math.sqrt(covariance[i][i]) for i in range(n)]
    rest = [[0.0] * n for _ in range(n)]
    for i in range(n):
        rest[i][i] = 1.0 if sd[i] > 0 else 0.0
        for j in range(i):
            c = covariance[i][j]
            if c != 0:
                size = core.or_zero(core.times(core.split(abs(c)), core.inverse(core.split(sd[i])),
                                               core.inverse(core.split(sd[j]))))
                rest[i][j] = rest[j][i] = 0.0 if size < 2.0 ** -200 else math.copysign(size, c)
    left = list(range(n))
    columns = []
    while left:
        pivot = max(left, key=lambda i: rest[i][i])  # the first of equals
        if not rest[pivot][pivot] > tolerance:
            break
        root = math.sqrt(rest[pivot][pivot])
        left.remove(pivot)
        column = [0.0] * n
        column[pivot] = root
        for i in left:
            entry = rest[i][pivot] / root
            column[i] = 0.0 if abs(entry) < 2.0 ** -100 else entry
        for i in left:
            for j in left:
                rest[i][j] = rest[i][j] - column[i] * column[j]
        columns.append(column)
    return sd, columns


def multivariate_normal(d, mean, covariance):
    sd, columns = covariance_factor(covariance)
    if len(columns) < len(mean):
        d.met("singular")
    x = [0.0] * len(mean)
    for column in columns:
        z = d.normal()
        x = [xi + z * li for xi, li in zip(x, column)]
    result = [m if s == 0 else m + s * xi for m, s, xi in zip(mean, sd, x)]
    if any(y == 0 and s > 0 for y, s in zip(result, sd)):
        d.met("exactly 0")
    return [y if s == 0 else core.into_signed(y) for y, s in zip(result, sd)]


def dirichlet(d, alpha):
    logs = [unit_gamma(d, a, "gamma_draw_log") for a in alpha]
    largest = max(logs)
    x = [core.exp(y - largest) for y in logs]
    total = 0.0
    for share in x:
        total = total + share
    below_one = 1.0 - 2.0 ** -53 if len(x) > 1 else 1.0
    return [min(core.quotient(share, total), below_one) for share in x]


def multinomial(d, n, weights):
    exponent = core.split(max(weights))[1]
    parts = []
    for w in weights:
        part = Fraction(w) / Fraction(2) ** exponent
        parts.append(float(part) if part >= Fraction(1, 2 ** 900) else 0.0)
    after, steps = 0.0, [None] * len(parts)
    for i in reversed(range(len(parts))):
        if parts[i] > 0:
            total = parts[i] + after
            if after == 0:
                steps[i] = "all", 1.0
            elif parts[i] <= after:
                steps[i] = "these", core.quotient(parts[i], total)
            else:
                steps[i] = "others", core.quotient(after, total)
            after = total
    counts, left = [], n
    for step in steps:
        k = 0
        if left and step:
            kind, chance = step
            d.met(kind)
            k = left if kind == "all" else binomial(d, left, chance)
            k = left - k if kind == "others" else k
        counts.append(k)
        left -= k
    return counts


# ---- Vectors ----


class Words:
    """A given list of words."""

    def __init__(self, words):
        self.words, self.position = words, 0

    def __call__(self):
        self.position += 1
        return self.words[self.position - 1]


LAWS = {f.__name__: f for f in (
    bernoulli, geometric, poisson, binomial, negative_binomial, hypergeometric, zipf, categorical,
    weighted_index, multivariate_normal, dirichlet, multinomial)}


def kept(x):
    """A value as the file has it."""
    if isinstance(x, list):
        return [kept(y) for y in x]
    return base.bits(x) if isinstance(x, float) else x


def row(law, number, parameters, count, start=0, words=None):
    """`count` draws from a stream of its own, or from given words."""
    if words is None:
        path = [law, number]
        s = base.Stream.open(20261201, path)
        s.position = start
        result = {"seed": 20261201, "path": path, "word": start}
    else:
        s = Words(words)
        result = {"words": [base.HEX % word for word in words]}
    d = Draw(s)
    result["parameters"] = list(parameters)
    result["values"] = [kept(LAWS[law](d, *parameters)) for _ in range(count)]
    result["position"] = s.position
    result["branches"] = sorted(d.branches)
    return result


def thresholds(law, parameters):
    """Words at both sides of the thresholds of an inversion, found by bisection."""
    def value(place):
        return LAWS[law](Draw(Words([2 * place])), *parameters)

    last = 2 ** 63 - 1
    words, up = [], value(0) < value(last)
    for k in range(*sorted((value(0), value(last)))):
        low, high = 0, last  # k lies between their values
        while high - low > 1:
            middle = (low + high) // 2
            if (value(middle) <= k) == up:
                low = middle
            else:
                high = middle
        words += [2 * low, 2 * low + 1, 2 * high]
    return words


SQUARES = [float(i * i) for i in range(1, 101)]

# Parameters and how many draws are kept of them.
DRAWN = {
    "bernoulli": [((0.02,), 40), ((0.5,), 20), ((1.0,), 3), ((0.0,), 3), ((1e-300,), 3),
                  ((0.999,), 20)],
    "geometric": [((0.5,), 20), ((0.02,), 20), ((1.0,), 3), ((2.0 ** -24,), 10),
                  ((5.9e-8,), 20), ((1e-15,), 20), ((5e-18,), 20)],
    "poisson": [((4.5,), 40), ((0.0,), 3), ((1e-300,), 3), ((0.3,), 10), ((9.999,), 20),
                ((10.0,), 40), ((55.5,), 40), ((1000.0,), 30), ((1e8,), 20), ((1e15,), 20),
                ((1e18,), 20)],
    "binomial": [((100, 0.3), 40), ((0, 0.5), 3), ((7, 0.0), 3), ((7, 1.0), 3), ((32, 0.25), 20),
                 ((33, 0.25), 20), ((20, 0.8), 20), ((1000000, 3e-6), 10), ((21, 0.5), 40),
                 ((1000, 0.97), 30), ((2 ** 53, 1e-300), 3), ((2 ** 53, 0.3), 20),
                 ((2 ** 53, 1e-13), 20), ((10 ** 12, 0.75), 20)],
    "negative_binomial": [((1.0, 0.5), 20), ((2.5, 0.01), 30), ((0.3, 0.2), 30), ((1e-6, 0.5), 10),
                          ((1e9, 1e-6), 20), ((7.0, 1.0), 3), ((40.0, 0.6), 20), ((1.0, 0.99), 20)],
    "hypergeometric": [((1000, 300, 100), 40), ((0, 0, 0), 3), ((1, 1, 0), 3), ((10, 5, 5), 20),
                       ((30, 15, 15), 20), ((60, 20, 15), 20), ((1000, 10, 20), 10),
                       ((1000, 900, 30), 20), ((1000, 100, 800), 20), ((1000, 700, 800), 40),
                       ((2 ** 53, 2 ** 52, 10 ** 6), 20), ((2 ** 53, 2 ** 52, 2 ** 52), 20),
                       ((2 ** 53, 123456789, 987654), 20), ((10 ** 6, 1000, 5000), 10)],
    "zipf": [((1.1, 1000000), 40), ((1.0, 100), 40), ((0.0, 6), 20), ((0.0, 2 ** 63 - 1), 5),
             ((0.5, 10), 30), ((3.5, 1000), 20), ((1e-3, 2 ** 63 - 1), 20), ((1.0, 2 ** 60), 20),
             ((1.0 + 2.0 ** -40, 10 ** 9), 20), ((2.0, 1), 3), ((1e300, 50), 5), ((40.0, 3), 5)],
    "categorical": [(([12.5, 3.0, 0.0, 1e-7],), 40), (([1.0] * 6,), 40), (([7.0],), 3),
                    (([0.0, 2.0, 0.0],), 5), (([1e300, 5e-324, 0.0, 1.0, 1.7e308, 1e307],), 20),
                    ((SQUARES,), 40), (([0.0, 3.0, 0.0, 0.0, 1.0, 1e-3, 0.0, 2.5, 0.0],), 40),
                    (([5e-324, 1.5e-323],), 20)],
    "weighted_index": [(([0.2, 1e-9, 3.0], []), 30), (([0.2, 1e-9, 3.0], [[2, 0.0]]), 20),
                       (([1.0], []), 3), ((SQUARES, []), 40), ((SQUARES, [[99, 1e9], [0, 5e8]]), 20),
                       (([0.1, 0.0, 1e-9, 3.0, 7e5, 2e5, 1.0], []), 30)],
    "multivariate_normal": [
        (([1.0, -2.0, 0.5], [[4.0, 1.2, -0.4], [1.2, 9.0, 2.0], [-0.4, 2.0, 1.0]]), 10),
        (([1.0, 2.0, 0.0], [[2.0, 1.0, 3.0], [1.0, 5.0, 6.0], [3.0, 6.0, 9.0]]), 10),
        (([5.0, -1.0], [[0.0, 0.0], [0.0, 1e-8]]), 5), (([0.0], [[1.0]]), 5),
        (([1e308, 0.0], [[1e300, 3e149], [3e149, 2e-1]]), 5)],
    "dirichlet": [(([0.5, 2.0, 1.0, 7.0],), 10), (([1e-3, 1e-8, 2e-3],), 5), (([3.0],), 3),
                  (([1e-300, 1e300],), 3), (([40.0] * 8,), 4)],
    "multinomial": [((12, [1.0, 2.0, 0.0, 3.0]), 20), ((120, [0.5, 0.3, 0.2]), 20),
                    ((10 ** 12, [0.02, 0.97, 1e-11, 0.01]), 10), ((0, [1.0, 1.0]), 3),
                    ((5, [0.0, 2.0, 0.0]), 3), ((1000, [1e-300, 1e300, 1e300, 2e299]), 10)],
}

# Layer 0, not accepted at once: for the exponential one tail more, for the normal the tail, of which
# these are the lower and the upper one.
TAIL = 0xFFFFFFFFFFFFFF00
UPPER_TAIL = 0xFFFFFFFFFFFFFE00

# Parameters, how many draws, and the words that they are made of.
SCRIPTED = {
    "bernoulli": [((0.02,), 1, [0x051EB851EB851EC0]), ((0.02,), 1, [0x051EB851EB851EBF]),
                  ((1.0,), 2, [M64, 0]), ((1e-300,), 1, [0] * 15 + [0x0AB70FE0]),
                  ((1e-300,), 1, [0] * 15 + [0x0AB70FE1, 0x7C79AC8000000000]),
                  ((1e-300,), 1, [0] * 15 + [0x0AB70FE1, 0x7C79AC7FFFFFFFFF])],
    "geometric": [((5e-18,), 1, [TAIL] * 6 + [0x100, 0, 0x100]),
                  ((1e-15,), 1, [0x100, M64, 0x100, 0, 0x100]), ((0.5,), 1, [TAIL] * 9 + [0x100])],
    "poisson": [((10.0,), 1, [0, M64, M64, M64, 1 << 63, 1 << 63]),
                ((1e18,), 1, [0, M64, M64, M64, 1 << 63, 1 << 63])],
    "binomial": [((100, 0.3), 1, [0, M64, M64, M64, 1 << 63, 1 << 63])],
    "negative_binomial": [((64.0, 1.95e-17), 1, [UPPER_TAIL] + [TAIL] * 4 + [0x100] +
                            [TAIL] * 5 + [0x100, 0])],
    "hypergeometric": [((1000, 300, 100), 1, [0, 0, 0, M64, 1 << 63, 1 << 63])],
    "zipf": [((1.0, 2 ** 60), 1, [0, M64]), ((1.0, 100), 2, [0, M64]),
             ((0.25, 2 ** 63 - 1), 1, [0, M64]),
             ((1.0, 2 ** 60 + 2 ** 15), 1, [0, M64, 1 << 62, 5])],
    "categorical": [(([12.5, 3.0, 0.0, 1e-7],), 5, [0, M64, 1 << 62, 1 << 63, 3 << 62])],
    "weighted_index": [(([0.1, 0.2, 0.9, 0.0], []), 2, [0, M64]),
                       (([0.0, 0.3, 0.7, 0.0], []), 1, [M64])],
    "multivariate_normal": [(([1e308, -1e308], [[1e306, 0.0], [0.0, 2.0 ** -1000]]), 1,
                             [TAIL, 0x100, 0x100, 0x100]),
                            (([0.7869723223795005], [[1.0]]), 1, [0x4000000000000105])],
}

# Where the words at both sides of every threshold are tried.
AT_THRESHOLDS = {
    "poisson": [(0.3,), (1e-5,), (9.999,)],
    "binomial": [(32, 0.25), (33, 0.25), (20, 0.8), (10 ** 6, 3e-6), (2 ** 53, 1e-20)],
    "hypergeometric": [(10, 5, 5), (60, 20, 15), (1000, 990, 20), (2 ** 53, 10 ** 6, 10 ** 7)],
}


def computed():
    result = {}
    for law, cases in DRAWN.items():
        rows = [row(law, i, parameters, count) for i, (parameters, count) in enumerate(cases)]
        rows += [row(law, None, parameters, count, words=words)
                 for parameters, count, words in SCRIPTED.get(law, [])]
        for parameters in AT_THRESHOLDS.get(law, []):
            words = thresholds(law, parameters)
            rows.append(row(law, None, parameters, len(words), words=words))
        result[law] = rows
    return result


def as_text(vectors):
    return "{\n" + ",\n".join(
        '"%s": [\n%s\n]' % (law, ",\n".join(json.dumps(r, sort_keys=True) for r in rows))
        for law, rows in sorted(vectors.items())) + "\n}\n"


def main():
    path = os.path.join(base.GOLDEN, "discrete_vectors.json")
    mine = computed()
    if sys.argv[1:] == ["--write"]:
        with open(path, "w", encoding="ascii") as f:
            f.write(as_text(mine))
        return 0
    with open(path, encoding="ascii") as f:
        kept_rows = json.load(f)
    failures = checks = 0
    for law in sorted(set(mine) | set(kept_rows)):
        ours, theirs = mine.get(law, []), kept_rows.get(law, [])
        if len(ours) != len(theirs):
            print("discrete_vectors.json: %s has %d rows, %d computed" % (law, len(theirs), len(ours)))
            failures += 1
        for a, b in zip(ours, theirs):
            checks += 1
            if a != b:
                failures += 1
                print("%s: kept %s, computed %s" % (law, b, a))
    print("second implementation, discrete laws: %d passed, %d failed" % (checks - failures, failures))
    return 1 if failures or not checks else 0


if __name__ == "__main__":
    sys.exit(main())
