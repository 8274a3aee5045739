// A choice among outcomes 0 .. n - 1 of given weights that change between draws: the next event of
// a kinetic or event-driven model, whose rates change all the time.
//
//   leat::weighted_index next({0.2, 1e-9, 3});      const auto event = next(g);
//   next.update(event, 0);                           double rate = next.total();
//
// Domain: 1 weight or more, each 0 or from 2^-900 to 2^900 (1.2e-271 to 8.4e270); anything else
// throws invalid_parameter, which names the entry, and changes nothing. All weights may be 0; a
// draw is then refused. Memory: 16 bytes for each of n weights, n rounded up to a power of two.
//
// Method: a binary tree of sums over the weights (C. K. Wong and M. C. Easton, An efficient method
// for weighted sampling without replacement, SIAM J. Comput. 9(1), 1980). A draw is one word64, and
// one comparison on each of log2(n) levels; an update recomputes log2(n) sums. A sum is always that
// of its two parts, rounded once, so the tree depends on the weights it has and not on those it
// had: nothing drifts, and total() is the same bits everywhere. An outcome of weight 0 is never
// drawn. A chance is right to 2^-52, and to a relative 2^-52 for each level. So an outcome of a
// chance of 2^-53 or less may never come, or come too often. Not for weights that stay
// (categorical: constant time, and chances right to 2^-64).

#ifndef LEAT_DISTRIBUTIONS_WEIGHTED_INDEX_HPP
#define LEAT_DISTRIBUTIONS_WEIGHTED_INDEX_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/core/text.hpp"
#include "leat/core/vector_constexpr.hpp"
#include "leat/distributions/detail/law.hpp" // read_field and write_field of a list
#include "leat/uniform/uniform_integer.hpp"  // number_integer
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

#include <bit>
#include <cstddef>
#include <cstdint>
#include <limits>
#include <span>
#include <vector>

namespace leat {

/// A choice by weights that change.
template <detail::number_integer Int = std::int64_t>
class weighted_index {
    using real = detail::strict<double>;

public:
    using result_type = Int;

    /// One outcome, of weight 1.
    constexpr weighted_index() : weighted_index(std::vector<double>{1}) {}
    /// From weights >= 0, not all 0; they need not sum to 1.
    constexpr explicit weighted_index(const std::vector<double>& weights) : size_(weights.size()) {
        if (weights.empty()) {
            detail::refuse(name, "size of weights", 0, "must be at least 1");
        }
        if (size_ - 1 > static_cast<std::uint64_t>(std::numeric_limits<Int>::max())) {
            detail::refuse(name, "size of weights", std::uint64_t{size_},
                           "must be at most what the integer type can number");
        }
        for (std::size_t i = 0; i < size_; ++i) {
            refuse_unless_weight(i, weights[i]);
        }
        while (leaves_ < size_) {
            leaves_ *= 2;
        }
        sums_ = std::vector<double>(2 * leaves_, 0.0);
        for (std::size_t i = 0; i < size_; ++i) {
            sums_[leaves_ + i] = weights[i];
        }
        for (std::size_t node = leaves_ - 1; node > 0; --node) {
            add_up(node);
        }
    }

    /// A draw; refused while all weights are 0.
    template <random_words G>
    [[nodiscard]] constexpr Int operator()(G& g) const {
        if (total() == 0) {
            detail::refuse(name, "total", 0, "must be > 0 for a draw");
        }
        return at(word64(g));
    }
    /// For fills: all of the draws, from a cursor on the engine's words.
    template <class Words>
    constexpr void fill_from_words(std::span<Int> out, Words& words) const {
        for (Int& x : out) {
            x = (*this)(words);
        }
    }

    /// Gives outcome i another weight.
    constexpr void update(Int i, double weight) {
        const std::size_t entry = entry_or_refuse(i);
        refuse_unless_weight(entry, weight);
        std::size_t node = leaves_ + entry;
        sums_[node] = weight;
        for (node /= 2; node > 0; node /= 2) {
            add_up(node);
        }
    }

    /// The weight of outcome i.
    [[nodiscard]] constexpr double weight(Int i) const {
        return sums_[leaves_ + entry_or_refuse(i)];
    }
    /// All weights.
    [[nodiscard]] LEAT_VECTOR_CONSTEXPR std::vector<double> weights() const {
        std::vector<double> result;
        result.reserve(size_);
        for (std::size_t i = 0; i < size_; ++i) {
            result.push_back(sums_[leaves_ + i]);
        }
        return result;
    }
    /// The sum of the weights, as the tree adds them up.
    [[nodiscard]] constexpr double total() const noexcept { return sums_[1]; }
    /// The number of outcomes.
    [[nodiscard]] constexpr std::size_t size() const noexcept { return size_; }

    [[nodiscard]] static constexpr Int min() noexcept { return 0; }
    [[nodiscard]] constexpr Int max() const noexcept { return static_cast<Int>(size_ - 1); }

    /// The name under which it is saved.
    static constexpr const char* class_name = "weighted_index";
    /// What its constructor takes, by name.
    static constexpr const char* argument_names[] = {"weights"};
    /// Calls use with what the constructor took.
    template <class Use>
    constexpr decltype(auto) arguments(Use use) const {
        return use(weights());
    }

    friend bool operator==(const weighted_index&, const weighted_index&) = default;

    /// Writes the number of weights and the weights, to the bit.
    template <class Char, class Traits>
    friend std::basic_ostream<Char, Traits>& operator<<(std::basic_ostream<Char, Traits>& os,
                                                        const weighted_index& x) {
        detail::write_field(os, x.weights());
        return os;
    }
    /// Reads what << wrote; garbage and refused weights set failbit and leave `x` as it was.
    template <class Char, class Traits>
    friend std::basic_istream<Char, Traits>& operator>>(std::basic_istream<Char, Traits>& is,
                                                        weighted_index& x) {
        std::vector<double> weights;
        detail::read_field(is, weights);
        bool sound =
            !is.fail() && !weights.empty() &&
            weights.size() - 1 <= static_cast<std::uint64_t>(std::numeric_limits<Int>::max());
        for (const double w : weights) {
            sound = sound && is_weight(w);
        }
        if (sound) {
            x = weighted_index(weights);
        } else {
            is.setstate(std::basic_istream<Char, Traits>::failbit);
        }
        return is;
    }

private:
    static constexpr const char* name = "weighted_index";

    // Within these bounds no sum overflows, and no difference in a draw is a subnormal number.
    static constexpr bool is_weight(double w) noexcept {
        return w == 0 || (w >= 0x1p-900 && w <= 0x1p900);
    }
    static constexpr void refuse_unless_weight(std::size_t i, double w) {
        if (!is_weight(w)) {
            detail::refuse_entry(name, "weights", i, w, "must be 0 or from 2^-900 to 2^900");
        }
    }
    constexpr std::size_t entry_or_refuse(Int i) const {
        if (i < 0 || i > max()) {
            detail::refuse(name, "i", detail::message_value(i),
                           "must be the number of an outcome, from 0");
        }
        return static_cast<std::size_t>(i);
    }

    /// Node k has the parts 2k and 2k + 1; node 1 is the root.
    constexpr void add_up(std::size_t node) noexcept {
        sums_[node] = (real(sums_[2 * node]) + sums_[2 * node + 1]).value;
    }

    /// Where the point that a word stands for lies on the line of all weights, laid end to end.
    constexpr Int at(std::uint64_t word) const noexcept {
        real place = real(detail::open_unit(word)) * total();
        std::size_t node = 1;
        while (node < leaves_) {
            node *= 2;
            const double left = sums_[node];
            // Rounding may have put the place at the very end of a sum, or beyond: hence the second
            // condition. The chosen part is never 0.
            // No branch: it would be a coin toss.
            const std::uint64_t right = static_cast<std::uint64_t>(!(place.value < left)) &
                                        static_cast<std::uint64_t>(sums_[node + 1] > 0);
            const std::uint64_t taken = std::bit_cast<std::uint64_t>(left) & (0 - right);
            place = place - std::bit_cast<double>(taken);
            node += static_cast<std::size_t>(right);
        }
        return static_cast<Int>(node - leaves_);
    }

    std::size_t size_;
    std::size_t leaves_ = 1;
    std::vector<double> sums_;
};

weighted_index(std::vector<double>)->weighted_index<>;

} // namespace leat

#endif
