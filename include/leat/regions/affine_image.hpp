// The affine image of a region: turned, sheared, stretched, mirrored and moved, and still uniform.
//
//   leat::affine_image brick{leat::box{{0, 0}, {2, 1}}, {{{1, 0.5}, {0, 1}}}, {3, 4}};
//                            // region, matrix by rows, shift: the points matrix * x + shift
//
// A linear map multiplies every volume by the same factor, |det|, so that uniform stays uniform
// (Rubinstein, Simulation and the Monte Carlo Method, 1981, 2.5). That holds for solids only: the
// image of a surface would not be uniform by area, and does not compile.
//
// Words: those of the region. Rounding: every point drawn is contained. Domain: matrix and shift
// finite; entries 0 or from 2^-500 to 2^500 in size (2^-60 to 2^60 for float); the matrix far
// enough from singular that undoing it loses at most 40 bits (12 for float); the image's edge
// finite. Errors: invalid_parameter; engine_stuck.

#ifndef LEAT_REGIONS_AFFINE_IMAGE_HPP
#define LEAT_REGIONS_AFFINE_IMAGE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/dimension.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/matrix.hpp"
#include "leat/regions/detail/point.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <array>
#include <cstddef>
#include <limits>
#include <type_traits>

namespace leat {
/// The points matrix * x + shift, x being those of a region.
template <class Region>
class affine_image : public detail::region_base<affine_image<Region>, typename Region::real_type,
                                                Region::dimension> {
    static_assert(detail::measured_dimension_of<Region> == Region::dimension,
                  "leat::affine_image takes solids: the image of a surface is not uniform by area");
    static constexpr std::size_t n = Region::dimension;
    using Real = typename Region::real_type;
    using base = detail::region_base<affine_image, Real, n>;

public:
    using typename base::point_type;
    using matrix_type = std::array<std::array<Real, n>, n>; ///< rows

    /// The matrix by rows.
    constexpr affine_image(const Region& region, const std::type_identity_t<matrix_type>& matrix,
                           const std::type_identity_t<detail::point_argument<Real, n>>& shift)
        : region_(region), matrix_(matrix), shift_(shift.value) {
        detail::require_point("affine_image", "shift", shift_);
        for (const auto& row : matrix_) {
            detail::require_point("affine_image", "matrix", row);
            for (const Real x : row) {
                const int e = detail::exponent_of(x);
                if (x != 0 && (e < -largest_exponent || e > largest_exponent)) {
                    detail::refuse("affine_image", "matrix", x,
                                   std::is_same_v<Real, double>
                                       ? "must be 0 or from 2^-500 to 2^500 in size"
                                       : "must be 0 or from 2^-60 to 2^60 in size");
                }
            }
        }
        invert();
        find_bounds();
    }

    /// A point uniform by measure.
    template <random_words G>
    constexpr point_type operator()(G& g) const {
        for (int trial = 0; trial < detail::rounding_trials; ++trial) {
            const auto x = region_(g);
            point_type p{};
            for (std::size_t i = 0; i < n; ++i) {
                real sum = double{shift_[i]};
                for (std::size_t j = 0; j < n; ++j) {
                    sum = sum + real(double{matrix_[i][j]}) * double{x[j]};
                }
                p[i] = detail::rounded<Real>(sum);
            }
            if (contains(p)) {
                return p;
            }
        }
        detail::stuck("affine_image");
    }

    /// Whether p is in the image: it lies within bounds(), and the region contains the point that
    /// the inverse map makes of it, rounded. True for every point drawn.
    [[nodiscard]] constexpr bool contains(const point_type& p) const noexcept {
        if (!this->bounds_.contains(p)) {
            return false;
        }
        typename Region::point_type x{};
        for (std::size_t i = 0; i < n; ++i) {
            real sum = 0.0;
            for (std::size_t j = 0; j < n; ++j) {
                sum = sum + real(inverse_[i][j]) * (real(double{p[j]}) - double{shift_[j]});
            }
            constexpr double most = double{std::numeric_limits<Real>::max()};
            if (!(sum.value >= -most && sum.value <= most)) {
                return false;
            }
            x[i] = detail::rounded<Real>(sum);
        }
        return region_.contains(x);
    }

    /// |det matrix| times the region's measure, within a few ulp of each; saturated where it does
    /// not fit in Real.
    [[nodiscard]] constexpr Real measure() const noexcept {
        return detail::saturated<Real>(determinant_ * detail::split(double{region_.measure()}));
    }

    /// The region that this is the image of.
    [[nodiscard]] constexpr const Region& region() const noexcept { return region_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "affine_image";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"region", "matrix", "shift"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(region_, matrix_, shift_);
    }

    friend constexpr bool operator==(const affine_image& a, const affine_image& b) noexcept {
        return a.region_ == b.region_ && a.matrix_ == b.matrix_ && a.shift_ == b.shift_;
    }

private:
    using typename base::real;
    static constexpr int largest_exponent = std::is_same_v<Real, double> ? 500 : 60;
    static constexpr double most_loss = std::is_same_v<Real, double> ? 0x1p40 : 0x1p12;

    static constexpr double size(double x) noexcept { return x < 0 ? -x : x; }

    constexpr void invert() {
        for (std::size_t i = 0; i < n; ++i) {
            for (std::size_t j = 0; j < n; ++j) {
                inverse_[i][j] = double{matrix_[i][j]};
            }
        }
        const detail::square_matrix<n> matrix = inverse_;
        if (!detail::invert(inverse_, determinant_) ||
            !(detail::largest_terms(inverse_, matrix) <= most_loss)) {
            detail::refuse("affine_image",
                           "the matrix is singular, or too close to it to be undone");
        }
    }

    constexpr void find_bounds() {
        const auto of_region = region_.bounds();
        for (std::size_t i = 0; i < n; ++i) {
            real low = double{shift_[i]};
            real high = low;
            for (std::size_t j = 0; j < n; ++j) {
                const real one = real(double{matrix_[i][j]}) * double{of_region.low[j]};
                const real other = real(double{matrix_[i][j]}) * double{of_region.high[j]};
                low = low + (one < other ? one : other);
                high = high + (one < other ? other : one);
            }
            if (!(size(low.value) <= double{std::numeric_limits<Real>::max()} &&
                  size(high.value) <= double{std::numeric_limits<Real>::max()})) {
                detail::refuse("affine_image", "the image's edge must be finite");
            }
            this->bounds_.low[i] = detail::rounded<Real>(low);
            this->bounds_.high[i] = detail::rounded<Real>(high);
            const auto reach = detail::rounded<Real>(high * 0.5 - low * 0.5);
            if (!detail::is_size(reach)) {
                detail::refuse("affine_image", "half width", reach, detail::size_allowed<Real>);
            }
            detail::require_resolution("affine_image", "half width", reach, this->bounds_, i);
        }
    }

    Region region_;
    matrix_type matrix_;
    point_type shift_;
    detail::square_matrix<n> inverse_{};
    detail::scaled determinant_{1, 0};
};

template <class Region, class Matrix, class Shift>
affine_image(const Region&, const Matrix&, const Shift&) -> affine_image<Region>;

} // namespace leat

#endif
