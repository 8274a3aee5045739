// From an address to a seeded engine of any kind.
//
// The words of the stream at the address (kind "engine", see path.hpp) set the state:
//   counter engines   key and counter, each 32-bit word half a stream word, low half first, the
//                     lower half of the counter zero, so that blocks cannot run into each other
//   all others        by their seed-sequence constructor, fed the same 32-bit words; ISO's rules
//                     for seed sequences then map states the method forbids

#ifndef LEAT_STREAMS_SEEDING_HPP
#define LEAT_STREAMS_SEEDING_HPP

#include "leat/streams/address.hpp"
#include "leat/streams/thin_stream.hpp"

#include <climits>
#include <cstdint>
#include <type_traits>

namespace leat::detail {

/// An engine that is a key and a counter.
template <class Engine>
concept counter_engine = requires(typename Engine::key_type key,
                                  typename Engine::counter_type counter) {
    Engine{key, counter};
};

/// The bits of state that `seed_from_address` sets: key and half the counter of a counter engine;
/// else what the engine says, its base's for an adaptor (a shuffled table is filled from its base),
/// or its size.
template <class Engine>
consteval int seedable_bits() {
    if constexpr (counter_engine<Engine>) {
        return CHAR_BIT * static_cast<int>(sizeof(typename Engine::key_type) +
                                           sizeof(typename Engine::counter_type) / 2);
    } else if constexpr (requires { Engine::state_bits; }) {
        return Engine::state_bits;
    } else if constexpr (requires(const Engine& e) { e.base(); }) {
        return seedable_bits<std::remove_cvref_t<decltype(std::declval<const Engine&>().base())>>();
    } else {
        return static_cast<int>(sizeof(Engine)) * CHAR_BIT;
    }
}

/// A seed sequence, as ISO C++ defines it, that gives the words of a stream.
class address_seed_sequence {
public:
    using result_type = std::uint32_t;

    constexpr explicit address_seed_sequence(const stream_address& a) noexcept : words_(a) {}

    template <class Iterator>
    constexpr void generate(Iterator begin, Iterator end) {
        for (; begin != end; ++begin) {
            *begin = next();
        }
    }
    [[nodiscard]] static constexpr std::size_t size() noexcept { return 0; }
    template <class Iterator>
    constexpr void param(Iterator) const noexcept {}

    constexpr std::uint32_t next() {
        if (has_high_) {
            has_high_ = false;
            return high_;
        }
        const std::uint64_t word = words_();
        high_ = static_cast<std::uint32_t>(word >> 32);
        has_high_ = true;
        return static_cast<std::uint32_t>(word);
    }

private:
    thin_stream words_;
    std::uint32_t high_ = 0;
    bool has_high_ = false;
};

template <class Engine>
constexpr Engine seed_from_address(const stream_address& a) {
    address_seed_sequence words(a);
    if constexpr (counter_engine<Engine>) {
        typename Engine::key_type key{};
        typename Engine::counter_type counter{};
        using word = typename Engine::counter_type::value_type;
        const auto draw = [&words] {
            std::uint64_t x = words.next();
            if constexpr (sizeof(word) == 8) {
                x |= std::uint64_t{words.next()} << 32;
            }
            return static_cast<word>(x);
        };
        for (auto& k : key) {
            k = draw();
        }
        for (std::size_t i = counter.size() / 2; i < counter.size(); ++i) {
            counter[i] = draw();
        }
        return Engine{key, counter};
    } else {
        return Engine(words);
    }
}

} // namespace leat::detail

#endif
