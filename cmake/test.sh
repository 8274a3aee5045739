#!/bin/sh
# Sets up, builds and runs the tests: sh cmake/test.sh [--slow] [options for ctest]
set -eu

root=$(cd "$(dirname "$0")/.." && pwd)
. "$root/cmake/setup.sh"

slow=OFF
if [ "${1-}" = --slow ]; then
    slow=ON
    shift
fi

# libc++ of any version, with a clang++ that finds it.
has_libcxx() {
    for compiler in clang++ clang++-19; do
        printf '#include <vector>\nint main() {}\n' |
            "$compiler" -x c++ -stdlib=libc++ - -o /dev/null && return
    done
    return 1
}

need_build_tools
need python3 has_command python3
need pkgconf has_command pkg-config
need libgtest-dev has_header gtest/gtest.h
need nlohmann-json3-dev has_header nlohmann/json.hpp
need libboost-dev has_header boost/math/distributions/students_t.hpp
need libgsl-dev has_header gsl/gsl_cdf.h
need libmpfr-dev has_header mpfr.h
need libgmp-dev has_header gmp.h
need libtbb-dev has_header tbb/task_arena.h
need libopenmpi-dev has_command mpicxx
need openmpi-bin has_command mpirun
need doxygen has_command doxygen
need clang has_command clang++
need libc++-dev has_libcxx
need libc++abi-dev has_libcxx
install_missing

configure_and_build "$root/build/test" all -D LEAT_BUILD_TESTS=ON -D LEAT_BUILD_EXAMPLES=ON \
    -D LEAT_EXAMPLES_WITH_OPENMP=ON -D LEAT_EXAMPLES_WITH_TBB=ON -D LEAT_EXAMPLES_WITH_MPI=ON \
    -D LEAT_BUILD_SLOW_TESTS=$slow -D LEAT_WARNINGS_AS_ERRORS="${LEAT_WARNINGS_AS_ERRORS:-OFF}"
ctest --test-dir "$root/build/test" --output-on-failure --parallel "$(jobs)" "$@"
