// core/gf2.hpp and the characteristic polynomials that the engines' jumps stand on.

#include "leat/core/gf2.hpp"
#include "leat/engines/xoroshiro.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/engines/xoshiro.hpp"
#include "support/linear_engines.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <numeric>
#include <random> // mt19937_64 for arbitrary polynomials
#include <string_view>
#include <vector>

namespace {

using leat::wide_integer;
using leat::detail::characteristic;
using leat_test::plain;
using leat_test::plain_polynomial;

template <class Step>
using ring_of = leat::detail::gf2_ring<typename Step::word, Step::words>;

template <class Step>
typename ring_of<Step>::residue arbitrary(std::mt19937_64& g) {
    typename ring_of<Step>::residue r{};
    for (auto& word : r) {
        word = static_cast<typename Step::word>(g());
    }
    return r;
}

template <class Step>
class characteristic_test : public ::testing::Test {};
using steps =
    ::testing::Types<leat::detail::xorshift32_method, leat::detail::xorshift64_method,
                     leat::detail::xorshift128_method, leat::detail::xorshift64_star_method,
                     leat::detail::xorshift128_plus_method,
                     leat::detail::xoroshiro128_plus_plus_method, leat::detail::xoshiro256_step>;
TYPED_TEST_SUITE(characteristic_test, steps);

// Massey, IEEE Trans. Inf. Theory 15(1), 1969, written again in the plainest way: every state bit,
// from any state, has the derived polynomial as its minimal polynomial.
TYPED_TEST(characteristic_test, is_what_berlekamp_massey_finds) {
    using word = typename TypeParam::word;
    constexpr std::size_t word_bits = 8 * sizeof(word);
    constexpr std::size_t n = word_bits * TypeParam::words;
    const plain_polynomial derived = leat_test::characteristic_polynomial<TypeParam>();
    std::mt19937_64 g{n};
    for (const std::size_t bit : {std::size_t{0}, n / 3, n - 1}) {
        auto state = arbitrary<TypeParam>(g);
        std::vector<int> sequence;
        for (std::size_t i = 0; i < 2 * n; ++i) {
            sequence.push_back(static_cast<int>(state[bit / word_bits] >> bit % word_bits & 1u));
            TypeParam::step(state);
        }
        EXPECT_EQ(leat_test::berlekamp_massey(sequence), derived) << bit;
    }
}

// Cayley and Hamilton: P(T) s = 0, on every unit state and so on all.
TYPED_TEST(characteristic_test, annihilates_every_state) {
    using word = typename TypeParam::word;
    constexpr std::size_t word_bits = 8 * sizeof(word);
    const plain_polynomial p = leat_test::characteristic_polynomial<TypeParam>();
    for (std::size_t bit = 0; bit + 1 < p.size(); ++bit) {
        std::array<word, TypeParam::words> state{};
        state[bit / word_bits] = word{1} << bit % word_bits;
        std::array<word, TypeParam::words> total{};
        for (const int coefficient : p) {
            for (std::size_t i = 0; i < total.size(); ++i) {
                total[i] ^= coefficient != 0 ? state[i] : word{0};
            }
            TypeParam::step(state);
        }
        ASSERT_EQ(total, (std::array<word, TypeParam::words>{})) << bit;
    }
}

// x has the full order 2^n - 1: x^(2^n - 1) = 1, and no prime of it can be left out. The primes are
// those of Fermat's numbers (Euler 1732, Landry 1880, Morrison and Brillhart 1975).
TYPED_TEST(characteristic_test, is_primitive) {
    using ring = ring_of<TypeParam>;
    const ring& r = characteristic<TypeParam>;
    const wide_integer order = wide_integer::power_of_two(ring::degree) - 1;
    EXPECT_EQ(r.power_of_x(order), ring::one());
    wide_integer rest = order;
    for (const char* prime : {"3", "5", "17", "257", "65537", "641", "6700417", "274177",
                              "67280421310721", "59649589127497217", "5704689200685129054721"}) {
        const wide_integer p{std::string_view{prime}};
        if (rest % p == wide_integer{}) {
            rest = rest / p;
            EXPECT_NE(r.power_of_x(order / p), ring::one()) << prime;
        }
    }
    EXPECT_EQ(rest, wide_integer{1}); // the list has them all
}

/// The product modulo P by schoolbook multiplication and division.
plain_polynomial plain_product(const plain_polynomial& a, const plain_polynomial& b,
                               const plain_polynomial& modulus) {
    plain_polynomial wide(a.size() + b.size() - 1, 0);
    for (std::size_t i = 0; i < a.size(); ++i) {
        for (std::size_t j = 0; j < b.size(); ++j) {
            wide[i + j] ^= a[i] & b[j];
        }
    }
    const std::size_t n = modulus.size() - 1;
    for (std::size_t i = wide.size(); i-- > n;) {
        if (wide[i] != 0) {
            for (std::size_t j = 0; j <= n; ++j) {
                wide[i - n + j] ^= modulus[j];
            }
        }
    }
    wide.resize(n);
    return wide;
}

TYPED_TEST(characteristic_test, ring_multiplies_as_the_schoolbook) {
    using ring = ring_of<TypeParam>;
    const ring& r = characteristic<TypeParam>;
    const plain_polynomial p = leat_test::characteristic_polynomial<TypeParam>();
    std::mt19937_64 g{7};
    const typename ring::residue x{2};
    typename ring::residue all_ones{};
    all_ones.fill(static_cast<typename TypeParam::word>(~0ull));
    auto a = all_ones;
    for (int i = 0; i < 20; ++i) {
        const auto b = i == 0 ? all_ones : arbitrary<TypeParam>(g);
        EXPECT_EQ(plain(r.product(a, b)), plain_product(plain(a), plain(b), p));
        EXPECT_EQ(plain(r.square(a)), plain_product(plain(a), plain(a), p));
        EXPECT_EQ(plain(r.times_x(a)), plain_product(plain(a), plain(x), p));
        a = arbitrary<TypeParam>(g);
    }
}

TYPED_TEST(characteristic_test, ring_powers_obey_the_laws_of_exponents) {
    using ring = ring_of<TypeParam>;
    const ring& r = characteristic<TypeParam>;
    const wide_integer m{std::string_view{"31415926535897932384626433832795"}};
    const wide_integer n{std::string_view{"27182818284590452353602874713526"}};
    const auto a = r.power_of_x(m);
    const auto b = r.power_of_x(n);
    const auto both = r.power_of_x(m + n);
    EXPECT_EQ(r.product(a, b), both);
    EXPECT_EQ(r.power_of_x(wide_integer{0}), ring::one());
    EXPECT_EQ(r.power(a, 0), ring::one());
    EXPECT_EQ(r.power(a, 5), r.product(r.product(r.product(a, a), r.product(a, a)), a));
    EXPECT_EQ(r.power(typename ring::residue{2}, 1000003), r.power_of_x(wide_integer{1000003}));
}

/// The number of non-zero coefficients.
template <class Step>
int weight() {
    const plain_polynomial p = leat_test::characteristic_polynomial<Step>();
    return std::accumulate(p.begin(), p.end(), 0);
}

// Blackman and Vigna 2021, tables of parameters.
TEST(characteristic, has_the_published_weights) {
    const auto& entry = leat_test::reference_entry("engines.f2.weights");
    LEAT_TEST_REFERENCE(entry);
    const auto& expected = entry["expected"];
    EXPECT_EQ(weight<leat::detail::xoshiro256_step>(), expected["xoshiro256++"].get<int>());
    EXPECT_EQ(weight<leat::detail::xoroshiro128_plus_plus_method>(),
              expected["xoroshiro128++"].get<int>());
}

/// Whether an entry of engines.json says, among what it was verified with, that the characteristic
/// polynomial has this many non-zero coefficients (Berlekamp-Massey and PARI/GP, outside leat).
bool says_weight(const leat_test::json& entry, int coefficients) {
    const std::string text = " with " + std::to_string(coefficients) + " non-zero coefficients";
    for (const auto& verified : entry.at("verified")) {
        if (verified.get<std::string>().find(text) != std::string::npos) {
            return true;
        }
    }
    return false;
}

TEST(characteristic, has_the_weights_that_others_computed) {
    const auto expect_weight = [](const std::string& id, int coefficients) {
        const auto& entry = leat_test::reference_entry(id);
        LEAT_TEST_REFERENCE(entry);
        EXPECT_TRUE(says_weight(entry, coefficients)) << coefficients;
    };
    expect_weight("engines.xorshift32-13-17-5.state1", weight<leat::detail::xorshift32_method>());
    expect_weight("engines.xorshift64-13-7-17.state1", weight<leat::detail::xorshift64_method>());
    expect_weight("engines.xor128-11-8-19.state1", weight<leat::detail::xorshift128_method>());
    expect_weight("engines.xorshift64s-12-25-27.state1",
                  weight<leat::detail::xorshift64_star_method>());
    expect_weight("engines.xorshift128p-23-18-5.state1",
                  weight<leat::detail::xorshift128_plus_method>());
}

// Orders below the full one are found too: they would show a state bit that does not see the whole
// state. Shift registers of 1 to 30 bits, by the plain algorithm and by the packed one.
TEST(shortest_recurrence, agrees_with_berlekamp_massey_on_any_bits) {
    std::mt19937_64 g{11};
    for (int trial = 0; trial < 200; ++trial) {
        const std::uint64_t taps = g() & ((std::uint64_t{1} << (trial % 30)) - 1);
        std::uint64_t reg = g();
        std::vector<int> bits;
        for (int i = 0; i < 64; ++i) {
            bits.push_back(static_cast<int>(reg & 1u));
            const int next = std::popcount(reg & (taps << 1 | 1u)) & 1;
            reg = (reg & ((std::uint64_t{1} << (trial % 30 + 1)) - 1)) >> 1 |
                  static_cast<std::uint64_t>(next) << (trial % 30);
        }
        std::size_t i = 0;
        const auto found =
            leat::detail::shortest_recurrence<std::uint32_t, 1>([&] { return bits[i++] != 0; });
        ASSERT_EQ(i, bits.size());
        const plain_polynomial expected = leat_test::berlekamp_massey(bits);
        ASSERT_EQ(static_cast<std::size_t>(found.order), expected.size() - 1) << trial;
    }
}

} // namespace
