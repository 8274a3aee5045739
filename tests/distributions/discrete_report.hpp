// The tests of fit for draws of a law of whole numbers: one list, which the laws must pass and the
// planted faults must not.

#ifndef LEAT_TESTS_DISTRIBUTIONS_DISCRETE_REPORT_HPP
#define LEAT_TESTS_DISTRIBUTIONS_DISCRETE_REPORT_HPP

#include "support/statistics.hpp"

#include <boost/math/policies/policy.hpp>

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <string>
#include <vector>

namespace leat_test {

template <class Law, class G>
std::vector<std::int64_t> draw_counts(const Law& law, int n, G& g) {
    std::vector<std::int64_t> k(static_cast<std::size_t>(n));
    for (auto& value : k) {
        value = static_cast<std::int64_t>(law(g));
    }
    return k;
}

/// Chi-square of draws against masses on low .. high, whatever is beyond counted with the ends.
/// Neighbouring values share a cell until it expects 100 draws or a 200th of all.
template <class Mass>
outcome mass_test(std::string what, const std::vector<std::int64_t>& draws, std::int64_t low,
                  std::int64_t high, Mass mass) {
    const double least = std::max(100.0 / static_cast<double>(draws.size()), 0.005) * (1 + 1e-9);
    std::vector<double> chances;
    std::vector<std::size_t> cell_of(static_cast<std::size_t>(high - low + 1));
    double open = 0;
    double closed = 0;
    for (std::int64_t k = low; k <= high; ++k) {
        open += mass(static_cast<double>(k));
        cell_of[static_cast<std::size_t>(k - low)] = chances.size();
        if (open >= least && 1 - closed - open >= least) {
            chances.push_back(open);
            closed += open;
            open = 0;
        }
    }
    chances.push_back(1 - closed);
    std::vector<std::uint64_t> counts(chances.size());
    for (const std::int64_t k : draws) {
        ++counts[cell_of[static_cast<std::size_t>(std::clamp(k, low, high) - low)]];
    }
    if (counts.size() == 1) {
        return {std::move(what) + ": one cell", 0, 0};
    }
    return chi_square_test(std::move(what), counts, chances);
}

/// Mean and variance: at most 2 outcomes, fewer where the tails are too heavy for them.
inline std::vector<outcome> moment_tests(const std::string& name,
                                         const std::vector<std::int64_t>& draws,
                                         const known_moments& known, double excess) {
    const auto n = static_cast<double>(draws.size());
    double sum = 0;
    double squares = 0;
    for (const std::int64_t k : draws) {
        const double from_mean = static_cast<double>(k) - known.mean;
        sum += from_mean;
        squares += from_mean * from_mean / known.variance;
    }
    std::vector<outcome> report;
    if (known.nearly_normal(n)) {
        report.push_back(mean_test(name + ", mean", sum, n, {0, known.variance, known.skewness}));
    }
    if (excess <= 6) {
        report.push_back(mean_test(name + ", variance", squares, n, {1, excess + 2}));
    }
    return report;
}

/// All of these against a law of Boost.Math that has its moments, beside values 12 standard
/// deviations from the mean.
template <class Reference>
std::vector<outcome> count_report(const std::string& name, const std::vector<std::int64_t>& draws,
                                  const Reference& reference, std::int64_t least,
                                  std::int64_t most) {
    const double centre = mean(reference);
    const double spread = std::sqrt(variance(reference));
    const auto low = std::max(static_cast<double>(least), std::floor(centre - 12 * spread - 5));
    const auto high = std::min(static_cast<double>(most), std::ceil(centre + 12 * spread + 5));
    auto report = moment_tests(name, draws, {centre, variance(reference), skewness(reference)},
                               kurtosis_excess(reference));
    report.push_back(mass_test(name + ", chi-square", draws, static_cast<std::int64_t>(low),
                               static_cast<std::int64_t>(high),
                               [&](double k) { return pdf(reference, k); }));
    return report;
}

} // namespace leat_test

#endif
