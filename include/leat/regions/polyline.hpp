// The polyline: points uniform by length along a chain of segments, in N dimensions.
//
//   leat::polyline<2> shore{vertices};       // std::vector<std::array<double, 2>>
//
// Method: a segment is chosen with the probability of its length, by its share of the length of the
// whole; then a point of the segment. Equal neighbours are allowed: no point is drawn between them.
// A chain that ends where it began is closed; nothing else closes it.
//
// Words: two word64 a point, float included: the choice, then the place. Time: O(log n) for n
// vertices. The probability of a segment is right within n 2^-53 of the whole. Rounding: each
// coordinate is within 2 ulp of the larger end's of its segment, and between the ends'. Domain: at
// least two vertices, all finite; the length of the whole at least 2^-960 (2^-100 for float), and
// at least 256 steps between neighbouring numbers at its outermost coordinates. Errors:
// invalid_parameter. Not for an area inside a ring (polygon).

#ifndef LEAT_REGIONS_POLYLINE_HPP
#define LEAT_REGIONS_POLYLINE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/scaled.hpp"
#include "leat/regions/detail/line_piece.hpp"
#include "leat/regions/detail/region_base.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstddef>
#include <cstdint>
#include <utility> // move
#include <vector>

namespace leat {

/// The segments from each vertex to the next.
template <std::size_t N, detail::portable_real Real = double>
class polyline : public detail::region_base<polyline<N, Real>, Real, N, 1> {
    static_assert(N >= 1);
    using base = detail::region_base<polyline, Real, N, 1>;

public:
    using typename base::point_type;

    /// From two vertices or more, in order.
    explicit polyline(std::vector<point_type> vertices) : vertices_(std::move(vertices)) {
        if (vertices_.size() < 2) {
            detail::refuse("polyline", "vertices", static_cast<std::uint64_t>(vertices_.size()),
                           "must be at least 2");
        }
        this->bounds_ = {vertices_[0], vertices_[0]};
        for (const point_type& p : vertices_) {
            detail::require_point("polyline", "vertex", p);
            for (std::size_t i = 0; i < N; ++i) {
                auto& [low, high] = this->bounds_;
                low[i] = p[i] < low[i] ? p[i] : low[i];
                high[i] = p[i] > high[i] ? p[i] : high[i];
            }
        }
        add_lengths();
        for (std::size_t i = 0; i < N; ++i) {
            if (this->bounds_.low[i] != this->bounds_.high[i]) {
                detail::require_resolution("polyline", "length", length_, this->bounds_, i);
            }
        }
        scale_ = detail::scale_of(length_);
        tolerance_ = detail::held(detail::surface_tolerance(length_, this->bounds_) * scale_);
    }

    /// A point uniform by length.
    template <random_words G>
    point_type operator()(G& g) const {
        const double choice = unit(g);
        const double place = unit(g);
        const detail::strict<double> passed = detail::strict<double>(choice) * ends_.back();
        // The first piece that ends beyond: `passed` is below the end of the last.
        std::size_t low = 0;
        std::size_t high = ends_.size() - 1;
        while (low < high) {
            const std::size_t middle = low + (high - low) / 2;
            if (ends_[middle] > passed.value) {
                high = middle;
            } else {
                low = middle + 1;
            }
        }
        return piece(low).at(place);
    }

    /// Whether p is on the polyline: at most 1e-12 of its length (float: 1e-6) from one of its
    /// segments, or eight steps between neighbouring numbers at its outermost coordinate where that
    /// is more. True for every point drawn. Looks at every segment.
    [[nodiscard]] bool contains(const point_type& p) const noexcept {
        if (!this->bounds_.contains(p)) {
            return false;
        }
        for (std::size_t i = 0; i < ends_.size(); ++i) {
            if (piece(i).is_near(p, scale_, tolerance_)) {
                return true;
            }
        }
        return false;
    }

    /// The length, within n ulp; saturated where it does not fit in Real.
    [[nodiscard]] Real measure() const noexcept { return length_; }

    /// The vertices in order.
    [[nodiscard]] const std::vector<point_type>& vertices() const noexcept { return vertices_; }

    /// The name under which it is saved.
    static constexpr const char* class_name = "polyline";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"vertices"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(vertices_);
    }

    friend bool operator==(const polyline&, const polyline&) = default;

private:
    using real = detail::strict<double>;

    [[nodiscard]] detail::line_piece<N, Real> piece(std::size_t i) const noexcept {
        return {vertices_[i], vertices_[i + 1]};
    }

    // Lengths in a unit that the box's size sets, so that neither end of the range is met.
    void add_lengths() {
        const detail::scaled across =
            detail::line_piece<N, Real>{this->bounds_.low, this->bounds_.high}.length();
        if (this->bounds_.low == this->bounds_.high) {
            detail::refuse("polyline", "length", Real{0}, detail::size_allowed<Real>);
        }
        real sum = 0.0;
        ends_.reserve(vertices_.size() - 1);
        for (std::size_t i = 0; i + 1 < vertices_.size(); ++i) {
            if (vertices_[i] != vertices_[i + 1]) {
                const detail::scaled length = piece(i).length();
                const std::int64_t exponent = length.exponent - across.exponent;
                if (exponent > -900) { // else it is nothing beside the whole
                    sum = sum + detail::scaled{length.factor, exponent}.value();
                }
            }
            ends_.push_back(sum.value);
        }
        detail::scaled whole = detail::split(sum.value);
        whole.exponent += across.exponent;
        length_ = detail::saturated<Real>(whole);
        detail::require_size("polyline", "length", length_);
    }

    std::vector<point_type> vertices_;
    std::vector<double> ends_; // where each segment ends on the way, in a unit of their own
    Real length_ = 0;
    double scale_ = 0; // the power of two that brings the length into [2, 4)
    double tolerance_ = 0;
};

template <detail::portable_real Real, std::size_t N>
polyline(const std::vector<std::array<Real, N>>&) -> polyline<N, Real>;

} // namespace leat

#endif
