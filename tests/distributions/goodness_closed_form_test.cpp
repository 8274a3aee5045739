// The laws drawn in closed form against Boost.Math and the published quantiles, a million draws
// each, and their far tails, which the words alone would cut off.

#include "distributions/law_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/reference.hpp"
#include "support/sanitized.hpp"
#include "support/seeds.hpp"

#include "leat/distributions/cauchy.hpp"
#include "leat/distributions/empirical.hpp"
#include "leat/distributions/gumbel.hpp"
#include "leat/distributions/laplace.hpp"
#include "leat/distributions/logistic.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/distributions/pareto.hpp"
#include "leat/distributions/piecewise_linear.hpp"
#include "leat/distributions/rayleigh.hpp"
#include "leat/distributions/triangular.hpp"
#include "leat/uniform/unit.hpp"

#include <boost/math/distributions/cauchy.hpp>
#include <boost/math/distributions/extreme_value.hpp>
#include <boost/math/distributions/laplace.hpp>
#include <boost/math/distributions/logistic.hpp>
#include <boost/math/distributions/pareto.hpp>
#include <boost/math/distributions/rayleigh.hpp>
#include <boost/math/distributions/triangular.hpp>
#include <boost/math/special_functions/gamma.hpp>
#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <string>
#include <vector>

namespace {

using namespace leat_test;
namespace bm = boost::math;

constexpr int many = sanitized ? 200000 : 1000000;

/// Kolmogorov-Smirnov, mean and variance, by the law's own name in this test.
template <class Law, class Reference>
std::vector<double> check_law(const std::string& name, const Law& law, const Reference& reference) {
    auto g = source_of_this_test().stream(name); // one sample a name
    auto x = draw_values(law, many, g);
    check(law_report(name, x, reference));
    return x;
}

/// The same, and the counts, where tests/reference/distributions.json has the law.
template <class Law, class Reference>
void check_published_law(const std::string& id, const Law& law, const Reference& reference) {
    const auto& entry = reference_entry("distributions." + id);
    LEAT_TEST_REFERENCE(entry);
    check(quantile_report(id, check_law(id, law, reference), entry));
}

/// Kolmogorov-Smirnov alone, for laws without moments, or that Boost.Math has not.
template <class Law, class Cdf>
std::vector<double> check_cumulative(const std::string& name, const Law& law, Cdf cdf) {
    auto g = source_of_this_test().stream(name);
    auto x = draw_values(law, many, g);
    check(kolmogorov_smirnov_test(name, x, cdf));
    return x;
}

TEST(ClosedFormGoodness, Gumbel) {
    using reference = bm::extreme_value_distribution<double, in_double>;
    check_published_law("gumbel.5.2", leat::gumbel{5, 2}, reference(5, 2));
    check_law("standard", leat::gumbel{0, 1}, reference(0, 1));
    check_law("narrow", leat::gumbel{1e6, 1e-3}, reference(1e6, 1e-3));
    check_law("float", leat::gumbel<float>{-3, 10}, reference(-3, 10));
}

TEST(ClosedFormGoodness, Logistic) {
    using reference = bm::logistic_distribution<double, in_double>;
    check_published_law("logistic.0.1", leat::logistic{0, 1}, reference(0, 1));
    check_published_law("logistic.-1.2", leat::logistic{-1, 2}, reference(-1, 2));
    check_law("wide", leat::logistic{1e100, 1e100}, reference(1e100, 1e100));
    check_law("float", leat::logistic<float>{0, 10}, reference(0, 10));
}

TEST(ClosedFormGoodness, Laplace) {
    using reference = bm::laplace_distribution<double, in_double>;
    check_published_law("laplace.0.1", leat::laplace{0, 1}, reference(0, 1));
    check_published_law("laplace.2.0.5", leat::laplace{2, 0.5}, reference(2, 0.5));
    check_law("tiny", leat::laplace{0, 1e-100}, reference(0, 1e-100));
    check_law("float", leat::laplace<float>{-3, 10}, reference(-3, 10));
}

TEST(ClosedFormGoodness, Cauchy) {
    using reference = bm::cauchy_distribution<double, in_double>;
    const auto check_cauchy = [](const std::string& name, const auto& law, const reference& known) {
        return check_cumulative(name, law, [&](double x) { return cdf(known, x); });
    };
    const auto& entry = reference_entry("distributions.cauchy.3.2");
    LEAT_TEST_REFERENCE(entry);
    check(quantile_report("3.2", check_cauchy("3.2", leat::cauchy{3, 2}, reference(3, 2)), entry));
    check_cauchy("standard", leat::cauchy{0, 1}, reference(0, 1));
    check_cauchy("tiny", leat::cauchy{0, 1e-100}, reference(0, 1e-100));
    check_cauchy("float", leat::cauchy<float>{-3, 10}, reference(-3, 10));
}

TEST(ClosedFormGoodness, Pareto) {
    // ln(x / scale) is exponential of rate shape: also where moments are infinite
    const auto check_pareto = [](const std::string& name, const auto& law) {
        const auto scale = static_cast<double>(law.scale());
        const auto shape = static_cast<double>(law.shape());
        return check_cumulative(name, law, [=](double x) {
            return x < 2 * scale ? -std::expm1(-shape * std::log1p((x - scale) / scale))
                                 : -std::expm1(-shape * std::log(x / scale));
        });
    };
    for (const std::string id : {"pareto.1.3", "pareto.2.1.5"}) {
        const auto& entry = reference_entry("distributions." + id);
        LEAT_TEST_REFERENCE(entry);
        const leat::pareto law{std::stod(entry["parameters"]["minimum"].get<std::string>()),
                               std::stod(entry["parameters"]["index"].get<std::string>())};
        check(quantile_report(id, check_pareto(id, law), entry));
    }
    check_law("light tail", leat::pareto{10, 40},
              bm::pareto_distribution<double, in_double>(10, 40));
    check_pareto("heavy tail", leat::pareto{1, 0.05});
    check_pareto("nearly constant", leat::pareto{1, 1e6});
    check_pareto("float", leat::pareto<float>{3, 2});
}

TEST(ClosedFormGoodness, Rayleigh) {
    using reference = bm::rayleigh_distribution<double, in_double>;
    check_published_law("rayleigh.1", leat::rayleigh{1}, reference(1));
    check_law("other", leat::rayleigh{7.5}, reference(7.5));
    check_law("huge", leat::rayleigh{1e100}, reference(1e100));
    check_law("float", leat::rayleigh<float>{0.01}, reference(static_cast<double>(0.01F)));
}

// x^2 / (2 scale^2) is a gamma variate of shape 3/2; moments: Johnson, Kotz and Balakrishnan, ch.
// 18
TEST(ClosedFormGoodness, Maxwell) {
    const auto check_maxwell = [](const std::string& name, const auto& law) {
        const auto scale = static_cast<double>(law.scale());
        const auto x = check_cumulative(name, law, [=](double value) {
            const double z = value / scale;
            return bm::gamma_p(1.5, z * z / 2, in_double());
        });
        double sum = 0;
        double squares = 0;
        for (const double value : x) {
            sum += value / scale;
            squares += value / scale * (value / scale);
        }
        check(mean_test(name + ", mean", sum, many, {std::sqrt(8 / M_PI), 3 - 8 / M_PI, 0.49}));
        check(mean_test(name + ", mean square", squares, many, {3, 6, std::sqrt(8.0 / 3)}));
    };
    check_maxwell("standard", leat::maxwell{1});
    check_maxwell("molecules", leat::maxwell{297.3});
    check_maxwell("tiny", leat::maxwell{1e-100});
    check_maxwell("float", leat::maxwell<float>{3});
}

TEST(ClosedFormGoodness, Triangular) {
    using reference = bm::triangular_distribution<double, in_double>;
    for (const std::string id : {"triangular.0.0.3.1", "triangular.-1.2.4", "triangular.0.0.1"}) {
        const auto& p = reference_entry("distributions." + id)["parameters"];
        const double lo = std::stod(p["minimum"].get<std::string>());
        const double mode = std::stod(p["mode"].get<std::string>());
        const double hi = std::stod(p["maximum"].get<std::string>());
        check_published_law(id, leat::triangular{lo, mode, hi}, reference(lo, mode, hi));
    }
    check_law("mode at hi", leat::triangular{-5, 5, 5}, reference(-5, 5, 5));
    check_law("far and narrow", leat::triangular{1e6, 1e6 + 1, 1e6 + 2},
              reference(1e6, 1e6 + 1, 1e6 + 2));
    check_law("float", leat::triangular<float>{-1, 0, 3}, reference(-1, 0, 3));
}

// The distribution function by hand: a quarter of the area before 1 (see the entry).
TEST(ClosedFormGoodness, PiecewiseLinear) {
    const auto& entry = reference_entry("distributions.piecewise.linear");
    LEAT_TEST_REFERENCE(entry);
    const auto published = [](double x) {
        return x < 1 ? x * x / 4 : 0.25 + (x - 1) / 2 - (x - 1) * (x - 1) / 16;
    };
    const auto x =
        check_cumulative("published", leat::piecewise_linear{{0, 1, 3}, {0, 1, 0.5}}, published);
    double sum = 0;
    for (const double value : x) {
        sum += value;
    }
    check(mean_test("published, mean", sum, many, {19.0 / 12, 77.0 / 144, 0.2}));
    check_cumulative("float", leat::piecewise_linear<float>{{0, 1, 3}, {0, 1, 0.5}}, published);
    check_cumulative(
        "a triangle", leat::piecewise_linear{{-1, 0.5, 3}, {0, 7, 0}}, [](double value) {
            return cdf(bm::triangular_distribution<double, in_double>(-1, 0.5, 3), value);
        });
    check_cumulative("a gap", leat::piecewise_linear{{0, 1, 2, 3}, {2, 0, 0, 6}}, [](double value) {
        return value < 1   ? (1 - (1 - value) * (1 - value)) / 4
               : value < 2 ? 0.25
                           : 0.25 + 0.75 * (value - 2) * (value - 2);
    });
}

// Each value in proportion to how often it stands in the list.
TEST(ClosedFormGoodness, Empirical) {
    const auto check_empirical = [](const std::string& name, std::size_t n) {
        std::vector<double> values;
        std::vector<double> probabilities;
        for (std::size_t i = 0; i < n; ++i) {
            const double k = 1 + static_cast<double>(i % 3); // the i-th value k times
            values.insert(values.end(), static_cast<std::size_t>(k), static_cast<double>(n - i));
            probabilities.insert(probabilities.begin(), k);
        }
        const leat::empirical law(values);
        for (double& p : probabilities) {
            p /= static_cast<double>(values.size());
        }
        auto g = source_of_this_test().stream(name);
        std::vector<std::uint64_t> counts(n);
        for (int i = 0; i < many; ++i) {
            ++counts[static_cast<std::size_t>(law(g)) - 1];
        }
        check(chi_square_test(name, counts, probabilities));
    };
    check_empirical("two", 2);
    check_empirical("three", 3);
    check_empirical("thirty-one", 31);
    check_empirical("a thousand", 1000);
}

// ---- Far tails -------------------------------------------------------------------------------

/// The same draws on condition of a first word that leads into the tail: a sampler that has a tail
/// at all must get the law of its excess right.
struct into_tail {
    static constexpr std::uint64_t min() { return 0; }
    static constexpr std::uint64_t max() { return ~std::uint64_t{0}; }
    std::uint64_t operator()() {
        const bool first = !drawn;
        drawn = true;
        return first ? word : g();
    }
    leat::stream& g;
    std::uint64_t word;
    bool drawn = false;
};

// Beyond 8 ln 2 the Gumbel law's upper tail is 1 - exp(-exp(-x)) over its value there.
TEST(ClosedFormGoodness, GumbelTail) {
    auto g = source_of_this_test().stream("tail");
    std::vector<double> x(many / 4);
    for (double& value : x) {
        into_tail words{g, 0}; // the smallest exponential
        value = leat::gumbel<>::standard(words);
    }
    const double start = 8 * std::log(2.0);
    EXPECT_GT(*std::max_element(x.begin(), x.end()), start + 8);
    check(kolmogorov_smirnov_test("beyond 8 ln 2", x, [=](double t) {
        return 1 - std::expm1(-std::exp(-t)) / std::expm1(-std::exp(-start));
    }));
}

// Beyond u = 2^-8 from an end: 1 / (1 + exp(x)) over 2^-8, on both sides.
TEST(ClosedFormGoodness, LogisticTails) {
    for (const std::uint64_t word : {std::uint64_t{0}, ~std::uint64_t{0}}) {
        auto g = source_of_this_test().stream("tail", word);
        std::vector<double> x(many / 4);
        for (double& value : x) {
            into_tail words{g, word};
            value = leat::logistic<>::standard(words) * (word == 0 ? -1 : 1);
        }
        check(kolmogorov_smirnov_test("beyond 2^-8", x,
                                      [](double t) { return 1 - 256 / (1 + std::exp(t)); }));
    }
}

// The denominator, where it is below 2^-8, has the half normal law on that condition.
TEST(ClosedFormGoodness, CauchyTail) {
    auto g = source_of_this_test().stream("tail");
    std::vector<double> x(many / 4);
    for (double& value : x) {
        struct second_in_tail {
            static constexpr std::uint64_t min() { return 0; }
            static constexpr std::uint64_t max() { return ~std::uint64_t{0}; }
            std::uint64_t operator()() {
                ++drawn;
                // first a normal of 0.5 or so at once, then one next to 0
                return drawn == 1 ? first : drawn == 2 ? std::uint64_t{1} : g();
            }
            leat::stream& g;
            std::uint64_t first;
            int drawn = 0;
        } words{g, (std::uint64_t{1} << 62) | 1};
        into_tail copy{g, words.first};
        const double above = leat::detail::standard_normal(copy);
        value = above / std::fabs(leat::cauchy<>::standard(words));
    }
    check(kolmogorov_smirnov_test("the denominator below 2^-8", x, [](double z) {
        return std::erf(z / std::sqrt(2.0)) / std::erf(0x1p-8 / std::sqrt(2.0));
    }));
    EXPECT_LT(*std::min_element(x.begin(), x.end()), 0x1p-8 * 1e-4);
}

} // namespace
