// The tests of fit are themselves tested: against published tables and formulas, on faults they
// must find, and on the accounting of false alarms.

#include "support/alarm_budget.hpp"
#include "support/reference.hpp"
#include "support/seeds.hpp"
#include "support/statistics.hpp"

#include "leat/uniform/open_interval.hpp"

#include <gtest/gtest-spi.h>
#include <gtest/gtest.h>

#include <cmath>

namespace {

using namespace leat_test;

// Kolmogorov 1933, Smirnov 1948, by mpmath: tests/reference/tests.json, tests.kolmogorov.*.
TEST(Statistics, KolmogorovSeriesGivesThePublishedTable) {
    const double n = 1e16; // where the correction for finite n vanishes
    for (const char* lambda : {"0.5", "0.8", "1.2", "1.3581", "1.6276"}) {
        const auto& entry = reference_entry(std::string("tests.kolmogorov.") + lambda);
        const double q = entry["expected"]["Q"];
        const double t = entry["parameters"]["lam"];
        EXPECT_NEAR(kolmogorov_p(t / std::sqrt(n), n) / q, 1, 1e-7) << lambda;
    }
    const auto& points = reference_entry("tests.kolmogorov.critical");
    for (std::size_t i = 0; i < points["parameters"]["alpha"].size(); ++i) {
        const double alpha = points["parameters"]["alpha"][i];
        const double t = points["expected"]["quantiles"][i];
        EXPECT_NEAR(kolmogorov_p(t / std::sqrt(n), n) / alpha, 1, 1e-7) << alpha;
    }
}

// The exact one-sided tail, Birnbaum and Tingey, Ann. Math. Stat. 22, 1951, eq. (3.0):
// P(D+ >= d) = d sum C(n, j) (d + j/n)^(j-1) (1 - d - j/n)^(n-j). Far out, the two-sided tail is
// twice that, less at most its square.
double exact_one_sided_tail(double d, int n) {
    double sum = 0;
    for (int j = 0; j <= static_cast<int>(n * (1 - d)); ++j) {
        const double up = d + static_cast<double>(j) / n;
        const double down = 1 - up;
        if (down > 0) {
            sum += std::exp(std::lgamma(n + 1.0) - std::lgamma(j + 1.0) - std::lgamma(n - j + 1.0) +
                            (j - 1) * std::log(up) + (n - j) * std::log(down));
        }
    }
    return d * sum;
}

TEST(Statistics, KolmogorovTailIsRightFarOut) {
    for (const double t : {2.0, 2.7, 3.5}) { // p from 7e-4 to 5e-11
        for (const auto& [n, error] : {std::pair{1000, 0.1}, std::pair{100000, 1e-3}}) {
            const double d = t / std::sqrt(n);
            EXPECT_NEAR(kolmogorov_p(d, n) / (2 * exact_one_sided_tail(d, n)), 1, error)
                << t << " " << n;
        }
    }
}

TEST(Statistics, LargestDistanceEqualsTheSortedFormula) {
    auto g = leat_test::source_of_this_test().stream();
    for (const int n : {1, 2, 3, 10, 1000}) {
        for (const int steps : {3, 1000000}) { // many ties, and none
            std::vector<double> x;
            for (int i = 0; i < n; ++i) {
                x.push_back(std::ceil(leat::unit(g) * steps) / (steps + 1));
            }
            const auto cdf = [](double u) { return u * u; };
            std::vector<double> sorted = x;
            std::sort(sorted.begin(), sorted.end());
            double expected = 0;
            for (int i = 0; i < n; ++i) { // Knuth, TAOCP vol. 2, 3.3.1 B, eq. (13)
                const double f = cdf(sorted[static_cast<std::size_t>(i)]);
                expected = std::max({expected, (i + 1.0) / n - f, f - static_cast<double>(i) / n});
            }
            EXPECT_EQ(largest_distance(x, cdf), expected) << n << " " << steps;
        }
    }
}

TEST(Statistics, ChiSquareOfTwoCells) {
    const std::uint64_t counts[] = {110, 90};
    // chi-square 2 at 1 degree of freedom: the upper tail is erfc(1) = 0.1572992070 (Abramowitz and
    // Stegun, table 7.1); both ends double it.
    const outcome found = chi_square_test("two", counts);
    EXPECT_DOUBLE_EQ(found.statistic, 2);
    EXPECT_NEAR(found.p, 2 * 0.1572992070, 1e-9);
    const std::uint64_t few[] = {50, 50};
    EXPECT_THROW(chi_square_test("few", few), std::invalid_argument);
}

TEST(Statistics, CountsAreExactAtBothEnds) {
    EXPECT_NEAR(count_test("none", 0, 10, 0.5).p, 2.0 / 1024, 1e-15); // 10 tails of a coin
    EXPECT_NEAR(count_test("all", 10, 10, 0.5).p, 2.0 / 1024, 1e-15);
    EXPECT_EQ(count_test("half", 5, 10, 0.5).p, 1);
    EXPECT_NEAR(count_test("rare", 2, 1000000, 1e-9).p / (2 * 5e-7), 1, 2e-3); // Poisson 0.001
}

TEST(Statistics, MeansAreNormalAndRefusedWhereTooSkew) {
    // Phi(1.959964) = 0.975 (Abramowitz and Stegun, table 26.1)
    EXPECT_NEAR(mean_test("z", 1.959963985, 1, {0, 1}).p, 0.05, 1e-9);
    EXPECT_EQ(mean_test("nan", std::nan(""), 1, {0, 1}).p, 0);
    EXPECT_THROW(mean_test("skew", 0, 100, {0, 1, 1}), std::invalid_argument);
}

TEST(Statistics, KolmogorovSmirnovFindsNothingInUniforms) {
    auto g = source_of_this_test().stream();
    std::vector<double> x(100000);
    for (double& u : x) {
        u = leat::unit(g);
    }
    check(kolmogorov_smirnov_test("uniform", x, [](double u) { return u; }));
    for (double& u : x) {
        u = std::pow(u, 1.1); // a planted fault
    }
    EXPECT_TRUE(
        is_rejected({kolmogorov_smirnov_test("uniform^1.1", x, [](double u) { return u; })}));
    x[0] = std::nan("");
    EXPECT_EQ(kolmogorov_smirnov_test("nan", x, [](double u) { return u; }).p, 0);
}

TEST(AlarmBudget, AnUndeclaredCheckFails) {
    EXPECT_NONFATAL_FAILURE(check(outcome{"fine", 0, 1}), "more checks than");
}

TEST(AlarmBudget, APValueBelowTheLevelFails) {
    EXPECT_NONFATAL_FAILURE(check(outcome{"wrong", 7, 0.9e-10}), "wrong: statistic 7");
}

TEST(AlarmBudget, ChecksOfTheSuiteKeepTheRate) {
    EXPECT_LE(all_declared_checks() * check_level, suite_alarm_rate);
    EXPECT_FALSE(is_rejected({outcome{"fine", 0, 1.1e-10}}));
    EXPECT_TRUE(is_rejected({outcome{"fine", 0, 1}, outcome{"wrong", 0, 0.9e-10}}));
}

} // namespace
