// splitmix64: a 64-bit counter with a strong mixing function. Fast, tiny, good for seeding.
//
// State     one 64-bit word, every value allowed; the n-th state is the first plus n * gamma.
// Output    64-bit words; each occurs exactly once in a period of 2^64.
// Jumps     addition: any distance in a few operations; discard is O(1).
// Seeding   splitmix64{word} takes the word as the state itself. A seed sequence gives two 32-bit
//           words, low first.
//
// Good for filling the state of larger engines (that is how leat seeds them from one number), for
// hashing a counter, for short runs. Not for large runs: with no repeated output in 2^64 draws it
// is told from random after about 2^32 draws (birthdays), and all seeds share the one cycle: two
// seeds are two places on it, at a distance nobody chose.
//
// Source: Steele, Lea and Flood, "Fast splittable pseudorandom number generators", OOPSLA 2014
// (mixing function: D. Stafford's variant 13).

#ifndef LEAT_ENGINES_SPLITMIX64_HPP
#define LEAT_ENGINES_SPLITMIX64_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"
#include "leat/engines/counter_leap.hpp" // leap(n): every n-th draw

#include <array>
#include <cstdint>

namespace leat {

/// A counter in steps of the golden ratio, and a mixer. See the head of this file.
class splitmix64 {
public:
    using result_type = std::uint64_t;
    using state_type = std::uint64_t;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "splitmix64";
    static constexpr std::uint64_t default_seed = 0;
    static constexpr int state_bits = 64;
    /// The step of the counter: the odd number nearest to 2^64 / golden ratio.
    static constexpr std::uint64_t gamma = 0x9E3779B97F4A7C15u;

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }
    static constexpr wide_integer period() { return wide_integer::power_of_two(64); }

    constexpr splitmix64() noexcept = default;
    /// From the state itself.
    constexpr explicit splitmix64(std::uint64_t seed) noexcept : state_(seed) {}
    template <detail::seed_sequence_for<splitmix64> Sequence>
    constexpr explicit splitmix64(Sequence& q) {
        seed(q);
    }

    constexpr void seed() noexcept { state_ = default_seed; }
    constexpr void seed(std::uint64_t seed) noexcept { state_ = seed; }
    template <detail::seed_sequence_for<splitmix64> Sequence>
    constexpr void seed(Sequence& q) {
        std::array<std::uint32_t, 2> words{};
        q.generate(words.data(), words.data() + words.size());
        state_ = words[0] | std::uint64_t{words[1]} << 32;
    }

    /// The mixing function: a bijection of 64-bit words.
    static constexpr std::uint64_t mix(std::uint64_t z) noexcept {
        z = (z ^ (z >> 30)) * 0xBF58476D1CE4E5B9u;
        z = (z ^ (z >> 27)) * 0x94D049BB133111EBu;
        return z ^ (z >> 31);
    }

    constexpr result_type operator()() noexcept {
        state_ += gamma;
        return mix(state_);
    }

    constexpr void discard(unsigned long long n) noexcept { state_ += gamma * n; }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) noexcept { discard(distance.word(0)); }

    /// An engine of every n-th draw, beginning with the next one. See streams/split.hpp.
    [[nodiscard]] constexpr counter_leap<splitmix64> leap(std::uint64_t n) const {
        return counter_leap{*this, n};
    }

    [[nodiscard]] constexpr state_type state() const noexcept { return state_; }

    friend constexpr bool operator==(const splitmix64&, const splitmix64&) = default;

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const splitmix64& e) {
        detail::write_unsigned(os, e.state_);
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        splitmix64& e) {
        detail::read_unsigned(is, max(), e.state_);
        return is;
    }

private:
    std::uint64_t state_ = default_seed;
};

} // namespace leat

#endif
