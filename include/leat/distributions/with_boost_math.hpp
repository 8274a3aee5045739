// density, cumulative and quantile of every law by one name, with Boost.Math where the laws
// themselves stop: at incomplete gamma and beta functions.
//
//     leat::cumulative(law, x)    leat::quantile(law, p)    leat::density(law, x)
//
// They call the law's own member where there is one (the same bits everywhere), else Boost.Math:
// gamma and maxwell by the incomplete gamma function. Results of Boost.Math are accurate to about
// 1e-13, but may differ in the last digits between machines: promise P1 does not cover them.
// Arguments and refusals are those of the members: x NaN and p outside (0, 1) are refused, results
// kept finite. Source: the definitions (Abramowitz and Stegun, 26.4, 26.5). This header needs
// Boost.Math; leat.hpp does not include it, and nothing else of leat needs it. Not for sampling:
// the laws draw without it.

#ifndef LEAT_DISTRIBUTIONS_WITH_BOOST_MATH_HPP
#define LEAT_DISTRIBUTIONS_WITH_BOOST_MATH_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/maxwell.hpp"

#include <boost/math/policies/policy.hpp>
#include <boost/math/special_functions/gamma.hpp>

namespace leat {
namespace detail {

/// Boost.Math computing in double; what leaves the range comes as 0 or infinity, not as an error.
using boost_policy = boost::math::policies::policy<
    boost::math::policies::promote_double<false>,
    boost::math::policies::overflow_error<boost::math::policies::ignore_error>,
    boost::math::policies::underflow_error<boost::math::policies::ignore_error>>;

/// P(X <= x) of scale times a gamma variate.
inline double gamma_cumulative(double shape, double scale, double x) {
    if (!(x > 0)) {
        return 0;
    }
    return finite(x) ? boost::math::gamma_p(shape, quotient(x, scale), boost_policy()) : 1;
}

/// The inverse of gamma_cumulative.
inline double gamma_quantile(double shape, double scale, double p) {
    const double x = boost::math::gamma_p_inv(shape, p, boost_policy());
    return x > 0 && finite(x) ? product(scale, x) : into_positive<double>(x);
}

} // namespace detail

/// The law's density at x, or an integer law's probability of x.
template <class Law, class X>
requires requires(const Law& law, X x) { law.density(x); }
constexpr double density(const Law& law, X x) { return law.density(x); }

/// P(X <= x): the law's own.
template <class Law, class X>
requires requires(const Law& law, X x) { law.cumulative(x); }
constexpr double cumulative(const Law& law, X x) { return law.cumulative(x); }

/// The x with cumulative(x) = p: the law's own.
template <class Law>
requires requires(const Law& law) { law.quantile(0.5); }
constexpr auto quantile(const Law& law, double p) { return law.quantile(p); }

/// P(X <= x) of a gamma law.
template <detail::portable_real Real>
double cumulative(const gamma<Real>& law, double x) {
    detail::number_or_refuse("gamma", x);
    return detail::gamma_cumulative(static_cast<double>(law.shape()),
                                    static_cast<double>(law.scale()), x);
}
/// The x with cumulative(law, x) = p, 0 < p < 1.
template <detail::portable_real Real>
double quantile(const gamma<Real>& law, double p) {
    detail::chance_or_refuse("gamma", p);
    return detail::gamma_quantile(static_cast<double>(law.shape()),
                                  static_cast<double>(law.scale()), p);
}

/// The x with P(X <= x) = p of a Maxwell law, 0 < p < 1.
template <detail::portable_real Real>
double quantile(const maxwell<Real>& law, double p) {
    detail::chance_or_refuse("maxwell", p);
    // half its square is a gamma variate of shape 3/2
    const double half_square = detail::gamma_quantile(1.5, 1, p);
    return detail::product(static_cast<double>(law.scale()),
                           detail::square_root(detail::product(2, half_square)));
}

} // namespace leat

#endif
