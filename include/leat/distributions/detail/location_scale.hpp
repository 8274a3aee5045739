// What the laws with a location and a scale have in common: X = location + scale Z, Z of the
// standard law.
//
// A law `L` derives from `location_scale<L, P>`, where P is as law.hpp asks, with the fields
// `location` and `scale`, and gives as public static members
//     template <random_words G> double standard(G&);      a draw of the standard law
//     scaled standard_density(double z);                  its density at a finite z
//     double standard_cumulative(double z);               P(Z <= z) at a finite z
//     double standard_quantile(double p);                 the inverse of that, 0 < p < 1
// The draw is computed in double; one that passes the range is given as the nearest end of it.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_LOCATION_SCALE_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_LOCATION_SCALE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"

#include <limits>

namespace leat::detail {

/// The fault of a location and a scale.
constexpr fault location_scale_fault(double location, double scale) noexcept {
    return first_of(unless_finite("location", location), unless_positive("scale", scale));
}

/// The common base of laws that are location + scale * a standard law.
template <class Law, class Parameters>
class location_scale : public law<Law, Parameters> {
    using base = law<Law, Parameters>;

public:
    using result_type = decltype(Parameters::location);

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr result_type operator()(G& g) const {
        return from_standard(Law::standard(g));
    }

    [[nodiscard]] constexpr result_type location() const noexcept { return this->param().location; }
    [[nodiscard]] constexpr result_type scale() const noexcept { return this->param().scale; }
    [[nodiscard]] static constexpr result_type min() noexcept {
        return std::numeric_limits<result_type>::lowest();
    }
    [[nodiscard]] static constexpr result_type max() noexcept {
        return std::numeric_limits<result_type>::max();
    }

    /// The probability density at x.
    [[nodiscard]] constexpr double density(double x) const {
        const double z = standard_place(x);
        return finite(z) ? or_zero(Law::standard_density(z) * inverse(split(scale_()))) : 0.0;
    }
    /// P(X <= x).
    [[nodiscard]] constexpr double cumulative(double x) const {
        const double z = standard_place(x);
        return finite(z) ? Law::standard_cumulative(z) : z < 0 ? 0.0 : 1.0;
    }
    /// The x with cumulative(x) = p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double z = Law::standard_quantile(chance_or_refuse(Parameters::law_name, p));
        return kept_normal((strict<double>(scale_()) * z + location_()).value);
    }

protected:
    using base::base;

    [[gnu::always_inline]] constexpr result_type from_standard(double z) const noexcept {
        return into_signed<result_type>(
            (strict<double>(location_()) + strict<double>(scale_()) * z).value);
    }
    constexpr double location_() const noexcept { return static_cast<double>(location()); }
    constexpr double scale_() const noexcept { return static_cast<double>(scale()); }
    /// `factor` scale^2.
    constexpr double times_square_of_scale(double factor) const noexcept {
        return (split(factor) * split(scale_()) * split(scale_())).value();
    }

private:
    constexpr double standard_place(double x) const {
        return standardised(number_or_refuse(Parameters::law_name, x), location_(), scale_());
    }
};

} // namespace leat::detail

#endif
