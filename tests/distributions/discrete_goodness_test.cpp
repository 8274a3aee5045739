// The laws of whole numbers against Boost.Math's masses and exact integers, on both sides of every
// switch between methods and right at it; and planted faults, which the same tests must reject.

#include "distributions/discrete_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"

#include "leat/core/wide_integer.hpp"
#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/zipf.hpp"

#include <boost/math/distributions/binomial.hpp>
#include <boost/math/distributions/geometric.hpp>
#include <boost/math/distributions/hypergeometric.hpp>
#include <boost/math/distributions/negative_binomial.hpp>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/poisson.hpp>
#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <cstdint>
#include <cstdio>
#include <limits>
#include <string>
#include <vector>

namespace {

using namespace leat_test;

constexpr int many = 400000;
constexpr auto no_end = std::numeric_limits<std::int64_t>::max();

using in_double = boost::math::policies::policy<boost::math::policies::promote_double<false>>;

std::string number(double x) {
    char text[32];
    std::snprintf(text, sizeof text, "%.17g", x);
    return text;
}

template <class Law>
std::vector<std::int64_t> sample(const std::string& name, const Law& law, int n = many) {
    auto g = source_of_this_test().stream(name); // one sample a name
    return draw_counts(law, n, g);
}

TEST(DiscreteGoodness, Bernoulli) {
    for (const double p : {0.0, 0x1p-60, 0.001, 0.3, 0.5, 0.999, 1.0}) {
        const auto draws = sample(number(p), leat::bernoulli{p});
        const auto hits = std::count(draws.begin(), draws.end(), 1);
        check(count_test("p = " + number(p), static_cast<std::uint64_t>(hits), many, p));
    }
}

TEST(DiscreteGoodness, Poisson) {
    using reference = boost::math::poisson_distribution<double, in_double>;
    // 10 is where inversion ends
    for (const double mean :
         {0.01, 0.9, 4.0, 9.9, 9.999999999999998, 10.0, 10.1, 31.7, 1000.0, 123456.7}) {
        check(count_report(number(mean), sample(number(mean), leat::poisson{mean}), reference(mean),
                           0, no_end));
    }
    check(count_report("int8", sample("int8", leat::poisson<std::int8_t>{40}), reference(40), 0,
                       127));
    check(count_report("uint64", sample("uint64", leat::poisson<std::uint64_t>{20}), reference(20),
                       0, no_end));
}

TEST(DiscreteGoodness, Binomial) {
    using reference = boost::math::binomial_distribution<double, in_double>;
    struct parameters {
        std::int64_t n;
        double p;
    };
    for (const auto& [n, p] : std::array<parameters, 14>{{{1, 0.3},
                                                          {10, 0.3},
                                                          {33, 0.02}, // by the logarithm
                                                          {20, 0.499999},
                                                          {20, 0.5}, // n p = 10: rejection
                                                          {20, 0.500001},
                                                          {25, 0.41},
                                                          {100, 0.0999},
                                                          {100, 0.1001},
                                                          {100, 0.3},
                                                          {100, 0.95},
                                                          {1000, 0.7},
                                                          {20000000, 0.25},
                                                          {1000000000000, 5e-12}}}) {
        const std::string name = std::to_string(n) + " " + number(p);
        check(count_report(name, sample(name, leat::binomial{n, p}),
                           reference(static_cast<double>(n), p), 0, n));
    }
}

TEST(DiscreteGoodness, Geometric) {
    using reference = boost::math::geometric_distribution<double, in_double>;
    for (const double p : {0.98, 0.5, 0.2, 0.01}) {
        check(count_report(number(p), sample(number(p), leat::geometric{p}), reference(p), 0,
                           no_end));
    }
    // Where a draw is put together from two parts, and just above: the law's scale by an
    // exponential law, and the lowest digits, which are all but uniform.
    for (const double p : {0x1p-23, 0x1.fp-25, 1e-9, 1e-15}) {
        const auto draws = sample(number(p), leat::geometric{p});
        std::vector<double> x(draws.begin(), draws.end());
        check(kolmogorov_smirnov_test(
            number(p), x, [p](double k) { return -std::expm1((k + 0.5) * std::log1p(-p)); }));
        std::vector<std::uint64_t> low_digits(256);
        for (const auto k : draws) {
            ++low_digits[static_cast<std::uint64_t>(k) % 256];
        }
        check(chi_square_test(number(p) + ", modulo 256", low_digits));
    }
}

TEST(DiscreteGoodness, NegativeBinomial) {
    using reference = boost::math::negative_binomial_distribution<double, in_double>;
    struct parameters {
        double r;
        double p;
    };
    for (const auto& [r, p] : std::array<parameters, 7>{{{0.05, 0.05},
                                                         {0.5, 0.5},
                                                         {1, 0.1},
                                                         {2.5, 0.2},
                                                         {50, 0.9},
                                                         {1000, 0.01},
                                                         {1e7, 0.999}}}) {
        const std::string name = number(r) + " " + number(p);
        const auto draws = sample(name, leat::negative_binomial{r, p});
        check(count_report(name, draws, reference(r, p), 0, no_end));
    }
}

leat::wide_integer choose(unsigned n, unsigned k) {
    leat::wide_integer c{1};
    for (unsigned i = 1; i <= k; ++i) {
        c = c * leat::wide_integer{n - k + i} / leat::wide_integer{i};
    }
    return c;
}

/// choose(marked, k) choose(rest, draws - k) / choose(population, draws) for k = least .. most, by
/// exact integers; each is the one before times a fraction that leaves no remainder.
class exact_masses {
public:
    exact_masses(unsigned population, unsigned marked, unsigned draws)
        : least_(draws + marked > population ? draws + marked - population : 0) {
        const unsigned most = std::min(marked, draws);
        const auto all = choose(population, draws);
        auto ways = choose(marked, least_) * choose(population - marked, draws - least_);
        for (unsigned k = least_;; ++k) {
            const auto quotient = static_cast<std::uint64_t>((ways << 62) / all);
            masses_.push_back(std::ldexp(static_cast<double>(quotient), -62));
            if (k == most) {
                return;
            }
            ways = ways * leat::wide_integer{(marked - k) * (draws - k)} /
                   leat::wide_integer{(k + 1) * (population - marked - draws + k + 1)};
        }
    }
    double operator()(double k) const { return masses_[static_cast<std::size_t>(k) - least_]; }

private:
    unsigned least_;
    std::vector<double> masses_;
};

TEST(DiscreteGoodness, Hypergeometric) {
    struct parameters {
        unsigned population;
        unsigned marked;
        unsigned draws;
    };
    for (const auto& [population, marked, draws] :
         std::array<parameters, 10>{{{20, 15, 10},
                                     {40, 20, 19}, // a mean of 9.5
                                     {40, 20, 20}, // 10: ratio of uniforms
                                     {40, 20, 21},
                                     {41, 21, 20},
                                     {200, 60, 40},
                                     {200, 140, 40}, // both flips, one by one and together
                                     {200, 60, 160},
                                     {200, 140, 160},
                                     {200, 100, 100}}}) {
        const std::string name =
            std::to_string(population) + " " + std::to_string(marked) + " " + std::to_string(draws);
        const leat::hypergeometric law{population, marked, draws};
        const auto sampled = sample(name, law);
        const double all = population;
        const double share = marked / all;
        const double mean = draws * share;
        const double variance = mean * (1 - share) * (all - draws) / (all - 1);
        auto report = moment_tests(name, sampled, {mean, variance, 0.5}, 1e9);
        report.push_back(mass_test(name, sampled, law.min(), law.max(),
                                   exact_masses(population, marked, draws)));
        check(report);
    }
    using reference = boost::math::hypergeometric_distribution<double>;
    struct large {
        unsigned population;
        unsigned marked;
        unsigned draws;
    };
    for (const auto& [population, marked, draws] : std::array<large, 3>{
             {{200000, 2000, 2000}, {1000000, 600000, 1000}, {200000, 3000, 80000}}}) {
        const std::string name = std::to_string(population);
        const reference exact(marked, draws, population);
        const double centre = boost::math::mean(exact);
        const double width = 7 * std::sqrt(boost::math::variance(exact));
        const auto sampled = sample(name + " " + std::to_string(marked),
                                    leat::hypergeometric{population, marked, draws});
        check(mass_test(name, sampled, static_cast<std::int64_t>(std::max(0.0, centre - width)),
                        static_cast<std::int64_t>(centre + width),
                        [&](double k) { return pdf(exact, static_cast<unsigned>(k)); }));
    }
}

/// Masses in proportion to k^-s, summed in long double from the smallest.
std::vector<double> zipf_masses(double s, int n) {
    std::vector<double> masses(static_cast<std::size_t>(n) + 1);
    long double total = 0;
    for (int k = n; k >= 1; --k) {
        total += std::pow(static_cast<long double>(k), -static_cast<long double>(s));
    }
    for (int k = 1; k <= n; ++k) {
        masses[static_cast<std::size_t>(k)] = static_cast<double>(
            std::pow(static_cast<long double>(k), -static_cast<long double>(s)) / total);
    }
    return masses;
}

TEST(DiscreteGoodness, Zipf) {
    struct parameters {
        double s;
        int n;
    };
    for (const auto& [s, n] : std::array<parameters, 9>{{{0, 50},
                                                         {1e-12, 50},
                                                         {0.5, 100},
                                                         {1, 1000},
                                                         {1 + 1e-12, 1000},
                                                         {1.1, 100000},
                                                         {2, 1000000},
                                                         {3.7, 10},
                                                         {1.5, 2}}}) {
        const auto masses = zipf_masses(s, n);
        const std::string name = number(s) + " " + std::to_string(n);
        check(mass_test(name, sample(name, leat::zipf{s, n}), 1, n,
                        [&](double k) { return masses[static_cast<std::size_t>(k)]; }));
    }
    // As large as n goes: the scale by the integral, which the sum all but is, and the low digits.
    for (const double s : {0.0, 0.1, 0.7}) {
        const auto draws = sample("largest " + number(s), leat::zipf{s, no_end});
        std::vector<double> x(draws.begin(), draws.end());
        check(kolmogorov_smirnov_test(number(s), x,
                                      [s](double k) { return std::pow(k * 0x1p-63, 1 - s); }));
        std::vector<std::uint64_t> low_digits(256);
        for (const auto k : draws) {
            ++low_digits[static_cast<std::uint64_t>(k) % 256];
        }
        check(chi_square_test(number(s) + ", modulo 256", low_digits));
    }
}

// Means where no mass can be counted: the shape by Boost.Math's distribution functions, or by a
// normal law whose difference (at most 0.04 divided by the standard deviation) is far below what
// the sample could show; and the lowest digits.
template <class Law, class Cdf>
void check_large(const std::string& name, const Law& law, Cdf cdf) {
    const auto draws = sample(name, law);
    std::vector<double> x;
    for (const auto k : draws) {
        x.push_back((static_cast<double>(k) - law.mean()) / std::sqrt(law.variance()));
    }
    check(kolmogorov_smirnov_test(name, x, cdf));
    std::vector<std::uint64_t> low_digits(256);
    for (const auto k : draws) {
        ++low_digits[static_cast<std::uint64_t>(k) % 256];
    }
    check(chi_square_test(name + ", modulo 256", low_digits));
}

TEST(DiscreteGoodness, LargeMeans) {
    const auto normal = [](double z) {
        return boost::math::cdf(boost::math::normal_distribution<double, in_double>(0, 1), z);
    };
    constexpr std::int64_t two_to_53 = std::int64_t{1} << 53;
    check_large("Poisson 1e12", leat::poisson{1e12}, normal);
    check_large("Poisson 1e15", leat::poisson{1e15}, normal);
    check_large("Poisson 9e18", leat::poisson{9e18}, normal);
    check_large("binomial 0.5", leat::binomial{two_to_53, 0.5}, normal);
    check_large("binomial 1e-4", leat::binomial{two_to_53, 1e-4}, normal);
    check_large("binomial 0.9", leat::binomial{two_to_53, 0.9}, normal);
    check_large("hypergeometric", leat::hypergeometric{two_to_53, two_to_53 / 3, two_to_53 / 5 * 4},
                normal);
    check_large("hypergeometric of few",
                leat::hypergeometric{two_to_53, two_to_53 / 1000, two_to_53 / 7}, normal);
    check_large("negative binomial", leat::negative_binomial{1e9, 1e-3}, normal);
}

// ---- Planted faults ----------------------------------------------------------------------------

/// A normal law's draws, rounded: what a central-limit shortcut gives.
struct rounded_normal {
    leat::normal<double> law;
    template <class G>
    std::int64_t operator()(G& g) const {
        return std::llround(law(g));
    }
};

TEST(DiscreteFaults, PoissonByRoundedNormal) {
    const boost::math::poisson_distribution<double, in_double> reference(1000);
    const rounded_normal wrong{leat::normal{1000, std::sqrt(1000.0)}};
    EXPECT_TRUE(
        is_rejected(count_report("wrong", sample("wrong", wrong, 5 * many), reference, 0, no_end)));
    check(count_report("right", sample("right", leat::poisson{1000}, 5 * many), reference, 0,
                       no_end));
}

TEST(DiscreteFaults, BinomialByRoundedNormal) {
    const boost::math::binomial_distribution<double, in_double> reference(100, 0.3);
    const rounded_normal wrong{leat::normal{30, std::sqrt(21.0)}};
    EXPECT_TRUE(is_rejected(count_report("wrong", sample("wrong", wrong), reference, 0, 100)));
    check(count_report("right", sample("right", leat::binomial{100, 0.3}), reference, 0, 100));
}

TEST(DiscreteFaults, HypergeometricWithReplacement) {
    const auto test = [](const std::vector<std::int64_t>& draws) {
        return mass_test("hypergeometric", draws, 0, 10, exact_masses(200, 60, 10));
    };
    EXPECT_TRUE(is_rejected({test(sample("wrong", leat::binomial{10, 0.3}))}));
    check(test(sample("right", leat::hypergeometric{200, 60, 10})));
}

/// A geometric law of a small chance by rounding an exponential draw down, in float.
TEST(DiscreteFaults, GeometricInFloatMissesValues) {
    constexpr double p = 1e-9;
    const auto low_digits = [](const std::vector<std::int64_t>& draws) {
        std::vector<std::uint64_t> counts(256);
        for (const auto k : draws) {
            ++counts[static_cast<std::uint64_t>(k) % 256];
        }
        return chi_square_test("modulo 256", counts);
    };
    const auto wrong = [](auto& g) {
        const leat::exponential<float> wait{p};
        return static_cast<std::int64_t>(wait(g));
    };
    EXPECT_TRUE(is_rejected({low_digits(sample("wrong", wrong))}));
    check(low_digits(sample("right", leat::geometric{p})));
}

} // namespace
