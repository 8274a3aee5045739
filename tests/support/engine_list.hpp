// Every engine of leat, for the tests that all of them must pass. A new engine joins by one line in
// `engines`, and one more below where its method forbids states.

#ifndef LEAT_TESTS_SUPPORT_ENGINE_LIST_HPP
#define LEAT_TESTS_SUPPORT_ENGINE_LIST_HPP

#include "leat/compat/historical.hpp"
#include "leat/engines/braid.hpp"
#include "leat/engines/combined_recursive.hpp"
#include "leat/engines/counter.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/lehmer128.hpp"
#include "leat/engines/multiply_with_carry.hpp"
#include "leat/engines/shuffled.hpp"
#include "leat/engines/xoroshiro.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/engines/xoshiro.hpp"

#include <gtest/gtest.h>

#include <cstdint>
#include <string>
#include <vector>

namespace leat_test {

using engines = ::testing::Types<                          //
    leat::minimal_standard,                                //
    leat::minimal_standard_48271,                          //
    leat::minimal_standard_69621,                          //
    leat::lehmer<std::uint64_t, 37, 2305843009213693951u>, // a 64-bit modulus, 2^61 - 1
    leat::lehmer128,                                       //
    leat::mwc_lag4_32,                                     //
    leat::mwc_lag1_32,                                     //
    leat::mwc_lag1_64,                                     //
    leat::mrg32k3a,                                        //
    leat::splitmix64,                                      //
    leat::xorshift32,                                      //
    leat::xorshift64,                                      //
    leat::xorshift128,                                     //
    leat::xorshift64_star,                                 //
    leat::xorshift128_plus,                                //
    leat::xoroshiro128_plus_plus,                          //
    leat::xoshiro256_plus_plus,                            //
    leat::xoshiro256_plus,                                 //
    leat::xoshiro256_star_star,                            //
    leat::xoshiro256_braid,                                //
    leat::philox4x32,                                      //
    leat::philox4x64,                                      //
    leat::iso_c_sample,                                    //
    leat::posix48,                                         //
    leat::additive_feedback31,                             //
    leat::additive_feedback63,                             //
    leat::shuffled<leat::minimal_standard, 256>,           //
    leat::shuffled_by<leat::minimal_standard_48271, leat::minimal_standard, 128>>;

/// What an engine must refuse: seeds, and states in the form of its text (whole words).
struct refusals {
    std::vector<std::uint64_t> seeds;
    std::vector<std::string> states;
};

template <class Engine>
refusals refused_by(const Engine*) {
    return {};
}
template <std::uint32_t multiplier>
refusals refused_by(const leat::lehmer<std::uint32_t, multiplier, 2147483647>*) {
    return {{0, 2147483647, 2147483648, 4294967297}, {"0", "2147483647", "4294967297"}};
}
inline refusals refused_by(const leat::lehmer<std::uint64_t, 37, 2305843009213693951u>*) {
    return {{0, 2305843009213693951, ~0ull}, {"0", "2305843009213693951"}};
}
inline refusals refused_by(const leat::lehmer128*) {
    return {{0, 2, 1ull << 63}, {"0 0", "0 1", "2 18446744073709551615"}};
}
inline refusals refused_by(const leat::philox4x32*) {
    return {{}, {"0 0 0 0 0 0 4", "0 0 0 0 0 4294967296 0"}};
}
inline refusals refused_by(const leat::mwc_lag4_32*) {
    return {{},
            {"0 0 0 0 0", "1 2 3 4 2111119494",
             "4294967295 4294967295 4294967295 4294967295 2111119493", "4294967296 0 0 0 1"}};
}
inline refusals refused_by(const leat::mwc_lag1_32*) {
    return {{}, {"0 0", "1 4294957665", "4294967295 4294957664"}};
}
inline refusals refused_by(const leat::mwc_lag1_64*) {
    return {{}, {"0 0", "1 18446744073709550874", "18446744073709551615 18446744073709550873"}};
}
inline refusals refused_by(const leat::mrg32k3a*) {
    return {{},
            {"0 0 0 1 2 3", "1 2 3 0 0 0", "4294967087 1 1 1 1 1", "1 1 4294967087 1 1 1",
             "1 1 1 4294944443 1 1", "1 1 1 1 1 4294944443"}};
}
inline refusals refused_by(const leat::iso_c_sample*) { return {{}, {"2147483648"}}; }
inline refusals refused_by(const leat::posix48*) { return {{}, {"1 2 65536", "65536 0 0"}}; }
/// `first`, then words of 4: without an odd word the cycle is a shorter one.
inline std::string then_fours(std::string first, int words) {
    for (int i = 1; i < words; ++i) {
        first += " 4";
    }
    return first;
}
inline refusals refused_by(const leat::additive_feedback31*) {
    return {{}, {then_fours("4", 31), then_fours("4294967297", 31)}};
}
inline refusals refused_by(const leat::additive_feedback63*) {
    return {{}, {then_fours("4", 63), then_fours("4294967297", 63)}};
}
template <std::size_t K>
refusals refused_by(const leat::shuffled<leat::minimal_standard, K>*) {
    return {{0, 2147483647, 4294967297}, {}};
}
inline refusals refused_by(const leat::philox4x64*) { return {{}, {"0 0 0 0 0 0 4"}}; }

inline refusals refused_by(const leat::xorshift32*) {
    return {{0, 4294967296, ~0ull}, {"0", "4294967296"}};
}
inline refusals refused_by(const leat::xorshift64*) { return {{0}, {"0"}}; }
inline refusals refused_by(const leat::xorshift64_star*) { return {{0}, {"0"}}; }
inline refusals refused_by(const leat::xorshift128*) {
    return {{}, {"0 0 0 0", "1 4294967296 0 0"}};
}
inline refusals refused_by(const leat::xorshift128_plus*) { return {{}, {"0 0"}}; }
inline refusals refused_by(const leat::xoroshiro128_plus_plus*) { return {{}, {"0 0"}}; }
inline refusals refused_by(const leat::xoshiro256_plus_plus*) { return {{}, {"0 0 0 0"}}; }
inline refusals refused_by(const leat::xoshiro256_plus*) { return {{}, {"0 0 0 0"}}; }
inline refusals refused_by(const leat::xoshiro256_star_star*) { return {{}, {"0 0 0 0"}}; }
inline refusals refused_by(const leat::xoshiro256_braid*) { return {{}, {"0 0 0 0"}}; }

} // namespace leat_test

#endif
