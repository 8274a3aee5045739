// Uniform means uniform by measure (promise P4), for every smooth region: equal-measure cells and
// the law of each coordinate (uniform_report.hpp), the published values of
// tests/reference/regions.json, and the classic wrong samplers, which the same tests must reject.

#include "regions/uniform_report.hpp"
#include "support/alarm_budget.hpp"
#include "support/reference.hpp"
#include "support/seeds.hpp"

#include "leat/regions.hpp"
#include "leat/uniform/open_interval.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>

namespace {

using namespace leat_test;

constexpr double pi = std::numbers::pi;

template <class Sampler, class Map>
void check_uniform(const Sampler& sampler, Map map, int n = many) {
    auto g = source_of_this_test().stream("uniform");
    check(uniform_report(unit_numbers_of(sampler, map, n, g)));
}

/// Facts of a reference entry as means of functions of a point; the variances, which are not
/// published, come from a sample of their own, a relative error of 1e-2 that cannot matter.
class published {
public:
    explicit published(const std::string& id) : facts_(reference_entry(id)["expected"]["facts"]) {}

    [[nodiscard]] double operator[](const char* fact) const { return facts_.at(fact); }

    template <class Sampler, class Function>
    void mean(const char* fact, const Sampler& sampler, Function f, int n = few) const {
        auto g = source_of_this_test().stream("published", fact);
        const double expected = facts_.at(fact);
        double squares = 0;
        double sum = 0;
        for (int i = 0; i < 20000; ++i) {
            const double off = f(sampler(g)) - expected;
            squares += off * off;
        }
        for (int i = 0; i < n; ++i) {
            sum += f(sampler(g));
        }
        check(mean_test(fact, sum, n, {expected, squares / 20000}));
    }
    /// Distances of disjoint pairs, which are independent.
    template <class Sampler>
    void mean_pair_distance(const Sampler& sampler) const {
        auto g = source_of_this_test().stream("pairs");
        const double expected = facts_.at("mean_pair_distance");
        const double square = facts_.at("mean_squared_pair_distance");
        double sum = 0;
        for (int i = 0; i < few; ++i) {
            const auto p = sampler(g);
            const auto q = sampler(g);
            sum += length_of(from(p, q));
        }
        check(mean_test("mean pair distance", sum, few, {expected, square - expected * expected}));
    }
    template <class Sampler, class Predicate>
    void share(const char* fact, const Sampler& sampler, Predicate f) const {
        auto g = source_of_this_test().stream("share", fact);
        std::uint64_t hits = 0;
        for (int i = 0; i < few; ++i) {
            hits += f(sampler(g)) ? 1U : 0U;
        }
        check(count_test(fact, hits, few, facts_.at(fact)));
    }

private:
    json facts_;
};

const auto radius = [](const auto& p) { return length_of(p); };
const auto square_radius = [](const auto& p) { return length_of(p) * length_of(p); };
const auto first_square = [](const auto& p) { return p[0] * p[0]; };
const auto first_fourth = [](const auto& p) { return whole_power(p[0], 4); };
const auto first_size = [](const auto& p) { return std::abs(p[0]); };
const auto third_square = [](const auto& p) { return p[2] * p[2]; };

template <std::size_t N>
void check_ball(const std::string& id) {
    const leat::ball<N> unit{std::array<double, N>{}, 1};
    check_uniform(unit, [](const auto& p) { return shell_numbers<N>(p, 0, 1); });
    const published facts(id);
    EXPECT_DOUBLE_EQ(unit.measure(), facts["volume"]);
    facts.mean("mean_radius", unit, radius);
    facts.mean("mean_squared_radius", unit, square_radius);
    facts.mean("second_moment_each_coordinate", unit, first_square);
    facts.mean("mean_abs_coordinate", unit, first_size);
    facts.mean("fourth_moment_coordinate", unit, first_fourth);
    facts.share("share_within_half_radius", unit, [](const auto& p) { return length_of(p) < 0.5; });
    facts.mean_pair_distance(unit); // 36/35 in space
}

TEST(SmoothGoodness, Ball3) { check_ball<3>("regions.ball.3"); }
TEST(SmoothGoodness, Ball5) { check_ball<5>("regions.ball.5"); }
TEST(SmoothGoodness, Ball7) { check_ball<7>("regions.ball.7"); }

TEST(SmoothGoodness, BallElsewhere) {
    const leat::ball<3, float> b{{4, -3, 100}, 2.5};
    check_uniform(b, [&b](const auto& p) { return shell_numbers<3>(from(b.centre(), p), 0, 2.5); });
    const leat::ball<4> coarse{{1e15, 1e15, 1e15, -1e15}, 64};
    check_uniform(
        coarse,
        [&coarse](const auto& p) {
            auto v = from(coarse.centre(), p); // spread over the grid's step, 1/8
            return direction_numbers<4>(v);
        },
        few);
}

template <std::size_t N>
void check_sphere(const std::string& id) {
    const leat::sphere<N> unit{std::array<double, N>{}, 1};
    check_uniform(unit, [](const auto& p) { return direction_numbers<N>(p); });
    const published facts(id);
    EXPECT_DOUBLE_EQ(unit.measure(), facts["area"]);
    facts.mean("second_moment_each_coordinate", unit, first_square);
    facts.mean("mean_abs_coordinate", unit, first_size);
    facts.mean("fourth_moment_coordinate", unit, first_fourth);
    facts.mean("mixed_moment_x2_y2", unit, [](const auto& p) { return p[0] * p[0] * p[1] * p[1]; });
    facts.mean_pair_distance(unit); // 4/3 in space
}

TEST(SmoothGoodness, Sphere2) { check_sphere<2>("regions.sphere.2"); }
// Its first number is the height: Archimedes' hat-box theorem.
TEST(SmoothGoodness, Sphere3) { check_sphere<3>("regions.sphere.3"); }
TEST(SmoothGoodness, Sphere4) { check_sphere<4>("regions.sphere.4"); }
TEST(SmoothGoodness, Sphere6) { check_sphere<6>("regions.sphere.6"); }

template <class Region>
void check_shell(const std::string& id, const char* content) {
    const published facts(id);
    const auto& parameters = reference_entry(id)["parameters"];
    const double inner = std::stod(parameters["r1"].get<std::string>());
    const double outer = std::stod(parameters["r2"].get<std::string>());
    const Region r{typename Region::point_type{}, inner, outer};
    check_uniform(r,
                  [&](const auto& p) { return shell_numbers<Region::dimension>(p, inner, outer); });
    EXPECT_NEAR(r.measure() / facts[content], 1, 1e-14);
    facts.mean("mean_radius", r, radius);
    facts.mean("mean_squared_radius", r, square_radius);
    facts.mean("second_moment_each_coordinate", r, first_square);
}

TEST(SmoothGoodness, Annulus) { check_shell<leat::annulus<>>("regions.annulus.1.2", "area"); }
TEST(SmoothGoodness, AnnulusOfASmallHollow) {
    check_shell<leat::annulus<>>("regions.annulus.0.1.5", "area");
}
TEST(SmoothGoodness, Shell) { check_shell<leat::shell<3>>("regions.shell.1.2", "volume"); }
TEST(SmoothGoodness, ShellThin) {
    check_shell<leat::shell<3>>("regions.shell.0.5.0.75", "volume");
    // thinner than outer / N, where the other method takes over
    check_uniform(leat::shell<3>{{0, 0, 0}, 1.5, 2},
                  [](const auto& p) { return shell_numbers<3>(p, 1.5, 2); });
    check_uniform(leat::shell<5>{{0, 0, 0, 0, 0}, 1.7, 2},
                  [](const auto& p) { return shell_numbers<5>(p, 1.7, 2); });
    check_uniform(leat::annulus{{0, 0}, 1.2, 2},
                  [](const auto& p) { return shell_numbers<2>(p, 1.2, 2); });
    // so thin that the radius itself is uniform
    const leat::shell<3> thinnest{{0, 0, 0}, 1, 1 + 1e-9};
    check_uniform(
        thinnest,
        [](const auto& p) {
            const auto [height, turn] = direction_numbers<3>(p);
            return unit_numbers<3>{(length_of(p) - 1) / 1e-9, height, turn};
        },
        few);
}

TEST(SmoothGoodness, Sector) {
    for (const auto& s : {leat::sector{{1, 2}, 3, 0.5, 1.25}, leat::sector{{1, 2}, 3, -2, 3.5}}) {
        check_uniform(s, [&s](const auto& p) {
            const auto v = from(s.centre(), p);
            double angle = std::atan2(v[1], v[0]);
            angle += angle < s.from() ? 2 * pi : 0;
            return unit_numbers<2>{(v[0] * v[0] + v[1] * v[1]) / 9,
                                   (angle - s.from()) / (s.to() - s.from())};
        });
    }
}

TEST(SmoothGoodness, Ellipsoid) {
    check_uniform(leat::ellipsoid{{1, 2, 3}, {3, 0.01, 500}}, [](const auto& p) {
        return shell_numbers<3>({(p[0] - 1) / 3, (p[1] - 2) / 0.01, (p[2] - 3) / 500}, 0, 1);
    });
}

void check_cap(const std::string& id, const leat::cap<>& c, const std::array<double, 3>& axis) {
    const test_frame frame(axis);
    const double angle = double{c.half_angle()};
    const auto local = [&](const auto& p) { return frame(from(c.centre(), p)); };
    check_uniform(c, [&](const auto& p) {
        const auto [x, y, z] = local(p);
        return unit_numbers<2>{(1 - z) / (1 - std::cos(angle)), turn_of(y, x)};
    });
    const published facts(id);
    EXPECT_NEAR(c.measure() / facts["area"], 1, 1e-14);
    facts.mean("mean_z", c, [&](const auto& p) { return local(p)[2]; });
    facts.mean("second_moment_z", c, [&](const auto& p) { return third_square(local(p)); });
    facts.mean("second_moment_x", c, [&](const auto& p) { return first_square(local(p)); });
    facts.mean("mean_polar_angle", c, [&](const auto& p) { return std::acos(local(p)[2]); });
    facts.share("share_within_half_angle", c,
                [&](const auto& p) { return std::acos(local(p)[2]) < angle / 2; });
}

TEST(SmoothGoodness, Cap) {
    check_cap("regions.cap.10", leat::cap{{0, 0, 0}, 1, {0, 0, 1}, pi / 18}, {0, 0, 1});
    check_cap("regions.cap.60", leat::cap{{3, -2, 1}, 1, {1, -2, -0.5}, pi / 3}, {1, -2, -0.5});
}

TEST(SmoothGoodness, Cylinder) {
    const test_frame frame({1, -2, 0.5});
    const leat::cylinder tilted{{5, 6, 7}, {1, -2, 0.5}, 0.5, 20};
    check_uniform(tilted, [&](const auto& p) {
        const auto [x, y, z] = frame(from({5.0, 6.0, 7.0}, p));
        return unit_numbers<3>{z / 20, (x * x + y * y) / 0.25, turn_of(y, x)};
    });
    const published facts("regions.cylinder.solid");
    const leat::cylinder upright{{0, 0, -1}, {0, 0, 3}, 1, 2};
    EXPECT_DOUBLE_EQ(upright.measure(), facts["volume"]);
    facts.mean("second_moment_x", upright, first_square);
    facts.mean("second_moment_z", upright, third_square);
    facts.mean("mean_squared_distance_from_centre", upright, square_radius);
    facts.mean("mean_axis_distance", upright, [](const auto& p) { return std::hypot(p[0], p[1]); });
}

// Volume above a height is as the cube of the distance from the tip.
TEST(SmoothGoodness, Cone) {
    const test_frame frame({-1, 2, 0.5});
    check_uniform(leat::cone{{5, 6, 7}, {-1, 2, 0.5}, 3, 20}, [&](const auto& p) {
        const auto [x, y, z] = frame(from({5.0, 6.0, 7.0}, p));
        const double from_tip = 1 - z / 20;
        const double across = std::hypot(x, y) / (3 * from_tip);
        return unit_numbers<3>{whole_power(from_tip, 3), across * across, turn_of(y, x)};
    });
}

unit_numbers<2> torus_numbers(const std::array<double, 3>& p) { // major 2, minor 0.5
    const double tube = std::atan2(p[2], std::hypot(p[0], p[1]) - 2);
    return {(tube + 0.25 * std::sin(tube)) / (2 * pi) + 0.5, turn_of(p[1], p[0])};
}

TEST(SmoothGoodness, Torus) {
    const leat::torus ring{{0, 0, 0}, 2, 0.5};
    check_uniform(ring, torus_numbers);
    const published facts("regions.torus.2.0.5");
    EXPECT_DOUBLE_EQ(ring.measure(), facts["area"]);
    const auto across = [](const auto& p) { return std::hypot(p[0], p[1]); };
    facts.mean("mean_axis_distance", ring, across);
    facts.mean("mean_squared_axis_distance", ring,
               [&](const auto& p) { return across(p) * across(p); });
    facts.mean("second_moment_x", ring, first_square);
    facts.mean("second_moment_z", ring, third_square);
    facts.share("share_outer_half", ring, [&](const auto& p) { return across(p) > 2; });
}

double angle_of(const std::array<double, 4>& q) {
    return 2 * std::acos(std::min(1.0, std::abs(q[0])));
}

// The angle of a uniform rotation has the law (t - sin t) / pi (Miles, Biometrika 52, 1965; from
// memory; its density stands in regions.rotation.so3).
outcome angle_law_test(const std::vector<std::array<double, 4>>& quaternions) {
    std::vector<double> angles;
    for (const auto& q : quaternions) {
        angles.push_back(angle_of(q));
    }
    return kolmogorov_smirnov_test("angle", angles,
                                   [](double t) { return (t - std::sin(t)) / pi; });
}

template <class Sampler>
std::vector<outcome> rotation_report(const Sampler& sampler, int n) {
    auto g = source_of_this_test().stream("rotations");
    std::vector<std::array<double, 4>> all(static_cast<std::size_t>(n));
    std::vector<unit_numbers<3>> numbers;
    for (auto& q : all) {
        q = sampler(g);
        numbers.push_back(direction_numbers<4>(q));
    }
    auto report = uniform_report(numbers);
    report.push_back(angle_law_test(all));
    return report;
}

TEST(SmoothGoodness, Rotation) {
    const leat::rotation r;
    check(rotation_report(r, many));
    const published facts("regions.rotation.so3");
    facts.mean("mean_angle", r, angle_of);
    facts.mean("mean_cos_angle", r, [](const auto& q) { return std::cos(angle_of(q)); });
    facts.mean("mean_squared_angle", r, [](const auto& q) { return angle_of(q) * angle_of(q); });
    facts.share("share_angle_below_90_degrees", r,
                [](const auto& q) { return angle_of(q) < pi / 2; });
    // What it makes of any vector is uniform on the sphere.
    check_uniform(r, [](const auto& q) {
        return direction_numbers<3>(leat::rotation<>::apply(q, {1, -2, 2}));
    });
}

TEST(SmoothGoodness, BoxAndSegments) {
    check_uniform(leat::box<3>{{-1, 0, 1e6}, {3, 1e-9, 1e6 + 1}}, [](const auto& p) {
        return unit_numbers<3>{(p[0] + 1) / 4, p[1] / 1e-9, p[2] - 1e6};
    });
    check_uniform(leat::segment{{3, 4}, {0, 0}},
                  [](const auto& p) { return unit_numbers<1>{length_of(p) / 5}; });
    // by length 3, 4, 0, 1
    const leat::polyline<2> bent{
        std::vector<std::array<double, 2>>{{0, 0}, {3, 0}, {3, 4}, {3, 4}, {2, 4}}};
    EXPECT_DOUBLE_EQ(bent.measure(), 8);
    check_uniform(bent, [](const auto& p) {
        const double way = p[1] == 0 ? p[0] : p[0] == 3 ? 3 + p[1] : 7 + (3 - p[0]);
        return unit_numbers<1>{way / 8};
    });
    const leat::box<2> square{{0, 0}, {1, 1}};
    published("regions.square.unit").mean_pair_distance(square);
    published("regions.square.unit").share("share_in_inscribed_circle", square, [](const auto& p) {
        return std::hypot(p[0] - 0.5, p[1] - 0.5) < 0.5;
    });
    published("regions.cube.unit").mean_pair_distance(leat::box<3>{{0, 0, 0}, {1, 1, 1}});
}

// The inverse by Cramer's rule; area |det| times that of the box.
TEST(SmoothGoodness, AffineImage) {
    const leat::affine_image sheared{leat::box{{0, 0}, {2, 1}}, {{{1, 3}, {-2, 4}}}, {3, 4}};
    EXPECT_DOUBLE_EQ(sheared.measure(), 20);
    check_uniform(sheared, [](const auto& p) {
        const double x = p[0] - 3;
        const double y = p[1] - 4;
        return unit_numbers<2>{(4 * x - 3 * y) / 10 / 2, (2 * x + y) / 10};
    });
}

// ---- directions ----

TEST(SmoothGoodness, Directions) {
    check_uniform(leat::isotropic_direction<float>{},
                  [](const auto& p) { return direction_numbers<3>(from({}, p)); });
    const test_frame frame({2, 1, -2});
    check_uniform(leat::direction_in_cone{{2, 1, -2}, 0.3}, [&](const auto& p) {
        const auto [x, y, z] = frame(p);
        return unit_numbers<2>{(1 - z) / (1 - std::cos(0.3)), turn_of(y, x)};
    });
    // P(cos t <= z) = z^2 (Lambert)
    check_uniform(leat::lambert_direction{{2, 1, -2}}, [&](const auto& p) {
        const auto [x, y, z] = frame(p);
        return unit_numbers<2>{z * z, turn_of(y, x)};
    });
}

TEST(SmoothGoodness, VonMisesFisher) {
    const test_frame frame({2, 1, -2});
    for (const char* text : {"0.5", "2", "10"}) {
        const double kappa = std::stod(text);
        const leat::von_mises_fisher law{{2, 1, -2}, kappa};
        check_uniform(law, [&](const auto& p) {
            const auto [x, y, z] = frame(p);
            return unit_numbers<2>{std::expm1(-kappa * (1 - z)) / std::expm1(-2 * kappa),
                                   turn_of(y, x)};
        });
        const published facts("regions.vmf." + std::string(text));
        facts.mean("mean_z", law, [&](const auto& p) { return frame(p)[2]; });
        facts.mean("second_moment_z", law, [&](const auto& p) { return third_square(frame(p)); });
        facts.mean("second_moment_x", law, [&](const auto& p) { return first_square(frame(p)); });
    }
    const leat::von_mises_fisher weak{{2, 1, -2}, 0.45}; // the other branch
    check_uniform(weak, [&](const auto& p) {
        const auto [x, y, z] = frame(p);
        return unit_numbers<2>{std::expm1(-0.45 * (1 - z)) / std::expm1(-0.9), turn_of(y, x)};
    });
}

// ---- planted: the mistakes that survive a look at a plot ----

using point3 = std::array<double, 3>;

template <class Sampler, class Map>
std::vector<outcome> report_of(const Sampler& sampler, Map map) {
    auto g = source_of_this_test().stream("uniform");
    return uniform_report(unit_numbers_of(sampler, map, few, g));
}

TEST(PlantedFaults, UniformPolarAngleIsRejected) {
    const auto faulty = [](leat::stream& g) -> point3 {
        const double polar = pi * leat::unit(g);
        const double around = 2 * pi * leat::unit(g);
        return {std::sin(polar) * std::cos(around), std::sin(polar) * std::sin(around),
                std::cos(polar)};
    };
    EXPECT_TRUE(is_rejected(report_of(faulty, direction_numbers<3>)));
}

TEST(PlantedFaults, NormalisedCubePointsAreRejected) {
    const auto faulty = [](leat::stream& g) -> point3 {
        point3 p{};
        for (double& x : p) {
            x = 2 * leat::unit(g) - 1;
        }
        const double length = length_of(p);
        return {p[0] / length, p[1] / length, p[2] / length};
    };
    EXPECT_TRUE(is_rejected(report_of(faulty, direction_numbers<3>)));
}

TEST(PlantedFaults, UniformRadiusInABallIsRejected) {
    const auto faulty = [](leat::stream& g) -> point3 {
        const double r = leat::unit(g);
        const auto p = leat::sphere<3>{{0, 0, 0}, 1}(g);
        return {r * p[0], r * p[1], r * p[2]};
    };
    EXPECT_TRUE(
        is_rejected(report_of(faulty, [](const point3& p) { return shell_numbers<3>(p, 0, 1); })));
}

TEST(PlantedFaults, UniformTubeAngleIsRejected) {
    const auto faulty = [](leat::stream& g) -> point3 {
        const double tube = 2 * pi * leat::unit(g);
        const double around = 2 * pi * leat::unit(g);
        const double distance = 2 + 0.5 * std::cos(tube);
        return {distance * std::cos(around), distance * std::sin(around), 0.5 * std::sin(tube)};
    };
    EXPECT_TRUE(is_rejected(report_of(faulty, torus_numbers)));
}

// Turns about z, then x, then z, by three uniform angles.
TEST(PlantedFaults, UniformEulerAnglesAreRejected) {
    const auto faulty = [](leat::stream& g) -> std::array<double, 4> {
        const double first = 2 * pi * leat::unit(g);
        const double middle = pi * leat::unit(g);
        const double last = 2 * pi * leat::unit(g);
        const double sum = (first + last) / 2;
        const double difference = (first - last) / 2;
        return {std::cos(middle / 2) * std::cos(sum), std::sin(middle / 2) * std::cos(difference),
                std::sin(middle / 2) * std::sin(difference), std::cos(middle / 2) * std::sin(sum)};
    };
    EXPECT_TRUE(is_rejected(rotation_report(faulty, few)));
}

TEST(PlantedFaults, UniformAngleAboutAUniformAxisIsRejected) {
    const auto faulty = [](leat::stream& g) -> std::array<double, 4> {
        const auto axis = leat::isotropic_direction<>{}(g);
        const double half = pi * leat::unit(g);
        return {std::cos(half), std::sin(half) * axis[0], std::sin(half) * axis[1],
                std::sin(half) * axis[2]};
    };
    EXPECT_TRUE(is_rejected(rotation_report(faulty, few)));
}

// And the right ones pass the same tests at the same size.
TEST(PlantedFaults, RightOnesPassAtTheSameSize) {
    check(report_of(leat::sphere<3>{{0, 0, 0}, 1}, direction_numbers<3>));
    check(report_of(leat::ball<3>{{0, 0, 0}, 1},
                    [](const point3& p) { return shell_numbers<3>(p, 0, 1); }));
    check(report_of(leat::torus{{0, 0, 0}, 2, 0.5}, torus_numbers));
    check(rotation_report(leat::rotation{}, few));
}

} // namespace
