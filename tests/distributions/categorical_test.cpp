// categorical: fit, outcomes that must never come, what is refused, ISO C++ [rand.req.dist].

#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"

#include "leat/distributions/categorical.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "leat/uniform/unit.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <numeric>
#include <random>
#include <sstream>
#include <string>
#include <vector>

namespace {

using namespace leat_test;

constexpr int many = 1000000;

/// Draws from `sampler`, counted by outcome 0 .. n - 1.
template <class Sampler>
std::vector<std::uint64_t> counts_of(const Sampler& sampler, std::size_t n, leat::stream& g) {
    std::vector<std::uint64_t> counts(n);
    for (int i = 0; i < many; ++i) {
        ++counts.at(static_cast<std::size_t>(sampler(g)));
    }
    return counts;
}

/// Chi-square over the outcomes of positive weight; the others must have no draw. Reference: the
/// probabilities of std::discrete_distribution.
outcome report(const std::string& name, const std::vector<std::uint64_t>& counts,
               const std::vector<double>& weights) {
    const auto all = std::discrete_distribution<>(weights.begin(), weights.end()).probabilities();
    std::vector<std::uint64_t> seen;
    std::vector<double> probabilities;
    for (std::size_t i = 0; i < weights.size(); ++i) {
        if (weights[i] > 0) {
            seen.push_back(counts[i]);
            probabilities.push_back(all[i]);
        } else {
            EXPECT_EQ(counts[i], 0u) << name << ": outcome " << i << " has weight 0";
        }
    }
    return chi_square_test(name, seen, probabilities);
}

void check_weights(const std::string& name, const std::vector<double>& weights,
                   const std::vector<double>& in_proportion) {
    auto g = source_of_this_test().stream(name);
    check(report(name, counts_of(leat::categorical(weights), weights.size(), g), in_proportion));
}
void check_weights(const std::string& name, const std::vector<double>& weights) {
    check_weights(name, weights, weights);
}

TEST(CategoricalGoodness, Weights) {
    check_weights("two", {0.3, 0.7});
    check_weights("die", {1, 1, 1, 1, 1, 1});
    check_weights("powers of two", {1, 2, 4, 8, 16, 32, 64});
    check_weights("holes", {0, 3, 0, 0, 1, 1e-3, 0, 2.5, 0});
    std::vector<double> line(1000);
    std::iota(line.begin(), line.end(), 500);
    check_weights("a thousand", line);
    // Sums that no double holds: the reference has the same proportions.
    check_weights("huge", {1.6e308, 1.6e308, 0.8e308}, {2, 2, 1});
    check_weights("tiny", {0, 4.9e-324, 9.9e-324}, {0, 1, 2});
}

// The heavy outcome and the million light ones together: where a table in float goes wrong.
std::vector<double> one_heavy() {
    std::vector<double> weights(1 + (1U << 20), 1.0);
    weights[0] = 0x1p24;
    return weights;
}
constexpr double chance_of_light = 1.0 / 17; // 2^20 / (2^24 + 2^20)

template <class Sampler>
outcome report_light(const Sampler& sampler) {
    auto g = source_of_this_test().stream();
    std::uint64_t light = 0;
    for (int i = 0; i < many; ++i) {
        light += sampler(g) != 0 ? 1U : 0U;
    }
    return count_test("light outcomes", light, many, chance_of_light);
}

TEST(CategoricalGoodness, OneHeavyOutcomeAmongAMillion) {
    check(report_light(leat::categorical(one_heavy())));
}

/// Vose's algorithm as published (1991), in any floating-point type.
template <class Real>
class textbook_alias {
public:
    explicit textbook_alias(const std::vector<double>& weights)
        : keep_(weights.size(), Real{1}), alias_(weights.size()) {
        Real total = 0;
        for (const double w : weights) {
            total += static_cast<Real>(w);
        }
        std::vector<Real> p;
        std::vector<std::size_t> small;
        std::vector<std::size_t> large;
        for (std::size_t i = 0; i < weights.size(); ++i) {
            p.push_back(static_cast<Real>(weights[i]) / total * static_cast<Real>(weights.size()));
            (p[i] < 1 ? small : large).push_back(i);
        }
        while (!small.empty() && !large.empty()) {
            const std::size_t s = small.back();
            const std::size_t l = large.back();
            small.pop_back();
            keep_[s] = p[s];
            alias_[s] = l;
            p[l] = (p[l] + p[s]) - 1;
            if (p[l] < 1) {
                large.pop_back();
                small.push_back(l);
            }
        }
    }
    template <class G>
    std::size_t operator()(G& g) const {
        const auto j = static_cast<std::size_t>(leat::below(keep_.size(), g));
        return leat::unit(g) < static_cast<double>(keep_[j]) ? j : alias_[j];
    }

private:
    std::vector<Real> keep_;
    std::vector<std::size_t> alias_;
};

TEST(PlantedFaults, TextbookAliasInDoublePasses) {
    check(report_light(textbook_alias<double>(one_heavy())));
}

TEST(PlantedFaults, AliasTableBuiltInFloatIsRejected) {
    EXPECT_TRUE(is_rejected({report_light(textbook_alias<float>(one_heavy()))}));
}

TEST(PlantedFaults, ModuloOfAWordIsRejected) {
    auto g = source_of_this_test().stream();
    const auto by_modulo = [](leat::stream& words) { return (words() >> 56) % 100; };
    const std::vector<double> alike(100, 1.0);
    EXPECT_TRUE(is_rejected({report("modulo", counts_of(by_modulo, 100, g), alike)}));
}

// P3: an outcome of weight 0 does not come, whatever the words; nor does anything out of range.
TEST(Categorical, NoWordGivesAnOutcomeOfWeightZero) {
    std::vector<double> weights(37);
    for (std::size_t i = 0; i < weights.size(); ++i) {
        weights[i] = i % 5 == 2 ? std::pow(1e40, static_cast<double>(i) / 5 - 4) : 0;
    }
    const leat::categorical law(weights);
    const auto positive = [&](std::int64_t k) {
        return weights.at(static_cast<std::size_t>(k)) > 0;
    };
    leat::all_zeros zeros;
    leat::all_ones ones;
    EXPECT_TRUE(positive(law(zeros)));
    EXPECT_TRUE(positive(law(ones)));
    leat::xoshiro256_plus_plus g{1};
    for (int i = 0; i < 100000; ++i) {
        leat::constant word{g() & (~std::uint64_t{0} << (i % 64))}; // ends of columns too
        ASSERT_TRUE(positive(law(word)));
    }
}

TEST(Categorical, LeastWeightsBesideLargestDoNotDisturb) {
    const leat::categorical law({1e-300, 1e300, 4.9e-324, 0, 1e300});
    leat::xoshiro256_plus_plus g{2};
    for (int i = 0; i < 10000; ++i) {
        const auto k = law(g);
        ASSERT_TRUE(k == 1 || k == 4);
    }
    const leat::categorical one({0, 0, 4.9e-324, 0});
    for (int i = 0; i < 1000; ++i) {
        ASSERT_EQ(one(g), 2);
    }
}

TEST(Categorical, OneWordADraw) {
    const leat::categorical law({1, 2, 3});
    leat::xoshiro256_plus_plus g{3};
    leat::xoshiro256_plus_plus words{3};
    for (int i = 0; i < 100; ++i) {
        static_cast<void>(law(g));
        words();
    }
    EXPECT_EQ(g, words);
}

// Values by hand from the definition.
TEST(Categorical, MomentsAndChances) {
    const leat::categorical law({1, 0, 2, 5});
    EXPECT_DOUBLE_EQ(law.mean(), 2.375);        // (2 * 2 + 3 * 5) / 8
    EXPECT_DOUBLE_EQ(law.variance(), 0.984375); // (4 * 2 + 9 * 5) / 8 - 2.375^2
    EXPECT_EQ(law.density(0), 0.125);
    EXPECT_EQ(law.density(1), 0);
    EXPECT_EQ(law.density(3), 0.625);
    EXPECT_EQ(law.density(-1), 0);
    EXPECT_EQ(law.density(4), 0);
    EXPECT_EQ(law.density(2.5), 0);
    EXPECT_EQ(law.cumulative(-1), 0);
    EXPECT_EQ(law.cumulative(0), 0.125);
    EXPECT_EQ(law.cumulative(1), 0.125);
    EXPECT_EQ(law.cumulative(2), 0.375);
    EXPECT_EQ(law.cumulative(3), 1);
    EXPECT_EQ(law.quantile(0.125), 0);
    EXPECT_EQ(law.quantile(0.126), 2);
    EXPECT_EQ(law.quantile(0.375), 2);
    EXPECT_EQ(law.quantile(0.9), 3);
    EXPECT_THROW(static_cast<void>(law.quantile(1)), leat::invalid_parameter);
    const leat::categorical far({1e300, 1e-5, 1e-300});
    EXPECT_DOUBLE_EQ(far.density(1), 1e-305);
    EXPECT_EQ(far.density(2), 0); // 1e-600
    EXPECT_DOUBLE_EQ(leat::categorical({1.7e308, 1.7e308}).mean(), 0.5);
    EXPECT_DOUBLE_EQ(leat::categorical({5e-324, 5e-324}).variance(), 0.25);
}

template <class Make>
std::string refusal(Make make) {
    try {
        make();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "nothing refused";
}

TEST(Categorical, RefusesWhatIsNoListOfWeightsAndNamesTheEntry) {
    const auto made_of = [](const std::vector<double>& weights) {
        return refusal([&] { static_cast<void>(leat::categorical(weights)); });
    };
    EXPECT_EQ(made_of({}), "leat::categorical: size of weights = 0, must be at least 1");
    EXPECT_EQ(made_of({0, 0}), "leat::categorical: sum of weights = 0, must be > 0");
    EXPECT_EQ(made_of({1, 2, -0.5}),
              "leat::categorical: weights[2] = -0.5, must be finite and >= 0");
    EXPECT_EQ(made_of({std::numeric_limits<double>::infinity(), 1}),
              "leat::categorical: weights[0] = inf, must be finite and >= 0");
    EXPECT_EQ(made_of({1, std::numeric_limits<double>::quiet_NaN()})
                  .find("leat::categorical: weights[1] = "),
              0u);
    const std::vector<double> most(128, 1.0);
    EXPECT_EQ(leat::categorical<std::int8_t>(most).max(), 127);
    EXPECT_EQ(refusal([] {
                  static_cast<void>(leat::categorical<std::int8_t>(std::vector<double>(129, 1.0)));
              }),
              "leat::categorical: size of weights = 129, must be at most what the integer type can "
              "number");
}

// [rand.req.dist], as requirements_test.cpp has it for laws whose parameters are numbers.
TEST(Categorical, MeetsTheRequirementsOfIso) {
    using law = decltype(leat::categorical({1.0, 2.0}));
    using parameters = law::param_type;
    static_assert(std::same_as<law, leat::categorical<std::int64_t>>);
    static_assert(std::same_as<law::result_type, std::int64_t>);
    static_assert(std::same_as<parameters::distribution_type, law>);
    static_assert(std::regular<law> && std::regular<parameters>);
    static_assert(std::is_aggregate_v<parameters>);
    static_assert(!std::is_convertible_v<parameters, law>);

    EXPECT_EQ(law{}.param(), parameters{});
    const parameters p{.weights = {3, 0, 4}};
    const law d{p};
    EXPECT_EQ(d.param(), p);
    EXPECT_NE(d, law{});
    EXPECT_EQ(d.min(), 0);
    EXPECT_EQ(d.max(), 2);
    law changed;
    changed.param(p);
    EXPECT_EQ(changed, d);
    EXPECT_THROW(changed.param(parameters{{1, -1}}), leat::invalid_parameter);
    EXPECT_EQ(changed, d);
    leat::xoshiro256_plus_plus one{7};
    leat::xoshiro256_plus_plus two{7};
    std::minstd_rand odd_range{1};
    for (int i = 0; i < 1000; ++i) {
        const auto k = d(one);
        ASSERT_EQ(law{}(two, p), k);
        ASSERT_NE(d(odd_range), 1);
    }
    EXPECT_EQ(law{}(one), 0);
}

TEST(Categorical, TextRoundTripAndGarbage) {
    const leat::categorical d({0.1, 0, 1e300});
    std::stringstream text;
    text << std::hex << d << ' ' << leat::categorical<>{};
    EXPECT_EQ(text.str(), "3 x3fb999999999999a x0000000000000000 x7e37e43c8800759c "
                          "1 x3ff0000000000000");
    leat::categorical<> first;
    leat::categorical<> second = d;
    text >> first >> second;
    EXPECT_TRUE(text);
    EXPECT_EQ(first, d);
    EXPECT_EQ(second, leat::categorical<>{});
    for (const char* garbage : {"", "x", "0", "1", "-1 x3ff0000000000000", "2 x3ff0000000000000",
                                "1 x0000000000000000", "2 x3ff0000000000000 xbff0000000000000",
                                "1 x7ff8000000000000", "18446744073709551615 x3ff0000000000000"}) {
        std::istringstream is{garbage};
        leat::categorical target = d;
        is >> target;
        EXPECT_TRUE(is.fail()) << garbage;
        EXPECT_EQ(target, d) << garbage;
    }
}

} // namespace
