// What the benchmarks of fills share. A benchmark is called WORK/ENTRY: the entries of one work do
// the same thing, one of them being the baseline, and ratios.py compares them. All of them fill an
// array of 16384 elements, 128 KiB of doubles, which the second-level cache holds.

#ifndef LEAT_BENCH_HARNESS_HPP
#define LEAT_BENCH_HARNESS_HPP

#include "leat/bulk/fill.hpp"
#include "leat/engines/braid.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/source.hpp"

#include <benchmark/benchmark.h>
#include <gsl/gsl_rng.h>

#include <cstddef>
#include <cstdint>
#include <memory>
#include <random>
#include <span>
#include <string>
#include <vector>

namespace leat_bench {

inline constexpr std::size_t elements = 16384;

/// Adds a benchmark that times work(span): `open()` gives the work, with its engine.
template <class Element, class Open>
benchmark::internal::Benchmark* add(const std::string& name, Open open,
                                    std::size_t length = elements) {
    return benchmark::RegisterBenchmark(name.c_str(), [open, length](benchmark::State& state) {
        auto work = open();
        std::vector<Element> array(length);
        for (auto _ : state) {
            work(std::span(array));
            benchmark::DoNotOptimize(array.data());
            benchmark::ClobberMemory();
        }
        state.SetItemsProcessed(static_cast<std::int64_t>(length) * state.iterations());
    });
}

/// The same for a sampler drawn from one by one: `open()` gives the engine.
template <class Element, class Open, class Sampler>
void add_loop(const std::string& name, Open open, Sampler sampler) {
    add<Element>(name, [open, sampler] {
        return [g = open(), draw = sampler](std::span<Element> out) mutable {
            for (Element& x : out) {
                x = draw(g);
            }
        };
    });
}

/// The same for a fill.
template <class Element, class Open, class Sampler>
void add_fill(const std::string& name, Open open, Sampler sampler) {
    add<Element>(name, [open, sampler] {
        return
            [g = open(), sampler](std::span<Element> out) mutable { leat::fill(out, sampler, g); };
    });
}

inline const auto stream = [] { return leat::source{20261201}.stream("bench"); };
inline const auto braid = [] { return leat::xoshiro256_braid{20261201}; };
inline const auto xoshiro = [] { return leat::xoshiro256_plus_plus{20261201}; };
inline const auto twister = [] { return std::mt19937_64{20261201}; };
inline const auto gsl_twister = [] {
    return std::shared_ptr<gsl_rng>(gsl_rng_alloc(gsl_rng_mt19937), gsl_rng_free);
};

/// leat's sampler in the ways people draw from it.
template <class Element, class Sampler>
void add_ours(const std::string& work, Sampler sampler) {
    add_fill<Element>(work + "/braid, filled", braid, sampler);
    add_fill<Element>(work + "/stream, filled", stream, sampler);
    add_loop<Element>(work + "/stream, one by one", stream, sampler);
    add_loop<Element>(work + "/xoshiro256++, one by one", xoshiro, sampler);
}

} // namespace leat_bench

#endif
