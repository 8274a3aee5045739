// What simplex and tetrahedron share: the points of which N + 1 corners are the extremes.

#ifndef LEAT_REGIONS_DETAIL_SIMPLEX_SHAPE_HPP
#define LEAT_REGIONS_DETAIL_SIMPLEX_SHAPE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/bounds.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/matrix.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <limits>

namespace leat::detail {

/// A point with x_i > 0 and a sum below 1, uniform: the gaps that N uniforms, sorted, leave from 0
/// on. All exact: multiples of 2^-53. Uniforms that are equal, which leave no gap, are drawn anew.
template <std::size_t N, random_words G>
constexpr std::array<double, N> unit_simplex_point(G& g, const char* name) {
    for (int trial = 0; trial < 16; ++trial) { // (N^2 / 2^53)^16
        std::array<double, N> x{};
        for (std::size_t i = 0; i < N; ++i) {
            const double u = unit(g);
            std::size_t place = i;
            for (; place > 0 && x[place - 1] > u; --place) {
                x[place] = x[place - 1];
            }
            x[place] = u;
        }
        bool apart = true;
        for (std::size_t i = N - 1; i > 0; --i) {
            x[i] = held(x[i] - x[i - 1]);
            apart = apart && x[i] > 0;
        }
        if (apart) {
            return x;
        }
    }
    stuck(name);
}

/// The solid between N + 1 corners.
template <std::size_t N, portable_real Real>
class simplex_shape {
public:
    using point_type = std::array<Real, N>;
    using corners_type = std::array<point_type, N + 1>;

    /// The corners 0 and one step along each axis, its faces left out.
    constexpr simplex_shape() noexcept : open_(true) {
        for (std::size_t i = 0; i < N; ++i) {
            corners_[i + 1][i] = 1;
            edges_[i][i] = 1;
            inverse_[i][i] = 1;
            box_.high[i] = 1;
        }
    }

    constexpr simplex_shape(const char* name, const corners_type& corners) : corners_(corners) {
        box_ = {corners_[0], corners_[0]};
        for (const point_type& p : corners_) {
            require_point(name, "corner", p);
            extend(box_, p);
        }
        for (std::size_t i = 0; i < N; ++i) {
            const real half = 0.5;
            const auto width =
                rounded<Real>(half * double{box_.high[i]} - half * double{box_.low[i]});
            require_size(name, "half width", width);
            require_resolution(name, "half width", width, box_, i);
        }
        exponent_ = exponent_of(largest_coordinate(box_)) - 1;
        for (std::size_t i = 0; i < N; ++i) {
            origin_[i] = in_frame(corners_[0][i]);
            for (std::size_t j = 0; j < N; ++j) {
                edges_[i][j] = held(in_frame(corners_[j + 1][i]) - origin_[i]);
            }
        }
        inverse_ = edges_;
        if (!invert(inverse_, determinant_) || !resolves_points()) {
            refuse(name, "the corners lie too nearly in one plane for points between them to be "
                         "told apart");
        }
    }

    template <random_words G>
    [[nodiscard]] constexpr point_type draw(G& g, const char* name) const {
        for (int trial = 0; trial < rounding_trials; ++trial) {
            const std::array<double, N> x = unit_simplex_point<N>(g, name);
            point_type p{};
            for (std::size_t i = 0; i < N; ++i) {
                real way = real(edges_[i][0]) * x[0];
                for (std::size_t j = 1; j < N; ++j) {
                    way = way + real(edges_[i][j]) * x[j];
                }
                p[i] = from_frame((origin_[i] + way).value);
            }
            if (contains(p)) {
                return p;
            }
        }
        stuck(name);
    }

    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        if (!box_.contains(p)) {
            return false;
        }
        real sum = 0.0;
        bool inside = true;
        for (std::size_t i = 0; i < N; ++i) {
            real x = 0.0;
            for (std::size_t j = 0; j < N; ++j) {
                x = x + real(inverse_[i][j]) * (real(in_frame(p[j])) - origin_[j]);
            }
            inside = inside && (open_ ? x > 0.0 : x >= 0.0);
            sum = sum + x;
        }
        return inside && (open_ ? sum < 1.0 : sum <= 1.0);
    }

    /// |det of the edges| / N!
    [[nodiscard]] constexpr Real measure() const noexcept {
        scaled volume = determinant_;
        for (std::size_t i = 1; i <= N; ++i) {
            volume.factor = held(volume.factor / static_cast<double>(i));
            volume = split(volume.factor) * scaled{1, volume.exponent};
        }
        volume.exponent += static_cast<std::int64_t>(N) * exponent_;
        return saturated<Real>(volume);
    }

    [[nodiscard]] constexpr const region_bounds<Real, N>& box() const noexcept { return box_; }
    [[nodiscard]] constexpr const corners_type& corners() const noexcept { return corners_; }
    /// Whether its faces are left out: those of the unit simplex.
    [[nodiscard]] constexpr bool is_open() const noexcept { return open_; }

    friend constexpr bool operator==(const simplex_shape& a, const simplex_shape& b) noexcept {
        return a.corners_ == b.corners_ && a.open_ == b.open_;
    }

private:
    using real = strict<double>;

    // The frame: coordinates over 2^exponent, the largest in [2, 4); those below 2^-400 are 0.
    [[nodiscard]] constexpr double in_frame(Real x) const noexcept {
        return exponent_of(double{x}) - exponent_ < -400
                   ? 0
                   : held(double{x} * power_of_two<double>(-exponent_));
    }
    [[nodiscard]] constexpr Real from_frame(double x) const noexcept {
        return exponent_of(x) < -400 || exponent_of(x) + exponent_ < -1022
                   ? Real{0}
                   : rounded<Real>(held(x * power_of_two<double>(exponent_)));
    }

    // Rounding a point to Real must not move it by more than 1/256 of N-th of the way to a face.
    [[nodiscard]] constexpr bool resolves_points() const noexcept {
        for (std::size_t i = 0; i < N; ++i) {
            real moved = 0.0;
            for (std::size_t j = 0; j < N; ++j) {
                const double low = magnitude(in_frame(box_.low[j]));
                const double high = magnitude(in_frame(box_.high[j]));
                const real step =
                    real(low > high ? low : high) * double{std::numeric_limits<Real>::epsilon()};
                moved = moved + real(magnitude(inverse_[i][j])) * step;
            }
            if (!((moved * static_cast<double>(N)).value <= 0x1p-8)) {
                return false;
            }
        }
        return largest_terms(inverse_, edges_) <= 0x1p40;
    }

    corners_type corners_{};
    region_bounds<Real, N> box_{};
    int exponent_ = 0;
    std::array<double, N> origin_{};
    square_matrix<N> edges_{}; // column j leads from corner 0 to corner j + 1
    square_matrix<N> inverse_{};
    scaled determinant_{1, 0};
    bool open_ = false;
};

} // namespace leat::detail

#endif
