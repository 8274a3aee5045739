// Tests of fit, each returning a p-value: what a goodness-of-fit test is made of.
//
// A p-value is the probability, if the sampler is right, of a statistic at least as extreme as the
// one seen. All but the Kolmogorov-Smirnov test look at both ends: a chi-square that is too small,
// as from a grid in place of random points, is as suspect as one that is too large.
//
// How far the p-values can be trusted at 1e-10, where the suite decides (see alarm_budget.hpp):
//   binomial count       exact
//   Kolmogorov-Smirnov   a little too large, by a tenth at n = 1000, 1e-3 at 100000 (tested)
//   chi-square           asymptotic; cells of an expected count below 100 are refused
//   mean                 normal approximation; a mean whose skewness is above 0.02 is refused,
//   which
//                        keeps the first Edgeworth term of the tail below 0.84
//
// No test here may share its data's randomness with another to gain power; several tests of one
// sample are added up by the union bound, which needs no independence.

#ifndef LEAT_TESTS_SUPPORT_STATISTICS_HPP
#define LEAT_TESTS_SUPPORT_STATISTICS_HPP

#include <boost/math/distributions/binomial.hpp>
#include <boost/math/distributions/chi_squared.hpp>

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <span>
#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

namespace leat_test {

/// What one test of fit found.
struct outcome {
    std::string what;
    double statistic;
    double p;
};

/// The smallest p-value of several outcomes.
inline double smallest_p(const std::vector<outcome>& all) {
    double p = 1;
    for (const auto& one : all) {
        p = std::min(p, one.p);
    }
    return p;
}

/// P(D_n >= d) for the two-sided Kolmogorov-Smirnov statistic, all parameters known: Kolmogorov's
/// series (1933) at t = sqrt(n) d + 1 / (6 sqrt(n)), which is Smirnov's expansion with an error of
/// O(1/n) (Bol'shev, Theory Probab. Appl. 8, 1963, for the one-sided case).
inline double kolmogorov_p(double d, double n) {
    const double t = std::sqrt(n) * d + 1 / (6 * std::sqrt(n));
    if (t < 0.2) {
        return 1; // 1 - p is below 1e-12
    }
    double sum = 0;
    double sign = 1;
    for (int k = 1; k <= 40; ++k, sign = -sign) {
        sum += sign * std::exp(-2.0 * k * k * t * t);
    }
    return std::clamp(2 * sum, 0.0, 1.0);
}

/// The largest distance between the empirical distribution function of `x` and `cdf`.
/// Exact, but neither sorts the sample nor evaluates `cdf` everywhere: it halves the sample about
/// its median, and drops a part as soon as no distance inside can exceed one already found.
template <class Cdf>
double largest_distance(std::span<double> x, Cdf cdf) {
    const auto n = static_cast<double>(x.size());
    double largest = 0;
    // The values with ranks [low, high) have distribution function values within [f_low, f_high].
    const auto search = [&](const auto& self, std::size_t low, std::size_t high, double f_low,
                            double f_high) -> void {
        const double bound =
            std::max(f_high - static_cast<double>(low) / n, static_cast<double>(high) / n - f_low);
        if (low == high || bound <= largest) {
            return;
        }
        const std::size_t middle = low + (high - low) / 2;
        const auto at = [&](std::size_t i) { return x.begin() + static_cast<std::ptrdiff_t>(i); };
        std::nth_element(at(low), at(middle), at(high));
        const double f = cdf(x[middle]);
        largest = std::max({largest, f - static_cast<double>(middle) / n,
                            static_cast<double>(middle + 1) / n - f});
        self(self, low, middle, f_low, f);
        self(self, middle + 1, high, f, f_high);
    };
    search(search, 0, x.size(), 0, 1);
    return largest;
}

/// Kolmogorov-Smirnov test of a sample against a continuous distribution function. Reorders the
/// sample.
template <class Cdf>
outcome kolmogorov_smirnov_test(std::string what, std::span<double> x, Cdf cdf) {
    for (const double value : x) {
        if (!std::isfinite(value)) {
            return {std::move(what) + ": not finite", value, 0};
        }
    }
    const double d = largest_distance(x, cdf);
    return {std::move(what), d, kolmogorov_p(d, static_cast<double>(x.size()))};
}

/// Pearson's chi-square test of counts against cell probabilities that sum to 1.
inline outcome chi_square_test(std::string what, std::span<const std::uint64_t> counts,
                               std::span<const double> probabilities) {
    double n = 0;
    for (const auto count : counts) {
        n += static_cast<double>(count);
    }
    double sum = 0;
    for (std::size_t i = 0; i < counts.size(); ++i) {
        const double expected = n * probabilities[i];
        if (expected < 100) {
            throw std::invalid_argument("chi_square_test: a cell expects fewer than 100");
        }
        const double excess = static_cast<double>(counts[i]) - expected;
        sum += excess * excess / expected;
    }
    const boost::math::chi_squared law(static_cast<double>(counts.size() - 1));
    const double upper = boost::math::cdf(boost::math::complement(law, sum));
    const double lower = boost::math::cdf(law, sum);
    return {std::move(what), sum, std::min(1.0, 2 * std::min(upper, lower))};
}

/// The same with equal cells.
inline outcome chi_square_test(std::string what, std::span<const std::uint64_t> counts) {
    const std::vector<double> equal(counts.size(), 1 / static_cast<double>(counts.size()));
    return chi_square_test(std::move(what), counts, equal);
}

/// Number of successes in n independent trials of probability p: exact, both ends.
inline outcome count_test(std::string what, std::uint64_t hits, std::uint64_t n, double p) {
    const boost::math::binomial law(static_cast<double>(n), p);
    const auto k = static_cast<double>(hits);
    const double at_most = boost::math::cdf(law, k);
    const double at_least = hits == 0 ? 1.0 : boost::math::cdf(boost::math::complement(law, k - 1));
    return {std::move(what), k, std::min(1.0, 2 * std::min(at_most, at_least))};
}

/// A quantity with known moments, and whether their mean over n draws is near enough to normal.
struct known_moments {
    double mean;
    double variance;
    double skewness = 0; // of one draw; or a bound on its size

    [[nodiscard]] bool nearly_normal(double n) const {
        return std::abs(skewness) <= 0.02 * std::sqrt(n);
    }
};

/// The mean of n independent draws against its exact value and standard error.
inline outcome mean_test(std::string what, double sum, double n, const known_moments& known) {
    if (!known.nearly_normal(n)) {
        throw std::invalid_argument("mean_test: too skew for a normal approximation");
    }
    const double z = (sum / n - known.mean) / std::sqrt(known.variance / n);
    return {std::move(what), z, std::isnan(z) ? 0.0 : std::erfc(std::abs(z) / std::sqrt(2.0))};
}

} // namespace leat_test

#endif
