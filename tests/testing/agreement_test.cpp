// The statistical checks of leat/testing: tail areas of chi-squared against Boost.Math, their alarm
// rates by exact sums and by repetition, faults they must find, and what they print.

#include "leat/testing/agreement.hpp"

#include "leat/distributions/exponential.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/testing/agrees_with_counts.hpp"
#include "leat/testing/agrees_with_distribution.hpp"
#include "leat/testing/agrees_with_mean.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"

#include <gtest/gtest-spi.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <limits>
#include <span>
#include <sstream>
#include <string>
#include <utility>
#include <vector>

namespace {

using namespace leat_test;

// Source: Boost.Math, chi_squared. (GSL is a thousandth off at 10^6 degrees of freedom.)
TEST(TailAreas, ChiSquaredEqualsBoost) {
    using leat::testing::detail::chi_squared_tails;
    for (const double k : {1.0, 2.0, 3.0, 5.0, 30.0, 99.0, 1e4, 1e6}) {
        for (const double z : {-6.0, -3.0, -1.0, -0.1, 0.1, 0.5, 1.0, 3.0, 6.0, 30.0}) {
            const double x = std::max(k + z * std::sqrt(2 * k), 0.001 * k);
            const boost::math::chi_squared law(k);
            if (const double below = cdf(law, x); below > 1e-300) {
                EXPECT_NEAR(chi_squared_tails(x, k).below / below, 1, 1e-12) << k << " " << x;
            }
            if (const double above = cdf(complement(law, x)); above > 1e-300) {
                EXPECT_NEAR(chi_squared_tails(x, k).above / above, 1, 1e-12) << k << " " << x;
            }
        }
    }
}

// ---- alarm rates ----

/// The chance of at least (at most) that many alarms in n checks at the rate: a check's alarm rate
/// may be too low, but not too high.
outcome no_more_alarms(std::string what, std::uint64_t alarms, std::uint64_t n, double rate) {
    const boost::math::binomial law(static_cast<double>(n), rate);
    const auto k = static_cast<double>(alarms);
    return {std::move(what), k, alarms == 0 ? 1.0 : cdf(complement(law, k - 1))};
}

/// How many of `repeats` checks of fresh samples do not agree.
template <class Check>
std::uint64_t alarms_in(std::uint64_t repeats, Check one_check) {
    std::uint64_t alarms = 0;
    for (std::uint64_t i = 0; i < repeats; ++i) {
        alarms += one_check() ? 0u : 1u;
    }
    return alarms;
}

/// n draws.
template <class Law>
std::vector<double> sample(std::size_t n, const Law& law, leat::stream& g) {
    std::vector<double> x(n);
    for (double& value : x) {
        value = law(g);
    }
    return x;
}

TEST(AlarmRate, OfMeansAndDistributionsIsWhatWasAskedFor) {
    auto g = source_of_this_test().stream();
    const leat::normal law{3, 2};
    check(count_test(
        "mean",
        alarms_in(4000, [&] { return bool(leat::agrees_with_mean(sample(20, law, g), 3, 0.05)); }),
        4000, 0.05));
    check(count_test("distribution",
                     alarms_in(4000,
                               [&] {
                                   return bool(leat::agrees_with_distribution(sample(20, law, g),
                                                                              law, 0.05));
                               }),
                     4000, 0.05));
    check(count_test(
        "counts",
        alarms_in(4000,
                  [&] {
                      std::vector<int> seen(4, 0);
                      for (int i = 0; i < 400; ++i) {
                          ++seen[leat::below(std::uint64_t{4}, g)];
                      }
                      return bool(leat::agrees_with_counts(seen, std::vector{1, 1, 1, 1}, 0.05));
                  }),
        4000, 0.05));
}

TEST(AlarmRate, OfSkewMeansIsWithinTheStatedFactor) {
    auto g = source_of_this_test().stream();
    const leat::exponential law{1.0}; // skewness 2: h is 1 at n = 130 and a rate of 0.01
    const std::uint64_t alarms =
        alarms_in(5000, [&] { return bool(leat::agrees_with_mean(sample(130, law, g), 1, 0.01)); });
    check(no_more_alarms("skew", alarms, 5000, 0.01 * std::exp(1.0)));
}

TEST(AlarmRate, OfBoundedMeansIsNeverHigher) {
    auto g = source_of_this_test().stream();
    for (const double chance : {0.02, 0.5}) { // hits and misses: what the bound is nearest to
        const std::uint64_t alarms = alarms_in(4000, [&] {
            std::vector<int> hits(50);
            for (int& hit : hits) {
                hit = leat::unit(g) < chance ? 1 : 0;
            }
            return bool(leat::agrees_with_bounded_mean(hits, chance, 0, 1, 0.05));
        });
        check(no_more_alarms("bounded", alarms, 4000, 0.05));
        EXPECT_GT(alarms, 4) << "the bound is so weak that it is of no use";
    }
}

// All chances are known here: n samples in two cells, the rarer expecting just what is allowed.
// Source of the masses: Boost.Math, binomial.
TEST(AlarmRate, OfOneCellIsWithinTheStatedFactor) {
    constexpr int n = 20000;
    for (const double rate : {0.05, 0.01, 0.001, 1e-6}) {
        const double least = 1.001 * leat::testing::detail::least_expected(rate);
        const boost::math::binomial law(n, least / n);
        double alarm = 0;
        for (int k = 0; k < 4 * least + 20; ++k) {
            const std::vector counts{k, n - k};
            if (!leat::agrees_with_counts(counts, std::vector{least, n - least}, rate)) {
                alarm += pdf(law, k);
            }
        }
        EXPECT_LT(alarm, std::exp(1.0) * rate) << rate;
        EXPECT_GT(alarm, 0.1 * rate) << rate;
    }
}

TEST(AlarmRate, OfRepeatedLooksIsSpentOnce) {
    auto g = source_of_this_test().stream();
    std::uint64_t wrongly_right = 0;
    std::uint64_t wrongly_wrong = 0;
    for (int i = 0; i < 300; ++i) {
        const auto draw = [&] { return leat::unit(g); };
        const auto right = leat::agrees_with_mean_within(draw, 0.5, 0.03, 0.05);
        wrongly_wrong += right ? 0u : 1u;
        const auto off = leat::agrees_with_mean_within(draw, 0.53, 0.03, 0.05);
        wrongly_right += off ? 1u : 0u;
    }
    check(no_more_alarms("failed although right", wrongly_wrong, 300, 0.05));
    check(no_more_alarms("passed although off by the tolerance", wrongly_right, 300, 0.05));
}

// ---- planted faults ----

/// A check of the suite, at the suite's level.
void check(std::string what, const leat::agreement& found) {
    EXPECT_EQ(found.alarm_rate, check_level);
    leat_test::check(outcome{std::move(what), found.statistic, found ? 1.0 : 0.0});
}

TEST(PlantedFaultsOfUsers, AreFound) {
    constexpr double rate = check_level;
    auto g = source_of_this_test().stream();
    const leat::normal right{0, 1};
    const std::vector<double> x = sample(20000, right, g);
    check("mean", leat::agrees_with_mean(x, 0, rate));
    EXPECT_FALSE(leat::agrees_with_mean(x, 0.08, rate));
    check("distribution", leat::agrees_with_distribution(x, right, rate));
    EXPECT_FALSE(leat::agrees_with_distribution(x, leat::normal{0, 1.2}, rate));
    EXPECT_FALSE(leat::agrees_with_distribution(x, leat::normal{0.12, 1}, rate));

    // The remainder of a 3-bit word by 6 favours 0 and 1; see also enumerating_test.cpp.
    std::vector<int> fair(6, 0);
    std::vector<int> favoured(6, 0);
    for (int i = 0; i < 20000; ++i) {
        ++fair[leat::below(std::uint64_t{6}, g)];
        ++favoured[leat::below(std::uint64_t{8}, g) % 6];
    }
    const std::vector<double> chances(6, 1.0 / 6);
    check("counts", leat::agrees_with_counts(fair, chances, rate));
    EXPECT_FALSE(leat::agrees_with_counts(favoured, chances, rate));
    // Two cells are even by chance now and then; a hundred are too even for random numbers.
    EXPECT_TRUE(leat::agrees_with_counts(std::vector{5000, 5000}, std::vector{1, 1}, 0.01));
    const std::vector<int> even(100, 3000);
    EXPECT_FALSE(leat::agrees_with_counts(even, even, rate));

    // A gross fault is found at the first look; a right mean takes what its tolerance needs.
    const auto draw = [&] { return right(g); };
    const auto gross = leat::agrees_with_mean_within(draw, 1, 0.01, rate);
    EXPECT_FALSE(gross);
    EXPECT_EQ(gross.samples, 1000u);
    const auto fine = leat::agrees_with_mean_within(draw, 0, 0.05, rate);
    check("within", fine);
    EXPECT_GT(fine.samples, 8000u); // a standard error of a sixth of the tolerance or so
    EXPECT_LT(fine.samples, 200000u);

    EXPECT_TRUE(leat::agrees_with_bounded_mean(std::vector<int>{0, 1, 1, 0}, 0.5, 0, 1, 1e-6));
    EXPECT_FALSE(leat::agrees_with_bounded_mean(std::vector<int>(30, 1), 0.5, 0, 1, 1e-6));
}

// ---- what a check says ----

std::string printed(const leat::agreement& found) {
    std::ostringstream text;
    text << found;
    return text.str();
}

TEST(Agreement, SaysStatisticSizeAndRate) {
    const std::vector<int> x{1, 2, 3, 4, 5}; // t = (3 - 2) / sqrt(2.5 / 5)
    EXPECT_EQ(printed(leat::agrees_with_mean(x, 2, 0.001)),
              "leat::agrees_with_mean: agrees: mean 3, expected 2, t = 1.414; 5 samples, "
              "p = 0.2302, not below the alarm rate 0.001");
    // A point at 1 - 0.01 of one uniform: p = 2 * 0.01.
    EXPECT_EQ(printed(leat::agrees_with_distribution(
                  std::vector{0.99}, [](double u) { return u; }, 0.05)),
              "leat::agrees_with_distribution: does not agree: largest distance 0.99; 1 samples, "
              "p = 0.02, below the alarm rate 0.05");
    // chi-square 2 at 1 degree of freedom: above it erfc(1) = 0.1572992 (Abramowitz and
    // Stegun, 7.1)
    EXPECT_EQ(printed(leat::agrees_with_counts(std::vector{110, 85, 5, 0},
                                               std::vector{0.5, 0.48, 0.01, 0.01}, 0.01)),
              "leat::agrees_with_counts: agrees: chi-square 2 with 1 degree of freedom (4 cells "
              "joined to 2); 200 samples, p = 0.3146, not below the alarm rate 0.01");
    // Hoeffding, all hits: 2 * 2^-10.
    EXPECT_EQ(
        printed(leat::agrees_with_bounded_mean(std::vector<bool>(10, true), 0.5, 0, 1, 0.01)),
        "leat::agrees_with_bounded_mean: does not agree: mean 1, expected 0.5, by Hoeffding's "
        "bound; 10 samples, p = 0.001953, below the alarm rate 0.01");
    int n = 0;
    EXPECT_EQ(
        printed(leat::agrees_with_mean_within([&n] { return n++ % 2; }, 0.5, 0.001, 0.01, 1500)),
        "leat::agrees_with_mean_within: undecided after 1500 draws: mean 0.5, expected 0.5 to "
        "within 0.001, t = 0, p = 1, this look's share of the alarm rate 0.01 being 0.0025");
}

TEST(Agreement, GoogleTestShowsTheMessage) {
    const std::vector<int> x(100, 7);
    EXPECT_NONFATAL_FAILURE(
        EXPECT_TRUE(leat::agrees_with_mean(x, 8, 1e-6)),
        "does not agree: mean 7, expected 8, t = -inf (BEWARE: all samples are alike, so that "
        "nothing is known of their spread); 100 samples, p = 0, "
        "below the alarm rate 1e-06");
    EXPECT_TRUE(leat::agrees_with_mean(x, 7, 1e-6));
}

TEST(Agreement, WarnsOfSkewSamples) {
    std::vector<double> x(100, 0.0);
    x[3] = 1; // skewness 9.85
    EXPECT_NE(printed(leat::agrees_with_mean(x, 0.01, 1e-6)).find("BEWARE: skewness 9.849"),
              std::string::npos);
    EXPECT_EQ(printed(leat::agrees_with_mean(x, 0.01, 0.5)).find("BEWARE"), std::string::npos);
}

// A chance of one in a thousand: at the first looks nothing was hit yet, and nothing is concluded.
TEST(Agreement, RareHitsAreWaitedFor) {
    int n = 0;
    const auto draw = [&n] { return ++n % 1500 == 0 ? 1 : 0; };
    const auto found = leat::agrees_with_mean_within(draw, 1 / 1500.0, 1e-4, 0.01);
    EXPECT_TRUE(found) << found;
    EXPECT_GT(found.samples, 100000u);
    const auto none = leat::agrees_with_mean_within([] { return 0; }, 0.5, 0.1, 0.01, 10000);
    EXPECT_FALSE(none);
    EXPECT_NE(none.message.find("undecided after 10000 draws"), std::string::npos) << none;
}

TEST(Agreement, SpoiltSamplesDoNotAgree) {
    const std::vector<double> x{0.5, std::nan(""), 0.5};
    const std::string says = "sample 1 (counted from 0) ";
    const auto identity = [](double u) { return u; };
    EXPECT_NE(
        printed(leat::agrees_with_mean(x, 0.5, 1e-6)).find(says + "is not at most 2^200 in size"),
        std::string::npos);
    EXPECT_FALSE(leat::agrees_with_mean(x, 0.5, 1e-6));
    EXPECT_FALSE(leat::agrees_with_mean(std::vector{1e200, -1e200}, 0, 1e-6));
    EXPECT_FALSE(leat::agrees_with_distribution(x, identity, 1e-6));
    EXPECT_FALSE(leat::agrees_with_bounded_mean(x, 0.5, 0, 1, 1e-6));
    EXPECT_NE(printed(leat::agrees_with_bounded_mean(std::vector{0.5, 1.5}, 0.5, 0, 1, 1e-6))
                  .find(says + "is outside lo to hi"),
              std::string::npos);
    EXPECT_FALSE(leat::agrees_with_mean_within([] { return std::nan(""); }, 0, 1, 0.5));
    EXPECT_NE(printed(leat::agrees_with_counts(std::vector{50, 50, 1}, std::vector{1, 1, 0}, 0.5))
                  .find("cell 2 (counted from 0) has samples and expects none"),
              std::string::npos);
}

TEST(Agreement, RefusesWhatNoCheckCanMean) {
    const auto expect_refused = [](auto call, const std::string& text) {
        try {
            static_cast<void>(call());
            FAIL() << "not refused: " << text;
        } catch (const leat::invalid_parameter& e) {
            EXPECT_EQ(std::string(e.what()).rfind("leat::" + text, 0), 0u) << e.what();
        }
    };
    const std::vector<double> x{0.2, 0.4};
    const auto identity = [](double u) { return u; };
    expect_refused([&] { return leat::agrees_with_mean(x, 0, 0); },
                   "agrees_with_mean: alarm_rate = 0, must be > 0 and < 1");
    expect_refused([&] { return leat::agrees_with_mean(x, std::nan(""), 0.1); },
                   "agrees_with_mean: expected_mean = nan, must be at most 2^200 in size");
    expect_refused([&] { return leat::agrees_with_mean(std::span(x).first(1), 0, 0.1); },
                   "agrees_with_mean: samples = 1, must be at least 2");
    expect_refused([&] { return leat::agrees_with_bounded_mean(x, 0, 1, 1, 0.1); },
                   "agrees_with_bounded_mean: hi = 1, must be > lo");
    expect_refused([&] { return leat::agrees_with_bounded_mean(x, 2, 0, 1, 0.1); },
                   "agrees_with_bounded_mean: expected_mean = 2, must be from lo to hi");
    expect_refused([&] { return leat::agrees_with_mean_within([] { return 0; }, 0, 0, 0.1); },
                   "agrees_with_mean_within: tolerance = 0, must be > 0 and at most 2^200");
    expect_refused([&] { return leat::agrees_with_mean_within([] { return 0; }, 0, 1, 0.1, 999); },
                   "agrees_with_mean_within: most_draws = 999, must be at least 1000");
    expect_refused([&] { return leat::agrees_with_distribution(x, identity, 1); },
                   "agrees_with_distribution: alarm_rate = 1, must be > 0 and < 1");
    expect_refused(
        [&] { return leat::agrees_with_distribution(std::span(x).first(0), identity, 0.1); },
        "agrees_with_distribution: samples = 0, must be at least 1");
    expect_refused(
        [&] {
            return leat::agrees_with_distribution(
                x, [](double u) { return 1 - u; }, 0.1);
        },
        "agrees_with_distribution: value of the distribution function = 0.6, must be from "
        "0 to 1, and must not fall");
    expect_refused(
        [&] { return leat::agrees_with_counts(x, std::vector{1}, 0.1); },
        "agrees_with_counts: number of expected cells = 1, must be that of the observed");
    expect_refused(
        [&] {
            return leat::agrees_with_counts(std::vector{-1, 1}, std::vector{1, 1}, 0.1);
        },
        "agrees_with_counts: observed[0] = -1, must be a count");
    expect_refused(
        [&] {
            return leat::agrees_with_counts(std::vector{1, 1}, std::vector{1, -1}, 0.1);
        },
        "agrees_with_counts: expected[1] = -1, must be finite and >= 0");
    expect_refused(
        [&] {
            return leat::agrees_with_counts(std::vector{1, 1}, std::vector{0, 0}, 0.1);
        },
        "agrees_with_counts: sum of expected = 0, must be finite and > 0");
    expect_refused(
        [&] {
            return leat::agrees_with_counts(std::vector{6, 1}, std::vector{1, 1}, 0.1);
        },
        "agrees_with_counts: fewer than two cells expect 5 samples");
}

} // namespace
