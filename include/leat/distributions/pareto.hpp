// The Pareto law with a scale and a shape: P(X > x) = (scale / x)^shape, x >= scale; sizes of
// cities, claims, files. The scale is the smallest value.
//
// Domain: scale and shape finite and > 0; anything else throws invalid_parameter. A draw is scale
// exp(E / shape), E from the exponential's ziggurat: 1.03 word64 on average, as `exponential`, and
// as there the tail is complete. It is never below the scale, and equal to it where rounding makes
// it so. Draws beyond the range (a small shape) are given as the largest finite number. A float is
// computed as a double and rounded.
// Source: by inversion of the exponential (common practice; N. L. Johnson, S. Kotz and N.
// Balakrishnan, Continuous univariate distributions 1, 1994, ch. 20).
// Not for the form that starts at 0 (Lomax): subtract the scale.

#ifndef LEAT_DISTRIBUTIONS_PARETO_HPP
#define LEAT_DISTRIBUTIONS_PARETO_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class pareto;

/// The parameters of `pareto`.
template <detail::portable_real Real = double>
struct pareto_parameters {
    using distribution_type = pareto<Real>;
    static constexpr const char* law_name = "pareto";

    Real scale = 1; ///< the least value, > 0
    Real shape = 1; ///< > 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(detail::unless_positive("scale", static_cast<double>(scale)),
                                detail::unless_positive("shape", static_cast<double>(shape)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("scale", self.scale);
        visit("shape", self.shape);
    }
    friend constexpr bool operator==(const pareto_parameters&, const pareto_parameters&) = default;
};

/// The Pareto law.
template <detail::portable_real Real = double>
class pareto : public detail::law<pareto<Real>, pareto_parameters<Real>> {
    using base = detail::law<pareto, pareto_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Scale 1, shape 1.
    constexpr pareto() : pareto(param_type{}) {}
    constexpr pareto(detail::number auto scale, detail::number auto shape)
        : pareto(param_type{static_cast<Real>(scale), static_cast<Real>(shape)}) {}
    constexpr explicit pareto(const param_type& p) : base(p) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const double e = detail::standard_exponential(g);
        return detail::into_positive<Real>(from_standard(e));
    }

    [[nodiscard]] constexpr Real scale() const noexcept { return this->param().scale; }
    [[nodiscard]] constexpr Real shape() const noexcept { return this->param().shape; }
    /// scale shape / (shape - 1); infinite for shape <= 1. Saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept {
        return shape_() > 1 ? scaled_mean().value() : std::numeric_limits<double>::infinity();
    }
    /// mean^2 / (shape (shape - 2)); infinite for shape <= 2. Saturates as the mean does.
    [[nodiscard]] constexpr double variance() const noexcept {
        if (!(shape_() > 2)) {
            return std::numeric_limits<double>::infinity();
        }
        const detail::scaled below =
            detail::split(shape_()) * detail::split(detail::held(shape_() - 2.0));
        return (scaled_mean() * scaled_mean() * detail::inverse(below)).value();
    }
    /// The scale, among the normal numbers.
    [[nodiscard]] constexpr Real min() const noexcept {
        return detail::into_positive<Real>(scale_());
    }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        if (!in_support(x)) {
            return 0;
        }
        const detail::scaled beyond =
            detail::exp_scaled(-detail::product(shape_(), log_of_ratio(x)));
        return detail::or_zero(beyond * detail::split(shape_()) *
                               detail::inverse(detail::split(x)));
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x > 0 && !detail::finite(x) ? 1 : 0;
        }
        return -detail::exp_minus_one(-detail::product(shape_(), log_of_ratio(x)));
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double chance = detail::chance_or_refuse(param_type::law_name, p);
        return detail::into_positive<double>(from_standard(-detail::log_one_plus(-chance)));
    }

private:
    /// Where the exponential is e.
    constexpr double from_standard(double e) const noexcept {
        return (detail::split(scale_()) * detail::exp_scaled(detail::held(e / shape_()))).value();
    }
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) >= scale_() && detail::finite(x);
    }
    /// ln(x / scale), with its digits also where x is near the scale.
    constexpr double log_of_ratio(double x) const noexcept {
        const double s = scale_();
        if (x < 2 * s && s > 0x1p-900) { // the difference is exact
            return detail::log_one_plus(((real(x) - s) / s).value);
        }
        const detail::two_part above = detail::log_parts(x);
        const detail::two_part below = detail::log_parts(s);
        return ((real(above.high) - below.high) + (real(above.low) - below.low)).value;
    }
    constexpr detail::scaled scaled_mean() const noexcept {
        return detail::split(scale_()) * detail::split(shape_()) *
               detail::inverse(detail::split(detail::held(shape_() - 1.0)));
    }
    constexpr double scale_() const noexcept { return static_cast<double>(scale()); }
    constexpr double shape_() const noexcept { return static_cast<double>(shape()); }
};

} // namespace leat

#endif
