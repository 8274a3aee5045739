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

leat::stream make(leat::stream*) { return leat::source{1}.stream(); }
leat::xoshiro256_plus_plus make(leat::xoshiro256_plus_plus*) { return {}; }

template <class Engine, class Sampler>
void fill_points(benchmark::State& state, Sampler sampler) {
    Engine g = make(static_cast<Engine*>(nullptr));
    std::vector<point> points(4096);
    for (auto _ : state) {
        for (point& p : points) {
            p = sampler(g);
        }
        benchmark::DoNotOptimize(points.data());
        benchmark::ClobberMemory();
    }
    state.counters["ns_a_point"] = benchmark::Counter(
        4096e-9, benchmark::Counter::kIsIterationInvariantRate | benchmark::Counter::kInvert);
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
}

const bool registered = [] {
    register_all<leat::stream>("stream");
    register_all<leat::xoshiro256_plus_plus>("xoshiro256_plus_plus");
    return true;
}();

} // namespace
