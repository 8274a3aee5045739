// The continuous laws against Boost.Math and the published quantiles, a million draws each.

#include "distributions/law_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/reference.hpp"
#include "support/sanitized.hpp"
#include "support/seeds.hpp"

#include "leat/distributions/exponential.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/lognormal.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/weibull.hpp"

#include <boost/math/distributions/exponential.hpp>
#include <boost/math/distributions/gamma.hpp>
#include <boost/math/distributions/lognormal.hpp>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/weibull.hpp>
#include <gtest/gtest.h>

#include <cmath>

namespace {

using namespace leat_test;

constexpr int many = sanitized ? 200000 : 1000000;

template <class Law, class Reference>
std::vector<double> check_law(const std::string& name, const Law& law, const Reference& reference,
                              int n = many) {
    auto g = source_of_this_test().stream(name); // one sample a name
    auto x = draw_values(law, n, g);
    check(law_report(name, x, reference));
    return x;
}

/// The same where tests/reference/distributions.json has the law: `id` after "distributions.".
template <class Law, class Reference>
void check_published_law(const std::string& id, const Law& law, const Reference& reference) {
    const auto& entry = reference_entry("distributions." + id);
    LEAT_TEST_REFERENCE(entry);
    check(quantile_report(id, check_law(id, law, reference), entry));
}

TEST(LawGoodness, Normal) {
    using reference = boost::math::normal_distribution<double, in_double>;
    check_published_law("normal.0.1", leat::normal{0, 1}, reference(0, 1));
    check_published_law("normal.-2.5.3", leat::normal{-2.5, 3}, reference(-2.5, 3));
    check_law("far and narrow", leat::normal{1e6, 0.01}, reference(1e6, 0.01));
    check_law("tiny", leat::normal{0, 1e-100}, reference(0, 1e-100));
    check_law("float", leat::normal<float>{0, 1}, reference(0, 1));
}

TEST(LawGoodness, Exponential) {
    using reference = boost::math::exponential_distribution<double, in_double>;
    check_published_law("exponential.0.25", leat::exponential{0.25}, reference(0.25));
    check_law("one", leat::exponential{1}, reference(1));
    check_law("rare", leat::exponential{1e-6}, reference(1e-6));
    check_law("from its mean", leat::exponential<>::from_mean(1e-8), reference(1e8));
    check_law("float", leat::exponential<float>{1}, reference(1));
}

TEST(LawGoodness, Weibull) {
    using reference = boost::math::weibull_distribution<double, in_double>;
    check_published_law("weibull.0.5.2", leat::weibull{0.5, 2}, reference(0.5, 2));
    check_published_law("weibull.1.5.2", leat::weibull{1.5, 2}, reference(1.5, 2));
    check_law("steep", leat::weibull{0.2, 3}, reference(0.2, 3));
    check_law("exponential", leat::weibull{1, 1}, reference(1, 1));
    check_law("wear", leat::weibull{5, 10}, reference(5, 10));
    check_law("float", leat::weibull<float>{1.5, 2}, reference(1.5, 2));
}

TEST(LawGoodness, Lognormal) {
    using reference = boost::math::lognormal_distribution<double, in_double>;
    check_published_law("lognormal.0.1", leat::lognormal{0, 1}, reference(0, 1));
    check_published_law("lognormal.1.0.25", leat::lognormal{1, 0.25}, reference(1, 0.25));
    check_published_law("lognormal.-3.2", leat::lognormal{-3, 2}, reference(-3, 2));
    check_law("narrow", leat::lognormal{0, 0.1}, reference(0, 0.1));
    // mean m, sd s: sigma^2 = ln(1 + s^2/m^2), mu = ln m - sigma^2/2 (Johnson, Kotz & Balakrishnan)
    const double sigma = std::sqrt(std::log(1 + 0.25 * 0.25));
    check_law("from mean and sd", leat::lognormal<>::from_mean_sd(40, 10),
              reference(std::log(40) - sigma * sigma / 2, sigma));
    check_law("float", leat::lognormal<float>{0, 1}, reference(0, 1));
}

TEST(LawGoodness, Gamma) {
    using reference = boost::math::gamma_distribution<double, in_double>;
    check_published_law("gamma.0.1.1", leat::gamma{0.1, 1}, reference(0.1, 1));
    check_published_law("gamma.0.5.1", leat::gamma{0.5, 1}, reference(0.5, 1));
    check_published_law("gamma.1.1", leat::gamma{1, 1}, reference(1, 1));
    check_published_law("gamma.2.5.3", leat::gamma{2.5, 3}, reference(2.5, 3));
    check_published_law("gamma.10.0.5", leat::gamma{10, 0.5}, reference(10, 0.5));
    check_law("small shape", leat::gamma{0.05, 2}, reference(0.05, 2));
    check_law("nearly one", leat::gamma{0.999, 1}, reference(0.999, 1));
    check_law("large shape", leat::gamma{1e4, 1e-4}, reference(1e4, 1e-4));
    // Skewness 2e-6: normal to better than 1e-6 (the first Edgeworth term), too close to be seen.
    check_law("huge shape", leat::gamma{1e12, 1},
              boost::math::normal_distribution<double, in_double>(1e12, 1e6));
    check_law("float", leat::gamma<float>{2.5, 3}, reference(2.5, 3));
}

// ln X, where X itself may lie far below the smallest number.
TEST(LawGoodness, GammaLogarithm) {
    for (const double shape : {1e-4, 0.1, 2.5, 1e4}) {
        auto g = source_of_this_test().stream(std::to_string(shape));
        const leat::gamma law{shape, 1};
        std::vector<double> x(many / 4);
        for (double& value : x) {
            value = law.draw_log(g);
        }
        check(kolmogorov_smirnov_test("ln X, shape " + std::to_string(shape), x, [=](double t) {
            // Below e^-600, P(a, x) = x^a / Gamma(a + 1) to 260 digits (Abramowitz and
            // Stegun 6.5.29)
            return t < -600 ? std::exp(shape * t - std::lgamma(shape + 1))
                            : boost::math::gamma_p(shape, std::exp(t), in_double());
        }));
    }
}

} // namespace
