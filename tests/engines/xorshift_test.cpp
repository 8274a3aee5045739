// xorshift32, xorshift64, xorshift128, xorshift64_star and xorshift128_plus.

#include "leat/engines/xorshift.hpp"
#include "support/linear_engines.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <random> // ISO C++'s own engines as a reference for seed sequences
#include <sstream>
#include <string>
#include <vector>

namespace {

using leat_test::expect_published_jumps;
using leat_test::expect_published_outputs;

// Marsaglia, J. Stat. Software 8(14), 2003, with the paper's seeds and with others.
TEST(xorshift, gives_marsaglias_sequences) {
    expect_published_outputs<leat::xorshift32>("engines.xorshift32-13-17-5.state1");
    expect_published_outputs<leat::xorshift64>("engines.xorshift64.paper");
    expect_published_outputs<leat::xorshift64>("engines.xorshift64-13-7-17.state0");
    expect_published_outputs<leat::xorshift64>("engines.xorshift64-13-7-17.state1");
    expect_published_outputs<leat::xorshift128>("engines.xor128.paper");
    expect_published_outputs<leat::xorshift128>("engines.xor128-11-8-19.state1");
}

// Vigna, ACM TOMS 42(4), 2016, and J. Comput. Appl. Math. 315, 2017.
TEST(xorshift, gives_vignas_scrambled_sequences) {
    expect_published_outputs<leat::xorshift64_star>("engines.xorshift64s-12-25-27.state0");
    expect_published_outputs<leat::xorshift64_star>("engines.xorshift64s-12-25-27.state1");
    expect_published_outputs<leat::xorshift128_plus>("engines.xorshift128p-23-18-5.state0");
    expect_published_outputs<leat::xorshift128_plus>("engines.xorshift128p-23-18-5.state1");
}

// jumps.json, group gf2: states computed by matrix powers and by polynomials outside leat.
TEST(xorshift, jumps_to_the_states_of_the_reference) {
    expect_published_jumps<leat::xorshift32>("jumps.xorshift32.", 7);
    expect_published_jumps<leat::xorshift64>("jumps.xorshift64.", 8);
    expect_published_jumps<leat::xorshift128>("jumps.xor128.", 6);
    expect_published_jumps<leat::xorshift64_star>("jumps.xorshift64s.", 5);
    expect_published_jumps<leat::xorshift128_plus>("jumps.xorshift128p.", 6);
}

// The default seeds of the one-word engines are those of the paper (2463534242 from memory).
TEST(xorshift, starts_from_the_papers_seeds) {
    EXPECT_EQ(leat::xorshift32{}.state()[0], 2463534242u);
    const auto& entry = leat_test::reference_entry("engines.xorshift64.paper");
    LEAT_TEST_REFERENCE(entry);
    EXPECT_EQ(leat::xorshift64{}.state()[0], leat_test::word(entry["parameters"]["seed"]));
}

// A word that is the state is never 0, all others are drawn: the state after zeros everywhere but
// in a word not yet drawn shows that the engines with more words do draw 0.
TEST(xorshift, has_true_ends) {
    static_assert(leat::xorshift32::min() == 1 && leat::xorshift32::max() == 0xFFFFFFFFu);
    static_assert(leat::xorshift64::min() == 1);
    static_assert(leat::xorshift64_star::min() == 1);
    static_assert(leat::xorshift128::min() == 0);
    static_assert(leat::xorshift128_plus::min() == 0);
    leat::xorshift128 four{std::array<std::uint32_t, 4>{0, 1, 0, 0}};
    EXPECT_EQ(four(), 0u);
    leat::xorshift128_plus two{std::array<std::uint64_t, 2>{1, ~std::uint64_t{0}}};
    EXPECT_EQ(two(), 0u);
    // All ones is reached: the preimage of the greatest word, found by rewinding one step.
    leat::xorshift32 last{0xFFFFFFFFu};
    leat::rewind(last, 1);
    EXPECT_EQ(last(), leat::xorshift32::max());
    // A word of xorshift64_star is the state times an odd constant, which has an inverse.
    leat::xorshift64_star star{1};
    std::uint64_t inverse = 2685821657736338717u;
    for (int i = 0; i < 6; ++i) { // Newton's iteration doubles the right bits, from 3
        inverse *= 2 - 2685821657736338717u * inverse;
    }
    const std::uint64_t drawn = star();
    EXPECT_EQ(drawn * inverse, star.state()[0]);
}

/// The words that ISO's mersenne_twister_engine of N words, no bits masked, takes from a sequence.
template <class Word, std::size_t N, class Sequence>
std::vector<std::uint64_t> iso_words(Sequence& q) {
    constexpr std::size_t w = 8 * sizeof(Word);
    std::mersenne_twister_engine<Word, w, N, 1, 0, 1, 0, 1, 0, 1, 0, 1, 0, 1> iso{q};
    std::stringstream text;
    text << iso; // ISO C++ [rand.eng.mers]: the words of the state, in order
    std::vector<std::uint64_t> result(N);
    for (auto& x : result) {
        text >> x;
    }
    return result;
}

template <class Engine>
void expect_seeded_as_iso() {
    using state = typename Engine::state_type;
    std::seed_seq some{2026, 7, 19};
    EXPECT_EQ(Engine{some}.state(),
              leat_test::state_from<state>(
                  iso_words<typename state::value_type, std::tuple_size_v<state>>(some)));
}

struct zero_sequence {
    using result_type = std::uint32_t;
    template <class Iterator>
    void generate(Iterator first, Iterator last) const {
        for (; first != last; ++first) {
            *first = 0;
        }
    }
};

// ISO C++ [rand.eng.mers]: k = ceil(w/32) numbers a word, low first; all zeros become 2^(w-1).
// libstdc++'s mersenne_twister_engine, with as many words and no bits masked, is the reference.
TEST(xorshift, takes_seed_sequences_as_iso_does) {
    expect_seeded_as_iso<leat::xorshift32>();
    expect_seeded_as_iso<leat::xorshift64>();
    expect_seeded_as_iso<leat::xorshift128>();
    expect_seeded_as_iso<leat::xorshift128_plus>();
    zero_sequence zeros;
    EXPECT_EQ(leat::xorshift32{zeros}.state()[0], 0x80000000u);
    EXPECT_EQ(leat::xorshift64{zeros}.state()[0], 0x8000000000000000u);
    EXPECT_EQ((leat::xorshift128{zeros}.state()),
              (std::array<std::uint32_t, 4>{0x80000000u, 0, 0, 0}));
}

// The header: words of 32 bits take the upper half of each splitmix64 output. The outputs for seed
// 1234567 are published.
TEST(xorshift, expands_a_seed_by_splitmix64) {
    const auto& entry = leat_test::reference_entry("engines.xoshiro256pp.filled1234567");
    LEAT_TEST_REFERENCE(entry);
    const auto outputs = leat_test::words(entry["parameters"]["state"]);
    const leat::xorshift128 narrow{1234567};
    for (std::size_t i = 0; i < 4; ++i) {
        EXPECT_EQ(narrow.state()[i], outputs[i] >> 32);
    }
    EXPECT_EQ((leat::xorshift128_plus{1234567}.state()),
              (std::array<std::uint64_t, 2>{outputs[0], outputs[1]}));
}

template <class Callable>
std::string refusal(Callable call) {
    try {
        call();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "not refused";
}

// design.md, promise P5: class, parameter, value and what is allowed.
TEST(xorshift, says_what_it_refuses) {
    EXPECT_EQ(refusal([] { leat::xorshift32{0}; }),
              "leat::xorshift32: seed = 0, must be 1 to 4294967295");
    EXPECT_EQ(refusal([] { leat::xorshift32{4294967296u}; }),
              "leat::xorshift32: seed = 4294967296, must be 1 to 4294967295");
    EXPECT_EQ(refusal([] { leat::xorshift64{0}; }), "leat::xorshift64: seed = 0, must not be 0");
    EXPECT_EQ(refusal([] { leat::xorshift128{std::array<std::uint32_t, 4>{}}; }),
              "leat::xorshift128: state = 0, must not be all zeros");
    leat::xorshift64 kept{5};
    EXPECT_NE(refusal([&] { kept.seed(0); }), "not refused");
    EXPECT_EQ(kept, leat::xorshift64{5});
}

} // namespace
