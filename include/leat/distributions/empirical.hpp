// The empirical law of a list of values: each is drawn with the same chance; measured service
// times, bootstrap samples.
//
//   leat::empirical service({3.2, 4.1, 2.7, 3.2});      double x = service(g);
//
// Domain: 1 value or more, each finite; anything else throws invalid_parameter, which names the
// entry. A value that occurs k times is drawn k times as often. The law holds the values in
// ascending order, so `param()` has them so too, whatever their order was. A draw is
// values[below(n)]: one word32 or word64 (see uniform_integer.hpp), in constant time, and the law
// is exact. Constructing takes n log n, moments and `cumulative` and `quantile` at most n. Source:
// by its definition (B. Efron, Bootstrap methods, Ann. Statist. 7(1), 1979). Not for values with
// weights (categorical, as an index), nor for a smooth density through them (piecewise_linear).

#ifndef LEAT_DISTRIBUTIONS_EMPIRICAL_HPP
#define LEAT_DISTRIBUTIONS_EMPIRICAL_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/scaled.hpp"
#include "leat/distributions/detail/ascending.hpp"
#include "leat/distributions/detail/evaluate.hpp"
#include "leat/distributions/detail/into_range.hpp"
#include "leat/distributions/detail/law.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <cstddef>
#include <cstdint>
#include <span>
#include <utility> // move
#include <vector>

namespace leat {

template <detail::portable_real Real>
class empirical;

/// The parameters of `empirical`.
template <detail::portable_real Real = double>
struct empirical_parameters {
    using distribution_type = empirical<Real>;
    static constexpr const char* law_name = "empirical";

    std::vector<Real> values{0}; ///< what was observed, in any order; finite

    /// What is wrong with them, if anything.
    [[nodiscard]] constexpr detail::fault fault() const noexcept {
        if (values.empty()) {
            return {"size of values", 0, "must be at least 1"};
        }
        for (std::size_t i = 0; i < values.size(); ++i) {
            const auto value = static_cast<double>(values[i]);
            if (!detail::finite(value)) {
                return {"values", value, "must be finite", i};
            }
        }
        return {};
    }
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("values", self.values);
    }
    friend bool operator==(const empirical_parameters&, const empirical_parameters&) = default;
};

/// The empirical law.
template <detail::portable_real Real = double>
class empirical : public detail::law<empirical<Real>, empirical_parameters<Real>> {
    using base = detail::law<empirical, empirical_parameters<Real>>;
    using real = detail::strict<double>;

public:
    using result_type = Real;
    using typename base::param_type;

    /// One value: always 0.
    constexpr empirical() : empirical(param_type{}) {}
    constexpr explicit empirical(std::vector<Real> values)
        : empirical(param_type{std::move(values)}) {}
    constexpr explicit empirical(const param_type& p) : base(in_order(p)) {}

    using base::operator();
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr Real operator()(G& g) const {
        return values()[static_cast<std::size_t>(below(std::uint64_t{values().size()}, g))];
    }

    /// In ascending order.
    [[nodiscard]] constexpr const std::vector<Real>& values() const noexcept {
        return this->param().values;
    }
    /// The mean of the values.
    [[nodiscard]] constexpr double mean() const noexcept {
        const detail::scaled unit = largest();
        return unit.exponent == 0 && unit.factor == 0 ? 0.0 : signed_product(mean_in(unit), unit);
    }
    /// The mean square distance of the values from their mean. Saturates at the ends of double's
    /// range.
    [[nodiscard]] constexpr double variance() const noexcept {
        if (min() == max()) {
            return 0;
        }
        const detail::scaled unit = largest();
        const real centre = mean_in(unit);
        real sum = 0.0;
        for (const Real value : values()) {
            const real distance = real(in_units(value, unit)) - centre;
            if (detail::magnitude(distance.value) > 0x1p-400) { // its square is no subnormal number
                sum = sum + distance * distance;
            }
        }
        const real mean_square = sum / static_cast<double>(values().size());
        return (detail::split(mean_square.value) * unit * unit).value();
    }
    [[nodiscard]] constexpr Real min() const noexcept { return values().front(); }
    [[nodiscard]] constexpr Real max() const noexcept { return values().back(); }

    /// The chance of x: the share of values that equal it.
    [[nodiscard]] constexpr double probability(double x) const {
        const double at = detail::number_or_refuse(param_type::law_name, x);
        std::size_t count = 0;
        for (const Real value : values()) {
            count += static_cast<std::size_t>(static_cast<double>(value) == at);
        }
        return share(count);
    }
    /// P(X <= x): the share of values up to x.
    [[nodiscard]] constexpr double cumulative(double x) const {
        const double at = detail::number_or_refuse(param_type::law_name, x);
        std::size_t count = 0;
        while (count < values().size() && static_cast<double>(values()[count]) <= at) {
            ++count;
        }
        return share(count);
    }
    /// The smallest value with cumulative(value) >= p, 0 < p < 1.
    [[nodiscard]] constexpr double quantile(double p) const {
        const double chance = detail::chance_or_refuse(param_type::law_name, p);
        std::size_t count = 1;
        while (share(count) < chance) {
            ++count;
        }
        return static_cast<double>(values()[count - 1]);
    }

private:
    static constexpr param_type in_order(param_type p) {
        if (p.fault().parameter == nullptr) {
            detail::sort_ascending(std::span<Real>(p.values));
        }
        return p;
    }
    constexpr double share(std::size_t count) const noexcept {
        return detail::held(static_cast<double>(count) / static_cast<double>(values().size()));
    }
    /// The power of two at or below the largest size: sums in units of it cannot overflow.
    constexpr detail::scaled largest() const noexcept {
        const double low = detail::magnitude(static_cast<double>(min()));
        const double high = detail::magnitude(static_cast<double>(max()));
        const double size = low > high ? low : high;
        return size == 0 ? detail::scaled{0, 0} : detail::scaled{1.0, detail::split(size).exponent};
    }
    static constexpr double in_units(Real value, detail::scaled unit) noexcept {
        const auto x = static_cast<double>(value);
        return x == 0 ? 0.0 : signed_product(x, detail::inverse(unit));
    }
    static constexpr double signed_product(double x, detail::scaled factor) noexcept {
        const double size = detail::magnitude(x);
        const double result = size == 0 ? 0.0 : detail::or_zero(detail::split(size) * factor);
        return x < 0 ? -result : result;
    }
    constexpr double mean_in(detail::scaled unit) const noexcept {
        real sum = 0.0;
        for (const Real value : values()) {
            sum = sum + in_units(value, unit);
        }
        return (sum / static_cast<double>(values().size())).value;
    }
};

empirical(std::vector<double>)->empirical<>;

} // namespace leat

#endif
