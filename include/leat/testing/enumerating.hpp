// Engines that go through every combination of their first draws, so that what code does with them
// can be counted instead of sampled: an exact test, with no alarm rate.
//
//   leat::enumerating<8, 2> g;                 // 2 words of 8 bits: 65536 cases
//   do {
//       try {
//           ++times[roll(g)];                  // draws its words from g, as from any engine
//       } catch (const leat::stream_exhausted&) {
//           ++undecided;                       // it wanted a third word
//       }
//   } while (g.next_case());
//
// All cases are equally likely, also those that leave words undrawn: times[x] / cases() is the
// chance of x, up to undecided / cases(). A case that asks for more than `draws` words throws
// stream_exhausted.
//
//   enumerating<bits, draws>       words of `bits` bits, from 0 to 2^bits - 1: exact for code that
//                                  goes by the engine's min() and max(), as <random> does
//   enumerating_high<bits, draws>  words of 64 bits whose upper bits take every pattern, the rest
//                                  being half way (1000...): a fine grid over all words, right to
//                                  2^-bits a draw, for code that asks for 64-bit words (leat's
//                                  samplers make one from 64 / bits draws of the narrower engine)
//
// bits * draws is at most 40; some 24 take a fraction of a second.
// Not for simulation: the words are not random.

#ifndef LEAT_TESTING_ENUMERATING_HPP
#define LEAT_TESTING_ENUMERATING_HPP

#include "leat/core/errors.hpp"

#include <cstdint>

namespace leat {
namespace testing {

/// What both engines share: which case it is, and how many of its words were drawn.
template <int bits, int draws>
class every_case {
    static_assert(bits >= 1 && bits <= 32, "leat::enumerating: bits must be 1 to 32");
    static_assert(
        draws >= 1 && draws <= 40 && bits * draws <= 40,
        "leat::enumerating: bits * draws must be at most 40, or there are too many cases");

public:
    /// How many cases there are: 2^(bits * draws).
    [[nodiscard]] static constexpr std::uint64_t cases() noexcept {
        return std::uint64_t{1} << (bits * draws);
    }

    /// Goes to the next case and to its first word; false after the last, when it starts again.
    constexpr bool next_case() noexcept {
        drawn_ = 0;
        case_ = (case_ + 1) % cases();
        return case_ != 0;
    }

    /// How many words of this case were drawn.
    [[nodiscard]] constexpr int drawn() const noexcept { return drawn_; }

    friend constexpr bool operator==(const every_case&, const every_case&) = default;

protected:
    /// The bits of the next word.
    constexpr std::uint64_t next_pattern() {
        if (drawn_ == draws) {
            leat::detail::message m;
            m.text("leat::enumerating: a case has ").value(draws);
            leat::detail::raise<stream_exhausted>(m.text(" words, and one more was asked for"));
        }
        const int shift = bits * drawn_;
        ++drawn_;
        return (case_ >> shift) & ((std::uint64_t{1} << bits) - 1);
    }

private:
    std::uint64_t case_ = 0; // its words, the first drawn the least significant
    int drawn_ = 0;
};

/// Every combination of `draws` words of `bits` bits; see above.
template <int bits, int draws>
class enumerating : public every_case<bits, draws> {
public:
    using result_type = std::uint32_t;
    [[nodiscard]] static constexpr result_type min() noexcept { return 0; }
    [[nodiscard]] static constexpr result_type max() noexcept {
        return ~result_type{0} >> (32 - bits);
    }
    constexpr result_type operator()() { return static_cast<result_type>(this->next_pattern()); }
};

/// Every combination of the upper `bits` bits of `draws` 64-bit words; see above.
template <int bits, int draws>
class enumerating_high : public every_case<bits, draws> {
public:
    using result_type = std::uint64_t;
    [[nodiscard]] static constexpr result_type min() noexcept { return 0; }
    [[nodiscard]] static constexpr result_type max() noexcept { return ~result_type{0}; }
    constexpr result_type operator()() { return (2 * this->next_pattern() + 1) << (63 - bits); }
};

} // namespace testing

using testing::enumerating;
using testing::enumerating_high;

} // namespace leat

#endif
