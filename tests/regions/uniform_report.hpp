// A test of fit for any region: the inverse of its exact map, by the standard library's functions,
// makes of a uniform point as many independent numbers, each uniform in (0, 1), as the region has
// dimensions. Those fall into cells of equal measure (chi-square), each has its law
// (Kolmogorov-Smirnov), and together they are all of what uniform means.
//
// The maps are integral calculus: measure in shells is proportional to r^N, on spheres the height
// is uniform (Archimedes), and so on; beside each stands its formula.

#ifndef LEAT_TESTS_REGIONS_UNIFORM_REPORT_HPP
#define LEAT_TESTS_REGIONS_UNIFORM_REPORT_HPP

#include "support/sanitized.hpp"
#include "support/statistics.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <cstdint>
#include <numbers>
#include <string>
#include <vector>

namespace leat_test {

/// Points of a report: a million, but under the address sanitizer, which is slow and looks for
/// other faults, a quarter of that.
inline constexpr int many = sanitized ? 250000 : 1000000;
inline constexpr int few = 100000; // enough to see a planted fault

/// x^n; std::pow would take most of the tests' time.
constexpr double whole_power(double x, std::size_t n) {
    return n == 0 ? 1 : x * whole_power(x, n - 1);
}

template <std::size_t K>
using unit_numbers = std::array<double, K>;

/// 1 + K outcomes. A number outside [0, 1] is a point outside the region and gives p = 0.
template <std::size_t K>
std::vector<outcome> uniform_report(const std::vector<unit_numbers<K>>& points) {
    constexpr std::size_t per_axis[] = {0, 256, 24, 8, 5, 4, 3, 3};
    constexpr std::size_t n = per_axis[K];
    std::size_t cells = 1;
    for (std::size_t k = 0; k < K; ++k) {
        cells *= n;
    }
    std::vector<std::uint64_t> counts(cells, 0);
    for (const auto& point : points) {
        std::size_t cell = 0;
        for (const double u : point) {
            if (!(u > -1e-9 && u < 1 + 1e-9)) {
                return {{"outside the region", u, 0}};
            }
            cell = cell * n + static_cast<std::size_t>(std::clamp(u * n, 0.0, n - 1.0));
        }
        ++counts[cell];
    }
    std::vector<outcome> report{chi_square_test("cells of equal measure", counts)};
    const std::size_t sample = std::min<std::size_t>(points.size(), few);
    for (std::size_t k = 0; k < K; ++k) {
        std::vector<double> values(sample);
        for (std::size_t i = 0; i < sample; ++i) {
            values[i] = points[i][k];
        }
        report.push_back(kolmogorov_smirnov_test("number " + std::to_string(k), values,
                                                 [](double u) { return u; }));
    }
    return report;
}

template <class Sampler, class Map, class G>
auto unit_numbers_of(const Sampler& sampler, Map map, int n, G& g) {
    std::vector<decltype(map(sampler(g)))> numbers(static_cast<std::size_t>(n));
    for (auto& u : numbers) {
        u = map(sampler(g));
    }
    return numbers;
}

/// The angle of (x, y) as a share of a turn.
inline double turn_of(double y, double x) {
    return std::atan2(y, x) / (2 * std::numbers::pi) + 0.5;
}

/// P(t_1 <= t), t_1 a coordinate of a uniform point of the unit sphere in n dimensions: the
/// integral of (1 - s^2)^((n-3)/2), in closed form.
inline double sphere_coordinate_share(std::size_t n, double t) {
    const double pi = std::numbers::pi;
    const double root = std::sqrt(std::max(0.0, 1 - t * t));
    switch (n) {
    case 3:
        return (1 + t) / 2;
    case 4:
        return 0.5 + (t * root + std::asin(t)) / pi;
    case 5:
        return 0.5 + (3 * t - t * t * t) / 4;
    case 6:
        return 0.5 + (t * (5 - 2 * t * t) * root + 3 * std::asin(t)) / (3 * pi);
    case 7:
        return 0.5 + (t - 2 * t * t * t / 3 + whole_power(t, 5) / 5) * 15 / 16;
    default:
        throw std::invalid_argument("sphere_coordinate_share");
    }
}

/// N - 1 numbers of a direction: each coordinate as a share of what those before it leave, and the
/// angle of the last two. Shares of lower spheres are independent (polar coordinates).
template <std::size_t N>
unit_numbers<N - 1> direction_numbers(const std::array<double, N>& v) {
    unit_numbers<N - 1> u{};
    double rest = 0;
    for (const double x : v) {
        rest += x * x;
    }
    for (std::size_t i = 0; i + 2 < N; ++i) {
        const double t = std::clamp(v[i] / std::sqrt(rest), -1.0, 1.0);
        u[i] = sphere_coordinate_share(N - i, t);
        rest = 0;
        for (std::size_t j = i + 1; j < N; ++j) {
            rest += v[j] * v[j];
        }
    }
    u[N - 2] = turn_of(v[N - 1], v[N - 2]);
    return u;
}

template <std::size_t N>
double length_of(const std::array<double, N>& v) {
    double square = 0;
    for (const double x : v) {
        square += x * x;
    }
    return std::sqrt(square);
}

/// Any point, from a centre, in double.
template <std::size_t N, class Real>
std::array<double, N> from(const std::array<Real, N>& centre, const std::array<Real, N>& p) {
    std::array<double, N> v{};
    for (std::size_t i = 0; i < N; ++i) {
        v[i] = static_cast<double>(p[i]) - static_cast<double>(centre[i]);
    }
    return v;
}

/// N numbers of a point between two radii (inner 0: of a ball): measure is as r^N.
template <std::size_t N>
unit_numbers<N> shell_numbers(const std::array<double, N>& v, double inner, double outer) {
    unit_numbers<N> u{};
    const double least = whole_power(inner, N);
    const double most = whole_power(outer, N);
    u[0] = (whole_power(length_of(v), N) - least) / (most - least);
    const auto direction = direction_numbers<N>(v);
    std::copy(direction.begin(), direction.end(), u.begin() + 1);
    return u;
}

/// Coordinates in a frame whose third axis is given: Gram and Schmidt's, not the library's.
struct test_frame {
    std::array<double, 3> a{}, b{}, c{};

    explicit test_frame(std::array<double, 3> axis) : c(axis) {
        scale(c, 1 / length_of(c));
        const std::size_t least = std::abs(c[0]) < 0.6 ? 0 : 1;
        a[least] = 1;
        const double along = dot(a, c);
        for (std::size_t i = 0; i < 3; ++i) {
            a[i] -= along * c[i];
        }
        scale(a, 1 / length_of(a));
        b = {c[1] * a[2] - c[2] * a[1], c[2] * a[0] - c[0] * a[2], c[0] * a[1] - c[1] * a[0]};
    }
    [[nodiscard]] std::array<double, 3> operator()(const std::array<double, 3>& v) const {
        return {dot(a, v), dot(b, v), dot(c, v)};
    }

private:
    static double dot(const std::array<double, 3>& x, const std::array<double, 3>& y) {
        return x[0] * y[0] + x[1] * y[1] + x[2] * y[2];
    }
    static void scale(std::array<double, 3>& x, double s) {
        for (double& value : x) {
            value *= s;
        }
    }
};

} // namespace leat_test

#endif
