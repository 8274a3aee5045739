#!/usr/bin/env python3
"""A second implementation of leat's specification, from the page alone.

It shares no code with the library and uses Python's integers, exact fractions and, for the laws,
its floats (binary64, each operation rounded by itself). Run without arguments it checks every vector
of tests/golden/vectors.json; with --write it computes the expected values and writes the file, so
that the library is tested against this program and not against itself. Of the library it takes the
tables alone, tests/golden/tables.json.
"""

import json
import os
import struct
import sys
from fractions import Fraction

GOLDEN = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "golden")
M32 = 0xFFFFFFFF
M64 = 0xFFFFFFFFFFFFFFFF


def siphash128(k0, k1, words):
    """SipHash-2-4 with a 128-bit result (Aumasson and Bernstein 2012) over 64-bit words."""
    v = [k0 ^ 0x736F6D6570736575, k1 ^ 0x646F72616E646F6D ^ 0xEE,
         k0 ^ 0x6C7967656E657261, k1 ^ 0x7465646279746573]

    def rotl(x, n):
        return ((x << n) | (x >> (64 - n))) & M64

    def rounds(n):
        for _ in range(n):
            v[0] = (v[0] + v[1]) & M64
            v[1] = rotl(v[1], 13) ^ v[0]
            v[0] = rotl(v[0], 32)
            v[2] = (v[2] + v[3]) & M64
            v[3] = rotl(v[3], 16) ^ v[2]
            v[0] = (v[0] + v[3]) & M64
            v[3] = rotl(v[3], 21) ^ v[0]
            v[2] = (v[2] + v[1]) & M64
            v[1] = rotl(v[1], 17) ^ v[2]
            v[2] = rotl(v[2], 32)

    for m in list(words) + [((8 * len(words)) & 0xFF) << 56]:
        v[3] ^= m
        rounds(2)
        v[0] ^= m
    v[2] ^= 0xEE
    rounds(4)
    low = v[0] ^ v[1] ^ v[2] ^ v[3]
    v[1] ^= 0xDD
    rounds(4)
    return low, v[0] ^ v[1] ^ v[2] ^ v[3]


def philox4x32(counter, key):
    """Ten rounds (Salmon, Moraes, Dror and Shaw 2011), words least significant first."""
    x = list(counter)
    k = list(key)
    for _ in range(10):
        p0 = x[0] * 0xD2511F53
        p1 = x[2] * 0xCD9E8D57
        x = [(p1 >> 32) ^ x[1] ^ k[0], p1 & M32, (p0 >> 32) ^ x[3] ^ k[1], p0 & M32]
        k = [(k[0] + 0x9E3779B9) & M32, (k[1] + 0xBB67AE85) & M32]
    return x


KINDS = {"stream": 1, "engine": 2, "chunk": 3, "offspring": 4, "indexed variate": 5}


def item(part):
    if isinstance(part, str):
        data = part.encode("utf-8")
        padded = data + b"\0" * (-len(data) % 8)
        return [3 + 256 * len(data)] + [int.from_bytes(padded[i:i + 8], "little")
                                        for i in range(0, len(padded), 8)]
    return [1, part] if part >= 0 else [2, -part]


def place(start, parts, kind):
    """Key and upper word of a path; `start` is the seed's item or a parent's."""
    words = [int.from_bytes(b"leat\1\0\0\0", "little")] + start
    parts = list(parts)
    index = parts.pop() if parts and not isinstance(parts[-1], str) else None
    for part in parts:
        words += item(part)
    form = 0 if index is None else 1 if index >= 0 else 2
    words.append(KINDS[kind] + 256 * form)
    key_bytes = bytes(range(16))
    low, high = siphash128(int.from_bytes(key_bytes[:8], "little"),
                           int.from_bytes(key_bytes[8:], "little"), words)
    return low, (high + abs(index or 0)) & M64


class Stream:
    def __init__(self, key, upper, position=0):
        self.key, self.upper, self.position = key, upper, position

    @classmethod
    def open(cls, seed, path):
        return cls(*place(item(seed), path, "stream"))

    def offspring(self, i):
        return Stream(*place([4, self.key, self.upper], [i], "offspring"))

    def __call__(self):
        b, second = divmod(self.position, 2)
        y = philox4x32([b & M32, b >> 32, self.upper & M32, self.upper >> 32],
                       [self.key & M32, self.key >> 32])
        self.position += 1
        return y[2 * second] | y[2 * second + 1] << 32

    def line(self):
        low, _ = siphash128(0, 0, [1, self.key, self.upper, self.position])
        return "leat-stream 1 key %016x upper %016x word %d sum %08x" % (
            self.key, self.upper, self.position, low & M32)


# ---- Mappings ----

FORMATS = {"double": (53, "<d", "<Q", "%016x"), "float": (24, "<f", "<I", "%08x")}


def drawn_bits(width, values, digit):
    """word64 or word32 from an engine of `values` values; digit() is a word less the smallest."""
    n = 1
    if values & (values - 1) == 0:
        while values ** n < 2 ** width:
            n += 1
        row = sum(digit() * values ** i for i in range(n))
        return row * 2 ** width // values ** n
    while 8 * (values ** n % 2 ** width) > values ** n:
        n += 1
    while True:
        row = sum(digit() * values ** i for i in range(n))
        if row < values ** n - values ** n % 2 ** width:
            return row % 2 ** width


def nearest(x, digits):
    """The fraction x >= 0 rounded to that many binary digits, ties to even, exactly."""
    if x == 0:
        return x
    unit = Fraction(1)
    while x / unit >= 2 ** digits:
        unit *= 2
    while x / unit < 2 ** (digits - 1):
        unit /= 2
    return round(x / unit) * unit  # round() of a fraction takes ties to even


def unit(word, real, ends):
    """The exact value of the mapping; `word` has 64 bits for a double, 32 for a float."""
    digits = FORMATS[real][0]
    width = 64 if real == "double" else 32
    if ends == "open":
        k = word >> (width - digits + 1)
        return Fraction(2 * k + 1, 2 ** digits)
    k = word >> (width - digits)
    if ends == "closed_open":
        return Fraction(k, 2 ** digits)
    if ends == "open_closed":
        return Fraction(k + 1, 2 ** digits)
    return nearest(Fraction(k, 2 ** digits - 1), digits)


def bits(x, real="double"):
    """The representation of a number that fits the format, in hexadecimal."""
    _, as_real, as_word, text = FORMATS[real]
    packed = struct.pack(as_real, float(x))
    assert Fraction(struct.unpack(as_real, packed)[0]) == x
    return text % struct.unpack(as_word, packed)[0]


def offset(last, s):
    """Uniform on 0 .. last; the draws of `below` and `uniform_integer`."""
    if last <= M32:
        width, draw = 32, lambda: s() >> 32
    else:
        width, draw = 64, s
    n = last + 1
    if n == 2 ** width:
        return draw()
    while True:
        product = draw() * n
        if product % 2 ** width >= 2 ** width % n:
            return product >> width


# ---- Laws: every + - * / below is one operation on binary64 ----


def tables():
    def real(x):
        return float.fromhex(x)

    with open(os.path.join(GOLDEN, "tables.json"), encoding="ascii") as f:
        raw = json.load(f)
    result = {"exp": {name: real(raw["exp"][name])
                      for name in ("steps_per_log", "log_step_high", "log_step_low")}}
    result["exp"]["powers"] = [(real(v), real(r)) for v, r in raw["exp"]["powers"]]
    for law in ("normal", "exponential"):
        result[law] = {"tail": real(raw[law]["tail"]),
                       "layers": [(real(w), int(bar, 16)) for w, bar in raw[law]["layers"]],
                       "heights": [real(h) for h in raw[law]["heights"]]}
    return result


TABLES = tables()


def exp(x):
    """e^x for -700 < x < 700."""
    t = TABLES["exp"]
    steps = (x * t["steps_per_log"] + 6755399441055744.0) - 6755399441055744.0  # 1.5 * 2^52
    r = (x - steps * t["log_step_high"]) - steps * t["log_step_low"]
    q = r * r
    series = q * ((0.5 + r * (1 / 6))
                  + q * ((1 / 24 + r * (1 / 120)) + q * (1 / 720)))
    n = int(steps)
    value, rest = t["powers"][n % 128]
    growth = r + (series + rest)
    return (value + value * growth) * 2.0 ** (n // 128)  # the last product is exact


class Law:
    """The two ziggurats. `branches` collects what was met on the way."""

    def __init__(self, s):
        self.s, self.branches = s, set()

    def trial(self, law):
        word = self.s()
        width, bar = TABLES[law]["layers"][word & 255]
        x = float(2 * (word >> 12) + 1) * width
        return word, x, word < bar

    def under_density(self, law, layer, density):
        u = float(unit(self.s(), "double", "open"))
        low, high = TABLES[law]["heights"][layer:layer + 2]
        return low + u * (high - low) < density

    def exponential(self):
        passed = 0.0
        while True:
            word, x, accepted = self.trial("exponential")
            layer = word & 255
            if accepted:
                return passed + x
            if layer == 0:
                self.branches.add("tail")
                passed = passed + TABLES["exponential"]["tail"]
            elif self.under_density("exponential", layer, exp(-x)):
                self.branches.add("wedge")
                return passed + x
            else:
                self.branches.add("wedge, rejected")

    def normal(self):
        while True:
            word, x, accepted = self.trial("normal")
            layer = word & 255
            sign = -1.0 if word & 256 else 1.0
            if accepted:
                return sign * x
            if layer == 0:
                return sign * self.normal_tail()
            if self.under_density("normal", layer, exp((x * x) * -0.5)):
                self.branches.add("wedge")
                return sign * x
            self.branches.add("wedge, rejected")

    def normal_tail(self):
        r = TABLES["normal"]["tail"]
        while True:
            x = self.exponential() / r
            y = self.exponential()
            if y + y > x * x:
                self.branches.add("tail")
                return x + r
            self.branches.add("tail, rejected")


# ---- Vectors ----

HEX = "%016x"

PATHS = [
    (20261201, []),
    (20261201, ["failures", 3, 4]),
    (20261201, ["failures", 3]),
    (20261201, ["failures"]),
    (20261201, [3]),
    (20261201, ["3"]),
    (20261201, ["ab", "c"]),
    (20261201, ["a", "bc"]),
    (20261201, [-1]),
    (20261201, [1]),
    (20261201, [M64]),
    (20261201, [-(2 ** 63)]),
    (20261201, ["a"]),
    (20261201, ["a", 0]),
    (20261201, [""]),
    (20261201, ["", ""]),
    (20261201, ["eight by", 2]),
    (20261201, ["nine byte", 2]),
    (20261201, ["\u00e9", 2]),
    (20261201, [1, 2, 3, 4, 5, 6, 7, 8, 9, -10]),
    ("20261201", ["failures", 3, 4]),
    ("", []),
    (0, []),
    (-1, []),
    (M64, []),
    (1, ["a text of more than sixteen bytes", -3, "gearbox", 12]),
]


def stream_vectors():
    rows = []
    for seed, path in PATHS:
        s = Stream.open(seed, path)
        child, named = s.offspring(5), s.offspring("spare")
        row = {"seed": seed, "path": path, "key": HEX % s.key, "upper": HEX % s.upper,
               "line": s.line(), "offspring_5": child.line(), "offspring_spare": named.line(),
               "words": [HEX % s() for _ in range(5)]}
        s.position = M64 - 2
        row["last_words"] = [HEX % s(), HEX % s()]
        rows.append(row)
    return rows


FAILURES = (20261201, ["failures", 3, 4])


# Number of values, and the smallest. Of 57 values a tenth of the rows is rejected.
ENGINES = [(6, 1), (57, 3), (2, 0), (256, 0), (2 ** 31 - 2, 1), (2 ** 32, 0), (2 ** 32 - 1, 1),
           (2 ** 64 - 1, 1)]


def word_vectors():
    """Words of engines that return `smallest` plus words of a stream modulo their range."""
    rows = []
    for values, smallest in ENGINES:
        s = Stream.open(20261201, ["digits", values])
        row = {"seed": 20261201, "path": ["digits", values], "values": values, "smallest": smallest,
               "word64": [], "word32": []}
        for _ in range(12):
            row["word64"].append(HEX % drawn_bits(64, values, lambda: s() % values))
            row["word32"].append(HEX % drawn_bits(32, values, lambda: s() % values))
        row["position"] = s.position
        rows.append(row)
    return rows


def unit_vectors():
    s = Stream.open(*FAILURES)
    words = [0, M64, 1 << 63, (1 << 63) - 1, 1 << 12, (1 << 12) - 1, 1 << 11, (1 << 11) - 1,
             M64 - (1 << 11), M64 - (1 << 12), 0x00000200FFFFFFFF, 0x000000FF00000000,
             0xFFFFFEFFFFFFFFFF] + [s() for _ in range(20)]
    rows = []
    for word in words:
        row = {"word": HEX % word}
        for real in FORMATS:
            drawn = word if real == "double" else word >> 32
            row[real] = {ends: bits(unit(drawn, real, ends), real)
                         for ends in ("open", "closed_open", "open_closed", "closed")}
        rows.append(row)
    return rows


# lo, hi, whether a word is rejected on the way
RANGES = [
    (1, 6, False),
    (0, 0, False),
    (-5, 994, False),
    (0, 2 ** 31, True),
    (-(2 ** 31), 2 ** 31 - 1, False),
    (0, 2 ** 32 - 2, False),
    (0, 2 ** 32, False),
    (0, 3 * 2 ** 62, True),
    (-(2 ** 62), 2 ** 62, True),
    (-(2 ** 63), 2 ** 63 - 1, False),
    (2 ** 63, 2 ** 64 - 1, False),
    (0, M64, False),
    (0, M64 - 1, False),
]


def uniform_integer_vectors():
    rows = []
    for i, (lo, hi, rejects) in enumerate(RANGES):
        path = ["integers", i]
        s = Stream.open(20261201, path)
        values = [lo + offset(hi - lo, s) for _ in range(12)]
        assert (s.position > 12) == rejects
        rows.append({"seed": 20261201, "path": path, "lo": lo, "hi": hi, "values": values,
                     "position": s.position})
    return rows


def below_vectors():
    rows = []
    for n in (1, 2, 6, 100, 2 ** 31 + 1, 2 ** 32, 2 ** 32 + 1, 2 ** 63 + 1, M64):
        path = ["below", n]
        s = Stream.open(20261201, path)
        values = [offset(n - 1, s) for _ in range(8)]
        rows.append({"seed": 20261201, "path": path, "n": n, "values": values,
                     "position": s.position})
    return rows


# The law's parameters, the word to begin at, how many draws, and the branches they reach.
EXPONENTIAL = [
    ({"rate": 1.0}, 0, 20, []),
    ({"rate": 1.0}, 123, 1, ["wedge, rejected"]),
    ({"rate": 1.0}, 270, 1, ["wedge"]),
    ({"rate": 0.3}, 1400, 4, ["tail"]),
    ({"rate": 1e-9}, 21967, 3, ["wedge", "wedge, rejected"]),
    ({"rate": 1e6}, 24690, 3, ["tail", "wedge"]),
]
NORMAL = [
    ({"mean": 0.0, "sd": 1.0}, 0, 20, []),
    ({"mean": 0.0, "sd": 1.0}, 123, 1, ["wedge"]),
    ({"mean": 0.0, "sd": 1.0}, 445, 1, ["wedge, rejected"]),
    ({"mean": 0.0, "sd": 1.0}, 2133, 1, ["tail"]),
    ({"mean": -3.7, "sd": 12.1}, 2701, 4, ["tail"]),
    ({"mean": 1e9, "sd": 0.001}, 21967, 3, ["wedge", "wedge, rejected"]),
    ({"mean": 10.0, "sd": 1e-3}, 24690, 2, ["tail", "wedge"]),
    ({"mean": 0.0, "sd": 7.0}, 60377, 2, ["tail", "tail, rejected"]),
]


def law_vectors(cases, draw):
    rows = []
    for parameters, start, count, reached in cases:
        path = ["laws", 1]
        s = Stream.open(20261201, path)
        s.position = start
        law = Law(s)
        values = [bits(draw(law, parameters)) for _ in range(count)]
        assert sorted(law.branches) == reached, (parameters, start, sorted(law.branches))
        row = {"seed": 20261201, "path": path, "word": start, "values": values,
               "position": s.position, "branches": reached}
        row.update(parameters)
        rows.append(row)
    return rows


def computed():
    return {
        "streams": stream_vectors(),
        "words": word_vectors(),
        "unit": unit_vectors(),
        "uniform_integer": uniform_integer_vectors(),
        "below": below_vectors(),
        "exponential": law_vectors(EXPONENTIAL, lambda law, p: law.exponential() / p["rate"]),
        "normal": law_vectors(NORMAL, lambda law, p: p["mean"] + p["sd"] * law.normal()),
    }


def as_json(x):
    """JSON with integers beyond 2^53 as they are: readers must keep 64-bit integers."""
    return json.dumps(x, indent=1, sort_keys=True) + "\n"


def main():
    path = os.path.join(GOLDEN, "vectors.json")
    if sys.argv[1:] == ["--write"]:
        with open(path, "w", encoding="ascii") as f:
            f.write(as_json(computed()))
        return 0
    with open(path, encoding="ascii") as f:
        kept = json.load(f)
    mine = computed()
    failures = checks = 0
    for section, rows in mine.items():
        if section not in kept or len(kept[section]) != len(rows):
            print("vectors.json: section %s is missing or of another length" % section)
            failures += 1
            continue
        for ours, theirs in zip(rows, kept[section]):
            checks += 1
            if ours != theirs:
                failures += 1
                print("%s: kept %s, computed %s" % (section, theirs, ours))
    print("second implementation: %d passed, %d failed" % (checks - failures, failures))
    return 1 if failures or not checks else 0


if __name__ == "__main__":
    sys.exit(main())
