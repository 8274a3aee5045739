// Transformed rejection for counts of a large mean: what `poisson` and `binomial` share.
//
// A trial takes two word64: U uniform on (-1/2, 1/2) and V on (0, 1). The count is the whole part
// of (2 a / (1/2 - |U|) + b) U + c, and is accepted where V, scaled, lies below its mass times the
// slope of that transformation: often by a squeeze, without the mass. The place of a trial is kept
// as an offset from the whole part of the mean, so that no size of mean costs digits.
// A fill goes through the same trials and decides them by a table of masses near the mode; where
// rounding could make that decide otherwise than a single draw does, or a count is not in the
// table, the test of a single draw is made.
// Sources: those of the laws.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_TRANSFORMED_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_DISCRETE_TRANSFORMED_HPP

#include "leat/core/barrier.hpp"
#include "leat/core/concepts.hpp"
#include "leat/core/error_free.hpp" // magnitude
#include "leat/core/errors.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/sizes.hpp"
#include "leat/distributions/detail/discrete_support.hpp"
#include "leat/uniform/unit.hpp"
#include "leat/uniform/words.hpp"

#include <cstddef>
#include <cstdint>
#include <span>

namespace leat::detail {

/// Masses near a mode, as shares of any one mass, right to about 2^-40 of themselves.
class nearby_masses {
public:
    /// From the mass at `middle` outwards; ratio(k) is mass(k) / mass(k - 1). Counts end at max.
    template <class Ratio>
    constexpr nearby_masses(std::uint64_t middle, double mass, std::uint64_t max,
                            const Ratio& ratio) noexcept
        : first_(middle < reach ? 0 : middle - reach) {
        const std::uint64_t after = max - middle < reach ? max : middle + reach;
        mass_[middle - first_] = mass;
        for (std::uint64_t k = middle; k < after; ++k) {
            mass_[k + 1 - first_] = held(mass_[k - first_] * ratio(k + 1));
        }
        for (std::uint64_t k = middle; k > first_; --k) {
            mass_[k - 1 - first_] = held(mass_[k - first_] / ratio(k));
        }
    }

    /// The share at k, 0 where it is not known.
    [[nodiscard]] constexpr double operator()(std::uint64_t k) const noexcept {
        const std::uint64_t i = k - first_;
        return i <= 2 * reach ? mass_[i] : 0.0;
    }

    static constexpr std::uint64_t reach = 255;

private:
    std::uint64_t first_;
    double mass_[2 * reach + 1] = {};
};

/// The transformation and its squeeze. All parameters are the methods' own.
class transformed_rejection {
    using real = strict<double>;

public:
    struct parameters {
        std::uint64_t whole; // of the mean
        double fraction;
        double shift; // c is the mean and this
        double a;
        double b;
        double squeeze;
        double scale; // of V
    };

    constexpr explicit transformed_rejection(const parameters& p) noexcept : p_(p) {}

    [[nodiscard]] constexpr const parameters& param() const noexcept { return p_; }

    /// A count in 0 .. max. log_mass(k, k - mean) is the logarithm of the mass that `scale` is for.
    template <random_words G, class LogMass>
    [[nodiscard]] constexpr std::uint64_t draw(G& g, std::uint64_t max, const LogMass& log_mass,
                                               const char* name) const {
        const offsets_from counts(p_.whole, max);
        for (int left = trials; left > 0; --left) {
            const std::uint64_t first = word64(g);
            const std::uint64_t second = word64(g);
            const place at = place_of(first);
            const real v = open_unit(second);
            std::uint64_t k = 0;
            std::int64_t offset = 0;
            if (counts.floor(at.x.value, offset, k) &&
                (squeezed(at, v) || accepts(at, v, k, offset, log_mass))) {
                return k;
            }
        }
        stuck(name);
    }

    /// The draws of a loop, from the cursor of a fill; `masses` are those of log_mass.
    template <class T, class Words, class LogMass, class Finish>
    constexpr void fill(std::span<T> out, Words& words, std::uint64_t max, const LogMass& log_mass,
                        const nearby_masses& masses, const char* name, Finish finish) const {
        const offsets_from counts(p_.whole, max);
        for (std::size_t i = 0; i < out.size(); ++i) {
            if (i % Words::block == 0) {
                words.expect(2 * (out.size() - i));
            }
            std::uint64_t k = 0;
            int left = trials;
            while (!decide(words, counts, log_mass, masses, k)) {
                if (--left == 0) {
                    stuck(name);
                }
            }
            out[i] = finish(k);
        }
    }

private:
    static constexpr int trials = 64;

    struct place {
        real side; // 1/2 - |U|
        real x;
    };
    constexpr place place_of(std::uint64_t word) const noexcept {
        const real u = real(open_unit(word)) - 0.5;
        const real side = real(0.5) - magnitude(u.value);
        const real x = (real(2.0) * p_.a / side + p_.b) * u + (real(p_.fraction) + p_.shift);
        return {side, x};
    }
    constexpr bool squeezed(const place& at, real v) const noexcept {
        return at.side >= 0.07 && v <= p_.squeeze;
    }
    template <class LogMass>
    constexpr bool accepts(const place& at, real v, std::uint64_t k, std::int64_t offset,
                           const LogMass& log_mass) const noexcept {
        const real height = v * p_.scale / (real(p_.a) / (at.side * at.side) + p_.b);
        const real difference = real(static_cast<double>(offset)) - p_.fraction;
        return natural_log(height.value) <= log_mass(k, difference.value);
    }

    /// One trial of a fill.
    template <class Words, class LogMass>
    [[gnu::always_inline]] constexpr bool
    decide(Words& words, const offsets_from& counts, const LogMass& log_mass,
           const nearby_masses& masses, std::uint64_t& k) const {
        const std::uint64_t first = words();
        const std::uint64_t second = words();
        const place at = place_of(first);
        const real v = open_unit(second);
        std::int64_t offset = 0;
        if (!counts.floor(at.x.value, offset, k)) [[unlikely]] {
            return false;
        }
        // The same test without a logarithm or a division, with room for rounding on either side.
        const real square = at.side * at.side;
        const real height = v * p_.scale * square;
        const real bar = real(masses(k)) * (real(p_.a) + square * p_.b);
        if (height <= bar * (1 - 0x1p-30)) [[likely]] {
            return true;
        }
        if (height >= bar * (1 + 0x1p-30) && bar > 0 && !squeezed(at, v)) {
            return false;
        }
        return squeezed(at, v) || accepts(at, v, k, offset, log_mass);
    }

    parameters p_;
};

} // namespace leat::detail

#endif
