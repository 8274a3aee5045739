// What a point of a region costs, one by one, beside its plain baselines.
//
// The disk was measured both published ways before one was kept; the other stands here as
// `disk_by_square_root`, so that the choice can be checked on another machine. The bar is twice the
// cost of two uniforms and a square root, drawn from the same engine.

#include "leat/regions.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/core/square_root.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/source.hpp"
#include "leat/uniform/open_interval.hpp"

#include <benchmark/benchmark.h>

#include <array>
#include <cmath> // to make a polygon
#include <cstddef>
#include <numbers>
#include <type_traits>
#include <vector>

namespace {

using point = std::array<double, 2>;

struct two_uniforms_and_a_root {
    template <class G>
    point operator()(G& g) const {
        const double u = leat::unit(g);
        const double v = leat::unit(g);
        return {leat::detail::square_root(u), v};
    }
};

struct disk_by_square_root { // R sqrt(u) and a uniform angle
    template <class G>
    point operator()(G& g) const {
        const leat::detail::strict<double> radius = leat::detail::square_root(leat::unit(g));
        const auto [sine, cosine] = leat::detail::sine_cosine(leat::unit(g));
        return {(radius * cosine).value, (radius * sine).value};
    }
};

// The published alternatives that were measured and not kept.

template <std::size_t N>
struct ball_by_normals {
    template <class G>
    std::array<double, N> operator()(G& g) const {
        const leat::detail::normal_vector<N> normals(g);
        const leat::detail::strict<double> e = leat::detail::standard_exponential(g);
        return leat::detail::over(normals.x,
                                  leat::detail::square_root((e + e + normals.square).value));
    }
};

template <std::size_t N>
struct sphere_by_normals {
    template <class G>
    std::array<double, N> operator()(G& g) const {
        const leat::detail::normal_vector<N> normals(g);
        return leat::detail::over(normals.x, leat::detail::square_root(normals.square));
    }
};

template <std::size_t N>
struct ball_by_rejection {
    template <class G>
    std::array<double, N> operator()(G& g) const {
        for (;;) {
            std::array<double, N> p{};
            double square = 0;
            for (double& x : p) {
                x = 2 * leat::unit(g) - 1;
                square += x * x;
            }
            if (square < 1) {
                return p;
            }
        }
    }
};

struct rotation_by_sines { // Shoemake's own way to the two angles
    template <class G>
    std::array<double, 4> operator()(G& g) const {
        using real = leat::detail::strict<double>;
        const real u = leat::unit(g);
        const auto a = leat::detail::sine_cosine(leat::unit(g));
        const auto b = leat::detail::sine_cosine(leat::unit(g));
        const real first = leat::detail::square_root((real(1) - u).value);
        const real second = leat::detail::square_root(u.value);
        return {(first * a.sine).value, (first * a.cosine).value, (second * b.sine).value,
                (second * b.cosine).value};
    }
};

leat::stream make(leat::stream*) { return leat::source{1}.stream(); }
leat::xoshiro256_plus_plus make(leat::xoshiro256_plus_plus*) { return {}; }

template <class Engine, class Sampler>
void fill_points(benchmark::State& state, Sampler sampler) {
    Engine g = make(static_cast<Engine*>(nullptr));
    std::vector<std::invoke_result_t<Sampler&, Engine&>> points(4096);
    for (auto _ : state) {
        for (auto& p : points) {
            p = sampler(g);
        }
        benchmark::DoNotOptimize(points.data());
        benchmark::ClobberMemory();
    }
    state.counters["ns_a_point"] = benchmark::Counter(
        4096e-9, benchmark::Counter::kIsIterationInvariantRate | benchmark::Counter::kInvert);
}

/// A ring of n vertices with seven lobes, and teeth.
leat::polygon<> lobed_polygon(int n) {
    std::vector<std::array<double, 2>> ring;
    for (int i = 0; i < n; ++i) {
        const double angle = 2 * std::numbers::pi * i / n;
        const double radius = 1 + 0.3 * std::sin(7 * angle) + (i % 2 == 0 ? 0 : 0.001);
        ring.push_back({radius * std::cos(angle), radius * std::sin(angle)});
    }
    return leat::polygon{ring};
}

template <class Engine>
void register_all(const std::string& engine) {
    const auto add = [&engine](const char* name, auto sampler) {
        benchmark::RegisterBenchmark(
            (engine + "/" + name).c_str(),
            [sampler](benchmark::State& state) { fill_points<Engine>(state, sampler); });
    };
    add("two_uniforms_and_a_root", two_uniforms_and_a_root{});
    add("disk", leat::disk{{0, 0}, 1});
    add("disk_by_square_root", disk_by_square_root{});
    add("ellipse", leat::ellipse{{0, 0}, 8.5, 3.2, 0.4});
    add("ellipse_by_rejection", leat::ellipse_by_rejection{{0, 0}, 8.5, 3.2, 0.4});
    add("ball<3>", leat::ball<3>{{0, 0, 0}, 1});
    add("ball<3>_by_normals", ball_by_normals<3>{});
    add("ball<4>", leat::ball<4>{{0, 0, 0, 0}, 1});
    add("ball<4>_by_rejection", ball_by_rejection<4>{});
    add("sphere<3>", leat::sphere<3>{{0, 0, 0}, 1});
    add("sphere<3>_by_normals", sphere_by_normals<3>{});
    add("sphere<4>_by_normals", sphere_by_normals<4>{});
    add("rotation", leat::rotation{});
    add("rotation_by_sines", rotation_by_sines{});
    add("annulus", leat::annulus{{0, 0}, 1, 2.5});
    add("sector", leat::sector{{0, 0}, 1, 0, 1});
    add("cylinder", leat::cylinder{{0, 0, 0}, {1, 2, 3}, 1, 1});
    add("cone", leat::cone{{0, 0, 0}, {1, 2, 3}, 1, 1});
    add("torus", leat::torus{{0, 0, 0}, 2, 1});
    add("triangle", leat::triangle{{0, 0}, {4, 0}, {1, 3}});
    add("simplex<3>", leat::simplex<3>{});
    add("polygon_10", lobed_polygon(10)); // the cost of a point should not grow with the vertices
    add("polygon_1000", lobed_polygon(1000));
    add("polygon_100000", lobed_polygon(100000));
}

const bool registered = [] {
    register_all<leat::stream>("stream");
    register_all<leat::xoshiro256_plus_plus>("xoshiro256_plus_plus");
    return true;
}();

} // namespace
