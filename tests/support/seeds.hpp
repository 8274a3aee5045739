// Seeds derived from a test's name, so that none was chosen because it passes.

#ifndef LEAT_TESTS_SUPPORT_SEEDS_HPP
#define LEAT_TESTS_SUPPORT_SEEDS_HPP

#include "leat/streams/source.hpp"
#include "support/alarm_budget.hpp" // name_of_this_test

namespace leat_test {

/// The source whose seed is the text "Suite.Test" of the running test. Every sampler in the test
/// draws from a stream of its own: source_of_this_test().stream("which", 3).
inline leat::source source_of_this_test() { return leat::source{name_of_this_test()}; }

} // namespace leat_test

#endif
