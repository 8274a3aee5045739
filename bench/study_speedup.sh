#!/bin/sh
# How much faster the Skerry Bank study is on several threads: sh bench/study_speedup.sh [THREADS]
#
# Times the study on one thread and on so many (2 if not given), for each driver of the build, in
# turn, and prints the best of 5 runs each and their ratio. Bar: 1.8 on two threads. Measure on an
# idle machine with that many processors. REPETITIONS and REPLICATIONS (2000) can be set.
set -eu

root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cmake/setup.sh"

threads=${1:-2}
repetitions=${REPETITIONS:-5}
folder=$root/build/study_speedup
configure_and_build "$folder" leat_skerry_bank \
    -D LEAT_BUILD_EXAMPLES=ON -D LEAT_BUILD_TESTS=OFF -D LEAT_BUILD_BENCH=OFF >&2
times=$(mktemp)
trap 'rm -f "$times"' EXIT

run() { # DRIVER THREADS: appends both and the nanoseconds that a run takes
    began=$(date +%s%N)
    "$folder/examples/leat_skerry_bank" --driver "$1" --threads "$2" \
        --replications "${REPLICATIONS:-2000}" --output "$folder/output" >/dev/null
    echo "$1 $2 $(($(date +%s%N) - began))" >>"$times"
}

drivers=""
for driver in jthread openmp tbb; do
    # One that is not in the build is refused with status 2.
    if "$folder/examples/leat_skerry_bank" --driver $driver --replications 2 \
        --output "$folder/output" >/dev/null 2>&1; then
        drivers="$drivers $driver"
    fi
done
i=0
while [ "$i" -lt "$repetitions" ]; do
    for driver in $drivers; do
        run "$driver" 1
        run "$driver" "$threads"
    done
    i=$((i + 1))
done

echo "| driver | 1 thread, s | $threads threads, s | times as fast |"
echo "|---|---|---|---|"
awk '{ key = $1 " " $2; if (!(key in least) || $3 < least[key]) least[key] = $3; names[$1] = 1 }
    END { for (name in names) {
        one = least[name " 1"] / 1e9; many = least[name " '"$threads"'"] / 1e9
        printf "| %s | %.2f | %.2f | %.2f |\n", name, one, many, one / many } }' "$times"
