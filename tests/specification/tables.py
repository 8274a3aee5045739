#!/usr/bin/env python3
"""The tables that tests/golden/SPECIFICATION.md and LAWS.md refer to, tests/golden/tables.json.

Run without arguments it checks that the file holds what the library's headers hold; with --write it
writes the file from them. Reals stand as hexadecimal floating point texts, bars as hexadecimal words.
(The headers come from tests/reference/make_math_tables.py, which computes all of them at 60 digits.)
"""

import json
import os
import re
import sys

ROOT = os.path.join(os.path.dirname(os.path.abspath(__file__)), "..", "..")
REAL = r"-?0x[0-9a-f.]+p-?\d+|0\.0"
PAIR = r"\{(%s), (%s)\}" % (REAL, REAL)


def header(path):
    with open(os.path.join(ROOT, "include", "leat", *path.split("/")), encoding="ascii") as f:
        return f.read()


def constant(text, name):
    return re.search(r"double %s = (%s);" % (name, REAL), text).group(1)


def rows(text, name, pattern, count):
    body = re.search(r" %s\[%d\] = \{(.*?)\n\};" % (name, count), text, re.DOTALL).group(1)
    found = [list(row) if isinstance(row, tuple) else row for row in re.findall(pattern, body)]
    if len(found) != count:
        raise SystemExit("%s: %d entries read, %d expected" % (name, len(found), count))
    return found


def tables():
    powers = header("core/exponential_table.hpp")
    layers = header("distributions/detail/ziggurat_table.hpp")
    logs = header("core/logarithm_table.hpp")
    gammas = header("core/log_gamma_table.hpp")
    sines = header("core/sine_table.hpp")
    angles = header("core/arctangent_table.hpp")
    result = {"exp": {name: constant(powers, name)
                      for name in ("steps_per_log", "log_step_high", "log_step_low")}}
    result["exp"]["powers"] = rows(powers, "power_of_two_table", PAIR, 128)
    result["log"] = {
        "first": re.search(r"log_first = 0x([0-9a-f]{16});", logs).group(1),
        "two_high": constant(logs, "log_two_high"),
        "two_low": constant(logs, "log_two_low"),
        "polynomial": rows(logs, "log_polynomial", REAL, 6),
        "entries": rows(logs, "logarithm_table", r"\{(%s), (%s), (%s)\}" % (REAL, REAL, REAL), 128),
    }
    result["log_gamma"] = {
        "middle": rows(gammas, "log_gamma_middle", REAL, 24),
        "stirling": rows(gammas, "stirling_series", REAL, 9),
        "half_log_two_pi": constant(gammas, "half_log_two_pi"),
    }
    result["sine_cosine"] = {
        "two_pi": constant(sines, "two_pi"),
        "two_pi_rest": constant(sines, "two_pi_rest"),
        "entries": rows(sines, "sine_table", PAIR, 128),
    }
    result["arctangent"] = {
        "half_pi": constant(angles, "half_pi"),
        "half_pi_rest": constant(angles, "half_pi_rest"),
        "entries": rows(angles, "arctangent_table", PAIR, 65),
    }
    for law in ("normal", "exponential"):
        result[law] = {
            "tail": constant(layers, law + "_tail"),
            "layers": rows(layers, law + "_layers", r"\{(%s), 0x([0-9a-f]{16})u\}" % REAL, 256),
            "heights": rows(layers, law + "_heights", REAL, 257),
        }
    return result


def main():
    path = os.path.join(ROOT, "tests", "golden", "tables.json")
    if sys.argv[1:] == ["--write"]:
        with open(path, "w", encoding="ascii") as f:
            f.write(json.dumps(tables(), sort_keys=True).replace("], ", "],\n") + "\n")
        return 0
    with open(path, encoding="ascii") as f:
        kept = json.load(f)
    if kept != tables():
        print("tables.json does not hold what the headers hold; a change of a table that is there "
              "needs a new major version")
        return 1
    print("tables.json: as the headers")
    return 0


if __name__ == "__main__":
    sys.exit(main())
