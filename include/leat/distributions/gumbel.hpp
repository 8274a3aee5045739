// The Gumbel law of largest values with a location and a scale: P(X <= x) = exp(-exp(-z)), z = (x -
// location) / scale; the greatest flood, load or delay of many. The location is the mode.
//
// Domain: location finite, scale finite and > 0; anything else throws invalid_parameter. A draw is
// location - scale ln E, E from the exponential's ziggurat: 1.04 word64 on average, as
// `exponential`. Of an E below 2^-8 (one in 257) only that is kept, and -ln E is drawn again under
// that condition as 8 ln 2 + E', accepted with chance exp(-2^-8 exp(-E')): so the upper tail, which
// E in steps of 2^-53 would end at z = 37, is complete. At most 32 trials of two, then
// engine_stuck. Draws beyond the range are given as the largest finite number of their sign. A
// float is computed as a double and rounded.
// Source: by inversion of the exponential (common practice; N. L. Johnson, S. Kotz and N.
// Balakrishnan, Continuous univariate distributions 2, 1995, ch. 22).
// Not for smallest values: negate the draw of the law with the negated location.

#ifndef LEAT_DISTRIBUTIONS_GUMBEL_HPP
#define LEAT_DISTRIBUTIONS_GUMBEL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/distributions/detail/location_scale.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

namespace leat {

template <detail::portable_real Real>
class gumbel;

/// The parameters of `gumbel`.
template <detail::portable_real Real = double>
struct gumbel_parameters {
    using distribution_type = gumbel<Real>;
    static constexpr const char* law_name = "gumbel";

    Real location = 0; ///< the mode
    Real scale = 1;    ///< > 0

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
    friend constexpr bool operator==(const gumbel_parameters&, const gumbel_parameters&) = default;
};

/// The Gumbel law.
template <detail::portable_real Real = double>
class gumbel : public detail::location_scale<gumbel<Real>, gumbel_parameters<Real>> {
    using base = detail::location_scale<gumbel, gumbel_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using typename base::param_type;

    /// Location 0, scale 1.
    constexpr gumbel() : gumbel(param_type{}) {}
    constexpr gumbel(detail::number auto location, detail::number auto scale)
        : gumbel(param_type{static_cast<Real>(location), static_cast<Real>(scale)}) {}
    constexpr explicit gumbel(const param_type& p) : base(p) {}

    /// location + scale times Euler's constant.
    [[nodiscard]] constexpr double mean() const noexcept {
        constexpr double euler = 0x1.2788cfc6fb619p-1;
        return detail::kept_normal((real(this->location_()) + real(this->scale_()) * euler).value);
    }
    /// pi^2 scale^2 / 6. Saturates at the ends of double's range.
    [[nodiscard]] constexpr double variance() const noexcept {
        return this->times_square_of_scale(0x1.a51a6625307d3p0);
    }

    /// -ln E, with its whole upper tail.
    template <random_words G>
    [[nodiscard]] static constexpr double standard(G& g) {
        const double e = detail::standard_exponential(g);
        return e < 0x1p-8 ? upper_tail(g) : -detail::natural_log(e);
    }
    [[nodiscard]] static constexpr detail::scaled standard_density(double z) noexcept {
        return detail::exp_scaled((-(real(z) + detail::natural_exp(-z))).value);
    }
    [[nodiscard]] static constexpr double standard_cumulative(double z) noexcept {
        return detail::or_zero(detail::exp_scaled(-detail::natural_exp(-z)));
    }
    [[nodiscard]] static constexpr double standard_quantile(double p) noexcept {
        return -detail::natural_log(-detail::natural_log(p));
    }

private:
    /// -ln E of an E below 2^-8.
    template <random_words G>
    [[gnu::noinline]] static constexpr double upper_tail(G& g) {
        for (int trial = 0; trial < detail::ziggurat_trials; ++trial) {
            const double beyond = detail::standard_exponential(g); // uniform: E e^beyond = 2^-8
            const double wait = detail::standard_exponential(g);
            if (wait > detail::held(0x1p-8 * detail::natural_exp(-beyond))) {
                constexpr double bound = 0x1.62e42fefa39efp2; // 8 ln 2
                return (real(bound) + beyond).value;
            }
        }
        detail::stuck("gumbel");
    }
};

} // namespace leat

#endif
