// The laws built on gamma variates, and truncated_normal, inverse_gaussian and von_mises, one by
// one: what is written, refusals, moments against Boost.Math, degenerate and extreme parameters,
// the words a draw takes, densities and distribution functions. Fits are in
// goodness_gamma_family_test.cpp.

#include "leat/distributions/beta.hpp"
#include "leat/distributions/chi_squared.hpp"
#include "leat/distributions/erlang.hpp"
#include "leat/distributions/fisher_f.hpp"
#include "leat/distributions/inverse_gaussian.hpp"
#include "leat/distributions/student_t.hpp"
#include "leat/distributions/truncated_normal.hpp"
#include "leat/distributions/von_mises.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"

#include <boost/math/distributions/beta.hpp>
#include <boost/math/distributions/fisher_f.hpp>
#include <boost/math/distributions/gamma.hpp>
#include <boost/math/distributions/inverse_gaussian.hpp>
#include <boost/math/distributions/students_t.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <concepts>
#include <cstdint>
#include <limits>
#include <sstream>
#include <string>

namespace {

using engine = leat::xoshiro256_plus_plus;

constexpr double smallest = std::numeric_limits<double>::min();
constexpr double largest = std::numeric_limits<double>::max();
constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double nan = std::numeric_limits<double>::quiet_NaN();

// The design: deduction ignores argument types; named fields cannot be got the wrong way round.
static_assert(std::same_as<decltype(leat::truncated_normal{0, 1, 2, 3})::result_type, double>);
static_assert(std::same_as<decltype(leat::erlang{3, 2})::result_type, double>);
static_assert(std::same_as<decltype(leat::beta{1.0F, 2})::result_type, double>);
static_assert(leat::erlang{{.k = 3, .rate = 2}} == leat::erlang{3.0, 2});
static_assert(leat::truncated_normal{{.mean = 1, .sd = 2, .lo = 3, .hi = 4}} ==
              leat::truncated_normal{1, 2, 3, 4});
static_assert(leat::fisher_f{{.d1 = 1, .d2 = 2}} == leat::fisher_f{1, 2});
static_assert(leat::beta{{.a = 1, .b = 2}} == leat::beta{1, 2});
static_assert(leat::inverse_gaussian{{.mean = 1, .shape = 2}} == leat::inverse_gaussian{1, 2});
static_assert(leat::von_mises{{.mean = 1, .concentration = 2}} == leat::von_mises{1, 2});
static_assert(leat::chi_squared{{.k = 2}} == leat::chi_squared{2});
static_assert(leat::student_t{{.k = 2}} == leat::student_t{2});

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

TEST(GammaFamily, RefusedParameters) {
    const std::string whole = ", must be a whole number from 1 to 2^53";
    expect_refused("leat::chi_squared: k = 0, must be finite and > 0",
                   [] { return leat::chi_squared{0}; });
    expect_refused("leat::student_t: k = -1, must be finite and >= 1e-300",
                   [] { return leat::student_t{-1}; });
    expect_refused("leat::fisher_f: d2 = 0, must be finite and >= 1e-300", [] {
        return leat::fisher_f{1, 0};
    });
    expect_refused("leat::beta: a = -2, must be finite and >= 1e-300", [] {
        return leat::beta{-2, 1};
    });
    expect_refused("leat::erlang: k = 0" + whole, [] { return leat::erlang{0, 1}; });
    expect_refused("leat::erlang: k = -3" + whole, [] { return leat::erlang{-3, 1}; });
    expect_refused("leat::erlang: k = 2.5" + whole, [] { return leat::erlang{2.5, 1}; });
    expect_refused("leat::erlang: k = 9007199254740994" + whole, [] {
        return leat::erlang{9007199254740994, 1};
    });
    expect_refused("leat::erlang: k = inf" + whole, [] { return leat::erlang{infinity, 1}; });
    expect_refused("leat::erlang: rate = 0, must be finite and > 0", [] {
        return leat::erlang{1, 0};
    });
    expect_refused("leat::inverse_gaussian: shape = 0, must be finite and > 0", [] {
        return leat::inverse_gaussian{1, 0};
    });
    expect_refused("leat::von_mises: concentration = -1, must be finite and >= 0", [] {
        return leat::von_mises{0, -1};
    });
    expect_refused("leat::von_mises: mean = inf, must be finite", [] {
        return leat::von_mises{infinity, 1};
    });
}

TEST(TruncatedNormal, RefusedParameters) {
    const std::string room = ", must be above lo with a normal number between them";
    const std::string spread = ", must be finite and > 0, or 0 where lo < mean < hi";
    const auto make = [](double mean, double sd, double lo, double hi) {
        return [=] { return leat::truncated_normal{mean, sd, lo, hi}; };
    };
    expect_refused("leat::truncated_normal: hi = 1" + room, make(0, 1, 1, 1));
    expect_refused("leat::truncated_normal: hi = -2" + room, make(0, 1, 1, -2));
    const double next = std::nextafter(1.0, 2.0);
    expect_refused("leat::truncated_normal: hi = 1.0000000000000002" + room, make(0, 1, 1, next));
    expect_refused("leat::truncated_normal: hi = 2.2250738585072014e-308" + room,
                   make(0, 1, -smallest, smallest));
    expect_refused("leat::truncated_normal: hi = -inf" + room, make(0, 1, -infinity, -infinity));
    expect_refused("leat::truncated_normal: lo = inf, must be below hi",
                   make(0, 1, infinity, infinity));
    expect_refused("leat::truncated_normal: sd = 0" + spread, make(0, 0, 1, 2));
    expect_refused("leat::truncated_normal: sd = -1" + spread, make(0, -1, -1, 2));
    expect_refused("leat::truncated_normal: mean = inf, must be finite", make(infinity, 1, 0, 2));
    EXPECT_THROW(make(0, 1, nan, 2)(), leat::invalid_parameter);
    EXPECT_THROW(make(0, 1, 0, nan)(), leat::invalid_parameter);
    // Room for one number: it is drawn.
    engine g{1};
    EXPECT_EQ(make(0, 1, 1, std::nextafter(next, 2.0))()(g), next);
}

TEST(TruncatedNormal, InfiniteEndsAreWrittenAndRead) {
    const leat::truncated_normal law{1, 2, -infinity, infinity};
    std::stringstream text;
    text << law;
    leat::truncated_normal read;
    text >> read;
    EXPECT_EQ(read, law);
    EXPECT_EQ(law.min(), -largest);
    EXPECT_EQ(law.max(), largest);
    EXPECT_NEAR(law.mean(), 1, 1e-13);
    EXPECT_NEAR(law.variance(), 4, 1e-12);
}

// ---- Moments ---------------------------------------------------------------------------------

// Where the law has none, NaN; where it is infinite, infinity (Johnson, Kotz and Balakrishnan,
// Continuous Univariate Distributions 2, 1995, ch. 27 and 28).
TEST(GammaFamily, MomentsThatDoNotExist) {
    EXPECT_TRUE(std::isnan(leat::student_t{1}.mean()));
    EXPECT_TRUE(std::isnan(leat::student_t{1}.variance()));
    EXPECT_EQ(leat::student_t{1.5}.mean(), 0);
    EXPECT_EQ(leat::student_t{1.5}.variance(), infinity);
    EXPECT_EQ(leat::student_t{2}.variance(), infinity);
    EXPECT_EQ((leat::fisher_f{3, 2}.mean()), infinity);
    EXPECT_TRUE(std::isnan(leat::fisher_f{3, 2}.variance()));
    EXPECT_EQ((leat::fisher_f{3, 4}.variance()), infinity);
}

TEST(GammaFamily, MomentsAreBoosts) {
    for (const double a : {1e-8, 0.3, 1.0, 2.5, 40.0, 1e12}) {
        for (const double b : {1e-3, 1.0, 7.0, 1e9}) {
            const boost::math::beta_distribution<> beta(a, b);
            EXPECT_NEAR((leat::beta{a, b}.mean()) / mean(beta), 1, 1e-14);
            EXPECT_NEAR((leat::beta{a, b}.variance()) / variance(beta), 1, 1e-13);
            const boost::math::inverse_gaussian_distribution<> wald(a, b);
            EXPECT_EQ((leat::inverse_gaussian{a, b}.mean()), a);
            EXPECT_NEAR((leat::inverse_gaussian{a, b}.variance()) / variance(wald), 1, 1e-13);
        }
    }
    for (const double k : {2.1, 5.0, 1e6}) {
        const boost::math::students_t_distribution<> t(k);
        EXPECT_NEAR(leat::student_t{k}.variance() / variance(t), 1, 1e-14);
        const boost::math::fisher_f_distribution<> f(3, k + 2);
        EXPECT_NEAR((leat::fisher_f{3, k + 2}.mean()) / mean(f), 1, 1e-14);
        EXPECT_NEAR((leat::fisher_f{3, k + 2}.variance()) / variance(f), 1, 1e-13);
        EXPECT_EQ(leat::chi_squared{k}.mean(), k);
        EXPECT_EQ(leat::chi_squared{k}.variance(), 2 * k);
    }
    EXPECT_DOUBLE_EQ((leat::erlang{7, 4}.mean()), 1.75);
    EXPECT_DOUBLE_EQ((leat::erlang{7, 4}.variance()), 7 / 16.0);
    EXPECT_EQ(leat::chi_squared{1.7e308}.variance(), largest);
    EXPECT_EQ((leat::erlang{7, 1e200}.variance()), smallest);
}

// The closed form (Johnson, Kotz and Balakrishnan, Continuous Univariate Distributions 1, 1994,
// 13.10.1), with std::erfc, where it does not cancel.
TEST(TruncatedNormal, MomentsAreTheClosedForm) {
    const auto density = [](double x) { return std::exp(-x * x / 2) / std::sqrt(2 * M_PI); };
    const auto above = [](double x) { return std::erfc(x / std::sqrt(2.0)) / 2; };
    for (const auto& [a, b] :
         {std::pair{-1.0, 1.5}, {-0.1, 3.0}, {0.5, 2.5}, {3.0, 4.0}, {-9.0, 0.5}, {-5.0, -3.0}}) {
        const double mass = a > 0 ? above(a) - above(b) : above(-b) - above(-a);
        const double mean = (density(a) - density(b)) / mass;
        const double variance = 1 + (a * density(a) - b * density(b)) / mass - mean * mean;
        const leat::truncated_normal law{10, 2, 10 + 2 * a, 10 + 2 * b};
        EXPECT_NEAR(law.mean(), 10 + 2 * mean, 1e-12) << a;
        EXPECT_NEAR(law.variance(), 4 * variance, 1e-11) << a;
    }
    // Half a normal; an even density; and far out an exponential of rate a, to 1 / a^2.
    const leat::truncated_normal half{0, 3, 0, infinity};
    EXPECT_NEAR(half.mean(), 3 * std::sqrt(2 / M_PI), 1e-13);
    EXPECT_NEAR(half.variance(), 9 * (1 - 2 / M_PI), 1e-12);
    const leat::truncated_normal even{0, 1e6, 1, 2};
    EXPECT_NEAR(even.mean(), 1.5, 1e-12);
    EXPECT_NEAR(even.variance(), 1.0 / 12, 1e-12);
    const leat::truncated_normal far{0, 1, 1e8, infinity};
    EXPECT_EQ(far.mean(), std::nextafter(1e8, infinity)); // 1e8 + 1e-8, rounded
    EXPECT_NEAR(far.variance() * 1e16, 1, 1e-9);
    EXPECT_EQ((leat::truncated_normal{3, 0, 1, 4}.mean()), 3);
    EXPECT_EQ((leat::truncated_normal{3, 0, 1, 4}.variance()), 0);
}

// ---- Densities and distribution functions ------------------------------------------------------

/// Near to a reference that is itself good to `digits` relative; what a double cannot hold is 0.
void expect_close(double got, double expected, double digits, const std::string& where) {
    if (expected < 1e-290) {
        EXPECT_LE(got, 1e-289) << where;
    } else {
        EXPECT_NEAR(got / expected, 1, digits) << where << ": " << got << ", " << expected;
    }
}

TEST(GammaFamily, DensitiesAreBoosts) {
    const auto at = [](double a, double b, double x) {
        return std::to_string(a) + ", " + std::to_string(b) + " at " + std::to_string(x);
    };
    constexpr std::array degrees{0.01, 0.7, 1.0, 2.0, 5.5, 30.0, 1e4};
    for (const double a : degrees) {
        for (const double x : {1e-5, 0.01, 0.5, 0.9, 1.0, 1.1, 3.0, 50.0, 1e4}) {
            const boost::math::gamma_distribution<> half(a / 2, 2);
            expect_close(leat::chi_squared{a}.density(x * a), pdf(half, x * a), 1e-11, at(a, 0, x));
            const boost::math::students_t_distribution<> t(a);
            expect_close(leat::student_t{a}.density(x), pdf(t, x), 1e-11, at(a, 0, x));
            expect_close(leat::student_t{a}.density(-x), pdf(t, x), 1e-11, at(a, 0, x));
            for (const double b : degrees) {
                const boost::math::fisher_f_distribution<> f(a, b);
                expect_close(leat::fisher_f{a, b}.density(x), pdf(f, x), 1e-9, at(a, b, x));
                const boost::math::beta_distribution<> beta(a, b);
                const double share = x / (1 + x);
                expect_close(leat::beta{a, b}.density(share), pdf(beta, share), 1e-9,
                             at(a, b, share));
            }
        }
        expect_close(leat::student_t{a}.density(0), pdf(boost::math::students_t(a), 0.0), 1e-12,
                     at(a, 0, 0));
    }
    const boost::math::gamma_distribution<> stages(12, 0.25);
    EXPECT_NEAR((leat::erlang{12, 4}.density(2.5)) / pdf(stages, 2.5), 1, 1e-12);
    // A huge shape at its mode: the normal density there, 1 / sqrt(2 pi variance), to 1e-12.
    EXPECT_NEAR((leat::beta{1e12, 1e12}.density(0.5)) / std::sqrt(8e12 / (2 * M_PI)), 1, 1e-10);
    for (const double outside : {-1.0, 0.0, infinity, -infinity}) {
        EXPECT_EQ(leat::chi_squared{3}.density(outside), 0);
        EXPECT_EQ((leat::fisher_f{3, 3}.density(outside)), 0);
        EXPECT_EQ((leat::beta{3, 3}.density(outside)), 0);
        EXPECT_EQ((leat::erlang{3, 3}.density(outside)), 0);
        EXPECT_EQ((leat::inverse_gaussian{3, 3}.density(outside)), 0);
    }
    EXPECT_EQ((leat::beta{3, 3}.density(1)), 0);
    EXPECT_EQ(leat::student_t{3}.density(infinity), 0);
    EXPECT_THROW(static_cast<void>(leat::student_t{3}.density(nan)), leat::invalid_parameter);
    EXPECT_THROW(static_cast<void>(leat::chi_squared{3}.density(nan)), leat::invalid_parameter);
}

TEST(InverseGaussian, DensityAndDistributionAreBoosts) {
    for (const double mean : {0.1, 1.0, 20.0}) {
        for (const double shape : {0.2, 1.0, 3.0, 50.0}) {
            const boost::math::inverse_gaussian_distribution<> reference(mean, shape);
            const leat::inverse_gaussian law{mean, shape};
            for (const double x : {0.01, 0.3, 0.9, 1.0, 1.2, 2.0, 7.0}) {
                const std::string where = std::to_string(mean) + ", " + std::to_string(shape) +
                                          " at " + std::to_string(x);
                expect_close(law.density(x * mean), pdf(reference, x * mean), 1e-11, where);
                if (shape / mean < 300) { // beyond, Boost.Math's e^(2 shape / mean) overflows
                    EXPECT_NEAR(law.cumulative(x * mean), cdf(reference, x * mean), 1e-12) << where;
                }
            }
        }
    }
    const leat::inverse_gaussian law{2, 5};
    EXPECT_EQ(law.cumulative(0), 0);
    EXPECT_EQ(law.cumulative(infinity), 1);
    EXPECT_EQ(law.cumulative(1e-300), 0);
    // mean to infinity: P(X <= x) = erfc(sqrt(shape / (2 x))), far into the lower tail
    EXPECT_NEAR((leat::inverse_gaussian{1e30, 5}.cumulative(0.01)) / std::erfc(std::sqrt(250.0)), 1,
                1e-12);
    EXPECT_THROW(static_cast<void>(law.cumulative(nan)), leat::invalid_parameter);
}

TEST(VonMises, DensityIsThatOfTheBesselFunction) {
    for (const double k : {0.0, 1e-12, 0.3, 2.0, 20.0, 49.0, 51.0, 300.0}) {
        const leat::von_mises law{1, k};
        const double bessel = boost::math::cyl_bessel_i(0, k);
        for (const double t : {-3.1, -1.0, -0.01, 0.0, 0.2, 3.1}) {
            expect_close(law.density(1 + t), std::exp(k * std::cos(t)) / (2 * M_PI * bessel), 1e-12,
                         std::to_string(k) + " at " + std::to_string(t));
        }
        EXPECT_EQ(law.density(1 + 3.2), 0);
        EXPECT_EQ(law.density(1 - 3.2), 0);
    }
    EXPECT_NEAR((leat::von_mises{0, 1e20}.density(0)) / std::sqrt(1e20 / (2 * M_PI)), 1, 1e-14);
}

// With std::erfc of the ends' own tails, where that does not cancel.
TEST(TruncatedNormal, DensityAndDistributionAreTheClosedForm) {
    const auto above = [](double x) { return std::erfc(x / std::sqrt(2.0)) / 2; };
    for (const auto& [a, b] : {std::pair{-1.0, 1.5},
                               {-0.1, 3.0},
                               {0.5, 2.5},
                               {3.0, 4.0},
                               {-9.0, 0.5},
                               {-5.0, -3.0},
                               {-infinity, -2.0},
                               {1.0, infinity},
                               {-infinity, infinity},
                               {-0.3, 0.2},
                               {10.0, 11.0}}) {
        const leat::truncated_normal law{10, 2, 10 + 2 * a, 10 + 2 * b};
        const auto between = [&](double x, double y) {
            return x > 0 ? above(x) - above(y) : above(-y) - above(-x);
        };
        for (const double share : {0.01, 0.3, 0.5, 0.8, 0.99}) {
            const double low = std::fmax(a, std::fmin(b, 0) - 5);
            const double z = low + share * (std::fmin(b, low + 8) - low);
            const std::string where =
                std::to_string(a) + ", " + std::to_string(b) + " at " + std::to_string(z);
            const double x = 10 + 2 * z;
            const double chance = between(a, z) / between(a, b);
            EXPECT_NEAR(law.cumulative(x), chance, 1e-12) << where;
            expect_close(law.density(x),
                         std::exp(-z * z / 2) / std::sqrt(2 * M_PI) / between(a, b) / 2, 1e-12,
                         where);
            const double p = law.cumulative(x);
            if (p > 0 && p < 1 - 1e-6) {
                EXPECT_NEAR(law.cumulative(law.quantile(p)), p, 1e-14) << where;
                EXPECT_NEAR(law.quantile(p), x, 1e-8) << where;
            }
        }
        EXPECT_EQ(law.cumulative(10 + 2 * b), 1);
        EXPECT_EQ(law.cumulative(10 + 2 * a), 0);
        EXPECT_EQ(law.density(10 + 2 * b), 0);
    }
    // Far out: 1 - exp(-a v - v^2 / 2) to 1 / a^2; and an even density.
    const leat::truncated_normal far{0, 1, 1e6, infinity};
    EXPECT_NEAR(far.cumulative(1e6 + 1e-6), 1 - std::exp(-1e6 * (1e6 + 1e-6 - 1e6)), 1e-11);
    const leat::truncated_normal even{0, 1e9, 3, 4};
    EXPECT_NEAR(even.quantile(0.25), 3.25, 1e-13);
    EXPECT_NEAR(even.density(3.5), 1, 1e-13);
    const leat::truncated_normal point{3, 0, 1, 4};
    EXPECT_EQ(point.cumulative(2.9), 0);
    EXPECT_EQ(point.cumulative(3), 1);
    EXPECT_EQ(point.quantile(0.5), 3);
    EXPECT_EQ(point.density(3), largest);
    EXPECT_THROW(static_cast<void>(far.quantile(1)), leat::invalid_parameter);
    EXPECT_THROW(static_cast<void>(far.cumulative(nan)), leat::invalid_parameter);
}

// ---- Supports, degenerate laws and extremes ----------------------------------------------------

/// 64-bit words, counted.
struct counted {
    static constexpr std::uint64_t min() { return 0; }
    static constexpr std::uint64_t max() { return ~std::uint64_t{0}; }
    std::uint64_t operator()() {
        ++drawn;
        return g();
    }
    engine g{3};
    double drawn = 0;
};

/// Draws are numbers within min and max, and take at most `bound` words on average (4000 draws:
/// the mean is known to some hundredths).
template <class Law>
void expect_in_support(const Law& law, double bound) {
    constexpr int draws = 4000;
    counted g;
    for (int i = 0; i < draws; ++i) {
        const auto x = law(g);
        ASSERT_TRUE(std::isfinite(x)) << law;
        ASSERT_GE(x, law.min()) << law;
        ASSERT_LE(x, law.max()) << law;
        ASSERT_TRUE(x == 0 || std::isnormal(x)) << law;
    }
    ASSERT_LE(g.drawn / draws, bound + 0.15) << law;
}

// The bounds on words are those that the headers state.
TEST(GammaFamily, ExtremeParametersStayInTheSupport) {
    constexpr std::array shapes{1e-300, 1e-100, 1e-8, 1e-3, 0.1, 0.5,  0.9,   1.0,    1.5,
                                2.0,    3.0,    4.0,  50.0, 1e6, 1e12, 1e300, largest};
    for (const double a : shapes) {
        expect_in_support(leat::chi_squared{a}, a < 2 ? 3.2 : 2.2);
        expect_in_support(leat::student_t{a}, a < 2 ? 4.3 : 3.2);
        if (a < 1e30 && a > 1e-30) {
            const auto f = static_cast<float>(a);
            expect_in_support(leat::chi_squared<float>{f}, a < 2 ? 3.2 : 2.2);
            expect_in_support(leat::student_t<float>{f}, a < 2 ? 4.3 : 3.2);
            expect_in_support(leat::beta<float>{f, 0.3F}, 6.4);
        }
        if (a >= 1 && a < 1e13) {
            for (const double rate : {1e-300, 1.0, 1e300}) {
                expect_in_support(leat::erlang{a == 1.5 ? 1 : a, rate}, 2.2);
            }
        }
        for (const double b : shapes) {
            expect_in_support(leat::fisher_f{a, b}, 6.4);
            expect_in_support(leat::beta{a, b}, a + b <= 1 ? 2.65 : a >= 1 && b >= 1 ? 4.2 : 6.4);
        }
    }
    expect_in_support(leat::chi_squared{5e-324}, 3.2);
    expect_in_support(leat::erlang{std::int64_t{1} << 53, 3}, 2.2);
}

TEST(InverseGaussian, ExtremeParametersStayInTheSupport) {
    constexpr std::array sizes{5e-324, 1e-300, 1e-100, 1e-12, 1e-3, 1.0, 1e4, 1e12, 1e300, largest};
    for (const double mean : sizes) {
        for (const double shape : sizes) {
            expect_in_support(leat::inverse_gaussian{mean, shape}, 2.05);
        }
    }
    expect_in_support(leat::inverse_gaussian<float>{1e30F, 1e-30F}, 2.05);
    expect_in_support(leat::inverse_gaussian<float>{1e-30F, 1e30F}, 2.05);
}

// The published root loses every digit here: mean (1 + w - sqrt(w (w + 2))) for w = 1e15.
TEST(InverseGaussian, TheSmallRootKeepsItsDigits) {
    const leat::inverse_gaussian law{1e15, 0.5};
    engine g{5};
    for (int i = 0; i < 1000; ++i) {
        engine copy = g;
        const double z = leat::detail::standard_normal(copy);
        const double w = 1e15 * z * z;
        const double x = law(g);
        if (w > 1e8 && x < 1e10) { // mean / (1 + w + sqrt(w (w + 2))) is mean / (2 w + 2 - ...)
            ASSERT_NEAR(x * (2 * w + 2) / 1e15, 1, 1e-14);
        }
    }
}

TEST(VonMises, ExtremeParametersStayInTheSupport) {
    for (const double concentration :
         {0.0, 5e-324, 1e-300, 1e-12, 1e-3, 1.0, 10.0, 1e6, 1e12, 1e18, 1e19, 1e300, largest}) {
        for (const double mean : {0.0, M_PI, -3.0, 1e6, 1e300}) {
            expect_in_support(leat::von_mises{mean, concentration}, 3.1);
        }
        expect_in_support(leat::von_mises<float>{0.5, std::fmin(concentration, 1e38)}, 3.1);
    }
}

TEST(TruncatedNormal, ExtremeParametersStayInTheSupport) {
    const auto expect = [](double mean, double sd, double lo, double hi, double bound) {
        expect_in_support(leat::truncated_normal{mean, sd, lo, hi}, bound);
        expect_in_support(leat::truncated_normal{-mean, sd, -hi, -lo}, bound); // the mirror image
    };
    for (const double sd : {1e-300, 1e-12, 1.0, 1e12, 1e300}) {
        for (const double a : {-40.0, -1.0, -1e-9, 0.0, 1e-9, 0.2499, 0.26, 1.0, 8.0, 40.0, 1e6}) {
            for (const double width : {1e-9, 0.5, 0.99, 1.01, 1.99, 2.01, 5.0, 1e6}) {
                if (a + width != a && width * sd > 1e-305 && (a + width) * sd < largest) {
                    expect(0, sd, a * sd, (a + width) * sd, 3.4);
                }
            }
            expect(0, sd, a * sd, infinity, 3.2);
        }
    }
    expect(1e6, 1e-3, 1e6 - 1e-10, 1e6 + 1e-9, 3.4);
    expect(-1e300, 1e-300, 0, 1e300, 3.2); // more sd out than a double counts
    expect(-largest, smallest, largest / 2, largest, 3.2);
    expect(-largest, largest, -largest, largest, 3.2);
    expect(0, largest, -largest, largest, 3.4);
    expect(largest, largest, -largest, infinity, 3.2);
    expect(0, 1, 0, 5e-324 + 2 * smallest, 3.4); // about the subnormal numbers
    for (const float lo : {-3.0F, 0.0F, 5.0F}) { // never an end, though 2^-24 away from it
        expect_in_support(leat::truncated_normal<float>{0, 1, lo, std::nextafter(lo, 9.0F) + 1e-6F},
                          3.4);
    }
}

// Common random numbers stay common as sd goes to 0.
TEST(TruncatedNormal, ADegenerateLawGivesItsMeanAndConsumesWords) {
    const leat::truncated_normal law{2.5, 0, 1, 3};
    engine g{7};
    for (int i = 0; i < 100; ++i) {
        EXPECT_EQ(law(g), 2.5);
    }
    EXPECT_NE(g, engine{7});
}

// Half of Student's draws pass the range of double at k = 0.001: P(|T| > t) is about t^-k.
TEST(StudentT, TinyDegreesSaturate) {
    const leat::student_t law{1e-3};
    engine g{8};
    int saturated = 0;
    for (int i = 0; i < 10000; ++i) {
        saturated += std::fabs(law(g)) == largest ? 1 : 0;
    }
    EXPECT_NEAR(saturated / 1e4, std::exp(-0.001 * std::log(largest)), 6.5 * 0.005);
}

// With k = 1 the tail is P(|T| > t) = 2 / (pi t): a normal in steps of 2^-53 would end it at 2^54.
// These words are a normal of about 1, one of nearly 0, an exponential that enters its tail (7.7)
// six times, and one to accept with.
TEST(StudentT, TheTailOfOneDegreeHasNoEnd) {
    constexpr std::uint64_t plain = 0x4000000000000005u;
    constexpr std::uint64_t least = 0x0000000000000005u;
    constexpr std::uint64_t tail = 0xFFFFFFFFFFFFFF00u;
    leat::scripted words{plain, least, tail, tail, tail, tail, tail, tail, plain, plain};
    const double t = leat::student_t{1}(words);
    EXPECT_GT(t, 256 * std::exp(46.0) * 0.1);
    EXPECT_LT(t, 256 * std::exp(48.0));
}

} // namespace
