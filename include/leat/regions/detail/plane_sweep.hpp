// A polygon with holes cut into triangles, or refused: one sweep of the plane does both.
//
// A vertical line, tilted by nothing at all, passes over the vertices from left to right; of two on
// one vertical the lower comes first. It keeps the edges that it cuts, from below to above. Edges
// that become neighbours are tested for crossing: the first crossing has no way past (M. I. Shamos
// and D. Hoey, Geometric intersection problems, 17th FOCS, 1976). Between a lower edge and the
// next, where the inside of the polygon lies, a chain of vertices borders what is still uncut; each
// new vertex cuts off the triangles it sees (S. Hertel and K. Mehlhorn, Fast triangulation of
// simple polygons, FCT 1983). All decisions are exact (orientation.hpp), so that there is no
// tolerance to choose and no input that goes wrong. Time O(n log n) for n vertices.

#ifndef LEAT_REGIONS_DETAIL_PLANE_SWEEP_HPP
#define LEAT_REGIONS_DETAIL_PLANE_SWEEP_HPP

#include "leat/regions/detail/merge_sort.hpp"
#include "leat/regions/detail/orientation.hpp"
#include "leat/regions/detail/plane_triangle.hpp"

#include <cstddef>
#include <cstdint>
#include <set>
#include <utility> // swap
#include <vector>

namespace leat::detail {

/// Does its work when constructed. Vertices are named by their places in `points`; an edge by the
/// vertex that it leaves when the inside is kept on the left. A template, so that only a program
/// with polygons compiles it.
template <class Names>
class plane_sweep {
public:
    using index = std::uint32_t;

    plane_sweep(const std::vector<plane_point>& points, const Names& names)
        : points_(points),
          names_(names),
          next_(points.size()),
          previous_(points.size()),
          rank_(points.size()),
          places_(points.size()),
          chains_(points.size()),
          line_(below_edge{this}) {
        triangles_.reserve(points.size() + 2 * names.rings());
        links_.reserve(3 * points.size());
        const std::vector<index> order = sorted_vertices();
        for (std::size_t ring = 0; ring < names_.rings(); ++ring) {
            link_ring(ring);
        }
        for (const index v : order) {
            pass(v);
        }
    }

    /// The triangles, counterclockwise. None has an area of 0.
    [[nodiscard]] const std::vector<plane_triangle>& triangles() const noexcept {
        return triangles_;
    }

private:
    static constexpr index none = ~index{0};

    struct below_edge {
        const plane_sweep* sweep;
        bool operator()(index e, index f) const { return sweep->is_below(e, f); }
    };
    using sweep_line = std::set<index, below_edge>;
    using iterator = typename sweep_line::iterator;

    /// One vertex of a chain.
    struct link {
        index vertex;
        index down;
        index up;
    };
    /// From the left end of a lower edge to that of the next edge above; bent so that no three
    /// neighbours could be cut off. `newest` is the vertex passed last.
    struct chain {
        index bottom;
        index top;
        index newest;
    };

    static iterator below(iterator it) { return --it; }
    static iterator above(iterator it) { return ++it; }

    [[nodiscard]] bool before(index a, index b) const noexcept { return rank_[a] < rank_[b]; }
    [[nodiscard]] double turned(index a, index b, index c) const noexcept {
        return turn(points_[a], points_[b], points_[c]);
    }
    /// Whether the inside lies above an edge.
    [[nodiscard]] bool is_lower(index e) const noexcept { return before(e, next_[e]); }
    [[nodiscard]] index left(index e) const noexcept { return is_lower(e) ? e : next_[e]; }
    [[nodiscard]] index right(index e) const noexcept { return is_lower(e) ? next_[e] : e; }

    std::vector<index> sorted_vertices() {
        std::vector<index> order(points_.size());
        for (index i = 0; i < order.size(); ++i) {
            order[i] = i;
        }
        merge_sort(order, [this](index a, index b) { return points_[a] < points_[b]; });
        for (index i = 0; i < order.size(); ++i) {
            rank_[order[i]] = i;
            if (i > 0 && points_[order[i]] == points_[order[i - 1]]) {
                names_.refuse_equal(order[i - 1], order[i]);
            }
        }
        return order;
    }

    // The outer ring counterclockwise, holes clockwise. The sense shows at the leftmost vertex.
    void link_ring(std::size_t ring) {
        const index first = names_.first(ring);
        const index last = names_.last(ring);
        index leftmost = first;
        for (index i = first; i <= last; ++i) {
            next_[i] = i == last ? first : i + 1;
            previous_[i] = i == first ? last : i - 1;
            leftmost = before(i, leftmost) ? i : leftmost;
        }
        const double sense = turned(previous_[leftmost], leftmost, next_[leftmost]);
        if (sense == 0) {
            names_.refuse_overlap(previous_[leftmost], leftmost, next_[leftmost]);
        }
        if ((sense > 0) != (ring == 0)) {
            for (index i = first; i <= last; ++i) {
                std::swap(next_[i], previous_[i]);
            }
        }
    }

    // Both edges are cut by the line, or one begins at it.
    [[nodiscard]] bool is_below(index e, index f) const {
        if (e == f) {
            return false;
        }
        const index a = left(e);
        const index c = left(f);
        if (a == c) {
            return turned(a, right(e), right(f)) > 0;
        }
        const bool later = before(a, c); // f begins later: at c, above e or below it?
        const index edge = later ? e : f;
        const index vertex = later ? c : a;
        const double side = turned(left(edge), right(edge), vertex);
        if (side == 0) {
            names_.refuse_on_edge(vertex, left(edge), right(edge));
        }
        return (side > 0) == later;
    }

    void require_apart(index e, index f) const {
        const index a = left(e);
        const index b = right(e);
        const index c = left(f);
        const index d = right(f);
        if (a == c || b == d) {
            return; // at a vertex that they share; if they overlapped one would begin on the other
        }
        const auto differ = [](double x, double y) {
            return !(x > 0 && y > 0) && !(x < 0 && y < 0);
        };
        const double of_c = turned(a, b, c);
        const double of_d = turned(a, b, d);
        if (!differ(of_c, of_d)) {
            return;
        }
        const double of_a = turned(c, d, a);
        const double of_b = turned(c, d, b);
        if (!differ(of_a, of_b)) {
            return;
        }
        if (of_c == 0 || of_d == 0) {
            names_.refuse_on_edge(of_c == 0 ? c : d, a, b);
        }
        if (of_a == 0 || of_b == 0) {
            names_.refuse_on_edge(of_a == 0 ? a : b, c, d);
        }
        names_.refuse_crossing(a, b, c, d);
    }

    void require_apart_from_below(iterator it) const {
        if (it != line_.begin() && it != line_.end()) {
            require_apart(*below(it), *it);
        }
    }

    void pass(index v) {
        const index in = previous_[v]; // the edge that arrives
        const index out = v;
        const bool in_begins = before(v, previous_[v]);
        const bool out_begins = before(v, next_[v]);
        if (in_begins && out_begins) {
            begin_two(v, in, out);
        } else if (!in_begins && !out_begins) {
            end_two(v, in, out);
        } else if (out_begins) {
            replace(in, out);
            chains_[out] = chains_[in];
            add_below(chains_[out], v);
        } else {
            replace(out, in);
            add_above(chains_[edge_below(in)], v);
        }
    }

    [[nodiscard]] index edge_below(index e) const { return *below(places_[e]); }

    void replace(index old, index edge) {
        const auto after = line_.erase(places_[old]);
        const auto it = line_.insert(after, edge);
        places_[edge] = it;
        require_apart_from_below(it);
        require_apart_from_below(above(it));
    }

    void begin_two(index v, index in, index out) {
        const double sense = turned(previous_[v], v, next_[v]);
        if (sense == 0) {
            names_.refuse_overlap(previous_[v], v, next_[v]);
        }
        const bool encloses = sense > 0;
        const auto it = line_.insert(encloses ? out : in).first;
        const auto upper = line_.insert(above(it), encloses ? in : out);
        places_[*it] = it;
        places_[*upper] = upper;
        require_apart_from_below(it);
        require_apart_from_below(above(upper));
        if (encloses) {
            const index only = new_link(v);
            chains_[out] = {only, only, only};
            return;
        }
        // The inside is parted, along a cut to the newest vertex of its chain.
        if (it == line_.begin() || !is_lower(*below(it))) {
            names_.refuse_outside(v);
        }
        chain& lower = chains_[*below(it)];
        const index cut = lower.newest;
        const index copy = new_link(links_[cut].vertex);
        chain upper_part{copy, lower.top == cut ? copy : lower.top, copy};
        links_[copy].up = links_[cut].up;
        if (links_[copy].up != none) {
            links_[links_[copy].up].down = copy;
        }
        links_[cut].up = none;
        lower.top = cut;
        add_above(lower, v);
        add_below(upper_part, v);
        chains_[out] = upper_part;
    }

    void end_two(index v, index in, index out) {
        if (turned(previous_[v], v, next_[v]) > 0) { // the inside ends here
            index a = chains_[in].bottom;
            for (index b = links_[a].up; b != none; b = links_[b].up) {
                cut_off(v, links_[b].vertex, links_[a].vertex);
                a = b;
            }
        } else { // two parts of it meet
            chain& lower = chains_[edge_below(out)];
            chain upper = chains_[in];
            add_above(lower, v);
            add_below(upper, v);
            const index joint = lower.top;
            links_[joint].up = links_[upper.bottom].up;
            links_[links_[joint].up].down = joint;
            lower.top = upper.top;
            lower.newest = joint;
        }
        line_.erase(places_[in]);
        require_apart_from_below(line_.erase(places_[out]));
    }

    index new_link(index vertex) {
        const std::uint64_t place = links_.size();
        links_.push_back({vertex, none, none});
        return static_cast<index>(place);
    }
    void cut_off(index a, index b, index c) {
        triangles_.push_back({points_[a], points_[b], points_[c]});
    }

    void add_above(chain& c, index v) {
        const index added = new_link(v);
        index a = c.top;
        for (index b = links_[a].down;
             b != none && turned(v, links_[a].vertex, links_[b].vertex) > 0; b = links_[a].down) {
            cut_off(v, links_[a].vertex, links_[b].vertex);
            a = b;
        }
        links_[added].down = a;
        links_[a].up = added;
        c = {c.bottom, added, added};
    }
    void add_below(chain& c, index v) {
        const index added = new_link(v);
        index a = c.bottom;
        for (index b = links_[a].up; b != none && turned(v, links_[b].vertex, links_[a].vertex) > 0;
             b = links_[a].up) {
            cut_off(v, links_[b].vertex, links_[a].vertex);
            a = b;
        }
        links_[added].up = a;
        links_[a].down = added;
        c = {added, c.top, added};
    }

    const std::vector<plane_point>& points_;
    const Names& names_;
    std::vector<index> next_;
    std::vector<index> previous_;
    std::vector<index> rank_;
    std::vector<iterator> places_; // of the edges on the line
    std::vector<chain> chains_;    // above lower edges on the line
    std::vector<link> links_;
    sweep_line line_;
    std::vector<plane_triangle> triangles_;
};

} // namespace leat::detail

#endif
