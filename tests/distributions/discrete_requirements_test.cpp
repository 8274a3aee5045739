// ISO C++ [rand.req.dist] for the laws of whole numbers, and leat's own promises beside it (P1, P3,
// P5, P8). A law joins by one line in `laws`: a parameter set that is not its default one.

#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/zipf.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <random>
#include <sstream>
#include <string>
#include <type_traits>
#include <vector>

namespace {

template <class Make>
struct law_case {
    using parameters = decltype(Make{}());
    using law = typename parameters::distribution_type;
    static constexpr parameters other() { return Make{}(); }
};

using laws = ::testing::Types<
    law_case<decltype([] { return leat::bernoulli_parameters{.p = 0.3}; })>,
    law_case<decltype([] { return leat::binomial_parameters<>{.n = 10, .p = 0.3}; })>,
    law_case<decltype([] { return leat::binomial_parameters<>{.n = 100, .p = 0.7}; })>,
    law_case<decltype([] { return leat::binomial_parameters<int>{.n = 100, .p = 0.3}; })>,
    law_case<decltype([] { return leat::geometric_parameters<>{.p = 0.1}; })>,
    law_case<decltype([] { return leat::geometric_parameters<>{.p = 1e-9}; })>,
    law_case<decltype([] {
        return leat::hypergeometric_parameters<>{.population = 50, .successes = 30, .draws = 7};
    })>,
    law_case<decltype([] {
        return leat::hypergeometric_parameters<int>{
            .population = 1000, .successes = 600, .draws = 300};
    })>,
    law_case<decltype([] { return leat::negative_binomial_parameters<>{.r = 2.5, .p = 0.2}; })>,
    law_case<decltype([] { return leat::poisson_parameters<>{.mean = 4.5}; })>,
    law_case<decltype([] { return leat::poisson_parameters<std::int8_t>{.mean = 50}; })>,
    law_case<decltype([] { return leat::poisson_parameters<std::uint64_t>{.mean = 1e15}; })>,
    law_case<decltype([] { return leat::zipf_parameters<>{.exponent = 1.3, .n = 5000}; })>,
    law_case<decltype([] { return leat::zipf_parameters<int>{.exponent = 0, .n = 6}; })>>;

template <class Case>
class DiscreteRequirements : public ::testing::Test {};
TYPED_TEST_SUITE(DiscreteRequirements, laws);

// Rows result_type, param_type, D(), D(p), d.param(), d.min(), d.max(), copy.
TYPED_TEST(DiscreteRequirements, TypesAndConstruction) {
    using law = typename TypeParam::law;
    using parameters = typename law::param_type;
    static_assert(std::is_integral_v<typename law::result_type>);
    static_assert(std::same_as<typename parameters::distribution_type, law>);
    static_assert(std::is_aggregate_v<parameters>); // named fields: the design
    static_assert(std::regular<law> && std::regular<parameters>);
    static_assert(std::is_trivially_copyable_v<law>);
    static_assert(!std::is_convertible_v<parameters, law>); // explicit

    EXPECT_EQ(law{}.param(), parameters{});
    const parameters p = TypeParam::other();
    const law d{p};
    EXPECT_EQ(d.param(), p);
    EXPECT_EQ(law{d}, d);
    EXPECT_NE(d, law{});
    EXPECT_LT(d.min(), d.max());
    static_assert(std::same_as<decltype(d.min()), typename law::result_type>);
    static_assert(std::same_as<decltype(d.max()), typename law::result_type>);
}

// Rows d(g), d(g, p), d.reset(), d.param(p); and P8: no draw changes a law.
TYPED_TEST(DiscreteRequirements, DrawsAreAFunctionOfTheEngineAndTheParameters) {
    using law = typename TypeParam::law;
    const auto p = TypeParam::other();
    const law d{p};
    law changed;
    changed.param(p);
    EXPECT_EQ(changed, d);

    const law standard;
    leat::xoshiro256_plus_plus one{7};
    leat::xoshiro256_plus_plus two{7};
    leat::xoshiro256_plus_plus three{7};
    for (int i = 0; i < 2000; ++i) {
        const auto x = d(one);
        static_assert(std::same_as<decltype(x), const typename law::result_type>);
        ASSERT_EQ(standard(two, p), x);
        ASSERT_EQ(changed(three), x);
        changed.reset();
        ASSERT_GE(x, d.min());
        ASSERT_LE(x, d.max());
    }
    EXPECT_EQ(one, two);
    EXPECT_EQ(one, three);
    EXPECT_EQ(standard, law{});
}

// Any uniform random bit generator will do: of 32 bits, with ranges that are no power of two.
TYPED_TEST(DiscreteRequirements, AnyEngineServes) {
    const typename TypeParam::law d{TypeParam::other()};
    std::mt19937 words32{1};
    std::minstd_rand odd_range{1};
    leat::minimal_standard lehmer{1};
    double sum = 0;
    for (int i = 0; i < 500; ++i) {
        for (const double x : {static_cast<double>(d(words32)), static_cast<double>(d(odd_range)),
                               static_cast<double>(d(lehmer))}) {
            sum += x - d.mean();
        }
    }
    EXPECT_LT(std::abs(sum / 1500), 6 * std::sqrt(d.variance() / 1500)); // a unit error, not a fit
}

// Rows os << d, is >> d: to the bit, whatever the stream's flags and character.
TYPED_TEST(DiscreteRequirements, TextRoundTrip) {
    using law = typename TypeParam::law;
    const law d{TypeParam::other()};
    std::stringstream stream;
    stream << std::hex << std::showbase << std::uppercase << std::scientific;
    stream.fill('*');
    stream.width(3);
    stream << d;
    stream.put(' ');
    stream << law{};
    law first;
    law second{TypeParam::other()};
    stream >> first >> second;
    EXPECT_TRUE(stream);
    EXPECT_EQ(first, d);
    EXPECT_EQ(second, law{});

    std::wstringstream wide;
    wide << d;
    law third;
    wide >> third;
    EXPECT_EQ(third, d);
}

TYPED_TEST(DiscreteRequirements, GarbageIsRefusedAndLeavesTheLawAsItWas) {
    using law = typename TypeParam::law;
    const law d{TypeParam::other()};
    std::ostringstream os;
    os << d;
    for (const std::string& text : std::vector<std::string>{
             "", " ", "law", "1.5 2.5", "x", "-1 -1 -1", "xg000000000000000", "y" + os.str(),
             "99999999999999999999 x3fd3333333333333", "9 x7ff8000000000000", "x7ff8000000000000 9",
             "x7ff8000000000000 x7ff8000000000000", // NaN
             "xbff0000000000000 xbff0000000000000"}) {
        std::istringstream is{text};
        law target = d;
        is >> target;
        EXPECT_TRUE(is.fail()) << '"' << text << '"';
        EXPECT_EQ(target, d) << '"' << text << '"';
    }
}

// P5: refused with the law's name, and nothing is half changed.
TYPED_TEST(DiscreteRequirements, NotANumberIsRefusedInEveryRealField) {
    using law = typename TypeParam::law;
    using parameters = typename law::param_type;
    const law d{TypeParam::other()};
    for (const double bad : {std::numeric_limits<double>::quiet_NaN(),
                             std::numeric_limits<double>::infinity(), -1.0}) {
        parameters p = d.param();
        bool any = false;
        parameters::each(p, [&](const char*, auto& field) {
            if constexpr (std::floating_point<std::remove_reference_t<decltype(field)>>) {
                field = bad;
                any = true;
            } else if (bad == -1 && std::is_signed_v<std::remove_reference_t<decltype(field)>>) {
                field = static_cast<std::remove_reference_t<decltype(field)>>(bad);
                any = true;
            }
        });
        if (!any) {
            continue;
        }
        law target = d;
        EXPECT_THROW(static_cast<void>(law{p}), leat::invalid_parameter);
        EXPECT_THROW(target.param(p), leat::invalid_parameter);
        EXPECT_EQ(target, d);
        leat::xoshiro256_plus_plus g{1};
        EXPECT_THROW(static_cast<void>(d(g, p)), leat::invalid_parameter);
        EXPECT_EQ(g, leat::xoshiro256_plus_plus{1}); // and no word is drawn
        try {
            static_cast<void>(law{p});
        } catch (const leat::invalid_parameter& e) {
            const std::string start = std::string("leat::") + parameters::law_name + ": ";
            EXPECT_EQ(std::string(e.what()).rfind(start, 0), 0u) << e.what();
            EXPECT_NE(std::string(e.what()).find(" must "), std::string::npos);
        }
    }
}

// P3 and P5: whatever the engine returns, a draw is in the support, or the law says it is stuck.
template <class Law, class G>
void draw_from_broken(const Law& d, G g) {
    for (int i = 0; i < 3; ++i) {
        try {
            const auto x = d(g);
            ASSERT_GE(x, d.min());
            ASSERT_LE(x, d.max());
        } catch (const leat::engine_stuck&) {
            return;
        }
    }
}

TYPED_TEST(DiscreteRequirements, BrokenEnginesNeverHangNorLeaveTheSupport) {
    using law = typename TypeParam::law;
    for (const law& d : {law{}, law{TypeParam::other()}}) {
        draw_from_broken(d, leat::constant{0});
        draw_from_broken(d, leat::constant{~std::uint64_t{0}});
        for (std::uint64_t low = 0; low < 64; ++low) {
            for (const std::uint64_t high : {0u, 1u, 0x7FFFFu, 0x80000u, 0xFFFFFu}) {
                draw_from_broken(d, leat::constant{(high << 44) | low});
                draw_from_broken(d, leat::constant{~((high << 44) | low)});
            }
        }
    }
}

// P1: constant evaluation gives what run time gives.
template <class Case>
constexpr std::uint64_t digest_of_draws() {
    leat::xoshiro256_plus_plus g{99};
    const typename Case::law d{Case::other()};
    std::uint64_t digest = 0;
    for (int i = 0; i < 20; ++i) {
        const auto x = static_cast<std::uint64_t>(d(g));
        digest = digest * 31 + x;
    }
    return digest;
}

TYPED_TEST(DiscreteRequirements, ConstantEvaluationAgreesWithRunTime) {
    constexpr std::uint64_t at_compile_time = digest_of_draws<TypeParam>();
    EXPECT_EQ(digest_of_draws<TypeParam>(), at_compile_time);
}

} // namespace
