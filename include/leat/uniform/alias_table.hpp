// A choice among outcomes of given weights in constant time: one look into a table a draw.
//
//   const detail::alias_table<> table(weights);       std::size_t i = table(g);
//
// Domain: 1 to 2^32 weights, each finite and >= 0 (subnormal numbers too), not all 0: the caller
// refuses anything else under its own name, see `first_bad_weight`. A draw consumes one word64 and
// throws nothing. Memory: 8 bytes for each of n columns, n rounded up to a power of two.
//
// How exact. Everything is done in integers. Outcome i is given c[i] of the 2^64 words, the whole
// numbers c[i] summing to 2^64, and is drawn by exactly so many. With p[i] its weight over the sum
// of all n, |c[i] - 2^64 p[i]| < 1 + n / 2^29: a chance is off by about 2^-64 at most, and to
// notice takes 2^64 draws or more. A weight of 0 gets no word; a positive one below 2^-64 of the
// sum may get none either. Multiplying all weights by a power of two changes nothing.
//
// Method: A. J. Walker, An efficient method for generating discrete random variables with general
// distributions, ACM TOMS 3(3), 1977; the table is built in linear time, as by M. D. Vose, A linear
// algorithm for generating random numbers with a given distribution, IEEE Trans. Software Eng.
// 17(9), 1991. With integers the columns fill without a rest, so neither needs a special end.
// Not for weights that change (weighted_index), nor for fewer draws than there are weights.

#ifndef LEAT_UNIFORM_ALIAS_TABLE_HPP
#define LEAT_UNIFORM_ALIAS_TABLE_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/modular.hpp" // divide_wide
#include "leat/core/scaled.hpp"
#include "leat/core/wide_multiply.hpp"
#include "leat/uniform/words.hpp"

#include <bit>
#include <concepts>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <span>
#include <vector>

namespace leat::detail {

/// The index of the first weight that is negative, infinite or NaN; their number if none is.
constexpr std::size_t first_bad_weight(std::span<const double> weights) noexcept {
    std::size_t i = 0;
    while (i < weights.size() && weights[i] >= 0 &&
           weights[i] <= std::numeric_limits<double>::max()) {
        ++i;
    }
    return i;
}

/// True where every weight is 0.
constexpr bool all_zero(std::span<const double> weights) noexcept {
    for (const double w : weights) {
        if (w > 0) {
            return false;
        }
    }
    return true;
}

/// Weights as whole numbers of one small unit, 2^-94 of the power of two at or below the largest.
/// What is cut off is below that unit; 2^32 weights sum to less than 2^127.
class whole_weights {
public:
    /// `weights` as the head of this file asks for.
    constexpr explicit whole_weights(std::span<const double> weights) noexcept {
        double largest = 0;
        for (const double w : weights) {
            largest = w > largest ? w : largest;
        }
        top_ = split(largest).exponent;
        for (const double w : weights) {
            total_ = add(total_, (*this)(w));
        }
        shift_ = std::countl_zero(total_.high); // the largest is at least 2^94: below 64
    }

    /// A weight in units.
    [[nodiscard]] constexpr word_pair operator()(double weight) const noexcept {
        if (weight == 0) {
            return {0, 0};
        }
        const scaled x = split(weight);
        constexpr std::uint64_t leading = std::uint64_t{1} << 52;
        const std::uint64_t digits =
            (std::bit_cast<std::uint64_t>(x.factor) & (leading - 1)) | leading;
        const std::int64_t places = x.exponent - top_ + 42; // digits * 2^places, at most 42
        if (places > 0) {
            return {digits << places, digits >> (64 - places)};
        }
        return {places > -53 ? digits >> -places : 0, 0};
    }

    [[nodiscard]] constexpr word_pair total() const noexcept { return total_; }
    /// The exponent of two of the unit.
    [[nodiscard]] constexpr std::int64_t exponent() const noexcept { return top_ - 94; }

    /// floor(2^64 sum / total), modulo 2^64, for a sum of weights in units.
    [[nodiscard]] constexpr std::uint64_t share(word_pair sum) const noexcept {
        if (sum == total_) {
            return 0;
        }
        const word_pair n = shifted(sum);
        const word_pair d = shifted(total_);
        // One digit of a long division (Knuth, TAOCP vol. 2, 4.3.1, Algorithm D): the estimate from
        // the leading digits is at most 2 too large.
        std::uint64_t q = n.high < d.high ? divide_wide(n, d.high).quotient
                                          : std::numeric_limits<std::uint64_t>::max();
        for (;; --q) {
            const word_pair lower = multiply_wide(q, d.low);
            const word_pair upper = multiply_add_wide(q, d.high, lower.high, 0);
            if (upper.high < n.high ||
                (upper.high == n.high &&
                 (upper.low < n.low || (upper.low == n.low && lower.low == 0)))) {
                return q;
            }
        }
    }

private:
    [[nodiscard]] constexpr word_pair shifted(word_pair x) const noexcept {
        return shift_ == 0
                   ? x
                   : word_pair{x.low << shift_, (x.high << shift_) | (x.low >> (64 - shift_))};
    }

    std::int64_t top_ = 0; // the exponent of two of the largest weight
    word_pair total_{0, 0};
    int shift_ = 0;
};

/// The table (see above). Templated on the word so that the tests can go through all words of 8 and
/// of 16 bits: with fewer bits, for at most 2^digits weights, the same holds of 2^digits words.
template <std::unsigned_integral Word = std::uint64_t>
class alias_table {
    static constexpr int digits = std::numeric_limits<Word>::digits;

public:
    /// The table of these weights.
    constexpr explicit alias_table(std::span<const double> weights) {
        const std::size_t n = weights.size();
        const std::uint64_t last = n > 2 ? n - 1 : 1; // two columns at least, or a shift is too far
        const int bits = 64 - std::countl_zero(last);
        rest_bits_ = digits - bits;
        // With a value: without, not all compilers take it in constant evaluation.
        columns_ = std::vector<Word>(std::size_t{1} << bits, Word{0});
        std::vector<Word> words(n, Word{0});
        std::size_t owner = n;
        count_words(weights, words, owner);
        for (std::size_t j = 0; j < columns_.size(); ++j) {
            columns_[j] = column(owner < n ? owner : j, 0);
        }
        if (owner == n) {
            pair_columns(words);
        }
    }

    /// The outcome that a word stands for.
    [[nodiscard, gnu::always_inline]] constexpr std::size_t at(Word word) const noexcept {
        return look_up(columns_.data(), rest_bits_, word);
    }
    /// A draw.
    template <random_words G>
    [[nodiscard]] constexpr std::size_t operator()(G& g) const {
        return at(static_cast<Word>(draw_bits<digits>(g)));
    }

    /// For fills: out[i] = at(words[i]), for as many as there are words.
    template <class Int>
    constexpr void at_each(std::span<const Word> words, Int* out) const noexcept {
        const Word* const columns = columns_.data(); // locals, which `out` cannot alias
        const int rest_bits = rest_bits_;
        for (std::size_t i = 0; i < words.size(); ++i) {
            out[i] = static_cast<Int>(look_up(columns, rest_bits, words[i]));
        }
    }

private:
    // A column holds 2^rest_bits words: the upper bits of a word choose it. The rest of the word is
    // below its threshold for the outcome of the column's own number, else it is for the alias.
    // Both are packed into one word, the alias on top; a full column is its own alias.
    [[gnu::always_inline]] static constexpr std::size_t look_up(const Word* columns, int rest_bits,
                                                                Word word) noexcept {
        const auto mask = static_cast<Word>((Word{1} << rest_bits) - 1);
        const auto own = static_cast<Word>(word >> rest_bits);
        const Word entry = columns[own];
        const auto alias = static_cast<Word>(entry >> rest_bits);
        return static_cast<std::size_t>((word & mask) < (entry & mask) ? own : alias);
    }
    [[nodiscard]] constexpr Word column(std::size_t alias, Word threshold) const noexcept {
        return static_cast<Word>((static_cast<Word>(alias) << rest_bits_) | threshold);
    }

    /// How many words each outcome gets: the differences of the rounded sums, so that they sum up.
    /// One that gets all 2^digits, which a word does not hold, is the owner.
    static constexpr void count_words(std::span<const double> weights, std::vector<Word>& words,
                                      std::size_t& owner) noexcept {
        const whole_weights whole(weights);
        word_pair sum{0, 0};
        Word before = 0;
        for (std::size_t i = 0; i < weights.size(); ++i) {
            const word_pair weight = whole(weights[i]);
            if (weight == word_pair{0, 0}) {
                continue;
            }
            sum = add(sum, weight);
            const auto upto = static_cast<Word>(whole.share(sum) >> (64 - digits));
            words[i] = static_cast<Word>(upto - before);
            if (sum == whole.total() && before == 0) {
                owner = i;
            }
            before = upto;
        }
    }

    /// Fills every column that has too few words of its own from one that has too many.
    constexpr void pair_columns(std::vector<Word>& words) noexcept {
        const auto full = static_cast<Word>(Word{1} << rest_bits_);
        std::size_t rich = 0; // from here on lie all outcomes with more words than a column holds
        for (std::size_t next = 0; next < columns_.size(); ++next) {
            for (std::size_t j = next;;) {
                const Word own = j < words.size() ? words[j] : Word{0};
                if (own >= full) {
                    break; // rich, or full: as it was made
                }
                while (words[rich] <= full) {
                    ++rich;
                }
                columns_[j] = column(rich, own);
                if (j < words.size()) {
                    words[j] = full; // settled
                }
                words[rich] = static_cast<Word>(words[rich] - (full - own));
                if (rich > next) {
                    break; // its turn will come
                }
                j = rich;
            }
        }
    }

    int rest_bits_ = 0;
    std::vector<Word> columns_;
};

} // namespace leat::detail

#endif
