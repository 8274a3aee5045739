// The triangular law on (lo, hi) with a mode: a density that rises in a straight line from 0 at lo
// to its peak at the mode and falls to 0 at hi; expert judgements of least, likeliest and most.
//
// Domain: finite, lo <= mode <= hi, hi - lo finite and at least 2^-960 (2^-100 for float), with a
// number between them; anything else throws invalid_parameter. A draw is by inversion of one open
// unit uniform u (one word64, nothing is rejected), and grows with u: lo + w sqrt(u l / w), where u
// is below l / w, else hi - w sqrt((1 - u) r / w), with l, r, w the parts below and above the mode
// and the whole. No draw is lo or hi. A float is computed as a double and rounded.
// Source: by inversion (common practice; N. L. Johnson, S. Kotz and N. Balakrishnan, Continuous
// univariate distributions 2, 1995, 26.9).
// Not where the ends themselves are uncertain, nor for a smooth peak (beta).

#ifndef LEAT_DISTRIBUTIONS_TRIANGULAR_HPP
#define LEAT_DISTRIBUTIONS_TRIANGULAR_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/detail/interval_map.hpp" // next_up
#include "leat/uniform/unit.hpp"

#include <cstdint>
#include <limits>

namespace leat {

template <detail::portable_real Real>
class triangular;

/// The parameters of `triangular`.
template <detail::portable_real Real = double>
struct triangular_parameters {
    using distribution_type = triangular<Real>;
    static constexpr const char* law_name = "triangular";

    Real lo = 0;             ///< the least value
    Real mode = Real{1} / 2; ///< the likeliest, lo to hi
    Real hi = 1;             ///< the greatest, above lo

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        const auto low = static_cast<double>(lo);
        const auto middle = static_cast<double>(mode);
        const auto high = static_cast<double>(hi);
        if (!detail::finite(low)) {
            return {"lo", low, "must be finite"};
        }
        constexpr double least = std::numeric_limits<Real>::digits > 24 ? 0x1p-960 : 0x1p-100;
        const double width = detail::held(high - low);
        if (!detail::finite(high) || !detail::finite(width) || !(width >= least) ||
            !(detail::next_up(lo) < hi)) {
            return {"hi", high,
                    "must be finite and above lo, by at least 2^-960 (float 2^-100), with a number "
                    "between, and by no more than the largest finite number"};
        }
        if (!(low <= middle && middle <= high)) {
            return {"mode", middle, "must be between lo and hi"};
        }
        return {};
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("lo", self.lo);
        visit("mode", self.mode);
        visit("hi", self.hi);
    }
    friend constexpr bool operator==(const triangular_parameters&,
                                     const triangular_parameters&) = default;
};

/// The triangular law.
template <detail::portable_real Real = double>
class triangular : public detail::law<triangular<Real>, triangular_parameters<Real>> {
    using base = detail::law<triangular, triangular_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// On (0, 1) with the mode in the middle.
    constexpr triangular() : triangular(param_type{}) {}
    constexpr triangular(detail::number auto lo, detail::number auto mode, detail::number auto hi)
        : triangular(
              param_type{static_cast<Real>(lo), static_cast<Real>(mode), static_cast<Real>(hi)}) {}
    constexpr explicit triangular(const param_type& p)
        : base(p),
          width_((real(hi_()) - lo_()).value),
          rising_(share(static_cast<double>(p.mode), lo_())),
          falling_(share(hi_(), static_cast<double>(p.mode))) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const std::uint64_t word = word64(g);
        return inside<Real>(at(detail::open_unit(word)));
    }

    [[nodiscard]] constexpr Real lo() const noexcept { return this->param().lo; }
    [[nodiscard]] constexpr Real mode() const noexcept { return this->param().mode; }
    [[nodiscard]] constexpr Real hi() const noexcept { return this->param().hi; }
    /// (lo + mode + hi) / 3.
    [[nodiscard]] constexpr double mean() const noexcept {
        const real third = real(width_) / 3.0;
        return (real(lo_()) + third * (real(1.0) + rising_)).value;
    }
    /// (hi - lo)^2 (1 - c (1 - c)) / 18, c = (mode - lo) / (hi - lo). Saturates at the ends of
    /// double's range.
    [[nodiscard]] constexpr double variance() const noexcept {
        const real factor = (real(1.0) - real(rising_) * falling_) / 18.0;
        const detail::scaled width = detail::split(width_);
        return (detail::split(factor.value) * width * width).value();
    }
    [[nodiscard]] constexpr Real min() const noexcept { return lo(); }
    [[nodiscard]] constexpr Real max() const noexcept { return hi(); }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        if (!in_support(x)) {
            return 0;
        }
        const double part = x < mode_()   ? (real(share(x, lo_())) / rising_).value
                            : x > mode_() ? (real(share(hi_(), x)) / falling_).value
                                          : 1.0;
        return detail::or_zero(detail::split(detail::held(part + part)) *
                               detail::inverse(detail::split(width_)));
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        if (!in_support(x)) {
            return x <= lo_() ? 0 : 1;
        }
        if (x < mode_()) {
            const real part = share(x, lo_());
            return detail::product(part.value, (part / rising_).value);
        }
        const real beyond = share(x, mode_());
        const double all = (real(rising_) + beyond * (real(2.0) - beyond / falling_)).value;
        return x == mode_() ? rising_ : all < 1 ? all : 1;
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        return inside<double>(at(detail::chance_or_refuse(param_type::law_name, p)));
    }

private:
    /// Where the cumulative chance is u.
    constexpr double at(double u) const noexcept {
        if (u < rising_) {
            return (real(lo_()) + real(width_) * detail::square_root(detail::product(u, rising_)))
                .value;
        }
        const real rest = real(1.0) - u;
        return (real(hi_()) - real(width_) * detail::square_root((rest * falling_).value)).value;
    }
    template <class Result>
    constexpr Result inside(double x) const noexcept {
        const Result first = detail::next_up(static_cast<Result>(lo()));
        const Result last = -detail::next_up(static_cast<Result>(-hi()));
        const Result value = detail::into_signed<Result>(x);
        return value < first ? first : value > last ? last : value;
    }
    constexpr bool in_support(double x) const {
        return detail::number_or_refuse(param_type::law_name, x) > lo_() && x < hi_();
    }
    /// (above - below) / (hi - lo), 0 where that is below the smallest normal number.
    constexpr double share(double above, double below) const noexcept {
        const double part = (real(above) - below).value;
        return part > 0
                   ? detail::or_zero(detail::split(part) * detail::inverse(detail::split(width_)))
                   : 0;
    }
    constexpr double lo_() const noexcept { return static_cast<double>(lo()); }
    constexpr double mode_() const noexcept { return static_cast<double>(mode()); }
    constexpr double hi_() const noexcept { return static_cast<double>(hi()); }

    double width_;
    double rising_;  // the chance of a draw below the mode
    double falling_; // and above
};

} // namespace leat

#endif
