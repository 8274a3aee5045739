// Refusals of a polygon that say which vertices are at fault, as the caller numbered them: ring[3],
// holes[1][0].

#ifndef LEAT_REGIONS_DETAIL_RING_NAMES_HPP
#define LEAT_REGIONS_DETAIL_RING_NAMES_HPP

#include "leat/core/errors.hpp"

#include <cstddef>
#include <cstdint>
#include <vector>

namespace leat::detail {

/// Where each ring begins among the vertices of all, counted through; ring 0 is the outer one.
class ring_names {
public:
    using index = std::uint32_t;

    void add_ring(std::uint64_t vertices) {
        ends_.push_back(size() + static_cast<index>(vertices));
    }

    [[nodiscard]] index size() const noexcept { return ends_.empty() ? 0 : ends_.back(); }
    [[nodiscard]] std::size_t rings() const noexcept { return ends_.size(); }
    [[nodiscard]] index first(std::size_t ring) const noexcept {
        return ring == 0 ? 0 : ends_[ring - 1];
    }
    [[nodiscard]] index last(std::size_t ring) const noexcept { return ends_[ring] - 1; }
    [[nodiscard]] std::size_t ring_of(index vertex) const noexcept {
        std::size_t ring = 0;
        while (vertex >= ends_[ring]) {
            ++ring;
        }
        return ring;
    }

    [[noreturn]] void refuse_equal(index a, index b) const {
        message m = start();
        name(name(m, a < b ? a : b).text(" and "), a < b ? b : a);
        raise<invalid_parameter>(m.text(" are the same point, must be given once"));
    }
    [[noreturn]] void refuse_on_edge(index vertex, index a, index b) const {
        message m = start();
        edge(name(m, vertex).text(" lies on the edge "), a, b);
        raise<invalid_parameter>(m.text(", rings must not touch themselves or each other"));
    }
    [[noreturn]] void refuse_crossing(index a, index b, index c, index d) const {
        const bool ordered = lower(a, b) < lower(c, d);
        message m = start();
        edge(m.text("the edge "), ordered ? a : c, ordered ? b : d).text(" crosses ");
        edge(m, ordered ? c : a, ordered ? d : b);
        raise<invalid_parameter>(m.text(", rings must not cross themselves or each other"));
    }
    [[noreturn]] void refuse_overlap(index a, index middle, index b) const {
        message m = start();
        edge(m.text("the edges "), a, middle).text(" and ");
        edge(m, middle, b);
        raise<invalid_parameter>(m.text(" overlap, rings must enclose an area"));
    }
    [[noreturn]] void refuse_outside(index vertex) const {
        message m = start();
        m.text("holes[").value(std::uint64_t{ring_of(vertex) - 1});
        raise<invalid_parameter>(m.text("] must lie inside the ring and outside other holes"));
    }

private:
    static message start() {
        message m;
        m.text("leat::polygon: ");
        return m;
    }
    message& name(message& m, index vertex) const {
        const std::size_t ring = ring_of(vertex);
        const std::uint64_t place = vertex - first(ring);
        if (ring == 0) {
            m.text("ring[");
        } else {
            m.text("holes[").value(std::uint64_t{ring - 1}).text("][");
        }
        return m.value(place).text("]");
    }
    /// In the caller's sense: from a vertex to the one after it.
    message& edge(message& m, index a, index b) const {
        const index from = lower(a, b);
        return name(name(m, from).text("-"), from == a ? b : a);
    }
    /// Which of two neighbours comes first; the last vertex of a ring comes before the first.
    [[nodiscard]] index lower(index a, index b) const noexcept {
        const std::size_t ring = ring_of(a);
        const auto follows = [&](index x, index y) {
            return y == (x == last(ring) ? first(ring) : x + 1);
        };
        return follows(a, b) ? a : b;
    }

    std::vector<index> ends_;
};

} // namespace leat::detail

#endif
