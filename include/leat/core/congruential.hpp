// The congruential method modulo a power of two: x -> a x + c mod 2^bits, its jumps and distances.
//
//     constexpr leat::congruential posix{25214903917, 11, 48};
//     posix.after(x, 1'000'000);         // the state a million steps on
//     posix.steps_between(x, y);         // how many steps lead from x to y
//
// For states of such generators met in old programs and files; a state is a 64-bit word below
// 2^bits. Full period (every state on one cycle of 2^bits) needs an odd c and a = 1 modulo 4 (Hull
// and Dobell, SIAM Review 4, 1962); steps_between refuses other constants.
//
// Sources: Brown, "Random number generation with arbitrary strides", Trans. Amer. Nucl. Soc. 71,
// 1994, for `after`; the same squares, one bit of the distance at a time, give the distance.

#ifndef LEAT_CORE_CONGRUENTIAL_HPP
#define LEAT_CORE_CONGRUENTIAL_HPP

#include "leat/core/errors.hpp"

#include <cstdint>

namespace leat {

/// The constants of x -> multiplier * x + increment mod 2^bits.
struct congruential {
    std::uint64_t multiplier; ///< what the state is multiplied by
    std::uint64_t increment;  ///< what is then added
    int bits = 64;            ///< 2 to 64

    friend constexpr bool operator==(const congruential&, const congruential&) = default;

    /// The state after one step.
    [[nodiscard]] constexpr std::uint64_t next(std::uint64_t x) const noexcept {
        return (multiplier * x + increment) & mask();
    }

    /// The state after n steps; n is taken modulo 2^64, which every period divides.
    [[nodiscard]] constexpr std::uint64_t after(std::uint64_t x, std::uint64_t n) const noexcept {
        congruential power = *this; // 2^i steps
        for (; n != 0; n >>= 1) {
            if ((n & 1u) != 0) {
                x = power.next(x);
            }
            power = power.twice();
        }
        return x & mask();
    }

    /// How many steps lead from one state to another. Constants without full period are refused.
    [[nodiscard]] constexpr std::uint64_t steps_between(std::uint64_t from,
                                                        std::uint64_t to) const {
        if (bits < 2 || bits > 64) {
            detail::refuse("congruential", "bits", bits, "must be 2 to 64");
        }
        if (multiplier % 4 != 1) {
            detail::refuse("congruential", "multiplier", multiplier,
                           "must be 1 modulo 4 (full period)");
        }
        if (increment % 2 != 1) {
            detail::refuse("congruential", "increment", increment, "must be odd (full period)");
        }
        // 2^i steps leave the lower i bits alone and change bit i: so bit i of the distance is
        // whether the states, brought together below, differ there.
        std::uint64_t distance = 0;
        congruential power = *this;
        for (int i = 0; i < bits; ++i) {
            if (((from ^ to) >> i & 1u) != 0) {
                from = power.next(from);
                distance |= std::uint64_t{1} << i;
            }
            power = power.twice();
        }
        return distance;
    }

private:
    [[nodiscard]] constexpr std::uint64_t mask() const noexcept {
        return ~std::uint64_t{0} >> (64 - bits);
    }
    /// Two of these steps as one.
    [[nodiscard]] constexpr congruential twice() const noexcept {
        return {multiplier * multiplier, (multiplier + 1) * increment, bits};
    }
};

} // namespace leat

#endif
