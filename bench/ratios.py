#!/usr/bin/env python3
"""Prints tables of ratios from Google Benchmark's JSON: python3 ratios.py FILE...

Benchmarks are called WORK/ENTRY. The baseline of a work is its entry from <random>, else the one
that was registered first; the limit is memset. Times are the least of the repetitions, for whatever
else the machine does only adds to them; the spread is how far the median lies above the least.
"""

import json
import statistics
import sys


def read(paths):
    """{work: {entry: [ns an element of each repetition]}}, in the order of the files."""
    works = {}
    for path in paths:
        with open(path, encoding="ascii") as file:
            runs = json.load(file)["benchmarks"]
        runs = [r for r in runs if r.get("run_type") == "iteration" and "items_per_second" in r]
        # Interleaving shuffles them; family_index is the order of registration.
        for run in sorted(runs, key=lambda r: r["family_index"]):
            work, entry = run["name"].removesuffix("/real_time").split("/", 1)
            times = works.setdefault(work, {}).setdefault(entry, [])
            times.append(1e9 / run["items_per_second"])
    return works


def is_standard(entry):
    return entry.startswith("std::") or entry == "<random>"


def table(work, entries):
    baseline = next((e for e in entries if is_standard(e)), next(iter(entries)))
    best = {entry: min(times) for entry, times in entries.items()}
    limit = best.get("memset")
    heads = [work, "ns each", f"times as fast as {baseline}"]
    heads += ["share of memset's speed"] if limit else []
    heads += ["spread"]
    print("| " + " | ".join(heads) + " |")
    print("|" + "---|" * len(heads))
    for entry, times in entries.items():
        ns = best[entry]
        cells = [entry, f"{ns:.3g}", f"{best[baseline] / ns:.2f}"]
        cells += [f"{limit / ns:.2f}"] if limit else []
        cells += [f"{statistics.median(times) / ns - 1:.0%}"]
        print("| " + " | ".join(cells) + " |")
    print()


def main():
    for work, entries in read(sys.argv[1:]).items():
        table(work, entries)


if __name__ == "__main__":
    main()
