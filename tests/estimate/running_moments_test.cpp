// running_moments: against certified results, GSL, and its own promises (merging, refusals, text).

#include "leat/estimate/batch_means.hpp"
#include "leat/estimate/paired_differences.hpp"
#include "leat/estimate/running_moments.hpp"
#include "leat/estimate/stopping.hpp"

#include <gsl/gsl_statistics_double.h>
#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <sstream>
#include <string>
#include <vector>

namespace {

using leat::running_moments;

/// A few hundred values without structure: the fractions of multiples of sqrt(2), cubed.
std::vector<double> some_values(std::size_t n, double scale = 1, double shift = 0) {
    std::vector<double> x(n);
    for (std::size_t i = 0; i < n; ++i) {
        const double u = std::fmod(static_cast<double>(i + 1) * 1.4142135623730951, 1.0);
        x[i] = shift + scale * u * u * u;
    }
    return x;
}

running_moments moments_of(std::span<const double> x) {
    running_moments m;
    m.add(x);
    return m;
}

/// What a call refuses with.
template <class Call>
std::string refusal(Call call) {
    try {
        call();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "not refused";
}

// NIST Statistical Reference Datasets, univariate summary statistics: NumAcc1 to 4 are made by
// rule; their certified values, and the data and certified values of Michelso, are from memory (the
// two agree to all certified digits, which no slip of memory would).
struct certified {
    const char* name;
    std::vector<double> values;
    double mean;
    double deviation;
    double tolerance; // of the deviation: what rounding the data to double costs
};

std::vector<double> alternating(double first, double low, double high) {
    std::vector<double> x{first};
    for (int i = 0; i < 500; ++i) {
        x.push_back(low);
        x.push_back(high);
    }
    return x;
}

TEST(RunningMoments, ReachTheCertifiedValuesOfTheReferenceDatasets) {
    std::vector<double> light; // Michelson's speed of light, km/s above 299000, in Mm/s
    for (const double km :
         {850,  740, 900, 1070, 930, 850, 950, 980, 980, 880, 1000, 980, 930, 650, 760, 810, 1000,
          1000, 960, 960, 960,  940, 960, 940, 880, 800, 850, 880,  900, 840, 830, 790, 810, 880,
          880,  830, 800, 790,  760, 800, 880, 880, 880, 860, 720,  720, 620, 860, 970, 950, 880,
          910,  850, 870, 840,  840, 850, 840, 840, 840, 890, 810,  810, 820, 800, 770, 760, 740,
          750,  760, 910, 920,  890, 860, 880, 720, 840, 850, 850,  780, 890, 840, 780, 810, 760,
          810,  790, 810, 820,  850, 870, 870, 810, 740, 810, 940,  950, 800, 810, 870}) {
        light.push_back(299 + km / 1000);
    }
    const certified sets[] = {
        {"NumAcc1", {10000001, 10000003, 10000002}, 10000002, 1, 1e-15},
        {"NumAcc2", alternating(1.2, 1.1, 1.3), 1.2, 0.1, 1e-14},
        {"NumAcc3", alternating(1000000.2, 1000000.1, 1000000.3), 1000000.2, 0.1, 1e-8},
        {"NumAcc4", alternating(10000000.2, 10000000.1, 10000000.3), 10000000.2, 0.1, 1e-7},
        {"Michelso", light, 299.8524, 0.0790105478190518, 1e-12},
    };
    for (const certified& set : sets) {
        const running_moments m = moments_of(set.values);
        EXPECT_NEAR(m.mean() / set.mean, 1, 1e-15) << set.name;
        EXPECT_NEAR(m.standard_deviation() / set.deviation, 1, set.tolerance) << set.name;
    }
}

TEST(RunningMoments, AgreeWithGsl) {
    for (const auto& x : {some_values(2), some_values(3, -5, 2), some_values(1000, 10, 1e4),
                          some_values(777, 1e-30), some_values(777, 1e30)}) {
        const running_moments m = moments_of(x);
        const std::size_t n = x.size();
        const auto size = static_cast<double>(n);
        EXPECT_EQ(m.count(), n);
        EXPECT_NEAR(m.mean() / gsl_stats_mean(x.data(), 1, n), 1, 1e-14);
        EXPECT_NEAR(m.variance() / gsl_stats_variance(x.data(), 1, n), 1, 1e-11);
        EXPECT_NEAR(m.standard_error() * std::sqrt(size) / gsl_stats_sd(x.data(), 1, n), 1, 1e-11);
        // GSL divides by the deviation of n - 1
        const double by_n = size / (size - 1);
        EXPECT_NEAR(m.skewness(), gsl_stats_skew(x.data(), 1, n) * std::pow(by_n, 1.5), 1e-9);
        EXPECT_NEAR(m.excess_kurtosis() + 3, (gsl_stats_kurtosis(x.data(), 1, n) + 3) * by_n * by_n,
                    1e-9);
        EXPECT_EQ(m.min(), gsl_stats_min(x.data(), 1, n));
        EXPECT_EQ(m.max(), gsl_stats_max(x.data(), 1, n));
    }
}

TEST(RunningMoments, MergeAsIfAllHadBeenAddedInOne) {
    const std::vector<double> x = some_values(1000, 3, -1);
    const running_moments whole = moments_of(x);
    for (const std::size_t cut : {0u, 1u, 2u, 13u, 500u, 999u, 1000u}) {
        running_moments m = moments_of(std::span(x).first(cut));
        m.merge(moments_of(std::span(x).subspan(cut)));
        EXPECT_EQ(m.count(), 1000u);
        EXPECT_NEAR(m.mean(), whole.mean(), 1e-14);
        EXPECT_NEAR(m.variance(), whole.variance(), 1e-13);
        EXPECT_NEAR(m.skewness(), whole.skewness(), 1e-12);
        EXPECT_NEAR(m.excess_kurtosis(), whole.excess_kurtosis(), 1e-12);
        EXPECT_EQ(m.min(), whole.min());
        EXPECT_EQ(m.max(), whole.max());
    }
    running_moments twice = whole;
    twice.merge(twice);
    EXPECT_EQ(twice.count(), 2000u);
    EXPECT_NEAR(twice.mean(), whole.mean(), 1e-15);
    EXPECT_NEAR(twice.excess_kurtosis(), whole.excess_kurtosis(), 1e-12);
}

TEST(RunningMoments, AreTheSameAtCompileTime) {
    constexpr auto work = [] {
        running_moments m;
        for (const double x : {0.1, 0.7, -3.3, 1e10, 2.5}) {
            m.add(x);
        }
        running_moments other;
        other.add(5.25);
        other.add(-0.3);
        m.merge(other);
        return m;
    };
    constexpr running_moments known = work();
    EXPECT_EQ(work(), known);
    static_assert(known.count() == 7 && known.min() == -3.3 && known.max() == 1e10);
}

TEST(RunningMoments, KeepTheirDigitsAtTheEndsOfTheirDomain) {
    running_moments large;
    running_moments small;
    for (const double x : {-1.0, 1.0, 1.0, -1.0, 1.0}) {
        large.add(x * 0x1p200);
        small.add(x * 0x1p-199);
    }
    EXPECT_EQ(large.mean(), 0.2 * 0x1p200);
    EXPECT_NEAR(large.variance() / 0x1p400, 1.2, 1e-15);
    EXPECT_NEAR(small.variance() / 0x1p-398, 1.2, 1e-15);
    EXPECT_NEAR(large.excess_kurtosis(), small.excess_kurtosis(), 1e-14);
    EXPECT_NEAR(large.skewness(), small.skewness(), 1e-14);
    running_moments tiny; // the mean goes on where the variance stops
    tiny.add(0x1p-400);
    tiny.add(3 * 0x1p-400);
    EXPECT_EQ(tiny.mean(), 0x1p-399);
    EXPECT_EQ(tiny.variance(), 0);
    running_moments subnormal;
    subnormal.add(0x1p-1060);
    subnormal.add(-0x1p-1070);
    EXPECT_EQ(subnormal.mean(), 0);
}

TEST(RunningMoments, RefuseWhatTheyCannotTakeOrGive) {
    running_moments m;
    const double infinite = std::numeric_limits<double>::infinity();
    for (const double x : {infinite, -infinite, std::nan(""), 0x1.1p200}) {
        EXPECT_THROW(m.add(x), leat::invalid_parameter);
    }
    EXPECT_EQ(m, running_moments{}); // nothing was taken in
    EXPECT_EQ(refusal([&] { m.add(1e300); }),
              "leat::running_moments: value = 1e+300, must be at most 2^200 in size");
    EXPECT_EQ(refusal([&] { (void)m.mean(); }),
              "leat::running_moments: count = 0, must be at least 1");
    EXPECT_THROW((void)m.min(), leat::invalid_parameter);
    EXPECT_THROW((void)m.max(), leat::invalid_parameter);
    m.add(4);
    EXPECT_EQ(m.mean(), 4);
    EXPECT_EQ(refusal([&] { (void)m.variance(); }),
              "leat::running_moments: count = 1, must be at least 2");
    m.add(4);
    EXPECT_EQ(m.variance(), 0);
    EXPECT_EQ(refusal([&] { (void)m.skewness(); }),
              "leat::running_moments: variance = 0, must be > 0 for a skewness or kurtosis");
    EXPECT_THROW((void)m.excess_kurtosis(), leat::invalid_parameter);

    // A count of 2^53 is full.
    running_moments full(leat::moments_state{std::uint64_t{1} << 53, 1, 0, 0, 0, 1, 1});
    const running_moments before = full;
    EXPECT_THROW(full.add(1), leat::invalid_parameter);
    EXPECT_THROW(full.merge(m), leat::invalid_parameter);
    EXPECT_EQ(full, before);
}

TEST(RunningMoments, RefuseStatesThatNoValuesLeadTo) {
    const leat::moments_state good = moments_of(some_values(10)).state();
    EXPECT_EQ(running_moments(good).state(), good);
    const auto refused = [&](auto change) {
        leat::moments_state bad = good;
        change(bad);
        EXPECT_THROW(running_moments{bad}, leat::invalid_parameter);
    };
    refused([](auto& s) { s.count = (std::uint64_t{1} << 53) + 1; });
    refused([](auto& s) { s.count = 0; });
    refused([](auto& s) { s.count = 1; });
    refused([](auto& s) { s.mean = std::nan(""); });
    refused([](auto& s) { s.second = -1; });
    refused([](auto& s) { s.second = 0x1p-1000; }); // less than any distance that counts
    refused([](auto& s) { s.third = std::nan(""); });
    refused([](auto& s) { s.fourth = std::numeric_limits<double>::infinity(); });
    refused([](auto& s) { s.min = s.max + 1; });
    refused([](auto& s) { s.max = 0x1p201; });
}

TEST(RunningMoments, GoThroughTextToTheBit) {
    for (const running_moments& m :
         {running_moments{}, moments_of(some_values(1)), moments_of(some_values(100, -3, 0.1))}) {
        std::stringstream text;
        text << std::hex << m;
        running_moments back;
        back.add(99);
        text >> back;
        EXPECT_TRUE(text);
        EXPECT_EQ(back, m);
    }
    std::ostringstream text;
    text << moments_of(some_values(3));
    const std::string whole = text.str();
    running_moments m;
    m.add(7);
    const running_moments before = m;
    std::string negative = whole; // the sum of squares, the third word
    negative[negative.find(' ', negative.find(' ') + 1) + 2] = 'f';
    for (const std::string& garbage :
         {std::string("three"), whole.substr(0, whole.size() - 1), negative}) {
        std::istringstream in(garbage);
        in >> m;
        EXPECT_TRUE(in.fail()) << garbage;
        EXPECT_EQ(m, before) << garbage;
    }
}

// "Student", Biometrika 6, 1908: hours of sleep gained by ten patients under two drugs; data from
// memory, pinned by the results that go with them in intervals_test.cpp.
TEST(PairedDifferences, TakePairsMergeAndRestore) {
    const double one[] = {0.7, -1.6, -0.2, -1.2, -0.1, 3.4, 3.7, 0.8, 0.0, 2.0};
    const double two[] = {1.9, 0.8, 1.1, 0.1, -0.1, 4.4, 5.5, 1.6, 4.6, 3.4};
    leat::paired_differences all;
    leat::paired_differences left;
    leat::paired_differences right;
    for (int i = 0; i < 10; ++i) {
        all.add(one[i], two[i]);
        (i < 4 ? left : right).add(one[i], two[i]);
    }
    left.merge(right);
    EXPECT_EQ(all.count(), 10u);
    EXPECT_EQ(left.count(), 10u);
    EXPECT_NEAR(all.difference().mean(), -1.58, 1e-15);
    EXPECT_NEAR(left.difference().mean(), -1.58, 1e-15);
    EXPECT_NEAR(left.variance_ratio(), all.variance_ratio(), 1e-13);
    // var(a) + var(b) over var(a - b), by GSL
    double difference[10];
    for (int i = 0; i < 10; ++i) {
        difference[i] = one[i] - two[i];
    }
    EXPECT_NEAR(all.variance_ratio(),
                (gsl_stats_variance(one, 1, 10) + gsl_stats_variance(two, 1, 10)) /
                    gsl_stats_variance(difference, 1, 10),
                1e-12);
    EXPECT_EQ(leat::paired_differences(all.first(), all.second(), all.difference()), all);
    EXPECT_THROW(leat::paired_differences(all.first(), all.second(), right.difference()),
                 leat::invalid_parameter);

    leat::paired_differences none;
    EXPECT_THROW(none.add(0x1p200, 0), leat::invalid_parameter);
    EXPECT_THROW(none.add(0, std::nan("")), leat::invalid_parameter);
    EXPECT_EQ(none, leat::paired_differences{});
    none.add(1, 2);
    none.add(2, 3);
    EXPECT_EQ(refusal([&] { (void)none.variance_ratio(); }),
              "leat::paired_differences: variance of the difference = 0, must be > 0 for a ratio");
}

TEST(BatchMeans, KeepTwentyToThirtyNineFullBatches) {
    leat::batch_means run(3);
    const std::vector<double> x = some_values(5003);
    for (std::size_t i = 0; i < x.size(); ++i) {
        run.add(x[i]);
        if (i + 1 < 23) {
            EXPECT_THROW((void)run.report(), leat::invalid_parameter);
            continue;
        }
        const std::uint64_t used = i + 1 - 3;
        EXPECT_EQ(run.count(), used);
        EXPECT_GE(run.batches(), 20u);
        EXPECT_LE(run.batches(), 39u);
        EXPECT_EQ(run.batches(), used / run.batch_length());
    }
    // 5000 values: 39 batches of 128. GSL gives their means, and the mean of those.
    const leat::batch_report r = run.report(0.9);
    EXPECT_EQ(r.batches, 39u);
    EXPECT_EQ(r.batch_length, 128u);
    std::vector<double> means;
    for (std::size_t i = 0; i < 39; ++i) {
        means.push_back(gsl_stats_mean(&x[3 + 128 * i], 1, 128));
    }
    EXPECT_NEAR(r.estimate, gsl_stats_mean(means.data(), 1, 39), 1e-13);
    const double deviation = gsl_stats_sd(means.data(), 1, 39);
    EXPECT_NEAR(r.mean.half_width() / (1.6859544602 * deviation / std::sqrt(39.0)), 1, 1e-8)
        << "t of 38 degrees from memory; printed tables have 1.686";
    EXPECT_EQ(r.mean.level, 0.9);
    // von Neumann's ratio, by its definition
    double steps = 0;
    for (std::size_t i = 1; i < 39; ++i) {
        steps += std::pow(means[i] - means[i - 1], 2);
    }
    EXPECT_NEAR(r.correlation, 1 - steps / (2 * 38 * deviation * deviation), 1e-9);
}

TEST(BatchMeans, WarnOfATrendAndNotOfAlternation) {
    leat::batch_means rising;
    leat::batch_means alternating;
    leat::batch_means still;
    for (int i = 0; i < 1000; ++i) {
        rising.add(i);
        alternating.add(i / 32 % 2); // batches of 32: neighbours differ
        still.add(2.5);
    }
    EXPECT_TRUE(rising.report().correlated);
    EXPECT_GT(rising.report().correlation, 0.9);
    EXPECT_FALSE(alternating.report().correlated);
    EXPECT_LT(alternating.report().correlation, -0.9);
    EXPECT_FALSE(still.report().correlated);
    EXPECT_EQ(still.report().mean, (leat::interval{2.5, 2.5, 0.95}));
    leat::batch_means run;
    EXPECT_THROW(run.add(std::nan("")), leat::invalid_parameter);
    EXPECT_EQ(run.count(), 0u);
    EXPECT_THROW((void)rising.report(1), leat::invalid_parameter);
    EXPECT_EQ(refusal([&] { (void)run.report(); }),
              "leat::batch_means: batches = 0, must be at least 20: run longer");
}

TEST(StoppingRule, StopsWhereStudentsIntervalIsNarrowEnough) {
    const leat::stopping_rule rule{.half_width = 0.03, .level = 0.9, .at_least = 10};
    running_moments m;
    for (const double x : some_values(3000)) {
        m.add(x);
        if (m.count() < 10) {
            EXPECT_FALSE(rule.enough(m));
        } else {
            EXPECT_EQ(rule.enough(m), leat::student_interval(m, 0.9).half_width() <= 0.03)
                << m.count();
        }
    }
    EXPECT_TRUE(rule.enough(m));
    // the normal law's count, by its formula: (1.6448536 s / 0.03)^2
    EXPECT_NEAR(static_cast<double>(rule.expected_count(m)),
                std::pow(1.6448536269514722 / 0.03, 2) * m.variance(), 1);
}

TEST(StoppingRule, JudgesByTheMeansSizeToo) {
    const leat::stopping_rule share{.relative = 0.1, .at_least = 5};
    const leat::stopping_rule both{.half_width = 0.05, .relative = 0.1, .at_least = 5};
    running_moments m;
    m.add(some_values(300, 1, -10)); // mean near -9.75, half-width near 0.03
    EXPECT_TRUE(share.enough(m));
    EXPECT_TRUE(both.enough(m));
    running_moments near_zero;
    near_zero.add(some_values(300, 1, -0.25));
    EXPECT_FALSE(share.enough(near_zero));
    EXPECT_FALSE(both.enough(near_zero));
}

TEST(StoppingRule, WaitsWhileNothingVariesButNotForever) {
    const leat::stopping_rule rule{.half_width = 1, .at_least = 10, .at_most = 1000};
    running_moments m;
    for (int i = 1; i < 1000; ++i) {
        m.add(0); // a rare event, not yet seen
        EXPECT_FALSE(rule.enough(m));
    }
    m.add(0);
    EXPECT_TRUE(rule.enough(m));
    EXPECT_EQ(rule.expected_count(m), 10u);
    running_moments wide;
    wide.add(1e9);
    wide.add(-1e9);
    EXPECT_EQ(rule.expected_count(wide), 1000u);
}

TEST(StoppingRule, RefusesWhatAsksForNothing) {
    running_moments m;
    const auto refused = [&](const leat::stopping_rule& rule) {
        return refusal([&] { (void)rule.enough(m); });
    };
    EXPECT_EQ(refused({}), "leat::stopping_rule: half_width = 0, must be > 0, unless relative is");
    EXPECT_EQ(refused({.half_width = -1}),
              "leat::stopping_rule: half_width = -1, must be >= 0, at most 2^200");
    EXPECT_EQ(refused({.relative = std::nan("")}),
              "leat::stopping_rule: relative = nan, must be >= 0, at most 2^200");
    EXPECT_EQ(refused({.half_width = 1, .level = 1}),
              "leat::stopping_rule: level = 1, must be >= 0.001 and < 1");
    EXPECT_EQ(refused({.half_width = 1, .at_least = 1}),
              "leat::stopping_rule: at_least = 1, must be at least 2");
    EXPECT_EQ(refused({.half_width = 1, .at_most = 29}),
              "leat::stopping_rule: at_most = 29, must not be below at_least");
    EXPECT_FALSE((leat::stopping_rule{.half_width = 1}.enough(m)));
}

} // namespace
