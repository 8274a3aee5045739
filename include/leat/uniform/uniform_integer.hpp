// Uniform integers on any range, exactly unbiased.
//
//   leat::uniform_integer die{1, 6};   int face = die(g);     // both ends in
//   auto i = leat::below(n, g);                               // 0 .. n - 1, of n's type
//
// Any signed or unsigned integer type of 8 to 64 bits and any range of it, the full one included.
// bool and the character types are refused: their signedness and width vary.
//
// Method: multiply and shift, with rejection (Lemire, Fast random integer generation in an
// interval, ACM TOMACS 29(1), 2019, algorithm 5). A range of up to 2^32 values takes `word32` of
// the engine, a wider one `word64`, whatever the type: so the same engine and range give the same
// integers as int, long or std::uint64_t. A trial is rejected with a probability below one half
// (below n / 2^32 or n / 2^64), and one trial consumes one such word.
//
// Refused: hi below lo; n below 1. Throws engine_stuck after 101 rejections in a row (2^-101).
// Not: word % n, which favours small values.

#ifndef LEAT_UNIFORM_UNIFORM_INTEGER_HPP
#define LEAT_UNIFORM_UNIFORM_INTEGER_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_multiply.hpp"
#include "leat/uniform/words.hpp"

#include <concepts>
#include <cstdint>
#include <iosfwd>
#include <limits>
#include <type_traits>

namespace leat {
namespace detail {

/// An integer type that stands for a number: neither bool nor a character type.
template <class T>
concept number_integer = std::integral<T> && !std::same_as<T, bool> && !std::same_as<T, char> &&
                         !std::same_as<T, wchar_t> && !std::same_as<T, char8_t> &&
                         !std::same_as<T, char16_t> && !std::same_as<T, char32_t> && sizeof(T) <= 8;

/// The product of two words, as upper and lower word.
template <std::unsigned_integral Word>
struct scaled_word {
    Word upper;
    Word lower;
};

template <std::unsigned_integral Word>
constexpr scaled_word<Word> scale_word(Word word, Word n) noexcept {
    if constexpr (sizeof(Word) == 8) {
        const word_pair product = multiply_wide(word, n);
        return {product.high, product.low};
    } else {
        const std::uint64_t product = std::uint64_t{word} * n;
        return {static_cast<Word>(product >> std::numeric_limits<Word>::digits),
                static_cast<Word>(product)};
    }
}

/// Uniform on 0 .. n - 1, n at least 1, from uniform words that `draw()` gives. Templated on the
/// word so that the tests can go through every word of 8 and of 16 bits.
template <std::unsigned_integral Word, class Draw>
constexpr Word multiply_shift(Word n, Draw draw, const char* name) {
    scaled_word<Word> x = scale_word<Word>(draw(), n);
    if (x.lower < n) {
        // 2^width mod n: so many words too many fall on some outcomes. Rarely needed, so only
        // worked out here.
        const auto surplus = static_cast<Word>(static_cast<Word>(0 - n) % n);
        for (int rejected = 0; x.lower < surplus;) {
            if (++rejected == 101) {
                stuck(name);
            }
            x = scale_word<Word>(draw(), n);
        }
    }
    return x.upper;
}

/// Uniform on 0 .. last. Inlined by force: most of it falls away where the range is known.
template <random_words G>
[[gnu::always_inline]] constexpr std::uint64_t up_to(std::uint64_t last, G& g, const char* name) {
    constexpr std::uint64_t narrow = std::numeric_limits<std::uint32_t>::max();
    if (last < narrow) {
        return multiply_shift<std::uint32_t>(
            static_cast<std::uint32_t>(last + 1), [&g] { return word32(g); }, name);
    }
    if (last == narrow) {
        return word32(g);
    }
    if (last == std::numeric_limits<std::uint64_t>::max()) {
        return word64(g);
    }
    return multiply_shift<std::uint64_t>(
        last + 1, [&g] { return word64(g); }, name);
}

/// The law that is lowest + multiply_shift(count) of word32s, modulo 2^64.
struct short_range {
    std::uint32_t count = 0; // 0 where the law in question is not one
    std::uint64_t lowest = 0;
};

/// The offset that up_to(last, g) gives where g's next word is this one, if that is certain: false
/// where it might be rejected. For an engine of 64-bit words.
constexpr bool up_to_by_word(std::uint64_t last, std::uint64_t word,
                             std::uint64_t& offset) noexcept {
    constexpr std::uint64_t narrow = std::numeric_limits<std::uint32_t>::max();
    if (last < narrow) {
        const auto half = static_cast<std::uint32_t>(word >> 32);
        const auto x = scale_word<std::uint32_t>(half, static_cast<std::uint32_t>(last + 1));
        offset = x.upper;
        return x.lower > last;
    }
    if (last == narrow) {
        offset = word >> 32;
        return true;
    }
    if (last == std::numeric_limits<std::uint64_t>::max()) {
        offset = word;
        return true;
    }
    const auto x = scale_word<std::uint64_t>(word, last + 1);
    offset = x.upper;
    return x.lower > last;
}

/// An integer as an error message takes it.
template <number_integer Int>
constexpr auto message_value(Int x) noexcept {
    if constexpr (std::signed_integral<Int>) {
        return static_cast<long long>(x);
    } else {
        return static_cast<unsigned long long>(x);
    }
}

} // namespace detail

/// Uniform on 0 .. n - 1, as n's type; an n below 1 is refused.
template <detail::number_integer Int, random_words G>
constexpr Int below(Int n, G& g) {
    if (n < 1) {
        detail::refuse("below", "n", detail::message_value(n), "must be at least 1");
    }
    return static_cast<Int>(detail::up_to(static_cast<std::uint64_t>(n) - 1, g, "below"));
}

template <detail::number_integer Int>
class uniform_integer;

/// The range lo .. hi, both ends in.
template <detail::number_integer Int = int>
struct uniform_integer_parameters {
    using distribution_type = uniform_integer<Int>;
    static constexpr const char* law_name = "uniform_integer";

    Int lo = 0;                               ///< the least value
    Int hi = std::numeric_limits<Int>::max(); ///< the greatest, not below lo

    /// Calls visit(name, field) for each of them.
    template <class Self, class Visit>
    static constexpr void each(Self& self, Visit visit) {
        visit("lo", self.lo);
        visit("hi", self.hi);
    }
    friend constexpr bool operator==(const uniform_integer_parameters&,
                                     const uniform_integer_parameters&) = default;
};

/// Uniform on lo .. hi, both ends in.
template <detail::number_integer Int = int>
class uniform_integer {
public:
    using result_type = Int;
    using param_type = uniform_integer_parameters<Int>;

    /// 0 to the largest value of the type.
    constexpr uniform_integer() noexcept = default;
    /// Both ends in.
    constexpr uniform_integer(Int lo, Int hi)
        : uniform_integer(uniform_integer_parameters<Int>{lo, hi}) {}
    constexpr explicit uniform_integer(const uniform_integer_parameters<Int>& p) : range_(p) {
        if (p.hi < p.lo) {
            detail::refuse("uniform_integer", "hi", detail::message_value(p.hi),
                           "must not be below lo");
        }
    }

    /// One value.
    template <random_words G>
    [[gnu::always_inline]] constexpr Int operator()(G& g) const {
        return at(detail::up_to(span(), g, "uniform_integer"));
    }
    /// For fills: the draw whose first 64-bit word is `word`, if no rejection is in question.
    constexpr bool from_word(std::uint64_t word, Int& x) const noexcept {
        std::uint64_t offset = 0;
        const bool certain = detail::up_to_by_word(span(), word, offset);
        x = at(offset);
        return certain;
    }
    /// For fills, which have kernels for ranges of fewer than 2^32 values.
    [[nodiscard]] constexpr detail::short_range as_short_range() const noexcept {
        constexpr std::uint64_t narrow = std::numeric_limits<std::uint32_t>::max();
        return {span() < narrow ? static_cast<std::uint32_t>(span() + 1) : 0,
                static_cast<std::uint64_t>(range_.lo)};
    }
    /// One value of the range `p`, leaving this one aside.
    template <random_words G>
    constexpr Int operator()(G& g, const param_type& p) const {
        const uniform_integer other(p);
        return other(g);
    }

    [[nodiscard]] constexpr Int lo() const noexcept { return range_.lo; }
    [[nodiscard]] constexpr Int hi() const noexcept { return range_.hi; }
    [[nodiscard]] constexpr param_type param() const noexcept { return range_; }
    /// Changes the range; a refused one changes nothing.
    constexpr void param(const param_type& p) { *this = uniform_integer(p); }
    /// Nothing to forget: no draw changes a sampler.
    constexpr void reset() noexcept {}

    [[nodiscard]] constexpr Int min() const noexcept { return range_.lo; }
    [[nodiscard]] constexpr Int max() const noexcept { return range_.hi; }
    /// (lo + hi) / 2.
    [[nodiscard]] constexpr double mean() const noexcept {
        const auto middle = static_cast<Int>(static_cast<std::uint64_t>(range_.lo) + span() / 2);
        return static_cast<double>(middle) + (span() % 2 == 0 ? 0.0 : 0.5);
    }
    /// (n^2 - 1) / 12 for n values.
    [[nodiscard]] constexpr double variance() const noexcept {
        const auto steps = static_cast<double>(span());
        return steps * (steps + 2) / 12;
    }

    friend constexpr bool operator==(const uniform_integer&, const uniform_integer&) = default;

    /// Writes lo and hi.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const uniform_integer& x) {
        detail::write_integer(os, x.lo());
        detail::write_char(os, ' ');
        detail::write_integer(os, x.hi());
        return os;
    }
    /// Reads what << wrote. Anything else, or a range that would be refused, sets failbit and
    /// leaves `x` as it was.
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        uniform_integer& x) {
        param_type p;
        if (detail::read_integer(is, p.lo) && detail::read_integer(is, p.hi)) {
            if (p.hi < p.lo) {
                is.setstate(std::basic_istream<Char, Traits>::failbit);
            } else {
                x = uniform_integer(p);
            }
        }
        return is;
    }

private:
    // In unsigned arithmetic, where passing the ends of Int is defined.
    [[nodiscard]] constexpr Int at(std::uint64_t offset) const noexcept {
        return static_cast<Int>(static_cast<std::uint64_t>(range_.lo) + offset);
    }
    [[nodiscard]] constexpr std::uint64_t span() const noexcept {
        return static_cast<std::uint64_t>(range_.hi) - static_cast<std::uint64_t>(range_.lo);
    }

    param_type range_;
};

} // namespace leat

#endif
