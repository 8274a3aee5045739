// The Laplace law with a location and a scale: density exp(-|x - location| / scale) / (2 scale);
// errors with heavier tails than a normal's, the difference of two waiting times.
//
// Domain: location finite, scale finite and > 0; anything else throws invalid_parameter. A draw is
// location +- scale E, E and the sign from one word of the exponential's ziggurat, whose bit 8 is
// free: 1.03 word64 on average, as `exponential`, and as there the tails are complete. Draws beyond
// the range are given as the largest finite number of their sign. A float is computed as a double
// and rounded.
// Source: by its definition (common practice; N. L. Johnson, S. Kotz and N. Balakrishnan,
// Continuous univariate distributions 2, 1995, ch. 24).
// Not for one-sided waits (exponential).

#ifndef LEAT_DISTRIBUTIONS_LAPLACE_HPP
#define LEAT_DISTRIBUTIONS_LAPLACE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/distributions/detail/location_scale.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/uniform/words.hpp"

#include <cstdint>

namespace leat {

template <detail::portable_real Real>
class laplace;

/// The parameters of `laplace`.
template <detail::portable_real Real = double>
struct laplace_parameters {
    using distribution_type = laplace<Real>;
    static constexpr const char* law_name = "laplace";

    Real location = 0; ///< the mean
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
    friend constexpr bool operator==(const laplace_parameters&,
                                     const laplace_parameters&) = default;
};

/// The Laplace law.
template <detail::portable_real Real = double>
class laplace : public detail::location_scale<laplace<Real>, laplace_parameters<Real>> {
    using base = detail::location_scale<laplace, laplace_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using typename base::param_type;

    /// Location 0, scale 1.
    constexpr laplace() : laplace(param_type{}) {}
    constexpr laplace(detail::number auto location, detail::number auto scale)
        : laplace(param_type{static_cast<Real>(location), static_cast<Real>(scale)}) {}
    constexpr explicit laplace(const param_type& p) : base(p) {}

    /// For fills: the draw whose first 64-bit word is `word`, where that is accepted at once.
    [[gnu::always_inline]] constexpr bool from_word(std::uint64_t word, Real& x) const noexcept {
        double e = 0;
        const bool accepted = detail::exponential_at_once(word, e);
        x = this->from_standard(detail::with_sign_of(word, e));
        return accepted;
    }

    /// The expectation: the location.
    [[nodiscard]] constexpr double mean() const noexcept { return this->location_(); }
    /// 2 scale^2. Saturates at the ends of double's range.
    [[nodiscard]] constexpr double variance() const noexcept {
        return this->times_square_of_scale(2);
    }

    /// An exponential with a sign.
    template <random_words G>
    [[nodiscard, gnu::always_inline]] static constexpr double standard(G& g) {
        const std::uint64_t word = word64(g);
        double e = 0;
        if (!detail::exponential_at_once(word, e)) [[unlikely]] {
            e = detail::standard_exponential_rest(g, word);
        }
        return detail::with_sign_of(word, e);
    }
    [[nodiscard]] static constexpr detail::scaled standard_density(double z) noexcept {
        return detail::exp_scaled(-detail::magnitude(z)) * detail::scaled{1.0, -1};
    }
    [[nodiscard]] static constexpr double standard_cumulative(double z) noexcept {
        const double beyond = detail::or_zero(standard_density(z));
        return z < 0 ? beyond : detail::held(1.0 - beyond);
    }
    [[nodiscard]] static constexpr double standard_quantile(double p) noexcept {
        return p < 0.5 ? detail::natural_log(detail::held(2.0 * p))
                       : -detail::natural_log((real(2.0) * (real(1.0) - p)).value);
    }
};

} // namespace leat

#endif
