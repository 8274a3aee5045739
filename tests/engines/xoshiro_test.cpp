// xoshiro256_plus_plus, xoshiro256_plus, xoshiro256_star_star and xoroshiro128_plus_plus.

#include "leat/engines/xoroshiro.hpp"
#include "leat/engines/xoshiro.hpp"
#include "support/linear_engines.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <string>

namespace {

using leat_test::expect_published_jumps;
using leat_test::expect_published_outputs;

// Blackman and Vigna, ACM TOMS 47(4), 2021.
TEST(xoshiro, gives_the_published_sequences) {
    expect_published_outputs<leat::xoshiro256_plus_plus>("engines.xoshiro256pp.state0");
    expect_published_outputs<leat::xoshiro256_plus_plus>("engines.xoshiro256pp.state1");
    expect_published_outputs<leat::xoshiro256_plus>("engines.xoshiro256p.state0");
    expect_published_outputs<leat::xoshiro256_plus>("engines.xoshiro256p.state1");
    expect_published_outputs<leat::xoshiro256_star_star>("engines.xoshiro256ss.state1");
    expect_published_outputs<leat::xoroshiro128_plus_plus>("engines.xoroshiro128pp.state1");
}

// A seed fills the state by splitmix64, as the authors advise.
TEST(xoshiro, fills_its_state_from_a_seed) {
    for (const auto& entry : leat_test::reference_family("engines.xoshiro256pp.filled")) {
        LEAT_TEST_REFERENCE(entry);
        const auto seed = leat_test::word(entry["parameters"]["seed"]);
        leat::xoshiro256_plus_plus plus_plus{seed};
        leat::xoshiro256_star_star star_star{seed};
        const auto state = leat_test::state_from<leat::xoshiro256_plus_plus::state_type>(
            leat_test::words(entry["parameters"]["state"]));
        EXPECT_EQ(plus_plus.state(), state);
        EXPECT_EQ(star_star.state(), state);
        const auto first = leat_test::words(entry["expected"]["first"]);
        EXPECT_EQ(leat_test::draws(plus_plus, first.size()), first);
        const auto other = leat_test::words(entry["expected"]["first_starstar"]);
        EXPECT_EQ(leat_test::draws(star_star, other.size()), other);
    }
}

// jumps.json, group gf2, the published short and long jumps among them.
TEST(xoshiro, jumps_to_the_states_of_the_reference) {
    expect_published_jumps<leat::xoshiro256_plus_plus>("jumps.xoshiro256.", 9);
    expect_published_jumps<leat::xoroshiro128_plus_plus>("jumps.xoroshiro128pp.", 7);
}

// The three scramblers stand on one state, so they jump alike.
TEST(xoshiro, jumps_alike_under_every_scrambler) {
    const std::array<std::uint64_t, 4> start{1, 2, 3, 4};
    leat::xoshiro256_plus_plus plus_plus{start};
    leat::xoshiro256_plus plus{start};
    leat::xoshiro256_star_star star_star{start};
    leat::jump(plus_plus, leat::pow2(192));
    leat::jump(plus, leat::pow2(192));
    leat::jump(star_star, leat::pow2(192));
    EXPECT_EQ(plus.state(), plus_plus.state());
    EXPECT_EQ(star_star.state(), plus_plus.state());
}

/// The four 64-bit words of a published jump polynomial.
std::array<std::uint64_t, 4> hex_words(const leat_test::json& list) {
    std::array<std::uint64_t, 4> words{};
    for (std::size_t i = 0; i < 4; ++i) {
        words[i] = std::stoull(list.at(i).get<std::string>(), nullptr, 16);
    }
    return words;
}

// Blackman and Vigna print the jump polynomials for 2^128 and 2^192 in their code.
TEST(xoshiro, has_the_published_jump_polynomials) {
    const auto& ring = leat::detail::characteristic<leat::detail::xoshiro256_step>;
    for (const unsigned k : {128u, 192u}) {
        const auto& entry =
            leat_test::reference_entry("jumps.xoshiro256.poly.2e" + std::to_string(k));
        LEAT_TEST_REFERENCE(entry);
        EXPECT_EQ(ring.power_of_x(leat::wide_integer::power_of_two(k)),
                  hex_words(entry["expected"]["words_hex"]));
    }
}

// Any word can be drawn, 0 included.
TEST(xoshiro, has_true_ends) {
    static_assert(leat::xoshiro256_plus_plus::min() == 0);
    static_assert(leat::xoshiro256_plus_plus::max() == ~std::uint64_t{0});
    leat::xoshiro256_plus_plus plus_plus{std::array<std::uint64_t, 4>{0, 1, 0, 0}};
    EXPECT_EQ(plus_plus(), 0u);
    leat::xoshiro256_plus plus{std::array<std::uint64_t, 4>{0, 1, 0, 0}};
    EXPECT_EQ(plus(), 0u);
    leat::xoshiro256_star_star star_star{std::array<std::uint64_t, 4>{1, 0, 0, 0}};
    EXPECT_EQ(star_star(), 0u);
}

// A jump of full width in constant evaluation, under the compilers' default limits.
constexpr std::array<std::uint64_t, 4> jumped_by_2_to_128() {
    leat::xoshiro256_plus_plus engine{std::array<std::uint64_t, 4>{
        81985529216486895u, 18364758544493064720u, 2611923443488327891u, 1376283091369227076u}};
    engine.advance(leat::wide_integer::power_of_two(128));
    return engine.state();
}
TEST(xoshiro, jumps_at_compile_time) {
    constexpr auto state = jumped_by_2_to_128();
    const auto& entry = leat_test::reference_entry("jumps.xoshiro256.2e128");
    LEAT_TEST_REFERENCE(entry);
    EXPECT_EQ(state, (leat_test::state_from<std::array<std::uint64_t, 4>>(
                         leat_test::words(entry["expected"]["state"]))));
}

} // namespace
