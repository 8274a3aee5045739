#!/bin/sh
# Builds and runs the benchmarks, and prints tables of ratios: sh cmake/bench.sh [NAME...]
#
# NAME is an area: words, uniform, laws (all three where none is given). Every entry runs beside its
# baseline in one program, interleaved at random, several times. The JSON stays in the build folder.
# Flags are those of a plain user, -O2. CXX chooses the compiler; CXXFLAGS adds flags, such as
# -DLEAT_TEST_KERNEL_CEILING=1 for a processor that ends at AVX2 (0: baseline).
# Measure on an idle machine. REPETITIONS (9) and MIN_TIME (0.05 s each) can be set.
set -eu

root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cmake/setup.sh"

need_build_tools
need libbenchmark-dev has_header benchmark/benchmark.h
need libgsl-dev has_header gsl/gsl_rng.h
need python3 has_command python3
install_missing

if [ $# -eq 0 ]; then
    set -- words uniform laws
fi
areas=$*

compiler=${CXX:-c++}
flags="-O2 ${CXXFLAGS:-}"
name=$(basename "$compiler")$(printf '%s' "${CXXFLAGS:-}" | tr -c 'A-Za-z0-9' _)
folder=$root/build/bench_$name
results=""
for area in $areas; do
    configure_and_build "$folder" "leat_bench_$area" -D "CMAKE_CXX_COMPILER=$compiler" \
        -D "CMAKE_CXX_FLAGS_RELEASE=$flags" -D LEAT_BUILD_BENCH=ON -D LEAT_BUILD_TESTS=OFF \
        -D LEAT_BUILD_EXAMPLES=OFF >&2
    "$folder/bench/leat_bench_$area" --benchmark_enable_random_interleaving=true \
        --benchmark_repetitions="${REPETITIONS:-9}" --benchmark_min_time="${MIN_TIME:-0.05}" \
        --benchmark_out="$folder/$area.json" --benchmark_out_format=json >&2
    results="$results $folder/$area.json"
done

echo "Machine: $(sed -n 's/^model name[^:]*: //p' /proc/cpuinfo 2>/dev/null | sort -u | head -n 1)," \
    "$(jobs) processors, $(uname -sm)"
echo "Compiler: $("$compiler" --version | head -n 1); flags: $flags"
echo
# shellcheck disable=SC2086 # a list of files
python3 "$root/bench/ratios.py" $results
