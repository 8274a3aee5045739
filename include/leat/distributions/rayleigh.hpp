// The Rayleigh law with a scale: density (x / scale^2) exp(-(x / scale)^2 / 2), x > 0; the length
// of a plane vector of two normals of that standard deviation: wave heights, wind, fading.
//
// Domain: scale finite and > 0; anything else throws invalid_parameter. A draw is scale sqrt(2 E),
// E from the exponential's ziggurat: 1.03 word64 on average, as `exponential`, and as there the
// tail is complete. Results out of range are given as the smallest normal and the largest finite
// number. A float is computed as a double and rounded.
// Source: by inversion of the exponential (common practice; N. L. Johnson, S. Kotz and N.
// Balakrishnan, Continuous univariate distributions 1, 1994, ch. 18).
// Not for two components of unequal spread, nor for a vector with a drift.

#ifndef LEAT_DISTRIBUTIONS_RAYLEIGH_HPP
#define LEAT_DISTRIBUTIONS_RAYLEIGH_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class rayleigh;

/// The parameter of `rayleigh`.
template <detail::portable_real Real = double>
struct rayleigh_parameters {
    using distribution_type = rayleigh<Real>;
    static constexpr const char* law_name = "rayleigh";

    Real scale = 1; ///< one component's standard deviation, > 0

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::unless_positive("scale", static_cast<double>(scale));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("scale", self.scale);
    }
    friend constexpr bool operator==(const rayleigh_parameters&,
                                     const rayleigh_parameters&) = default;
};

/// The Rayleigh law.
template <detail::portable_real Real = double>
class rayleigh : public detail::law<rayleigh<Real>, rayleigh_parameters<Real>> {
    using base = detail::law<rayleigh, rayleigh_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Scale 1.
    constexpr rayleigh() : rayleigh(param_type{}) {}
    constexpr explicit rayleigh(detail::number auto scale)
        : rayleigh(param_type{static_cast<Real>(scale)}) {}
    constexpr explicit rayleigh(const param_type& p) : base(p) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard, gnu::always_inline]] constexpr Real operator()(G& g) const {
        return from_standard<Real>(detail::standard_exponential(g));
    }
    /// For fills: the draw whose first 64-bit word is `word`, where that is accepted at once.
    [[gnu::always_inline]] constexpr bool from_word(std::uint64_t word, Real& x) const noexcept {
        double e = 0;
        const bool accepted = detail::exponential_at_once(word, e);
        x = from_standard<Real>(e);
        return accepted;
    }

    [[nodiscard]] constexpr Real scale() const noexcept { return this->param().scale; }
    /// scale sqrt(pi / 2). Like the variance it saturates at the ends of double's range.
    [[nodiscard]] constexpr double mean() const noexcept {
        return detail::product(0x1.40d931ff62706p0, scale_());
    }
    /// (2 - pi / 2) scale^2.
    [[nodiscard]] constexpr double variance() const noexcept {
        const detail::scaled s = detail::split(scale_());
        return (detail::split(0x1.b7812aeef4b9fp-2) * s * s).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        if (!in_support(x)) {
            return 0;
        }
        const detail::scaled z = scaled_place(x);
        return detail::or_zero(z * detail::exp_scaled(-half_square(z)) *
                               detail::inverse(detail::split(scale_())));
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x > 0 ? 1 : 0;
        }
        return -detail::exp_minus_one(-half_square(scaled_place(x)));
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double chance = detail::chance_or_refuse(param_type::law_name, p);
        return from_standard<double>(-detail::log_one_plus(-chance));
    }

private:
    template <class Result>
    [[gnu::always_inline]] constexpr Result from_standard(double e) const noexcept {
        return detail::into_positive<Result>(
            (real(scale_()) * detail::square_root(detail::held(e + e))).value);
    }
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) > 0 && detail::finite(x);
    }
    constexpr detail::scaled scaled_place(double x) const noexcept {
        return detail::split(x) * detail::inverse(detail::split(scale_()));
    }
    static constexpr double half_square(detail::scaled z) noexcept {
        return (z * z * detail::scaled{1.0, -1}).value();
    }
    constexpr double scale_() const noexcept { return static_cast<double>(scale()); }
};

} // namespace leat

#endif
