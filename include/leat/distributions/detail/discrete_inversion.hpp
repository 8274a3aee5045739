// Inversion for counts of a small mean: one 64-bit word is compared with thresholds.
//
// Threshold k is the chance of a value above k, times 2^63: a draw is the number of thresholds that
// its word's upper 63 bits lie below. So one word gives one draw, and small words are large values.
// A draw works the thresholds out one by one; a fill writes the very same ones into a table. They
// are part of the sequence: mass(k) = mass(k - 1) * ratio(k) in double, each mass cut to a whole
// number and taken off the threshold. Below 2^31, where the errors so added up would begin to show,
// a threshold is the sum of the masses that follow instead. So chances of a value above k are right
// to about 2^-50 of the largest of them, and to 2^-20 of their own down to 2^-40; values that
// only a chance below 2^-63 would pass are not drawn.
//
// `Ratio` is callable: ratio(k), k >= 1, is mass(k) / mass(k - 1), which falls with k.
// Source: common practice (inversion by sequential search); the end of the thresholds is our own.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_INVERSION_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_INVERSION_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/exponential.hpp"

#include <cstddef>
#include <cstdint>
#include <span>

namespace leat::detail {

/// 1 / k for small k. Built-in arrays here and below: they take an index of any width.
struct reciprocal_table {
    double of[64] = {};
    constexpr reciprocal_table() noexcept {
        for (int k = 1; k < 64; ++k) {
            of[k] = 1.0 / k;
        }
    }
};
inline constexpr reciprocal_table small_reciprocals;

/// 1 / k, for k >= 1: where k is small from a table, which holds the same double.
constexpr double reciprocal(std::uint64_t k) noexcept {
    return k < 64 ? small_reciprocals.of[k] : held(1.0 / static_cast<double>(k));
}

/// Where the thresholds of a law begin.
struct first_threshold {
    double mass;        // of 0, times 2^63
    std::int64_t above; // threshold 0

    /// From the logarithm of the mass at 0, which is at least -40 or so.
    static constexpr first_threshold from_log_mass(double log_mass) noexcept {
        using real = strict<double>;
        // The smaller of mass and rest is computed, the other is what remains to 1.
        if (log_mass > -0.6875) {
            const real rest = -real(exp_minus_one(log_mass));
            return from((real(1.0) - rest).value, rest.value);
        }
        return from_mass(natural_exp(log_mass));
    }
    /// From the mass at 0, where the rest to 1 may be its difference from 1.
    static constexpr first_threshold from_mass(double mass) noexcept {
        return from(mass, held(1.0 - mass));
    }

private:
    static constexpr first_threshold from(double mass, double rest) noexcept {
        return {held(mass * 0x1p63), static_cast<std::int64_t>(held(rest * 0x1p63))};
    }
};

/// The thresholds of a law, one after the other.
template <class Ratio>
class threshold_walk {
public:
    constexpr threshold_walk(first_threshold first, Ratio ratio) noexcept
        : ratio_(ratio), mass_(first.mass), above_(first.above) {}

    /// The threshold it stands at.
    [[nodiscard]] constexpr std::int64_t above() const noexcept { return above_; }
    [[nodiscard]] constexpr std::uint64_t k() const noexcept { return k_; }

    /// Goes to the next.
    constexpr void next() noexcept {
        ++k_;
        mass_ = held(mass_ * ratio_(k_));
        // Signed, because processors convert to signed words faster: no mass passes 2^63.
        above_ -= static_cast<std::int64_t>(mass_);
        if (above_ < (std::int64_t{1} << 31)) [[unlikely]] {
            above_ = sum_of_the_rest();
        }
    }

    /// The value a word gives. From a fresh walk.
    constexpr std::uint64_t operator()(std::uint64_t word) noexcept {
        const auto place = static_cast<std::int64_t>(word >> 1);
        while (place < above_) {
            next();
        }
        return k_;
    }

private:
    [[gnu::noinline]] constexpr std::int64_t sum_of_the_rest() const noexcept {
        using real = strict<double>;
        real term = mass_;
        real sum = 0.0;
        std::uint64_t j = k_;
        do {
            term = term * ratio_(++j);
            sum = sum + term;
        } while (term > sum * 0x1p-56 && term > 0x1p-60);
        return static_cast<std::int64_t>(sum.value);
    }

    Ratio ratio_;
    double mass_;
    std::int64_t above_;
    std::uint64_t k_ = 0;
};

/// All thresholds of a law whose mean is at most 10 or so, and for each leading byte of a word
/// where the search begins.
class threshold_table {
    static constexpr int capacity = 128; // means of 10 need some 55

public:
    template <class Ratio>
    constexpr explicit threshold_table(threshold_walk<Ratio> walk) noexcept {
        int size = 0;
        above_[size] = walk.above();
        while (above_[size] != 0 && size + 1 < capacity) {
            walk.next();
            above_[++size] = walk.above();
        }
        int k = size;
        for (std::uint64_t byte = 0; byte < 256; ++byte) {
            const auto last = static_cast<std::int64_t>((byte << 55) | (~std::uint64_t{0} >> 9));
            while (k > 0 && last >= above_[k - 1]) {
                --k;
            }
            start_[byte] = static_cast<std::uint8_t>(k);
        }
    }

    /// The value a word gives.
    [[gnu::always_inline]] constexpr std::uint64_t operator()(std::uint64_t word) const noexcept {
        const auto place = static_cast<std::int64_t>(word >> 1);
        unsigned k = start_[word >> 56];
        while (place < above_[k]) {
            ++k;
        }
        return k;
    }

private:
    std::int64_t above_[capacity] = {};
    std::uint8_t start_[256] = {};
};

/// From this many draws on a table pays.
inline constexpr std::size_t worth_a_table = 256;

/// Fills by a table; `finish` makes a result of the value inverted.
template <class T, class Words, class Finish>
constexpr void fill_by_table(std::span<T> out, Words& words, const threshold_table& table,
                             Finish finish) {
    for (std::size_t i = 0; i < out.size();) {
        const std::span<const std::uint64_t> ahead = words.ahead(out.size() - i);
        for (std::size_t j = 0; j < ahead.size(); ++j) {
            out[i + j] = finish(table(ahead[j]));
        }
        words.skip(ahead.size());
        i += ahead.size();
    }
}

/// Fills draw by draw.
template <class T, class Law, class Words>
constexpr void fill_one_by_one(std::span<T> out, const Law& law, Words& words) {
    for (std::size_t i = 0; i < out.size(); ++i) {
        if (i % Words::block == 0) {
            words.expect(out.size() - i);
        }
        out[i] = law(words);
    }
}

} // namespace leat::detail

#endif
