// The ellipse: points uniform by area inside it, in the plane, turned by any angle.
//
//   leat::ellipse lease{{0, 0}, 8.5, 3.2};             // centre, semi-axis along x, along y
//   leat::ellipse turned{{0, 0}, 8.5, 3.2, 0.4};       // counter-clockwise by 0.4 radians
//
//   ellipse                a point of the unit disk, stretched by the semi-axes, turned and moved:
//                          a linear map, so that uniform stays uniform. The one to use.
//   ellipse_by_rejection   a point of the box around the ellipse, until it falls inside. The method
//                          that papers and other programs use; slow where a thin ellipse is turned.
//
// Both are exact (Devroye, Non-Uniform Random Variate Generation, 1986, II.3 and V.2; area-true
// maps also in Rubinstein, Simulation and the Monte Carlo Method, 1981, 2.5). They give different
// points from the same words. Never take one coordinate uniform and the other inside its chord:
// that crowds points at the two tips.
//
// Words: two a trial, in the order first coordinate (along the first axis, or x), second. `ellipse`
// takes 2.55 on average; `ellipse_by_rejection` two over the share of its box that the ellipse
// fills. Rounding: a trial is decided on the rounded point itself, so every point drawn is
// contained. Domain: centre and edge finite; semi-axes at least 2^-960 (2^-100 for float), where
// subnormals would begin to matter, and at least 256 steps between neighbouring numbers at the edge
// (a turned ellipse: both semi-axes in both coordinates), so that points can be uniform at all. The
// rotation is in radians, from -1000 to 1000. Units of the others: those of the centre. Errors:
// invalid_parameter, also where ellipse_by_rejection would reject more than 1023 of 1024 trials;
// engine_stuck after so many rejections that a sound engine has them below 2^-100.

#ifndef LEAT_REGIONS_ELLIPSE_HPP
#define LEAT_REGIONS_ELLIPSE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/regions/detail/elliptic_region.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/square_trial.hpp"

#include <array>
#include <cstdint>
#include <type_traits>

namespace leat {

/// An ellipse whose points are an area-true image of the points of the unit disk.
template <detail::portable_real Real = double>
class ellipse : public detail::elliptic_region<Real> {
public:
    using typename detail::elliptic_region<Real>::point_type;

    /// Any arithmetic types; deduced as ellipse<double>.
    template <detail::arithmetic A, detail::arithmetic B, detail::arithmetic Angle = int>
    constexpr ellipse(const std::type_identity_t<detail::point_argument<Real, 2>>& centre, A semi_x,
                      B semi_y, Angle rotation = 0)
        : detail::elliptic_region<Real>("ellipse", centre.value, static_cast<Real>(semi_x),
                                        static_cast<Real>(semi_y), static_cast<Real>(rotation)) {
        const strict first = strict(this->semi_[0]) * detail::signed_unit_step<Real>;
        const strict second = strict(this->semi_[1]) * detail::signed_unit_step<Real>;
        along_ = {step(first * this->cosine_), step(first * this->sine_)};
        across_ = {step(-second * this->sine_), step(second * this->cosine_)};
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        using square = detail::square_trial<Real>;
        for (int trial = 0; trial < 64; ++trial) { // 2^-142 for a sound engine
            const square at(g);
            const std::uint64_t norm = at.norm();
            if (norm > square::circle + this->doubt_) {
                continue;
            }
            const strict u = at.x();
            const strict v = at.y();
            const strict x = this->centre_[0] + (u * along_[0] + v * across_[0]);
            const strict y = this->centre_[1] + (u * along_[1] + v * across_[1]);
            const point_type p{x.value, y.value};
            if (norm < square::circle - this->doubt_ || this->contains(p)) {
                return p;
            }
        }
        detail::stuck("ellipse");
    }

    /// The same point as a Vec: anything that two coordinates in braces initialise.
    template <class Vec, random_words G>
    constexpr Vec draw(G& g) const {
        return detail::point_as<Vec>((*this)(g));
    }

    /// The name under which it is saved.
    static constexpr const char* class_name = "ellipse";

    friend constexpr bool operator==(const ellipse&, const ellipse&) = default;

private:
    using strict = detail::strict<Real>;

    // No subnormal factors: they would not be the same where the processor flushes them to zero.
    static constexpr Real step(strict x) noexcept {
        return detail::exponent_of(x.value) < 1 - detail::real_layout<Real>::bias ? Real{0}
                                                                                  : x.value;
    }

    std::array<Real, 2> along_{};  // the first semi-axis, over the steps of a signed unit
    std::array<Real, 2> across_{}; // the second
};

/// The same region, its points found by rejection from the box around it.
template <detail::portable_real Real = double>
class ellipse_by_rejection : public detail::elliptic_region<Real> {
public:
    using typename detail::elliptic_region<Real>::point_type;

    /// Any arithmetic types; deduced as ellipse_by_rejection<double>.
    template <detail::arithmetic A, detail::arithmetic B, detail::arithmetic Angle = int>
    constexpr ellipse_by_rejection(
        const std::type_identity_t<detail::point_argument<Real, 2>>& centre, A semi_x, B semi_y,
        Angle rotation = 0)
        : detail::elliptic_region<Real>("ellipse_by_rejection", centre.value,
                                        static_cast<Real>(semi_x), static_cast<Real>(semi_y),
                                        static_cast<Real>(rotation)) {
        constexpr Real quarter_pi = static_cast<Real>(0x1.921fb54442d18p-1);
        acceptance_ = (strict(this->semi_[0]) / this->half_width_[0] *
                       (strict(this->semi_[1]) / this->half_width_[1]) * quarter_pi)
                          .value;
        if (acceptance_ < Real{1} / 1024) {
            detail::refuse("ellipse_by_rejection", "acceptance", acceptance_,
                           "must be at least 1/1024: the ellipse is too thin for its box; use "
                           "leat::ellipse");
        }
        // (1 - p)^n < 2^-100 for n = 70 / p, since -ln(1 - p) > p and 100 ln 2 < 70.
        most_trials_ = static_cast<int>((strict(70) / acceptance_).value) + 1;
        for (std::size_t i = 0; i < 2; ++i) {
            step_[i] = (strict(this->half_width_[i]) * detail::signed_unit_step<Real>).value;
        }
    }

    /// A point uniform by area.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < most_trials_; ++trial) {
            const detail::square_trial<Real> at(g);
            const strict x = strict(at.x()) * step_[0];
            const strict y = strict(at.y()) * step_[1];
            const point_type p{(this->centre_[0] + x).value, (this->centre_[1] + y).value};
            if (this->contains(p)) {
                return p;
            }
        }
        detail::stuck("ellipse_by_rejection");
    }

    /// The same point as a Vec: anything that two coordinates in braces initialise.
    template <class Vec, random_words G>
    constexpr Vec draw(G& g) const {
        return detail::point_as<Vec>((*this)(g));
    }

    /// The share of trials that succeed: the ellipse's area over that of its box.
    [[nodiscard]] constexpr Real acceptance() const noexcept { return acceptance_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "ellipse_by_rejection";

    friend constexpr bool operator==(const ellipse_by_rejection&,
                                     const ellipse_by_rejection&) = default;

private:
    using strict = detail::strict<Real>;

    Real acceptance_ = 0;
    int most_trials_ = 0;
    std::array<Real, 2> step_{}; // half the box, over the steps of a signed unit
};

} // namespace leat

#endif
