// What ellipse and ellipse_by_rejection share: the shape itself, without a sampler.

#ifndef LEAT_REGIONS_DETAIL_ELLIPTIC_REGION_HPP
#define LEAT_REGIONS_DETAIL_ELLIPTIC_REGION_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/bounds.hpp"
#include "leat/regions/detail/extent.hpp"

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat::detail {

/// An ellipse in the plane, its first axis turned by an angle from the x axis.
template <portable_real Real>
class elliptic_region {
public:
    using real_type = Real;
    using point_type = std::array<Real, 2>;
    using bounds_type = region_bounds<Real, 2>;
    static constexpr std::size_t dimension = 2;

    /// Whether p is in the ellipse, its edge included: it lies within bounds(), and the squares of
    /// its two coordinates along the axes, over the semi-axes, add up to at most 1, every operation
    /// rounded. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        const strict dx = strict(p[0]) - centre_[0];
        const strict dy = strict(p[1]) - centre_[1];
        const strict x = (dx * cosine_ + dy * sine_) * scale_[0] * inverse_[0];
        const strict y = (dy * cosine_ - dx * sine_) * scale_[1] * inverse_[1];
        return x * x + y * y <= strict(1) && bounds_.contains(p);
    }

    /// The area, rounded; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept { return pi_times(semi_[0], semi_[1]); }

    [[nodiscard]] constexpr bounds_type bounds() const noexcept { return bounds_; }
    [[nodiscard]] constexpr point_type centre() const noexcept { return centre_; }
    /// The first semi-axis.
    [[nodiscard]] constexpr Real semi_x() const noexcept { return semi_[0]; }
    /// The second semi-axis.
    [[nodiscard]] constexpr Real semi_y() const noexcept { return semi_[1]; }
    /// The angle from the x axis to the first semi-axis, counter-clockwise, in radians.
    [[nodiscard]] constexpr Real rotation() const noexcept { return rotation_; }

    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "semi_x", "semi_y", "rotation"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(centre_, semi_[0], semi_[1], rotation_);
    }

    friend constexpr bool operator==(const elliptic_region&, const elliptic_region&) = default;

protected:
    using strict = detail::strict<Real>;

    constexpr elliptic_region(const char* name, const point_type& centre, Real semi_x, Real semi_y,
                              Real rotation)
        : centre_(centre), semi_{semi_x, semi_y}, rotation_(rotation) {
        for (const Real c : centre_) {
            if (!is_finite(c)) {
                refuse(name, "centre", c, "must be finite");
            }
        }
        for (std::size_t i = 0; i < 2; ++i) {
            if (!is_size(semi_[i])) {
                refuse(name, parameter(i), semi_[i], size_allowed<Real>);
            }
            scale_[i] = power_of_two<Real>(1 - exponent_of(semi_[i]));
            inverse_[i] = (strict(1) / (strict(semi_[i]) * scale_[i])).value;
        }
        if (!(rotation_ >= -1000 && rotation_ <= 1000)) {
            refuse(name, "rotation", rotation_, "must be from -1000 to 1000 (radians)");
        }
        turn();
        find_half_widths();
        for (std::size_t i = 0; i < 2; ++i) {
            bounds_.low[i] = (strict(centre_[i]) - half_width_[i]).value;
            bounds_.high[i] = (strict(centre_[i]) + half_width_[i]).value;
        }
        for (std::size_t i = 0; i < 2; ++i) {
            require_resolution(name, i, i);
            if (rotation_ != 0) { // each axis then shows in both coordinates
                require_resolution(name, i, 1 - i);
            }
        }
        doubt_ = find_doubt();
    }

    point_type centre_;
    std::array<Real, 2> semi_;
    Real rotation_;
    Real cosine_ = 1;
    Real sine_ = 0;
    std::array<Real, 2> half_width_{}; // of the box around the turned ellipse
    std::uint64_t doubt_ = 0; // for a square_trial: within this of the circle, contains() decides

private:
    static constexpr const char* parameter(std::size_t i) noexcept {
        return i == 0 ? "semi_x" : "semi_y";
    }

    constexpr void turn() noexcept {
        constexpr double turns_per_radian = 0x1.45f306dc9c883p-3; // 1 / (2 pi), rounded
        const double turns = (detail::strict<double>(double{rotation_}) * turns_per_radian).value;
        // A smaller angle moves no point of an ellipse that passes require_resolution.
        if (exponent_of(turns) >= -100) {
            const auto [sine, cosine] = sine_cosine(turns);
            sine_ = held(static_cast<Real>(sine));
            cosine_ = held(static_cast<Real>(cosine));
        }
    }

    // Half the width of the turned ellipse: the root of (a cos)^2 + (b sin)^2, and for the height
    // of (a sin)^2 + (b cos)^2. Scaled, so that no square leaves the range.
    constexpr void find_half_widths() noexcept {
        half_width_ = semi_;
        if (rotation_ == 0) {
            return;
        }
        using wide = detail::strict<double>;
        const scaled a = split(double{semi_[0]});
        const scaled b = split(double{semi_[1]});
        const std::int64_t e = a.exponent > b.exponent ? a.exponent : b.exponent;
        const wide along = scaled{a.factor, a.exponent - e}.value();
        const wide across = scaled{b.factor, b.exponent - e}.value();
        for (std::size_t i = 0; i < 2; ++i) {
            const wide first = along * double{i == 0 ? cosine_ : sine_};
            const wide second = across * double{i == 0 ? sine_ : cosine_};
            const double half = square_root((first * first + second * second).value);
            half_width_[i] = held(static_cast<Real>(scaled{half, e}.value()));
        }
    }

    constexpr void require_resolution(const char* name, std::size_t axis,
                                      std::size_t coordinate) const {
        for (const Real edge : {bounds_.low[coordinate], bounds_.high[coordinate]}) {
            if (!is_finite(edge)) {
                refuse(name, parameter(axis), semi_[axis], "must leave the region's edge finite");
            }
            if (!resolves(semi_[axis], edge)) {
                refuse(name, parameter(axis), semi_[axis], resolution_needed);
            }
        }
    }

    [[nodiscard]] constexpr std::uint64_t find_doubt() const noexcept {
        const auto edge = [this](std::size_t i) {
            return largest_exponent({bounds_.low[i], bounds_.high[i]});
        };
        if (rotation_ == 0) {
            const std::uint64_t x = doubtful_norms(semi_[0], edge(0));
            const std::uint64_t y = doubtful_norms(semi_[1], edge(1));
            return x > y ? x : y;
        }
        return doubtful_norms(semi_[0] < semi_[1] ? semi_[0] : semi_[1],
                              edge(0) > edge(1) ? edge(0) : edge(1));
    }

    std::array<Real, 2> scale_{};   // powers of two that bring the semi-axes into [2, 4)
    std::array<Real, 2> inverse_{}; // one over the scaled semi-axes
    bounds_type bounds_{};
};

} // namespace leat::detail

#endif
