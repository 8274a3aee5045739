// The digest of what leat computes: a line for each thing, the same on every machine (promise P1)
// and in every version of one major number (promise P7).
//
// To join: a line in engines.cpp, streams.cpp, uniform.cpp, maths.cpp, laws.cpp, regions.cpp or
// estimate.cpp. The digest is FNV-1a, 64 bits (Fowler, Noll and Vo, 1991; constants from memory),
// over the bytes of the values, the least significant first.

#ifndef LEAT_TESTS_DIGEST_DIGEST_HPP
#define LEAT_TESTS_DIGEST_DIGEST_HPP

#include "leat/engines/xoshiro.hpp"

#include <bit>
#include <concepts>
#include <cstdint>
#include <cstdio>
#include <type_traits>

namespace digests {

class digest {
public:
    /// Integers count as 64 bits whatever their type, reals as their own bits.
    template <std::integral T>
    void add(T x) {
        add_bytes(static_cast<std::uint64_t>(x), 8);
    }
    void add(double x) { add_bytes(std::bit_cast<std::uint64_t>(x), 8); }
    void add(float x) { add_bytes(std::bit_cast<std::uint32_t>(x), 4); }
    /// Points, vectors, texts.
    template <class Range>
    requires requires(const Range& r) { r.begin(); }
    void add(const Range& values) {
        for (const auto& value : values) {
            add(value);
        }
    }
    [[nodiscard]] std::uint64_t value() const { return value_; }

private:
    void add_bytes(std::uint64_t word, int count) {
        for (int i = 0; i < count; ++i) {
            value_ = (value_ ^ (word & 0xFFu)) * 0x100000001b3u;
            word >>= 8;
        }
    }

    std::uint64_t value_ = 0xcbf29ce484222325u;
};

/// Whether values of this type hold reals.
template <class T>
constexpr bool holds_reals() {
    if constexpr (std::is_arithmetic_v<T>) {
        return std::is_floating_point_v<T>;
    } else {
        return holds_reals<std::remove_cvref_t<decltype(*std::declval<const T&>().begin())>>();
    }
}

inline void print(bool reals, const char* name, const digest& d) {
    std::printf("%-8s %-48s %016llx\n", reals ? "reals" : "integers", name,
                static_cast<unsigned long long>(d.value()));
}

/// The line of anything that is drawn from an engine: `draw(g)`, many times.
template <class Draw, class Engine = leat::xoshiro256_plus_plus>
void draws(const char* name, const Draw& draw, int count = 50000, Engine g = Engine{20261201}) {
    digest d;
    for (int i = 0; i < count; ++i) {
        d.add(draw(g));
    }
    d.add(static_cast<std::uint64_t>(g())); // and the state the engine is left in
    print(holds_reals<std::remove_cvref_t<decltype(draw(g))>>(), name, d);
}

void engines();
void streams();
void uniform();
void maths();
void laws();
void discrete();
void regions();
void bulk();
void estimate();

} // namespace digests

#endif
