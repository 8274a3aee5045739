#!/usr/bin/env python3
"""A second implementation of leat's specification, from the page alone.

It shares no code with the library and uses nothing but Python's integers and exact fractions. Run
without arguments it checks every vector of tests/golden/vectors.json that it covers; with --write
it computes the expected values and writes the file, so that the library is tested against this
program and not against itself.
"""

import json
import os
import sys
from fractions import Fraction

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


def computed():
    return {"streams": stream_vectors()}


def as_json(x):
    """JSON with integers beyond 2^53 as they are: readers must keep 64-bit integers."""
    return json.dumps(x, indent=1, sort_keys=True) + "\n"


def main():
    path = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "golden", "vectors.json")
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
