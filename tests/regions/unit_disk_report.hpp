// The tests of fit for points that should be uniform in the unit disk: one list, which the right
// samplers must pass and the planted faults must not. Ellipses are brought here by the linear map
// that makes them a unit disk, which keeps uniform uniform.
//
// Exact values and their sources:
//   moments of x^a y^b: Folland, Amer. Math. Monthly 108, 2001, 446-448 (integrals over the
//   circle), times 2 / (a + b + 2) for the radius; entry regions.disk.unit agrees where it lists
//   them the rest: tests/reference/regions.json, entries regions.disk.unit and regions.disk.2.5
//   (Santalo; Mathai; Dunbar 1997; from memory, verified by quadrature and closed form)

#ifndef LEAT_TESTS_REGIONS_UNIT_DISK_REPORT_HPP
#define LEAT_TESTS_REGIONS_UNIT_DISK_REPORT_HPP

#include "support/reference.hpp"
#include "support/statistics.hpp"

#include <array>
#include <cmath>
#include <cstdint>
#include <numbers>
#include <string>
#include <vector>

namespace leat_test {

using plane_point = std::array<double, 2>;

inline double double_factorial(int n) { return n <= 1 ? 1 : n * double_factorial(n - 2); }

/// E x^a y^b for a uniform point of the unit disk.
inline double disk_moment(int a, int b) {
    if (a % 2 != 0 || b % 2 != 0) {
        return 0;
    }
    return 2.0 / (a + b + 2) * double_factorial(a - 1) * double_factorial(b - 1) /
           double_factorial(a + b);
}

inline double integer_power(double x, int n) { return n == 0 ? 1 : x * integer_power(x, n - 1); }

inline std::vector<outcome> unit_disk_report(const std::vector<plane_point>& points) {
    const auto& facts = reference_entry("regions.disk.unit")["expected"]["facts"];
    const auto n = static_cast<double>(points.size());
    std::vector<outcome> report;

    for (int order = 1; order <= 4; ++order) {
        for (int a = 0; a <= order; ++a) {
            const int b = order - a;
            double sum = 0;
            for (const auto& [x, y] : points) {
                sum += integer_power(x, a) * integer_power(y, b);
            }
            const double expected = disk_moment(a, b);
            report.push_back(
                mean_test("mean of x^" + std::to_string(a) + " y^" + std::to_string(b), sum, n,
                          {expected, disk_moment(2 * a, 2 * b) - expected * expected}));
        }
    }

    double radii = 0;
    double from_the_edge = 0;
    std::uint64_t within_half = 0;
    constexpr std::size_t rings = 16;
    constexpr std::size_t sectors = 32;
    std::vector<std::uint64_t> cells(rings * sectors, 0); // of equal area
    for (const auto& [x, y] : points) {
        const double square = x * x + y * y;
        radii += std::sqrt(square);
        from_the_edge += std::hypot(x - 1, y);
        within_half += square < 0.25 ? 1 : 0;
        const double turn = std::atan2(y, x) / (2 * std::numbers::pi) + 0.5;
        const auto ring = std::min(rings - 1, static_cast<std::size_t>(square * rings));
        const auto sector = std::min(sectors - 1, static_cast<std::size_t>(turn * sectors));
        ++cells[ring * sectors + sector];
    }
    const double mean_radius = facts["mean_radius"];
    const double mean_square = facts["mean_squared_radius"];
    report.push_back(
        mean_test("mean radius", radii, n, {mean_radius, mean_square - mean_radius * mean_radius}));
    // 32 R / (9 pi) from a boundary point; the mean square is R^2 + E r^2 (parallel axes)
    const double edge = reference_entry(
        "regions.disk.2.5")["expected"]["facts"]["mean_distance_from_a_boundary_point"];
    report.push_back(mean_test("mean distance from a boundary point", from_the_edge, n,
                               {edge / 2.5, 1 + mean_square - edge * edge / 6.25}));
    report.push_back(count_test("share within half the radius", within_half, points.size(),
                                facts["share_within_half_radius"]));
    report.push_back(chi_square_test("cells of equal area", cells));

    double distances = 0;
    std::uint64_t near = 0;
    const std::size_t pairs = points.size() / 2; // disjoint pairs are independent
    for (std::size_t i = 0; i < pairs; ++i) {
        const auto& p = points[2 * i];
        const auto& q = points[2 * i + 1];
        const double distance = std::hypot(p[0] - q[0], p[1] - q[1]);
        distances += distance;
        near += distance < 1 ? 1 : 0;
    }
    const double mean_distance = facts["mean_pair_distance"]; // 128 R / (45 pi)
    const double mean_square_distance = facts["mean_squared_pair_distance"];
    report.push_back(
        mean_test("mean distance of a pair", distances, static_cast<double>(pairs),
                  {mean_distance, mean_square_distance - mean_distance * mean_distance}));
    report.push_back(count_test("pairs nearer than the radius", near, pairs,
                                facts["probability_pair_distance_below_radius"]));
    return report;
}

} // namespace leat_test

#endif
