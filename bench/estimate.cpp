// Sums and moments: what an exact sum costs beside a plain one, and one pass of running moments
// beside GSL's passes. Items are doubles taken in.

#include "harness.hpp"

#include "leat/distributions/exponential.hpp"
#include "leat/estimate/exact_sum.hpp"
#include "leat/estimate/running_moments.hpp"

#include <gsl/gsl_statistics_double.h>

namespace {

using namespace leat_bench;

/// Adds a benchmark of a function of an array of exponential times.
template <class Reduce>
void reduce(const std::string& name, Reduce reduce) {
    add<double>(name, [reduce] {
        std::vector<double> times(elements);
        auto g = stream();
        leat::fill(times, leat::exponential{1}, g);
        return [reduce, times](std::span<double>) { benchmark::DoNotOptimize(reduce(times)); };
    });
}

const bool registered = [] {
    reduce("sum of doubles/plain loop", [](const std::vector<double>& x) {
        double sum = 0;
        for (const double value : x) {
            sum += value;
        }
        return sum;
    });
    reduce("sum of doubles/leat::exact_sum", [](const std::vector<double>& x) {
        leat::exact_sum sum;
        sum.add(x);
        return sum.value();
    });

    reduce("four moments/GSL, a pass each", [](const std::vector<double>& x) {
        const double mean = gsl_stats_mean(x.data(), 1, x.size());
        const double sd = gsl_stats_sd_m(x.data(), 1, x.size(), mean);
        return sd + gsl_stats_skew_m_sd(x.data(), 1, x.size(), mean, sd) +
               gsl_stats_kurtosis_m_sd(x.data(), 1, x.size(), mean, sd);
    });
    reduce("four moments/leat::running_moments", [](const std::vector<double>& x) {
        leat::running_moments m;
        m.add(x);
        return m.standard_deviation() + m.skewness() + m.excess_kurtosis();
    });
    return true;
}();

} // namespace
