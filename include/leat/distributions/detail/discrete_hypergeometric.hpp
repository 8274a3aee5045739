// Hypergeometric counts where at most half of the population is marked and at most half is drawn:
// the core of `hypergeometric`, which brings every case to this one.
//
// Below a mean of 10 inversion on the thresholds of discrete_inversion.hpp, from 10 on the ratio of
// uniforms with a table-mountain hat (HRUA). A fill decides its trials by a table of masses near
// the mode, and as a single draw where rounding could matter.
// Sources: see hypergeometric.hpp.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_HYPERGEOMETRIC_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_HYPERGEOMETRIC_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // two_product
#include "leat/core/errors.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/square_root.hpp"
#include "leat/distributions/detail/discrete_deviance.hpp"
#include "leat/distributions/detail/discrete_inversion.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/distributions/detail/discrete_transformed.hpp" // nearby_masses
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

#include <cstddef>
#include <cstdint>
#include <span>

namespace leat::detail {

/// The ratio of successive masses.
struct hypergeometric_ratio {
    double marked_and_one;
    double drawn_and_one;
    double neither; // when none of the drawn is marked
    constexpr double operator()(std::uint64_t k) const noexcept {
        using real = strict<double>;
        const real count = static_cast<double>(k);
        return ((real(marked_and_one) - count) * reciprocal(k) *
                ((real(drawn_and_one) - count) / (count + neither)))
            .value;
    }
};

/// Hypergeometric counts where at most half is marked and at most half is drawn.
class hypergeometric_counts {
    using real = strict<double>;

public:
    static constexpr double smallest_rejection_mean = 10;

    constexpr hypergeometric_counts(double population, double marked, double drawn) noexcept
        : marked_(marked), drawn_(drawn), neither_((real(population) - marked - drawn).value) {
        if (population == 0) {
            return;
        }
        // The mean, marked * drawn / population, as a whole number and a fraction: the remainder of
        // the division is exact but for its last bits.
        const two_part product = two_product(marked, drawn);
        whole_ = static_cast<std::uint64_t>((real(product.high) / population).value);
        const two_part divided = two_product(static_cast<double>(whole_), population);
        fraction_ =
            (((real(product.high) - divided.high) + (real(product.low) - divided.low)) / population)
                .value;
        mean_ = (real(static_cast<double>(whole_)) + fraction_).value;
        if (inverts()) {
            first_ = first_threshold::from_log_mass(log_mass_of_none(population));
            return;
        }
        const real variance = real(mean_) * ((real(population) - marked) / population) *
                              ((real(population) - drawn) / (real(population) - 1.0));
        width_ = (real(0x1.b72cd3f331398p+0) * square_root((variance + 0.5).value) + // 2 sqrt(2/e)
                  0x1.cc3ebd3bc711ap-1) // 3 - 2 sqrt(3/e)
                     .value;
        const real mode = (real(marked) + 1.0) / (real(population) + 2.0) * (real(drawn) + 1.0);
        const auto from_whole = floor_to_integer((mode - static_cast<double>(whole_)).value);
        log_mode_ = log_of_cells(static_cast<double>(whole_) + static_cast<double>(from_whole),
                                 held(static_cast<double>(from_whole) - fraction_));
    }

    [[nodiscard]] constexpr bool inverts() const noexcept {
        return mean_ < smallest_rejection_mean;
    }
    /// The thresholds, where it inverts.
    [[nodiscard]] constexpr threshold_walk<hypergeometric_ratio> thresholds() const noexcept {
        return {first_, ratio()};
    }
    [[nodiscard]] constexpr std::uint64_t most() const noexcept {
        return static_cast<std::uint64_t>(marked_ < drawn_ ? marked_ : drawn_);
    }

    template <random_words G>
    [[nodiscard]] constexpr std::uint64_t draw(G& g) const {
        if (inverts()) {
            const std::uint64_t word = word64(g);
            const std::uint64_t k = thresholds()(word);
            return k < most() ? k : most();
        }
        const offsets_from counts(whole_, most());
        for (int left = trials; left > 0; --left) {
            const std::uint64_t first = word64(g);
            const std::uint64_t second = word64(g);
            std::uint64_t k = 0;
            std::int64_t offset = 0;
            if (counts.floor(place(first, second), offset, k) &&
                accepts(open_unit(first), k, offset)) {
                return k;
            }
        }
        stuck(name);
    }

    /// The draws of a loop; `finish` makes results of them.
    template <class T, class Words, class Finish>
    constexpr void fill(std::span<T> out, Words& words, Finish finish) const {
        const std::uint64_t max = most();
        if (inverts()) {
            const threshold_table table(thresholds());
            fill_by_table(out, words, table,
                          [&](std::uint64_t k) { return finish(k < max ? k : max); });
            return;
        }
        const offsets_from counts(whole_, max);
        const real middle = real(log_of_cells(static_cast<double>(whole_), -fraction_)) - log_mode_;
        const nearby_masses shares(whole_, natural_exp(middle.value), max, ratio());
        for (std::size_t i = 0; i < out.size(); ++i) {
            if (i % Words::block == 0) {
                words.expect(2 * (out.size() - i));
            }
            std::uint64_t k = 0;
            int left = trials;
            while (!decide(words, counts, shares, k)) {
                if (--left == 0) {
                    stuck(name);
                }
            }
            out[i] = finish(k);
        }
    }

    /// The logarithm of the mass at k, where the population is not 0.
    [[nodiscard]] constexpr double log_mass(double k) const noexcept {
        const real difference = (real(k) - static_cast<double>(whole_)) - fraction_;
        const real rest_marked = real(neither_) + drawn_;
        const real rest_drawn = real(neither_) + marked_;
        const real population = rest_marked + marked_;
        return (real(log_of_cells(k, difference.value)) -
                (real(log_poisson_mass_at_mean(marked_)) +
                 log_poisson_mass_at_mean(rest_marked.value) + log_poisson_mass_at_mean(drawn_) +
                 log_poisson_mass_at_mean(rest_drawn.value) -
                 log_poisson_mass_at_mean(population.value)))
            .value;
    }

private:
    static constexpr const char* name = "hypergeometric";
    static constexpr int trials = 110;

    [[nodiscard]] constexpr hypergeometric_ratio ratio() const noexcept {
        return {held(marked_ + 1.0), held(drawn_ + 1.0), neither_};
    }
    /// Where a trial falls, from whole_.
    [[nodiscard]] constexpr double place(std::uint64_t first, std::uint64_t second) const noexcept {
        const real y = real(open_unit(second)) - 0.5;
        return (real(fraction_) + 0.5 + real(width_) * y / open_unit(first)).value;
    }
    /// Whether x^2 is at most the mass at k as a share of the mode's.
    [[nodiscard]] constexpr bool accepts(real x, std::uint64_t k,
                                         std::int64_t offset) const noexcept {
        const double difference = held(static_cast<double>(offset) - fraction_);
        const real log_share = real(log_of_cells(static_cast<double>(k), difference)) - log_mode_;
        if (x * (real(4.0) - x) - 3.0 <= log_share) { // at most 2 ln x
            return true;
        }
        if (x * (x - log_share) >= 1) { // x - 1 / x is at most 2 ln x
            return false;
        }
        return real(2.0) * natural_log(x.value) <= log_share;
    }
    /// One trial of a fill: by the table where rounding cannot matter, else as a single draw.
    template <class Words>
    [[gnu::always_inline]] constexpr bool decide(Words& words, const offsets_from& counts,
                                                 const nearby_masses& shares,
                                                 std::uint64_t& k) const {
        const std::uint64_t first = words();
        const std::uint64_t second = words();
        std::int64_t offset = 0;
        if (!counts.floor(place(first, second), offset, k)) [[unlikely]] {
            return false;
        }
        const real x = open_unit(first);
        const real share = shares(k);
        const real square = x * x;
        if (square <= share * (1 - 0x1p-30)) {
            return true;
        }
        if (square >= share * (1 + 0x1p-30) && share > 0) {
            return false;
        }
        return accepts(x, k, offset);
    }

    /// log_mass(k) but for a constant; `difference` is k - mean. Half is the most that is marked
    /// or drawn, so the other cells' means lose no digits.
    [[nodiscard]] constexpr double log_of_cells(double k, double difference) const noexcept {
        const real only_marked = real(marked_) - mean_;
        const real only_drawn = real(drawn_) - mean_;
        const real none = real(neither_) + mean_;
        return (real(log_poisson_mass(k, mean_, difference)) +
                log_poisson_mass((real(marked_) - k).value, only_marked.value, -difference) +
                log_poisson_mass((real(drawn_) - k).value, only_drawn.value, -difference) +
                log_poisson_mass((real(neither_) + k).value, none.value, difference))
            .value;
    }

    /// log_mass(0), for means below 10: what cancels in it is left out, so that it is right
    /// relative to the mean, however small that is.
    [[nodiscard]] constexpr double log_mass_of_none(double population) const noexcept {
        if (mean_ == 0) {
            return 0;
        }
        if (neither_ == 0) { // half of fewer than 40, marked and drawn
            return log_mass(0);
        }
        const real rest_marked = real(neither_) + drawn_;
        const real rest_drawn = real(neither_) + marked_;
        const real deviances = real(deviance(marked_, (real(marked_) - mean_).value, mean_)) +
                               deviance(drawn_, (real(drawn_) - mean_).value, mean_) +
                               deviance(neither_, (real(neither_) + mean_).value, -mean_);
        const real remainders =
            (real(stirling_remainder(rest_marked.value)) - stirling_remainder(population)) +
            (real(stirling_remainder(rest_drawn.value)) - stirling_remainder(neither_));
        const real roots = real(0.5) * log_one_plus((real(mean_) / neither_).value);
        return ((remainders + roots) - deviances - mean_).value;
    }

    double marked_;
    double drawn_;
    double neither_;
    std::uint64_t whole_ = 0; // of the mean
    double fraction_ = 0;
    double mean_ = 0;
    first_threshold first_{}; // one or the other of this and the rest is in use
    double width_ = 0;
    double log_mode_ = 0;
};

} // namespace leat::detail

#endif
