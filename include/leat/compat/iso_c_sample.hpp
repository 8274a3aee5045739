// iso_c_sample: the rand() that the C standard prints as an example.
//
//   next = next * 1103515245 + 12345;   return (next / 65536) % 32768;
//
// State     `next` modulo 2^31, one word: its higher bits never reach an output.
// Output    15 bits, 0 to 32767.
// Period    2^31. In every output the lowest bit repeats after 2^17 draws, the next after 2^18.
// Jumps     in closed form, below a microsecond.
// Seeding   iso_c_sample{seed} is srand(seed): the seed is the state, modulo 2^31. Without a seed
// it
//           is 1, as the standard has it. A seed sequence is read as ISO C++ [rand.eng.lcong] reads
//           it. No seed is refused.
// Text      the state in decimal; 2^31 and above set failbit.
//
// Good for replaying results of programs and systems that took the example as it stands, and for
// nothing else: 15 bits are coarse, successive values lie on few planes, and 2^31 draws are
// seconds. Few C libraries use it: glibc's rand() is additive_feedback31. Never for keys or games.
//
// Source: ISO/IEC 9899:2018, 7.22.2.2, example.

#ifndef LEAT_COMPAT_ISO_C_SAMPLE_HPP
#define LEAT_COMPAT_ISO_C_SAMPLE_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/congruential.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"

#include <array>
#include <cstdint>

namespace leat {

/// The C standard's example of rand(). See the head of this file.
class iso_c_sample {
public:
    using result_type = std::uint32_t;
    using state_type = std::uint32_t;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "iso_c_sample";
    static constexpr std::uint64_t default_seed = 1;
    static constexpr int state_bits = 31;

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return 32767; }
    static constexpr wide_integer period() { return wide_integer::power_of_two(method.bits); }

    constexpr iso_c_sample() noexcept = default;
    /// As srand(seed).
    constexpr explicit iso_c_sample(std::uint64_t seed) noexcept : next_(wrapped(seed)) {}
    template <detail::seed_sequence_for<iso_c_sample> Sequence>
    constexpr explicit iso_c_sample(Sequence& q) {
        seed(q);
    }

    constexpr void seed() noexcept { next_ = default_seed; }
    constexpr void seed(std::uint64_t seed) noexcept { next_ = wrapped(seed); }
    template <detail::seed_sequence_for<iso_c_sample> Sequence>
    constexpr void seed(Sequence& q) {
        std::array<std::uint32_t, 4> words{};
        q.generate(words.data(), words.data() + words.size());
        next_ = wrapped(words[3]);
    }

    /// As rand().
    constexpr result_type operator()() noexcept {
        next_ = wrapped(method.next(next_));
        return next_ >> 16;
    }

    constexpr void discard(unsigned long long n) noexcept {
        next_ = wrapped(method.after(next_, n));
    }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) noexcept {
        discard(distance.word(0)); // the period divides 2^64
    }

    [[nodiscard]] constexpr state_type state() const noexcept { return next_; }

    friend constexpr bool operator==(const iso_c_sample&, const iso_c_sample&) = default;

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const iso_c_sample& e) {
        detail::write_unsigned(os, e.next_);
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        iso_c_sample& e) {
        std::uint64_t next = 0;
        if (detail::read_unsigned(is, largest, next)) {
            e.next_ = wrapped(next);
        }
        return is;
    }

private:
    static constexpr congruential method{1103515245, 12345, 31};
    static constexpr std::uint32_t largest = 0x7FFFFFFF;

    static constexpr std::uint32_t wrapped(std::uint64_t x) noexcept {
        return static_cast<std::uint32_t>(x) & largest;
    }

    std::uint32_t next_ = default_seed;
};

} // namespace leat

#endif
