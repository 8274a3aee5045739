// Lehmer engines: x -> a x mod m, the multiplicative congruential method, and the minimal standard.
//
// State     one word x, 1 <= x < m. Zero is refused (it would stay zero), m and above are refused.
// Output    x after the step: 1 to m - 1, never 0, and with a prime m and a primitive root a each
//           of them once in a period. The range is no power of two: take whole words, integers and
//           reals from it through leat's uniform/, which stays exact, or x / m through `unit()`.
// Period    the order of a modulo m, found at compile time where period() or a jump is used; it is
//           2^31 - 2 for the three aliases. It needs the prime factors of m and of m - 1: any
//           32-bit modulus will do; two prime factors above some 2^24 pass the compilers' limits.
// Jumps     a^n by binary powers: well below a microsecond for 32-bit moduli.
// Seeding   lehmer{x} takes the state itself. A seed sequence follows ISO C++
//           [rand.eng.lcong]: ceil(log2 m / 32) + 3 words, the first three left out; 0 becomes 1.
//
// Weaknesses: a period that a modern machine runs through in seconds; successive values lie on few
// hyperplanes (k-tuples on at most (k! m)^(1/k) of them); with m a power of two the lowest bits
// have tiny periods, and with a composite m a state that shares a factor with m keeps it, on a
// shorter cycle. Consecutive seeds give sequences in proportion. Good for reproducing
// published results and for teaching; for new work draw from a leat::stream.
//
// Sources: D. H. Lehmer 1951 (Proc. 2nd Symp. on Large-Scale Digital Calculating Machinery);
// Park and Miller, CACM 31(10), 1988, and the letters of CACM 36(7), 1993.

#ifndef LEAT_ENGINES_LEHMER_HPP
#define LEAT_ENGINES_LEHMER_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/exact_ratio.hpp" // unit()
#include "leat/core/modular.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_integer.hpp"

#include <array>
#include <bit>
#include <concepts>
#include <cstdint>

namespace leat {

namespace detail {

/// The order of a multiplier: a variable, so that it is computed once, and only where it is asked.
template <class UInt, UInt multiplier, UInt modulus>
inline constexpr std::uint64_t lehmer_order = multiplicative_order(multiplier, modulus);

} // namespace detail

/// Every n-th draw of a Lehmer engine: a Lehmer engine whose multiplier is a^n mod m.
template <class UInt, UInt modulus>
class lehmer_leap {
public:
    using result_type = UInt;
    /// The name under which it is saved.
    static constexpr const char* engine_name = "lehmer_leap";
    /// The parameters that belong to its name.
    static constexpr UInt engine_parameters[] = {modulus};

    static constexpr result_type min() noexcept { return 1; }
    static constexpr result_type max() noexcept { return modulus - 1; }

    /// `first` is the first draw.
    constexpr lehmer_leap(UInt first, UInt multiplier) noexcept
        : next_(first), multiplier_(multiplier) {}

    constexpr result_type operator()() noexcept {
        const UInt x = next_;
        next_ = detail::multiply_mod(multiplier_, next_, modulus);
        return x;
    }

    /// One to be read into.
    static constexpr lehmer_leap for_reading() noexcept { return {1, 1}; }

    friend constexpr bool operator==(const lehmer_leap&, const lehmer_leap&) = default;

    /// Writes the next draw and the multiplier.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const lehmer_leap& e) {
        detail::write_words(os, std::array<std::uint64_t, 2>{e.next_, e.multiplier_});
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        lehmer_leap& e) {
        std::array<std::uint64_t, 2> words{};
        if (detail::read_words(is, words)) {
            if (words[0] == 0 || words[0] >= modulus || words[1] == 0 || words[1] >= modulus) {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            } else {
                e = {static_cast<UInt>(words[0]), static_cast<UInt>(words[1])};
            }
        }
        return is;
    }

private:
    UInt next_;
    UInt multiplier_;
};

/// x -> multiplier * x mod modulus. See the head of this file.
template <class UInt, UInt multiplier_, UInt modulus_>
class lehmer {
    static_assert(std::same_as<UInt, std::uint32_t> || std::same_as<UInt, std::uint64_t>,
                  "leat::lehmer: UInt must be std::uint32_t or std::uint64_t");
    static_assert(modulus_ > 2, "leat::lehmer: the modulus must be above 2");
    static_assert(multiplier_ > 0 && multiplier_ < modulus_,
                  "leat::lehmer: the multiplier must be above 0 and below the modulus");
    static_assert(detail::greatest_common_divisor(multiplier_, modulus_) == 1,
                  "leat::lehmer: multiplier and modulus must have no common factor");

public:
    using result_type = UInt;
    using state_type = UInt;
    static constexpr UInt multiplier = multiplier_; ///< a
    static constexpr UInt modulus = modulus_;       ///< m
    /// The name under which it is saved.
    static constexpr const char* engine_name = "lehmer";
    /// The parameters that belong to its name.
    static constexpr UInt engine_parameters[] = {multiplier, modulus};
    static constexpr std::uint64_t default_seed = 1;
    /// Whole bits that the states fill: floor(log2(modulus - 1)).
    static constexpr int state_bits = static_cast<int>(std::bit_width(UInt{modulus - 1})) - 1;

    static constexpr result_type min() noexcept { return 1; }
    static constexpr result_type max() noexcept { return modulus - 1; }
    /// The order of the multiplier: the length of the cycle of every state prime to the modulus.
    static constexpr wide_integer period() {
        return detail::lehmer_order<UInt, multiplier, modulus>;
    }

    constexpr lehmer() noexcept = default;
    /// From the state itself, 1 to modulus - 1; anything else is refused.
    constexpr explicit lehmer(std::uint64_t seed) : x_(checked(seed)) {}
    template <detail::seed_sequence_for<lehmer> Sequence>
    constexpr explicit lehmer(Sequence& q) {
        seed(q);
    }

    constexpr void seed() noexcept { x_ = default_seed; }
    constexpr void seed(std::uint64_t seed) { x_ = checked(seed); }
    template <detail::seed_sequence_for<lehmer> Sequence>
    constexpr void seed(Sequence& q) {
        constexpr std::size_t k = sizeof(UInt) > 4 && (modulus - 1) >> 31 >> 1 != 0 ? 2 : 1;
        std::array<std::uint32_t, k + 3> words{};
        q.generate(words.data(), words.data() + words.size());
        std::uint64_t sum = words[3];
        if constexpr (k == 2) {
            sum |= std::uint64_t{words[4]} << 32;
        }
        x_ = static_cast<UInt>(sum % modulus);
        if (x_ == 0) {
            x_ = 1;
        }
    }

    constexpr result_type operator()() noexcept {
        x_ = detail::multiply_mod(multiplier, x_, modulus);
        return x_;
    }
    /// The published real mapping: draws x and returns x / modulus, rounded once, in (0, 1).
    constexpr double unit() noexcept requires(std::uint64_t{modulus_} <= std::uint64_t{1} << 53) {
        const UInt x = (*this)();
        return detail::exact_ratio(x, modulus);
    }

    constexpr void discard(unsigned long long n) noexcept {
        x_ = detail::multiply_mod(detail::power_mod(multiplier, n, modulus), x_, modulus);
    }
    /// Moves on by any distance, exactly.
    constexpr void advance(const wide_integer& distance) {
        discard(distance.fits_word() ? distance.word(0) : (distance % period()).word(0));
    }

    /// An engine of every n-th draw, beginning with the next one. See streams/split.hpp.
    [[nodiscard]] constexpr lehmer_leap<UInt, modulus_> leap(std::uint64_t n) const noexcept {
        return {detail::multiply_mod(multiplier, x_, modulus),
                detail::power_mod(multiplier, n, modulus)};
    }

    [[nodiscard]] constexpr state_type state() const noexcept { return x_; }

    friend constexpr bool operator==(const lehmer&, const lehmer&) = default;

    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const lehmer& e) {
        detail::write_unsigned(os, e.x_);
        return os;
    }
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        lehmer& e) {
        std::uint64_t x = 0;
        if (detail::read_unsigned(is, max(), x)) {
            if (x == 0) {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            } else {
                e.x_ = static_cast<UInt>(x);
            }
        }
        return is;
    }

private:
    static constexpr UInt checked(std::uint64_t seed) {
        if (seed == 0 || seed >= modulus) {
            detail::refuse("lehmer", "seed", seed, "must be above 0 and below the modulus");
        }
        return static_cast<UInt>(seed);
    }

    UInt x_ = default_seed;
};

/// The minimal standard of 1988.
using minimal_standard = lehmer<std::uint32_t, 16807, 2147483647>;
/// The better multiplier that Park and Miller recommended in 1993.
using minimal_standard_48271 = lehmer<std::uint32_t, 48271, 2147483647>;
/// The other multiplier of the same letter.
using minimal_standard_69621 = lehmer<std::uint32_t, 69621, 2147483647>;

} // namespace leat

#endif
