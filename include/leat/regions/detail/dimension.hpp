// What a region measures: 1 a length, 2 an area, 3 a volume. Those that do not say fill their
// space.

#ifndef LEAT_REGIONS_DETAIL_DIMENSION_HPP
#define LEAT_REGIONS_DETAIL_DIMENSION_HPP

#include <cstddef>

namespace leat::detail {

template <class Region>
constexpr std::size_t find_measured_dimension() noexcept {
    if constexpr (requires { Region::measured_dimension; }) {
        return Region::measured_dimension;
    } else {
        return Region::dimension;
    }
}

template <class Region>
inline constexpr std::size_t measured_dimension_of = find_measured_dimension<Region>();

} // namespace leat::detail

#endif
