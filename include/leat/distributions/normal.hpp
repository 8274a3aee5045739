// The normal law with a mean and a standard deviation: density exp(-((x - mean)/sd)^2 / 2) /
// (sd sqrt(2 pi)).
//
// Domain: mean finite, sd finite and >= 0 (0: every draw is the mean). Anything else throws
// invalid_parameter. A draw is mean + sd z, z from the 256-layer ziggurat of
// detail/ziggurat.hpp, and consumes 1.02 word64 on average: one in 98.5 % of draws, at most 32
// trials of two (in the tail 64 exponentials), then engine_stuck. The tail is complete: |z| beyond
// 8 comes as often as it should. Results that overflow are given as the largest finite number,
// results below the smallest normal number in size as that number with its sign. A float is
// computed as a double and rounded.
// Source: Marsaglia and Tsang, J. Stat. Software 5(8), 2000.
// Not for correlated values (multivariate_normal), nor for a normal cut to an interval.

#ifndef LEAT_DISTRIBUTIONS_NORMAL_HPP
#define LEAT_DISTRIBUTIONS_NORMAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // two_product
#include "leat/core/error_function.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/normal_quantile.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/ziggurat.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class normal;

/// The parameters of `normal`.
template <detail::portable_real Real = double>
struct normal_parameters {
    using distribution_type = normal<Real>;
    static constexpr const char* law_name = "normal";

    Real mean = 0; ///< finite
    Real sd = 1;   ///< the standard deviation, >= 0

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(detail::unless_finite("mean", static_cast<double>(mean)),
                                detail::unless_non_negative("sd", static_cast<double>(sd)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("mean", self.mean);
        visit("sd", self.sd);
    }
    friend constexpr bool operator==(const normal_parameters&, const normal_parameters&) = default;
};

/// The normal law.
template <detail::portable_real Real = double>
class normal : public detail::law<normal<Real>, normal_parameters<Real>> {
    using base = detail::law<normal, normal_parameters<Real>>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// Mean 0, standard deviation 1.
    constexpr normal() : normal(param_type{}) {}
    constexpr normal(detail::number auto mean, detail::number auto sd)
        : normal(param_type{static_cast<Real>(mean), static_cast<Real>(sd)}) {}
    constexpr explicit normal(const param_type& p) : base(p) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard, gnu::always_inline]] constexpr Real operator()(G& g) const {
        return from_standard(detail::standard_normal(g));
    }
    /// For fills: the draw whose first 64-bit word is `word`, where that is accepted at once.
    [[gnu::always_inline]] constexpr bool from_word(std::uint64_t word, Real& x) const noexcept {
        double z = 0;
        const bool accepted = detail::normal_at_once(word, z);
        x = from_standard(z);
        return accepted;
    }

    [[nodiscard]] constexpr Real sd() const noexcept { return this->param().sd; }
    /// The expectation: the parameter of that name.
    [[nodiscard]] constexpr double mean() const noexcept { return mean_(); }
    /// sd^2; where that passes the range of double, its largest finite number.
    [[nodiscard]] constexpr double variance() const noexcept {
        if (sd() == 0) {
            return 0;
        }
        const detail::scaled sd = detail::split(sd_());
        return (sd * sd).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept {
        return std::numeric_limits<Real>::lowest();
    }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x; of sd 0 the largest finite number at the mean.
    [[nodiscard]] constexpr double density(double x) const {
        if (sd() == 0) {
            return detail::number_or_refuse(param_type::law_name, x) == mean_()
                       ? std::numeric_limits<double>::max()
                       : 0.0;
        }
        const double z = standard_place(x);
        if (!(detail::magnitude(z) < 0x1p300)) {
            return 0;
        }
        constexpr detail::scaled root{0x1.9884533d43651p-2, 0}; // 1 / sqrt(2 pi)
        return detail::or_zero(root * detail::standard_bell(z) *
                               detail::inverse(detail::split(sd_())));
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (sd() == 0) {
            return detail::number_or_refuse(param_type::law_name, x) < mean_() ? 0 : 1;
        }
        return detail::normal_below(standard_place(x));
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        using real = detail::strict<double>;
        const double z = detail::normal_quantile(detail::chance_or_refuse(param_type::law_name, p));
        return sd() == 0 ? mean_() : detail::kept_normal((real(mean_()) + real(sd_()) * z).value);
    }

private:
    [[gnu::always_inline]] constexpr Real from_standard(double z) const noexcept {
        using real = detail::strict<double>;
        const double x = (real(mean_()) + real(sd_()) * z).value;
        return sd() == 0 ? this->param().mean : detail::into_signed<Real>(x);
    }
    constexpr double standard_place(double x) const {
        return detail::standardised(detail::number_or_refuse(param_type::law_name, x), mean_(),
                                    sd_());
    }
    constexpr double mean_() const noexcept { return static_cast<double>(this->param().mean); }
    constexpr double sd_() const noexcept { return static_cast<double>(this->param().sd); }
};

} // namespace leat

#endif
