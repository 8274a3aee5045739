#!/usr/bin/env python3
"""The continuous laws, random order and choice of tests/golden/LAWS.md, a second time.

Run without arguments it checks every row of tests/golden/law_vectors.json; with --write it computes
the expected values and writes the file, so that the library (law_vectors_test.cpp) is tested
against this program and not against itself. Every + - * / below is one operation on Python's floats
(binary64), and math.sqrt is the correctly rounded root.
"""

import json
import math
import os
import struct
import sys
from fractions import Fraction

import alias_table
import core_maths as maths
import second_implementation as base
from core_maths import exp, exp_scaled, inverse, log, log1p, product, quotient, shortened, split
from core_maths import times, value

INFINITY = math.inf
LEAST = {"double": 2.0 ** -1022, "float": 2.0 ** -126}
MOST = {"double": sys.float_info.max, "float": (2 - 2.0 ** -23) * 2.0 ** 127}


# ---- Functions of angles ----


def angle_tables():
    with open(os.path.join(base.GOLDEN, "tables.json"), encoding="ascii") as f:
        raw = json.load(f)
    return {name: {field: [tuple(map(float.fromhex, row)) for row in x]
                   if isinstance(x, list) else float.fromhex(x) for field, x in raw[name].items()}
            for name in ("sine_cosine", "arctangent")}


ANGLES = angle_tables()


def sine_cosine(x):
    """Of x turns."""
    t = ANGLES["sine_cosine"]
    i = (x * 128.0 + 1.5 * 2.0 ** 52) - 1.5 * 2.0 ** 52
    d = x - i / 128
    a, e = maths.two_product(t["two_pi"], d)
    a_low = e + d * t["two_pi_rest"]
    q = a * a
    p = a + (a_low + a * q * (-1 / 6 + q * (1 / 120 - q * (1 / 5040))))
    h = q * (0.5 - q * (1 / 24 - q * (1 / 720)))
    s, s_low = t["entries"][int(i) % 128]
    c, c_low = t["entries"][(int(i) + 32) % 128]
    return s + ((s_low - s * h) + c * p), c + ((c_low - c * h) - s * p)


def arctangent_below(s, l):
    d = 0.0 if l == 0 else s / l
    if d < 2.0 ** -1022:
        return 0.0
    if d < 2.0 ** -28:
        return d
    j = 0 if d < 1 / 32 else int(64 * d + 0.5)
    t = j / 64
    h = shortened(l, 7)
    r = d if j == 0 else ((s - t * h) - t * (l - h)) / (l + t * s)
    q = r * r
    p = q * (-1 / 3 + q * (1 / 5 + q * (-1 / 7 + q * (1 / 9 - q * (1 / 11)))))
    a, a_low = ANGLES["arctangent"]["entries"][j]
    return a + (r + (r * p + a_low))


def arctangent(y, x):
    t = ANGLES["arctangent"]
    if y <= x:
        return arctangent_below(y, x)
    return t["half_pi"] + (t["half_pi_rest"] - arctangent_below(x, y))


# ---- The last step of a draw ----


def as_float(x):
    return struct.unpack("<f", struct.pack("<f", x))[0]


def into(x, real):
    """Into range."""
    if abs(x) < LEAST[real]:
        return math.copysign(LEAST[real], x)
    if abs(x) > MOST[real]:
        return math.copysign(MOST[real], x)
    return x if real == "double" else as_float(x)


def up(x, real):
    """The next number above x, subnormal numbers included."""
    _, as_real, as_word, _ = base.FORMATS[real]
    if x == 0:
        return struct.unpack(as_real, struct.pack(as_word, 1))[0]
    n = struct.unpack(as_word, struct.pack(as_real, x))[0]
    return struct.unpack(as_real, struct.pack(as_word, n - 1 if x < 0 else n + 1))[0]


def normal_above(x, real):
    """The next normal number above x (0 is none)."""
    least = LEAST[real]
    if -least < x < least:
        return least
    if x == -INFINITY:
        return -MOST[real]
    above = up(x, real)
    return least if -least < above < least else above


# ---- Laws: each takes the parameters and gives a variate of `self.real` ----


class Laws:
    """The laws of one stream. `branches` collects what was met on the way."""

    def __init__(self, s, real):
        self.s, self.real, self.branches = s, real, set()
        self.samplers = base.Law(s)

    def e(self):
        return self.samplers.exponential()

    def z(self):
        return self.samplers.normal()

    def u(self):
        return float(base.unit(self.s(), "double", "open"))

    def met(self, branch):
        self.branches.add(branch)

    def into(self, x):
        result = into(x, self.real)
        if abs(x) < LEAST[self.real]:
            self.met("below range")
        elif abs(x) > MOST[self.real]:
            self.met("above range")
        return result

    # Location and scale

    def uniform(self, a, b, ends="open"):
        word = self.s() if self.real == "double" else self.s() >> 32
        x = Fraction(a) + (Fraction(b) - Fraction(a)) * base.unit(word, self.real, ends)
        digits = base.FORMATS[self.real][0]
        x = float((-1 if x < 0 else 1) * base.nearest(abs(x), digits))
        if x == a and ends in ("open", "open_closed"):
            self.met("at a")
            return up(a, self.real)
        if x == b and ends in ("open", "closed_open"):
            self.met("at b")
            return -up(-b, self.real)
        return x

    def uniform_closed_open(self, a, b):
        return self.uniform(a, b, "closed_open")

    def uniform_open_closed(self, a, b):
        return self.uniform(a, b, "open_closed")

    def uniform_closed(self, a, b):
        return self.uniform(a, b, "closed")

    def normal(self, mean, sd):
        x = mean + sd * self.z()
        return mean if sd == 0 else self.into(x)

    def exponential(self, rate):
        return self.into(self.e() / rate)

    def laplace(self, location, scale):
        start = self.s.position
        e = self.e()
        after, self.s.position = self.s.position, start
        negative = self.s() & 256  # of the first word
        self.s.position = after
        return self.into(location + scale * (-e if negative else e))

    def gumbel(self, location, scale):
        e = self.e()
        if e < 2.0 ** -8:
            self.met("upper tail")
            while True:
                beyond = self.e()
                if self.e() > 2.0 ** -8 * exp(-beyond):
                    break
                self.met("upper tail, rejected")
            z = 8 * LOG_2 + beyond
        else:
            z = -log(e)
        return self.into(location + scale * z)

    def logistic(self, location, scale):
        u = self.u()
        if 2.0 ** -8 <= u <= 1 - 2.0 ** -8:
            z = log(u / (1 - u))
        else:
            beyond = self.e()
            z = (8 * LOG_2 + beyond) + log1p(-(2.0 ** -8 * exp(-beyond)))
            self.met("lower tail" if u < 0.5 else "upper tail")
            z = -z if u < 0.5 else z
        return self.into(location + scale * z)

    def near_zero(self, fall):
        while True:
            beyond = self.e()
            wait = self.e()
            x = 2.0 ** -8 * exp(-beyond)
            if wait > fall(x):
                return x
            self.met("near 0, rejected")

    def cauchy(self, location, scale):
        above = self.z()
        below = self.z()
        if abs(below) < 2.0 ** -8:
            self.met("near 0")
            below = math.copysign(self.near_zero(lambda x: 0.5 * x * x), below)
        return self.into(location + scale * (above / below))

    # Powers and roots of the exponential and the normal

    def lognormal(self, log_mean, log_sd):
        return self.into(exp(log_mean + log_sd * self.z()))

    def weibull(self, shape, scale):
        return self.into(value(times(split(scale), maths.power_scaled(self.e(), 1 / shape))))

    def pareto(self, scale, shape):
        return self.into(value(times(split(scale), exp_scaled(self.e() / shape))))

    def rayleigh(self, scale):
        e = self.e()
        return self.into(scale * math.sqrt(e + e))

    def maxwell(self, scale):
        e = self.e()
        z = self.z()
        return self.into(scale * math.sqrt((e + e) + z * z))

    # Gamma and its kin

    def gamma_factor(self, shape):
        d, c = gamma_constants(shape)
        while True:
            z = self.z()
            t = z * c
            root = 1 + t
            if root > 0:
                square = z * z
                u = self.u()
                if u < 1 - square * square * 0.0331:
                    return root * root * root
                if log(u) < into(3 * d, "double") * log_beyond_cube(t):
                    self.met("logarithm, series" if abs(t) < 1 / 16 else "logarithm")
                    return root * root * root
                self.met("rejected")
            else:
                self.met("no cube")

    def gamma(self, shape, scale):
        d = gamma_constants(shape + 1 if shape < 1 else shape)[0]
        factor = self.gamma_factor(shape + 1 if shape < 1 else shape)
        if shape < 1:
            self.met("boost")
            e = self.e()
            return self.into(value(times(split(factor), split(d), split(scale),
                                         exp_scaled(-e / shape))))
        x = d * factor * scale
        if x > MOST["double"]:
            self.met("product above range")
            x = value(times(split(factor), split(d), split(scale)))
        return self.into(x)

    def gamma_draw_log(self, shape, scale):
        d = gamma_constants(shape + 1 if shape < 1 else shape)[0]
        x = log(self.gamma_factor(shape + 1 if shape < 1 else shape)) + (log(d) + log(scale))
        if shape < 1:
            self.met("boost")
            x = x - self.e() / shape
        return self.into(x)

    def unit_gamma(self, shape):
        """The factor and the drop."""
        unit = gamma_unit(shape)
        if shape in (0.5, 1, 1.5, 2):
            x = 0.0
            if shape in (0.5, 1.5):
                z = self.z()
                if shape == 0.5 and abs(z) < 2.0 ** -8:
                    self.met("near 0")
                    z = self.near_zero(lambda y: y * y * 0.5)
                x = z * z * 0.5
            if shape >= 1:
                e = self.e()
                if shape == 1 and e < 2.0 ** -8:
                    self.met("near 0")
                    e = self.near_zero(lambda y: y)
                x = x + e
            if shape == 2:
                x = x + self.e()
            return x * (1 / unit), 0.0
        core = shape + 1 if shape < 1 else shape
        factor = self.gamma_factor(core) * (gamma_constants(core)[0] / unit)
        if shape >= 1:
            return factor, 0.0
        self.met("drop")
        return factor, self.e() / shape

    def erlang(self, k, rate):
        factor, _ = self.unit_gamma(float(k))
        return self.into(gamma_unit(k) * factor / rate)

    def chi_squared(self, k):
        factor, drop = self.unit_gamma(half_of(k))
        if drop == 0:
            return self.into(factor * (2.0 if k < 2 else k))
        return self.into(value(times(split(factor * 2), exp_scaled(-drop))))

    def student_t(self, k):
        half = half_of(k)
        z = self.z()
        factor, drop = self.unit_gamma(half)
        t = z * (math.sqrt(half) if half < 1 else 1.0) / math.sqrt(factor)
        if drop == 0:
            return self.into(t)
        size = value(times(split(abs(t)), exp_scaled(0.5 * drop)))
        return self.into(math.copysign(size, t))

    def fisher_f(self, d1, d2):
        scale = (1.0, 0)
        if d2 < 2:
            f, n = split(d2)
            scale = (f, n - 1)
        if d1 < 2:
            f, n = split(d1)
            scale = (scale[0] / f, scale[1] - (n - 1))
        factor1, drop1 = self.unit_gamma(0.5 * d1)
        factor2, drop2 = self.unit_gamma(0.5 * d2)
        ratio = factor1 / factor2
        if drop1 == 0 and drop2 == 0:
            return self.into(ratio * value(scale))
        return self.into(value(times(split(ratio), scale, exp_scaled(drop2 - drop1))))

    def beta(self, a, b):
        if b == 1:
            self.met("power")
            x = exp(-self.e() / a)
        elif a == 1:
            self.met("power from 1")
            x = -maths.expm1(-self.e() / b)
        elif all(y >= 1 or y == 0.5 for y in (a, b)):
            self.met("gammas")
            ratio = gamma_unit(b) / gamma_unit(a)
            g1, _ = self.unit_gamma(a)
            g2, _ = self.unit_gamma(b)
            x = g1 / (g1 + ratio * g2)
        elif a + b <= 1:
            self.met("Johnk")
            x = self.johnk(a, b)
        else:
            self.met("gammas with a drop")
            ratio = gamma_unit(b) / gamma_unit(a)
            g1, drop1 = self.unit_gamma(a)
            g2, drop2 = self.unit_gamma(b)
            x = 1 / (value(times(split(ratio), split(g2 / g1), exp_scaled(drop1 - drop2))) + 1)
        x = self.into(x)
        below_1 = 1 - (2.0 ** -53 if self.real == "double" else 2.0 ** -24)
        if x >= 1:
            self.met("rounds to 1")
        return min(x, below_1)

    def johnk(self, a, b):
        while True:
            x = self.e() / a
            y = self.e() / b
            ratio = exp(-abs(x - y))
            least = x if x < y else y
            if not (least < LOG_2 and exp(-least) * (ratio + 1) > 1):
                return (1.0 if x < y else ratio) / (ratio + 1)
            self.met("rejected")

    # Others

    def inverse_gaussian(self, mean, shape):
        f, n = split(mean)
        g, m = split(shape)
        spread = max(value((f / g, n - m - 1)), 2.0 ** -400)
        z = self.z()
        square = z * z
        if spread > 2.0 ** 400:
            self.met("one root")
            return self.into(shape / square)
        w = square * spread
        s = 1 + (w + math.sqrt(w * (w + 2)))
        if s > 2.0 ** 32:
            self.met("by an exponential")
            greater = self.e() > log(s + 1)
        else:
            greater = self.u() * (s + 1) < 1
        self.met("greater root" if greater else "smaller root")
        return self.into(s * mean if greater else mean / s)

    def von_mises(self, mean, concentration):
        k = concentration
        if k > 2.0 ** 60:
            self.met("narrow")
            top, bottom, q = k * 0.25, 0.125, 0.5 / math.sqrt(k)
        else:
            w = k + k
            root = math.sqrt(1 + w * w)
            difference = 1 + 1 / (root + w)
            top, bottom = (root + 1) * 0.125, difference * 0.125
            q = math.sqrt(difference / ((root + 1) + w))
        while True:
            word = self.s()
            u = float(base.unit(word, "double", "open"))
            sine, cosine = sine_cosine(u * 0.25)
            c = top / (bottom + k * 0.5 * cosine * cosine)
            x = c - 1
            e = self.e()
            if e * c >= x * x:
                break
            if e >= x - log(c):
                self.met("logarithm")
                break
            self.met("rejected")
        angle = 2 * arctangent(q * sine, cosine)
        return self.into(mean + (-angle if word & 256 else angle))

    def triangular(self, lo, mode, hi):
        width = hi - lo

        def share(part):
            return maths.or_zero(times(split(part), inverse(split(width)))) if part > 0 else 0.0

        rising, falling = share(mode - lo), share(hi - mode)
        u = self.u()
        if u < rising:
            self.met("below the mode")
            x = lo + width * math.sqrt(product(u, rising))
        else:
            self.met("above the mode")
            x = hi - width * math.sqrt((1 - u) * falling)
        first, last = up(lo, self.real), -up(-hi, self.real)
        x = self.into(x)
        if not first <= x <= last:
            self.met("at an end")
        return min(max(x, first), last)

    def empirical(self, values):
        return sorted(values)[base.offset(len(values) - 1, self.s)]

    def piecewise_linear(self, points, densities):
        highest = max(densities)
        heights = [quotient(y, highest) for y in densities]
        areas, lines = [], []
        for i in range(len(points) - 1):
            total = heights[i] + heights[i + 1]
            if total > 0:
                share = quotient(points[i + 1] - points[i], points[-1] - points[0])
                areas.append(product(total * 0.5, share))
                lines.append((quotient(heights[i], total), quotient(heights[i + 1], total)))
            else:
                areas.append(0.0)
                lines.append((0.5, 0.5))
        i, _ = alias_table.draw(areas, self.s)
        left, right = lines[i]
        u = self.u()
        t = u / (left + math.sqrt((1 - u) * (left * left) + u * (right * right)))
        x = self.into(points[i] + (points[i + 1] - points[i]) * t)
        if x >= points[i + 1]:
            self.met("at the end")
            return -up(-points[i + 1], self.real)
        return max(x, points[i])

    def truncated_normal(self, mean, sd, lo, hi):
        first, last = normal_above(lo, self.real), -normal_above(-hi, self.real)
        if sd == 0:
            self.z()
            self.met("point")
            return mean

        def over_sd(x, y):
            if math.isinf(x) or math.isinf(y):
                return -INFINITY if x < y else INFINITY
            shrink = 0.25 if max(abs(x), abs(y)) > 2.0 ** 1000 else 1.0
            return (x * shrink - y * shrink) / sd / shrink

        def rate_of(a):
            return into(a, "double") if a > 2.0 ** 30 else (a + math.sqrt(a * a + 4)) * 0.5

        def inside(x):
            return min(max(self.into(x), first), last)

        a, b, width = over_sd(lo, mean), over_sd(hi, mean), over_sd(hi, lo)
        holds = a < 0 < b
        down = not holds and b <= 0
        end, near, far = (hi, -b, -a) if down else (lo, a, b)
        sign = -1.0 if down else 1.0
        if holds:
            narrow = width <= 2 and sd < 2.0 ** 1000
        else:
            narrow = width <= 1 if near <= 0.25 else rate_of(near) * width <= 1
        if narrow:
            self.met("narrow")
            while True:
                u = self.u()
                e = self.e()
                v = u * width
                if e >= ((v + near) * (v + near) * 0.5 if holds else v * (v * 0.5 + near)):
                    return inside(end + sign * (u * (hi - lo)))
                self.met("narrow, rejected")
        if holds or near <= 0.25:
            self.met("normal" if holds else "folded")
            grow = 64.0 if abs(mean) > 2.0 ** 1000 or sd > 2.0 ** 1000 else 1.0
            while True:
                z = self.z() if holds else abs(self.z())
                if near < z < far:
                    return inside((mean / grow + sd / grow * (sign * z)) * grow)
                self.met("normal, rejected")
        self.met("far")
        rate = rate_of(near)
        step = into(sd / rate, "double")
        while True:
            e = self.e()
            if e > rate * width:
                self.met("far, outside")
                continue
            if (e - 1) * (e - 1) <= self.e() * (rate * rate * 2):
                return inside(end + sign * (e * step))
            self.met("far, rejected")

    # Order and choice: whole numbers

    def shuffle(self, n):
        items = list(range(n))
        for i in range(n, 1, -1):
            j = base.offset(i - 1, self.s)
            items[i - 1], items[j] = items[j], items[i - 1]
        return items

    def pick(self, n):
        return base.offset(n - 1, self.s)

    def sample_without_replacement(self, n, k):
        moved = {}
        sample = []
        for i in range(k):
            j = i + base.offset(n - i - 1, self.s)
            sample.append(moved.get(j, j))
            moved[j] = moved.get(i, i)
        return sample


LOG_2 = float.fromhex("0x1.62e42fefa39efp-1")


def half_of(k):
    f, n = split(k)
    return value((f, n - 1))


def gamma_constants(shape):
    d = shape - 1 / 3
    return d, 1 / (3 * math.sqrt(d))


def gamma_unit(shape):
    return 1.0 if shape < 1 else float(shape)


def log_beyond_cube(t):
    if abs(t) < 1 / 16:
        total = 0.0
        for n in range(16, 3, -1):
            total = 1 / n - t * total
        return -(t * t * t * t * total)
    return log1p(t) - (t - t * t * (0.5 - t / 3))


# ---- Vectors ----

# Parameters, the word to begin at, how many draws; "float" where the law is one of floats (its
# parameters are floats then). The rows that begin later than at word 0 reach a rare branch.
ROWS = {
    "uniform": [([-1.5, 7.25], 0, 6), ([1.0, 1.0 + 2.0 ** -51], 0, 6), ([-1e308, 7e307], 0, 6),
                ([0.0, 1e-280], 0, 6), ([1e-3, 1e3], 0, 6), ([-0.5, 3.0], 0, 6, "float"),
                ([2.0, 2.0 + 2.0 ** -21], 0, 6, "float")],
    "uniform.closed_open": [([-1.5, 7.25], 0, 6), ([1.0, 1.0 + 2.0 ** -52], 0, 6),
                            ([-0.5, 3.0], 0, 6, "float")],
    "uniform.open_closed": [([-1.5, 7.25], 0, 6), ([1.0, 1.0 + 2.0 ** -52], 0, 6),
                            ([-0.5, 3.0], 0, 6, "float")],
    "uniform.closed": [([-1.5, 7.25], 0, 6), ([1.0, 1.0 + 2.0 ** -52], 0, 6),
                       ([0.0, 1e-280], 0, 6), ([-0.5, 3.0], 0, 6, "float")],
    "normal": [([-3.7, 12.1], 0, 6), ([1e308, 1e308], 0, 6), ([0.5, 2.25], 0, 6, "float"),
               ([0.0, 2.0 ** 126], 0, 6, "float"), ([0.0, 0.0], 0, 3)],
    "exponential": [([0.3], 0, 6), ([1e-308], 0, 6), ([1e-308], 10, 2), ([1e308], 0, 6),
                    ([0.25], 0, 6, "float"), ([2.0 ** 126], 0, 6, "float"),
                    ([2.0 ** -140], 0, 6, "float")],
    "laplace": [([-1.5, 0.25], 0, 6), ([1e308, 1e308], 0, 6), ([0.5, 2.0], 0, 6, "float")],
    "gumbel": [([10.0, 3.5], 0, 6), ([10.0, 3.5], 570, 2), ([10.0, 3.5], 81889, 2),
               ([-2.0, 0.5], 0, 6, "float")],
    "logistic": [([10.0, 3.5], 0, 6), ([10.0, 3.5], 395, 2), ([10.0, 3.5], 103, 2),
                 ([-2.0, 0.5], 0, 6, "float")],
    "cauchy": [([0.1, 0.001], 0, 6), ([0.1, 0.001], 95, 2), ([-2.0, 0.5], 0, 6, "float"),
               ([0.0, 1e307], 0, 6), ([0.0, 1e307], 3, 2)],
    "lognormal": [([1.2, 0.4], 0, 6), ([0.0, 400.0], 0, 6), ([-3.0, 0.0], 0, 6),
                  ([1.0, 0.5], 0, 6, "float")],
    "weibull": [([1.5, 4000.0], 0, 6), ([0.25, 1e-300], 0, 6), ([0.001, 1.0], 0, 6),
                ([1e300, 7.0], 0, 6), ([1e-300, 7.0], 0, 6), ([1.0, 2.5], 0, 6),
                ([2.5, 3.0], 0, 6, "float")],
    "pareto": [([1.0, 2.5], 0, 6), ([1e-310, 0.01], 0, 6), ([3.0, 1e20], 0, 6),
               ([2.0, 1.5], 0, 6, "float")],
    "rayleigh": [([2.3], 0, 6), ([1e308], 0, 6), ([1e308], 1, 2), ([0.75], 0, 6, "float")],
    "maxwell": [([2.3], 0, 6), ([1e-308], 0, 6), ([0.75], 0, 6, "float")],
    "gamma": [([2.5, 3.0], 0, 6), ([2.5, 3.0], 7, 2), ([2.5, 3.0], 94, 2), ([0.3, 1.0], 0, 6),
              ([0.3, 1.0], 160, 2), ([0.0001, 1.0], 0, 6), ([1.0, 0.2], 0, 6),
              ([1e10, 1e300], 0, 6), ([1000000.0, 0.001], 0, 6), ([1e308, 1e-300], 0, 6),
              ([0.7, 1e-308], 0, 6), ([1e12, 1e-12], 0, 6), ([0.5, 2.0], 0, 6, "float"),
              ([7.5, 0.125], 0, 6, "float")],
    "gamma.draw_log": [([2.5, 3.0], 0, 6), ([2.5, 3.0], 53, 2), ([1e-8, 1e-300], 0, 6),
                       ([1e-8, 1e-300], 282, 2), ([1000000.0, 0.001], 0, 6),
                       ([1000000.0, 0.001], 20, 2), ([0.5, 2.0], 0, 6, "float")],
    "erlang": [([1, 0.2], 0, 6), ([1, 0.2], 822, 2), ([2, 3.5], 0, 6), ([3, 0.001], 0, 6),
               ([3, 0.001], 10, 2), ([3, 0.001], 5, 2), ([4, 1.0], 0, 6),
               ([2 ** 53, 7.0], 0, 6), ([5, 0.5], 0, 6, "float")],
    "chi_squared": [([1.0], 0, 6), ([1.0], 1221, 2), ([2.0], 0, 6), ([2.0], 381514, 2),
                    ([3.0], 0, 6), ([4.0], 0, 6), ([7.5], 0, 6), ([7.5], 33, 2), ([0.2], 0, 6),
                    ([0.2], 77, 2), ([1e-300], 0, 6), ([1e12], 0, 6),
                    ([1e12], 8, 2), ([3.0], 0, 6, "float")],
    "student_t": [([1.0], 0, 6), ([1.0], 654, 2), ([2.0], 0, 6), ([3.0], 0, 6), ([5.5], 0, 6),
                  ([0.01], 0, 6), ([0.01], 96, 2), ([1e12], 0, 6),
                  ([1e12], 8, 2), ([2.5], 0, 6, "float")],
    "fisher_f": [([1.0, 1.0], 0, 6), ([1.0, 1.0], 34, 2), ([3.0, 4.5], 0, 6), ([3.0, 4.5], 10, 2),
                 ([3.0, 4.5], 27, 2), ([0.5, 6.0], 0, 6), ([0.5, 6.0], 322, 2), ([7.0, 0.01], 0, 6),
                 ([0.3, 0.4], 0, 6), ([2.0, 4.0], 0, 6), ([1e-300, 1e300], 0, 6),
                 ([3.0, 5.0], 0, 6, "float")],
    "beta": [([2.3, 1.0], 0, 6), ([1.0, 0.3], 0, 6), ([1.0, 1.0], 0, 6), ([0.5, 0.5], 0, 6),
             ([0.5, 0.5], 938, 2), ([2.5, 3.5], 0, 6), ([2.5, 3.5], 4, 2), ([2.5, 3.5], 32, 2),
             ([1.5, 2.0], 0, 6), ([0.2, 0.3], 0, 6), ([0.7, 0.8], 0, 6), ([0.001, 5.0], 0, 6),
             ([0.001, 5.0], 29, 2), ([5.0, 0.001], 0, 6), ([0.001, 0.01], 0, 6),
             ([1e-300, 1e-290], 0, 6), ([1e12, 300000000000.0], 0, 6),
             ([1e12, 300000000000.0], 4, 2), ([0.25, 0.5], 0, 6, "float"),
             ([64.0, 0.0625], 0, 6, "float"), ([2.0, 3.0], 0, 6, "float")],
    "inverse_gaussian": [([1.0, 1.0], 0, 6), ([1000000000.0, 0.001], 0, 6),
                         ([100000.0, 0.0001], 0, 6), ([1e200, 1e-200], 0, 6),
                         ([0.001, 1000000.0], 0, 6), ([1e-300, 1e300], 0, 6),
                         ([2.0, 0.5], 0, 6, "float")],
    "von_mises": [([0.0, 1.0], 0, 6), ([0.0, 1.0], 4, 2), ([0.0, 1.0], 2, 2), ([1.0, 0.0], 0, 6),
                  ([1.0, 1000000.0], 0, 6), ([3.0, 1e25], 0, 6), ([-2.0, 20.0], 0, 6),
                  ([0.1, 1e-10], 0, 6), ([0.5, 4.0], 0, 6, "float")],
    "triangular": [([0.0, 3.0, 10.0], 0, 6), ([0.0, 0.0, 1.0], 0, 6), ([-1.0, 1.0, 1.0], 0, 6),
                   ([1.0, 1.0000000000000004, 1.0000000000000004], 0, 6),
                   ([0.0, 5e-324, 1.0], 0, 6), ([-1e300, 1e300, 1e305], 0, 6),
                   ([1.0, 2.0, 4.0], 0, 6, "float")],
    "empirical": [([[3.2, 4.1, 2.7, 3.2, -1.0]], 0, 6), ([[7.5]], 0, 6),
                  ([[0.5, 0.25, 2.0]], 0, 6, "float")],
    "piecewise_linear": [([[0.0, 6.0, 9.0, 24.0], [0.0, 1.0, 5.0, 0.5]], 0, 6),
                         ([[0.0, 1.0], [1.0, 1.0]], 0, 6),
                         ([[-1.0, 0.0, 1.0, 2.0, 3.0], [2.0, 0.0, 0.0, 0.0, 0.001]], 0, 6),
                         ([[-1e300, 0.0, 1e305], [1e-310, 3e-310, 0.0]], 0, 6),
                         ([[1.0, 1.0000000000000002, 1.0000000000000009], [1.0, 1.0, 3.0]], 0, 6),
                         ([[0.0, 0.5, 4.0], [0.0, 1.0, 0.25]], 0, 6, "float")],
    "truncated_normal": [([0.0, 1.0, -1.0, 1.0], 0, 6), ([0.0, 1.0, -1.0, 1.0], 17, 2),
                         ([0.0, 1.0, -1.0, 3.0], 0, 6), ([0.0, 1.0, -1.0, 3.0], 8, 2),
                         ([0.0, 1.0, 0.1, "infinity"], 0, 6), ([10.0, 2.0, "-infinity", 9.9], 0, 6),
                         ([0.0, 1.0, 8.0, "infinity"], 0, 6), ([0.0, 1.0, 8.0, "infinity"], 87, 2),
                         ([0.0, 1.0, "-infinity", -3.0], 0, 6), ([0.0, 1.0, 4.0, 5.0], 0, 6),
                         ([0.0, 1.0, 4.0, 5.0], 97, 2), ([0.0, 1.0, -40.000000001, -40.0], 0, 6),
                         ([0.0, 1.0, 2.0, 2.4], 0, 6), ([1.0, 0.0, 0.0, 2.0], 0, 6),
                         ([1e308, 1e307, "-infinity", "infinity"], 0, 6),
                         ([0.0, 0.001, 40.0, "infinity"], 0, 6),
                         ([5.0, 1e305, -1e308, 1e300], 0, 6), ([0.0, 1.0, 0.0, 0.5], 0, 6),
                         ([0.0, 1e-320, 1.0, 2.0], 0, 6),
                         ([100000.0, 1e-5, "-infinity", 100000.0], 0, 6),
                         ([1.0, 0.5, 1.5, 2.5], 0, 6, "float"),
                         ([0.0, 2.0, -1.0, "infinity"], 0, 6, "float"),
                         ([0.0, 1.0, 6.0, "infinity"], 0, 6, "float")],
    "shuffle": [([10], 0, 3), ([1], 0, 3), ([0], 0, 3)],
    "pick": [([7], 0, 6), ([1], 0, 6)],
    "sample_without_replacement": [([20, 10], 0, 3), ([5, 5], 0, 3),
                                   ([2 ** 64 - 1, 6], 0, 3), ([9, 0], 0, 3),
                                   ([2 ** 32 + 1, 4], 0, 3)],
}

# What the rows of a law reach together.
REACHED = {
    "uniform": "at a; at b",
    "uniform.closed_open": "at b",
    "uniform.open_closed": "at a",
    "normal": "above range",
    "exponential": "above range; below range",
    "laplace": "above range",
    "gumbel": "upper tail; upper tail, rejected",
    "logistic": "lower tail; upper tail",
    "cauchy": "above range; near 0",
    "rayleigh": "above range",
    "maxwell": "below range",
    "gamma": "boost; logarithm; logarithm, series; no cube; product above range; rejected",
    "gamma.draw_log": "boost; logarithm; logarithm, series; no cube; rejected",
    "erlang": "logarithm; logarithm, series; near 0; rejected",
    "chi_squared": "drop; logarithm; logarithm, series; near 0; near 0, rejected; no cube; "
                   "rejected",
    "student_t": "drop; logarithm; logarithm, series; near 0; no cube; rejected",
    "fisher_f": "drop; logarithm; logarithm, series; near 0; no cube; rejected",
    "beta": "Johnk; below range; drop; gammas; gammas with a drop; logarithm; logarithm, series; "
            "near 0; no cube; power; power from 1; rejected; rounds to 1",
    "inverse_gaussian": "by an exponential; greater root; one root; smaller root",
    "von_mises": "logarithm; narrow; rejected",
    "triangular": "above the mode; at an end; below the mode",
    "piecewise_linear": "at the end",
    "truncated_normal": "far; far, outside; far, rejected; folded; narrow; narrow, rejected; "
                        "normal; normal, rejected; point",
}


def call(laws, name, parameters):
    return getattr(laws, name.replace(".", "_"))(*[float(x) if isinstance(x, str) else x
                                                   for x in parameters])


def as_stored(x, real):
    if isinstance(x, list):
        return [as_stored(y, real) for y in x]
    return x if isinstance(x, int) else base.bits(x, real)


# Arguments of the functions, and a hundred more each, words of a stream over `points`.
FUNCTIONS = {
    "exp": (maths.exp, [0.0, 1e-300, 40.5, 709.78, 709.79, -708.39, -708.4, -745.2, 1999.0, -1999.0,
                        2000.0, -2000.0, 1e300, -1e300], lambda u: 1400 * u - 700),
    "expm1": (maths.expm1, [0.0, 2.0 ** -54, -(2.0 ** -55), 1e-300, -40.0, -40.1, 40.0, 40.1,
                            800.0],
              lambda u: 80 * u - 40),
    "log_parts": (maths.log_parts, [1.0, 5e-324, 2.0 ** -1022, MOST["double"], 1 - 2.0 ** -53,
                                    1 + 2.0 ** -52, 0.701171875, 1.40234375, 1e300],
                  lambda u: 10 * u),
    "log1p": (maths.log1p, [0.0, 2.0 ** -54, -(2.0 ** -55), -1 + 2.0 ** -53, 1e300],
              lambda u: 4 * u - 1),
    "power": (maths.power, [(2.0, 0.5), (1.0, INFINITY), (0.5, INFINITY), (3.0, 1e300),
                            (3.0, -1e300), (7.0, 1e-300), (1.5, -0.0), (1 + 2.0 ** -52, 2.0 ** 52)],
              lambda u: (10 * u, 600 * u - 300)),
    "sine_cosine": (sine_cosine, [0.0, 0.125, 0.25, 0.5, 0.75, -0.25, 1 / 256, 1e-200, 1e6 + 0.3],
                    lambda u: 4 * u - 2),
    "arctangent": (arctangent, [(0.0, 0.0), (0.0, 1.0), (1.0, 0.0), (1.0, 1.0), (1e-310, 1.0),
                                (1e-9, 1.0), (1 / 32, 1.0), (1e300, 1e299), (1e-300, 1e300)],
                   lambda u: (u, 1 - u)),
    "log_gamma": (maths.log_gamma, [1.0, 2.0, 0.5, 1e-300, 9.999, 10.0, 1e15, 1e300],
                  lambda u: 12 * u),
}


def function_row(name):
    function, arguments, points = FUNCTIONS[name]
    s = base.Stream.open(20261201, ["function", name])
    arguments = arguments + [points(float(base.unit(s(), "double", "open"))) for _ in range(100)]

    def listed(x):
        return list(x) if isinstance(x, tuple) else [x]

    return {"arguments": [[stored_argument(y) for y in listed(x)] for x in arguments],
            "values": [[base.bits(y) for y in listed(function(*listed(x)))] for x in arguments]}


def stored_argument(x):
    return "infinity" if x == INFINITY else x


def computed():
    result = {"function " + name: [function_row(name)] for name in FUNCTIONS}
    for name, rows in ROWS.items():
        result[name] = []
        for index, (parameters, start, count, *real) in enumerate(rows):
            path = [name, index]
            s = base.Stream.open(20261201, path)
            s.position = start
            laws = Laws(s, real[0] if real else "double")
            values = [as_stored(call(laws, name, parameters), laws.real) for _ in range(count)]
            result[name].append({
                "seed": 20261201, "path": path, "word": start, "parameters": parameters,
                "real": laws.real, "values": values, "position": s.position,
                "branches": sorted(laws.branches)})
    return result


def as_json(sections):
    """One row a line."""
    return "{\n" + ",\n".join(
        '"%s": [\n%s\n]' % (name, ",\n".join(json.dumps(row, sort_keys=True) for row in rows))
        for name, rows in sections.items()) + "\n}\n"


def main():
    path = os.path.join(base.GOLDEN, "law_vectors.json")
    mine = computed()
    if sys.argv[1:] == ["--write"]:
        with open(path, "w", encoding="ascii") as f:
            f.write(as_json(mine))
        return 0
    with open(path, encoding="ascii") as f:
        kept = json.load(f)
    failures = checks = 0
    for name, rows in mine.items():
        reached = set().union(*(row.get("branches", []) for row in rows))
        for problem, found in (("rows are missing", len(kept.get(name, [])) != len(rows)),
                               ("branches reached: %s" % sorted(reached),
                                reached != set(REACHED.get(name, "").split("; ")) - {""})):
            if found:
                failures += 1
                print("%s: %s" % (name, problem))
        for ours, theirs in zip(rows, kept.get(name, [])):
            checks += 1
            if ours != theirs:
                failures += 1
                print("%s: kept %s, computed %s" % (name, theirs, ours))
    print("second implementation of laws: %d passed, %d failed" % (checks - failures, failures))
    return 1 if failures or not checks else 0


if __name__ == "__main__":
    sys.exit(main())
