// The polygon: points uniform by area inside a ring of vertices and outside the holes in it.
//
//   leat::polygon field{ring};                    // std::vector<std::array<double, 2>>
//   leat::polygon lake{shore, islands};           // and a std::vector of such rings
//   leat::polygon<> sail{{{0, 0}, {4, 0}, {1, 3}}};
//
// Method: cut into triangles once (detail/plane_sweep.hpp); then a triangle is chosen by its area
// in constant time (alias table) and a point of it is drawn as `triangle` draws it. Never take a
// point between random vertices, nor a triangle without regard to its area.
//
// Rings run in either sense and close themselves. Words: three word64, float included: the choice,
// then two for the point. Making it: O(n log n), 0.1 s for 10^5 vertices. A draw costs the same for
// ten vertices as for 10^5, but for the memory it reads, 60 bytes a vertex: 24 and 39 ns from a
// stream (g++ 12). Reading ahead in fills gained a twentieth, and was dropped.
//
// Exactness: the chance of a triangle is right within 2^-30 of itself. Every point drawn is
// contained. Where rounding puts one outside its triangle it is drawn anew; a triangle so thin that
// hardly a number lies in it gives a corner of it instead.
// Domain: rings of 3 to 2^31 vertices in all, finite; each coordinate 0, or at least 2^-400 of the
// largest; the half widths at least 2^-960 (2^-100 for float) and 256 steps between neighbouring
// numbers; an area that rounding does not spoil. Rings must not touch or cross themselves or each
// other: two equal vertices, a vertex on another edge, edges that overlap, a hole outside the ring
// or in a hole are refused, and the message names the vertices as ring[i] and holes[k][i].
// Units: those of the vertices. Errors: invalid_parameter.
// Not for points along the ring (polyline), nor for areas that touch (either).

#ifndef LEAT_REGIONS_POLYGON_HPP
#define LEAT_REGIONS_POLYGON_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/regions/detail/edge_bands.hpp"
#include "leat/regions/detail/merge_sort.hpp"
#include "leat/regions/detail/orientation.hpp"
#include "leat/regions/detail/plane_sweep.hpp"
#include "leat/regions/detail/plane_triangle.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/regions/detail/ring_names.hpp"
#include "leat/uniform/alias_table.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <utility> // move
#include <vector>

namespace leat {
/// The points inside a ring, outside its holes.
template <detail::portable_real Real = double>
class polygon : public detail::region_base<polygon<Real>, Real, 2> {
    using base = detail::region_base<polygon, Real, 2>;

public:
    using typename base::point_type;
    using ring_type = std::vector<std::array<Real, 2>>; ///< the corners in order, either way round

    /// From the outer ring and the rings of holes in it.
    explicit polygon(std::vector<std::array<Real, 2>> ring,
                     std::vector<std::vector<std::array<Real, 2>>> holes = {})
        : ring_(std::move(ring)), holes_(std::move(holes)) {
        detail::ring_names names;
        require_ring("ring.size()", ring_, names);
        this->bounds_ = {ring_[0], ring_[0]};
        for (const point_type& p : ring_) {
            detail::extend(this->bounds_, p);
        }
        for (const ring_type& hole : holes_) {
            require_ring("holes[].size()", hole, names);
        }
        detail::require_plane_size("polygon", this->bounds_);
        frame_ = detail::plane_frame<Real>(this->bounds_);
        std::vector<detail::plane_point> points;
        std::vector<detail::plane_edge> edges;
        points.reserve(names.size());
        edges.reserve(names.size());
        add_ring(ring_, points, edges);
        for (const ring_type& hole : holes_) {
            add_ring(hole, points, edges);
        }
        triangles_ = detail::plane_sweep(points, names).triangles();
        weigh();
        edges_ = detail::edge_bands(std::move(edges), frame_(this->bounds_.low)[1],
                                    frame_(this->bounds_.high)[1]);
    }

    /// A point uniform by area.
    template <random_words G>
    point_type operator()(G& g) const {
        const std::size_t chosen = choice_(g);
        return triangles_[chosen].draw(frame_, g);
    }

    /// Whether p is in the polygon, its edges included: exact, but that a coordinate of p below
    /// 2^-400 of the polygon's largest counts as 0. True for every point drawn. Looks at the edges
    /// about as high as p: a few, unless many are as long as the polygon.
    [[nodiscard]] bool contains(const point_type& p) const noexcept {
        return this->bounds_.contains(p) && edges_.enclose(frame_(p));
    }

    /// The area, within 2^-30 of itself and mostly within a few ulp; saturated where it does not
    /// fit in Real.
    [[nodiscard]] Real measure() const noexcept {
        return detail::saturated<Real>(frame_.half_area(doubled_area_));
    }

    /// The outer ring.
    [[nodiscard]] const ring_type& ring() const noexcept { return ring_; }
    /// The rings of the holes.
    [[nodiscard]] const std::vector<ring_type>& holes() const noexcept { return holes_; }
    /// How many triangles it was cut into: the vertices, and two more a hole, less two.
    [[nodiscard]] std::size_t triangles() const noexcept { return triangles_.size(); }

    /// The name under which it is saved.
    static constexpr const char* class_name = "polygon";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"ring", "holes"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(ring_, holes_);
    }

    friend bool operator==(const polygon& a, const polygon& b) noexcept {
        return a.ring_ == b.ring_ && a.holes_ == b.holes_;
    }

private:
    using typename base::real;

    static void require_ring(const char* parameter, const ring_type& ring,
                             detail::ring_names& names) {
        if (ring.size() < 3 || ring.size() + names.size() > (std::uint64_t{1} << 31)) {
            detail::refuse("polygon", parameter, std::uint64_t{ring.size()},
                           "must be at least 3, and 2^31 vertices in all at most");
        }
        for (const point_type& p : ring) {
            detail::require_point("polygon", "vertex", p);
        }
        names.add_ring(ring.size());
    }

    void add_ring(const ring_type& ring, std::vector<detail::plane_point>& points,
                  std::vector<detail::plane_edge>& edges) const {
        detail::plane_point from = frame_(ring.back());
        for (const point_type& p : ring) {
            detail::require_kept("polygon", "vertex", frame_, p);
            const detail::plane_point to = frame_(p);
            edges.push_back(from[1] < to[1] ? detail::plane_edge{from, to}
                                            : detail::plane_edge{to, from});
            points.push_back(to);
            from = to;
        }
    }

    // The largest triangles first: those that are drawn most then share their memory.
    void weigh() {
        const auto area = [](const detail::plane_triangle& t) {
            return detail::doubled_area(t.a, t.b, t.c);
        };
        detail::merge_sort(triangles_,
                           [&](const auto& s, const auto& t) { return area(s) > area(t); });
        std::vector<double> areas;
        areas.reserve(triangles_.size());
        real sum = 0.0;
        for (const detail::plane_triangle& t : triangles_) {
            areas.push_back(area(t));
            sum = sum + areas.back();
        }
        doubled_area_ = sum.value;
        detail::require_area("polygon", frame_, this->bounds_, doubled_area_);
        choice_ = detail::alias_table<>(areas);
    }

    ring_type ring_;
    std::vector<ring_type> holes_;
    detail::plane_frame<Real> frame_{};
    std::vector<detail::plane_triangle> triangles_;
    detail::alias_table<> choice_{std::array<double, 1>{1}};
    detail::edge_bands edges_;
    double doubled_area_ = 0;
};

} // namespace leat

#endif
