#include "drivers.hpp"

// Which are built is for the build to say: see programs.cmake.
#ifndef SKERRY_BANK_WITH_OPENMP
#define SKERRY_BANK_WITH_OPENMP 0
#endif
#ifndef SKERRY_BANK_WITH_TBB
#define SKERRY_BANK_WITH_TBB 0
#endif

namespace skerry {

std::span<const thread_driver> thread_drivers() {
    static constexpr thread_driver all[] = {
        {"jthread", run_on_jthread, "nothing"},
#if SKERRY_BANK_WITH_OPENMP
        {"openmp", run_on_openmp, "a compiler with OpenMP"},
#else
        {"openmp", nullptr, "a compiler with OpenMP"},
#endif
#if SKERRY_BANK_WITH_TBB
        {"tbb", run_on_tbb, "the library TBB"},
#else
        {"tbb", nullptr, "the library TBB"},
#endif
    };
    return all;
}

} // namespace skerry
