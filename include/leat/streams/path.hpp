// Paths, and the hash that turns one into the place of a stream.
//
// A path is a seed followed by parts; a seed or a part is an integer or a text. This page is the
// frozen specification: what it says is what tests/golden pins.
//
// The hash is SipHash-2-4-128 (core/siphash.hpp) under the key bytes 00 01 02 .. 0f, over a
// message of 64-bit words, each eight bytes with the least significant first:
//
//   1. the version:   the bytes 'l' 'e' 'a' 't' 1 0 0 0, that is 0x000000017461656c
//   2. the seed, as an item (below)
//   3. each part before the index, as an item
//   4. the end:       kind + 256 * index form
//
//   item, integer >= 0:  1, then the value
//   item, integer < 0:   2, then the magnitude (for -1 that is 1)
//   item, text:          3 + 256 * length in bytes, then the bytes, eight to a word in order,
//                        the last word padded with zeros; an empty text has no further word
//   item, parent:        4, then the key and the upper word of the parent stream's address; it
//                        stands in place of the seed, for offspring
//
//   kind:        1 stream, 2 engine, 3 chunk, 4 offspring, 5 indexed variate
//   index form:  0 no index, 1 an index >= 0, 2 an index < 0
//
// The index is the last part if that is an integer, and is not itself hashed. The first eight
// bytes of the result are the key; the last eight, plus the magnitude of the index (modulo 2^64),
// are the upper half of the counter. So two streams whose paths differ only in a trailing index of
// one sign have one key and different upper halves: they share no block of the bijection. An
// integer's value and sign matter, its type never does; 7 and "7" are different.

#ifndef LEAT_STREAMS_PATH_HPP
#define LEAT_STREAMS_PATH_HPP

#include "leat/core/errors.hpp"
#include "leat/core/siphash.hpp"

#include <array>
#include <concepts>
#include <cstddef> // nullptr_t
#include <cstdint>
#include <string_view> // text parts
#include <type_traits>

namespace leat::detail {

/// One item of a path, whatever type it was written in.
struct path_part {
    std::string_view text{};
    std::uint64_t magnitude = 0;
    bool is_text = false;
    bool is_negative = false;

    friend constexpr bool operator==(const path_part&, const path_part&) = default;
};

template <class T>
concept character = std::same_as<T, char> || std::same_as<T, wchar_t> || std::same_as<T, char8_t> ||
    std::same_as<T, char16_t> || std::same_as<T, char32_t>;

template <class T>
concept path_integer =
    std::integral<T> && !std::same_as<T, bool> && !character<T> && sizeof(T) <= 8;

/// Takes a path part as people write it: an integer, or a text.
template <class T>
constexpr path_part as_path_part(const T& part) {
    static_assert(!std::same_as<T, bool>,
                  "leat: a bool is no path part; write an integer or a text, such as \"on\"");
    static_assert(!character<T>,
                  "leat: a single character is no path part; write a text (\"a\") or cast to int");
    static_assert(!std::floating_point<T>,
                  "leat: a floating-point number is no path part; write an integer, such as a "
                  "step number, or a text");
    static_assert(!std::same_as<T, std::nullptr_t>,
                  "leat: nullptr is no path part; write an integer or a text");
    static_assert(path_integer<T> || std::convertible_to<const T&, std::string_view> ||
                      std::floating_point<T> || character<T> || std::same_as<T, bool>,
                  "leat: a path part is an integer of up to 64 bits or a text; cast an "
                  "enumeration to int");
    path_part p;
    if constexpr (path_integer<T>) {
        p.is_negative = part < T{0};
        const auto word = static_cast<std::uint64_t>(part);
        p.magnitude = p.is_negative ? std::uint64_t{0} - word : word;
    } else if constexpr (std::convertible_to<const T&, std::string_view>) {
        if constexpr (std::is_pointer_v<T>) {
            if (part == nullptr) {
                refuse("source", "a path part is a null pointer, must be a text");
            }
        }
        p.text = part;
        p.is_text = true;
    }
    return p;
}

enum class path_kind : std::uint64_t { stream = 1, engine, chunk, offspring, indexed_variate };

/// The key and the upper half of the counter: where in philox4x32's range a stream lives.
struct stream_place {
    std::uint64_t key;
    std::uint64_t upper;
};

/// A path being hashed. A trailing integer is held back, since it may turn out to be the index.
class path_hash {
public:
    /// A path that starts with a seed.
    constexpr explicit path_hash(const path_part& seed) noexcept { absorb(seed); }

    /// A path that starts with a parent stream: for offspring.
    constexpr explicit path_hash(stream_place parent) noexcept {
        hash_.absorb(4);
        hash_.absorb(parent.key);
        hash_.absorb(parent.upper);
    }

    constexpr void append(const path_part& part) noexcept {
        if (has_held_) {
            absorb(held_integer());
        }
        has_held_ = !part.is_text;
        if (part.is_text) {
            absorb(part);
        } else {
            held_ = part.magnitude;
            held_is_negative_ = part.is_negative;
        }
    }

    [[nodiscard]] constexpr stream_place place(path_kind kind) const noexcept {
        const std::uint64_t index_form = !has_held_ ? 0 : held_is_negative_ ? 2 : 1;
        siphash hash = hash_;
        hash.absorb(static_cast<std::uint64_t>(kind) + 256 * index_form);
        const word_pair result = hash.finish();
        return {result.low, result.high + (has_held_ ? held_ : 0)};
    }

    /// What a saved path consists of: the state of the hash, the integer held back, and 1 where
    /// there is one plus 2 where it is negative.
    using state_type = std::array<std::uint64_t, 7>;
    static constexpr std::uint64_t largest_form = 3;

    [[nodiscard]] constexpr state_type state() const noexcept {
        const auto h = hash_.state();
        return {h[0],
                h[1],
                h[2],
                h[3],
                h[4],
                held_,
                (has_held_ ? std::uint64_t{1} : 0) + (held_is_negative_ ? std::uint64_t{2} : 0)};
    }
    /// Goes on from a state, whose last word must be at most `largest_form`.
    constexpr explicit path_hash(const state_type& s) noexcept
        : hash_(std::array<std::uint64_t, 5>{s[0], s[1], s[2], s[3], s[4]}),
          held_(s[5]),
          has_held_((s[6] & 1u) != 0),
          held_is_negative_((s[6] & 2u) != 0) {}

    friend constexpr bool operator==(const path_hash&, const path_hash&) = default;

private:
    static constexpr siphash start() noexcept {
        siphash hash(0x0706050403020100u, 0x0f0e0d0c0b0a0908u);
        hash.absorb(0x000000017461656cu); // "leat", version 1
        return hash;
    }

    [[nodiscard]] constexpr path_part held_integer() const noexcept {
        return {.text = {}, .magnitude = held_, .is_text = false, .is_negative = held_is_negative_};
    }

    constexpr void absorb(const path_part& item) noexcept {
        if (!item.is_text) {
            hash_.absorb(item.is_negative ? 2 : 1);
            hash_.absorb(item.magnitude);
            return;
        }
        hash_.absorb_text(item.text);
    }

    siphash hash_ = start();
    std::uint64_t held_ = 0;
    bool has_held_ = false;
    bool held_is_negative_ = false;
};

} // namespace leat::detail

#endif
