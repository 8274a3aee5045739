// The triangle mesh: points uniform by area on a surface in space that is made of triangles.
//
//   leat::triangle_mesh hull{vertices, triples};   // std::vector of std::array<double, 3>, and of
//                                                  // std::array<std::uint32_t, 3> (or of
//                                                  // another integer type)
//
// Method: a triangle is chosen by its area in constant time (alias table), then a point of it is
// drawn by folding as in `triangle`. Never choose a triangle without regard to its area, nor weigh
// its corners by three uniforms over their sum.
//
// The triangles need not meet, nor be turned alike; where they overlap, points are denser. One
// without area, of equal corners too, is allowed: no point is drawn from it.
// Words: three word64, float included: the choice, then two for the point. Rounding: each
// coordinate is within 4 ulp of its triangle's largest. Domain: vertices finite; the indices below
// their number; 1 to 2^32 triangles; the largest half width at least 2^-960 (2^-100 for float), and
// 256 steps between neighbouring numbers in that direction; not all areas 0. Units: those of the
// vertices. Errors: invalid_parameter. Not for the solid inside (rejection, tetrahedron).

#ifndef LEAT_REGIONS_TRIANGLE_MESH_HPP
#define LEAT_REGIONS_TRIANGLE_MESH_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/detail/extent.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/uniform/alias_table.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <utility> // in_range, move
#include <vector>

namespace leat {

/// The points of some triangles in space.
template <detail::portable_real Real = double>
class triangle_mesh : public detail::region_base<triangle_mesh<Real>, Real, 3, 2> {
    using base = detail::region_base<triangle_mesh, Real, 3, 2>;

public:
    using typename base::point_type;
    using indices = std::array<std::uint32_t, 3>; ///< of a triangle's vertices

    /// From vertices, and for each triangle the indices of its three.
    triangle_mesh(std::vector<std::array<Real, 3>> vertices, std::vector<indices> triangles)
        : vertices_(std::move(vertices)), triangles_(std::move(triangles)) {
        require_triangles();
        this->bounds_ = {vertices_[triangles_[0][0]], vertices_[triangles_[0][0]]};
        for (const indices& t : triangles_) {
            for (const std::uint32_t corner : t) {
                detail::extend(this->bounds_, vertices_[corner]);
            }
        }
        const std::size_t widest = find_widest();
        const auto size = static_cast<Real>(half_width(widest));
        detail::require_size("triangle_mesh", "half width", size);
        detail::require_resolution("triangle_mesh", "half width", size, this->bounds_, widest);
        exponent_ = detail::exponent_of(double{size});
        tolerance_ = detail::held(detail::surface_tolerance(size, this->bounds_) *
                                  detail::power_of_two<double>(-exponent_));
        weigh();
    }

    /// The same with indices of another integer type; one that does not fit is refused.
    template <std::integral Index>
    requires(!std::same_as<Index, std::uint32_t>)
        triangle_mesh(std::vector<std::array<Real, 3>> vertices,
                      const std::vector<std::array<Index, 3>>& triangles)
        : triangle_mesh(std::move(vertices), as_indices(triangles)) {}

    /// A point uniform by area.
    template <random_words G>
    point_type operator()(G& g) const {
        const std::size_t chosen = choice_(g);
        const double u = unit(g);
        const double v = unit(g);
        const real fold = u + v > 1 ? 1.0 : 0.0; // exact, as the differences: steps of 2^-53
        const real x = detail::magnitude((fold - u).value); // u or 1 - u, without a branch
        const real y = detail::magnitude((fold - v).value);
        const real rest = real(1) - x - y;
        const auto& [i, j, k] = triangles_[chosen];
        const point_type& a = vertices_[i];
        const point_type& b = vertices_[j];
        const point_type& c = vertices_[k];
        point_type p{};
        for (std::size_t n = 0; n < 3; ++n) {
            p[n] =
                this->within_bounds(n, detail::rounded<Real>(rest * double{a[n]} +
                                                             x * double{b[n]} + y * double{c[n]}));
        }
        return p;
    }

    /// Whether p is on the surface: at most 1e-12 of its largest half width (float: 1e-6) from one
    /// of its triangles, or eight steps between neighbouring numbers at its outermost coordinate
    /// where that is more. True for every point drawn. Looks at every triangle.
    [[nodiscard]] bool contains(const point_type& p) const noexcept {
        if (!this->bounds_.contains(p)) {
            return false;
        }
        for (const indices& t : triangles_) {
            if (is_near(p, t)) {
                return true;
            }
        }
        return false;
    }

    /// The area, within a few ulp times the number of triangles; saturated where it does not fit in
    /// Real.
    [[nodiscard]] Real measure() const noexcept { return detail::saturated<Real>(area_); }

    /// The vertices.
    [[nodiscard]] const std::vector<point_type>& vertices() const noexcept { return vertices_; }
    /// The triangles' indices.
    [[nodiscard]] const std::vector<indices>& triangles() const noexcept { return triangles_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "triangle_mesh";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"vertices", "triangles"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(vertices_, triangles_);
    }

    friend bool operator==(const triangle_mesh& a, const triangle_mesh& b) noexcept {
        return a.vertices_ == b.vertices_ && a.triangles_ == b.triangles_;
    }

private:
    using typename base::real;
    using vector = std::array<double, 3>;

    template <class Index>
    static std::vector<indices> as_indices(const std::vector<std::array<Index, 3>>& triangles) {
        std::vector<indices> converted(triangles.size());
        for (std::size_t t = 0; t < triangles.size(); ++t) {
            for (std::size_t i = 0; i < 3; ++i) {
                converted[t][i] = static_cast<std::uint32_t>(triangles[t][i]);
                if (!std::in_range<std::uint32_t>(triangles[t][i])) {
                    detail::refuse_entry("triangle_mesh", "triangles", t, i,
                                         static_cast<double>(triangles[t][i]),
                                         "must be below the number of vertices");
                }
            }
        }
        return converted;
    }

    void require_triangles() const {
        for (const point_type& p : vertices_) {
            detail::require_point("triangle_mesh", "vertex", p);
        }
        if (triangles_.empty() || triangles_.size() > std::uint64_t{1} << 32) {
            detail::refuse("triangle_mesh", "triangles.size()", std::uint64_t{triangles_.size()},
                           "must be from 1 to 2^32");
        }
        for (std::size_t t = 0; t < triangles_.size(); ++t) {
            for (std::size_t i = 0; i < 3; ++i) {
                if (triangles_[t][i] >= vertices_.size()) {
                    detail::refuse_entry("triangle_mesh", "triangles", t, i,
                                         static_cast<double>(triangles_[t][i]),
                                         "must be below the number of vertices");
                }
            }
        }
    }

    [[nodiscard]] double half_width(std::size_t i) const noexcept {
        const real half = 0.5;
        return (half * double{this->bounds_.high[i]} - half * double{this->bounds_.low[i]}).value;
    }
    [[nodiscard]] std::size_t find_widest() const noexcept {
        std::size_t widest = half_width(0) < half_width(1) ? 1 : 0;
        return half_width(widest) < half_width(2) ? 2 : widest;
    }

    // From p to q, in units of 2^exponent_: at most 4 a coordinate.
    [[nodiscard]] vector way(const point_type& p, const point_type& q) const noexcept {
        const double unit_size = detail::power_of_two<double>(-exponent_);
        vector v{};
        for (std::size_t i = 0; i < 3; ++i) {
            v[i] = (real(double{q[i]}) * unit_size - real(double{p[i]}) * unit_size).value;
            v[i] = detail::exponent_of(v[i]) < -400 ? 0 : v[i]; // no subnormal squares
        }
        return v;
    }
    static vector cross(const vector& a, const vector& b) noexcept {
        return {(real(a[1]) * b[2] - real(a[2]) * b[1]).value,
                (real(a[2]) * b[0] - real(a[0]) * b[2]).value,
                (real(a[0]) * b[1] - real(a[1]) * b[0]).value};
    }
    static real dot(const vector& a, const vector& b) noexcept {
        return real(a[0]) * b[0] + real(a[1]) * b[1] + real(a[2]) * b[2];
    }

    void weigh() {
        std::vector<double> areas;
        areas.reserve(triangles_.size());
        real sum = 0.0;
        for (const auto& [i, j, k] : triangles_) {
            const vector normal =
                cross(way(vertices_[i], vertices_[j]), way(vertices_[i], vertices_[k]));
            const double square = dot(normal, normal).value;
            areas.push_back(square < 1e-200 ? 0 : detail::square_root(square));
            sum = sum + areas.back();
        }
        if (!(sum > 0.0)) {
            detail::refuse("triangle_mesh", "the triangles must have an area: all have none");
        }
        area_ = detail::split(sum.value);
        area_.exponent += 2 * exponent_ - 1;
        choice_ = detail::alias_table<>(areas);
    }

    // Whether the point of a triangle that is nearest to p is within the tolerance: p is above the
    // triangle, or nearest to a side.
    [[nodiscard]] bool is_near(const point_type& p, const indices& t) const noexcept {
        const real allowed = real(tolerance_) * tolerance_;
        vector normal =
            cross(way(vertices_[t[0]], vertices_[t[1]]), way(vertices_[t[0]], vertices_[t[2]]));
        const real square = dot(normal, normal);
        bool above = square > 1e-200;
        for (std::size_t side = 0; side < 3; ++side) {
            const point_type& from = vertices_[t[side]];
            const vector edge = way(from, vertices_[t[(side + 1) % 3]]);
            const vector v = way(from, p);
            above = above && dot(cross(normal, edge), v) >= 0.0;
            const real length = dot(edge, edge);
            real share = length > 1e-200 ? dot(edge, v) / length : real(0.0);
            share = share < 0.0 ? real(0.0) : share > 1.0 ? real(1.0) : share;
            real distance = 0.0;
            for (std::size_t i = 0; i < 3; ++i) {
                const real off = real(v[i]) - share * edge[i];
                distance = distance + off * off;
            }
            if (distance <= allowed) {
                return true;
            }
        }
        const real height = dot(normal, way(vertices_[t[0]], p));
        return above && height * height <= allowed * square;
    }

    std::vector<point_type> vertices_;
    std::vector<indices> triangles_;
    detail::alias_table<> choice_{std::array<double, 1>{1}};
    detail::scaled area_{1, 0};
    int exponent_ = 0;
    double tolerance_ = 0;
};

} // namespace leat

#endif
