// How likely it is that any two of many streams share draws.
//
// Streams that differ only in a trailing index share nothing, for certain. For all others:
//   addressed streams   n streams meet with a probability below n^2 / 2^129, however long they
//                       are: only a collision of the 128-bit address makes two of them overlap
//   engine<E>(path...)  n engines started at random on a cycle of P steps and drawn L times each
//                       overlap with a probability below n^2 L / P; counter engines as streams,
//                       with the bits of key and half the counter in place of 128

#ifndef LEAT_STREAMS_OVERLAP_HPP
#define LEAT_STREAMS_OVERLAP_HPP

#include "leat/core/barrier.hpp"
#include "leat/streams/seeding.hpp"
#include "leat/streams/stream.hpp"

#include <bit>
#include <concepts>
#include <cstdint>

namespace leat {
namespace detail {

/// 2^k for -1022 <= k <= 1023.
constexpr double exact_power_of_two(int k) noexcept {
    return std::bit_cast<double>(static_cast<std::uint64_t>(k + 1023) << 52);
}

} // namespace detail

/// The bound for `streams` streams of `draws` words each; at most 1. For engines opened by
/// source::engine, name the engine: overlap_bound<xoshiro256_plus_plus>(n, draws).
template <class Engine = stream>
constexpr double overlap_bound(std::uint64_t streams, std::uint64_t draws) noexcept {
    using detail::strict;
    const strict<double> n = static_cast<double>(streams);
    strict<double> bound = n * n;
    if constexpr (std::same_as<Engine, stream> || std::same_as<Engine, thin_stream>) {
        bound = bound * detail::exact_power_of_two(-129);
    } else if constexpr (detail::counter_engine<Engine>) {
        // Key and upper half of the counter are drawn; the lower half starts at zero and cannot
        // run over, so that two engines overlap only where all of those agree.
        bound = bound * detail::exact_power_of_two(-(detail::seedable_bits<Engine>() + 1));
    } else {
        // The bits of state stand for the cycle; from 2^1022 on the result is as good as 0.
        constexpr int bits =
            detail::seedable_bits<Engine>() < 1022 ? detail::seedable_bits<Engine>() : 1022;
        static_assert(bits >= 128, "leat: source::engine does not open engines of so few bits");
        bound = bound * static_cast<double>(draws) * detail::exact_power_of_two(-bits);
    }
    return bound > 1.0 ? 1.0 : bound.value;
}

} // namespace leat

#endif
