// The laws built on gamma variates, and truncated_normal, inverse_gaussian and von_mises, against
// the distribution functions of Boost.Math: a million draws at four parameter sets or more of each
// law, a quarter of that at the others; and planted faults.

#include "distributions/law_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/sanitized.hpp"
#include "support/seeds.hpp"

#include "leat/distributions/beta.hpp"
#include "leat/distributions/chi_squared.hpp"
#include "leat/distributions/erlang.hpp"
#include "leat/distributions/fisher_f.hpp"
#include "leat/distributions/inverse_gaussian.hpp"
#include "leat/distributions/student_t.hpp"
#include "leat/distributions/truncated_normal.hpp"
#include "leat/distributions/von_mises.hpp"

#include <boost/math/distributions/beta.hpp>
#include <boost/math/distributions/chi_squared.hpp>
#include <boost/math/distributions/fisher_f.hpp>
#include <boost/math/distributions/gamma.hpp>
#include <boost/math/distributions/inverse_gaussian.hpp>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/students_t.hpp>
#include <boost/math/special_functions/bessel.hpp>
#include <gtest/gtest.h>

#include <cmath>
#include <limits>

namespace {

using namespace leat_test;

constexpr int many = sanitized ? 200000 : 1000000;
constexpr int fewer = many / 4;
constexpr int few = 100000; // enough to see a planted fault
constexpr double infinity = std::numeric_limits<double>::infinity();

template <class Law>
std::vector<double> drawn(const std::string& name, const Law& law, int n = many) {
    auto g = source_of_this_test().stream(name); // one sample a name
    return draw_values(law, n, g);
}

/// Kolmogorov-Smirnov, mean and variance: for references whose kurtosis exists.
template <class Law, class Reference>
void check_law(const std::string& name, const Law& law, const Reference& reference, int n = many) {
    auto x = drawn(name, law, n);
    check(law_report(name, x, reference));
}

/// Kolmogorov-Smirnov of f(x), f increasing: for references without moments, and where x itself
/// is out of the range of what Boost.Math computes.
template <class Law, class Cdf>
void check_distances(const std::string& name, const Law& law, Cdf cdf, int n = many) {
    auto x = drawn(name, law, n);
    check(kolmogorov_smirnov_test(name + ", Kolmogorov-Smirnov", x, cdf));
}

template <class Reference>
auto cdf_of(const Reference& reference) {
    return [reference](double x) { return cdf(reference, x); };
}

TEST(LawGoodness, ChiSquared) { // every shape of detail/unit_gamma.hpp
    using reference = boost::math::chi_squared_distribution<double, in_double>;
    for (const double k : {0.3, 1.0, 3.0, 5.0}) {
        check_law(std::to_string(k), leat::chi_squared{k}, reference(k));
    }
    for (const double k : {1.7, 2.0, 2.5, 4.0, 1000.0}) {
        check_law(std::to_string(k), leat::chi_squared{k}, reference(k), fewer);
    }
    check_law("float", leat::chi_squared<float>{7}, reference(7), fewer);
    // z = (X - k) / sqrt(2 k) is normal to 1e-6 (the first Edgeworth term).
    check_distances("1e12", leat::chi_squared{1e12}, [](double x) {
        return cdf(boost::math::normal_distribution<double, in_double>(1e12, std::sqrt(2e12)), x);
    });
}

TEST(LawGoodness, Erlang) {
    using reference = boost::math::gamma_distribution<double, in_double>;
    check_law("1", leat::erlang{1, 0.25}, reference(1, 4));
    check_law("2", leat::erlang{2, 3}, reference(2, 1.0 / 3));
    check_law("3", leat::erlang{3, 1}, reference(3, 1));
    check_law("20", leat::erlang{20, 1e-3}, reference(20, 1e3));
    check_law("10000", leat::erlang{10000, 2}, reference(10000, 0.5), fewer);
    check_law("float", leat::erlang<float>{5, 2}, reference(5, 0.5), fewer);
}

TEST(LawGoodness, StudentT) {
    using reference = boost::math::students_t_distribution<double, in_double>;
    for (const double k : {0.2, 1.0, 3.0}) {
        check_distances(std::to_string(k), leat::student_t{k}, cdf_of(reference(k)));
    }
    for (const double k : {1.5, 2.0, 4.0}) {
        check_distances(std::to_string(k), leat::student_t{k}, cdf_of(reference(k)), fewer);
    }
    check_law("7", leat::student_t{7}, reference(7));
    check_law("30", leat::student_t{30}, reference(30), fewer);
    check_law("1e6", leat::student_t{1e6}, reference(1e6), fewer);
    check_distances("1e300", leat::student_t{1e300},
                    cdf_of(boost::math::normal_distribution<double, in_double>()), fewer);
    check_law("float", leat::student_t<float>{7}, reference(7), fewer);
}

TEST(LawGoodness, FisherF) {
    using reference = boost::math::fisher_f_distribution<double, in_double>;
    const auto check_pair = [](double d1, double d2, int n) {
        check_distances(std::to_string(d1) + "," + std::to_string(d2), leat::fisher_f{d1, d2},
                        cdf_of(reference(d1, d2)), n);
    };
    check_pair(0.4, 0.6, many);
    check_pair(1, 2, many);
    check_pair(2, 7, many);
    check_pair(1, 1, fewer);
    check_pair(0.5, 3, fewer);
    check_pair(3, 0.7, fewer);
    check_pair(1e5, 3, fewer);
    check_law("5, 40", leat::fisher_f{5, 40}, reference(5, 40));
    check_law("50, 200", leat::fisher_f{50, 200}, reference(50, 200), fewer);
    check_law("float", leat::fisher_f<float>{6, 60}, reference(6, 60), fewer);
}

TEST(LawGoodness, Beta) { // by region
    using reference = boost::math::beta_distribution<double, in_double>;
    const auto check_pair = [](double a, double b, int n) {
        check_law(std::to_string(a) + "," + std::to_string(b), leat::beta{a, b}, reference(a, b),
                  n);
    };
    check_pair(0.2, 1, many);
    check_pair(1, 4, fewer);
    check_pair(1, 1, fewer);
    check_pair(0.3, 0.4, many); // Johnk
    check_pair(0.05, 0.9, fewer);
    check_pair(2, 3, many); // gammas
    check_pair(0.5, 0.5, fewer);
    check_pair(1.5, 0.5, fewer);
    check_pair(300, 70, fewer);
    check_pair(1e5, 2, fewer);
    check_pair(0.3, 5, many); // boosted gammas
    check_pair(6, 0.6, fewer);
    check_pair(0.7, 0.8, fewer);
    check_law("float", leat::beta<float>{2, 3}, reference(2, 3), fewer);
    // Tiny shapes: so many draws are given as an end of the range that counts must do.
    const auto tiny = drawn("tiny", leat::beta{1e-3, 3e-3});
    const boost::math::beta_distribution<double, in_double> law(1e-3, 3e-3);
    for (const double point : {1e-300, 1e-30, 1e-3, 0.5, 1 - 1e-9}) {
        const auto below =
            std::count_if(tiny.begin(), tiny.end(), [point](double x) { return x <= point; });
        check(count_test("below " + std::to_string(point), static_cast<std::uint64_t>(below),
                         tiny.size(), cdf(law, point)));
    }
}

TEST(LawGoodness, InverseGaussian) {
    using reference = boost::math::inverse_gaussian_distribution<double, in_double>;
    check_law("1, 1", leat::inverse_gaussian{1, 1}, reference(1, 1));
    check_law("3, 50", leat::inverse_gaussian{3, 50}, reference(3, 50));
    check_law("2, 0.1", leat::inverse_gaussian{2, 0.1}, reference(2, 0.1));
    check_law("1e-3, 4e3", leat::inverse_gaussian{1e-3, 4}, reference(1e-3, 4));
    check_law("float", leat::inverse_gaussian<float>{3, 50}, reference(3, 50), fewer);
    // mean to infinity: 1 / z^2 (by definition of the first passage without drift)
    const auto squared_reciprocal = [](double x) { return std::erfc(1 / std::sqrt(2 * x)); };
    check_distances("1e20, 1", leat::inverse_gaussian{1e20, 1}, squared_reciprocal, fewer);
    check_distances("1e200, 1", leat::inverse_gaussian{1e200, 1}, squared_reciprocal, fewer);
}

/// P(a < Z < x) / P(a < Z < b) from the ends' tails.
auto truncated_cdf(double a, double b) {
    return [a, b](double x) {
        const double root = std::sqrt(0.5);
        if (a > 0) {
            const double tail = std::erfc(a * root);
            return (tail - std::erfc(x * root)) / (tail - std::erfc(b * root));
        }
        const double tail = std::erfc(-a * root);
        return (std::erfc(-x * root) - tail) / (std::erfc(-b * root) - tail);
    };
}

TEST(LawGoodness, TruncatedNormal) {
    int sets = 0;
    for (const auto& [a, b] : {std::pair{-1.0, 1.0}, // each method and side of each bound
                               {-1.5, 1.0},
                               {-0.01, 2.1},
                               {-infinity, 0.1},
                               {-8.0, infinity},
                               {0.0, infinity},
                               {0.2, 1.3},
                               {0.2, 1.1},
                               {0.3, infinity},
                               {0.3, 1.3},
                               {0.3, 1.0},
                               {-2.0, -0.5},
                               {-infinity, -6.0},
                               {2.0, 2.3},
                               {20.0, 20.2},
                               {35.0, infinity}}) {
        const std::string name = std::to_string(a) + "," + std::to_string(b);
        check_distances(name, leat::truncated_normal{0, 1, a, b}, truncated_cdf(a, b),
                        ++sets % 3 == 1 ? many : fewer);
    }
    check_distances("moved", leat::truncated_normal{10, 4, 12, 30},
                    [](double x) { return truncated_cdf(0.5, 5)((x - 10) / 4); });
    check_distances("float", leat::truncated_normal<float>{0, 1, 0.5, 3}, truncated_cdf(0.5, 3),
                    fewer);
    // 40 sd out Mills' ratio is 1 / (a + 1 / (a + 2 / (a + ...))) (Abramowitz and Stegun 26.2.14).
    const auto mills = [](double a) {
        double fraction = a;
        for (int n = 60; n >= 1; --n) {
            fraction = a + n / fraction;
        }
        return 1 / fraction;
    };
    check_distances("40 sd", leat::truncated_normal{0, 1, -infinity, -40}, [&](double x) {
        return mills(-x) / mills(40) * std::exp(-(-x - 40) * (-x + 40) / 2);
    });
    // 1e-9 sd wide the density is even to 1e-9.
    check_distances("narrow", leat::truncated_normal{0, 1e9, 1e9, 1e9 + 1},
                    [](double x) { return x - 1e9; });
}

/// The distribution function of a von Mises law of mean 0, summed from its Fourier series (N. I.
/// Fisher, Statistical Analysis of Circular Data, 1993, 3.3.6) with Boost.Math's Bessel functions.
class fourier_von_mises {
public:
    explicit fourier_von_mises(double concentration) {
        const double none = boost::math::cyl_bessel_i(0, concentration);
        for (int j = 1; j <= 60; ++j) {
            ratio_.push_back(boost::math::cyl_bessel_i(j, concentration) / none / j);
        }
    }
    double operator()(double x) const {
        double sum = x / 2;
        for (std::size_t j = 0; j < ratio_.size(); ++j) {
            sum += ratio_[j] * std::sin(static_cast<double>(j + 1) * x);
        }
        return 0.5 + sum / M_PI;
    }
    /// The variance: the integral of x^2 against the same series.
    double variance() const {
        double sum = M_PI * M_PI / 3;
        for (std::size_t j = 0; j < ratio_.size(); ++j) {
            sum += (j % 2 == 0 ? -4 : 4) * ratio_[j] / static_cast<double>(j + 1);
        }
        return sum;
    }

private:
    std::vector<double> ratio_;
};

TEST(LawGoodness, VonMises) {
    for (const double concentration : {0.0, 1e-12, 0.2, 1.0, 4.0, 30.0}) {
        const fourier_von_mises reference(concentration);
        check_distances(std::to_string(concentration), leat::von_mises{0, concentration}, reference,
                        concentration < 1e-6 ? fewer : many);
        EXPECT_NEAR((leat::von_mises{2, concentration}.variance()), reference.variance(), 1e-12);
    }
    const fourier_von_mises reference(2);
    check_distances(
        "moved", leat::von_mises{3, 2}, [&](double x) { return reference(x - 3); }, fewer);
    check_distances("float", leat::von_mises<float>{0, 2}, reference, fewer);
    // Concentrations k so large that the law is normal with variance 1 / k to one part in k.
    for (const double k : {1e8, 1e12, 1e20, 1e200}) {
        const boost::math::normal_distribution<double, in_double> normal(0, 1 / std::sqrt(k));
        check_distances("narrow " + std::to_string(std::log10(k)), leat::von_mises{0, k},
                        cdf_of(normal), fewer);
        EXPECT_NEAR((leat::von_mises{0, k}.variance()) * k, 1, 1e-7);
    }
}

// Michael, Schucany and Haas 1976 as published, and with its two roots swapped.
std::vector<outcome> report_two_roots(bool swapped) {
    auto g = source_of_this_test().stream();
    const auto published = [swapped](leat::stream& words) {
        constexpr double mean = 2;
        constexpr double shape = 3;
        const double z = leat::detail::standard_normal(words);
        const double y = mean * z * z;
        const double root = mean + mean / (2 * shape) * (y - std::sqrt(4 * shape * y + y * y));
        const bool first = leat::unit(words) <= mean / (mean + root);
        return first != swapped ? root : mean * mean / root;
    };
    auto x = draw_values(published, few, g);
    return law_report("two roots", x,
                      boost::math::inverse_gaussian_distribution<double, in_double>(2, 3));
}

TEST(PlantedFaults, InverseGaussianAsPublishedPasses) { check(report_two_roots(false)); }

TEST(PlantedFaults, InverseGaussianWithItsRootsSwappedIsRejected) {
    EXPECT_TRUE(is_rejected(report_two_roots(true)));
}

// A truncated normal clamped to its interval instead of drawn inside it.
TEST(PlantedFaults, ClampedNormalIsRejected) {
    auto g = source_of_this_test().stream();
    const auto clamped = [](leat::stream& words) {
        return std::clamp(leat::detail::standard_normal(words), -1.0, 1.0);
    };
    auto x = draw_values(clamped, few, g);
    EXPECT_TRUE(is_rejected({kolmogorov_smirnov_test("clamped", x, truncated_cdf(-1, 1))}));
}

} // namespace
