// The chi-squared law with k degrees of freedom: the sum of k squared standard normals; k need not
// be whole. Statistics of fit, sample variances.
//
// Domain: k finite and > 0; anything else throws invalid_parameter. A draw is twice a gamma variate
// of shape k/2 and consumes, on average, 1.02 word64 for k = 1, 1.03 for 2, 2.05 for 3, 2.06 for 4,
// at most 2.2 from there on, and 3.2 below 2 (k = 1 apart). Throws engine_stuck as `gamma` does.
// Results out of range are given as the smallest normal (most draws are, for tiny k) and the
// largest finite number. A float is computed as a double and rounded.
// Source: detail/unit_gamma.hpp; Marsaglia and Tsang, ACM TOMS 26(3), 2000.
// Not for its square root with k = 2 or 3 (rayleigh, maxwell are faster).

#ifndef LEAT_DISTRIBUTIONS_CHI_SQUARED_HPP
#define LEAT_DISTRIBUTIONS_CHI_SQUARED_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/distributions/detail/unit_gamma.hpp"
#include "leat/distributions/gamma.hpp"

#include <limits>

namespace leat {

template <detail::portable_real Real>
class chi_squared;

/// The parameter of `chi_squared`.
template <detail::portable_real Real = double>
struct chi_squared_parameters {
    using distribution_type = chi_squared<Real>;
    static constexpr const char* law_name = "chi_squared";

    Real k = 1; ///< degrees of freedom, > 0

    /// What is wrong with it, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        return detail::unless_positive("k", static_cast<double>(k));
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("k", self.k);
    }
    friend constexpr bool operator==(const chi_squared_parameters&,
                                     const chi_squared_parameters&) = default;
};

/// The chi-squared law.
template <detail::portable_real Real = double>
class chi_squared : public detail::law<chi_squared<Real>, chi_squared_parameters<Real>> {
    using base = detail::law<chi_squared, chi_squared_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// One degree of freedom.
    constexpr chi_squared() : chi_squared(param_type{}) {}
    constexpr explicit chi_squared(detail::number auto k)
        : chi_squared(param_type{static_cast<Real>(k)}) {}
    constexpr explicit chi_squared(const param_type& p)
        : base(p),
          gamma_((detail::split(static_cast<double>(p.k)) * detail::scaled{1, -1}).value()),
          unit_(p.k < 2 ? 2.0 : static_cast<double>(p.k)) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        const detail::gamma_pieces x = gamma_(g);
        if (x.drop == 0) [[likely]] {
            return detail::into_positive<Real>((real(x.factor) * unit_).value);
        }
        const detail::scaled product =
            detail::split((real(x.factor) * 2.0).value) * detail::exp_scaled(-x.drop);
        return detail::into_positive<Real>(product.value());
    }

    [[nodiscard]] constexpr Real k() const noexcept { return this->param().k; }
    /// k.
    [[nodiscard]] constexpr double mean() const noexcept { return static_cast<double>(k()); }
    /// 2 k; where that passes the range of double, its largest finite number.
    [[nodiscard]] constexpr double variance() const noexcept {
        return (detail::split(mean()) * detail::scaled{1, 1}).value();
    }
    [[nodiscard]] static constexpr Real min() noexcept { return std::numeric_limits<Real>::min(); }
    [[nodiscard]] static constexpr Real max() noexcept { return std::numeric_limits<Real>::max(); }

    /// The probability density at x. The cumulative chance and the quantile need the incomplete
    /// gamma function: distributions/with_boost_math.hpp has them.
    [[nodiscard]] constexpr double density(double x) const {
        if (!(detail::number_or_refuse(param_type::law_name, x) > 0) || !detail::finite(x)) {
            return 0;
        }
        const double half = (detail::split(mean()) * detail::scaled{1, -1}).value();
        return detail::or_zero(detail::gamma_density(half, 2, x));
    }

private:
    detail::unit_gamma gamma_; // of shape k / 2
    double unit_;              // of twice its variate
};

} // namespace leat

#endif
