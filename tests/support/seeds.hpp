// Seeds derived from a test's name, so that none was chosen because it passes.
//
// The environment variable LEAT_TEST_SEED_OFFSET, a whole number, moves every statistical test to
// other seeds: 0, or no such variable, gives the seeds of the suite; each other number gives a
// suite of its own, independent of the rest. It answers the question whether the suite passes only
// by the luck of its seeds.
//
// Beware of the alarm budget: it is that of one run. Offsets 0 to 20 are 21 runs, and may raise a
// false alarm with 21 times the probability: at most 2.1e-5, while one run stays at or below 1e-6.

#ifndef LEAT_TESTS_SUPPORT_SEEDS_HPP
#define LEAT_TESTS_SUPPORT_SEEDS_HPP

#include "leat/streams/source.hpp"
#include "support/alarm_budget.hpp" // name_of_this_test

#include <charconv>
#include <cstdint>
#include <cstdlib>
#include <stdexcept>
#include <string>
#include <string_view>
#include <system_error>

namespace leat_test {

/// The value of LEAT_TEST_SEED_OFFSET; 0 where it is not set. Throws where it is no whole number,
/// so that a slip of the pen does not pass for another set of seeds.
inline std::uint64_t seed_offset() {
    const char* const set = std::getenv("LEAT_TEST_SEED_OFFSET");
    if (set == nullptr) {
        return 0;
    }
    const std::string_view text(set);
    std::uint64_t offset = 0;
    const auto read = std::from_chars(text.data(), text.data() + text.size(), offset);
    if (read.ec != std::errc() || read.ptr != text.data() + text.size()) {
        throw std::invalid_argument("LEAT_TEST_SEED_OFFSET is no whole number: " +
                                    std::string(text));
    }
    return offset;
}

/// The source whose seed is the text "Suite.Test" of the running test, at the seed offset. Every
/// sampler in the test draws from a stream of its own: source_of_this_test().stream("which", 3).
inline leat::source source_of_this_test() {
    const leat::source own{name_of_this_test()};
    const std::uint64_t offset = seed_offset();
    return offset == 0 ? own : own.branch("seed offset", offset);
}

} // namespace leat_test

#endif
