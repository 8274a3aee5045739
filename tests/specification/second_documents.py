#!/usr/bin/env python3
"""A second implementation of the checksum of saved documents, from the page alone.

It checks every document of tests/golden/documents.json, as Python's own reader gives them, and that
no change of one value passes.
"""

import json
import os
import struct
import sys

from second_implementation import GOLDEN, siphash128


def packed(text):
    """The bytes of a text, eight to a word, the first one lowest."""
    data = text.encode("utf-8")
    padded = data + b"\0" * (-len(data) % 8)
    words = [int.from_bytes(padded[i:i + 8], "little") for i in range(0, len(padded), 8)]
    return [3 + 256 * len(data)] + words


def words_of(value):
    if value is None:
        return [0]
    if isinstance(value, bool):
        return [1 + 256 * int(value)]
    if isinstance(value, (int, float)):
        return [2, int.from_bytes(struct.pack("<d", float(value)), "little")]
    if isinstance(value, str):
        return packed(value)
    if isinstance(value, list):
        return [4 + 256 * len(value)] + [w for entry in value for w in words_of(entry)]
    names = sorted(value, key=lambda name: name.encode("utf-8"))
    return [5 + 256 * len(value)] + [w for name in names
                                     for w in packed(name) + words_of(value[name])]


def checksum(document):
    content = {name: value for name, value in document.items() if name != "checksum"}
    start = int.from_bytes(b"leatjson", "little")
    return "%016x" % siphash128(0, 0, [start] + words_of(content))[0]


def changed(value):
    """The value with one thing changed."""
    if isinstance(value, bool) or value is None:
        return 0
    if isinstance(value, (int, float)):
        return value + 1 if abs(value) < 1e15 else -value
    if isinstance(value, str):
        return value + "0"
    if isinstance(value, list):
        return value[:-1] + [changed(value[-1])] if value else [0]
    return {**value, "one more": 0}


def main():
    with open(os.path.join(GOLDEN, "documents.json"), encoding="ascii") as f:
        documents = json.load(f)
    failures = 0
    for name, document in documents.items():
        if name != document["leat"] or checksum(document) != document["checksum"]:
            failures += 1
            print("%s: kept %s, computed %s" % (name, document["checksum"], checksum(document)))
        for field in document:
            other = {**document, field: changed(document[field])}
            if field != "checksum" and checksum(other) == document["checksum"]:
                failures += 1
                print("%s: another %s passes" % (name, field))
    print("documents: %d read, %d failures" % (len(documents), failures))
    return 1 if failures or not documents else 0


if __name__ == "__main__":
    sys.exit(main())
