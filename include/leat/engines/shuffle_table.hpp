// What shuffled and shuffled_by share: the table, its index, its text, and how bases are seeded.

#ifndef LEAT_ENGINES_SHUFFLE_TABLE_HPP
#define LEAT_ENGINES_SHUFFLE_TABLE_HPP

#include "leat/core/errors.hpp"
#include "leat/core/modular.hpp"
#include "leat/core/text.hpp"
#include "leat/core/wide_multiply.hpp"
#include "leat/engines/splitmix64.hpp" // seed sequences drawn from it

#include <array>
#include <cstddef>
#include <cstdint>

namespace leat {

namespace detail {

/// floor(k * y / size) for y < size and k < 2^32, where a size of 0 stands for 2^64.
constexpr std::uint32_t table_place(std::uint64_t k, std::uint64_t y, std::uint64_t size) noexcept {
    const word_pair product = multiply_wide(k, y);
    if (size == 0) {
        return static_cast<std::uint32_t>(product.high);
    }
    if (product.high == 0) {
        return static_cast<std::uint32_t>(product.low / size);
    }
    return static_cast<std::uint32_t>(divide_wide(product, size).quotient);
}

/// The whole bits of a base engine's state, where it tells them (engines of <random> do not).
template <class Engine>
constexpr int state_bits_of() noexcept {
    if constexpr (requires { Engine::state_bits; }) {
        return Engine::state_bits;
    } else {
        return 0;
    }
}

/// Seeds an engine from one number: leat's take all 64 bits, those of <random> their own word.
template <class Engine>
constexpr void seed_by_number(Engine& engine, std::uint64_t seed) {
    if constexpr (requires { Engine::state_bits; }) {
        engine.seed(seed);
    } else {
        engine.seed(static_cast<typename Engine::result_type>(seed));
    }
}

/// A seed sequence of splitmix64's words, upper halves. Each call goes on where the last one ended.
struct splitmix_sequence {
    using result_type = std::uint32_t;
    splitmix64 source;

    template <class Iterator>
    constexpr void generate(Iterator first, Iterator last) {
        for (; first != last; ++first) {
            *first = static_cast<std::uint32_t>(source() >> 32);
        }
    }
};

/// A seed sequence that gives the words of another one, mixed.
template <class Sequence>
struct mixed_sequence {
    using result_type = std::uint32_t;
    Sequence& base;

    template <class Iterator>
    constexpr void generate(Iterator first, Iterator last) {
        base.generate(first, last);
        std::uint64_t chain = 0;
        for (; first != last; ++first) {
            chain = splitmix64::mix(chain + splitmix64::gamma + *first);
            *first = static_cast<std::uint32_t>(chain >> 32);
        }
    }
};

/// The table of both adaptors: filling, text, and what it refuses.
template <class Engine, std::size_t K>
struct shuffle_table {
    static_assert(K >= 1 && K <= 0xFFFFFFFFu, "leat::shuffled: K must be at least 1, below 2^32");
    using word = typename Engine::result_type;
    std::array<word, K> words{};

    constexpr void fill(Engine& engine) {
        for (word& w : words) {
            w = engine();
        }
    }
    constexpr void check(const char* name) const {
        for (const word w : words) {
            check_word(name, "table word", w);
        }
    }
    static constexpr void check_word(const char* name, const char* parameter, word w) {
        if (w < Engine::min() || w > Engine::max()) {
            refuse(name, parameter, w, "must lie in the base engine's range");
        }
    }

    friend constexpr bool operator==(const shuffle_table&, const shuffle_table&) = default;

    template <class Char, class Traits>
    static bool read_word(std::basic_istream<Char, Traits>& is, word& w) {
        std::uint64_t x = 0;
        if (!read_unsigned(is, Engine::max(), x)) {
            return false;
        }
        if (x < Engine::min()) {
            is.setstate(std::basic_istream<Char, Traits>::failbit);
            return false;
        }
        w = static_cast<word>(x);
        return true;
    }
    template <class Char, class Traits>
    bool read(std::basic_istream<Char, Traits>& is) {
        for (word& w : words) {
            if (!read_word(is, w)) {
                return false;
            }
        }
        return true;
    }
    template <class Char, class Traits>
    void write(std::basic_ostream<Char, Traits>& os) const {
        for (const word w : words) {
            write_char(os, ' ');
            write_unsigned(os, w);
        }
    }
};

} // namespace detail
} // namespace leat

#endif
