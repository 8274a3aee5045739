#!/bin/sh
# What including leat costs a user: sh bench/include_cost.sh [REPETITIONS]
#
# Times `-fsyntax-only` of one include each, in user seconds, the least of 5 repetitions, beside
# <random> and some headers of the standard library; then the code that one normal from a stream
# adds to a program, in bytes, plain -O2. CXX chooses the compiler.
# Bars: an engine header at most half of <random>, a stream with one law at most the same;
# below 65536 bytes of code.
set -eu

root=$(cd "$(dirname "$0")/.." && pwd)
compiler=${CXX:-c++}
repetitions=${1:-5}
folder=$(mktemp -d)
trap 'rm -r "$folder"' EXIT

# User seconds of the compiler on what stands in $folder/file.cpp: the least of some runs.
least_user_seconds() {
    i=0
    while [ "$i" -lt "$repetitions" ]; do
        # `times` counts what finished children took, on its second line.
        sh -c '"$1" -std=c++20 -fsyntax-only "-I$2/include" "$3/file.cpp"; times' \
            sh "$compiler" "$root" "$folder" | sed -n '2s/^\([0-9]*\)m\([0-9.]*\)s .*/\1 \2/p'
        i=$((i + 1))
    done | awk '{ t = 60 * $1 + $2; if (NR == 1 || t < least) least = t } END { print least }'
}

cost() {
    for header in "$@"; do
        echo "#include $header"
    done >"$folder/file.cpp"
    seconds=$(least_user_seconds)
    [ -n "${random-}" ] || random=$seconds
    awk -v s="$seconds" -v r="$random" -v name="$*" \
        'BEGIN { printf "| `%s` | %.2f | %.2f |\n", name, s, s / r }'
}

echo "$("$compiler" --version | head -n 1)"
echo
echo "| include | user s | of <random> |"
echo "|---|---|---|"
cost "<random>"
cost "<cstdint>"
cost "<vector>"
cost '"leat/engines/lehmer.hpp"'
cost '"leat/engines/xoshiro.hpp"'
cost '"leat/engines/philox.hpp"'
cost '"leat/engines/braid.hpp"'
cost '"leat/streams/source.hpp"'
cost '"leat/streams/source.hpp"' '"leat/distributions/normal.hpp"'
cost '"leat/bulk/fill.hpp"'
cost '"leat/leat.hpp"'
cost "<nlohmann/json.hpp>"
cost '"leat/state/json.hpp"'
echo

# The bytes of code and constants of a program.
program_size() {
    "$compiler" -std=c++20 -O2 "-I$root/include" "$folder/file.cpp" -o "$folder/program"
    size "$folder/program" | awk 'NR == 2 { print $1 }'
}

echo 'int main() { return 0; }' >"$folder/file.cpp"
empty=$(program_size)
cat >"$folder/file.cpp" <<'END'
#include "leat/distributions/normal.hpp"
#include "leat/streams/source.hpp"
int main() {
    leat::stream s = leat::source{1}.stream("one");
    return leat::normal{0, 1}(s) > 0;
}
END
normal=$(program_size)
cat >"$folder/file.cpp" <<'END'
#include "leat/bulk/fill.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/streams/source.hpp"
double values[1000];
int main() {
    leat::stream s = leat::source{1}.stream("one");
    leat::fill(values, leat::normal{0, 1}, s);
    return values[7] > 0;
}
END
filled=$(program_size)
echo "Code of one normal from a stream: $((normal - empty)) bytes; of one fill of normals:" \
    "$((filled - empty)) bytes."
