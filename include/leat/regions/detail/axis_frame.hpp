// A right-handed set of perpendicular unit vectors, the third along a given axis.
//
// Source: Duff and others, Building an orthonormal basis, revisited, J. Computer Graphics
// Techniques 6(1), 2017: no root and no division by a small number. Components of the axis below
// 2^-60 of its length count as 0, which moves no point by a rounding.

#ifndef LEAT_REGIONS_DETAIL_AXIS_FRAME_HPP
#define LEAT_REGIONS_DETAIL_AXIS_FRAME_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <array>
#include <cstddef>

namespace leat::detail {

/// The axis and what is perpendicular to it.
class axis_frame {
public:
    using vector = std::array<double, 3>;

    /// Of an axis of any length but 0, the constructor parameter of the region `name`.
    template <portable_real Real>
    constexpr axis_frame(const char* name, const char* parameter,
                         const std::array<Real, 3>& direction)
        : given_{double{direction[0]}, double{direction[1]}, double{direction[2]}} {
        require_point(name, parameter, direction);
        int largest = exponent_of(0.0);
        for (const Real x : direction) {
            const int e = exponent_of(double{x});
            largest = e > largest ? e : largest;
        }
        if (largest < smallest_size_exponent<Real>) {
            refuse(name, parameter, direction[0],
                   std::is_same_v<Real, double>
                       ? "must have a coordinate of at least 2^-960 in size"
                       : "must have a coordinate of at least 2^-100 in size");
        }
        const double scale = power_of_two<double>(largest == 1023 ? -1022 : -largest);
        real square = 0.0;
        for (std::size_t i = 0; i < 3; ++i) {
            const double x = double{direction[i]};
            third_[i] = exponent_of(x) < largest - 60 ? 0 : held(x * scale);
            square = square + real(third_[i]) * third_[i];
        }
        const double length = square_root(square.value);
        for (double& x : third_) {
            x = held(x / length);
        }
        complete();
    }

    /// The vector with these coordinates along the first, the second and the axis.
    [[nodiscard]] constexpr vector at(double x, double y, double z) const noexcept {
        vector v{};
        for (std::size_t i = 0; i < 3; ++i) {
            v[i] = ((real(x) * first_[i] + real(y) * second_[i]) + real(z) * third_[i]).value;
        }
        return v;
    }

    /// The coordinate of v along the axis.
    [[nodiscard]] constexpr double along(const vector& v) const noexcept {
        return ((real(v[0]) * third_[0] + real(v[1]) * third_[1]) + real(v[2]) * third_[2]).value;
    }

    /// The square of the distance of v from the axis: that of its vector product with the axis.
    [[nodiscard]] constexpr double square_across(const vector& v) const noexcept {
        const real x = real(v[1]) * third_[2] - real(v[2]) * third_[1];
        const real y = real(v[2]) * third_[0] - real(v[0]) * third_[2];
        const real z = real(v[0]) * third_[1] - real(v[1]) * third_[0];
        return ((x * x + y * y) + z * z).value;
    }

    [[nodiscard]] constexpr const vector& axis() const noexcept { return third_; }

    /// How far a unit circle about the axis reaches in coordinate i.
    [[nodiscard]] constexpr double reach_across(std::size_t i) const noexcept {
        const real a = third_[(i + 1) % 3];
        const real b = third_[(i + 2) % 3];
        return square_root((a * a + b * b).value);
    }

    /// The axis as the constructor got it, which a saved region shows.
    template <portable_real Real>
    [[nodiscard]] constexpr std::array<Real, 3> given() const noexcept {
        return {static_cast<Real>(given_[0]), static_cast<Real>(given_[1]),
                static_cast<Real>(given_[2])};
    }

    /// Whether the axes are the same, whatever length they were given in.
    friend constexpr bool operator==(const axis_frame& a, const axis_frame& b) noexcept {
        return a.third_ == b.third_;
    }

private:
    using real = strict<double>;

    constexpr void complete() noexcept {
        const real x = third_[0];
        const real y = third_[1];
        const double sign = third_[2] < 0 ? -1 : 1;
        const real a = real(-1) / (real(sign) + third_[2]);
        const real b = x * y * a;
        first_ = {(real(1) + real(sign) * (x * x * a)).value, (real(sign) * b).value,
                  (real(-sign) * x).value};
        second_ = {b.value, (real(sign) + y * y * a).value, (-y).value};
    }

    vector given_;
    vector first_{};
    vector second_{};
    vector third_{};
};

} // namespace leat::detail

#endif
