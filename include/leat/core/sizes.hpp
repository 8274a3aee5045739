// Lengths of arrays beside counts of words: std::size_t and std::uint64_t, which are one type on
// some targets and not on others.

#ifndef LEAT_CORE_SIZES_HPP
#define LEAT_CORE_SIZES_HPP

#include <concepts>
#include <cstddef>
#include <cstdint>

namespace leat::detail {

/// The smaller of a length and a count, as a length.
template <std::same_as<std::uint64_t> Count>
constexpr std::size_t smaller(std::size_t length, Count count) noexcept {
    if constexpr (std::same_as<Count, std::size_t>) { // a cast would be useless, and warned about
        return count < length ? count : length;
    } else {
        return count < length ? static_cast<std::size_t>(count) : length;
    }
}

} // namespace leat::detail

#endif
