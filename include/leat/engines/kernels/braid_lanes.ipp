// Rounds of xoshiro256_braid on vectors. Included by braid.hpp in this folder through
// per_instruction_set.ipp, which sets the width and the namespace.
//
// Two vectors of each of the four state words go through a tile of rounds in registers: all sixteen
// lanes at AVX-512's width, else some of them at a time. A tile's output stays in the first-level
// cache until its last lanes are done.

namespace leat::detail::LEAT_KERNEL_SPACE {

/// The words that a round draws from some lanes.
[[gnu::always_inline]] inline lanes braid_output(const lanes& a, const lanes& d) noexcept {
    const lanes sum = a + d;
    return ((sum << 23) | (sum >> 41)) + a;
}

/// xoshiro256's step.
[[gnu::always_inline]] inline void braid_lanes_step(lanes& a, lanes& b, lanes& c,
                                                    lanes& d) noexcept {
    const lanes t = b << 17;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= t;
    d = (d << 45) | (d >> 19);
}

/// Draws `rounds` rounds of sixteen words each. Word w of lane k stands at 16 w + k of `state`.
inline void braid_rounds(std::uint64_t* state, std::uint64_t* out, std::size_t rounds) noexcept {
    constexpr std::size_t width = LEAT_KERNEL_LANES;
    while (rounds > 0) {
        const std::size_t tile = rounds < 32 ? rounds : 32;
        for (std::size_t k = 0; k < 16; k += 2 * width) {
            lanes s[4][2];
            for (std::size_t w = 0; w < 4; ++w) {
                s[w][0] = load_lanes(state + 16 * w + k);
                s[w][1] = load_lanes(state + 16 * w + k + width);
            }
            std::uint64_t* to = out + k;
            for (std::size_t r = 0; r < tile; ++r) {
                store_lanes(to, braid_output(s[0][0], s[3][0]));
                store_lanes(to + width, braid_output(s[0][1], s[3][1]));
                to += 16;
                braid_lanes_step(s[0][0], s[1][0], s[2][0], s[3][0]);
                braid_lanes_step(s[0][1], s[1][1], s[2][1], s[3][1]);
            }
            for (std::size_t w = 0; w < 4; ++w) {
                store_lanes(state + 16 * w + k, s[w][0]);
                store_lanes(state + 16 * w + k + width, s[w][1]);
            }
        }
        out += 16 * tile;
        rounds -= tile;
    }
}

} // namespace leat::detail::LEAT_KERNEL_SPACE
