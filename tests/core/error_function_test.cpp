// The error function and the normal distribution function and its inverse: the errors that the
// headers promise, measured against MPFR (GNU MPFR 4, mpfr_erfc at 200 bits).

#include "leat/core/error_function.hpp"
#include "leat/core/normal_quantile.hpp"

#include <gtest/gtest.h>
#include <mpfr.h>

#include <algorithm>
#include <cmath>
#include <random>

namespace {

namespace ld = leat::detail;

constexpr int points = 1000; // of each sweep: MPFR's erfc is slow

/// An MPFR number of 200 bits that frees itself.
class exact {
public:
    explicit exact(double x = 0) {
        mpfr_init2(x_, 200);
        mpfr_set_d(x_, x, MPFR_RNDN);
    }
    ~exact() { mpfr_clear(x_); }
    exact(const exact&) = delete;
    exact& operator=(const exact&) = delete;
    operator mpfr_ptr() { return x_; }

private:
    mpfr_t x_;
};

/// |got - expected| in units of the last place of `expected`.
double ulps(double got, mpfr_ptr expected) {
    exact difference;
    mpfr_sub_d(difference, expected, got, MPFR_RNDN);
    mpfr_mul_2si(difference, difference, 53 - mpfr_get_exp(expected), MPFR_RNDN);
    return std::fabs(mpfr_get_d(difference, MPFR_RNDN));
}

/// Phi(x) = erfc(-x / sqrt 2) / 2.
void normal_below(mpfr_ptr result, mpfr_ptr x) {
    exact root(0.5);
    mpfr_sqrt(root, root, MPFR_RNDN);
    mpfr_mul(result, x, root, MPFR_RNDN);
    mpfr_neg(result, result, MPFR_RNDN);
    mpfr_erfc(result, result, MPFR_RNDN);
    mpfr_div_2ui(result, result, 1, MPFR_RNDN);
}

TEST(ErrorFunction, ScaledComplementIsWithinItsBound) {
    std::mt19937_64 words{1};
    std::uniform_real_distribution<double> exponent(-70, 6.5);
    double worst = 0;
    for (int i = 0; i < points; ++i) {
        const double y = std::exp2(exponent(words));
        exact expected(y);
        exact power;
        mpfr_sqr(power, expected, MPFR_RNDN);
        mpfr_exp(power, power, MPFR_RNDN);
        mpfr_erfc(expected, expected, MPFR_RNDN);
        mpfr_mul(expected, expected, power, MPFR_RNDN);
        worst = std::max(worst, ulps(ld::erfc_scaled(y), expected));
    }
    EXPECT_LE(worst, 5);
    // e^(y^2) erfc(y) -> 1 / (y sqrt pi) (Abramowitz and Stegun, 7.1.23)
    EXPECT_DOUBLE_EQ(ld::erfc_scaled(1e200), 1 / (1e200 * std::sqrt(M_PI)));
    EXPECT_EQ(ld::erfc_scaled(0), 1);
}

TEST(ErrorFunction, NormalBelowIsWithinItsBound) {
    std::mt19937_64 words{2};
    std::uniform_real_distribution<double> place(-37.5, 8.5);
    std::uniform_real_distribution<double> exponent(-70, 2);
    double worst = 0;
    for (int i = 0; i < points; ++i) {
        const double small = std::exp2(exponent(words));
        for (const double x : {place(words), small, -small}) {
            exact argument(x);
            exact expected;
            normal_below(expected, argument);
            worst = std::max(worst, ulps(ld::normal_below(x), expected));
        }
    }
    EXPECT_LE(worst, 6);
    EXPECT_EQ(ld::normal_below(-38), 0);
    EXPECT_EQ(ld::normal_below(-INFINITY), 0);
    EXPECT_EQ(ld::normal_below(INFINITY), 1);
    EXPECT_EQ(ld::normal_below(0), 0.5);
}

// A step of Newton's method at 200 bits gives the distance to the root: (Phi(x) - p) / phi(x).
TEST(ErrorFunction, NormalQuantileIsWithinItsBound) {
    std::mt19937_64 words{3};
    std::uniform_real_distribution<double> place(0, 1);
    std::uniform_real_distribution<double> exponent(-1020, 0);
    double worst = 0;
    for (int i = 0; i < points; ++i) {
        for (const double p : {place(words), std::exp2(exponent(words)),
                               1 - std::exp2(std::max(-53.0, exponent(words) / 20))}) {
            const double x = ld::normal_quantile(p);
            exact argument(x);
            exact step;
            normal_below(step, argument);
            mpfr_sub_d(step, step, p, MPFR_RNDN);
            exact density(x);
            mpfr_sqr(density, density, MPFR_RNDN);
            mpfr_div_2ui(density, density, 1, MPFR_RNDN);
            mpfr_exp(density, density, MPFR_RNDN);
            mpfr_mul(step, step, density, MPFR_RNDN);
            const double distance = mpfr_get_d(step, MPFR_RNDN) * std::sqrt(2 * M_PI);
            worst = std::max(worst, std::fabs(distance) / std::ldexp(1, std::ilogb(x) - 52));
        }
    }
    EXPECT_LE(worst, 8);
    EXPECT_EQ(ld::normal_quantile(0.5), 0);
}

} // namespace
