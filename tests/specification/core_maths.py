#!/usr/bin/env python3
"""The core maths of tests/golden/LAWS.md, written again from that page.

Every + - * / below is one operation on Python's floats (binary64, each rounded by itself), and
math.sqrt is the correctly rounded root. Nothing else of the math module takes part but frexp and
ldexp, which are exact here. Tables: tests/golden/tables.json.
"""

import json
import math
import os
import struct
import sys

LEAST = sys.float_info.min  # 2^-1022
MOST = sys.float_info.max


def _tables():
    def real(x):
        return [real(y) for y in x] if isinstance(x, list) else float.fromhex(x)

    path = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "golden", "tables.json")
    with open(path, encoding="ascii") as f:
        raw = json.load(f)
    result = {name: {field: real(x) for field, x in raw[name].items() if field != "first"}
              for name in ("exp", "log", "log_gamma")}
    result["log"]["first"] = int(raw["log"]["first"], 16)
    return result


TABLES = _tables()


def bits_of(x):
    return struct.unpack("<Q", struct.pack("<d", x))[0]


def from_bits(n):
    return struct.unpack("<d", struct.pack("<Q", n))[0]


def shortened(x, count):
    """x with its lowest `count` bits cleared."""
    return from_bits(bits_of(x) >> count << count)


# ---- Scaled numbers: (factor, exponent) ----


def split(x):
    """x > 0 with the factor in [1, 2)."""
    factor, exponent = math.frexp(x)
    return 2 * factor, exponent - 1


def value(x):
    """The double, saturating at the smallest normal and the largest finite number."""
    factor, exponent = x
    place = split(factor)[1] + exponent
    return MOST if place > 1023 else LEAST if place < -1022 else math.ldexp(factor, exponent)


def or_zero(x):
    factor, exponent = x
    return 0.0 if split(factor)[1] + exponent < -1022 else value(x)


def times(*factors):
    factor, exponent = factors[0]
    for f, e in factors[1:]:
        factor, exponent = factor * f, exponent + e
    return factor, exponent


def inverse(x):
    return 1.0 / x[0], -x[1]


def product(a, b):
    return 0.0 if a == 0 or b == 0 else value(times(split(a), split(b)))


def quotient(a, b):
    return 0.0 if a == 0 else value(times(split(a), inverse(split(b))))


def into_signed(x):
    """x among the normal numbers."""
    if LEAST <= abs(x) <= MOST:
        return x
    return math.copysign(MOST if abs(x) > 1 else LEAST, x)


# ---- Error-free sums and products ----


def two_sum(a, b):
    s = a + b
    b_seen = s - a
    a_seen = s - b_seen
    return s, (a - a_seen) + (b - b_seen)


def ordered_two_sum(a, b):
    s = a + b
    return s, b - (s - a)


def halves(x):
    scaled = x * 134217729.0  # 2^27 + 1
    high = scaled - (scaled - x)
    return high, x - high


def two_product(a, b):
    p = a * b
    a1, a2 = halves(a)
    b1, b2 = halves(b)
    return p, (((a1 * b1 - p) + a1 * b2) + a2 * b1) + a2 * b2


# ---- Exponential, logarithm, power ----


def polynomial(coefficients, x):
    total = coefficients[-1]
    for c in reversed(coefficients[:-1]):
        total = total * x + c
    return total


def exp_pieces(x, rest=0.0):
    """v, g, n with e^(x + rest) = v (1 + g) 2^n."""
    t = TABLES["exp"]
    steps = (x * t["steps_per_log"] + 6755399441055744.0) - 6755399441055744.0  # 1.5 * 2^52
    r = (x - steps * t["log_step_high"]) - (steps * t["log_step_low"] - rest)
    q = r * r
    series = q * ((0.5 + r * (1 / 6)) + q * ((1 / 24 + r * (1 / 120)) + q * (1 / 720)))
    n = int(steps)
    v, w = t["powers"][n % 128]
    return v, r + (series + w), n // 128


def exp_scaled(x, rest=0.0):
    if not -2000 < x < 2000:
        return 1.0, 2 ** 20 if x > 0 else -(2 ** 20)
    v, g, n = exp_pieces(x, rest)
    return v + v * g, n


def exp(x):
    return value(exp_scaled(x))


def expm1(x):
    if abs(x) < 2.0 ** -54:
        return x
    if x < -40:
        return -1.0
    if x > 40:
        return exp(x)
    v, g, n = exp_pieces(x)
    p = value((v, n))
    return (p - 1.0) + p * g


def log_parts(x):
    """ln x as the sum of two doubles."""
    t = TABLES["log"]
    factor, exponent = split(x)
    place = bits_of(factor) - t["first"]
    halve = place >> 52
    z = from_bits(bits_of(factor) - (halve << 52))
    c, c_high, c_low = t["entries"][(place >> 45) & 127]
    k = float(exponent + halve)

    z_high = shortened(z, 21)
    r, r_low = ordered_two_sum(z_high * c - 1.0, (z - z_high) * c)
    first, first_low = ordered_two_sum(k * t["two_high"] + c_high, r)
    r_high = shortened(r, 27)
    half = (r_high * r_high) * 0.5
    half_rest = ((r - r_high) * (r + r_high)) * 0.5
    second, second_low = ordered_two_sum(first, -half)
    p = t["polynomial"]
    q = r * r
    cubic = (r * q) * ((p[0] + r * p[1]) + q * ((p[2] + r * p[3]) + q * (p[4] + r * p[5])))
    low = (((k * t["two_low"] + c_low) + (first_low + second_low))
           + ((r_low - r_low * r) - half_rest)) + cubic
    return ordered_two_sum(second, low)


def log(x):
    return log_parts(x)[0]


def log1p(x):
    if abs(x) < 2.0 ** -54:
        return x
    u, e = two_sum(1.0, x)
    high, low = log_parts(u)
    return high + (low + e / u)


def power_scaled(x, y):
    """x^y for x > 0."""
    a, a_low = log_parts(x)
    a_high = shortened(a, 27)
    y_high = shortened(y, 27)
    high = y_high * a_high
    if not abs(high) < 2000:
        return exp_scaled(0.0 if a == 0 else high)
    if abs(high) < 2.0 ** -60:
        return 1.0, 0
    return exp_scaled(high, (y - y_high) * a_high + y * ((a - a_high) + a_low))


def power(x, y):
    return value(power_scaled(x, y))


def log_gamma(x):
    t = TABLES["log_gamma"]
    if x >= 10:
        i = 1.0 / x
        s = i * polynomial(t["stirling"], i * i)
        return ((x - 0.5) * log(x) - x) + (t["half_log_two_pi"] + s)
    above = x if x < 1 else x - 1.0
    factors = x if x < 1 else 1.0
    while above > 1:
        factors = factors * above
        above = above - 1.0
    middle = (above * (above - 1.0)) * polynomial(t["middle"], above - 0.5)
    shift = log(factors)
    return middle - shift if x < 1 else middle + shift
