// What jumps and step counts cost, by distance.
//
// Bars: Lehmer engines and counters any distance below 1 microsecond;
// mrg32k3a and multiply-with-carry below 20; xorshift types of 256 bits below 60; steps_between
// modulo 2^31 - 1 below 1 millisecond, of xorshift64 below 100. The baseline is what a jump
// replaces: so many draws, here 2^10 of them.

#include "leat/engines/braid.hpp"
#include "leat/engines/combined_recursive.hpp"
#include "leat/engines/counter.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/lehmer128.hpp"
#include "leat/engines/multiply_with_carry.hpp"
#include "leat/engines/xoroshiro.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/jump.hpp"
#include "leat/streams/split.hpp"
#include "leat/streams/steps.hpp"

#include <benchmark/benchmark.h>

#include <cstdint>
#include <limits>

namespace {

using lehmer_mersenne61 = leat::lehmer<std::uint64_t, 37, 2305843009213693951u>;

template <class E>
void draw_1024(benchmark::State& state) {
    E e;
    for (auto _ : state) {
        for (int i = 0; i < 1024; ++i) {
            benchmark::DoNotOptimize(e());
        }
    }
}

/// A jump by 2^k - 1: all bits of the distance set.
template <class E>
void jump_by_bits(benchmark::State& state) {
    E e;
    const leat::wide_integer distance =
        leat::wide_integer::power_of_two(static_cast<unsigned>(state.range(0))) - 1;
    for (auto _ : state) {
        leat::jump(e, distance);
        benchmark::DoNotOptimize(e);
    }
}

/// A jump by 2^k, k beyond any wide integer: the reduction by the period is the work.
template <class E>
void jump_by_power(benchmark::State& state) {
    E e;
    const auto k = static_cast<std::uint64_t>(state.range(0));
    for (auto _ : state) {
        leat::jump(e, leat::pow2(k));
        benchmark::DoNotOptimize(e);
    }
}

template <class E>
void count_steps(benchmark::State& state) {
    E a;
    E b;
    for (auto _ : state) {
        b();
        benchmark::DoNotOptimize(b);
        const auto steps = leat::steps_between(b, a);
        benchmark::DoNotOptimize(steps);
    }
}

/// A draw of a leap by 1000.
template <class E>
void draw_leap(benchmark::State& state) {
    auto leap = leat::leapfrog(E{}, 1, 1000);
    for (auto _ : state) {
        benchmark::DoNotOptimize(leap());
    }
}

#define LEAT_BENCH_JUMPS(name, E)                                                                  \
    BENCHMARK(draw_1024<E>)->Name("draw 1024/" name);                                              \
    BENCHMARK(jump_by_bits<E>)->Name("jump 2^k-1/" name)->Arg(10)->Arg(32)->Arg(64)->Arg(250);     \
    BENCHMARK(jump_by_power<E>)                                                                    \
        ->Name("jump pow2/" name)                                                                  \
        ->Arg(1000)                                                                                \
        ->Arg(std::numeric_limits<std::int64_t>::max());

LEAT_BENCH_JUMPS("minimal_standard", leat::minimal_standard)
LEAT_BENCH_JUMPS("lehmer mod 2^61-1", lehmer_mersenne61)
LEAT_BENCH_JUMPS("lehmer128", leat::lehmer128)
LEAT_BENCH_JUMPS("splitmix64", leat::splitmix64)
LEAT_BENCH_JUMPS("philox4x32", leat::philox4x32)
LEAT_BENCH_JUMPS("philox4x64", leat::philox4x64)
LEAT_BENCH_JUMPS("mwc_lag1_32", leat::mwc_lag1_32)
LEAT_BENCH_JUMPS("mwc_lag1_64", leat::mwc_lag1_64)
LEAT_BENCH_JUMPS("mwc_lag4_32", leat::mwc_lag4_32)
LEAT_BENCH_JUMPS("mrg32k3a", leat::mrg32k3a)
LEAT_BENCH_JUMPS("xorshift32", leat::xorshift32)
LEAT_BENCH_JUMPS("xorshift64", leat::xorshift64)
LEAT_BENCH_JUMPS("xoroshiro128_plus_plus", leat::xoroshiro128_plus_plus)
LEAT_BENCH_JUMPS("xoshiro256_plus_plus", leat::xoshiro256_plus_plus)
LEAT_BENCH_JUMPS("xoshiro256_braid", leat::xoshiro256_braid)

BENCHMARK(count_steps<leat::minimal_standard>)->Name("steps_between/minimal_standard");
BENCHMARK(count_steps<leat::lehmer128>)->Name("steps_between/lehmer128");
BENCHMARK(count_steps<leat::splitmix64>)->Name("steps_between/splitmix64");
BENCHMARK(count_steps<leat::philox4x64>)->Name("steps_between/philox4x64");
BENCHMARK(count_steps<leat::xorshift32>)->Name("steps_between/xorshift32");
BENCHMARK(count_steps<leat::xorshift64>)->Name("steps_between/xorshift64");

BENCHMARK(draw_leap<leat::minimal_standard>)->Name("leapfrog/minimal_standard");
BENCHMARK(draw_leap<leat::lehmer128>)->Name("leapfrog/lehmer128");
BENCHMARK(draw_leap<leat::philox4x32>)->Name("leapfrog/philox4x32");

} // namespace
