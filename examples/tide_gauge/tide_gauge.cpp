// The tide gauge of Skerry Bank harbour, after the migration from rand() that README.md goes
// through.
//
//   leat_tide_gauge [MONTHS [SEED]]      prints a line a month
//
// Every month has a stream of its own: it can be computed alone, and months shared among threads.

#include "gauge.hpp"

#include "leat/streams/source.hpp"

#include <charconv>
#include <cstdint>
#include <cstdio>
#include <cstring>
#include <exception>

namespace {

/// Reads a whole number from `low` on; says what is wrong and returns false where it is none.
template <class Int>
bool read(const char* name, const char* text, Int low, Int& x) {
    const char* const end = text + std::strlen(text);
    Int value{};
    const auto [stopped, fault] = std::from_chars(text, end, value);
    if (fault != std::errc() || stopped != end || value < low) {
        std::fprintf(stderr, "leat_tide_gauge: %s = \"%s\", must be a whole number, %lld or more\n",
                     name, text, static_cast<long long>(low));
        return false;
    }
    x = value;
    return true;
}

int run(int months, std::uint64_t seed) {
    const leat::source study{seed};
    const tide_gauge::instrument gauge;
    std::printf("month rms/mm  >30mm     lost    wakes   top/mm\n");
    for (int month = 0; month < months; ++month) {
        leat::stream s = study.stream("tide gauge", month);
        const tide_gauge::month_result r = observe(gauge, month, s);
        std::printf("%5d %8.2f %8d %8d %8d %8.1f\n", month + 1, r.rms_error, r.hours_off,
                    r.readings_lost, r.wakes, r.top_overstated);
    }
    return 0;
}

} // namespace

int main(int count, char** arguments) {
    int months = 12;
    std::uint64_t seed = 20261201;
    if (count > 3) {
        std::fputs("use: leat_tide_gauge [MONTHS [SEED]]\n", stderr);
        return 2;
    }
    if ((count > 1 && !read("MONTHS", arguments[1], 0, months)) ||
        (count > 2 && !read("SEED", arguments[2], std::uint64_t{0}, seed))) {
        return 2;
    }
    try {
        return run(months, seed);
    } catch (const std::exception& failure) {
        std::fprintf(stderr, "%s\n", failure.what());
        return 1;
    }
}
