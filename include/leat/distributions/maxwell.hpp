// The Maxwell law with a scale: density sqrt(2 / pi) x^2 exp(-(x / scale)^2 / 2) / scale^3, x > 0;
// the length of a vector of three normals of that standard deviation: the speed of a molecule, with
// scale sqrt(k T / m).
//
// Domain: scale finite and > 0; anything else throws invalid_parameter. A draw is scale
// sqrt(2 E + Z^2), for two squared normals sum to twice an exponential; E and Z from their
// ziggurats: 2.06 word64 on average. The tail is complete. Results out of range are given as the
// smallest normal and the largest finite number. A float is computed as a double and rounded.
// Source: by its definition (common practice; N. L. Johnson, S. Kotz and N. Balakrishnan,
// Continuous univariate distributions 1, 1994, ch. 18).
// `quantile` needs the incomplete gamma function: distributions/with_boost_math.hpp has it.
// Not for the velocity itself: draw three normals.

#ifndef LEAT_DISTRIBUTIONS_MAXWELL_HPP
#define LEAT_DISTRIBUTIONS_MAXWELL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_function.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class maxwell;

/// The parameter of `maxwell`.
template <detail::portable_real Real = double>
struct maxwell_parameters {
    using distribution_type = maxwell<Real>;
    static constexpr const char* law_name = "maxwell";

    Real scale = 1; ///< one component's standard deviation, > 0

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::unless_positive("scale", static_cast<double>(scale));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("scale", self.scale);
    }
    friend constexpr bool operator==(const maxwell_parameters&,
                                     const maxwell_parameters&) = default;
};

/// The Maxwell law.
template <detail::portable_real Real = double>
class maxwell : public detail::law<maxwell<Real>, maxwell_parameters<Real>> {
    using base = detail::law<maxwell, maxwell_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Scale 1.
    constexpr maxwell() : maxwell(param_type{}) {}
    constexpr explicit maxwell(detail::number auto scale)
        : maxwell(param_type{static_cast<Real>(scale)}) {}
    constexpr explicit maxwell(const param_type& p) : base(p) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const real e = detail::standard_exponential(g);
        const real z = detail::standard_normal(g);
        const double length = detail::square_root((e + e + z * z).value);
        return detail::into_positive<Real>((real(scale_()) * length).value);
    }

    [[nodiscard]] constexpr Real scale() const noexcept { return this->param().scale; }
    /// scale sqrt(8 / pi). Like the variance it saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept {
        return detail::product(0x1.9884533d43651p0, scale_());
    }
    /// (3 - 8 / pi) scale^2.
    [[nodiscard]] constexpr double variance() const noexcept {
        const detail::scaled s = detail::split(scale_());
        return (detail::split(0x1.d067c91b1bbebp-2) * s * s).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        if (!in_support(x)) {
            return 0;
        }
        const detail::scaled z = scaled_place(x);
        return detail::or_zero(z * standard_shell(z) * detail::inverse(detail::split(scale_())));
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x > 0 ? 1 : 0;
        }
        const detail::scaled parts = scaled_place(x);
        const double z = parts.value();
        if (z >= 2) {
            const real beyond =
                real(2.0) * detail::normal_below(-z) + detail::or_zero(standard_shell(parts));
            return (real(1.0) - beyond).value;
        }
        // The difference would cancel: (Abramowitz and Stegun, 26.4.6, with 3 degrees of freedom)
        const double square = z < 0x1p-60 ? 0.0 : detail::held(z * z);
        real sum = 1.0;
        for (int k = 45; k >= 5; k -= 2) {
            sum = real(1.0) + sum * square / static_cast<double>(k);
        }
        return detail::or_zero(parts * parts * standard_shell(parts) *
                               detail::split((sum / 3.0).value));
    }

private:
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) > 0 && detail::finite(x);
    }
    constexpr detail::scaled scaled_place(double x) const noexcept {
        return detail::split(x) * detail::inverse(detail::split(scale_()));
    }
    /// sqrt(2 / pi) z exp(-z^2 / 2).
    static constexpr detail::scaled standard_shell(detail::scaled z) noexcept {
        const double half_square = (z * z * detail::scaled{1.0, -1}).value();
        return detail::split(0x1.9884533d43651p-1) * z * detail::exp_scaled(-half_square);
    }
    constexpr double scale_() const noexcept { return static_cast<double>(scale()); }
};

} // namespace leat

#endif
