// What draws of the discrete laws cost, beside the standard library's, in one run.
//
// fill: arrays from a leat::stream, against a loop over the standard law and std::mt19937_64. The
// bars: poisson(4) 6 times as fast, poisson(1000) 4, binomial(100, 0.3) 6.
// fresh: new parameters at each draw, set-up included, both from the same engine. The bar: not
// slower. Run with --benchmark_enable_random_interleaving=true --benchmark_repetitions=5.

#include "leat/bulk/fill.hpp"
#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/zipf.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/source.hpp"

#include <benchmark/benchmark.h>

#include <array>
#include <cstdint>
#include <random>
#include <string>

namespace {

constexpr int many = 4096;

void count(benchmark::State& state) {
    state.counters["ns_a_draw"] = benchmark::Counter(
        many * 1e-9, benchmark::Counter::kIsIterationInvariantRate | benchmark::Counter::kInvert);
}

template <class Law>
void add_fill(const std::string& name, Law law) {
    benchmark::RegisterBenchmark(("fill/" + name + "/leat").c_str(), [law](auto& state) {
        leat::stream g = leat::source{1}.stream();
        std::array<typename Law::result_type, many> out{};
        for (auto _ : state) {
            leat::fill(out, law, g);
            benchmark::DoNotOptimize(out.data());
            benchmark::ClobberMemory();
        }
        count(state);
    });
}

template <class Law>
void add_standard(const std::string& name, const Law& law) {
    benchmark::RegisterBenchmark(("fill/" + name + "/std").c_str(), [law](auto& state) {
        std::mt19937_64 g{1};
        std::array<typename Law::result_type, many> out{};
        Law own = law;
        for (auto _ : state) {
            for (auto& x : out) {
                x = own(g);
            }
            benchmark::DoNotOptimize(out.data());
            benchmark::ClobberMemory();
        }
        count(state);
    });
}

/// `draw(i, g)` makes a law for event i and draws once.
template <class Draw>
void add_fresh(const std::string& name, Draw draw) {
    benchmark::RegisterBenchmark(("fresh/" + name).c_str(), [draw](auto& state) {
        leat::xoshiro256_plus_plus g{1};
        for (auto _ : state) {
            std::int64_t sum = 0;
            for (int i = 0; i < many; ++i) {
                sum += draw(1 + i * (0.001 / many), g);
            }
            benchmark::DoNotOptimize(sum);
        }
        count(state);
    });
}

void add_fresh_poisson(double mean) {
    const std::string name = "poisson " + std::to_string(mean);
    add_fresh(name + "/leat",
              [mean](double near_1, auto& g) { return leat::poisson{mean * near_1}(g); });
    add_fresh(name + "/std", [mean](double near_1, auto& g) {
        return std::poisson_distribution<std::int64_t>{mean * near_1}(g);
    });
}

void add_fresh_binomial(int n, double p) {
    const std::string name = "binomial " + std::to_string(n) + " " + std::to_string(p);
    add_fresh(name + "/leat", [n, p](double near_1, auto& g) {
        return leat::binomial{n, p * near_1}(g);
    });
    add_fresh(name + "/std", [n, p](double near_1, auto& g) {
        return std::binomial_distribution<std::int64_t>{n, p * near_1}(g);
    });
}

void add_fresh_geometric(double p) {
    const std::string name = "geometric " + std::to_string(p);
    add_fresh(name + "/leat",
              [p](double near_1, auto& g) { return leat::geometric{p * near_1}(g); });
    add_fresh(name + "/std", [p](double near_1, auto& g) {
        return std::geometric_distribution<std::int64_t>{p * near_1}(g);
    });
}

[[maybe_unused]] const bool registered = [] {
    add_fill("bernoulli 0.3", leat::bernoulli{0.3});
    add_standard("bernoulli 0.3", std::bernoulli_distribution{0.3});
    for (const double mean : {0.1, 4.0, 30.0, 1000.0}) {
        const std::string name = "poisson " + std::to_string(mean);
        add_fill(name, leat::poisson{mean});
        add_standard(name, std::poisson_distribution<std::int64_t>{mean});
        add_fresh_poisson(mean);
    }
    add_fill("binomial 10 0.3", leat::binomial{10, 0.3});
    add_standard("binomial 10 0.3", std::binomial_distribution<std::int64_t>{10, 0.3});
    add_fill("binomial 100 0.3", leat::binomial{100, 0.3});
    add_standard("binomial 100 0.3", std::binomial_distribution<std::int64_t>{100, 0.3});
    add_fresh_binomial(10, 0.3);
    add_fresh_binomial(100, 0.3);
    add_fresh_binomial(1000000, 0.3);
    add_fill("geometric 0.1", leat::geometric{0.1});
    add_standard("geometric 0.1", std::geometric_distribution<std::int64_t>{0.1});
    add_fresh_geometric(0.1);
    add_fresh_geometric(1e-6);
    add_fill("negative_binomial 3 0.4", leat::negative_binomial{3, 0.4});
    add_standard("negative_binomial 3 0.4",
                 std::negative_binomial_distribution<std::int64_t>{3, 0.4});
    add_fill("hypergeometric 1000 300 100", leat::hypergeometric{1000, 300, 100});
    add_fill("hypergeometric 100 30 10", leat::hypergeometric{100, 30, 10});
    add_fill("zipf 1.1 10^6", leat::zipf{1.1, 1000000});
    return true;
}();

} // namespace
