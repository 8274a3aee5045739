// weighted_index: fit before and after updates, no drift, outcomes that must never come, refusals.

#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"

#include "leat/bulk/fill.hpp"
#include "leat/distributions/weighted_index.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <bit>
#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <random>
#include <sstream>
#include <string>
#include <vector>

namespace {

using namespace leat_test;

constexpr int many = 1000000;

/// Chi-square of many draws over the outcomes of positive weight; the others must not come.
/// Reference: the probabilities of std::discrete_distribution.
void check_draws(const std::string& name, const leat::weighted_index<>& law, leat::stream& g) {
    const std::vector<double> weights = law.weights();
    std::vector<std::uint64_t> counts(weights.size());
    for (int i = 0; i < many; ++i) {
        ++counts.at(static_cast<std::size_t>(law(g)));
    }
    const auto all = std::discrete_distribution<>(weights.begin(), weights.end()).probabilities();
    std::vector<std::uint64_t> seen;
    std::vector<double> probabilities;
    for (std::size_t i = 0; i < weights.size(); ++i) {
        if (weights[i] > 0) {
            seen.push_back(counts[i]);
            probabilities.push_back(all[i]);
        } else {
            EXPECT_EQ(counts[i], 0u) << name << ", outcome " << i;
        }
    }
    check(chi_square_test(name, seen, probabilities));
}

TEST(WeightedIndexGoodness, BeforeAndAfterUpdates) {
    auto g = source_of_this_test().stream();
    leat::weighted_index law({1, 2, 3});
    check_draws("three", law, g);
    law.update(1, 0);
    check_draws("one gone", law, g);
    law.update(0, 0.125);
    law.update(1, 5);
    check_draws("and back", law, g);

    std::vector<double> weights(777);
    for (std::size_t i = 0; i < weights.size(); ++i) {
        weights[i] = i % 3 == 0 ? 0.0 : 1 + static_cast<double>(i % 17);
    }
    leat::weighted_index large(weights);
    check_draws("many", large, g);
    for (std::int64_t i = 0; i < 777; i += 2) {
        large.update(i, i % 4 == 0 ? 3.25 : 0.0);
    }
    check_draws("many, changed", large, g);
}

// The sums are a function of the weights: a million changes leave no trace.
TEST(WeightedIndex, UpdatesLeaveTheTreeOfTheWeightsTheyEndWith) {
    leat::xoshiro256_plus_plus g{1};
    std::vector<double> weights(1000, 1.0);
    leat::weighted_index law(weights);
    for (int i = 0; i < 200000; ++i) {
        const auto k = static_cast<std::int64_t>(g() % 1000);
        const double w = g() % 4 == 0 ? 0.0 : std::exp2(static_cast<double>(g() % 200) - 100);
        law.update(k, w);
        weights[static_cast<std::size_t>(k)] = w;
        ASSERT_EQ(law.weight(k), w);
    }
    const leat::weighted_index<> afresh(weights);
    EXPECT_EQ(law, afresh);
    EXPECT_EQ(law.weights(), weights);
    EXPECT_EQ(std::bit_cast<std::uint64_t>(law.total()),
              std::bit_cast<std::uint64_t>(afresh.total()));
    long double sum = 0; // 64 bits of precision here, 53 at least anywhere
    for (const double w : weights) {
        sum += w;
    }
    EXPECT_NEAR(law.total() / static_cast<double>(sum), 1, 1e-14);
    for (std::int64_t k = 0; k < 1000; ++k) {
        law.update(k, 1);
    }
    EXPECT_EQ(law, leat::weighted_index<>(std::vector<double>(1000, 1.0)));
    EXPECT_EQ(law.total(), 1000);
}

// P3: neither the least word nor the greatest, nor rounding at the end of a sum, leads to an
// outcome of weight 0 or beyond the last.
TEST(WeightedIndex, NoWordGivesAnOutcomeOfWeightZero) {
    leat::xoshiro256_plus_plus g{2};
    for (const std::size_t n : {1u, 2u, 3u, 7u, 8u, 100u}) {
        for (int trial = 0; trial < 300; ++trial) {
            std::vector<double> weights(n);
            for (double& w : weights) {
                w = g() % 3 != 0 ? 0.0 : std::exp2(static_cast<double>(g() % 1800) - 900);
                w = w * (1 + static_cast<double>(g() % 1000) / 1001);
                w = w > 0x1p900 ? 0x1p900 : w;
            }
            weights[g() % n] = 0.1;
            const leat::weighted_index law(weights);
            for (int draw = 0; draw < 64; ++draw) {
                leat::constant ends{draw % 2 == 0 ? ~std::uint64_t{0} << draw
                                                  : ~std::uint64_t{0} >> draw};
                ASSERT_GT(weights.at(static_cast<std::size_t>(law(ends))), 0.0);
                ASSERT_GT(weights.at(static_cast<std::size_t>(law(g))), 0.0);
            }
        }
    }
}

TEST(WeightedIndex, AllWeightsMayBeZeroButNotForADraw) {
    leat::weighted_index law({0, 0.5});
    law.update(1, 0);
    EXPECT_EQ(law.total(), 0);
    leat::xoshiro256_plus_plus g{3};
    EXPECT_THROW(static_cast<void>(law(g)), leat::invalid_parameter);
    EXPECT_EQ(g, leat::xoshiro256_plus_plus{3});
    std::vector<std::int64_t> out(100, -1);
    auto words = leat::source{4}.stream("fill");
    EXPECT_THROW(leat::fill(out, law, words), leat::invalid_parameter);
    EXPECT_EQ(words.position(), 0u);
    law.update(0, 0x1p-900);
    EXPECT_EQ(law(g), 0);
}

template <class Do>
std::string refusal(Do what) {
    try {
        what();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "nothing refused";
}

TEST(WeightedIndex, RefusesWithoutChangingAnything) {
    leat::weighted_index law({1, 2, 3});
    const leat::weighted_index<> before = law;
    const std::string allowed = ", must be 0 or from 2^-900 to 2^900";
    EXPECT_EQ(refusal([&] { law.update(1, -1); }),
              "leat::weighted_index: weights[1] = -1" + allowed);
    EXPECT_EQ(refusal([&] { law.update(2, 1e300); }),
              "leat::weighted_index: weights[2] = 1e+300" + allowed);
    EXPECT_EQ(refusal([&] { law.update(0, 1e-300); }),
              "leat::weighted_index: weights[0] = 1e-300" + allowed);
    EXPECT_EQ(refusal([&] { law.update(3, 1); }),
              "leat::weighted_index: i = 3, must be the number of an outcome, from 0");
    EXPECT_EQ(refusal([&] { law.update(-1, 1); }),
              "leat::weighted_index: i = -1, must be the number of an outcome, from 0");
    EXPECT_EQ(refusal([&] { static_cast<void>(law.weight(7)); }),
              "leat::weighted_index: i = 7, must be the number of an outcome, from 0");
    EXPECT_THROW(law.update(0, std::numeric_limits<double>::quiet_NaN()), leat::invalid_parameter);
    EXPECT_THROW(law.update(0, std::numeric_limits<double>::infinity()), leat::invalid_parameter);
    EXPECT_EQ(law, before);
    EXPECT_EQ(refusal([] { static_cast<void>(leat::weighted_index(std::vector<double>{})); }),
              "leat::weighted_index: size of weights = 0, must be at least 1");
    EXPECT_EQ(refusal([] {
                  static_cast<void>(leat::weighted_index({1, -2}));
              }),
              "leat::weighted_index: weights[1] = -2" + allowed);
    EXPECT_THROW(leat::weighted_index<std::int8_t>(std::vector<double>(129, 1.0)),
                 leat::invalid_parameter);
}

TEST(WeightedIndex, TextRoundTripAndGarbage) {
    static_assert(std::regular<leat::weighted_index<>>);
    leat::weighted_index law({1, 2, 3});
    law.update(1, 0);
    std::stringstream text;
    text << law;
    EXPECT_EQ(text.str(), "3 x3ff0000000000000 x0000000000000000 x4008000000000000");
    leat::weighted_index<> read;
    text >> read;
    EXPECT_EQ(read, law);
    for (const char* garbage : {"", "0", "1", "1 x", "2 x3ff0000000000000 xbff0000000000000",
                                "1 x7ff8000000000000", "1 x0000000000000001"}) {
        std::istringstream is{garbage};
        is >> read;
        EXPECT_TRUE(is.fail()) << garbage;
        EXPECT_EQ(read, law) << garbage;
    }
}

TEST(WeightedIndex, ConstantEvaluationAgrees) {
    constexpr auto sum = [] {
        leat::weighted_index law({0.5, 0, 3, 1e-3, 2});
        leat::xoshiro256_plus_plus g{3};
        std::int64_t total = 0;
        for (int i = 0; i < 60; ++i) {
            law.update(i % 5, 1.0 / (i + 1));
            total = 3 * (total % 1000) + law(g);
        }
        return total;
    };
    constexpr std::int64_t at_compile_time = sum();
    EXPECT_EQ(sum(), at_compile_time);
}

} // namespace
