// The laws unit_product on vectors, for one real type. Included by convert_lanes.ipp for double and
// for float: a template would lose the instruction set it was written under.

/// A vector of draws; `which` and `is_unit` are constants where this is inlined.
[[gnu::always_inline]] inline LEAT_KERNEL_REALS
next_products(const std::uint64_t* words, ends which, bool is_unit, LEAT_KERNEL_REAL factor,
              LEAT_KERNEL_REAL lowest, LEAT_KERNEL_REAL highest) noexcept {
    LEAT_KERNEL_REALS x = next_units(words, which, &factor);
    if (!is_unit) {
        const LEAT_KERNEL_REALS low = LEAT_KERNEL_REALS{} + lowest;
        const LEAT_KERNEL_REALS high = LEAT_KERNEL_REALS{} + highest;
        x = x * factor;
        x = x < low ? low : x;
        x = x > high ? high : x;
    }
    return x;
}

/// One law on `n` words.
[[gnu::always_inline]] inline void products(const std::uint64_t* words, LEAT_KERNEL_REAL* out,
                                            std::size_t n, ends which, bool is_unit,
                                            LEAT_KERNEL_REAL factor, LEAT_KERNEL_REAL lowest,
                                            LEAT_KERNEL_REAL highest) noexcept {
    constexpr std::size_t count = sizeof(LEAT_KERNEL_REALS) / sizeof(LEAT_KERNEL_REAL);
    std::size_t i = 0;
    for (; n - i >= count; i += count) {
        const auto x = next_products(words + i, which, is_unit, factor, lowest, highest);
        __builtin_memcpy(out + i, &x, sizeof x);
    }
    if (i < n) {
        std::uint64_t rest[count] = {};
        __builtin_memcpy(rest, words + i, (n - i) * sizeof *words);
        const auto x = next_products(rest, which, is_unit, factor, lowest, highest);
        __builtin_memcpy(out + i, &x, (n - i) * sizeof *out);
    }
}

/// The draws of a unit_product from `n` words.
inline void unit_products(const std::uint64_t* words, LEAT_KERNEL_REAL* out, std::size_t n,
                          ends which, LEAT_KERNEL_REAL factor, LEAT_KERNEL_REAL lowest,
                          LEAT_KERNEL_REAL highest) noexcept {
    const bool is_unit = factor == 1; // no rounding, nothing to move
    switch (which) {
    case ends::open:
        return is_unit ? products(words, out, n, ends::open, true, factor, lowest, highest)
                       : products(words, out, n, ends::open, false, factor, lowest, highest);
    case ends::closed_open:
        return is_unit ? products(words, out, n, ends::closed_open, true, factor, lowest, highest)
                       : products(words, out, n, ends::closed_open, false, factor, lowest, highest);
    case ends::open_closed:
        return is_unit ? products(words, out, n, ends::open_closed, true, factor, lowest, highest)
                       : products(words, out, n, ends::open_closed, false, factor, lowest, highest);
    case ends::closed:
        // The division takes most of the time.
        return products(words, out, n, ends::closed, false, factor, lowest, highest);
    }
}
