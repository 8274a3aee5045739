// steps_between(a, b): how many draws of `a` lead to the state of `b`.
//
// The least such number, as a std::optional of wide_integer: empty where b is not on a's cycle (two
// philox keys, two cycles of lehmer128). jump(a, *steps_between(a, b)) gives b.
//
// For engines whose algebra gives it:
//   splitmix64, philox4x32, philox4x64   a difference of counters
//   Lehmer modulo 2^31 - 1               a discrete logarithm by Pohlig and Hellman's method:
//                                        2^31 - 2 = 2 * 3^2 * 7 * 11 * 31 * 151 * 331; microseconds
//   lehmer128                            bit by bit, as in core/congruential.hpp
//   xorshift32, xorshift64               see steps_xorshift.hpp
// Congruential generators modulo 2^k with full period: congruential::steps_between. For every other
// engine the call does not compile: no practical method is known.
//
// Source: Pohlig and Hellman, IEEE Trans. Information Theory 24(1), 1978.

#ifndef LEAT_STREAMS_STEPS_HPP
#define LEAT_STREAMS_STEPS_HPP

#include "leat/core/congruential.hpp" // the same question modulo 2^k
#include "leat/core/modular.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/core/wide_multiply.hpp"
#include "leat/engines/counter.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/lehmer128.hpp"
#include "leat/streams/steps_xorshift.hpp"

#include <array>
#include <cstdint>
#include <optional>

namespace leat {

namespace detail {

inline constexpr std::uint32_t mersenne31 = 2147483647;

/// The logarithm to the base 7, a primitive root modulo 2^31 - 1, of x: 7^log = x, log < 2^31 - 2.
constexpr std::uint32_t logarithm_mod_mersenne31(std::uint32_t x) noexcept {
    constexpr std::uint32_t order = mersenne31 - 1;
    constexpr std::array<std::uint32_t, 7> parts{2, 9, 7, 11, 31, 151, 331}; // prime powers
    std::uint32_t logarithm = 0;
    for (const std::uint32_t part : parts) {
        // In the subgroup of this order the logarithm modulo `part` is found by trying.
        const std::uint32_t cofactor = order / part;
        const std::uint32_t root = power_mod<std::uint32_t>(7, cofactor, mersenne31);
        const std::uint32_t target = power_mod(x, cofactor, mersenne31);
        std::uint32_t digit = 0;
        for (std::uint32_t power = 1; power != target; ++digit) {
            power = multiply_mod(power, root, mersenne31);
        }
        // Chinese remainders: a multiple of the cofactor that is `digit` modulo `part`.
        const std::uint64_t inverse = inverse_mod(cofactor % part, part);
        logarithm =
            static_cast<std::uint32_t>((logarithm + inverse * digit % part * cofactor) % order);
    }
    return logarithm;
}

/// A multiplier's logarithm, computed once, by the compiler.
template <std::uint32_t multiplier>
inline constexpr std::uint32_t multiplier_logarithm = logarithm_mod_mersenne31(multiplier);

} // namespace detail

/// Steps from a to b; always there.
constexpr std::optional<wide_integer> steps_between(const splitmix64& a,
                                                    const splitmix64& b) noexcept {
    // The inverse of gamma modulo 2^64 by Newton's iteration, which doubles the right bits.
    std::uint64_t inverse = splitmix64::gamma; // right modulo 8
    for (int bits = 3; bits < 64; bits *= 2) {
        inverse *= 2 - splitmix64::gamma * inverse;
    }
    return wide_integer{(b.state() - a.state()) * inverse};
}

/// Steps from a to b; empty where the keys differ.
template <class UInt>
constexpr std::optional<wide_integer> steps_between(const philox4<UInt>& a,
                                                    const philox4<UInt>& b) {
    if (a.key() != b.key()) {
        return std::nullopt;
    }
    const auto draws_before = [](const philox4<UInt>& e) {
        wide_integer counter;
        for (std::size_t i = 4; i-- > 0;) {
            counter = (counter << (sizeof(UInt) == 4 ? 32u : 64u)) + wide_integer{e.counter()[i]};
        }
        return (counter << 2) + wide_integer{e.place()};
    };
    const wide_integer from = draws_before(a);
    const wide_integer to = draws_before(b);
    return from <= to ? to - from : to + philox4<UInt>::period() - from;
}

/// Steps from a to b; empty where the multiplier is no primitive root and b is on another cycle.
template <std::uint32_t multiplier>
constexpr std::optional<wide_integer>
steps_between(const lehmer<std::uint32_t, multiplier, detail::mersenne31>& a,
              const lehmer<std::uint32_t, multiplier, detail::mersenne31>& b) noexcept {
    // multiplier^d = b / a: in logarithms, step * d = ratio modulo the order.
    constexpr std::uint64_t order = detail::mersenne31 - 1;
    constexpr std::uint64_t step = detail::multiplier_logarithm<multiplier>;
    constexpr std::uint64_t common = detail::greatest_common_divisor(step, order);
    const std::uint64_t ratio = (detail::logarithm_mod_mersenne31(b.state()) + order -
                                 detail::logarithm_mod_mersenne31(a.state())) %
                                order;
    if (ratio % common != 0) {
        return std::nullopt;
    }
    constexpr std::uint64_t cycle = order / common;
    constexpr std::uint64_t inverse = detail::inverse_mod(step / common, cycle);
    return wide_integer{ratio / common * inverse % cycle};
}

/// Steps from a to b; empty where they are on different cycles (they differ in the second bit).
constexpr std::optional<wide_integer> steps_between(const lehmer128& a,
                                                    const lehmer128& b) noexcept {
    detail::word_pair from{a.state()[0], a.state()[1]};
    const detail::word_pair to{b.state()[0], b.state()[1]};
    if (((from.low ^ to.low) & 3u) != 0) {
        return std::nullopt;
    }
    // The multiplier is 5 modulo 8: 2^i steps leave the lower i + 2 bits alone and change the next.
    detail::word_pair power{lehmer128::multiplier[0], lehmer128::multiplier[1]};
    std::array<std::uint64_t, 2> distance{};
    for (int i = 0; i < 126; ++i) {
        const int bit = i + 2;
        const std::uint64_t difference = bit < 64 ? from.low ^ to.low : from.high ^ to.high;
        if ((difference >> (bit % 64) & 1u) != 0) {
            from = detail::multiply(power, from);
            distance[i < 64 ? 0 : 1] |= std::uint64_t{1} << (i % 64);
        }
        power = detail::multiply(power, power);
    }
    return wide_integer{distance};
}

} // namespace leat

#endif
