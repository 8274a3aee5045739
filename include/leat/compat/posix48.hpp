// posix48: the 48-bit congruential generator behind drand48(), lrand48() and mrand48().
//
//   X = 25214903917 X + 11 mod 2^48
//
// State     X, in three 16-bit words, the least significant first: the `unsigned short[3]` that
//           seed48() and erand48() take. Every state is allowed.
// Output    one X a draw, of which the functions of POSIX take
//             operator()       the upper 32 bits, 0 to 2^32 - 1: mrand48() before its sign
//             unit()           X / 2^48, exact, in [0, 1): drand48(). It can be 0
//             nonnegative()    the upper 31 bits, 0 to 2^31 - 1: lrand48()
//             signed_word()    the upper 32 bits as a signed number: mrand48()
// Period    2^48. The k-th lowest bit of X repeats after 2^k draws: the bits of unit() beyond the
//           32nd are poor.
// Jumps     in closed form, below a microsecond.
// Seeding   posix48{seed} is srand48(seed): the lower 32 bits of the seed become the upper 32 of X,
//           the rest is 0x330E; so a negative seed is given as static_cast<std::uint32_t>(-7). A
//           seed sequence is read as ISO C++ [rand.eng.lcong] reads it. No seed is refused.
// Unseeded  POSIX leaves the start of a program that never seeds to the system. posix48{} starts
//           from srand48(0x1234ABCD), as the BSD family does; glibc starts at X = 0, which is
//           posix48{posix48::state_type{0, 0, 0}}.
// Text      the three words in decimal.
//
// Other constants, set by lcong48(), have no engine here: leat::congruential computes their states.
//
// Good for replaying results that were made with these functions. Not for new work: the lattice of
// a 48-bit modulus is coarse, the low bits are poor, and streams cut at powers of two resemble each
// other. Never for keys or games: three outputs give the state away.
//
// Source: POSIX.1-2017 (IEEE Std 1003.1), drand48(); the start value of the BSD family: from
// memory.

#ifndef LEAT_COMPAT_POSIX48_HPP
#define LEAT_COMPAT_POSIX48_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/congruential.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"

#include <array>
#include <cstdint>

namespace leat {

/// drand48() and its family. See the head of this file.
class posix48 {
public:
    using result_type = std::uint32_t;
    using state_type = std::array<std::uint16_t, 3>; ///< least significant first, as in seed48()
    /// The name under which it is saved.
    static constexpr const char* engine_name = "posix48";
    static constexpr std::uint64_t default_seed = 0x1234ABCD;
    static constexpr int state_bits = 48;

    static constexpr result_type min() noexcept { return 0; }
    static constexpr result_type max() noexcept { return ~result_type{0}; }
    static constexpr wide_integer period() { return wide_integer::power_of_two(method.bits); }

    constexpr posix48() noexcept = default;
    /// As srand48(seed).
    constexpr explicit posix48(std::uint64_t seed) noexcept : x_(started(seed)) {}
    /// From X, as seed48(state).
    constexpr explicit posix48(const state_type& state) noexcept : x_(joined(state)) {}
    template <detail::seed_sequence_for<posix48> Sequence>
    constexpr explicit posix48(Sequence& q) {
        seed(q);
    }

    constexpr void seed() noexcept { x_ = started(default_seed); }
    constexpr void seed(std::uint64_t seed) noexcept { x_ = started(seed); }
    template <detail::seed_sequence_for<posix48> Sequence>
    constexpr void seed(Sequence& q) {
        std::array<std::uint32_t, 5> words{};
        q.generate(words.data(), words.data() + words.size());
        x_ = (words[3] | std::uint64_t{words[4]} << 32) & largest;
    }

    /// The upper 32 bits: what mrand48() gives, before it is taken as signed.
    constexpr result_type operator()() noexcept { return static_cast<result_type>(next() >> 16); }
    /// As drand48(): X / 2^48 in [0, 1). It can be 0; leat::unit(g) cannot.
    constexpr double unit() noexcept {
        // 48 bits fit a double, and so does their product with a power of two.
        return static_cast<double>(static_cast<std::int64_t>(next())) * 0x1p-48;
    }
    /// As lrand48(): 0 to 2^31 - 1.
    constexpr std::int32_t nonnegative() noexcept {
        return static_cast<std::int32_t>(next() >> 17);
    }
    /// As mrand48(): -2^31 to 2^31 - 1.
    constexpr std::int32_t signed_word() noexcept { return static_cast<std::int32_t>((*this)()); }

    constexpr void discard(unsigned long long n) noexcept { x_ = method.after(x_, n); }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) noexcept {
        discard(distance.word(0)); // the period divides 2^64
    }

    [[nodiscard]] constexpr state_type state() const noexcept {
        return {static_cast<std::uint16_t>(x_), static_cast<std::uint16_t>(x_ >> 16),
                static_cast<std::uint16_t>(x_ >> 32)};
    }

    friend constexpr bool operator==(const posix48&, const posix48&) = default;

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const posix48& e) {
        detail::write_words(os, e.state());
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        posix48& e) {
        state_type words{};
        if (detail::read_words(is, words)) {
            e.x_ = joined(words);
        }
        return is;
    }

private:
    static constexpr congruential method{25214903917, 11, 48};
    static constexpr std::uint64_t largest = 0xFFFFFFFFFFFF;

    static constexpr std::uint64_t started(std::uint64_t seed) noexcept {
        return (seed & 0xFFFFFFFFu) << 16 | 0x330E;
    }
    static constexpr std::uint64_t joined(const state_type& words) noexcept {
        return words[0] | std::uint64_t{words[1]} << 16 | std::uint64_t{words[2]} << 32;
    }
    constexpr std::uint64_t next() noexcept { return x_ = method.next(x_); }

    std::uint64_t x_ = started(default_seed);
};

} // namespace leat

#endif
