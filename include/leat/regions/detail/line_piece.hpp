// What segment and polyline share: a straight piece between two points of a space.

#ifndef LEAT_REGIONS_DETAIL_LINE_PIECE_HPP
#define LEAT_REGIONS_DETAIL_LINE_PIECE_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/scaled.hpp"
#include "leat/core/square_root.hpp"
#include "leat/regions/detail/region_base.hpp"

#include <array>
#include <cstddef>

namespace leat::detail {

/// The points between two ends.
template <std::size_t N, portable_real Real>
struct line_piece {
    std::array<Real, N> from;
    std::array<Real, N> to;

    /// Its length; the scaled smallest number where the ends are equal.
    [[nodiscard]] constexpr scaled length() const noexcept {
        std::array<double, N> half{}; // the difference itself may overflow
        int largest = exponent_of(0.0);
        for (std::size_t i = 0; i < N; ++i) {
            half[i] = (real(0.5) * double{to[i]} - real(0.5) * double{from[i]}).value;
            largest = exponent_of(half[i]) > largest ? exponent_of(half[i]) : largest;
        }
        if (largest < -1000) { // below any size accepted
            return {1, -1022};
        }
        const double scale = power_of_two<double>(largest == 1023 ? -1022 : -largest);
        real square = 0.0;
        for (const double x : half) {
            square = square + real(x) * scale * (real(x) * scale);
        }
        scaled root = split(square_root(square.value));
        root.exponent += 1 - exponent_of(scale);
        return root;
    }

    /// The point at the share u of the way, 0 < u < 1, within the box of the two ends.
    [[nodiscard]] constexpr std::array<Real, N> at(double u) const noexcept {
        std::array<Real, N> p{};
        const real rest = real(1) - u;
        for (std::size_t i = 0; i < N; ++i) {
            const Real low = from[i] < to[i] ? from[i] : to[i];
            const Real high = from[i] < to[i] ? to[i] : from[i];
            const Real x = rounded<Real>(rest * double{from[i]} + real(u) * double{to[i]});
            p[i] = x < low ? low : x > high ? high : x;
        }
        return p;
    }

    /// Whether p is at most `tolerance` away, both multiplied by `scale`, a power of two that
    /// brings the piece to a size from 0 to 8.
    [[nodiscard]] constexpr bool is_near(const std::array<Real, N>& p, double scale,
                                         double tolerance) const noexcept {
        real along = 0.0;
        real square = 0.0;
        std::array<double, N> way{};
        std::array<double, N> v{};
        for (std::size_t i = 0; i < N; ++i) {
            const real start = real(double{from[i]}) * scale;
            way[i] = (real(double{to[i]}) * scale - start).value;
            v[i] = (real(double{p[i]}) * scale - start).value;
            along = along + real(way[i]) * v[i];
            square = square + real(way[i]) * way[i];
        }
        real share = square > 1e-200 ? along / square : real(0.0);
        share = share < 0.0 ? real(0.0) : share > 1.0 ? real(1.0) : share;
        real distance = 0.0;
        for (std::size_t i = 0; i < N; ++i) {
            const real off = real(v[i]) - share * way[i];
            distance = distance + off * off;
        }
        return distance <= real(tolerance) * tolerance;
    }

    friend constexpr bool operator==(const line_piece&, const line_piece&) = default;

private:
    using real = strict<double>;
};

} // namespace leat::detail

#endif
