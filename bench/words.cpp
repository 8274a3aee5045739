// 64-bit words: the engines, beside std::mt19937_64 and rand(), and memset as the limit. And what
// it costs to open a stream.

#include "harness.hpp"

#include "leat/engines/combined_recursive.hpp"
#include "leat/engines/lehmer128.hpp"
#include "leat/engines/multiply_with_carry.hpp"
#include "leat/engines/philox.hpp"
#include "leat/streams/ledger.hpp"

#include <cstdlib>
#include <cstring>

namespace {

using namespace leat_bench;
using word = std::uint64_t;

template <class Open>
void add_words(const std::string& name, Open open) {
    add<word>("words/" + name + ", filled", [open] {
        return [g = open()](std::span<word> out) mutable { leat::fill_words(out, g); };
    });
}

const auto next = [](auto& g) -> word { return g(); };

/// Opens the stream of a new path, and draws once.
template <class Open>
void add_opening(const std::string& name, Open open) {
    benchmark::RegisterBenchmark(("open and draw once/" + name).c_str(),
                                 [open](benchmark::State& state) {
                                     const leat::source study{20261201};
                                     std::uint64_t i = 0;
                                     for (auto _ : state) {
                                         auto s = open(study, ++i);
                                         benchmark::DoNotOptimize(s());
                                     }
                                     state.SetItemsProcessed(state.iterations());
                                 });
}

const bool registered = [] {
    add_loop<word>("words/std::mt19937_64", twister, next);
    add<word>("words/rand(), 31 bits", [] {
        return [](std::span<word> out) {
            for (word& x : out) {
                x = static_cast<word>(std::rand());
            }
        };
    });
    add<word>("words/memset", [] {
        return [](std::span<word> out) { std::memset(out.data(), 1, out.size_bytes()); };
    });
    add_words("braid", braid);
    add_words("stream", stream);
    add_words("thin_stream", [] { return leat::source{20261201}.thin_stream("bench"); });
    add_words("xoshiro256++", xoshiro);
    add_loop<word>("words/stream, one by one", stream, next);
    add_loop<word>(
        "words/stream in a ledger, one by one",
        [] {
            static leat::ledger book;
            return leat::source{20261201, book}.stream("bench");
        },
        next);
    add_loop<word>("words/braid, one by one", braid, next);
    add_loop<word>("words/xoshiro256++, one by one", xoshiro, next);
    add_loop<word>(
        "words/philox4x64, one by one", [] { return leat::philox4x64{}; }, next);
    add_loop<word>(
        "words/lehmer128, one by one", [] { return leat::lehmer128{}; }, next);
    add_loop<word>(
        "words/mwc_lag1_64, one by one", [] { return leat::mwc_lag1_64{}; }, next);
    add_loop<word>(
        "words/mrg32k3a, 32 bits, one by one", [] { return leat::mrg32k3a{}; }, next);

    add_opening("std::mt19937_64", [](const leat::source&, word i) { return std::mt19937_64{i}; });
    add_opening("thin_stream", [](const leat::source& study, word i) {
        return study.thin_stream("turbine", 3, "failures", i);
    });
    add_opening("stream", [](const leat::source& study, word i) {
        return study.stream("turbine", 3, "failures", i);
    });
    return true;
}();

} // namespace
