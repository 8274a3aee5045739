// The laws one by one: moments against references, draws against the formula that defines them
// (with MPFR doing the arithmetic), refused and degenerate parameters, the ends of the range.

#include "leat/distributions/exponential.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/lognormal.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/weibull.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>
#include <mpfr.h>

#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <string>

namespace {

using engine = leat::xoshiro256_plus_plus;
using leat_test::json;

constexpr double smallest = std::numeric_limits<double>::min();
constexpr double largest = std::numeric_limits<double>::max();

// ---- What is written, and what it means ------------------------------------------------------

// The design: deduction ignores argument types; named fields cannot be got the wrong way round.
static_assert(std::same_as<decltype(leat::normal{0, 1}), leat::normal<double>>);
static_assert(std::same_as<decltype(leat::normal{0.0F, 1.0F}), leat::normal<double>>);
static_assert(std::same_as<decltype(leat::normal{}), leat::normal<double>>);
static_assert(std::same_as<decltype(leat::exponential{2}), leat::exponential<double>>);
static_assert(std::same_as<decltype(leat::weibull{1.5F, 8u}), leat::weibull<double>>);
static_assert(std::same_as<decltype(leat::lognormal{0, 1.0}), leat::lognormal<double>>);
static_assert(std::same_as<decltype(leat::gamma{2LL, 3}), leat::gamma<double>>);
static_assert(std::same_as<leat::normal<float>::result_type, float>);
static_assert(leat::gamma{{.shape = 2, .scale = 3}} == leat::gamma{2, 3});
static_assert(leat::normal{{.mean = 2, .sd = 3}} == leat::normal{2, 3});
static_assert(leat::exponential{{.rate = 4}} == leat::exponential<>::from_mean(0.25));
static_assert(leat::normal<float>{0.1, 1}.param().mean == 0.1F);
static_assert(!std::convertible_to<double, leat::exponential<double>>); // explicit

TEST(Laws, AccessorsAreNamedAsTheFields) {
    EXPECT_EQ((leat::normal{1, 2}.mean()), 1);
    EXPECT_EQ((leat::normal{1, 2}.sd()), 2);
    EXPECT_EQ(leat::exponential{3}.rate(), 3);
    EXPECT_EQ((leat::weibull{1, 2}.shape()), 1);
    EXPECT_EQ((leat::weibull{1, 2}.scale()), 2);
    EXPECT_EQ((leat::lognormal{1, 2}.log_mean()), 1);
    EXPECT_EQ((leat::lognormal{1, 2}.log_sd()), 2);
    EXPECT_EQ((leat::gamma{1, 2}.shape()), 1);
    EXPECT_EQ((leat::gamma{1, 2}.scale()), 2);
}

// ---- Refusals (P5) ---------------------------------------------------------------------------

template <class Make>
void expect_refused(const std::string& message, Make make) {
    try {
        static_cast<void>(make());
        ADD_FAILURE() << "accepted: " << message;
    } catch (const leat::invalid_parameter& e) {
        EXPECT_EQ(e.what(), message);
    }
}

TEST(Laws, RefusedParameters) {
    const double inf = std::numeric_limits<double>::infinity();
    expect_refused("leat::normal: sd = -1, must be finite and >= 0", [] {
        return leat::normal{0, -1};
    });
    expect_refused("leat::normal: mean = inf, must be finite", [&] {
        return leat::normal{inf, 1};
    });
    expect_refused("leat::exponential: rate = 0, must be finite and > 0",
                   [] { return leat::exponential{0}; });
    expect_refused("leat::exponential: rate = -2.5, must be finite and > 0",
                   [] { return leat::exponential{-2.5}; });
    expect_refused("leat::exponential: mean = 0, must be finite and > 0",
                   [] { return leat::exponential<>::from_mean(0); });
    expect_refused("leat::weibull: shape = 0, must be finite and > 0", [] {
        return leat::weibull{0, 1};
    });
    expect_refused("leat::weibull: scale = -1, must be finite and > 0", [] {
        return leat::weibull{1, -1};
    });
    expect_refused("leat::lognormal: log_sd = -0.5, must be finite and >= 0", [] {
        return leat::lognormal{0, -0.5};
    });
    expect_refused("leat::lognormal: mean = -1, must be finite and > 0",
                   [] { return leat::lognormal<>::from_mean_sd(-1, 1); });
    expect_refused("leat::lognormal: sd = -1, must be finite and >= 0",
                   [] { return leat::lognormal<>::from_mean_sd(1, -1); });
    expect_refused("leat::gamma: shape = 0, must be finite and > 0", [] {
        return leat::gamma{0, 1};
    });
    expect_refused("leat::gamma: scale = inf, must be finite and > 0", [&] {
        return leat::gamma{1, inf};
    });
    // A value that no float holds arrives as infinity or 0, and is refused as that.
    expect_refused("leat::exponential: rate = inf, must be finite and > 0",
                   [] { return leat::exponential<float>{1e300}; });
}

// ---- Moments ---------------------------------------------------------------------------------

double number(const json& value) {
    return value.is_string() ? std::stod(value.get<std::string>()) : value.get<double>();
}

template <class Make>
void expect_moments(const std::string& family, Make make) {
    for (const json& entry : leat_test::reference_family("distributions." + family + ".")) {
        LEAT_TEST_REFERENCE(entry);
        const auto law = make(entry["parameters"]);
        const double mean = number(entry["expected"]["mean"]);
        const double variance = number(entry["expected"]["variance"]);
        EXPECT_NEAR(law.mean(), mean, 1e-14 * std::fabs(mean));
        EXPECT_NEAR(law.variance(), variance, 1e-13 * variance);
    }
}

TEST(Laws, MomentsAreTheReferences) {
    expect_moments("normal", [](const json& p) {
        return leat::normal{number(p["mean"]), number(p["sd"])};
    });
    expect_moments("exponential",
                   [](const json& p) { return leat::exponential{number(p["rate"])}; });
    expect_moments("weibull", [](const json& p) {
        return leat::weibull{number(p["shape"]), number(p["scale"])};
    });
    expect_moments("lognormal", [](const json& p) {
        return leat::lognormal{number(p["mu"]), number(p["sigma"])};
    });
    expect_moments("gamma", [](const json& p) {
        return leat::gamma{number(p["shape"]), number(p["scale"])};
    });
}

/// An MPFR number of 400 bits that frees itself.
class exact {
public:
    exact() { mpfr_init2(x_, 400); }
    explicit exact(double x) : exact() { mpfr_set_d(x_, x, MPFR_RNDN); }
    ~exact() { mpfr_clear(x_); }
    exact(const exact&) = delete;
    exact& operator=(const exact&) = delete;
    operator mpfr_ptr() { return x_; }
    double rounded() { return mpfr_get_d(x_, MPFR_RNDN); }

private:
    mpfr_t x_;
};

// Gamma(1 + 2/k) - Gamma(1 + 1/k)^2 at 400 bits, where it is a difference of near equals, and where
// not.
TEST(Weibull, VarianceIsRightForEveryShape) {
    for (const double shape :
         {0.02, 0.03, 0.1, 0.5, 0.9, 2.0, 7.0, 15.0, 16.5, 40.0, 1e3, 1e6, 1e12}) {
        exact x(1);
        mpfr_div_d(x, x, shape, MPFR_RNDN);
        exact two;
        mpfr_mul_2ui(two, x, 1, MPFR_RNDN);
        mpfr_add_ui(x, x, 1, MPFR_RNDN);
        mpfr_add_ui(two, two, 1, MPFR_RNDN);
        mpfr_gamma(x, x, MPFR_RNDN);
        mpfr_gamma(two, two, MPFR_RNDN);
        const leat::weibull law{shape, 1};
        EXPECT_NEAR(law.mean() / x.rounded(), 1, 1e-13) << shape;
        mpfr_sqr(x, x, MPFR_RNDN);
        mpfr_sub(two, two, x, MPFR_RNDN);
        EXPECT_NEAR(law.variance() / two.rounded(), 1, 1e-12) << shape;
    }
    // pi^2 / (6 k^2), the limit for large shapes, out of double's range on the way
    EXPECT_NEAR((leat::weibull{1e200, 1e150}.variance() / 1e-100) / (M_PI * M_PI / 6), 1, 1e-14);
}

TEST(Lognormal, VarianceIsRightForEverySpread) {
    for (const double sd : {1e-200, 1e-12, 1e-9, 1e-5, 0.1, 1.0, 5.0, 6.4, 15.0}) {
        exact square(sd);
        mpfr_sqr(square, square, MPFR_RNDN);
        exact variance;
        mpfr_expm1(variance, square, MPFR_RNDN);
        mpfr_add_ui(square, square, 6, MPFR_RNDN); // 2 log_mean
        mpfr_exp(square, square, MPFR_RNDN);
        mpfr_mul(variance, variance, square, MPFR_RNDN);
        const leat::lognormal law{3, sd};
        if (sd == 1e-200) {
            EXPECT_EQ(law.variance(), smallest);
        } else {
            EXPECT_NEAR(law.variance() / variance.rounded(), 1, 1e-13) << sd;
        }
    }
    EXPECT_EQ((leat::lognormal{3, 0}.variance()), 0);
}

// from_mean_sd inverts mean() and variance(), whose values the references pin above.
TEST(Lognormal, FromMeanAndStandardDeviation) {
    for (const double mean : {1e-250, 0.3, 8.0, 1e12}) {
        for (const double ratio : {0.0, 1e-12, 1e-6, 0.4, 3.0, 1e5}) {
            const auto law = leat::lognormal<>::from_mean_sd(mean, mean * ratio);
            EXPECT_NEAR(law.mean() / mean, 1, 1e-12) << mean << ' ' << ratio;
            const double cv = law.log_sd() < 1e-3
                                  ? law.log_sd()
                                  : std::sqrt(std::expm1(std::pow(law.log_sd(), 2)));
            EXPECT_NEAR(cv, ratio, 1e-6 * ratio) << mean << ' ' << ratio;
        }
    }
    // ln(1 + r^2) for an r whose square no double holds: 2 ln r.
    const auto wide = leat::lognormal<>::from_mean_sd(1e-100, 1e100);
    EXPECT_NEAR(wide.log_sd(), std::sqrt(400 * std::log(10.0)), 1e-12);
    static_assert(leat::lognormal<float>::from_mean_sd(8, 0).log_sd() == 0);
}

TEST(Laws, MomentsOutOfRangeSaturate) {
    EXPECT_EQ(leat::exponential{1e-200}.variance(), largest);
    EXPECT_EQ(leat::exponential{1e200}.variance(), smallest);
    EXPECT_DOUBLE_EQ(leat::exponential{1e-200}.mean(), 1e200);
    EXPECT_EQ((leat::normal{0, 1e200}.variance()), largest);
    EXPECT_EQ((leat::normal{0, 0}.variance()), 0);
    EXPECT_EQ((leat::gamma{1e10, 1e200}.variance()), largest);
    EXPECT_DOUBLE_EQ((leat::gamma{1e10, 1e-155}.variance()), 1e-300);
    EXPECT_EQ((leat::weibull{1e-3, 1}.mean()), largest);
    EXPECT_EQ((leat::lognormal{0, 50}.mean()), largest);
}

// ---- Draws against their definitions -----------------------------------------------------------

// mean + sd z, E / rate, exp(log_mean + log_sd z), scale E^(1/shape): z and E as the standard laws
// draw them from the same words, the rest by MPFR.
TEST(Laws, DrawsAreTheDefiningFunctionsOfTheStandardLaws) {
    engine g{2026};
    for (int i = 0; i < 20000; ++i) {
        engine copy = g;
        const double z = leat::normal{}(copy);
        copy = g;
        const double e = leat::exponential{}(copy);

        copy = g;
        EXPECT_DOUBLE_EQ((leat::normal{-3, 0.7}(copy)), -3 + 0.7 * z);
        copy = g;
        EXPECT_EQ((leat::normal<float>{0, 1}(copy)), static_cast<float>(z));
        copy = g;
        EXPECT_EQ(leat::exponential{0.3}(copy), e / 0.3);
        copy = g;
        EXPECT_EQ(leat::exponential<float>{1}(copy), static_cast<float>(e));

        copy = g;
        exact log(z);
        mpfr_mul_d(log, log, 1.3, MPFR_RNDN);
        mpfr_add_d(log, log, 2, MPFR_RNDN);
        mpfr_exp(log, log, MPFR_RNDN);
        ASSERT_NEAR((leat::lognormal{2, 1.3}(copy)) / log.rounded(), 1, 4e-15);

        copy = g;
        exact life(e);
        exact power(1);
        mpfr_div_d(power, power, 1.7, MPFR_RNDN);
        mpfr_pow(life, life, power, MPFR_RNDN);
        mpfr_mul_ui(life, life, 8, MPFR_RNDN);
        ASSERT_NEAR((leat::weibull{1.7, 8}(copy)) / life.rounded(), 1, 2e-15);
        g();
    }
}

// Marsaglia and Tsang's constants and acceptance probabilities, from the reference's closed form.
TEST(Gamma, AcceptanceIsThePublishedOne) {
    const json entry = leat_test::reference_entry("distributions.mt2000.gamma");
    LEAT_TEST_REFERENCE(entry);
    for (const auto& [shape, expected] : entry["expected"].items()) {
        const leat::gamma law{std::stod(shape), 1};
        EXPECT_DOUBLE_EQ(leat::detail::gamma_from_one{std::stod(shape)}.d,
                         expected["d"].get<double>());
        struct counting {
            static constexpr std::uint64_t min() { return 0; }
            static constexpr std::uint64_t max() { return ~std::uint64_t{0}; }
            std::uint64_t operator()() {
                ++drawn;
                return g();
            }
            engine g{3};
            double drawn = 0;
        } g;
        constexpr int draws = 400000;
        for (int i = 0; i < draws; ++i) {
            static_cast<void>(law(g));
        }
        // A trial takes a normal (1.0221 words, ziggurat_test.cpp) and, unless z <= -1/c has
        // already rejected it, a uniform.
        const double c = expected["c"].get<double>();
        const double words = 1.0221 + 1 - 0.5 * std::erfc(1 / (c * std::sqrt(2.0)));
        const double acceptance = draws * words / g.drawn;
        EXPECT_NEAR(acceptance, expected["acceptance"].get<double>(), 0.0015) << shape;
    }
}

// ln(1+t) - (t - t^2/2 + t^3/3) against MPFR: the plain difference loses every digit for small t.
TEST(Gamma, AcceptanceExponentHasItsDigitsForLargeShapes) {
    for (double size = 1e-8; size < 0.9; size *= 1.17) {
        for (const double t : {size, -size}) {
            exact x(t);
            exact expected;
            mpfr_log1p(expected, x, MPFR_RNDN);
            exact term(t);
            for (unsigned long n = 1; n <= 3; ++n) {
                exact part;
                mpfr_div_ui(part, term, n, MPFR_RNDN);
                n == 2 ? mpfr_add(expected, expected, part, MPFR_RNDN)
                       : mpfr_sub(expected, expected, part, MPFR_RNDN);
                mpfr_mul(term, term, x, MPFR_RNDN);
            }
            EXPECT_NEAR(leat::detail::log_beyond_cube(t) / expected.rounded(), 1, 1e-10) << t;
        }
    }
}

TEST(Gamma, DrawLogIsTheLogarithmOfTheDraw) {
    for (const double shape : {1e-3, 0.2, 0.99, 1.0, 2.5, 300.0, 1e12}) {
        const leat::gamma law{shape, 7};
        engine g{4};
        for (int i = 0; i < 3000; ++i) {
            engine copy = g;
            const double log = law.draw_log(copy);
            const double x = law(g);
            ASSERT_EQ(g, copy); // the same words
            if (x > smallest) {
                ASSERT_NEAR(log, std::log(x), 1e-13 * (1 + std::fabs(log))) << shape;
            } else {
                ASSERT_LE(log, std::log(smallest) + 1e-12);
            }
        }
    }
}

// For shape a -> 0, a ln X tends to minus a standard exponential: mean -1, within a few a.
TEST(Gamma, TinyShapesKeepTheirLogarithms) {
    const leat::gamma law{1e-8, 1};
    engine g{5};
    double sum = 0;
    constexpr int draws = 100000;
    for (int i = 0; i < draws; ++i) {
        sum += 1e-8 * law.draw_log(g);
    }
    EXPECT_NEAR(sum / draws, -1, 6.5 / std::sqrt(draws)); // 6.5 standard errors
}

// Mean a and variance a within 6.5 standard errors also where doubles have few digits to spare.
TEST(Gamma, HugeShapesKeepTheirSpread) {
    const double shape = 1e12;
    const leat::gamma law{shape, 1};
    engine g{6};
    double sum = 0;
    double squares = 0;
    constexpr int draws = 100000;
    for (int i = 0; i < draws; ++i) {
        const double z = (law(g) - shape) / 1e6;
        sum += z;
        squares += z * z;
    }
    EXPECT_NEAR(sum / draws, 0, 6.5 / std::sqrt(draws));
    EXPECT_NEAR(squares / draws, 1, 6.5 * std::sqrt(2.0 / draws));
}

// ---- Degenerate laws and the ends of the range
// ---------------------------------------------------

TEST(Laws, DegenerateLawsGiveTheirOneValue) {
    engine g{7};
    for (int i = 0; i < 1000; ++i) {
        EXPECT_EQ((leat::normal{2.5, 0}(g)), 2.5);
        EXPECT_EQ((leat::normal{0, 0}(g)), 0);
        EXPECT_DOUBLE_EQ((leat::lognormal{1, 0}(g)), std::exp(1.0));
    }
    EXPECT_NE(g, engine{7}); // they consume words as ever: a sweep over sd keeps its random numbers
}

template <class Law>
void expect_in_range(const Law& law) {
    using real = typename Law::result_type;
    engine g{8};
    for (int i = 0; i < 2000; ++i) {
        const real x = law(g);
        ASSERT_TRUE(std::isfinite(x)) << law.param().scale;
        ASSERT_GE(x, std::numeric_limits<real>::min());
    }
}

TEST(Laws, ExtremeParametersStayInTheSupport) {
    for (const double shape : {1e-8, 1e-3, 0.5, 1.0, 50.0, 1e12, 1e300}) {
        for (const double scale : {1e-300, 1.0, 1e300, largest}) {
            expect_in_range(leat::gamma{shape, scale});
            expect_in_range(leat::weibull{shape, scale});
        }
        expect_in_range(leat::gamma<float>{std::fmin(shape, 1e30), 1e-30});
        expect_in_range(leat::weibull<float>{std::fmin(shape, 1e30), 1e30});
    }
    engine g{9};
    for (const double extreme : {5e-324, 1e-310, smallest, 1e-200, 1e200, largest}) {
        for (int i = 0; i < 500; ++i) {
            const double e = leat::exponential{extreme}(g);
            ASSERT_GE(e, smallest);
            ASSERT_LE(e, largest);
            const double z = leat::normal{0, extreme}(g);
            ASSERT_GE(std::fabs(z), smallest);
            ASSERT_LE(std::fabs(z), largest);
            const double l = leat::lognormal{0, extreme}(g);
            ASSERT_GE(l, smallest);
            ASSERT_LE(l, largest);
        }
    }
    for (int i = 0; i < 2000; ++i) {
        const float e = leat::exponential<float>{1e-38}(g);
        ASSERT_TRUE(std::isfinite(e));
        ASSERT_GE((leat::exponential<float>{3e38}(g)), std::numeric_limits<float>::min());
        const float z = leat::normal<float>{3e38, 3e38}(g);
        ASSERT_TRUE(std::isfinite(z));
    }
}

// Only the end result decides: factors that leave the range of double on the way do no harm.
TEST(Laws, IntermediateOverflowDoesNoHarm) {
    engine g{10};
    for (int i = 0; i < 1000; ++i) {
        engine copy = g;
        const double e = leat::exponential{}(copy);
        const double log = std::log(1e-300) + std::log(e) / 1e-3; // E^1000 alone may pass 1e308
        const double x = leat::weibull{1e-3, 1e-300}(g);
        if (log > -708 && log < 709) {
            ASSERT_NEAR(std::log(x), log, 1e-10);
        } else if (log < -709 || log > 710) {
            ASSERT_EQ(x, log < 0 ? smallest : largest);
        }
        // d (1 + c z)^3 alone is about 1e308, with some draws beyond the range
        ASSERT_NEAR((leat::gamma{1.7e308, 1e-300}(g)) / 1.7e8, 1, 1e-12);
    }
}

} // namespace
