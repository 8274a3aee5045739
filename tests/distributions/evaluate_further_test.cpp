// cumulative and quantile of the laws of whole numbers that with_boost_math.hpp answers for, and of
// von_mises: against Boost.Math's distributions, the published values of tests/reference (mpmath),
// the definitions, and inverse to each other.

#include "leat/distributions/von_mises.hpp"
#include "leat/distributions/with_boost_math.hpp"
#include "support/reference.hpp"

#include <boost/math/distributions/binomial.hpp>
#include <boost/math/distributions/hypergeometric.hpp>
#include <boost/math/distributions/negative_binomial.hpp>
#include <boost/math/distributions/poisson.hpp>
#include <gtest/gtest.h>

#include <cmath>
#include <cstdint>
#include <limits>
#include <string>

namespace {

using leat_test::json;

constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double not_a_number = std::numeric_limits<double>::quiet_NaN();
constexpr double chances[] = {1e-300, 1e-100, 1e-12, 1e-5,   0.01,     0.2,        0.4999,
                              0.5,    0.5001, 0.745, 0.9999, 1 - 1e-9, 1 - 0x1p-53};

/// A JSON number, or one written as text.
double number(const json& value) {
    return value.is_string() ? std::stod(value.get<std::string>()) : value.get<double>();
}

void expect_ratio_one(double found, double expected, double tolerance, double at) {
    EXPECT_LE(std::fabs(found - expected), tolerance * expected)
        << found << " and " << expected << " at " << at;
}

/// The entries of a family of discrete.json, tolerance as they ask for.
template <class Make>
void expect_published(const std::string& family, Make make) {
    for (const json& entry : leat_test::reference_family("discrete." + family + ".")) {
        LEAT_TEST_REFERENCE(entry);
        const auto law = make(entry.at("parameters"));
        for (const json& at : entry.at("expected").at("at")) {
            const double k = number(at.at("k"));
            expect_ratio_one(leat::cumulative(law, k), number(at.at("cdf")), 1e-12, k);
            EXPECT_EQ(leat::cumulative(law, k + 0.5), leat::cumulative(law, k)) << k;
        }
        for (const auto& [p, k] : entry.at("expected").at("lower").items()) {
            EXPECT_EQ(leat::quantile(law, std::stod(p)), number(k)) << p;
        }
        for (const auto& [q, k] : entry.at("expected").at("upper").items()) {
            EXPECT_EQ(leat::quantile(law, 1 - std::stod(q)), number(k)) << "upper " << q;
        }
    }
}

TEST(EvaluateFurther, PublishedCounts) {
    expect_published("poisson", [](const json& p) { return leat::poisson{number(p["mean"])}; });
    expect_published("binomial", [](const json& p) {
        return leat::binomial{static_cast<std::int64_t>(number(p["n"])), number(p["p"])};
    });
    expect_published("negbinomial", [](const json& p) {
        return leat::negative_binomial{number(p["r"]), number(p["p"])};
    });
    expect_published("hypergeometric", [](const json& p) {
        return leat::hypergeometric{static_cast<int>(number(p["N"])),
                                    static_cast<int>(number(p["K"])),
                                    static_cast<int>(number(p["n"]))};
    });
}

/// Against Boost.Math in long double, from one end to the other.
template <class Law, class Reference>
void expect_as_boost(const Law& law, const Reference& reference, double tolerance) {
    SCOPED_TRACE(Law::param_type::law_name);
    for (const double p : chances) {
        const double k = leat::quantile(law, p);
        const auto expected = static_cast<double>(cdf(reference, k));
        expect_ratio_one(leat::cumulative(law, k), expected, tolerance, k);
    }
}

TEST(EvaluateFurther, CountsAsBoost) {
    using namespace boost::math;
    using real = long double;
    for (const double mean : {1e-9, 0.37, 9.9, 10.1, 1234.5, 1e6}) {
        expect_as_boost(leat::poisson{mean}, poisson_distribution<real>(mean), 3e-12);
    }
    for (const int n : {1, 7, 1000, 1000000}) {
        for (const double p : {1e-6, 0.03, 0.5, 0.77}) {
            expect_as_boost(leat::binomial{n, p}, binomial_distribution<real>(n, p), 3e-12);
        }
    }
    for (const double r : {1e-3, 0.7, 12.5, 1e4}) {
        for (const double p : {1e-8, 0.01, 0.5, 0.98}) {
            expect_as_boost(leat::negative_binomial{r, p},
                            negative_binomial_distribution<real>(r, p), 3e-12);
        }
    }
    // population, marked, drawn; Boost's are drawn, marked, population
    const unsigned found[][3] = {
        {10, 4, 3}, {100, 90, 80}, {1000, 30, 990}, {100000, 50000, 40000}};
    for (const auto& [all, marked, drawn] : found) {
        expect_as_boost(leat::hypergeometric{all, marked, drawn},
                        hypergeometric_distribution<real>(drawn, marked, all), 3e-12);
    }
}

/// The least k, by its own definition; the ends; what is refused.
template <class Law>
void expect_counts_sound(const Law& law) {
    SCOPED_TRACE(Law::param_type::law_name);
    for (const double p : chances) {
        const double k = leat::quantile(law, p);
        EXPECT_EQ(k, std::floor(k));
        EXPECT_GE(leat::cumulative(law, k), p);
        EXPECT_LT(leat::cumulative(law, k - 1), p) << k;
        const double reached = leat::cumulative(law, k);
        if (reached < 1) {
            EXPECT_EQ(leat::quantile(law, reached), k) << p;
        }
        // the mass at k is what k adds
        const double added = reached - leat::cumulative(law, k - 1);
        EXPECT_NEAR(leat::density(law, k), added, 1e-11 * reached) << k;
    }
    EXPECT_EQ(leat::cumulative(law, -infinity), 0);
    EXPECT_EQ(leat::cumulative(law, static_cast<double>(law.min()) - 0.5), 0);
    EXPECT_EQ(leat::cumulative(law, static_cast<double>(law.max())), 1);
    EXPECT_EQ(leat::cumulative(law, infinity), 1);
    EXPECT_THROW(static_cast<void>(leat::cumulative(law, not_a_number)), leat::invalid_parameter);
    for (const double p : {0.0, 1.0, -0.1, 1.1, not_a_number}) {
        EXPECT_THROW(static_cast<void>(leat::quantile(law, p)), leat::invalid_parameter) << p;
    }
}

TEST(EvaluateFurther, QuantilesAreTheLeastCounts) {
    expect_counts_sound(leat::poisson{4.5});
    expect_counts_sound(leat::poisson{12345.0});
    expect_counts_sound(leat::poisson<std::uint8_t>{20});
    expect_counts_sound(leat::binomial{100, 0.3});
    expect_counts_sound(leat::binomial<std::uint16_t>{40000, 0.999});
    expect_counts_sound(leat::negative_binomial{0.01, 0.01});
    expect_counts_sound(leat::negative_binomial{50, 0.9});
    expect_counts_sound(leat::hypergeometric{1000, 300, 100});
    expect_counts_sound(leat::hypergeometric{20, 15, 10});
    expect_counts_sound(leat::hypergeometric<int>{100000, 99000, 98000});
}

TEST(EvaluateFurther, ConstantCountsAreSteps) {
    const auto expect_step = [](const auto& law, double at) {
        EXPECT_EQ(leat::cumulative(law, at - 1), 0);
        EXPECT_EQ(leat::cumulative(law, at), 1);
        EXPECT_EQ(leat::quantile(law, 1e-300), at);
        EXPECT_EQ(leat::quantile(law, 1 - 0x1p-53), at);
    };
    expect_step(leat::poisson{0}, 0);
    expect_step(leat::binomial{0, 0.3}, 0);
    expect_step(leat::binomial{9, 0}, 0);
    expect_step(leat::binomial{9, 1}, 9);
    expect_step(leat::negative_binomial{2.5, 1}, 0);
    expect_step(leat::hypergeometric{9, 9, 4}, 4);
    expect_step(leat::hypergeometric{9, 4, 9}, 4);
    expect_step(leat::hypergeometric{0, 0, 0}, 0);
}

// Huge laws are normal but for some 1 / (their standard deviation): the central limit theorem.
TEST(EvaluateFurther, HugeCountsAreNormal) {
    const auto expect_normal = [](const auto& law) {
        SCOPED_TRACE(law.param().law_name);
        const double sd = std::sqrt(law.variance());
        for (const double z : {-5.0, -1.0, 0.0, 0.5, 4.0}) {
            const double expected = 0.5 * std::erfc(-z * std::sqrt(0.5));
            EXPECT_NEAR(leat::cumulative(law, law.mean() + z * sd), expected, 20 / sd) << z;
            EXPECT_NEAR((leat::quantile(law, expected) - law.mean()) / sd, z, 1e-4 + 20 / sd) << z;
        }
    };
    expect_normal(leat::poisson{1e9});
    expect_normal(leat::binomial{std::int64_t{1} << 32, 0.3});
    expect_normal(leat::binomial{std::int64_t{1} << 53, 1e-6});
    expect_normal(leat::negative_binomial{1e8, 0.75});
    expect_normal(leat::hypergeometric{std::int64_t{1} << 53, std::int64_t{1} << 51, 1000000000});
}

/// The integral of e^(k (cos t - 1)) by Simpson's rule.
double von_mises_by_simpson(double k, double from, double to) {
    constexpr int steps = 100000;
    double sum = 0;
    for (int i = 0; i <= steps; ++i) {
        const double weight = i == 0 || i == steps ? 1 : i % 2 == 1 ? 4 : 2;
        const double sine = std::sin((from + (to - from) * i / steps) / 2);
        sum += weight * std::exp(-2 * k * sine * sine);
    }
    return sum * (to - from) / (3 * steps);
}

TEST(EvaluateFurther, VonMisesAsPublished) {
    for (const json& entry : leat_test::reference_family("distributions.vonmises.")) {
        LEAT_TEST_REFERENCE(entry);
        const json& p = entry.at("parameters");
        const leat::von_mises law{number(p["mu"]), number(p["kappa"])};
        for (const json& at : entry.at("expected").at("at")) {
            const double x = number(at.at("x"));
            const double slope = number(at.at("pdf"));
            const double expected = number(at.at("cdf"));
            // both x and pi are rounded
            expect_ratio_one(law.cumulative(x), expected, 1e-13 + 4e-16 * slope / expected, x);
            expect_ratio_one(law.density(x), slope, 1e-13, x);
        }
        for (const auto& [chance, x] : entry.at("expected").at("lower").items()) {
            EXPECT_NEAR(law.quantile(std::stod(chance)), number(x), 1e-14) << chance;
        }
        for (const auto& [chance, x] : entry.at("expected").at("upper").items()) {
            const double slope = law.density(number(x)); // 1 - chance is rounded
            EXPECT_NEAR(law.quantile(1 - std::stod(chance)), number(x), 1e-14 + 1e-16 / slope);
        }
    }
}

TEST(EvaluateFurther, VonMisesIsTheIntegralOfItsDensity) {
    constexpr double pi = 3.14159265358979324;
    for (const double k : {0.0, 1e-300, 0.1, 1.0, 15.0, 19.0, 21.0, 49.0, 51.0, 300.0}) {
        const leat::von_mises law{0, k};
        const double half = von_mises_by_simpson(k, 0, pi);
        for (const double away : {1e-9, 0.01, 0.3, 1.0, 2.0, 3.0, 3.14}) {
            const double end = k > 40 ? std::fmin(away + 20 / std::sqrt(k), pi) : pi;
            const double expected = von_mises_by_simpson(k, away, end) / half / 2;
            expect_ratio_one(law.cumulative(-away), expected, 4e-12, away);
            EXPECT_NEAR(law.cumulative(away), 1 - expected, 2e-13) << away;
        }
        EXPECT_EQ(law.cumulative(0), 0.5);
    }
    // Narrow ones are normal, to z^4 / (24 k).
    for (const double k : {1e18, 1e100, 1e300}) {
        const leat::von_mises law{0, k};
        for (const double z : {0.01, 1.0, 5.0, 30.0}) {
            expect_ratio_one(law.cumulative(-z / std::sqrt(k)), 0.5 * std::erfc(z * std::sqrt(0.5)),
                             1e-12, z);
        }
    }
}

TEST(EvaluateFurther, VonMisesEndsRefusalsAndRoundTrips) {
    for (const double k : {0.0, 0.5, 4.0, 100.0, 1e10, 1e300}) {
        const leat::von_mises law{0, k};
        double last = -infinity;
        for (const double p : chances) {
            const double x = leat::quantile(law, p);
            EXPECT_GE(x, last);
            EXPECT_LE(std::fabs(x), law.max());
            last = x;
            const double step = std::fabs(x) * law.density(x); // of an ulp of x, relative
            EXPECT_NEAR(leat::cumulative(law, x), p, 1e-14 * p + 4e-16 * step) << k;
        }
        EXPECT_EQ(law.cumulative(-infinity), 0);
        EXPECT_EQ(law.cumulative(law.min()), 0);
        EXPECT_EQ(law.cumulative(law.max()), 1);
        EXPECT_EQ(law.cumulative(infinity), 1);
    }
    const leat::von_mises law{2, 3};
    EXPECT_EQ(law.quantile(0.5), 2);
    EXPECT_NEAR(law.cumulative(2.5), (leat::von_mises{0, 3}.cumulative(0.5)), 1e-15);
    EXPECT_THROW(static_cast<void>(law.cumulative(not_a_number)), leat::invalid_parameter);
    for (const double p : {0.0, 1.0, not_a_number}) {
        EXPECT_THROW(static_cast<void>(law.quantile(p)), leat::invalid_parameter);
    }
    static_assert(leat::von_mises{0, 1}.cumulative(-2) < 0.1);
}

} // namespace
