// Fisher's F law with d1 and d2 degrees of freedom: (X1 / d1) / (X2 / d2), chi-squared variates
// over their degrees; ratios of sample variances. The degrees need not be whole.
//
// Domain: d1 and d2 finite and >= 1e-300 (below, the logarithms of the variates themselves pass the
// range of double); anything else throws invalid_parameter. A draw consumes what X1, then X2 do:
// see `chi_squared`; from 2.04 word64 on average (d1 = d2 = 1) to 6.4. Throws engine_stuck as
// `gamma` does. X1 / X2 is taken in logarithms where a degree is below 2, so that only an end
// result out of range saturates, at the smallest normal and the largest finite number. A float is
// computed as a double and rounded.
// Source: by definition; N. L. Johnson, S. Kotz and N. Balakrishnan, Continuous Univariate
// Distributions 2, 2nd ed. 1995, ch. 27; X: detail/unit_gamma.hpp.
// Not for the share X1 / (X1 + X2) (beta).

#ifndef LEAT_DISTRIBUTIONS_FISHER_F_HPP
#define LEAT_DISTRIBUTIONS_FISHER_F_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/beta_density.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/unit_gamma.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class fisher_f;

/// The parameters of `fisher_f`.
template <detail::portable_real Real = double>
struct fisher_f_parameters {
    using distribution_type = fisher_f<Real>;
    static constexpr const char* law_name = "fisher_f";

    Real d1 = 1; ///< degrees of freedom above the line, at least 1e-300
    Real d2 = 1; ///< and below it, at least 1e-300

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::first_of(unless_enough("d1", static_cast<double>(d1)),
                                unless_enough("d2", static_cast<double>(d2)));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("d1", self.d1);
        visit("d2", self.d2);
    }
    friend constexpr bool operator==(const fisher_f_parameters&,
                                     const fisher_f_parameters&) = default;

private:
    static constexpr detail::fault unless_enough(const char* parameter, double x) noexcept {
        return detail::finite(x) && x >= 1e-300
                   ? detail::fault{}
                   : detail::fault{parameter, x, "must be finite and >= 1e-300"};
    }
};

/// Fisher's F law.
template <detail::portable_real Real = double>
class fisher_f : public detail::law<fisher_f<Real>, fisher_f_parameters<Real>> {
    using base = detail::law<fisher_f, fisher_f_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// One degree of freedom each.
    constexpr fisher_f() : fisher_f(param_type{}) {}
    constexpr fisher_f(detail::number auto d1, detail::number auto d2)
        : fisher_f(param_type{static_cast<Real>(d1), static_cast<Real>(d2)}) {}
    constexpr explicit fisher_f(const param_type& p)
        : base(p),
          above_((real(0.5) * static_cast<double>(p.d1)).value),
          below_((real(0.5) * static_cast<double>(p.d2)).value),
          scale_(scale_of(static_cast<double>(p.d1), static_cast<double>(p.d2))),
          plain_scale_(scale_.value()) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const detail::gamma_pieces x1 = above_(g);
        const detail::gamma_pieces x2 = below_(g);
        const real ratio = real(x1.factor) / x2.factor;
        const real drop = real(x2.drop) - x1.drop;
        if (x1.drop == 0 && x2.drop == 0) [[likely]] { // no degree below 2, but 1: 1/2 to 2
            return detail::into_positive<Real>((ratio * plain_scale_).value);
        }
        const detail::scaled x =
            detail::split(ratio.value) * scale_ * detail::exp_scaled(drop.value);
        return detail::into_positive<Real>(x.value());
    }

    [[nodiscard]] constexpr Real d1() const noexcept { return this->param().d1; }
    [[nodiscard]] constexpr Real d2() const noexcept { return this->param().d2; }
    /// d2 / (d2 - 2); infinite for d2 <= 2.
    [[nodiscard]] constexpr double mean() const noexcept {
        const real d = static_cast<double>(d2());
        return d.value > 2 ? (d / (d - 2.0)).value : std::numeric_limits<double>::infinity();
    }
    /// 2 mean^2 (d1 + d2 - 2) / (d1 (d2 - 4)); infinite for 2 < d2 <= 4, NaN for d2 <= 2.
    /// Saturates.
    [[nodiscard]] constexpr double variance() const noexcept {
        const real d = static_cast<double>(d2());
        if (!(d.value > 4)) {
            return d.value > 2 ? std::numeric_limits<double>::infinity()
                               : std::numeric_limits<double>::quiet_NaN();
        }
        const real rest = d - 4.0;
        const real sum = real(1.0) / rest + ((d - 2.0) / rest) / static_cast<double>(d1());
        return detail::into_positive<double>((sum * 2.0 * mean() * mean()).value);
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x. The cumulative chance and the quantile need the incomplete
    /// beta function: distributions/with_boost_math.hpp has them.
    [[nodiscard]] constexpr double density(double x) const {
        if (!(detail::number_or_refuse(param_type::law_name, x) > 0) || !detail::finite(x)) {
            return 0;
        }
        const auto a = static_cast<double>(d1());
        const auto b = static_cast<double>(d2());
        const real odds = // d1 x / d2
            (detail::split(a) * detail::split(x) * detail::inverse(detail::split(b))).value();
        const real u = odds < 1.0 ? odds / (odds + 1.0) : real(1.0) / (real(1.0) / odds + 1.0);
        const double v = detail::into_positive<double>((real(1.0) / (odds + 1.0)).value);
        const detail::scaled kernel =
            detail::beta_kernel((real(0.5) * a).value, (real(0.5) * b).value, u.value, v);
        return detail::or_zero(kernel * detail::inverse(detail::split(x)));
    }

private:
    /// The units of the two variates, each over half its degrees: 1 where those are 2 or more.
    static constexpr detail::scaled scale_of(double d1, double d2) noexcept {
        detail::scaled x{1, 0};
        if (d2 < 2) {
            x = detail::split(d2) * detail::scaled{1, -1};
        }
        if (d1 < 2) {
            const detail::scaled half = detail::split(d1) * detail::scaled{1, -1};
            x = {detail::held(x.factor / half.factor), x.exponent - half.exponent};
        }
        return x;
    }

    detail::unit_gamma above_; // of shape d1 / 2
    detail::unit_gamma below_; // of shape d2 / 2
    detail::scaled scale_;
    double plain_scale_;
};

} // namespace leat

#endif
