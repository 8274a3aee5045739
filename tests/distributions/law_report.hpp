// The tests of fit for draws of a one-dimensional continuous law: one list, which the laws must
// pass and the planted faults must not.
//
// Reference: Boost.Math (distribution function, mean, variance, skewness, kurtosis), and the
// entries of tests/reference/distributions.json (quantiles and distribution function, by mpmath).
// Heavy tails: the mean is tested where the sample makes it nearly normal, the variance where the
// excess kurtosis is at most 6; elsewhere the counts beyond quantiles stand for them.

#ifndef LEAT_TESTS_DISTRIBUTIONS_LAW_REPORT_HPP
#define LEAT_TESTS_DISTRIBUTIONS_LAW_REPORT_HPP

#include "support/statistics.hpp"

#include <boost/math/distributions/complement.hpp>
#include <boost/math/policies/policy.hpp>
#include <nlohmann/json.hpp>

#include <algorithm>
#include <string>
#include <vector>

namespace leat_test {

/// For boost::math laws: computing in double is exact enough, and quicker.
using in_double = boost::math::policies::policy<boost::math::policies::promote_double<false>>;

template <class Law, class G>
std::vector<double> draw_values(const Law& law, int n, G& g) {
    std::vector<double> x(static_cast<std::size_t>(n));
    for (double& value : x) {
        value = static_cast<double>(law(g));
    }
    return x;
}

/// Kolmogorov-Smirnov, mean and variance: at most 3 outcomes. Reorders x.
template <class Reference>
std::vector<outcome> law_report(const std::string& name, std::vector<double>& x,
                                const Reference& law) {
    const auto n = static_cast<double>(x.size());
    std::vector<outcome> report;
    report.push_back(kolmogorov_smirnov_test(name + ", Kolmogorov-Smirnov", x,
                                             [&law](double value) { return cdf(law, value); }));
    const double centre = mean(law);
    const double spread = variance(law);
    const double excess = kurtosis_excess(law);
    double sum = 0;
    double squares = 0;
    for (const double value : x) {
        sum += value;
        squares += (value - centre) * (value - centre) / spread;
    }
    const known_moments first{centre, spread, skewness(law)};
    if (first.nearly_normal(n)) {
        report.push_back(mean_test(name + ", mean", sum, n, first));
    }
    if (excess <= 6) {
        report.push_back(mean_test(name + ", variance", squares, n, {1, excess + 2}));
    }
    return report;
}

/// How many draws lie below the entry's quantiles and points: 15 outcomes.
inline std::vector<outcome> quantile_report(const std::string& name, const std::vector<double>& x,
                                            const nlohmann::json& entry) {
    std::vector<outcome> report;
    const auto count_below = [&](double point, double p) {
        const auto hits =
            std::count_if(x.begin(), x.end(), [point](double value) { return value <= point; });
        report.push_back(count_test(name + ", count below " + std::to_string(point),
                                    static_cast<std::uint64_t>(hits), x.size(), p));
    };
    const auto count_above = [&](double point, double p) {
        const auto hits =
            std::count_if(x.begin(), x.end(), [point](double value) { return value > point; });
        report.push_back(count_test(name + ", count above " + std::to_string(point),
                                    static_cast<std::uint64_t>(hits), x.size(), p));
    };
    const auto& expected = entry.at("expected");
    for (const auto& [p, point] : expected.at("lower").items()) {
        count_below(point, std::stod(p));
    }
    for (const auto& [p, point] : expected.at("upper").items()) {
        count_above(point, std::stod(p));
    }
    for (const auto& at : expected.at("at")) {
        if (at.at("cdf") < at.at("sf")) {
            count_below(at.at("x"), at.at("cdf"));
        } else {
            count_above(at.at("x"), at.at("sf"));
        }
    }
    return report;
}

inline std::vector<outcome> operator+(std::vector<outcome> a, const std::vector<outcome>& b) {
    a.insert(a.end(), b.begin(), b.end());
    return a;
}

} // namespace leat_test

#endif
