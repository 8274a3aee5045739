// density, cumulative and quantile of every law by one name, with Boost.Math where the laws
// themselves stop, at incomplete gamma and beta functions, and by sums for laws of counts.
//
//     leat::cumulative(law, x)    leat::quantile(law, p)    leat::density(law, x)
//
// They call the law's own member where there is one (the same bits everywhere), else Boost.Math:
// gamma, erlang, chi_squared and maxwell by the incomplete gamma function, beta, student_t and
// fisher_f by the incomplete beta function, inverse_gaussian by its own cumulative chance.
// The quantiles of the last four are found by bisection, in 62 steps of a microsecond or less.
//
// poisson, binomial, negative_binomial and hypergeometric need no Boost: their masses are summed
// from x away from the mean, some nine standard deviations of them at a few nanoseconds each. That
// is right to a few 1e-12 for standard deviations up to 1e4, beyond by estimate to 1e-15 times the
// standard deviation, and the same everywhere. Only a negative_binomial of p < 1e-4 goes by the
// incomplete beta function. Their quantile is the least whole number k with cumulative(law, k) >=
// p. Not for standard deviations above some 1e8, which take seconds to minutes.
//
// Arguments and refusals are those of the members: x NaN and p outside (0, 1) are refused, results
// are finite. What Boost.Math computes is right to about 1e-13, but its last digits may differ
// between machines: promise P1 does not cover them. Where it finds no answer it throws its own
// error. Source: the definitions (Abramowitz and Stegun, 26.4, 26.5). leat.hpp does not include
// this header, and nothing else of leat needs Boost. Not for sampling: the laws draw without it.

#ifndef LEAT_DISTRIBUTIONS_WITH_BOOST_MATH_HPP
#define LEAT_DISTRIBUTIONS_WITH_BOOST_MATH_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/normal_quantile.hpp" // where to look for a count
#include "leat/core/square_root.hpp"
#include "leat/distributions/beta.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/chi_squared.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/erlang.hpp"
#include "leat/distributions/fisher_f.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/inverse_gaussian.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/student_t.hpp"

#include <boost/math/distributions/fisher_f.hpp>
#include <boost/math/distributions/students_t.hpp>
#include <boost/math/policies/policy.hpp>
#include <boost/math/special_functions/beta.hpp>
#include <boost/math/special_functions/gamma.hpp>

#include <cstdint>
#include <limits>

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

/// P(X <= x) of a law of counts: its masses summed from x away from the mean, until they matter no
/// more. ratio(j) is the mass at j + 1 as a share of that at j.
template <class Law, class Ratio>
double count_cumulative(const Law& law, double x, Ratio ratio) {
    using real = strict<double>;
    number_or_refuse(Law::param_type::law_name, x);
    const auto first = static_cast<double>(law.min());
    const auto last = static_cast<double>(law.max());
    if (!(x >= first && x < last)) {
        return x >= last ? 1 : 0;
    }
    const real k = static_cast<double>(static_cast<std::uint64_t>(x));
    const bool below = k < law.mean();
    real j = below ? k : k + 1.0;
    real mass = law.density(j.value);
    real sum = mass;
    while (mass > sum * 0x1p-80 && (below ? j > first : j < last)) {
        mass = below ? mass / ratio(j - 1.0) : mass * ratio(j);
        j = below ? j - 1.0 : j + 1.0;
        sum = sum + mass;
    }
    const double tail = sum < 1 ? sum.value : 1;
    return below ? tail : held(1 - tail);
}

/// The least k with cumulative(law, k) >= p: bracketed from where the normal law would have it,
/// then by bisection.
template <class Law>
double count_quantile(const Law& law, double p) {
    chance_or_refuse(Law::param_type::law_name, p);
    const auto reaches = [&](std::uint64_t k) {
        return cumulative(law, static_cast<double>(k)) >= p;
    };
    const auto first = static_cast<std::uint64_t>(law.min());
    const auto last = static_cast<std::uint64_t>(law.max());
    const double guess = law.mean() + square_root(law.variance()) * normal_quantile(p);
    std::uint64_t high = guess > 0 ? floor_at_most(guess, last) : 0;
    high = high < first ? first : high;
    std::uint64_t low = high; // the answer is in low .. high once each loop has had its turn
    std::uint64_t step = 1;
    while (high < last && !reaches(high)) {
        low = high + 1;
        high = last - high > step ? high + step : last;
        step *= 2;
    }
    while (low > first && reaches(low - 1)) {
        high = low - 1;
        low = high - first > step ? high - step : first;
        step *= 2;
    }
    while (low < high) {
        const std::uint64_t middle = low + (high - low) / 2;
        if (reaches(middle)) {
            high = middle;
        } else {
            low = middle + 1;
        }
    }
    return static_cast<double>(high);
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

/// P(X <= x) of an Erlang law.
template <detail::portable_real Real>
double cumulative(const erlang<Real>& law, double x) {
    detail::number_or_refuse("erlang", x);
    return detail::gamma_cumulative(static_cast<double>(law.k()),
                                    detail::quotient(1, static_cast<double>(law.rate())), x);
}
/// The x with cumulative(law, x) = p, 0 < p < 1.
template <detail::portable_real Real>
double quantile(const erlang<Real>& law, double p) {
    detail::chance_or_refuse("erlang", p);
    return detail::gamma_quantile(static_cast<double>(law.k()),
                                  detail::quotient(1, static_cast<double>(law.rate())), p);
}

/// P(X <= x) of a chi-squared law.
template <detail::portable_real Real>
double cumulative(const chi_squared<Real>& law, double x) {
    detail::number_or_refuse("chi_squared", x);
    return detail::gamma_cumulative(static_cast<double>(law.k()) / 2, 2, x);
}
/// The x with cumulative(law, x) = p, 0 < p < 1.
template <detail::portable_real Real>
double quantile(const chi_squared<Real>& law, double p) {
    detail::chance_or_refuse("chi_squared", p);
    return detail::gamma_quantile(static_cast<double>(law.k()) / 2, 2, p);
}

/// P(X <= x) of a beta law.
template <detail::portable_real Real>
double cumulative(const beta<Real>& law, double x) {
    detail::number_or_refuse("beta", x);
    return !(x > 0) ? 0
           : x >= 1 ? 1
                    : boost::math::ibeta(static_cast<double>(law.a()), static_cast<double>(law.b()),
                                         x, detail::boost_policy());
}
/// The x with cumulative(law, x) = p, 0 < p < 1; never 0 or 1.
template <detail::portable_real Real>
double quantile(const beta<Real>& law, double p) {
    detail::chance_or_refuse("beta", p);
    const double x = detail::least_reaching(p, [&](double at) { return cumulative(law, at); });
    return x < 1 ? x : 1 - 0x1p-53;
}

/// P(X <= x) of Student's law.
template <detail::portable_real Real>
double cumulative(const student_t<Real>& law, double x) {
    detail::number_or_refuse("student_t", x);
    if (!detail::finite(x)) {
        return x < 0 ? 0 : 1;
    }
    const boost::math::students_t_distribution<double, detail::boost_policy> known(
        static_cast<double>(law.k()));
    return boost::math::cdf(known, x);
}
/// The x with cumulative(law, x) = p, 0 < p < 1.
template <detail::portable_real Real>
double quantile(const student_t<Real>& law, double p) {
    detail::chance_or_refuse("student_t", p);
    if (p == 0.5) {
        return 0;
    }
    const double nearer = p < 0.5 ? p : 1 - p; // exact
    const double size =
        detail::least_reaching(-nearer, [&](double at) { return -cumulative(law, -at); });
    return p < 0.5 ? -size : size;
}

/// P(X <= x) of Fisher's F law.
template <detail::portable_real Real>
double cumulative(const fisher_f<Real>& law, double x) {
    detail::number_or_refuse("fisher_f", x);
    if (!(x > 0) || !detail::finite(x)) {
        return x > 0 ? 1 : 0;
    }
    const boost::math::fisher_f_distribution<double, detail::boost_policy> known(
        static_cast<double>(law.d1()), static_cast<double>(law.d2()));
    return boost::math::cdf(known, x);
}
/// The x with cumulative(law, x) = p, 0 < p < 1.
template <detail::portable_real Real>
double quantile(const fisher_f<Real>& law, double p) {
    detail::chance_or_refuse("fisher_f", p);
    return detail::least_reaching(p, [&](double at) { return cumulative(law, at); });
}

/// The x with P(X <= x) = p of an inverse Gaussian law, 0 < p < 1.
template <detail::portable_real Real>
double quantile(const inverse_gaussian<Real>& law, double p) {
    detail::chance_or_refuse("inverse_gaussian", p);
    return detail::least_reaching(p, [&](double at) { return law.cumulative(at); });
}

/// P(X <= x) of a Poisson law.
template <detail::number_integer Int>
double cumulative(const poisson<Int>& law, double x) {
    using real = detail::strict<double>;
    return detail::count_cumulative(law, x, [&](real j) { return real(law.mean()) / (j + 1.0); });
}
/// The least k with cumulative(law, k) >= p, 0 < p < 1.
template <detail::number_integer Int>
double quantile(const poisson<Int>& law, double p) {
    return detail::count_quantile(law, p);
}

/// P(X <= x) of a binomial law.
template <detail::number_integer Int>
double cumulative(const binomial<Int>& law, double x) {
    using real = detail::strict<double>;
    const real n = static_cast<double>(law.n());
    const real p = law.p();
    return detail::count_cumulative(
        law, x, [&](real j) { return (n - j) * p / ((j + 1.0) * (real(1.0) - p)); });
}
/// The least k with cumulative(law, k) >= p, 0 < p < 1.
template <detail::number_integer Int>
double quantile(const binomial<Int>& law, double p) {
    return detail::count_quantile(law, p);
}

/// P(X <= x) of a negative binomial law.
template <detail::number_integer Int>
double cumulative(const negative_binomial<Int>& law, double x) {
    using real = detail::strict<double>;
    if (law.p() < 1e-4 && x >= 0 && x < static_cast<double>(law.max())) { // too many to sum
        const auto k = static_cast<double>(static_cast<std::uint64_t>(x));
        const double chance = boost::math::ibeta(law.r(), k + 1, law.p(), detail::boost_policy());
        return chance < std::numeric_limits<double>::min() ? 0 : chance;
    }
    return detail::count_cumulative(
        law, x, [&](real j) { return (j + law.r()) / (j + 1.0) * (real(1.0) - law.p()); });
}
/// The least k with cumulative(law, k) >= p, 0 < p < 1.
template <detail::number_integer Int>
double quantile(const negative_binomial<Int>& law, double p) {
    return detail::count_quantile(law, p);
}

/// P(X <= x) of a hypergeometric law.
template <detail::number_integer Int>
double cumulative(const hypergeometric<Int>& law, double x) {
    using real = detail::strict<double>;
    const real marked = static_cast<double>(law.successes());
    const real drawn = static_cast<double>(law.draws());
    const real others = real(static_cast<double>(law.population())) - marked;
    return detail::count_cumulative(law, x, [&](real j) {
        return (marked - j) * (drawn - j) / ((j + 1.0) * (others - drawn + j + 1.0));
    });
}
/// The least k with cumulative(law, k) >= p, 0 < p < 1.
template <detail::number_integer Int>
double quantile(const hypergeometric<Int>& law, double p) {
    return detail::count_quantile(law, p);
}

} // namespace leat

#endif
