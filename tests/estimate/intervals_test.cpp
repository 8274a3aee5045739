// Intervals: published worked examples, and Boost.Math over wide grids.

#include "leat/estimate/detail/incomplete_beta.hpp"
#include "leat/estimate/mean_interval.hpp"
#include "leat/estimate/paired_differences.hpp"
#include "leat/estimate/proportion_interval.hpp"
#include "leat/estimate/quantile_interval.hpp"

#include <boost/math/distributions/binomial.hpp>
#include <boost/math/distributions/students_t.hpp>
#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <limits>
#include <string>
#include <vector>

namespace {

using leat::interval;
using leat::running_moments;

std::string refusal(auto call) {
    try {
        call();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "not refused";
}

void expect_near(const interval& found, double lower, double upper, double tolerance) {
    EXPECT_NEAR(found.lower, lower, tolerance);
    EXPECT_NEAR(found.upper, upper, tolerance);
}

TEST(Interval, HasAHalfWidthAndContainsItsEnds) {
    constexpr interval i{1, 4, 0.9};
    static_assert(i.half_width() == 1.5 && i.contains(1) && i.contains(4) && !i.contains(4.1) &&
                  !i.contains(0.9));
    const double largest = std::numeric_limits<double>::max();
    EXPECT_EQ((interval{-largest, largest, 0.5}.half_width()), largest);
}

// NIST/SEMATECH e-Handbook of Statistical Methods, 1.3.5.2: data ZARR13.DAT, 195 values, mean
// 9.261460, standard deviation 0.02278881, 95 % limits 9.258242 and 9.264679. From memory; printed
// to 6 decimals.
TEST(StudentInterval, GivesTheHandbooksLimits) {
    const double deviation = 0.02278881;
    const running_moments m(
        leat::moments_state{195, 9.261460, deviation * deviation * 194, 0, 0, 9.19, 9.33});
    expect_near(leat::student_interval(m), 9.258242, 9.264679, 1e-6);
}

// "Student", Biometrika 6, 1908, sleep gained under two drugs; the intervals are those of R's
// t.test on its data set `sleep`, from memory, printed to 7 decimals.
TEST(StudentInterval, GivesThePublishedIntervalsOfTheSleepData) {
    const double one[] = {0.7, -1.6, -0.2, -1.2, -0.1, 3.4, 3.7, 0.8, 0.0, 2.0};
    const double two[] = {1.9, 0.8, 1.1, 0.1, -0.1, 4.4, 5.5, 1.6, 4.6, 3.4};
    leat::paired_differences d;
    for (int i = 0; i < 10; ++i) {
        d.add(one[i], two[i]);
    }
    expect_near(d.interval(), -2.4598858, -0.7001142, 6e-8);
    expect_near(leat::welch_interval(d.first(), d.second()), -3.3654832, 0.2054832, 6e-8);
}

// Abramowitz and Stegun, table 26.10 (from memory): two-sided points of 95 % and 99 %, printed to
// 3 decimals.
TEST(StudentFactor, GivesThePrintedTable) {
    const double table[][3] = {{1, 12.706, 63.657}, {2, 4.303, 9.925},  {3, 3.182, 5.841},
                               {4, 2.776, 4.604},   {5, 2.571, 4.032},  {10, 2.228, 3.169},
                               {20, 2.086, 2.845},  {30, 2.042, 2.750}, {60, 2.000, 2.660},
                               {120, 1.980, 2.617}};
    for (const auto& row : table) {
        EXPECT_NEAR(leat::student_factor(row[0]), row[1], 6e-4) << row[0];
        EXPECT_NEAR(leat::student_factor(row[0], 0.99), row[2], 6e-4) << row[0];
    }
    EXPECT_NEAR(leat::normal_factor(), 1.959963984540054, 1e-15); // from memory
}

TEST(StudentFactor, AgreesWithBoost) {
    for (const double k : {1.0, 1.5, 2.0, 3.0, 4.5, 10.0, 29.0, 100.0, 1000.0, 5000.0, 16383.0,
                           16384.0, 1e5, 1e8, 1e15}) {
        const boost::math::students_t law(k);
        for (const double level : {0.001, 0.49, 0.5, 0.8, 0.95, 0.999, 1 - 1e-6, 1 - 0x1p-53}) {
            const double expected = level < 0.5 ? boost::math::quantile(law, 0.5 + level / 2)
                                                : -boost::math::quantile(law, (1 - level) / 2);
            EXPECT_NEAR(leat::student_factor(k, level) / expected, 1, level < 0.5 ? 5e-13 : 2e-13)
                << k << ' ' << level;
        }
    }
}

TEST(IncompleteBeta, AgreesWithBoost) {
    double worst = 0;
    for (const double a : {0.5, 1.0, 2.5, 10.0, 300.0, 1e4, 1e6}) {
        for (const double b : {0.5, 1.0, 3.0, 50.0, 1e3, 1e6}) {
            const double mean = a / (a + b);
            const double deviation = std::sqrt(mean * (1 - mean) / (a + b + 1));
            for (const double z : {-6.0, -3.0, -1.0, -0.1, 0.0, 0.1, 1.0, 3.0, 6.0}) {
                const double x = mean + z * deviation;
                if (!(x > 0 && x < 1)) {
                    continue;
                }
                // in long double, since Boost's double loses digits at large shapes
                const long double below = boost::math::ibeta<long double>(a, b, x);
                const long double above = boost::math::ibetac<long double>(a, b, x);
                const auto shares = leat::detail::beta_shares_at(a, b, x, 1 - x);
                const auto error =
                    below < above
                        ? static_cast<double>(leat::detail::or_zero(shares.below) / below - 1)
                        : static_cast<double>(leat::detail::or_zero(shares.above) / above - 1);
                worst = std::max(worst, std::abs(error));
            }
        }
    }
    EXPECT_LT(worst, 3.5e-13);
}

TEST(NormalInterval, IsMeanPlusMinusZ) {
    expect_near(leat::normal_interval(10, 2), 10 - 3.919927969080108, 10 + 3.919927969080108,
                1e-14);
    running_moments m;
    for (int i = 0; i < 100; ++i) {
        m.add(i % 2);
    }
    EXPECT_EQ(leat::normal_interval(m, 0.9),
              leat::normal_interval(m.mean(), m.standard_error(), 0.9));
}

// R. G. Newcombe, Two-sided confidence intervals for the single proportion, Statist. Med. 17, 1998,
// table I, methods 3 (score) and 5 (exact); from memory, printed to 4 decimals.
TEST(ProportionIntervals, GiveThePublishedExamples) {
    struct row {
        std::uint64_t successes, trials;
        double wilson[2], exact[2];
    };
    const row table[] = {{81, 263, {0.2553, 0.3662}, {0.2527, 0.3676}},
                         {15, 148, {0.0624, 0.1605}, {0.0578, 0.1617}},
                         {0, 20, {0, 0.1611}, {0, 0.1684}},
                         {1, 29, {0.0061, 0.1718}, {0.0009, 0.1776}}};
    for (const row& r : table) {
        expect_near(leat::wilson_interval(r.successes, r.trials), r.wilson[0], r.wilson[1], 6e-5);
        expect_near(leat::clopper_pearson_interval(r.successes, r.trials), r.exact[0], r.exact[1],
                    6e-5);
    }
}

TEST(ProportionIntervals, ClopperPearsonAgreesWithBoost) {
    using law = boost::math::binomial;
    for (const std::uint64_t n : {1u, 2u, 10u, 263u, 5000u, 1000000u, 2000000000u}) {
        for (const std::uint64_t k :
             {std::uint64_t{0}, std::uint64_t{1}, n / 100, n / 3, n - 1, n}) {
            for (const double level : {0.5, 0.95, 0.9999}) {
                const auto trials = static_cast<double>(n);
                const auto successes = static_cast<double>(k);
                const double tail = (1 - level) / 2;
                const interval found = leat::clopper_pearson_interval(k, n, level);
                const double lower = law::find_lower_bound_on_p(trials, successes, tail);
                const double upper = law::find_upper_bound_on_p(trials, successes, tail);
                EXPECT_NEAR(found.lower, lower, 1e-10 * lower) << k << " of " << n;
                EXPECT_NEAR(found.upper, upper, 1e-10 * upper) << k << " of " << n;
                EXPECT_EQ(found.level, level);
            }
        }
    }
}

// The ends leave exactly the tail, also at levels next to 1, where a small step of the search is no
// sign of its end, and for more trials than doubles can tell apart by shares.
TEST(ProportionIntervals, ClopperPearsonHoldsAtTheEndsOfItsDomain) {
    const std::uint64_t counts[][2] = {{3, 4}, {4, 6}, {1, 3}, {0, 2}, {999, 1000}, {70, 100000}};
    for (const auto& [k, n] : counts) {
        for (const double level : {0.001, 1 - 0x1p-30, 1 - 0x1p-53}) {
            const interval found = leat::clopper_pearson_interval(k, n, level);
            const auto hits = static_cast<double>(k);
            const auto misses = static_cast<double>(n - k);
            const double tail = (1 - level) / 2;
            if (k > 0) {
                const double share = boost::math::ibeta(hits, misses + 1, found.lower);
                EXPECT_NEAR(share / tail, 1, 1e-9) << k << " of " << n << ", level " << level;
            }
            if (found.upper < 0.999) { // nearer to 1 the share changes from double to double
                const double share = boost::math::ibetac(hits + 1, misses, found.upper);
                EXPECT_NEAR(share / tail, 1, 1e-9) << k << " of " << n << ", level " << level;
            }
        }
    }
    constexpr std::uint64_t most = std::uint64_t{1} << 53;
    const interval half = leat::clopper_pearson_interval(most / 2, most);
    EXPECT_TRUE(half.contains(0.5));
    EXPECT_NEAR(half.half_width() * 2 * std::sqrt(0x1p53), 1.959963984540054, 1e-6);
}

TEST(ProportionIntervals, WilsonSolvesItsEquation) {
    // The ends are where |p - share| = z sqrt(p (1 - p) / n) (Wilson 1927).
    for (const std::uint64_t n : {1u, 7u, 1000u, 1000000u}) {
        for (const std::uint64_t k : {std::uint64_t{0}, std::uint64_t{1}, n / 3, n - 1, n}) {
            const interval found = leat::wilson_interval(k, n, 0.95);
            const double share = static_cast<double>(k) / static_cast<double>(n);
            for (const double p : {found.lower, found.upper}) {
                const double z =
                    std::abs(p - share) / std::sqrt(p * (1 - p) / static_cast<double>(n));
                if (p > 0 && p < 1) {
                    EXPECT_NEAR(z, 1.959963984540054, 1e-9) << k << " of " << n;
                }
            }
            EXPECT_EQ(found.lower == 0, k == 0);
            EXPECT_EQ(found.upper == 1, k == n);
        }
    }
}

// The exact coverage, by adding up the binomial law (Boost) over all outcomes: Clopper-Pearson
// never falls below its level; Wilson does, a little; the normal interval for a rare event by far.
TEST(ProportionIntervals, CoverAsTheirHeaderSays) {
    const auto coverage = [](std::uint64_t n, double p, auto make) {
        const boost::math::binomial law(static_cast<double>(n), p);
        double covered = 0;
        for (std::uint64_t k = 0; k <= n; ++k) {
            if (make(k, n).contains(p)) {
                covered += boost::math::pdf(law, static_cast<double>(k));
            }
        }
        return covered;
    };
    const auto exact = [](std::uint64_t k, std::uint64_t n) {
        return leat::clopper_pearson_interval(k, n);
    };
    const auto wilson = [](std::uint64_t k, std::uint64_t n) {
        return leat::wilson_interval(k, n);
    };
    double wilson_sum = 0;
    int cases = 0;
    for (const std::uint64_t n : {5u, 20u, 100u}) {
        for (double p = 0.005; p < 1; p += 0.0198) {
            EXPECT_GE(coverage(n, p, exact), 0.95) << n << ' ' << p;
            wilson_sum += coverage(n, p, wilson);
            ++cases;
        }
    }
    EXPECT_NEAR(wilson_sum / cases, 0.95, 0.01); // on average over p
    const auto plain = [](std::uint64_t k, std::uint64_t n) {
        running_moments m;
        for (std::uint64_t i = 0; i < n; ++i) {
            m.add(i < k ? 1 : 0);
        }
        return leat::normal_interval(m);
    };
    EXPECT_LT(coverage(100, 0.01, plain), 0.65); // the planted fault: 0 of 100 has no width
    EXPECT_GE(coverage(100, 0.01, exact), 0.95);
}

// Ranks for the median: tables of the sign test's interval (W. J. Conover, Practical Nonparametric
// Statistics; from memory): 10 values, ranks 2 and 9, 97.85 %; 20 values, ranks 6 and 15, 95.86 %.
TEST(QuantileInterval, GivesThePrintedRanksOfTheMedian) {
    const leat::order_ranks ten = leat::quantile_ranks(10, 0.5);
    EXPECT_EQ(ten.lower, 2u);
    EXPECT_EQ(ten.upper, 9u);
    EXPECT_NEAR(ten.coverage, 0.9785, 1e-4);
    const leat::order_ranks twenty = leat::quantile_ranks(20, 0.5);
    EXPECT_EQ(twenty.lower, 6u);
    EXPECT_EQ(twenty.upper, 15u);
    EXPECT_NEAR(twenty.coverage, 0.9586, 1e-4);
}

TEST(QuantileInterval, HasTheNarrowestRanksThatTheBinomialLawAllows) {
    for (const std::uint64_t n : {36u, 100u, 1000u}) {
        for (const double p : {0.1, 0.5, 0.75, 0.9}) {
            for (const double level : {0.8, 0.95}) {
                const double tail = (1 - level) / 2;
                const boost::math::binomial law(static_cast<double>(n), p);
                const auto at_most = [&](std::uint64_t k) {
                    return boost::math::cdf(law, static_cast<double>(k));
                };
                const auto at_least = [&](std::uint64_t k) {
                    return boost::math::cdf(
                        boost::math::complement(law, static_cast<double>(k) - 1));
                };
                const leat::order_ranks r = leat::quantile_ranks(n, p, level);
                EXPECT_LE(at_most(r.lower - 1), tail);
                EXPECT_GT(at_most(r.lower), tail);
                EXPECT_LE(at_least(r.upper), tail);
                EXPECT_GT(at_least(r.upper - 1), tail);
                EXPECT_NEAR(r.coverage, 1 - at_most(r.lower - 1) - at_least(r.upper), 1e-12);
                EXPECT_GE(r.coverage, level);
            }
        }
    }
    // 1 - 0.9^35 / 0.025 and the like: the sizes that the header names
    EXPECT_NO_THROW((void)leat::quantile_ranks(36, 0.9));
    EXPECT_THROW((void)leat::quantile_ranks(35, 0.9), leat::invalid_parameter);
    EXPECT_THROW((void)leat::quantile_ranks(35, 0.1), leat::invalid_parameter);
    EXPECT_LE(std::pow(0.99, 368), 0.025);
    EXPECT_GT(std::pow(0.99, 367), 0.025);
    EXPECT_NO_THROW((void)leat::quantile_ranks(368, 0.99));
    EXPECT_THROW((void)leat::quantile_ranks(367, 0.99), leat::invalid_parameter);
}

TEST(QuantileInterval, TakesTheValuesOfItsRanks) {
    std::vector<double> values;
    for (int i = 1; i <= 20; ++i) {
        values.push_back(i * i);
    }
    EXPECT_EQ(leat::quantile_interval(values, 0.5), (interval{36, 225, 0.95}));
    std::swap(values[3], values[4]);
    EXPECT_EQ(refusal([&] { (void)leat::quantile_interval(values, 0.5); }),
              "leat::quantile_interval: values[4] = 16, must not be NaN, nor below the value "
              "before it");
    values[0] = std::nan("");
    EXPECT_THROW((void)leat::quantile_interval(values, 0.5), leat::invalid_parameter);
}

TEST(Intervals, RefuseWhatCannotBe) {
    running_moments one;
    one.add(1);
    running_moments two = one;
    two.add(1);
    EXPECT_EQ(refusal([&] { (void)leat::student_interval(one); }),
              "leat::student_interval: count = 1, must be at least 2");
    EXPECT_EQ(refusal([&] { (void)leat::student_interval(two, 1); }),
              "leat::student_interval: level = 1, must be >= 0.001 and < 1");
    EXPECT_EQ(leat::student_interval(two), (interval{1, 1, 0.95}));
    EXPECT_EQ(refusal([&] { (void)leat::normal_interval(one); }),
              "leat::normal_interval: count = 1, must be at least 2");
    EXPECT_EQ(refusal([&] { (void)leat::normal_interval(std::nan(""), 1); }),
              "leat::normal_interval: mean = nan, must be at most 2^900 in size");
    EXPECT_EQ(refusal([&] { (void)leat::normal_interval(0, -1); }),
              "leat::normal_interval: standard_error = -1, must be >= 0 and at most 2^900");
    EXPECT_EQ(refusal([&] { (void)leat::welch_interval(two, one); }),
              "leat::welch_interval: count = 1, must be at least 2");
    EXPECT_EQ(refusal([&] { (void)leat::welch_interval(two, two); }),
              "leat::welch_interval: variance = 0, must be > 0 in a or in b");
    EXPECT_EQ(refusal([&] { (void)leat::student_factor(0.9); }),
              "leat::student_factor: k = 0.9, must be finite and >= 1");
    EXPECT_EQ(refusal([&] { (void)leat::student_factor(3, std::nan("")); }),
              "leat::student_factor: level = nan, must be >= 0.001 and < 1");
    EXPECT_EQ(refusal([&] { (void)leat::normal_factor(0); }),
              "leat::normal_factor: level = 0, must be >= 0.001 and < 1");
    EXPECT_EQ(refusal([&] { (void)leat::wilson_interval(1, 0); }),
              "leat::wilson_interval: trials = 0, must be at least 1, at most 2^53");
    EXPECT_EQ(refusal([&] { (void)leat::clopper_pearson_interval(4, 3); }),
              "leat::clopper_pearson_interval: successes = 4, must not be above the trials");
    EXPECT_EQ(refusal([&] { (void)leat::quantile_ranks(0, 0.5); }),
              "leat::quantile_interval: n = 0, must be at least 1, at most 2^53");
    EXPECT_EQ(refusal([&] { (void)leat::quantile_ranks(10, 1); }),
              "leat::quantile_interval: p = 1, must be > 0 and < 1");
}

TEST(Intervals, AreTheSameAtCompileTime) {
    constexpr auto student = [] { return leat::student_factor(9, 0.95); };
    constexpr auto exact = [] { return leat::clopper_pearson_interval(3, 40); };
    constexpr auto wilson = [] { return leat::wilson_interval(3, 40); };
    constexpr auto ranks = [] { return leat::quantile_ranks(20, 0.5); };
    constexpr double known_student = student();
    constexpr interval known_exact = exact();
    constexpr interval known_wilson = wilson();
    constexpr leat::order_ranks known_ranks = ranks();
    EXPECT_EQ(student(), known_student);
    EXPECT_EQ(exact(), known_exact);
    EXPECT_EQ(wilson(), known_wilson);
    EXPECT_EQ(ranks(), known_ranks);
}

} // namespace
