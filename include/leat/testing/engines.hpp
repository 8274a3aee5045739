// Engines for tests: they return what the test says, not random words.
//
//   leat::scripted g{0, 1, ~0ull};   // these words, then an error
//   leat::scripted h{leat::word_for_unit(0.25)};   // leat::unit(h) is 0.25, leat::below(8, h) is 2
//   leat::constant g{42};            // this word for ever
//   leat::all_zeros g;  leat::all_ones g;
//   leat::alternating g;             // all zeros, all ones, all zeros, ...; or any two words
//
// `scripted` pins what code does with known draws, and how many it takes: one word too many throws
// stream_exhausted, and the message says how many were asked for. The others are the worst an
// engine can do: whatever promises "never 0" or "never hangs" must hold on them too, a loop that
// they keep in rejection ends with engine_stuck.
//
// All return 64-bit words over the full range; the names ending in 32 return 32-bit words.
// They live in leat::testing and are found in leat as well.
// Not for simulation: none of them is random.

#ifndef LEAT_TESTING_ENGINES_HPP
#define LEAT_TESTING_ENGINES_HPP

#include "leat/core/errors.hpp"

#include <concepts>
#include <cstddef>
#include <cstdint>
#include <initializer_list>
#include <limits>
#include <utility>
#include <vector>

namespace leat {
/// Tools for testing code that draws.
namespace testing {

/// What all test engines share: the word type and its full range.
template <std::unsigned_integral Word>
class full_range {
public:
    using result_type = Word;
    [[nodiscard]] static constexpr Word min() noexcept { return 0; }
    [[nodiscard]] static constexpr Word max() noexcept { return std::numeric_limits<Word>::max(); }

    friend constexpr bool operator==(const full_range&, const full_range&) = default;
};

/// Returns the given words in order; a draw past the last throws stream_exhausted.
template <std::unsigned_integral Word>
class script : public full_range<Word> {
public:
    /// From the words, the first to be drawn first.
    script(std::initializer_list<Word> words) : words_(words) {}
    /// From the words, the first to be drawn first.
    explicit script(std::vector<Word> words) : words_(std::move(words)) {}

    /// The next word.
    Word operator()() {
        const std::size_t asked = ++asked_;
        if (asked > words_.size()) {
            leat::detail::message m;
            m.text("leat::scripted: the script holds ")
                .value(static_cast<unsigned long long>(words_.size()))
                .text(" words, and ")
                .value(static_cast<unsigned long long>(asked));
            leat::detail::raise<stream_exhausted>(m.text(" were asked for"));
        }
        return words_[asked - 1];
    }

    /// How many words were asked for so far, a refused one included.
    [[nodiscard]] std::uint64_t asked() const noexcept { return asked_; }

    friend bool operator==(const script&, const script&) = default;

private:
    std::vector<Word> words_;
    std::size_t asked_ = 0;
};

/// Returns the same word for ever.
template <std::unsigned_integral Word>
class repeated_word : public full_range<Word> {
public:
    /// With the word to repeat.
    constexpr explicit repeated_word(Word word) noexcept : word_(word) {}
    /// The word.
    constexpr Word operator()() const noexcept { return word_; }

    friend constexpr bool operator==(const repeated_word&, const repeated_word&) = default;

private:
    Word word_;
};

/// Returns words with no bit set.
template <std::unsigned_integral Word>
class only_zeros : public full_range<Word> {
public:
    /// 0.
    constexpr Word operator()() const noexcept { return 0; }

    friend constexpr bool operator==(const only_zeros&, const only_zeros&) = default;
};

/// Returns words with every bit set.
template <std::unsigned_integral Word>
class only_ones : public full_range<Word> {
public:
    /// The greatest word.
    constexpr Word operator()() const noexcept { return std::numeric_limits<Word>::max(); }

    friend constexpr bool operator==(const only_ones&, const only_ones&) = default;
};

/// Returns two words in turn: no bit set and every bit set, or the two given.
template <std::unsigned_integral Word>
class two_in_turn : public full_range<Word> {
public:
    /// No bit set, then every bit set.
    constexpr two_in_turn() noexcept : two_in_turn(0, std::numeric_limits<Word>::max()) {}
    /// These two.
    constexpr two_in_turn(Word first, Word second) noexcept : next_(first), other_(second) {}

    /// The next of the two.
    constexpr Word operator()() noexcept {
        const Word word = next_;
        next_ = other_;
        other_ = word;
        return word;
    }

    friend constexpr bool operator==(const two_in_turn&, const two_in_turn&) = default;

private:
    Word next_;
    Word other_;
};

/// The 64-bit word that stands u of the way up: from it leat::unit makes u, to within 2^-53, and
/// leat::below(n, g) makes u n, rounded down. For scripts; u is to lie inside (0, 1).
constexpr std::uint64_t word_for_unit(double u) {
    if (!(u > 0 && u < 1)) {
        leat::detail::refuse("word_for_unit", "u", u, "must be > 0 and < 1");
    }
    return static_cast<std::uint64_t>(u * 0x1p64);
}

/// The given 64-bit words, then an error.
using scripted = script<std::uint64_t>;
/// The given 32-bit words, then an error.
using scripted32 = script<std::uint32_t>;
/// One 64-bit word for ever.
using constant = repeated_word<std::uint64_t>;
/// One 32-bit word for ever.
using constant32 = repeated_word<std::uint32_t>;
/// 64-bit words without a bit set.
using all_zeros = only_zeros<std::uint64_t>;
/// 32-bit words without a bit set.
using all_zeros32 = only_zeros<std::uint32_t>;
/// 64-bit words with every bit set.
using all_ones = only_ones<std::uint64_t>;
/// 32-bit words with every bit set.
using all_ones32 = only_ones<std::uint32_t>;
/// Two 64-bit words in turn.
using alternating = two_in_turn<std::uint64_t>;
/// Two 32-bit words in turn.
using alternating32 = two_in_turn<std::uint32_t>;

} // namespace testing

using testing::all_ones;
using testing::all_ones32;
using testing::all_zeros;
using testing::all_zeros32;
using testing::alternating;
using testing::alternating32;
using testing::constant;
using testing::constant32;
using testing::scripted;
using testing::scripted32;
using testing::word_for_unit;

} // namespace leat

#endif
