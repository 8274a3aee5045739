// The portable mathematics of core/: the errors that the headers promise, measured against MPFR
// (GNU MPFR 4, correctly rounded at 160 bits), the ends of the ranges, and the promise that
// constant evaluation and run time give the same bits.

#include "leat/core/arctangent.hpp"
#include "leat/core/error_free.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/log_gamma.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/power.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/core/square_root.hpp"

#include <gtest/gtest.h>
#include <mpfr.h>

#include <array>
#include <bit>
#include <cmath>
#include <cstdint>
#include <limits>
#include <random>

namespace {

namespace ld = leat::detail;

constexpr double smallest = std::numeric_limits<double>::min();
constexpr double largest = std::numeric_limits<double>::max();
constexpr int points = 20000; // of each sweep

/// An MPFR number that frees itself.
class exact {
public:
    exact() { mpfr_init2(x_, 160); }
    explicit exact(double x) : exact() { mpfr_set_d(x_, x, MPFR_RNDN); }
    ~exact() { mpfr_clear(x_); }
    exact(const exact&) = delete;
    exact& operator=(const exact&) = delete;
    operator mpfr_ptr() { return x_; }

private:
    mpfr_t x_;
};

/// |got - expected| in units of the last place that a double of expected's size has.
double ulps(double got, mpfr_ptr expected) {
    exact difference;
    mpfr_sub_d(difference, expected, got, MPFR_RNDN);
    mpfr_mul_2si(difference, difference, 53 - mpfr_get_exp(expected), MPFR_RNDN);
    return std::fabs(mpfr_get_d(difference, MPFR_RNDN));
}

/// Test points; any source of well spread numbers would do.
class points_of {
public:
    double between(double low, double high) {
        return low + (high - low) * (static_cast<double>(words_() >> 11) * 0x1p-53);
    }
    /// Of either sign, the size spread evenly over powers of two.
    double sized(double low_exponent, double high_exponent) {
        const double size = std::exp2(between(low_exponent, high_exponent));
        return (words_() & 1) != 0 ? size : -size;
    }
    /// Any positive double from the bits of `low` on: every exponent comes as often.
    double any_positive(double low) {
        const std::uint64_t first = std::bit_cast<std::uint64_t>(low);
        const std::uint64_t end =
            std::bit_cast<std::uint64_t>(std::numeric_limits<double>::infinity());
        return std::bit_cast<double>(first + words_() % (end - first));
    }

private:
    std::mt19937_64 words_{1};
};

/// Checks that `f` is within `bound` ulp of `reference` at every point that `draw` gives.
template <class Draw, class F, class Reference>
void within(double bound, Draw draw, F f, Reference reference, int count = points) {
    double worst = 0;
    double worst_at = 0;
    for (int i = 0; i < count; ++i) {
        const double x = draw();
        exact argument(x);
        exact expected;
        reference(static_cast<mpfr_ptr>(expected), static_cast<mpfr_ptr>(argument));
        const double error = ulps(f(x), expected);
        if (!(error <= worst)) { // also where it is NaN
            worst = error;
            worst_at = x;
        }
    }
    EXPECT_LE(worst, bound) << "at " << worst_at;
}

const auto mpfr_exp_of = [](mpfr_ptr y, mpfr_ptr x) { mpfr_exp(y, x, MPFR_RNDN); };
const auto mpfr_expm1_of = [](mpfr_ptr y, mpfr_ptr x) { mpfr_expm1(y, x, MPFR_RNDN); };
const auto mpfr_log_of = [](mpfr_ptr y, mpfr_ptr x) { mpfr_log(y, x, MPFR_RNDN); };
const auto mpfr_log1p_of = [](mpfr_ptr y, mpfr_ptr x) { mpfr_log1p(y, x, MPFR_RNDN); };
const auto mpfr_lngamma_of = [](mpfr_ptr y, mpfr_ptr x) { mpfr_lngamma(y, x, MPFR_RNDN); };

TEST(NaturalExp, IsWithinItsBound) {
    points_of p;
    within(
        0.51, [&] { return p.between(-708.39, 709.78); }, ld::natural_exp, mpfr_exp_of);
    within(
        0.51, [&] { return p.between(-1, 1); }, ld::natural_exp, mpfr_exp_of);
    within(
        0.51, [&] { return p.sized(-60, 9); }, ld::natural_exp, mpfr_exp_of);
}

TEST(NaturalExp, SaturatesInsteadOfOverflowOrSubnormals) {
    EXPECT_EQ(ld::natural_exp(0.0), 1.0);
    EXPECT_EQ(ld::natural_exp(1e-300), 1.0);
    EXPECT_LT(ld::natural_exp(709.78), largest);
    EXPECT_GT(ld::natural_exp(-708.39), smallest);
    for (const double x : {709.8, 1999.0, 2000.0, 1e300, std::numeric_limits<double>::infinity()}) {
        EXPECT_EQ(ld::natural_exp(x), largest) << x;
        EXPECT_EQ(ld::natural_exp(-x), smallest) << x;
    }
    EXPECT_EQ(ld::natural_exp(-708.4), smallest);
}

TEST(ExpMinusOne, IsWithinItsBound) {
    points_of p;
    within(
        2, [&] { return p.between(-0.1, 0.1); }, ld::exp_minus_one, mpfr_expm1_of);
    within(
        2, [&] { return p.between(-45, 700); }, ld::exp_minus_one, mpfr_expm1_of);
    within(
        2, [&] { return p.sized(-80, 5); }, ld::exp_minus_one, mpfr_expm1_of);
    EXPECT_EQ(ld::exp_minus_one(0.0), 0.0);
    EXPECT_EQ(ld::exp_minus_one(1e4), largest);
    EXPECT_EQ(ld::exp_minus_one(-1e4), -1.0);
}

TEST(NaturalLog, IsWithinItsBound) {
    points_of p;
    within(
        0.501, [&] { return p.any_positive(smallest); }, ld::natural_log, mpfr_log_of);
    within(
        0.501, [&] { return p.any_positive(5e-324); }, ld::natural_log, mpfr_log_of);
    within(
        0.501, [&] { return p.between(0.5, 2); }, ld::natural_log, mpfr_log_of);
    within(
        0.501, [&] { return 1 + p.sized(-52, -5); }, ld::natural_log, mpfr_log_of);
    EXPECT_EQ(ld::natural_log(1.0), 0.0);
    exact least(5e-324); // the smallest subnormal number
    mpfr_log(least, least, MPFR_RNDN);
    EXPECT_LE(ulps(ld::natural_log(5e-324), least), 0.501);
}

TEST(NaturalLog, PartsHaveTheDigitsThatAPowerNeeds) {
    points_of p;
    for (int i = 0; i < points; ++i) {
        const double x = i % 2 == 0 ? p.between(0.69, 1.42) : p.any_positive(smallest);
        exact log(x);
        mpfr_log(log, log, MPFR_RNDN);
        const ld::two_part parts = ld::log_parts(x);
        exact sum(parts.high);
        mpfr_add_d(sum, sum, parts.low, MPFR_RNDN);
        mpfr_sub(sum, sum, log, MPFR_RNDN);
        mpfr_div(sum, sum, log, MPFR_RNDN);
        ASSERT_LE(std::fabs(mpfr_get_d(sum, MPFR_RNDN)), 0x1p-65) << x;
    }
}

TEST(LogOnePlus, IsWithinItsBound) {
    points_of p;
    within(
        1, [&] { return p.sized(-80, -0.01); }, ld::log_one_plus, mpfr_log1p_of);
    within(
        1, [&] { return std::fabs(p.sized(-1, 1000)); }, ld::log_one_plus, mpfr_log1p_of);
    EXPECT_EQ(ld::log_one_plus(0.0), 0.0);
    EXPECT_EQ(ld::log_one_plus(1e-300), 1e-300);
}

TEST(Power, IsWithinItsBound) {
    points_of p;
    for (const double span : {1.0, 30.0, 1000.0, 1e6, 1e15}) {
        double y = 0;
        const auto base_in_range = [&] {
            for (;;) {
                const double x = span > 1e3 ? 1 + p.sized(-52, -7) : std::fabs(p.sized(-9, 9));
                y = p.between(-span, span);
                if (std::fabs(y * std::log(x)) < 707) {
                    return x;
                }
            }
        };
        within(
            0.51, base_in_range, [&](double x) { return ld::power(x, y); },
            [&](mpfr_ptr z, mpfr_ptr x) {
                exact exponent(y);
                mpfr_pow(z, x, exponent, MPFR_RNDN);
            });
    }
}

TEST(Power, SaturatesAndKeepsItsFixedPoints) {
    EXPECT_EQ(ld::power(1.0, 1e300), 1.0);
    EXPECT_EQ(ld::power(1e300, 0.0), 1.0);
    EXPECT_EQ(ld::power(7.0, 1e-300), 1.0);
    EXPECT_EQ(ld::power(2.0, 10.0), 1024.0);
    EXPECT_EQ(ld::power(9.0, 0.5), 3.0);
    EXPECT_EQ(ld::power(2.0, 1e300), largest);
    EXPECT_EQ(ld::power(2.0, -1e300), smallest);
    EXPECT_EQ(ld::power(0.5, std::numeric_limits<double>::infinity()), smallest);
    EXPECT_EQ(ld::power(1.0, std::numeric_limits<double>::infinity()), 1.0);
    EXPECT_EQ(ld::power(1.0, -std::numeric_limits<double>::infinity()), 1.0);
    EXPECT_EQ(ld::power(2.0, 1023.0), 0x1p1023);
    EXPECT_EQ(ld::power(2.0, -1022.0), smallest);
}

TEST(SineCosine, IsWithinItsBound) {
    points_of p;
    const auto sine_of = [](double t) { return ld::sine_cosine(t).sine; };
    const auto cosine_of = [](double t) { return ld::sine_cosine(t).cosine; };
    const auto radians = [](mpfr_ptr turns) {
        exact pi;
        mpfr_const_pi(pi, MPFR_RNDN);
        mpfr_mul(turns, turns, pi, MPFR_RNDN);
        mpfr_mul_2si(turns, turns, 1, MPFR_RNDN);
    };
    const auto mpfr_sine = [&](mpfr_ptr y, mpfr_ptr x) {
        radians(x);
        mpfr_sin(y, x, MPFR_RNDN);
    };
    const auto mpfr_cosine = [&](mpfr_ptr y, mpfr_ptr x) {
        radians(x);
        mpfr_cos(y, x, MPFR_RNDN);
    };
    within(
        1.6, [&] { return p.between(0, 1); }, sine_of, mpfr_sine);
    within(
        1.6, [&] { return p.between(0, 1); }, cosine_of, mpfr_cosine);
    within(
        1.6, [&] { return p.between(0.0035, 0.0125); }, sine_of, mpfr_sine); // the worst place
    within(
        1.6, [&] { return p.sized(-300, -1); }, sine_of, mpfr_sine);
    within(
        1.6, [&] { return p.between(-1e6, 1e6); }, cosine_of, mpfr_cosine);
}

TEST(SineCosine, IsExactAtQuarters) {
    const std::array<double, 4> sines{0, 1, 0, -1};
    for (int quarter = -8; quarter <= 8; ++quarter) {
        const ld::sine_and_cosine at = ld::sine_cosine(quarter * 0.25);
        const auto i = static_cast<std::size_t>(quarter + 8);
        EXPECT_EQ(at.sine, sines[i % 4]) << quarter;
        EXPECT_EQ(at.cosine, sines[(i + 1) % 4]) << quarter;
    }
}

TEST(Arctangent, IsWithinItsBound) {
    points_of p;
    double x = 0;
    const auto mpfr_angle = [&](mpfr_ptr z, mpfr_ptr y) {
        exact side(x);
        mpfr_atan2(z, y, side, MPFR_RNDN);
    };
    const auto angle = [&](double y) { return ld::arctangent(y, x); };
    for (const double span : {1.0, 7.0, 500.0}) { // ratios near 1, and of every size
        within(
            1.1,
            [&] {
                x = std::fabs(p.sized(-span, span));
                return std::fabs(p.sized(-span, span));
            },
            angle, mpfr_angle);
    }
    EXPECT_EQ(ld::arctangent(0, 3), 0.0);
    EXPECT_EQ(ld::arctangent(3, 0), M_PI / 2);
    EXPECT_EQ(ld::arctangent(7, 7), M_PI / 4);
    EXPECT_EQ(ld::arctangent(1e-300, 1e300), 0.0);
    EXPECT_EQ(ld::arctangent(1e300, 1e-300), M_PI / 2);
}

// IEEE 754 demands a correctly rounded square root; both ways of computing it must be that.
TEST(SquareRoot, IsCorrectlyRoundedBothWays) {
    points_of p;
    for (int i = 0; i < points; ++i) {
        double x = p.any_positive(smallest);
        if (i % 3 == 0) { // next to a square, where roots are hard to round
            const double root = p.between(1, 2);
            x = std::nextafter(root * root, i % 2 == 0 ? 0.0 : 4.0);
        }
        exact root(x);
        mpfr_sqrt(root, root, MPFR_RNDN);
        const double rounded = mpfr_get_d(root, MPFR_RNDN);
        ASSERT_EQ(ld::square_root(x), rounded) << x;
        ASSERT_EQ(ld::square_root_by_integers(x), rounded) << x;
    }
    for (const double x : {0.0, 1.0, 4.0, 2.25, smallest}) {
        EXPECT_EQ(ld::square_root(x), ld::square_root_by_integers(x));
    }
    EXPECT_EQ(ld::square_root(0.0), 0.0);
    EXPECT_EQ(ld::square_root(2.25), 1.5);
}

TEST(LogGamma, IsWithinItsBound) { // fewer points: MPFR's is slow
    points_of p;
    within(
        6, [&] { return p.between(1, 2); }, ld::log_gamma, mpfr_lngamma_of, 5000);
    within(
        6, [&] { return p.between(0, 1); }, ld::log_gamma, mpfr_lngamma_of, 5000);
    within(
        6, [&] { return p.between(2, 12); }, ld::log_gamma, mpfr_lngamma_of, 5000);
    within(
        6, [&] { return std::fabs(p.sized(-300, 300)); }, ld::log_gamma, mpfr_lngamma_of, 5000);
    EXPECT_LT(ld::log_gamma(2.5e305), largest);
    EXPECT_EQ(ld::log_gamma(2.6e305), std::numeric_limits<double>::infinity());
    EXPECT_EQ(ld::log_gamma(1.0), 0.0);
    EXPECT_EQ(ld::log_gamma(2.0), 0.0);
}

// The identity a + b = high + low (a * b = high + low), checked in exact arithmetic.
TEST(ErrorFree, SumsAndProductsLoseNothing) {
    points_of p;
    for (int i = 0; i < points; ++i) {
        const double a = p.sized(-30, 30);
        const double b = p.sized(-30, 30);
        exact sum(a);
        mpfr_add_d(sum, sum, b, MPFR_RNDN);
        const ld::two_part s = ld::two_sum(a, b);
        ASSERT_EQ(s.high, a + b);
        mpfr_sub_d(sum, sum, s.high, MPFR_RNDN);
        ASSERT_EQ(mpfr_cmp_d(sum, s.low), 0) << a << " + " << b;

        const double large = std::fabs(a) > std::fabs(b) ? a : b;
        const ld::two_part ordered = ld::ordered_two_sum(large, large == a ? b : a);
        ASSERT_EQ(ordered.high, s.high);
        ASSERT_EQ(ordered.low, s.low);

        exact product(a);
        mpfr_mul_d(product, product, b, MPFR_RNDN);
        const ld::two_part m = ld::two_product(a, b);
        ASSERT_EQ(m.high, a * b);
        mpfr_sub_d(product, product, m.high, MPFR_RNDN);
        ASSERT_EQ(mpfr_cmp_d(product, m.low), 0) << a << " * " << b;
    }
}

TEST(Scaled, SplitsEveryPositiveDoubleAndComesBack) {
    points_of p;
    for (int i = 0; i < points; ++i) {
        const double x = p.any_positive(5e-324);
        const ld::scaled parts = ld::split(x);
        ASSERT_GE(parts.factor, 1);
        ASSERT_LT(parts.factor, 2);
        ASSERT_EQ(std::ldexp(parts.factor, static_cast<int>(parts.exponent)), x);
        ASSERT_EQ(parts.value(), x < smallest ? smallest : x);
    }
}

TEST(Scaled, ProductsMayLeaveTheRangeOnTheWay) {
    const ld::scaled huge = ld::split(1e300);
    const ld::scaled tiny = ld::split(1e-300);
    EXPECT_DOUBLE_EQ((huge * huge * tiny * tiny).value(), 1.0);
    EXPECT_DOUBLE_EQ((ld::exp_scaled(1000) * ld::exp_scaled(-999)).value(), std::exp(1.0));
    EXPECT_EQ((huge * huge).value(), largest);
    EXPECT_EQ((tiny * tiny).value(), smallest);
}

// Promise: constant evaluation and run time agree. One function, run both ways.
constexpr int values = 64;
struct all_values {
    std::array<double, 9 * values> x{};
    friend constexpr bool operator==(const all_values&, const all_values&) = default;
};
constexpr all_values evaluate_all() {
    all_values v;
    std::size_t n = 0;
    for (int i = 1; i <= values; ++i) {
        const double x = i * 0.37;
        v.x[n++] = ld::natural_exp(x - 11);
        v.x[n++] = ld::exp_minus_one(x * 0.001);
        v.x[n++] = ld::natural_log(x);
        v.x[n++] = ld::log_one_plus(x * 0.01);
        v.x[n++] = ld::power(x, 1.7);
        v.x[n++] = ld::sine_cosine(x).sine + ld::sine_cosine(x).cosine;
        v.x[n++] = ld::square_root(x);
        v.x[n++] = ld::log_gamma(x);
        v.x[n++] = ld::arctangent(x, 5);
    }
    return v;
}

TEST(Mathematics, ConstantEvaluationAgreesWithRunTime) {
    constexpr all_values at_compile_time = evaluate_all();
    const all_values at_run_time = evaluate_all();
    EXPECT_EQ(at_compile_time, at_run_time);
}

} // namespace
