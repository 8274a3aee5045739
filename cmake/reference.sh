#!/bin/sh
# Builds the reference, every public thing of leat with its docstring, as HTML: sh cmake/reference.sh
set -eu

root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cmake/setup.sh"

need_build_tools
need doxygen has_command doxygen
install_missing

configure_and_build "$root/build/reference" leat_reference \
    -D LEAT_BUILD_TESTS=OFF -D LEAT_BUILD_EXAMPLES=OFF
echo "$root/build/reference/reference/html/index.html"
