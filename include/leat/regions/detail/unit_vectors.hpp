// Points uniform in the unit disk, on the unit circle, sphere and hypersphere, and in the unit
// ball: the offsets that regions stretch and move. In double, each coordinate within a few ulp.
//
// Words, all word64: a trial of the disk takes two and succeeds with probability pi/4.
//   circle          2.55: (u^2 - v^2, 2 u v) / s of a disk point, no root (von Neumann 1951)
//   sphere, N = 3   2.55: one disk point                           (Marsaglia, Ann. Math. Stat. 43,
//   sphere, N = 4   5.09: two disk points                           1972, 645-646)
//   sphere, N > 4   1.02 N: normals over their length (Muller, CACM 2(4), 1959)
//   ball, N <= 3    1, 2.55, 5.73: rejection from the cube (von Neumann 1951)
//   ball, N > 3     1.02 N + 1.03: normals x over sqrt(|x|^2 + 2 E), E exponential, which has the
//                   radius of law u^(1/N) without a power (Barthe, Guedon, Mendelson and Naor,
//                   Annals of Probability 33(2), 2005)
// Where both would do, the faster was kept (ns from xoshiro256++, g++ 12; bench/regions.cpp): a
// ball by rejection or by normals takes 19.1 or 19.4 for N = 3, 31 or 25 for N = 4, 57 or 31 for N
// = 5; a sphere by Marsaglia's methods or by normals 10 or 19 for N = 3, 12 or 24 for N = 4; a
// circle without or with sine and cosine 7.2 or 8.7.
//
// Throws engine_stuck under the name given, after so many rejections that a sound engine has them
// with a probability below 2^-100.

#ifndef LEAT_REGIONS_DETAIL_UNIT_VECTORS_HPP
#define LEAT_REGIONS_DETAIL_UNIT_VECTORS_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/ziggurat.hpp"
#include "leat/regions/detail/square_trial.hpp"
#include "leat/uniform/words.hpp"

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat::detail {

/// A point of the unit disk, its centre left out, and the square of its distance from there, which
/// is uniform in (0, 1) and independent of the direction.
struct disk_point {
    double x;
    double y;
    double square;
};

template <random_words G>
constexpr disk_point unit_disk_point(G& g, const char* name) {
    using square = square_trial<double>;
    for (int trial = 0; trial < 64; ++trial) { // 2^-142
        const square at(g);
        if (at.norm() > square::circle + square::error) {
            continue;
        }
        const strict<double> x = strict<double>(at.x()) * signed_unit_step<double>;
        const strict<double> y = strict<double>(at.y()) * signed_unit_step<double>;
        const strict<double> s = x * x + y * y;
        if (s < 1.0) {
            return {x.value, y.value, s.value};
        }
    }
    stuck(name);
}

/// A point of the unit circle.
template <random_words G>
constexpr std::array<double, 2> unit_circle_point(G& g, const char* name) {
    using real = strict<double>;
    const disk_point p = unit_disk_point(g, name);
    const real x = p.x;
    const real y = p.y;
    return {((x - y) * (x + y) / p.square).value, (real(2) * x * y / p.square).value};
}

/// The point of the unit sphere at the height 1 - versine * square, in the direction of a disk
/// point: uniform on the cap of points at least 1 - versine high, since its height is (Archimedes).
constexpr std::array<double, 3> cap_point(const disk_point& p, double versine) noexcept {
    using real = strict<double>;
    const real drop = real(versine) * p.square;
    const real stretch = square_root((real(versine) * (real(2) - drop)).value);
    return {(stretch * p.x).value, (stretch * p.y).value, (real(1) - drop).value};
}

/// The coordinates over `length`.
template <std::size_t N>
constexpr std::array<double, N> over(std::array<double, N> x, double length) noexcept {
    for (double& coordinate : x) {
        coordinate = held(coordinate / length);
    }
    return x;
}

/// N standard normals and the sum of their squares.
template <std::size_t N>
struct normal_vector {
    std::array<double, N> x{};
    double square = 0;

    template <random_words G>
    explicit constexpr normal_vector(G& g) {
        strict<double> sum = 0.0;
        for (double& coordinate : x) {
            coordinate = standard_normal(g);
            sum = sum + strict<double>(coordinate) * coordinate;
        }
        square = sum.value;
    }
};

/// A point of the unit sphere in N dimensions.
template <std::size_t N, random_words G>
constexpr std::array<double, N> unit_sphere_point(G& g, const char* name) {
    if constexpr (N == 2) {
        return unit_circle_point(g, name);
    } else if constexpr (N == 3) {
        return cap_point(unit_disk_point(g, name), 2);
    } else if constexpr (N == 4) {
        using real = strict<double>;
        const disk_point p = unit_disk_point(g, name);
        const disk_point q = unit_disk_point(g, name);
        const real stretch = square_root(((real(1) - p.square) / q.square).value);
        return {p.x, p.y, (stretch * q.x).value, (stretch * q.y).value};
    } else {
        const normal_vector<N> normals(g);
        return over(normals.x, square_root(normals.square));
    }
}

/// A point of the unit ball in N dimensions.
template <std::size_t N, random_words G>
constexpr std::array<double, N> unit_ball_point(G& g, const char* name) {
    using real = strict<double>;
    if constexpr (N == 2) {
        const disk_point p = unit_disk_point(g, name);
        return {p.x, p.y};
    } else if constexpr (N <= 3) {
        for (int trial = 0; trial < 128; ++trial) { // (1 - pi/6)^128 < 2^-136
            // As in square_trial: upper halves, squared as integers, reject most trials early.
            std::array<std::int64_t, N> words{};
            std::uint64_t norm = 0;
            for (std::int64_t& word : words) {
                word = static_cast<std::int64_t>(word64(g) ^ (std::uint64_t{1} << 63));
                const std::int64_t upper = word >> 32;
                norm += static_cast<std::uint64_t>(upper * upper); // at most 3 * 2^62
            }
            if (norm > square_trial<double>::circle + square_trial<double>::error) {
                continue;
            }
            std::array<double, N> x{};
            real sum = 0.0;
            for (std::size_t i = 0; i < N; ++i) {
                x[i] = static_cast<double>((words[i] >> 11) * 2 + 1) * signed_unit_step<double>;
                sum = sum + real(x[i]) * x[i];
            }
            if (sum < 1.0) {
                return x;
            }
        }
        stuck(name);
    } else {
        const normal_vector<N> normals(g);
        const real e = standard_exponential(g);
        return over(normals.x, square_root((real(normals.square) + (e + e)).value));
    }
}

} // namespace leat::detail

#endif
