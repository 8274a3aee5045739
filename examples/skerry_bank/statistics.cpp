#include "statistics.hpp"

#include <cmath>

#include <boost/math/distributions/students_t.hpp>

namespace skerry {
namespace {

// In double all through: by default Boost computes in long double, which is another type on every
// platform.
using student_t = boost::math::students_t_distribution<
    double, boost::math::policies::policy<boost::math::policies::promote_double<false>>>;

} // namespace

interval mean_interval(const std::vector<double>& values) {
    const auto n = static_cast<double>(values.size());
    double sum = 0;
    for (const double x : values) {
        sum += x;
    }
    const double mean = sum / n;
    double squares = 0;
    for (const double x : values) {
        squares += (x - mean) * (x - mean);
    }
    const double standard_error = std::sqrt(squares / (n - 1) / n);
    const student_t law(n - 1);
    const double t = quantile(law, 1 - (1 - confidence) / 2);
    return {mean, t * standard_error};
}

} // namespace skerry
