// ISO C++ [rand.req.dist]: what every one-dimensional law must give, and leat's own promises beside
// it (P3, P5, P8). A law joins by one line in `laws`: a parameter set that is not its default one.

#include "leat/distributions/beta.hpp"
#include "leat/distributions/categorical.hpp"
#include "leat/distributions/cauchy.hpp"
#include "leat/distributions/chi_squared.hpp"
#include "leat/distributions/empirical.hpp"
#include "leat/distributions/erlang.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/fisher_f.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/gumbel.hpp"
#include "leat/distributions/inverse_gaussian.hpp"
#include "leat/distributions/laplace.hpp"
#include "leat/distributions/logistic.hpp"
#include "leat/distributions/lognormal.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/pareto.hpp"
#include "leat/distributions/piecewise_linear.hpp"
#include "leat/distributions/rayleigh.hpp"
#include "leat/distributions/student_t.hpp"
#include "leat/distributions/triangular.hpp"
#include "leat/distributions/truncated_normal.hpp"
#include "leat/distributions/von_mises.hpp"
#include "leat/distributions/weibull.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <locale>
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
    law_case<decltype([] { return leat::normal_parameters<double>{.mean = -3, .sd = 0.5}; })>,
    law_case<decltype([] { return leat::normal_parameters<float>{.mean = 10, .sd = 2}; })>,
    law_case<decltype([] { return leat::exponential_parameters<double>{.rate = 0.25}; })>,
    law_case<decltype([] { return leat::exponential_parameters<float>{.rate = 3}; })>,
    law_case<decltype([] { return leat::weibull_parameters<double>{.shape = 1.5, .scale = 8}; })>,
    law_case<decltype([] { return leat::weibull_parameters<float>{.shape = 0.5F, .scale = 2}; })>,
    law_case<decltype(
        [] { return leat::lognormal_parameters<double>{.log_mean = 2, .log_sd = 0.3}; })>,
    law_case<decltype(
        [] { return leat::lognormal_parameters<float>{.log_mean = -1, .log_sd = 2}; })>,
    law_case<decltype([] { return leat::gamma_parameters<double>{.shape = 2.5, .scale = 3}; })>,
    law_case<decltype([] { return leat::gamma_parameters<double>{.shape = 0.3, .scale = 2}; })>,
    law_case<decltype([] { return leat::gamma_parameters<float>{.shape = 40, .scale = 0.5F}; })>,
    law_case<decltype([] { return leat::beta_parameters<double>{.a = 2.5, .b = 0.3}; })>,
    law_case<decltype([] { return leat::beta_parameters<float>{.a = 0.4F, .b = 0.2F}; })>,
    law_case<decltype([] { return leat::chi_squared_parameters<double>{.k = 6.5}; })>,
    law_case<decltype([] { return leat::chi_squared_parameters<float>{.k = 0.3F}; })>,
    law_case<decltype([] { return leat::erlang_parameters<double>{.k = 4, .rate = 0.5}; })>,
    law_case<decltype([] { return leat::erlang_parameters<float>{.k = 2, .rate = 8}; })>,
    law_case<decltype([] { return leat::fisher_f_parameters<double>{.d1 = 3, .d2 = 9}; })>,
    law_case<decltype([] { return leat::fisher_f_parameters<float>{.d1 = 0.7F, .d2 = 30}; })>,
    law_case<decltype(
        [] { return leat::inverse_gaussian_parameters<double>{.mean = 3, .shape = 0.5}; })>,
    law_case<decltype(
        [] { return leat::inverse_gaussian_parameters<float>{.mean = 0.5F, .shape = 4}; })>,
    law_case<decltype([] { return leat::student_t_parameters<double>{.k = 4.5}; })>,
    law_case<decltype([] { return leat::student_t_parameters<float>{.k = 3}; })>,
    law_case<decltype([] {
        return leat::truncated_normal_parameters<double>{.mean = 1, .sd = 2, .lo = 4, .hi = 9};
    })>,
    law_case<decltype([] {
        return leat::truncated_normal_parameters<float>{.mean = 1, .sd = 2, .lo = -1, .hi = 9};
    })>,
    law_case<decltype(
        [] { return leat::von_mises_parameters<double>{.mean = 2, .concentration = 3}; })>,
    law_case<decltype(
        [] { return leat::von_mises_parameters<float>{.mean = -1, .concentration = 0.2F}; })>,
    law_case<decltype(
        [] { return leat::gumbel_parameters<double>{.location = -3, .scale = 0.5}; })>,
    law_case<decltype(
        [] { return leat::logistic_parameters<double>{.location = -3, .scale = 0.5}; })>,
    law_case<decltype(
        [] { return leat::laplace_parameters<double>{.location = -3, .scale = 0.5}; })>,
    law_case<decltype([] { return leat::laplace_parameters<float>{.location = 10, .scale = 2}; })>,
    law_case<decltype(
        [] { return leat::cauchy_parameters<double>{.location = -3, .scale = 0.5}; })>,
    law_case<decltype([] { return leat::pareto_parameters<double>{.scale = 2, .shape = 3.5}; })>,
    law_case<decltype([] { return leat::pareto_parameters<float>{.scale = 0.5F, .shape = 3}; })>,
    law_case<decltype([] { return leat::rayleigh_parameters<double>{.scale = 2.5}; })>,
    law_case<decltype([] { return leat::rayleigh_parameters<float>{.scale = 8}; })>,
    law_case<decltype([] { return leat::maxwell_parameters<double>{.scale = 2.5}; })>,
    law_case<decltype([] { return leat::maxwell_parameters<float>{.scale = 8}; })>,
    law_case<decltype(
        [] { return leat::triangular_parameters<double>{.lo = -1, .mode = 0, .hi = 4}; })>,
    law_case<decltype(
        [] { return leat::triangular_parameters<float>{.lo = 2, .mode = 5, .hi = 5}; })>,
    law_case<decltype([] {
        return leat::empirical_parameters<double>{.values = {-1, 2, 2, 8}};
    })>,
    law_case<decltype([] {
        return leat::empirical_parameters<float>{.values = {0.5F, 3}};
    })>,
    law_case<decltype([] {
        return leat::categorical_parameters<>{.weights = {3, 0, 0.5, 1e-3}};
    })>,
    law_case<decltype([] {
        return leat::piecewise_linear_parameters<double>{.points = {0, 1, 3},
                                                         .densities = {0, 1, 0.5}};
    })>,
    law_case<decltype([] {
        return leat::piecewise_linear_parameters<float>{.points = {-2, 1, 3},
                                                        .densities = {4, 0, 1}};
    })>>;

/// Whether a law's parameters are lists, which are copied with an allocation.
template <class Parameters>
constexpr bool holds_a_list() {
    return requires(Parameters p) { p.values; }
    || requires(Parameters p) { p.points; }
    || requires(Parameters p) { p.weights; };
}

template <class Case>
class LawRequirements : public ::testing::Test {};
TYPED_TEST_SUITE(LawRequirements, laws);

/// A locale that would write 1.234,5 where the classic one writes 1234.5.
std::locale with_separators() {
    struct separators : std::numpunct<char> {
        char do_decimal_point() const override { return ','; }
        char do_thousands_sep() const override { return '.'; }
        std::string do_grouping() const override { return "\1"; }
    };
    return {std::locale::classic(), new separators};
}

template <class Law>
std::string text_of(const Law& law) {
    std::ostringstream os;
    os << law;
    return os.str();
}

// [rand.req.dist] table, rows result_type, param_type, D(), D(p), d.param(), d.min(), d.max(), copy
TYPED_TEST(LawRequirements, TypesAndConstruction) {
    using law = typename TypeParam::law;
    using parameters = typename law::param_type;
    static_assert(std::is_arithmetic_v<typename law::result_type>);
    static_assert(std::same_as<typename parameters::distribution_type, law>);
    static_assert(std::is_aggregate_v<parameters>); // named fields: the design
    static_assert(std::regular<law> && std::regular<parameters>);
    static_assert(std::is_trivially_copyable_v<law> || holds_a_list<parameters>());
    static_assert(!std::is_convertible_v<parameters, law>); // explicit

    EXPECT_EQ(law{}.param(), parameters{});
    const parameters p = TypeParam::other();
    const law d{p};
    EXPECT_EQ(d.param(), p);
    EXPECT_EQ(law{d}, d);
    EXPECT_NE(d, law{});
    EXPECT_LT(d.min(), d.max());
}

// Rows d(g), d(g, p), d.reset(), d.param(p); and P8: no draw changes a law.
TYPED_TEST(LawRequirements, DrawsAreAFunctionOfTheEngineAndTheParameters) {
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

// Any uniform random bit generator will do: of 64 bits, of 32, with a range no power of two.
TYPED_TEST(LawRequirements, AnyEngineServes) {
    using law = typename TypeParam::law;
    const law d{TypeParam::other()};
    std::mt19937 words32{1};
    std::minstd_rand odd_range{1};
    leat::minimal_standard lehmer{1};
    double sum = 0;
    for (int i = 0; i < 500; ++i) {
        sum += static_cast<double>(d(words32));
        sum += static_cast<double>(d(odd_range));
        sum += static_cast<double>(d(lehmer));
    }
    if (!std::isnan(d.mean())) { // crude: a unit error, not a fit
        EXPECT_GT(sum / 1500, d.mean() - d.variance());
        EXPECT_LT(sum / 1500, d.mean() + d.variance() + 1);
    }
}

// Rows os << d, is >> d: to the bit, whatever the stream's locale, flags and character.
TYPED_TEST(LawRequirements, TextRoundTrip) {
    using law = typename TypeParam::law;
    const law d{TypeParam::other()};
    std::stringstream stream;
    stream.imbue(with_separators());
    stream << std::hex << std::showbase << std::uppercase << std::scientific;
    stream.fill('*');
    stream.width(3);
    const auto flags = stream.flags();
    stream << d;
    stream.put(' ');
    stream << law{};
    EXPECT_EQ(stream.flags(), flags);
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

TYPED_TEST(LawRequirements, GarbageIsRefusedAndLeavesTheLawAsItWas) {
    using law = typename TypeParam::law;
    const law d{TypeParam::other()};
    const std::string good = text_of(d);
    std::vector<std::string> garbage{"", " ", "law", "1.5 2.5", "x", "-1 1", "xg000000000000000"};
    garbage.push_back(good.substr(0, good.size() - 1));
    garbage.push_back("y" + good);
    garbage.push_back("x7ff8000000000000 x7ff8000000000000"); // NaN
    garbage.push_back("x7ff0000000000000 x7ff0000000000000"); // infinity
    garbage.push_back("xbff0000000000000 xbff0000000000000"); // -1: no scale of any law
    for (const std::string& text : garbage) {
        std::istringstream is{text};
        law target = d;
        is >> target;
        EXPECT_TRUE(is.fail()) << '"' << text << '"';
        EXPECT_EQ(target, d) << '"' << text << '"';
    }
}

/// Every parameter set of `good` with one field set to `value`, to `visit`.
template <class Parameters, class Visit>
void with_each_field(const Parameters& good, double value, Visit visit) {
    int fields = 0;
    Parameters counted = good;
    Parameters::each(counted, [&](const char*, auto&) { ++fields; });
    for (int chosen = 0; chosen < fields; ++chosen) {
        Parameters p = good;
        int i = 0;
        Parameters::each(p, [&](const char*, auto& field) {
            if (i++ == chosen) {
                using type = std::remove_reference_t<decltype(field)>;
                if constexpr (!std::is_arithmetic_v<type>) { // a list: one of its entries
                    field.back() = static_cast<typename type::value_type>(value);
                } else { // no whole number is infinite: -1, which no law takes, stands for that
                    field =
                        std::is_integral_v<type> ? static_cast<type>(-1) : static_cast<type>(value);
                }
            }
        });
        visit(p);
    }
}

/// Where an infinite field is meant to be legal: the ends of a truncated normal.
template <class Parameters>
bool may_be_infinite(const Parameters&) {
    return false;
}
template <class Real>
bool may_be_infinite(const leat::truncated_normal_parameters<Real>& p) {
    constexpr Real infinity = std::numeric_limits<Real>::infinity();
    return p.lo == -infinity || p.hi == infinity;
}

// P5: refused with the law's name, and nothing is half changed.
TYPED_TEST(LawRequirements, NotANumberAndInfinityAreRefusedInEveryField) {
    using law = typename TypeParam::law;
    using parameters = typename law::param_type;
    const law d{TypeParam::other()};
    for (const double bad :
         {std::numeric_limits<double>::quiet_NaN(), std::numeric_limits<double>::infinity(),
          -std::numeric_limits<double>::infinity()}) {
        with_each_field(d.param(), bad, [&](const parameters& p) {
            if (may_be_infinite(p)) {
                EXPECT_EQ(law{p}.param(), p);
                return;
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
                EXPECT_NE(std::string(e.what()).find(" must be "), std::string::npos);
            }
        });
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

TYPED_TEST(LawRequirements, BrokenEnginesNeverHangNorLeaveTheSupport) {
    using law = typename TypeParam::law;
    for (const law& d : {law{}, law{TypeParam::other()}}) {
        draw_from_broken(d, leat::constant{0});
        draw_from_broken(d, leat::constant{~std::uint64_t{0}});
        // Every layer and sign of a ziggurat, at its inner end, its outer end and between.
        for (std::uint64_t low = 0; low < 512; ++low) {
            for (const std::uint64_t high : {0u, 1u, 0x7FFFFu, 0xFFFFFu}) {
                draw_from_broken(d, leat::constant{(high << 44) | low});
                draw_from_broken(d, leat::constant{~((high << 44) | low)});
            }
        }
    }
}

// P1: constant evaluation gives what run time gives.
template <class Law>
constexpr double sum_of_draws() {
    leat::xoshiro256_plus_plus g{99};
    const Law d{};
    double sum = 0;
    for (int i = 0; i < 60; ++i) {
        sum += static_cast<double>(d(g));
    }
    return sum;
}

TYPED_TEST(LawRequirements, ConstantEvaluationAgreesWithRunTime) {
    using law = typename TypeParam::law;
    if constexpr (!holds_a_list<typename law::param_type>()) { // not every compiler can allocate
        constexpr double at_compile_time = sum_of_draws<law>();
        EXPECT_EQ(sum_of_draws<law>(), at_compile_time);
    }
}

} // namespace
