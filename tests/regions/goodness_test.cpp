// Uniform means uniform by measure (promise P4): disk and ellipses against exact values, and the
// classic wrong samplers, which the same tests must reject.

#include "regions/unit_disk_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"

#include "leat/regions.hpp"
#include "leat/uniform/open_interval.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace {

using namespace leat_test;

constexpr int many = 1000000;
constexpr int few = 100000; // enough to see a planted fault

template <class Sampler, class G>
std::vector<plane_point> draw_points(const Sampler& sampler, int n, G& g) {
    std::vector<plane_point> points(static_cast<std::size_t>(n));
    for (auto& p : points) {
        const auto drawn = sampler(g);
        p = {static_cast<double>(drawn[0]), static_cast<double>(drawn[1])};
    }
    return points;
}

/// The linear map that takes an ellipse to the unit disk, by the standard library's functions.
template <class Ellipse>
void to_unit_disk(std::vector<plane_point>& points, const Ellipse& e) {
    const double c = std::cos(e.rotation());
    const double s = std::sin(e.rotation());
    for (auto& p : points) {
        const double x = p[0] - e.centre()[0];
        const double y = p[1] - e.centre()[1];
        p = {(x * c + y * s) / e.semi_x(), (y * c - x * s) / e.semi_y()};
    }
}

TEST(DiskGoodness, UnitDisk) {
    auto g = source_of_this_test().stream();
    check(unit_disk_report(draw_points(leat::disk{{0, 0}, 1}, many, g)));
}

// The radius and centre of regions.disk.2.5 (tests/reference/regions.json), moved off the origin.
TEST(DiskGoodness, DiskElsewhere) {
    auto g = source_of_this_test().stream();
    const auto& facts = reference_entry("regions.disk.2.5")["expected"]["facts"];
    auto points = draw_points(leat::disk{{-40, 3}, 2.5}, many, g);
    double squares = 0;
    for (auto& p : points) {
        p = {p[0] + 40, p[1] - 3};
        squares += p[0] * p[0] + p[1] * p[1];
    }
    // the square of the radius is uniform on (0, R^2): variance R^4 / 12
    check(mean_test("mean squared radius", squares, many,
                    {facts["mean_squared_radius"], std::pow(2.5, 4) / 12}));
    for (auto& p : points) {
        p = {p[0] / 2.5, p[1] / 2.5};
    }
    check(unit_disk_report(points));
}

TEST(DiskGoodness, FloatDisk) {
    auto g = source_of_this_test().stream();
    check(unit_disk_report(draw_points(leat::disk<float>{{0, 0}, 1}, many, g)));
}

template <class Ellipse>
void check_ellipse(const Ellipse& e) {
    auto g = source_of_this_test().stream();
    auto points = draw_points(e, many, g);
    to_unit_disk(points, e);
    check(unit_disk_report(points));
}

TEST(EllipseGoodness, Turned) { check_ellipse(leat::ellipse{{3, -7}, 8.5, 3.2, 0.4}); }
TEST(EllipseGoodness, ThinAndTurned) { check_ellipse(leat::ellipse{{0, 0}, 1e4, 1e-2, -2.5}); }
TEST(EllipseGoodness, Float) { check_ellipse(leat::ellipse<float>{{0, 0}, 2, 1, 0.7}); }
TEST(EllipseGoodness, TurnedByRejection) {
    check_ellipse(leat::ellipse_by_rejection{{3, -7}, 8.5, 3.2, 0.4});
}

// regions.ellipse.5.0.5 (tests/reference/regions.json): values of the ellipse itself, not of its
// image in the unit disk. Axes exchanged by a quarter turn, which tests the sense of the rotation.
template <class Ellipse>
void check_published_ellipse() {
    auto g = source_of_this_test().stream();
    const auto& entry = reference_entry("regions.ellipse.5.0.5");
    const auto& facts = entry["expected"]["facts"];
    const double a = entry["parameters"]["a"];
    const double b = entry["parameters"]["b"];
    const Ellipse upright{{0, 0}, a, b, std::numbers::pi / 2};
    EXPECT_NEAR(upright.measure() / facts["area"].template get<double>(), 1, 1e-14);
    double radius = 0;
    double square_radius = 0;
    double square_x = 0;
    double square_y = 0;
    double fourth = 0;
    std::uint64_t within_half = 0;
    for (int i = 0; i < many; ++i) {
        const auto [y, x] = upright(g); // turned back
        const double r = x * x + y * y;
        radius += std::sqrt(r);
        square_radius += r;
        square_x += x * x;
        square_y += y * y;
        fourth += x * x * x * x;
        const double u = x / a;
        const double v = y / b;
        within_half += u * u + v * v < 0.25 ? 1 : 0;
    }
    // Variances from the disk's moments up to x^8 (see unit_disk_report.hpp), stretched.
    const auto moment = [&](int i, int j) {
        return disk_moment(i, j) * std::pow(a, i) * std::pow(b, j);
    };
    const double mean_radius = facts["mean_radius"];
    const double mean_square = facts["mean_squared_radius"];
    const double mean_x = facts["second_moment_x"];
    const double mean_y = facts["second_moment_y"];
    const double mean_fourth = facts["fourth_moment_x"];
    check(mean_test("mean radius", radius, many,
                    {mean_radius, mean_square - mean_radius * mean_radius}));
    check(mean_test(
        "mean squared radius", square_radius, many,
        {mean_square, moment(4, 0) + 2 * moment(2, 2) + moment(0, 4) - mean_square * mean_square}));
    check(mean_test("second moment x", square_x, many, {mean_x, moment(4, 0) - mean_x * mean_x}));
    check(mean_test("second moment y", square_y, many, {mean_y, moment(0, 4) - mean_y * mean_y}));
    check(mean_test("fourth moment x", fourth, many,
                    {mean_fourth, moment(8, 0) - mean_fourth * mean_fourth}));
    check(count_test("share in half the size", within_half, many,
                     facts["share_in_half_size_ellipse"]));
}

TEST(EllipseGoodness, PublishedValues) { check_published_ellipse<leat::ellipse<>>(); }
TEST(EllipseGoodness, PublishedValuesByRejection) {
    check_published_ellipse<leat::ellipse_by_rejection<>>();
}

// The mistakes that survive a look at a plot.

plane_point uniform_radius(leat::stream& g) {
    const double radius = leat::unit(g);
    const double angle = 2 * std::numbers::pi * leat::unit(g);
    return {radius * std::cos(angle), radius * std::sin(angle)};
}

plane_point uniform_in_chord(leat::stream& g) {
    const double x = 2 * leat::unit(g) - 1;
    const double y = (2 * leat::unit(g) - 1) * std::sqrt(1 - x * x);
    return {x, y};
}

TEST(PlantedFaults, UniformRadiusIsRejected) {
    auto g = source_of_this_test().stream();
    EXPECT_TRUE(is_rejected(unit_disk_report(draw_points(uniform_radius, few, g))));
}

TEST(PlantedFaults, UniformInChordIsRejected) {
    auto g = source_of_this_test().stream();
    EXPECT_TRUE(is_rejected(unit_disk_report(draw_points(uniform_in_chord, few, g))));
}

TEST(PlantedFaults, UniformInChordOfAnEllipseIsRejected) {
    const leat::ellipse e{{3, -7}, 8.5, 3.2, 0.4};
    auto g = source_of_this_test().stream();
    const auto faulty = [&e](leat::stream& words) -> plane_point {
        const auto [u, v] = uniform_in_chord(words);
        const double c = std::cos(e.rotation());
        const double s = std::sin(e.rotation());
        return {e.centre()[0] + 8.5 * u * c - 3.2 * v * s,
                e.centre()[1] + 8.5 * u * s + 3.2 * v * c};
    };
    auto points = draw_points(faulty, few, g);
    to_unit_disk(points, e);
    EXPECT_TRUE(is_rejected(unit_disk_report(points)));
}

// A radius of R u^0.48, near enough to R sqrt(u) to be missed in a picture.
TEST(PlantedFaults, NearlyRightRadiusIsRejected) {
    auto g = source_of_this_test().stream();
    const auto faulty = [](leat::stream& words) -> plane_point {
        const double radius = std::pow(leat::unit(words), 0.48);
        const double angle = 2 * std::numbers::pi * leat::unit(words);
        return {radius * std::cos(angle), radius * std::sin(angle)};
    };
    EXPECT_TRUE(is_rejected(unit_disk_report(draw_points(faulty, few, g))));
}

// And what the faulty ones should have been passes at the same size.
TEST(PlantedFaults, SquareRootRadiusPasses) {
    auto g = source_of_this_test().stream();
    const auto right = [](leat::stream& words) -> plane_point {
        const double radius = std::sqrt(leat::unit(words));
        const double angle = 2 * std::numbers::pi * leat::unit(words);
        return {radius * std::cos(angle), radius * std::sin(angle)};
    };
    check(unit_disk_report(draw_points(right, few, g)));
}

} // namespace
