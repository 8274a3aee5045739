// What laws with a list of weights share: which lists they refuse, and in which words.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_WEIGHTS_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_WEIGHTS_HPP

#include "leat/distributions/detail/law.hpp" // fault
#include "leat/uniform/alias_table.hpp"

#include <cstddef>
#include <cstdint>
#include <span>

namespace leat::detail {

/// The fault of weights that must be 1 to 2^32 in number, finite and >= 0, and not all 0.
constexpr fault weights_fault(std::span<const double> weights) noexcept {
    const std::uint64_t size = weights.size();
    if (size == 0) {
        return {"size of weights", 0, "must be at least 1"};
    }
    if (size > std::uint64_t{1} << 32) {
        return {"size of weights", static_cast<double>(size), "must be at most 4294967296"};
    }
    const std::size_t i = first_bad_weight(weights);
    if (i < size) {
        return {"weights", weights[i], "must be finite and >= 0", i};
    }
    if (all_zero(weights)) {
        return {"sum of weights", 0, "must be > 0"};
    }
    return {};
}

} // namespace leat::detail

#endif
