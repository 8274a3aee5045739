// testing/detail/tail_areas.hpp: against GSL, published values and an exact method.

#include "leat/testing/detail/tail_areas.hpp"

#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <gsl/gsl_cdf.h>

#include <algorithm>
#include <cmath>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <string>
#include <vector>

namespace {

using leat_test::reference_entry;
namespace areas = leat::testing::detail;

// Source: GSL, gsl_cdf_tdist_Q. (Chi-squared against Boost.Math: agreement_test.cpp, which includes
// it.)
TEST(TailAreas, StudentEqualsGsl) {
    for (const double k : {1.0, 2.0, 3.0, 5.0, 30.0, 99.0, 1e4, 1e6}) {
        for (const double t : {1e-8, 0.1, 1.0, 1.7, 1.8, 2.5, 5.0, 8.0, 36.0}) {
            const double area = 2 * gsl_cdf_tdist_Q(t, k);
            EXPECT_NEAR(areas::student_t_beyond(-t, k) / area, 1, 1e-12) << k << " " << t;
        }
    }
}

// Abramowitz and Stegun, tables 26.10 (t, both sides 0.05) and 26.8 (chi-square, above 0.05),
// from memory, to the printed digits.
TEST(TailAreas, PublishedPercentagePoints) {
    EXPECT_NEAR(areas::student_t_beyond(2.228, 10), 0.05, 2e-5);
    EXPECT_NEAR(areas::student_t_beyond(12.706, 1), 0.05, 2e-6);
    EXPECT_NEAR(areas::chi_squared_tails(18.3070, 10).above, 0.05, 1e-6);
    EXPECT_NEAR(areas::chi_squared_tails(3.84146, 1).above, 0.05, 1e-6);
}

TEST(TailAreas, EndsOfTheRange) {
    constexpr double infinity = std::numeric_limits<double>::infinity();
    EXPECT_EQ(areas::student_t_beyond(0, 5), 1);
    EXPECT_EQ(areas::student_t_beyond(-infinity, 5), 0);
    EXPECT_EQ(areas::chi_squared_tails(0, 5).above, 1);
    EXPECT_EQ(areas::chi_squared_tails(infinity, 5).above, 0);
    EXPECT_EQ(areas::chi_squared_tails(1e5, 5).above, 0); // below the smallest double
    EXPECT_EQ(areas::kolmogorov_beyond(0.5, 1), 1);
    EXPECT_EQ(areas::kolmogorov_beyond(10, 10), 0);
}

/// P(D_n < d) by the matrix method: G. Marsaglia, W. W. Tsang and J. Wang, Evaluating Kolmogorov's
/// distribution, J. Stat. Softw. 8(18), 2003 (after J. Durbin, 1973). Exact but for rounding.
double exact_kolmogorov(double d, int n) {
    const int k = static_cast<int>(n * d) + 1;
    const auto m = static_cast<std::size_t>(2 * k - 1);
    const double h = k - n * d;
    using matrix = std::vector<std::vector<double>>;
    matrix step(m, std::vector<double>(m, 0.0));
    for (std::size_t i = 0; i < m; ++i) {
        for (std::size_t j = 0; j <= std::min(i + 1, m - 1); ++j) {
            step[i][j] = 1;
        }
    }
    for (std::size_t i = 0; i < m; ++i) {
        step[i][0] -= std::pow(h, i + 1);
        step[m - 1][i] -= std::pow(h, m - i);
    }
    step[m - 1][0] += h > 0.5 ? std::pow(2 * h - 1, m) : 0;
    for (std::size_t i = 0; i < m; ++i) {
        for (std::size_t j = 0; j <= std::min(i, m - 1); ++j) {
            step[i][j] /= std::tgamma(static_cast<double>(i - j + 2));
        }
    }
    // The middle entry of step^n, times n! / n^n: one factor i / n a multiplication.
    std::vector<double> row(m, 0.0);
    row[static_cast<std::size_t>(k - 1)] = 1;
    for (int i = 1; i <= n; ++i) {
        std::vector<double> next(m, 0.0);
        for (std::size_t a = 0; a < m; ++a) {
            for (std::size_t b = 0; b < m; ++b) {
                next[b] += row[a] * step[a][b] * i / n * std::exp(1.0);
            }
        }
        row = next;
    }
    return row[static_cast<std::size_t>(k - 1)] * std::exp(-n);
}

TEST(TailAreas, KolmogorovIsExactFarOutAndNeverTooSmall) {
    // The paper's example, Pr(D_10 < .274) (from memory).
    ASSERT_NEAR(exact_kolmogorov(0.274, 10), 0.6284796154565, 1e-12);
    for (const int n : {1, 2, 3, 5, 10, 30, 100, 400}) {
        for (const double t : {0.6, 0.7, 0.8, 1.0, 1.2, 1.4, 1.7, 2.0}) {
            const double d = t / std::sqrt(n);
            if (d >= 1) {
                continue;
            }
            const double p = 1 - exact_kolmogorov(d, n);
            const double found = areas::kolmogorov_beyond(n * d, static_cast<std::uint64_t>(n));
            EXPECT_GE(found, p * (1 - 1e-9)) << n << " " << t;
            if (p < 0.5) {
                EXPECT_LE(found, p * 1.02) << n << " " << t;
            }
            if (p < 0.25) {
                EXPECT_LE(found, p * (1 + 1.3 * std::pow(p / 2, 3)) + 1e-13) << n << " " << t;
            }
        }
    }
}

// Kolmogorov 1933, Smirnov 1948, by mpmath: tests/reference/tests.json, tests.kolmogorov.*; the
// limit of many samples, from which p differs by about 1 / sqrt(n).
TEST(TailAreas, KolmogorovNearsItsPublishedLimit) {
    for (const char* lambda : {"1.2", "1.3581", "1.6276"}) {
        const auto& entry = reference_entry(std::string("tests.kolmogorov.") + lambda);
        LEAT_TEST_REFERENCE(entry);
        const double q = entry["expected"]["Q"];
        const double t = entry["parameters"]["lam"];
        EXPECT_NEAR(areas::kolmogorov_beyond(t * std::sqrt(1e5), 100000) / q, 1, 0.01);
    }
}

} // namespace
