// Digests of the engines: seeds of every form, draws, discards, jumps and their own unit().

#include "leat/engines.hpp"
#include "digest/digest.hpp"
#include "leat/compat/historical.hpp"

#include <string>

namespace digests {
namespace {

/// A seed sequence without <random>: 1, 2, 3, ...
struct counting {
    using result_type = std::uint32_t;
    template <class Iterator>
    void generate(Iterator begin, Iterator end) {
        for (std::uint32_t i = 1; begin != end; ++begin) {
            *begin = i++;
        }
    }
};

template <class Engine>
void engine(const char* name) {
    digest d;
    const auto draw = [&d](Engine& e, int count) {
        for (int i = 0; i < count; ++i) {
            d.add(static_cast<std::uint64_t>(e()));
        }
    };
    Engine e;
    draw(e, 20000);
    e.seed(20261201);
    draw(e, 1000);
    counting sequence;
    e.seed(sequence);
    draw(e, 1000);
    e.discard(12345);
    draw(e, 1000);
    if constexpr (requires { e.advance(leat::wide_integer{}); }) {
        e.advance(leat::wide_integer{"123456789012345678901234567890"} % Engine::period());
        draw(e, 1000);
        e.advance(Engine::period() / leat::wide_integer{3});
        draw(e, 1000);
    }
    print(false, name, d);
    if constexpr (requires { e.unit(); }) {
        digest units;
        for (int i = 0; i < 10000; ++i) {
            units.add(e.unit());
        }
        print(true, (std::string(name) + ".unit").c_str(), units);
    }
}

} // namespace

void engines() {
    engine<leat::minimal_standard>("engine.minimal_standard");
    engine<leat::minimal_standard_48271>("engine.minimal_standard_48271");
    engine<leat::minimal_standard_69621>("engine.minimal_standard_69621");
    engine<leat::lehmer128>("engine.lehmer128");
    engine<leat::mwc_lag4_32>("engine.mwc_lag4_32");
    engine<leat::mwc_lag1_32>("engine.mwc_lag1_32");
    engine<leat::mwc_lag1_64>("engine.mwc_lag1_64");
    engine<leat::xorshift32>("engine.xorshift32");
    engine<leat::xorshift64>("engine.xorshift64");
    engine<leat::xorshift128>("engine.xorshift128");
    engine<leat::xorshift64_star>("engine.xorshift64_star");
    engine<leat::xorshift128_plus>("engine.xorshift128_plus");
    engine<leat::xoroshiro128_plus_plus>("engine.xoroshiro128_plus_plus");
    engine<leat::xoshiro256_plus>("engine.xoshiro256_plus");
    engine<leat::xoshiro256_plus_plus>("engine.xoshiro256_plus_plus");
    engine<leat::xoshiro256_star_star>("engine.xoshiro256_star_star");
    engine<leat::xoshiro256_braid>("engine.xoshiro256_braid");
    engine<leat::mrg32k3a>("engine.mrg32k3a");
    engine<leat::splitmix64>("engine.splitmix64");
    engine<leat::philox4x32>("engine.philox4x32");
    engine<leat::philox4x64>("engine.philox4x64");
    engine<leat::shuffled<leat::minimal_standard, 256>>("engine.shuffled.minimal_standard");
    engine<leat::shuffled<leat::xoshiro256_plus, 64>>("engine.shuffled.xoshiro256_plus");
    engine<leat::shuffled_by<leat::minimal_standard, leat::minimal_standard_48271, 128>>(
        "engine.shuffled_by.minimal_standard");
    engine<leat::iso_c_sample>("engine.iso_c_sample");
    engine<leat::posix48>("engine.posix48");
    engine<leat::additive_feedback31>("engine.additive_feedback31");
    engine<leat::additive_feedback63>("engine.additive_feedback63");
}

} // namespace digests
