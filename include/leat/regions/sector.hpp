// The sector: points uniform by area in a slice of a disk, in the plane.
//
//   leat::sector beam{{0, 0}, 40, 0.2, 0.9};      // centre, radius, from, to (radians)
//
// From the angle `from` counter-clockwise to the angle `to`. Method: an exact map, the radius of
// law r^2 as the larger of two uniforms, the angle uniform. Never take a uniform radius.
//
// Words: three word64, float included: two for the radius, one for the angle. Rounding: every point
// drawn is contained. Domain: as disk; from and to from -1000 to 1000, from < to, to - from at most
// 2 pi (rounded up), and the arc at least 256 steps between neighbouring numbers at the edge.
// Errors: invalid_parameter; engine_stuck. Not for the arc itself.

#ifndef LEAT_REGIONS_SECTOR_HPP
#define LEAT_REGIONS_SECTOR_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/turns.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstddef>
#include <type_traits>

namespace leat {

/// The points within `radius` of `centre`, in directions between two angles.
template <detail::portable_real Real = double>
class sector : public detail::region_base<sector<Real>, Real, 2> {
    using base = detail::region_base<sector, Real, 2>;

public:
    using typename base::point_type;

    /// Any arithmetic types; deduced as sector<double>.
    template <detail::arithmetic Size, detail::arithmetic From, detail::arithmetic To>
    constexpr sector(const std::type_identity_t<detail::point_argument<Real, 2>>& centre,
                     Size radius, From from, To to)
        : centre_(centre.value),
          radius_(static_cast<Real>(radius)),
          from_(static_cast<Real>(from)),
          to_(static_cast<Real>(to)) {
        this->bounds_ = detail::cube_about("sector", "radius", radius_, centre_);
        require_angle("from", from_);
        require_angle("to", to_);
        if (!(from_ < to_)) {
            detail::refuse("sector", "to", to_, "must be above from");
        }
        const real width = real(double{to_}) - double{from_};
        if (width > full_angle) {
            detail::refuse("sector", "to - from", width.value, "must be at most 2 pi");
        }
        const auto arc =
            detail::rounded<Real>(width > 1.0 ? real(double{radius_}) : width * double{radius_});
        for (std::size_t i = 0; i < 2; ++i) {
            detail::require_resolution("sector", "radius * (to - from)", arc, this->bounds_, i);
        }
        first_turns_ = detail::turns_of(double{from_});
        width_turns_ = detail::turns_of(width.value);
        full_ = width_turns_ >= 1;
        wide_ = width_turns_ > 0.5;
        first_ = detail::sine_cosine(first_turns_);
        last_ = detail::sine_cosine(detail::turns_of(double{to_}));
        scale_ = detail::scale_of(radius_);
        const real scaled = real(double{radius_}) * scale_;
        limit_ = (scaled * scaled).value;
        cut_bounds();
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < detail::rounding_trials; ++trial) {
            const double u = unit(g);
            const double v = unit(g);
            const double w = unit(g);
            const auto [sine, cosine] =
                detail::sine_cosine((real(first_turns_) + real(w) * width_turns_).value);
            const real distance = real(u > v ? u : v) * double{radius_};
            const point_type p{detail::rounded<Real>(double{centre_[0]} + distance * cosine),
                               detail::rounded<Real>(double{centre_[1]} + distance * sine)};
            if (contains(p)) {
                return p;
            }
        }
        detail::stuck("sector");
    }

    /// Whether p is in the sector, its edge included: it lies within bounds(), in the disk (see
    /// there), and to the left of the side at `from` and to the right of that at `to`, where vector
    /// products with their directions decide, every operation rounded. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        const real x = (real(double{p[0]}) - double{centre_[0]}) * scale_;
        const real y = (real(double{p[1]}) - double{centre_[1]}) * scale_;
        return x * x + y * y <= limit_ && this->bounds_.contains(p) && in_wedge(x, y);
    }

    /// The area, within a few ulp; saturated where it does not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        const detail::scaled radius = detail::split(double{radius_});
        return detail::saturated<Real>(radius * radius * detail::split(0.5) *
                                       detail::split((real(double{to_}) - double{from_}).value));
    }

    [[nodiscard]] constexpr point_type centre() const noexcept { return centre_; }
    [[nodiscard]] constexpr Real radius() const noexcept { return radius_; }
    [[nodiscard]] constexpr Real from() const noexcept { return from_; }
    [[nodiscard]] constexpr Real to() const noexcept { return to_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "sector";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"centre", "radius", "from", "to"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(centre_, radius_, from_, to_);
    }

    friend constexpr bool operator==(const sector& a, const sector& b) noexcept {
        return a.centre_ == b.centre_ && a.radius_ == b.radius_ && a.from_ == b.from_ &&
               a.to_ == b.to_;
    }

private:
    using typename base::real;

    /// 2 pi as this Real has it, rounded up.
    static constexpr double full_angle =
        std::is_same_v<Real, double> ? 0x1.921fb54442d19p+2 : 0x1.921fb6p+2;

    static constexpr void require_angle(const char* parameter, Real angle) {
        if (!(angle >= -1000 && angle <= 1000)) {
            detail::refuse("sector", parameter, angle, "must be from -1000 to 1000 (radians)");
        }
    }

    [[nodiscard]] constexpr bool in_wedge(real x, real y) const noexcept {
        const real left_of_first = y * first_.cosine - x * first_.sine;
        const real right_of_last = x * last_.sine - y * last_.cosine;
        return full_ || (wide_ ? left_of_first >= 0.0 || right_of_last >= 0.0
                               : left_of_first >= 0.0 && right_of_last >= 0.0);
    }

    // From the box of the disk: a side stays where its middle is in the sector, else the tips and
    // the ends of the arc are the outermost points.
    constexpr void cut_bounds() noexcept {
        const std::array<double, 2> ends_x{first_.cosine, last_.cosine};
        const std::array<double, 2> ends_y{first_.sine, last_.sine};
        const auto cut = [this](std::size_t i, const std::array<double, 2>& ends, bool low_stays,
                                bool high_stays) {
            double low = 0;
            double high = 0;
            for (const double end : ends) {
                low = end < low ? end : low;
                high = end > high ? end : high;
            }
            const real middle = double{centre_[i]};
            if (!low_stays) {
                this->bounds_.low[i] = detail::rounded<Real>(middle + real(low) * double{radius_});
            }
            if (!high_stays) {
                this->bounds_.high[i] =
                    detail::rounded<Real>(middle + real(high) * double{radius_});
            }
        };
        cut(0, ends_x, in_wedge(-1.0, 0.0), in_wedge(1.0, 0.0));
        cut(1, ends_y, in_wedge(0.0, -1.0), in_wedge(0.0, 1.0));
    }

    point_type centre_;
    Real radius_;
    Real from_;
    Real to_;
    double first_turns_ = 0;
    double width_turns_ = 0;
    bool full_ = false;
    bool wide_ = false; // more than half a turn
    detail::sine_and_cosine first_{};
    detail::sine_and_cosine last_{};
    double scale_ = 0; // the power of two that brings the radius into [2, 4)
    double limit_ = 0; // the scaled radius, squared
};

} // namespace leat

#endif
