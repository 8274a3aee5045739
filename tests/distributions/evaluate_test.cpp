// density, cumulative and quantile of the laws: against Boost.Math's distributions and the
// published values of tests/reference/distributions.json (computed with mpmath), inverse to each
// other, and right at the ends.

#include "leat/distributions/cauchy.hpp"
#include "leat/distributions/empirical.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/gumbel.hpp"
#include "leat/distributions/laplace.hpp"
#include "leat/distributions/logistic.hpp"
#include "leat/distributions/lognormal.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/pareto.hpp"
#include "leat/distributions/piecewise_linear.hpp"
#include "leat/distributions/rayleigh.hpp"
#include "leat/distributions/triangular.hpp"
#include "leat/distributions/truncated_normal.hpp"
#include "leat/distributions/weibull.hpp"
#include "leat/distributions/with_boost_math.hpp"
#include "support/reference.hpp"

#include <boost/math/distributions/cauchy.hpp>
#include <boost/math/distributions/exponential.hpp>
#include <boost/math/distributions/extreme_value.hpp>
#include <boost/math/distributions/gamma.hpp>
#include <boost/math/distributions/laplace.hpp>
#include <boost/math/distributions/logistic.hpp>
#include <boost/math/distributions/lognormal.hpp>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/pareto.hpp>
#include <boost/math/distributions/rayleigh.hpp>
#include <boost/math/distributions/triangular.hpp>
#include <boost/math/distributions/weibull.hpp>
#include <gtest/gtest.h>

#include <cmath>
#include <limits>
#include <string>
#include <vector>

namespace {

using leat_test::json;

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double not_a_number = std::numeric_limits<double>::quiet_NaN();
constexpr double chances[] = {1e-300,     1e-100, 1e-12,    1e-5,       0.01,  0.2,
                              0.3679,     0.4999, 0.5,      0.6,        0.745, 0.755,
                              1 - 0x1p-7, 0.9999, 1 - 1e-9, 1 - 0x1p-53};

double number(const json& value) {
    return value.is_string() ? std::stod(value.get<std::string>()) : value.get<double>();
}

/// |x| for a relative tolerance, where 0 asks for as much as the smallest normal number.
double size_of(double x) { return std::fabs(x) + std::numeric_limits<double>::min(); }

/// Against a Boost.Math law, at its own quantiles, so that every part of the support is met.
/// `tolerance` is relative, times the conditioning of the argument: x may be given in steps of an
/// ulp, which moves the results by |x| density / cumulative ulp.
template <class Law, class Reference>
void expect_as_boost(const std::string& name, const Law& law, const Reference& reference,
                     double tolerance = 2e-14) {
    SCOPED_TRACE(name);
    for (const double p : chances) {
        const double x = quantile(reference, p);
        if (!std::isfinite(x) || std::fabs(x) < 1e-300) {
            continue;
        }
        const double expected = cdf(reference, x);
        const double slope = pdf(reference, x);
        EXPECT_NEAR(leat::cumulative(law, x), expected,
                    tolerance * (size_of(expected) + std::fabs(x) * slope))
            << x;
        EXPECT_NEAR(leat::density(law, x), slope, 50 * tolerance * size_of(slope)) << x;
        const double back = leat::quantile(law, p);
        // an ulp of p and of x each
        const double step = slope > 0 ? tolerance * p / slope : 0;
        EXPECT_NEAR(back, x, 4 * (tolerance * size_of(x) + step)) << p;
    }
}

// Boost in double to within its own accuracy of some 1e-14.
TEST(Evaluate, AsBoost) {
    using namespace boost::math;
    expect_as_boost("normal", leat::normal{0, 1}, normal_distribution<>(0, 1), 2e-13);
    expect_as_boost("normal", leat::normal{-2.5, 3}, normal_distribution<>(-2.5, 3), 2e-13);
    expect_as_boost("lognormal", leat::lognormal{1, 0.25}, lognormal_distribution<>(1, 0.25),
                    1e-12);
    expect_as_boost("lognormal", leat::lognormal{-3, 2}, lognormal_distribution<>(-3, 2), 1e-12);
    expect_as_boost("exponential", leat::exponential{0.25}, exponential_distribution<>(0.25));
    expect_as_boost("weibull", leat::weibull{0.5, 2}, weibull_distribution<>(0.5, 2), 4e-13);
    expect_as_boost("weibull", leat::weibull{5, 10}, weibull_distribution<>(5, 10), 4e-13);
    expect_as_boost("gumbel", leat::gumbel{5, 2}, extreme_value_distribution<>(5, 2), 1e-12);
    expect_as_boost("gumbel", leat::gumbel{0, 1}, extreme_value_distribution<>(0, 1), 1e-12);
    expect_as_boost("logistic", leat::logistic{-1, 2}, logistic_distribution<>(-1, 2), 3e-13);
    expect_as_boost("laplace", leat::laplace{2, 0.5}, laplace_distribution<>(2, 0.5), 3e-13);
    expect_as_boost("cauchy", leat::cauchy{3, 2}, cauchy_distribution<>(3, 2), 5e-15);
    expect_as_boost("pareto", leat::pareto{2, 1.5}, pareto_distribution<>(2, 1.5), 1e-13);
    expect_as_boost("rayleigh", leat::rayleigh{1.5}, rayleigh_distribution<>(1.5));
    expect_as_boost("triangular", leat::triangular{-1, 0.5, 3},
                    triangular_distribution<>(-1, 0.5, 3));
    for (const double shape : {0.3, 1.0, 2.5, 9.9, 10.1, 1e3, 1e5}) {
        expect_as_boost("gamma " + std::to_string(shape), leat::gamma{shape, 2},
                        gamma_distribution<>(shape, 2), 5e-13);
    }
}

// Far from the mean of a huge shape, computed with mpmath 1.2 at 60 digits from the definition.
TEST(Evaluate, GammaDensityKeepsItsDigitsForHugeShapes) {
    EXPECT_NEAR((leat::gamma{1e9, 2}.density(1997657850.1183395)) / 5.866442504505763e-304, 1,
                1e-12);
}

/// The entry's quantiles and values; `tolerance` relative, its inputs being rounded to doubles.
template <class Make>
void expect_published(const std::string& family, double tolerance, Make make) {
    for (const json& entry : leat_test::reference_family("distributions." + family + ".")) {
        LEAT_TEST_REFERENCE(entry);
        const auto law = make(entry["parameters"]);
        for (const auto& [p, x] : entry["expected"]["lower"].items()) {
            const double expected = number(x);
            EXPECT_NEAR(leat::quantile(law, std::stod(p)), expected,
                        tolerance * (std::fabs(expected) + std::sqrt(std::fmin(law.variance(), 1))))
                << p;
        }
        for (const json& at : entry["expected"]["at"]) {
            const double x = number(at["x"]);
            const double slope = number(at["pdf"]);
            const double cumulative = number(at["cdf"]);
            EXPECT_NEAR(leat::cumulative(law, x), cumulative,
                        tolerance * (cumulative + std::fabs(x) * slope))
                << x;
            EXPECT_NEAR(leat::density(law, x), slope, 100 * tolerance * slope) << x;
        }
    }
}

TEST(Evaluate, PublishedValues) {
    expect_published("normal", 1e-14, [](const json& p) {
        return leat::normal{number(p["mean"]), number(p["sd"])};
    });
    expect_published("exponential", 1e-14,
                     [](const json& p) { return leat::exponential{number(p["rate"])}; });
    expect_published("weibull", 1e-14, [](const json& p) {
        return leat::weibull{number(p["shape"]), number(p["scale"])};
    });
    expect_published("lognormal", 1e-14, [](const json& p) {
        return leat::lognormal{number(p["mu"]), number(p["sigma"])};
    });
    expect_published("gamma", 1e-12, [](const json& p) {
        return leat::gamma{number(p["shape"]), number(p["scale"])};
    });
    const auto expect_located = [](const std::string& family, auto standard) {
        expect_published(family, 1e-14, [](const json& p) {
            return decltype(standard){number(p["location"]), number(p["scale"])};
        });
    };
    expect_located("gumbel", leat::gumbel{});
    expect_located("logistic", leat::logistic{});
    expect_located("laplace", leat::laplace{});
    expect_located("cauchy", leat::cauchy{});
    expect_published("pareto", 1e-14, [](const json& p) {
        return leat::pareto{number(p["minimum"]), number(p["index"])};
    });
    expect_published("rayleigh", 1e-14,
                     [](const json& p) { return leat::rayleigh{number(p["scale"])}; });
    expect_published("triangular", 1e-14, [](const json& p) {
        return leat::triangular{number(p["minimum"]), number(p["mode"]), number(p["maximum"])};
    });
}

// Those that Boost.Math answers for, against mpmath.
TEST(Evaluate, PublishedValuesOfTheGammaFamily) {
    expect_published("chi2", 1e-12,
                     [](const json& p) { return leat::chi_squared{number(p["nu"])}; });
    expect_published("student", 1e-12,
                     [](const json& p) { return leat::student_t{number(p["nu"])}; });
    expect_published("f", 1e-12, [](const json& p) {
        return leat::fisher_f{number(p["d1"]), number(p["d2"])};
    });
    expect_published("beta", 1e-12, [](const json& p) {
        return leat::beta{number(p["a"]), number(p["b"])};
    });
}

// x^2 / (2 scale^2) is a gamma variate of shape 3/2.
TEST(Evaluate, MaxwellIsTheRootOfAGamma) {
    for (const double scale : {1.0, 0.37, 1e-150}) {
        const leat::maxwell law{scale};
        for (double z = 0x1p-40; z < 36; z *= 1.31) {
            const double x = scale * z;
            const double half_square = 0.5 * (x / scale) * (x / scale);
            const double expected = boost::math::gamma_p(1.5, half_square);
            EXPECT_NEAR(leat::cumulative(law, x), expected, 1e-14 * expected) << z;
            const double slope =
                boost::math::gamma_p_derivative(1.5, half_square) * (x / scale) / scale;
            EXPECT_NEAR(leat::density(law, x) / slope, 1, 1e-12) << z;
            if (expected < 0.99) {
                EXPECT_NEAR(leat::quantile(law, expected) / x, 1, 1e-13) << z;
            }
        }
    }
}

// The exact rational values: mean 19/12, variance 77/144, a quarter of the area before 1.
TEST(Evaluate, PiecewiseLinearIsItsDefinition) {
    const json& entry = leat_test::reference_entry("distributions.piecewise.linear");
    LEAT_TEST_REFERENCE(entry);
    const leat::piecewise_linear law{{0, 1, 3}, {0, 1, 0.5}};
    EXPECT_DOUBLE_EQ(law.mean(), 19.0 / 12);
    EXPECT_DOUBLE_EQ(law.variance(), 77.0 / 144);
    EXPECT_DOUBLE_EQ(law.cumulative(1), 0.25);
    EXPECT_DOUBLE_EQ(law.density(1), 0.5);
    EXPECT_DOUBLE_EQ(law.density(2), 0.375);
    EXPECT_DOUBLE_EQ(law.density(0.5), 0.25);
    EXPECT_DOUBLE_EQ(law.density(2.999999999999), 0.25 + 0.125e-12);
    EXPECT_DOUBLE_EQ(law.quantile(0.25), 1);
    EXPECT_DOUBLE_EQ(law.quantile(0.0625), 0.5);
    for (double p = 0.001; p < 1; p += 0.0317) {
        EXPECT_NEAR(law.cumulative(law.quantile(p)), p, 4e-16 + 4e-16 * p);
    }
    // a gap, a density that falls to 0, parts of very different size: moments by hand
    const leat::piecewise_linear gap{{0, 1, 2, 3}, {2, 0, 0, 6}};
    EXPECT_DOUBLE_EQ(gap.mean(), (1.0 / 3 + 3 * 8.0 / 3) / 4);
    EXPECT_EQ(gap.density(1.5), 0);
    EXPECT_EQ(gap.cumulative(1.5), 0.25);
    EXPECT_DOUBLE_EQ(gap.quantile(0.25 + 0.75 / 4), 2.5);
    const leat::piecewise_linear wide{{-1e300, 0, 1e300}, {1e300, 1e-300, 1e300}};
    EXPECT_DOUBLE_EQ(wide.cumulative(0), 0.5);
    EXPECT_DOUBLE_EQ(wide.density(-1e300), 1e-300);
    EXPECT_NEAR(wide.mean(), 0, 1e285);
}

TEST(Evaluate, EmpiricalCountsItsValues) {
    const leat::empirical law({3.0, 1.0, 2.0, 3.0, -7.0});
    EXPECT_EQ(law.values(), (std::vector<double>{-7, 1, 2, 3, 3}));
    EXPECT_EQ(law, leat::empirical({-7.0, 3.0, 3.0, 1.0, 2.0})); // whatever the order
    EXPECT_DOUBLE_EQ(law.mean(), 0.4);
    EXPECT_DOUBLE_EQ(law.variance(), (7.4 * 7.4 + 0.6 * 0.6 + 1.6 * 1.6 + 2 * 2.6 * 2.6) / 5);
    EXPECT_EQ(law.probability(3), 0.4);
    EXPECT_EQ(law.probability(2.5), 0);
    EXPECT_EQ(law.cumulative(2), 0.6);
    EXPECT_EQ(law.cumulative(1.9), 0.4);
    EXPECT_EQ(law.cumulative(-8), 0);
    EXPECT_EQ(law.cumulative(3), 1);
    EXPECT_EQ(law.quantile(0.2), -7);
    EXPECT_EQ(law.quantile(0.2000001), 1);
    EXPECT_EQ(law.quantile(0.6), 2);
    EXPECT_EQ(law.quantile(0.99), 3);
    for (std::size_t n = 1; n < 300; n += 7) { // k / n as a double is the k-th value's
        std::vector<double> values;
        for (std::size_t i = 0; i < n; ++i) {
            values.push_back(static_cast<double>(n - 1 - i) * 1e300);
        }
        const leat::empirical many(values);
        EXPECT_DOUBLE_EQ(many.mean(), static_cast<double>(n - 1) / 2 * 1e300);
        for (std::size_t k = 1; k < n; ++k) {
            const double p = static_cast<double>(k) / static_cast<double>(n);
            EXPECT_EQ(many.quantile(p), static_cast<double>(k - 1) * 1e300);
            EXPECT_EQ(many.cumulative(many.quantile(p)), p);
        }
    }
}

/// The ends, what is refused, and that the density is the slope of the cumulative chance.
template <class Law>
void expect_sound(const Law& law, double smallest_value, double largest_value) {
    SCOPED_TRACE(Law::param_type::law_name);
    EXPECT_EQ(leat::density(law, -infinity), 0);
    EXPECT_EQ(leat::density(law, infinity), 0);
    EXPECT_EQ(leat::cumulative(law, -infinity), 0);
    EXPECT_EQ(leat::cumulative(law, infinity), 1);
    const double below = std::nextafter(smallest_value, -infinity);
    if (std::isfinite(below)) {
        EXPECT_EQ(leat::density(law, below), 0);
        EXPECT_EQ(leat::cumulative(law, below), 0);
        EXPECT_EQ(leat::density(law, -1e308), 0);
    }
    const double above = std::nextafter(largest_value, infinity);
    if (std::isfinite(above)) {
        EXPECT_EQ(leat::density(law, above), 0);
        EXPECT_EQ(leat::cumulative(law, above), 1);
    }
    EXPECT_THROW(static_cast<void>(leat::density(law, not_a_number)), leat::invalid_parameter);
    EXPECT_THROW(static_cast<void>(leat::cumulative(law, not_a_number)), leat::invalid_parameter);
    for (const double p : {0.0, 1.0, -0.1, 1.1, not_a_number, infinity}) {
        EXPECT_THROW(static_cast<void>(leat::quantile(law, p)), leat::invalid_parameter) << p;
    }
    double last = -infinity;
    for (const double p : chances) {
        const double x = leat::quantile(law, p);
        ASSERT_TRUE(std::isfinite(x));
        EXPECT_GE(x, last);
        last = x;
        if (p > 0.005 && p < 0.995) {
            const double h = 1e-5 * (std::fabs(x) + 1e-3);
            const double slope =
                (leat::cumulative(law, x + h) - leat::cumulative(law, x - h)) / (2 * h);
            EXPECT_NEAR(leat::density(law, x), slope, 3e-5 * slope) << x; // a kink at most
        }
    }
    // the whole mass lies in the middle 98 %, but for 2 %: Simpson's rule in the chance's own scale
    double area = 0;
    const double low = leat::quantile(law, 0.01);
    const double high = leat::quantile(law, 0.99);
    constexpr int steps = 20000;
    for (int i = 0; i <= steps; ++i) {
        const double weight = i == 0 || i == steps ? 1 : i % 2 == 1 ? 4 : 2;
        area += weight * leat::density(law, low + (high - low) * i / steps);
    }
    EXPECT_NEAR(area * (high - low) / (3 * steps), 0.98, 2e-4);
}

TEST(Evaluate, EndsRefusalsAndSlopes) {
    expect_sound(leat::normal{-2.5, 3}, -infinity, infinity);
    expect_sound(leat::lognormal{1, 0.25}, 0, infinity);
    expect_sound(leat::exponential{0.25}, 0, infinity);
    expect_sound(leat::weibull{1.5, 2}, 0, infinity);
    expect_sound(leat::gamma{2.5, 3}, 0, infinity);
    expect_sound(leat::gumbel{5, 2}, -infinity, infinity);
    expect_sound(leat::logistic{-1, 2}, -infinity, infinity);
    expect_sound(leat::laplace{2, 0.5}, -infinity, infinity);
    expect_sound(leat::cauchy{3, 2}, -infinity, infinity);
    expect_sound(leat::pareto{2, 1.5}, 2, infinity);
    expect_sound(leat::rayleigh{1.5}, 0, infinity);
    expect_sound(leat::maxwell{1.5}, 0, infinity);
    expect_sound(leat::triangular{-1, 0.5, 3}, -1, 3);
    expect_sound(leat::triangular{-1, 3, 3}, -1, 3);
    expect_sound(leat::piecewise_linear{{0, 1, 3}, {0, 1, 0.5}}, 0, 3);
    expect_sound(leat::erlang{3, 2}, 0, infinity);
    expect_sound(leat::chi_squared{5}, 0, infinity);
    expect_sound(leat::beta{2, 3}, 0, 1);
    expect_sound(leat::student_t{4}, -infinity, infinity);
    expect_sound(leat::fisher_f{3, 4}, 0, infinity);
    expect_sound(leat::inverse_gaussian{2, 3}, 0, infinity);
    expect_sound(leat::truncated_normal{0, 1, -1, 2}, -1, 2);
    expect_sound(leat::normal<float>{1, 2}, -infinity, infinity);
}

TEST(Evaluate, DegenerateLawsAreSteps) {
    const leat::normal point{2.5, 0};
    EXPECT_EQ(point.density(2.5), std::numeric_limits<double>::max());
    EXPECT_EQ(point.density(2.4), 0);
    EXPECT_EQ(point.cumulative(2.4), 0);
    EXPECT_EQ(point.cumulative(2.5), 1);
    EXPECT_EQ(point.quantile(0.01), 2.5);
    const leat::lognormal one{0, 0};
    EXPECT_EQ(one.cumulative(0.99), 0);
    EXPECT_EQ(one.cumulative(1), 1);
    EXPECT_EQ(one.quantile(0.3), 1);
}

// Whatever the parameters, a chance is one and a quantile is finite.
TEST(Evaluate, ExtremeParameters) {
    for (const double a : {1e-300, 1e-8, 1.0, 1e12, 1e300}) {
        for (const double b : {1e-300, 1e-8, 1.0, 1e12, 1e300}) {
            const auto sound = [&](const auto& law) {
                for (const double x : {-1e308, -1.0, 1e-310, 1e-300, 1e-8, 1.0, 3.0, 1e12, 1e308}) {
                    const double p = law.cumulative(x);
                    EXPECT_TRUE(p >= 0 && p <= 1) << a << ' ' << b << ' ' << x;
                    const double slope = law.density(x);
                    EXPECT_TRUE(slope >= 0 && std::isfinite(slope)) << a << ' ' << b << ' ' << x;
                }
                for (const double p : chances) {
                    EXPECT_TRUE(std::isfinite(law.quantile(p))) << a << ' ' << b << ' ' << p;
                }
            };
            sound(leat::normal{a, b});
            sound(leat::lognormal{a, b});
            sound(leat::exponential{a});
            sound(leat::weibull{a, b});
            sound(leat::gumbel{-a, b});
            sound(leat::logistic{a, b});
            sound(leat::laplace{-a, b});
            sound(leat::cauchy{a, b});
            sound(leat::pareto{a, b});
            sound(leat::rayleigh{a});
            sound(leat::triangular{-a - 1, 0, b + 1});
            const leat::gamma law{a, b};
            for (const double x : {1e-310, 1e-8, 1.0, 1e12, 1e308}) {
                EXPECT_TRUE(law.density(x) >= 0 && std::isfinite(law.density(x))) << a << ' ' << b;
            }
        }
    }
}

// The members are constexpr, and the library's own name for them finds them.
static_assert(leat::normal{0, 1}.cumulative(0) == 0.5);
static_assert(leat::cumulative(leat::cauchy{0, 1}, 0) == 0.5);
static_assert(leat::logistic{0, 1}.quantile(0.5) == 0);

} // namespace
