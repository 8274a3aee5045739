// Student's t law with k degrees of freedom: z / sqrt(X / k), z standard normal and X chi-squared
// with k degrees; k need not be whole. k = 1 is the Cauchy law. Errors of estimated means, heavy
// tails.
//
// Domain: k finite and >= 1e-300 (below, the density leaves the range of double everywhere);
// anything else throws invalid_parameter. A draw consumes a normal, then
// X: on average 2.04 word64 for k = 1, 2.05 for 2, 3.2 at most from there on, 4.3 below 2 (k = 1
// apart). Throws engine_stuck as `gamma` does. For small k the draws themselves pass the range of
// double (half of them at k = 0.001): they are given as the largest finite number with their sign.
// A float is computed as a double and rounded.
// Source: by definition, "Student", Biometrika 6, 1908; X: detail/unit_gamma.hpp.
// Not for a standard Cauchy variate by itself (cauchy).

#ifndef LEAT_DISTRIBUTIONS_STUDENT_T_HPP
#define LEAT_DISTRIBUTIONS_STUDENT_T_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/beta_density.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/unit_gamma.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class student_t;

/// The parameter of `student_t`.
template <detail::portable_real Real = double>
struct student_t_parameters {
    using distribution_type = student_t<Real>;
    static constexpr const char* law_name = "student_t";

    Real k = 1; ///< degrees of freedom, at least 1e-300

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const auto degrees = static_cast<double>(k);
        return detail::finite(degrees) && degrees >= 1e-300
                   ? detail::fault{}
                   : detail::fault{"k", degrees, "must be finite and >= 1e-300"};
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("k", self.k);
    }
    friend constexpr bool operator==(const student_t_parameters&,
                                     const student_t_parameters&) = default;
};

/// Student's t law.
template <detail::portable_real Real = double>
class student_t : public detail::law<student_t<Real>, student_t_parameters<Real>> {
    using base = detail::law<student_t, student_t_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// One degree of freedom.
    constexpr student_t() : student_t(param_type{}) {}
    constexpr explicit student_t(detail::number auto k)
        : student_t(param_type{static_cast<Real>(k)}) {}
    constexpr explicit student_t(const param_type& p)
        : student_t(p, (detail::split(static_cast<double>(p.k)) * detail::scaled{1, -1}).value()) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const real z = detail::standard_normal(g);
        const detail::gamma_pieces x = gamma_(g);
        const real t = z * scale_ / detail::square_root(x.factor);
        if (x.drop == 0) [[likely]] {
            return detail::into_signed<Real>(t.value);
        }
        const detail::scaled size = detail::split(detail::magnitude(t.value)) *
                                    detail::exp_scaled((real(0.5) * x.drop).value);
        return detail::into_signed<Real>(t.value < 0 ? -size.value() : size.value());
    }

    [[nodiscard]] constexpr Real k() const noexcept { return this->param().k; }
    /// 0; NaN for k <= 1, where there is none.
    [[nodiscard]] constexpr double mean() const noexcept {
        return k() > 1 ? 0.0 : std::numeric_limits<double>::quiet_NaN();
    }
    /// k / (k - 2); infinite for 1 < k <= 2, NaN for k <= 1.
    [[nodiscard]] constexpr double variance() const noexcept {
        if (k() > 2) {
            const real degrees = static_cast<double>(k());
            return (degrees / (degrees - 2.0)).value;
        }
        return k() > 1 ? std::numeric_limits<double>::infinity()
                       : std::numeric_limits<double>::quiet_NaN();
    }
    [[nodiscard]] static constexpr Real min() noexcept {
        return std::numeric_limits<Real>::lowest();
    }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x. The cumulative chance and the quantile need the incomplete
    /// beta function: distributions/with_boost_math.hpp has them.
    [[nodiscard]] constexpr double density(double x) const {
        const double size = detail::magnitude(detail::number_or_refuse(param_type::law_name, x));
        if (!detail::finite(size)) {
            return 0;
        }
        const auto degrees = static_cast<double>(k());
        const double root = detail::square_root(degrees);
        const double place = detail::quotient(size, root);
        const real t = place < 0x1p-500 ? 0x1p-500 : place; // nearer to 0 nothing changes
        // x^2 / k has the law of odds of a beta of 1/2 and k/2.
        const real square = t.value > 0x1p500 ? 0x1p1000 : (t * t).value;
        const real v = real(1.0) / (square + 1.0);
        const detail::scaled kernel =
            detail::beta_kernel(0.5, (real(degrees) * 0.5).value, (square * v).value, v.value);
        return detail::or_zero(kernel * detail::inverse(detail::split(t.value)) *
                               detail::inverse(detail::split(root)));
    }

private:
    constexpr student_t(const param_type& p, double half)
        : base(p), gamma_(half), scale_(half < 1 ? detail::square_root(half) : 1.0) {}

    detail::unit_gamma gamma_; // of shape k / 2
    double scale_;             // the root of k / 2 over the variate's unit
};

} // namespace leat

#endif
