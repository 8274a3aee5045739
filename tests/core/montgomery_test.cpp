// Modular arithmetic and orders of elements against Boost.Multiprecision.

#include "leat/core/element_order.hpp"
#include "leat/core/montgomery.hpp"
#include "leat/core/wide_integer.hpp"

#include <boost/multiprecision/cpp_int.hpp>
#include <boost/multiprecision/miller_rabin.hpp>
#include <gtest/gtest.h>

#include <cstddef>
#include <cstdint>
#include <random>
#include <string>
#include <string_view>
#include <vector>

namespace {

using boost::multiprecision::cpp_int;
using leat::wide_integer;
using leat::detail::montgomery;

template <std::size_t N>
using residue = typename montgomery<N>::residue;

template <std::size_t N>
cpp_int value(const residue<N>& x) {
    cpp_int sum = 0;
    for (std::size_t i = N; i-- > 0;) {
        sum = (sum << 64) | x[i];
    }
    return sum;
}

template <std::size_t N>
residue<N> words(cpp_int x) {
    residue<N> result{};
    for (std::uint64_t& word : result) {
        word = static_cast<std::uint64_t>(x & 0xFFFFFFFFFFFFFFFFu);
        x >>= 64;
    }
    return result;
}

/// Moduli of every length up to 64 N bits, all ones included, and residues at both ends.
template <std::size_t N>
void expect_products_and_powers_of_boost() {
    std::mt19937_64 draw{N};
    const auto random = [&draw] {
        residue<N> x{};
        for (std::uint64_t& word : x) {
            word = draw() % 5 == 0 ? ~0ull : draw();
        }
        return value<N>(x);
    };
    for (unsigned i = 0; i < 400; ++i) {
        cpp_int m = random() >> static_cast<unsigned>(draw() % (64 * N - 2));
        if (i == 0) {
            m = (cpp_int{1} << (64 * N)) - 1;
        }
        m |= 1;
        if (m == 1) {
            m = 3;
        }
        const montgomery<N> field{words<N>(m)};
        ASSERT_EQ(value<N>(field.from_form(field.one())), 1 % m);
        for (int k = 0; k < 4; ++k) {
            const cpp_int a = k == 0 ? cpp_int{m - 1} : cpp_int{random() % m};
            const cpp_int b = k == 1 ? cpp_int{m - 1} : cpp_int{random() % m};
            const auto form = field.to_form(words<N>(a));
            ASSERT_EQ(value<N>(field.from_form(form)), a);
            ASSERT_EQ(value<N>(field.multiply(form, words<N>(b))), a * b % m) << m;
            const std::uint64_t exponent = k == 2 ? 0 : draw() >> (draw() % 64);
            ASSERT_EQ(value<N>(field.from_form(field.power_form(form, exponent))),
                      powm(a, cpp_int{exponent}, m))
                << a << " ^ " << exponent << " mod " << m;
        }
    }
}

TEST(montgomery, multiplies_and_raises_as_boost) {
    expect_products_and_powers_of_boost<1>();
    expect_products_and_powers_of_boost<2>();
    expect_products_and_powers_of_boost<3>();
    expect_products_and_powers_of_boost<8>();
}

TEST(montgomery, raises_to_wide_powers_as_boost) {
    const cpp_int m{"718373885684172166973216179348278232025854377983"};
    const cpp_int e{"31415926535897932384626433832795028841971693993751058209749445923078164"};
    const montgomery<3> field{words<3>(m)};
    const auto power =
        field.power_form(field.to_form({12345}), wide_integer{std::string_view{e.str()}});
    EXPECT_EQ(value<3>(field.from_form(power)), powm(cpp_int{12345}, e, m));
}

template <std::size_t N>
bool passes(const cpp_int& m) {
    return leat::detail::passes_as_prime(montgomery<N>{words<N>(m)});
}

TEST(passes_as_prime, agrees_with_boost) {
    std::mt19937_64 judge{1};
    std::mt19937_64 draw{20261203};
    int primes = 0;
    for (int i = 0; i < 1500; ++i) {
        const cpp_int m =
            (((cpp_int{draw()} << 64) | draw()) >> static_cast<unsigned>(draw() % 60)) | 1;
        const bool prime = miller_rabin_test(m, 25, judge);
        primes += prime ? 1 : 0;
        ASSERT_EQ(passes<2>(m), prime) << m;
    }
    EXPECT_GT(primes, 15); // about 2/ln(2^100) of 1500: there was something to agree on
    // Mersenne numbers: 2^127 - 1 and 2^521 - 1 are prime (Lucas 1876; Robinson 1954), 2^67 - 1 =
    // 193707721 * 761838257287 is not (Cole 1903).
    EXPECT_TRUE(passes<2>((cpp_int{1} << 127) - 1));
    EXPECT_TRUE(passes<9>((cpp_int{1} << 521) - 1));
    EXPECT_FALSE(passes<2>((cpp_int{1} << 67) - 1));
}

template <std::size_t N>
cpp_int order(const cpp_int& element, const cpp_int& m) {
    const montgomery<N> field{words<N>(m)};
    const wide_integer found = leat::detail::element_order(field, field.to_form(words<N>(element)));
    return value<N>(words<N>(value<8>(leat::detail::low_words<8>(found))));
}

TEST(element_order, is_right_modulo_a_safe_prime) {
    // The modulus of mwc_lag4_32 (tests/reference, engines.mwc4.period): squares have the order
    // q = (m - 1)/2, all others but -1 the order m - 1; -1 is no square, as m = 3 mod 4.
    const cpp_int m{"718373885684172166973216179348278232025854377983"};
    const cpp_int q = (m - 1) / 2;
    EXPECT_EQ(order<3>(4, m), q);
    EXPECT_EQ(order<3>(m - 4, m), 2 * q);
    EXPECT_EQ(order<3>(m - 1, m), 2);
    EXPECT_EQ(order<3>(1, m), 1);
}

// By the definition: g^d = 1, and g^(d/p) is not 1 for any prime p that divides d.
TEST(element_order, is_right_modulo_a_prime_with_many_factors_below) {
    const std::vector<std::uint64_t> primes{2, 3, 19, 251, 2000000033, 3000000019};
    const cpp_int m = cpp_int{2000000033} * 3000000019 * 251 * 19 * 27 * 32 + 1;
    std::mt19937_64 judge{2};
    ASSERT_TRUE(miller_rabin_test(m, 25, judge));
    for (unsigned g = 2; g < 30; ++g) {
        const cpp_int d = order<2>(g, m);
        ASSERT_NE(d, 0);
        EXPECT_EQ((m - 1) % d, 0) << g;
        EXPECT_EQ(powm(cpp_int{g}, d, m), 1) << g;
        for (const std::uint64_t p : primes) {
            if (d % p == 0) {
                EXPECT_NE(powm(cpp_int{g}, d / p, m), 1) << g << ' ' << p;
            }
        }
    }
    EXPECT_EQ(order<2>(5, m), (m - 1) / 171); // by SymPy's n_order
    EXPECT_EQ(order<2>(10, m), m - 1);        // by SymPy's n_order
}

TEST(element_order, is_0_where_it_is_not_known) {
    // A composite modulus (Cole 1903, above), and a prime one whose m - 1 has two large primes:
    // 2^130 - 6 = 2 * 23 * 32985101 * 897064739519922787230182993783 (by SymPy).
    EXPECT_EQ(order<2>(3, (cpp_int{1} << 67) - 1), 0);
    EXPECT_EQ(order<3>(2, (cpp_int{1} << 130) - 5), 0);
}

} // namespace
