// uniform: a + (b - a) u rounded once to nearest, moved off an excluded end.
//
// References: GNU MPFR (exact_point.hpp); ISO C++ [rand.req.dist]; the moments of the continuous
// uniform law, (a + b) / 2 and (b - a)^2 / 12.

#include "leat/uniform/open_interval.hpp"

#include "leat/testing/engines.hpp"
#include "uniform/exact_point.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <cstdint>
#include <limits>
#include <locale>
#include <random>
#include <sstream>
#include <string>
#include <type_traits>
#include <vector>

namespace {

using exact_point::sweep;
using leat::ends;
using real_limits = std::numeric_limits<double>;

TEST(Uniform, IsTheExactPointRoundedOnceDouble) {
    sweep<double, ends::open>(300000, 1);
    sweep<double, ends::closed_open>(100000, 2);
    sweep<double, ends::open_closed>(100000, 3);
    sweep<double, ends::closed>(200000, 4);
}

TEST(Uniform, IsTheExactPointRoundedOnceFloat) {
    sweep<float, ends::open>(300000, 5);
    sweep<float, ends::closed_open>(100000, 6);
    sweep<float, ends::open_closed>(100000, 7);
    sweep<float, ends::closed>(200000, 8);
}

TEST(Uniform, IntervalsThatPeopleWriteAreExactToo) {
    exact_point::reference exact;
    std::mt19937_64 g(9);
    const std::vector<std::pair<double, double>> intervals{
        {0, 1},
        {1, 2},
        {-1, 1},
        {0, 6.283185307179586},
        {0.3, 1},
        {1e-300, 10},
        {1e-6, 1e6},
        {0.001, 1000},
        {-1e-300, 3},
        {-273.15, 0},
        {1e15, 1e15 + 1},
        {-5, 1e-18},
        {-1e308, 1e308},
        {0, real_limits::max()},
        {real_limits::lowest(), real_limits::max()},
        {real_limits::denorm_min(), 3},
        {-real_limits::denorm_min(), 10},
        {-3, real_limits::min()},
        {0, 0x1p-960},
        {-0x1p-961, 0x1p-961}};
    for (const auto& [a, b] : intervals) {
        for (int i = 0; i < 5000; ++i) {
            const std::uint64_t word = exact_point::adversarial_word(g);
            exact_point::check_point<double, ends::open>(exact, a, b, word);
            exact_point::check_point<double, ends::closed_open>(exact, a, b, word);
            exact_point::check_point<double, ends::open_closed>(exact, a, b, word);
            exact_point::check_point<double, ends::closed>(exact, a, b, word);
            ASSERT_FALSE(HasFatalFailure());
        }
    }
}

template <class Real, ends Ends>
void check_ends(Real a, Real b) {
    const leat::uniform<Real, Ends> law(a, b);
    leat::all_zeros low;
    leat::all_ones high;
    const Real smallest = law(low);
    const Real largest = law(high);
    EXPECT_EQ(smallest, law.min());
    EXPECT_EQ(largest, law.max());
    EXPECT_TRUE(exact_point::lower_in(Ends) ? smallest == a : smallest > a) << a << " " << b;
    EXPECT_TRUE(exact_point::upper_in(Ends) ? largest == b : largest < b) << a << " " << b;
    for (unsigned i = 0; i < 64; ++i) {
        leat::constant g{std::uint64_t{1} << i};
        const Real x = law(g);
        EXPECT_TRUE(x >= smallest && x <= largest);
    }
}

template <class Real>
void check_all_ends() {
    const Real one = 1;
    const Real up = std::nextafter(one, Real{2});
    const Real max = std::numeric_limits<Real>::max();
    const Real width = sizeof(Real) == 4 ? Real(0x1p-100) : Real(0x1p-960);
    const std::vector<std::pair<Real, Real>> intervals{
        {0, 1},
        {-1, 0},
        {-1, 1},
        {one, std::nextafter(up, Real{2})},
        {0, max},
        {-max, 0},
        {-max, max},
        {max / 2, max},
        {0, width},
        {-width, 0},
        {Real(1e6), Real(1e6) + 1},
        {std::numeric_limits<Real>::denorm_min(), 1}};
    for (const auto& [a, b] : intervals) {
        check_ends<Real, ends::open>(a, b);
        check_ends<Real, ends::closed_open>(a, b);
        check_ends<Real, ends::open_closed>(a, b);
        check_ends<Real, ends::closed>(a, b);
    }
    // Two neighbours leave room for one value if one end is in, for none if both are out.
    check_ends<Real, ends::closed_open>(one, up);
    check_ends<Real, ends::open_closed>(one, up);
    check_ends<Real, ends::closed>(one, up);
    EXPECT_THROW((leat::uniform<Real>{one, up}), leat::invalid_parameter);
}

TEST(Uniform, NoEngineReachesAnExcludedEnd) {
    check_all_ends<double>();
    check_all_ends<float>();
}

TEST(Uniform, OneValueBetweenTwoEndsIsAlwaysThatValue) {
    const double next = std::nextafter(1.0, 2.0);
    const leat::uniform law{1.0, std::nextafter(next, 2.0)};
    std::mt19937_64 g(1);
    for (int i = 0; i < 1000; ++i) {
        ASSERT_EQ(law(g), next);
    }
}

TEST(Uniform, TheUnitIntervalIsUnit) {
    std::mt19937_64 g(2);
    std::mt19937_64 h(2);
    const leat::uniform law;
    const leat::uniform<float> small;
    for (int i = 0; i < 1000; ++i) {
        ASSERT_EQ(law(g), leat::unit(h));
        ASSERT_EQ(small(g), leat::unit<float>(h));
    }
    // From a 32-bit engine two words a double, one a float.
    leat::scripted32 words{1, 2, 3};
    (void)law(words);
    (void)small(words);
    EXPECT_EQ(words.asked(), 3u);
}

// ISO C++ [rand.req.dist].
using law_type = leat::uniform<>;
static_assert(std::is_same_v<law_type::result_type, double>);
static_assert(std::is_same_v<law_type::param_type::distribution_type, law_type>);
static_assert(law_type{} == leat::uniform{0, 1} && law_type{} != leat::uniform{0, 2});
static_assert(leat::uniform{2, 3}.param() == law_type::param_type{2, 3});
static_assert(leat::uniform{2, 3}.a() == 2 && leat::uniform{2, 3}.b() == 3);

// Deduction ignores the arguments' types; the parameters name theirs.
static_assert(std::is_same_v<decltype(leat::uniform{0, 1}), leat::uniform<double, ends::open>>);
static_assert(std::is_same_v<decltype(leat::uniform{0.5f, 3u}), leat::uniform<double, ends::open>>);
static_assert(
    std::is_same_v<decltype(leat::uniform{leat::uniform_parameters<float>{.a = 1, .b = 2}}),
                   leat::uniform<float, ends::open>>);

// constexpr, and min and max are what the extreme words give.
static_assert(leat::uniform{0, 1}.min() == 0x1p-53 && leat::uniform{0, 1}.max() == 1 - 0x1p-53);
static_assert(leat::uniform{1, 2}.min() == 1 + 0x1p-52 && leat::uniform{1, 2}.max() == 2 - 0x1p-52);
static_assert(leat::uniform<double, ends::closed>{-3, 8}.min() == -3);
static_assert(leat::uniform<double, ends::closed>{-3, 8}.max() == 8);
static_assert(leat::uniform{1e-300, 3}.max() < 3); // the wide route at compile time
constexpr double drawn_at_compile_time() {
    leat::constant g{0x123456789ABCDEF0};
    const leat::uniform law{1e-6, 1e6};
    return law(g);
}
TEST(Uniform, CompileTimeAndRunTimeAgree) {
    constexpr double then = drawn_at_compile_time();
    const volatile double b = 1e6;
    leat::constant g{0x123456789ABCDEF0};
    const leat::uniform law{1e-6, b};
    EXPECT_EQ(law(g), then);
}

TEST(Uniform, MomentsAreThoseOfTheContinuousLaw) {
    static_assert(leat::uniform{2, 5}.mean() == 3.5 && leat::uniform{2, 5}.variance() == 0.75);
    static_assert(leat::uniform<float>{-1, 2}.mean() == 0.5f);
    const leat::uniform all{real_limits::lowest(), real_limits::max()};
    EXPECT_EQ(all.mean(), 0);
    EXPECT_EQ(all.variance(), real_limits::infinity());
    EXPECT_EQ((leat::uniform{real_limits::max() / 2, real_limits::max()}.mean()),
              real_limits::max() * 0.75);
}

TEST(Uniform, AParameterSetDrawsLikeItsOwnLaw) {
    std::mt19937_64 g(1);
    std::mt19937_64 h(1);
    law_type changing;
    const leat::uniform fixed{-0.3, 11};
    for (int i = 0; i < 100; ++i) {
        ASSERT_EQ(changing(g, fixed.param()), fixed(h));
    }
    EXPECT_EQ(changing, law_type{});
    changing.param(fixed.param());
    EXPECT_EQ(changing, fixed);
    changing.reset();
    EXPECT_EQ(changing, fixed);
}

template <class Real, ends Ends = ends::open>
std::string refusal(Real a, Real b) {
    try {
        (void)leat::uniform<Real, Ends>(a, b);
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "accepted";
}

TEST(Uniform, RefusesWhatHasNoRoom) {
    const double nan = real_limits::quiet_NaN();
    const double infinity = real_limits::infinity();
    EXPECT_EQ(refusal(nan, 1.0), "leat::uniform: a = nan, must be finite");
    EXPECT_EQ(refusal(-infinity, 1.0), "leat::uniform: a = -inf, must be finite");
    EXPECT_EQ(refusal(0.0, infinity), "leat::uniform: b = inf, must be finite");
    EXPECT_EQ(refusal(0.0, nan), "leat::uniform: b = nan, must be finite");
    EXPECT_EQ(refusal(1.0, 0.5), "leat::uniform: b = 0.5, must be above a");
    EXPECT_EQ(refusal(1.0, 1.0), "leat::uniform: b = 1, must be above a");
    EXPECT_EQ((refusal<double, ends::closed>(1.0, 1.0)), "leat::uniform: b = 1, must be above a");
    EXPECT_EQ(refusal(1.0, std::nextafter(1.0, 2.0)),
              "leat::uniform: b = 1.0000000000000002, must leave room for a number between a and "
              "b, as both ends are out");
    const std::string width = ", must be at least 2^-960 (2^-100 for float)";
    EXPECT_EQ(refusal(0.0, 1e-300), "leat::uniform: b - a = 1e-300" + width);
    EXPECT_EQ(refusal(0.0, std::nextafter(0x1p-960, 0.0)).find("leat::uniform: b - a = "), 0u);
    EXPECT_EQ((refusal<double, ends::closed>(-1e-310, 1e-310)),
              "leat::uniform: b - a = 2e-310" + width);
    EXPECT_EQ(refusal(0.0, 0x1p-960), "accepted");
    EXPECT_EQ(refusal(0.0f, 0x1p-101f).find("leat::uniform: b - a = "), 0u);
    EXPECT_EQ(refusal(0.0f, 0x1p-100f), "accepted");

    law_type law{1, 2};
    EXPECT_THROW(law.param({3, 3}), leat::invalid_parameter);
    EXPECT_EQ(law, (law_type{1, 2}));
}

/// A locale that groups digits and has a decimal comma, as many do.
struct grouping : std::numpunct<char> {
    char do_thousands_sep() const override { return '.'; }
    char do_decimal_point() const override { return ','; }
    std::string do_grouping() const override { return "\3"; }
};

TEST(Uniform, TextReturnsTheSameLawInAnyLocale) {
    std::stringstream text;
    text.imbue(std::locale(text.getloc(), new grouping));
    text << std::hex << std::showpos;
    const leat::uniform law{-1.0 / 3, 12345678.9};
    const leat::uniform<float> small{0.1, 0.2};
    text << law << ' ' << small;
    law_type back;
    leat::uniform<float> small_back;
    text >> back >> small_back;
    EXPECT_TRUE(static_cast<bool>(text));
    EXPECT_EQ(back, law);
    EXPECT_EQ(small_back, small);

    std::wstringstream wide;
    wide << law;
    law_type wide_back;
    wide >> wide_back;
    EXPECT_EQ(wide_back, law);
}

TEST(Uniform, GarbageSetsFailbitAndChangesNothing) {
    std::ostringstream good;
    good << leat::uniform{1, 2};
    const std::string one = good.str().substr(0, 17);
    const std::string two = good.str().substr(18);
    std::ostringstream fine;
    fine << leat::uniform{0.1, 2};
    for (const std::string& bad :
         {std::string(), std::string("rubbish"), one, one + " 2", two + " " + one, one + " " + one,
          one + " " + two.substr(0, 16)}) {
        std::istringstream text(bad);
        law_type law{3, 4};
        text >> law;
        EXPECT_TRUE(text.fail()) << bad;
        EXPECT_EQ(law, (law_type{3, 4})) << bad;
    }
    std::istringstream text(fine.str()); // 0.1 as a double is no float
    leat::uniform<float> small{3, 4};
    text >> small;
    EXPECT_TRUE(text.fail());
    EXPECT_EQ(small, (leat::uniform<float>{3, 4}));
}

} // namespace
