// The Cauchy law with a location and a scale: density 1 / (pi scale (1 + z^2)), z = (x - location)
// / scale; resonance lines, and ratios that come near a zero. It has no mean and no variance.
//
// Domain: location finite, scale finite and > 0; anything else throws invalid_parameter. A draw is
// location + scale Z / Z', two normals from the ziggurat: 2.06 word64 on average. Of a Z' below
// 2^-8 in size (one in 320) only that and its sign are kept, and it is drawn again under that
// condition as 2^-8 exp(-E), accepted with chance exp(-Z'^2 / 2): so the tails, which a Z' in steps
// of 2^-53 would end near |z| = 10^16, are complete. At most 32 trials of two, then engine_stuck.
// Draws beyond the range are given as the largest finite number of their sign. A float is computed
// as a double and rounded.
// Source: the ratio of two normals (common practice; N. L. Johnson, S. Kotz and N. Balakrishnan,
// Continuous univariate distributions 1, 1994, ch. 16).
// Not for averages: the mean of any number of draws spreads as one draw does.

#ifndef LEAT_DISTRIBUTIONS_CAUCHY_HPP
#define LEAT_DISTRIBUTIONS_CAUCHY_HPP

#include "leat/core/arctangent.hpp"
#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/distributions/detail/location_scale.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class cauchy;

/// The parameters of `cauchy`.
template <detail::portable_real Real = double>
struct cauchy_parameters {
    using distribution_type = cauchy<Real>;
    static constexpr const char* law_name = "cauchy";

    Real location = 0; ///< the median
    Real scale = 1;    ///< half the width at half the height, > 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::location_scale_fault(static_cast<double>(location),
                                            static_cast<double>(scale));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("location", self.location);
        visit("scale", self.scale);
    }
    friend constexpr bool operator==(const cauchy_parameters&, const cauchy_parameters&) = default;
};

/// The Cauchy law.
template <detail::portable_real Real = double>
class cauchy : public detail::location_scale<cauchy<Real>, cauchy_parameters<Real>> {
    using base = detail::location_scale<cauchy, cauchy_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using typename base::param_type;

    /// Location 0, scale 1.
    constexpr cauchy() : cauchy(param_type{}) {}
    constexpr cauchy(detail::number auto location, detail::number auto scale)
        : cauchy(param_type{static_cast<Real>(location), static_cast<Real>(scale)}) {}
    constexpr explicit cauchy(const param_type& p) : base(p) {}

    /// Undefined: NaN.
    [[nodiscard]] constexpr double mean() const noexcept {
        return std::numeric_limits<double>::quiet_NaN();
    }
    /// Undefined: NaN.
    [[nodiscard]] constexpr double variance() const noexcept {
        return std::numeric_limits<double>::quiet_NaN();
    }

    /// The ratio of two normals, with its whole tails.
    template <random_words G>
    [[nodiscard]] static constexpr double standard(G& g) {
        const double above = detail::standard_normal(g);
        double below = detail::standard_normal(g);
        if (detail::magnitude(below) < 0x1p-8) {
            below = below < 0 ? -near_zero(g) : near_zero(g);
        }
        return detail::held(above / below);
    }
    [[nodiscard]] static constexpr detail::scaled standard_density(double z) noexcept {
        const double size = detail::magnitude(z);
        constexpr detail::scaled pi{0x1.921fb54442d18p1, 0};
        return detail::inverse(pi * (size < 0x1p-30 ? detail::scaled{1.0, 0}
                                     : size > 0x1p500
                                         ? detail::split(size) * detail::split(size)
                                         : detail::split((real(1.0) + real(z) * z).value)));
    }
    [[nodiscard]] static constexpr double standard_cumulative(double z) noexcept {
        constexpr double per_pi = 0x1.45f306dc9c883p-2; // 1 / pi
        const double size = detail::magnitude(z);
        if (size <= 1) {
            const real middle = real(detail::arctangent(size, 1.0)) * per_pi;
            return (z < 0 ? real(0.5) - middle : real(0.5) + middle).value;
        }
        const double beyond = detail::product(detail::arctangent(1.0, size), per_pi);
        return z < 0 ? beyond : detail::held(1.0 - beyond);
    }
    [[nodiscard]] static constexpr double standard_quantile(double p) noexcept {
        const double nearer = p < 0.5 ? p : detail::held(1.0 - p); // exact
        constexpr double pi = 0x1.921fb54442d18p1;
        double size = 0;
        if (nearer < 0x1p-400) { // the cotangent is 1 / angle
            size = detail::held(1.0 / detail::product(pi, nearer));
        } else {
            const detail::sine_and_cosine half_turns =
                detail::sine_cosine(detail::held(0.5 * nearer));
            size = detail::held(half_turns.cosine / half_turns.sine);
        }
        return p < 0.5 ? -size : size;
    }

private:
    /// A normal in (0, 2^-8).
    template <random_words G>
    [[gnu::noinline]] static constexpr double near_zero(G& g) {
        for (int trial = 0; trial < detail::ziggurat_trials; ++trial) {
            const double beyond = detail::standard_exponential(g);
            const double z = detail::held(0x1p-8 * detail::natural_exp(-beyond)); // uniform
            const double wait = detail::standard_exponential(g);
            if (wait > (real(0.5) * z * z).value) {
                return z;
            }
        }
        detail::stuck("cauchy");
    }
};

} // namespace leat

#endif
