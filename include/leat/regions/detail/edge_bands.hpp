// Whether a point lies inside closed rings, without a look at every edge: the plane is cut into
// bands of equal height, and each keeps the edges that reach into it. Exact: the band of a number
// is a function that never falls, so that no edge is missed, and the sides are exact.

#ifndef LEAT_REGIONS_DETAIL_EDGE_BANDS_HPP
#define LEAT_REGIONS_DETAIL_EDGE_BANDS_HPP

#include "leat/core/barrier.hpp"
#include "leat/regions/detail/orientation.hpp"

#include <cstddef>
#include <cstdint>
#include <utility> // move
#include <vector>

namespace leat::detail {

struct plane_edge {
    plane_point low; // the end of lower y
    plane_point high;
};

class edge_bands {
public:
    edge_bands() = default;
    /// Edges whose y lie from `low` to `high`.
    edge_bands(std::vector<plane_edge> edges, double low, double high)
        : edges_(std::move(edges)), low_(low) {
        bands_ = edges_.size();
        for (;; bands_ /= 2) { // long edges reach into many bands: then there must be fewer
            per_height_ = held(static_cast<double>(bands_) / held(high - low));
            std::size_t entries = 0;
            for (const plane_edge& e : edges_) {
                entries += band(e.high[1]) - band(e.low[1]) + 1;
            }
            if (entries <= 8 * edges_.size()) { // as it is with one band
                list(entries);
                return;
            }
        }
    }

    /// Whether q lies on an edge, or an odd number of edges lie to its right.
    [[nodiscard]] bool enclose(const plane_point& q) const noexcept {
        const std::size_t in = band(q[1]);
        bool inside = false;
        for (std::size_t i = starts_[in]; i < starts_[in + 1]; ++i) {
            const auto& [a, b] = edges_[entries_[i]];
            if (q[1] < a[1] || q[1] > b[1]) {
                continue;
            }
            const double side = turn(a, b, q);
            if (side == 0) {
                if ((a[0] <= q[0] && q[0] <= b[0]) || (b[0] <= q[0] && q[0] <= a[0])) {
                    return true;
                }
            } else if (q[1] < b[1] && side > 0) {
                inside = !inside;
            }
        }
        return inside;
    }

private:
    [[nodiscard]] std::size_t band(double y) const noexcept {
        const double x = held(held(y - low_) * per_height_);
        const auto last = static_cast<double>(bands_ - 1);
        return x > last ? bands_ - 1 : x > 0 ? static_cast<std::size_t>(x) : 0;
    }

    void list(std::size_t entries) {
        starts_.assign(bands_ + 1, 0);
        for (const plane_edge& e : edges_) {
            for (std::size_t i = band(e.low[1]); i <= band(e.high[1]); ++i) {
                ++starts_[i + 1];
            }
        }
        for (std::size_t i = 0; i < bands_; ++i) {
            starts_[i + 1] += starts_[i];
        }
        std::vector<std::size_t> next(starts_.begin(), starts_.end() - 1);
        entries_.resize(entries);
        for (std::uint32_t e = 0; e < edges_.size(); ++e) {
            for (std::size_t i = band(edges_[e].low[1]); i <= band(edges_[e].high[1]); ++i) {
                entries_[next[i]++] = e;
            }
        }
    }

    std::vector<plane_edge> edges_;
    std::vector<std::size_t> starts_; // band i has the entries from starts_[i] to starts_[i + 1]
    std::vector<std::uint32_t> entries_;
    std::size_t bands_ = 1;
    double low_ = 0;
    double per_height_ = 0;
};

} // namespace leat::detail

#endif
