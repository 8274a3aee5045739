#!/bin/sh
# Sets up, builds and runs the Skerry Bank study: sh cmake/demo.sh [its options, such as --help]
set -eu

root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cmake/setup.sh"

need_build_tools
need nlohmann-json3-dev has_header nlohmann/json.hpp
install_missing

configure_and_build "$root/build/demo" leat_skerry_bank \
    -D LEAT_BUILD_EXAMPLES=ON -D LEAT_BUILD_TESTS=OFF -D LEAT_BUILD_BENCH=OFF
exec "$root/build/demo/examples/leat_skerry_bank" "$@"
