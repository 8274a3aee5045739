// The angle between the axis of a cap, or of a cone of directions, and its rim.

#ifndef LEAT_REGIONS_DETAIL_CAP_ANGLE_HPP
#define LEAT_REGIONS_DETAIL_CAP_ANGLE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/regions/detail/turns.hpp"

#include <limits>
#include <type_traits>

namespace leat::detail {

/// Sine, cosine and versine (1 - cosine, without losing the digits of a small angle).
class cap_angle {
public:
    template <portable_real Real>
    constexpr cap_angle(const char* name, Real half_angle) {
        constexpr Real pi_up =
            std::is_same_v<Real, double> ? Real(0x1.921fb54442d19p+1) : Real(0x1.921fb6p+1);
        // So small an angle would leave fewer than 256 steps between neighbouring directions.
        constexpr Real least = 256 * std::numeric_limits<Real>::epsilon();
        if (!(half_angle >= least && half_angle <= pi_up)) {
            refuse(name, "half_angle", half_angle,
                   std::is_same_v<Real, double> ? "must be from 2^-44 to pi (radians)"
                                                : "must be from 2^-15 to pi (radians)");
        }
        const auto whole = sine_cosine(turns_of(double{half_angle}));
        const auto half = sine_cosine(turns_of(0.5 * double{half_angle}));
        sine_ = whole.sine < 0 ? 0 : whole.sine; // pi rounded up
        const strict<double> s = half.sine;
        versine_ = (strict<double>(2) * s * s).value;
        cosine_ = held(1 - versine_);
    }

    [[nodiscard]] constexpr double sine() const noexcept { return sine_; }
    [[nodiscard]] constexpr double cosine() const noexcept { return cosine_; }
    [[nodiscard]] constexpr double versine() const noexcept { return versine_; }

    friend constexpr bool operator==(const cap_angle&, const cap_angle&) = default;

private:
    double sine_ = 0;
    double cosine_ = 0;
    double versine_ = 0;
};

} // namespace leat::detail

#endif
