// Random order and random choice: shuffle, pick, sample_without_replacement.
//
//   leat::shuffle(cards, g);                              // all orders equally likely
//   auto& turbine = leat::pick(turbines, g);              // one element, by reference
//   auto rows = leat::sample_without_replacement(n, k, g);  // k different ones of 0 .. n - 1
//
// Every index is drawn by `below`, so exactly unbiased; the draws and their order are fixed here
// and are part of the interface, unlike those of std::shuffle and std::sample.
//
// Sources: Durstenfeld, Algorithm 235: Random permutation, CACM 7(7), 1964; Fisher and Yates,
// Statistical Tables, 1938. An engine of b bits of state reaches at most 2^b of the size! orders:
// 128 bits are passed at 34 elements, 256 bits at 57. That is harmless in simulation, where no
// order is looked for.

#ifndef LEAT_UNIFORM_PERMUTE_HPP
#define LEAT_UNIFORM_PERMUTE_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <bit>
#include <cstddef>
#include <cstdint>
#include <iterator>
#include <type_traits>
#include <utility>
#include <vector>

namespace leat {

/// Puts the elements of a random-access range into random order, in place. For i from size - 1
/// down to 1 it draws j = below(i + 1) and swaps elements i and j: size - 1 calls of `below`.
template <class Range, random_words G>
constexpr void shuffle(Range&& range, G& g) {
    const auto first = std::begin(range);
    using iterator = std::remove_const_t<decltype(first)>;
    static_assert(std::random_access_iterator<iterator>,
                  "leat::shuffle needs a random-access range: an array, a vector, a span, a deque");
    using distance = std::iter_difference_t<iterator>;
    for (std::uint64_t i = std::size(range); i > 1; --i) {
        const std::uint64_t j = below(i, g);
        std::ranges::iter_swap(first + static_cast<distance>(i - 1),
                               first + static_cast<distance>(j));
    }
}

/// A reference to a random element: the one at below(size). An empty range is refused.
template <class Range, random_words G>
constexpr decltype(auto) pick(Range& range, G& g) {
    const std::uint64_t size = std::size(range);
    if (size == 0) {
        detail::refuse("pick", "size of the range", 0, "must be at least 1");
    }
    const auto first = std::begin(range);
    using iterator = std::remove_const_t<decltype(first)>;
    static_assert(std::random_access_iterator<iterator>,
                  "leat::pick needs a random-access range: an array, a vector, a span, a deque");
    const std::uint64_t i = below(size, g);
    return first[static_cast<std::iter_difference_t<iterator>>(i)];
}

namespace detail {

/// A word that is known to fit, as a size. (A template, so that no cast is seen where both are the
/// same type.)
template <class Size = std::size_t>
constexpr Size as_size(std::uint64_t x) noexcept {
    if constexpr (sizeof(Size) == sizeof x) {
        return x;
    } else {
        return static_cast<Size>(x);
    }
}

/// A map from non-zero 64-bit keys to words, of a size known beforehand: open addressing, at most
/// half full. The keys met here are random, so their product with an odd constant spreads them.
class index_map {
public:
    LEAT_VECTOR_CONSTEXPR explicit index_map(std::uint64_t entries)
        : bits_(65 - std::countl_zero(entries | 1)), slots_(std::size_t{1} << bits_) {}

    /// The value kept under `key`; a new key gets `value`.
    constexpr std::uint64_t& at(std::uint64_t key, std::uint64_t value) {
        const std::size_t mask = slots_.size() - 1;
        auto i = as_size((key * 0x9E3779B97F4A7C15u) >> (64 - bits_));
        while (slots_[i].key != key) {
            if (slots_[i].key == 0) {
                slots_[i] = {key, value};
                break;
            }
            i = (i + 1) & mask;
        }
        return slots_[i].value;
    }

private:
    struct slot {
        std::uint64_t key = 0; // 0: free
        std::uint64_t value = 0;
    };
    int bits_;
    std::vector<slot> slots_;
};

/// An integer that must not be negative, as a word.
template <number_integer Int>
constexpr std::uint64_t count_of(Int x, const char* parameter) {
    if (x < 0) {
        refuse("sample_without_replacement", parameter, message_value(x), "must not be negative");
    }
    return static_cast<std::uint64_t>(x);
}

} // namespace detail

/// k different integers of 0 .. n - 1, in random order: every one of the n! / (n - k)! outcomes is
/// equally likely. n may be up to 2^64 - 1; memory and expected time are of order k.
///
/// It is the start of a shuffle, of which only what has moved is kept: for i from 0 to k - 1, with
/// j = i + below(n - i), elements i and j of 0, 1, ..., n - 1 are swapped, and the first k are the
/// sample. k calls of `below`. Sort the result where ascending order is wanted.
template <detail::number_integer N, detail::number_integer K, random_words G>
LEAT_VECTOR_CONSTEXPR std::vector<std::uint64_t> sample_without_replacement(N n, K k, G& g) {
    const std::uint64_t size = detail::count_of(n, "n");
    const std::uint64_t wanted = detail::count_of(k, "k");
    if (wanted > size) {
        detail::refuse("sample_without_replacement", "k", detail::message_value(k),
                       "must not exceed n");
    }
    std::vector<std::uint64_t> sample;
    if (wanted > sample.max_size() / 8) {
        detail::refuse("sample_without_replacement", "k", detail::message_value(k),
                       "must fit in memory");
    }
    sample.resize(detail::as_size(wanted));
    for (std::size_t i = 0; i < sample.size(); ++i) {
        sample[i] = i;
    }
    // Places below k are in the sample itself; those beyond that have been swapped, in the map.
    const std::uint64_t beyond = size - wanted;
    detail::index_map moved(beyond < wanted ? beyond : wanted);
    for (std::size_t i = 0; i < sample.size(); ++i) {
        const std::uint64_t j = i + below(size - i, g);
        if (j < wanted) {
            std::swap(sample[i], sample[detail::as_size(j)]);
        } else {
            std::swap(sample[i], moved.at(j, j));
        }
    }
    return sample;
}

} // namespace leat

#endif
