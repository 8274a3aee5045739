// Lehmer engines and lehmer128 against published values and against libstdc++.

#include "leat/engines/lehmer.hpp"
#include "leat/engines/lehmer128.hpp"

#include "leat/core/modular.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <random> // libstdc++'s linear_congruential_engine, a running reference
#include <string>
#include <vector>

namespace {

using leat_test::word;
using leat_test::words;

template <std::uint32_t a, std::uint32_t m = 2147483647>
using lehmer32 = leat::lehmer<std::uint32_t, a, m>;

/// The entries of one multiplier modulo 2^31 - 1: first10 and, where there is one, x10000.
template <std::uint32_t a>
void expect_published() {
    const std::string family = "engines.lehmer." + std::to_string(a) + ".";
    for (const auto& entry : leat_test::reference_family(family)) {
        LEAT_TEST_REFERENCE(entry);
        const auto& expected = entry["expected"];
        if (expected.contains("value")) {
            EXPECT_EQ(leat_test::nth_draw(lehmer32<a>{1}, 10000), word(expected["value"]));
        } else if (expected.contains("first_from_1")) {
            lehmer32<a> one{1};
            EXPECT_EQ(leat_test::draws(one, 10), words(expected["first_from_1"]));
            lehmer32<a> other{123456789};
            EXPECT_EQ(leat_test::draws(other, 10), words(expected["first_from_123456789"]));
        } else {
            // Schrage's decomposition m = a q + r: an identity of the entry, not of our method.
            ASSERT_TRUE(expected.contains("q"));
            EXPECT_EQ(a * word(expected["q"]) + word(expected["r"]), 2147483647u);
            EXPECT_EQ(word(expected["r"]) < word(expected["q"]),
                      expected["r_less_than_q"].template get<bool>());
        }
    }
}

// Source: the entries lehmer.* of engines.json with the modulus 2^31 - 1.
TEST(lehmer, gives_the_published_values) {
    expect_published<16807>();
    expect_published<48271>();
    expect_published<69621>();
    expect_published<39373>();
    expect_published<742938285>();
    expect_published<950706376>();
    expect_published<1226874159>();
    expect_published<62089911>();
    expect_published<1343714438>();
    expect_published<630360016>();
    expect_published<397204094>();
    expect_published<41358>();
}

template <class E>
void expect_component(const char* id) {
    const auto& entry = leat_test::reference_entry(id);
    LEAT_TEST_REFERENCE(entry);
    E e{word(entry["parameters"]["seed"])};
    EXPECT_EQ(leat_test::draws(e, 10), words(entry["expected"]["first"]));
    EXPECT_EQ(leat_test::nth_draw(E{1}, 10000), word(entry["expected"]["x10000"]));
    E far{1};
    far.discard(9999);
    EXPECT_EQ(far(), word(entry["expected"]["x10000"]));
}

// Source: the entries lehmer.40014, lehmer.40692 and lcg.randu of engines.json: other moduli, one
// of them a power of two.
TEST(lehmer, takes_other_moduli) {
    expect_component<lehmer32<40014, 2147483563>>("engines.lehmer.40014");
    expect_component<lehmer32<40692, 2147483399>>("engines.lehmer.40692");
    expect_component<lehmer32<65539, 2147483648>>("engines.lcg.randu");
}

/// Same values as ISO's engine, from many seeds and from seed sequences.
template <class Ours, class Iso>
void expect_same_as_iso() {
    for (const std::uint32_t seed : {1u, 2u, 16807u, 20261201u, 2147483646u}) {
        Ours ours{seed};
        Iso iso{seed};
        for (int i = 0; i < 1000; ++i) {
            ASSERT_EQ(ours(), iso()) << seed << ' ' << i;
        }
    }
    for (std::uint32_t i = 0; i < 200; ++i) {
        std::seed_seq q{i, i * i};
        Ours ours{q};
        Iso iso{q};
        ASSERT_EQ(ours(), iso()) << i;
    }
}

// Source: libstdc++, which implements ISO C++ [rand.eng.lcong] and [rand.predef].
TEST(lehmer, agrees_with_the_standard_library) {
    expect_same_as_iso<leat::minimal_standard, std::minstd_rand0>();
    expect_same_as_iso<leat::minimal_standard_48271, std::minstd_rand>();
    expect_same_as_iso<lehmer32<69621>,
                       std::linear_congruential_engine<std::uint32_t, 69621, 0, 2147483647>>();
    // Above 2^32 the seed sequence gives two words (k = 2).
    expect_same_as_iso<
        leat::lehmer<std::uint64_t, 37, 2305843009213693951u>,
        std::linear_congruential_engine<std::uint64_t, 37, 0, 2305843009213693951u>>();
}

// Source: ISO C++ [rand.eng.lcong] on seed sequences: "if c mod m is 0 and S is 0, sets the state
// to 1"; the words before the first three are not used. A sequence that gives m in word 3 makes S =
// 0.
struct words_0_0_0_m {
    void generate(std::uint32_t* first, std::uint32_t* last) const {
        ASSERT_EQ(last - first, 4);
        first[0] = first[1] = first[2] = 0;
        first[3] = 2147483647;
    }
};
TEST(lehmer, maps_a_zero_from_a_seed_sequence_to_one) {
    const words_0_0_0_m q;
    EXPECT_EQ(leat::minimal_standard{q}.state(), 1u);
}

// Source: Park and Miller 1988: 16807 and all primitive roots have period 2^31 - 2. For 2^61 - 1
// the order of 37 was taken from the definition: 37^(p-1) = 1 and no 37^((p-1)/q) = 1, with p - 1 =
// 2 * 3^2 * 5^2 * 7 * 11 * 13 * 31 * 41 * 61 * 151 * 331 * 1321 (checked by multiplication).
TEST(lehmer, knows_its_period) {
    EXPECT_TRUE(leat::minimal_standard::period() == leat::wide_integer{2147483646});
    EXPECT_TRUE(leat::minimal_standard_48271::period() == leat::wide_integer{2147483646});
    EXPECT_TRUE(leat::minimal_standard_69621::period() == leat::wide_integer{2147483646});
    // 65539 = 3 modulo 8: order 2^29 modulo 2^31 (Knuth, TAOCP vol. 2, 3.2.1.2, Theorem C).
    EXPECT_TRUE((lehmer32<65539, 2147483648>::period()) == leat::wide_integer{1 << 29});

    using large = leat::lehmer<std::uint64_t, 37, 2305843009213693951u>;
    const std::array<std::uint64_t, 12> primes{2, 3, 5, 7, 11, 13, 31, 41, 61, 151, 331, 1321};
    std::uint64_t product = 3 * 5;
    for (const std::uint64_t q : primes) {
        product *= q;
    }
    ASSERT_EQ(product, 2305843009213693950u);
    const std::uint64_t order = static_cast<std::uint64_t>(large::period());
    EXPECT_EQ(product % order, 0u);
    large e{1};
    e.discard(order);
    EXPECT_EQ(e.state(), 1u);
    for (const std::uint64_t q : primes) {
        if (order % q == 0) {
            large part{1};
            part.discard(order / q);
            EXPECT_NE(part.state(), 1u) << q;
        }
    }
}

// Small moduli whole: the order found equals the cycle walked.
template <std::uint32_t a, std::uint32_t m>
void expect_cycle() {
    lehmer32<a, m> e{1};
    std::uint64_t length = 0;
    do {
        e();
        ++length;
    } while (e.state() != 1);
    EXPECT_TRUE((lehmer32<a, m>::period()) == leat::wide_integer{length}) << a << ' ' << m;
}
TEST(lehmer, has_the_period_that_is_walked) {
    expect_cycle<3, 7>();
    expect_cycle<2, 7>();
    expect_cycle<5, 4096>();
    expect_cycle<3, 4096>();
    expect_cycle<4095, 4096>();
    expect_cycle<10, 39203>(); // 197 * 199
    expect_cycle<2, 50653>();  // 37^3
    expect_cycle<17, 65537>();
    expect_cycle<1, 11>();
}

// x / m, rounded once. Source: the division of the hardware, IEEE 754, both operands exact.
TEST(lehmer, gives_its_published_real_mapping) {
    leat::minimal_standard a;
    leat::minimal_standard b;
    leat::lehmer<std::uint32_t, 279470273, 4294967291> c;
    auto d = c;
    leat::lehmer<std::uint64_t, 37, 9007199254740881> e; // the largest prime below 2^53
    auto f = e;
    for (int i = 0; i < 100000; ++i) {
        ASSERT_EQ(a.unit(), static_cast<double>(b()) / 2147483647.0);
        ASSERT_EQ(c.unit(), static_cast<double>(d()) / 4294967291.0);
        ASSERT_EQ(e.unit(), static_cast<double>(f()) / 9007199254740881.0);
    }
    for (const std::uint64_t m :
         {2147483647ull, 4294967291ull, 9007199254740881ull, 3ull, 4096ull}) {
        for (std::uint64_t x = 1; x < m && x < 3000; ++x) {
            ASSERT_EQ(leat::detail::exact_ratio(x, m),
                      static_cast<double>(x) / static_cast<double>(m));
            ASSERT_EQ(leat::detail::exact_ratio(m - x, m),
                      static_cast<double>(m - x) / static_cast<double>(m));
        }
    }
    static_assert(leat::minimal_standard{1}.unit() == 16807.0 / 2147483647.0);
}

TEST(lehmer, names_what_it_refuses) {
    try {
        leat::minimal_standard{2147483647};
        FAIL();
    } catch (const leat::invalid_parameter& e) {
        EXPECT_STREQ(e.what(),
                     "leat::lehmer: seed = 2147483647, must be above 0 and below the modulus");
    }
    try {
        leat::lehmer128{6};
        FAIL();
    } catch (const leat::invalid_parameter& e) {
        EXPECT_STREQ(e.what(), "leat::lehmer128: seed = 6, must be odd");
    }
}

// Source: the entry mcg128.lecuyer of engines.json.
TEST(lehmer128, gives_the_reference_states_and_draws) {
    const auto& entry = leat_test::reference_entry("engines.mcg128.lecuyer");
    LEAT_TEST_REFERENCE(entry);
    const auto& expected = entry["expected"];
    leat::lehmer128 e{word(entry["parameters"]["seed"])};
    EXPECT_TRUE(leat::wide_integer{leat::lehmer128::multiplier} ==
                leat_test::wide(entry["parameters"]["a"]));
    for (std::size_t i = 0; i < expected["states"].size(); ++i) {
        EXPECT_EQ(e(), word(expected["high64"][i])) << i;
        EXPECT_TRUE(leat::wide_integer{e.state()} == leat_test::wide(expected["states"][i])) << i;
    }
    EXPECT_EQ(leat_test::nth_draw(leat::lehmer128{1}, 10000), word(expected["x10000_high64"]));
    leat::lehmer128 far{1};
    far.discard(10000);
    EXPECT_TRUE(leat::wide_integer{far.state()} == leat_test::wide(expected["x10000"]));
}

// Source: Knuth, TAOCP vol. 2, 3.2.1.2, Theorem C: order 2^126 for a multiplier 5 modulo 8.
TEST(lehmer128, has_the_period_of_its_multiplier) {
    EXPECT_EQ(leat::lehmer128::multiplier[0] % 8, 5u);
    EXPECT_TRUE(leat::lehmer128::period() == leat::wide_integer::power_of_two(126));
}

// The modular routines below the engines, against the definition and against tables.
TEST(modular, tells_primes_from_composites) {
    std::vector<bool> composite(100000, false); // the sieve of Eratosthenes
    for (std::uint64_t n = 2; n < composite.size(); ++n) {
        ASSERT_EQ(leat::detail::is_prime(n), !composite[n]) << n;
        for (std::uint64_t k = n * n; k < composite.size(); k += n) {
            composite[k] = true;
        }
    }
    EXPECT_FALSE(leat::detail::is_prime(0));
    EXPECT_FALSE(leat::detail::is_prime(1));
    // From memory: 2^64 - 59 is the largest 64-bit prime; 3825123056546413051 is the least strong
    // pseudoprime to the nine bases 2 to 23 (Jiang and Deng, Math. Comp. 83, 2014).
    EXPECT_TRUE(leat::detail::is_prime(18446744073709551557u));
    EXPECT_FALSE(leat::detail::is_prime(3825123056546413051u));
}

TEST(modular, finds_the_prime_factors) {
    for (const std::uint64_t n :
         {1ull, 2ull, 1ull << 63, 2147483646ull, 2305843009213693950ull, 18446744073709551615ull,
          18446744073709551557ull, 4294967291ull * 4294967279ull, 4294967291ull * 4294967291ull,
          2642245ull * 2642245 * 2642245, 2097143ull * 2097143 * 2097143}) {
        const auto found = leat::detail::prime_factors(n);
        std::uint64_t rest = n;
        for (int i = 0; i < found.count; ++i) {
            const std::uint64_t p = found.primes[static_cast<std::size_t>(i)];
            EXPECT_TRUE(leat::detail::is_prime(p)) << p;
            ASSERT_EQ(rest % p, 0u) << p;
            while (rest % p == 0) {
                rest /= p;
            }
        }
        EXPECT_EQ(rest, 1u) << n;
    }
}

TEST(modular, multiplies_and_inverts) {
    // Against the definition of division: n = q d + r with r < d, in 128 bits.
    std::mt19937_64 g{1};
    for (int i = 0; i < 100000; ++i) {
        const std::uint64_t d = (g() >> (g() % 64)) | 1u;
        const leat::detail::word_pair n{g(), g() % d};
        const auto [q, r] = leat::detail::divide_wide(n, d);
        ASSERT_LT(r, d);
        ASSERT_TRUE(leat::detail::add(leat::detail::multiply_wide_portable(q, d), {r, 0}) == n);
        if (d > 1) {
            const std::uint64_t a = n.high;
            if (leat::detail::greatest_common_divisor(a, d) == 1) {
                ASSERT_EQ(leat::detail::multiply_mod(a, leat::detail::inverse_mod(a, d), d), 1u);
            }
        }
    }
}

} // namespace
