// A stable sort for the preparation of polygons: <algorithm> would cost more to include than all
// regions together.
//
// Bottom-up merging (Knuth, TAOCP vol. 3, 5.2.4): O(n log n) comparisons, a copy of the elements
// as working space. Not for speed beyond that: use std::sort where it is included anyway.

#ifndef LEAT_REGIONS_DETAIL_MERGE_SORT_HPP
#define LEAT_REGIONS_DETAIL_MERGE_SORT_HPP

#include <cstddef>
#include <vector>

namespace leat::detail {

/// Sorts so that no element comes before(...) the one in front of it; equals keep their order.
template <class T, class Before>
void merge_sort(std::vector<T>& values, Before before) {
    const std::size_t size = values.size();
    std::vector<T> merged(values);
    for (std::size_t run = 1; run < size; run *= 2) {
        for (std::size_t start = 0; start < size; start += 2 * run) {
            const std::size_t middle = size - start < run ? size : start + run;
            const std::size_t end = size - start < 2 * run ? size : start + 2 * run;
            std::size_t left = start;
            std::size_t right = middle;
            for (std::size_t i = start; i < end; ++i) {
                const bool from_right =
                    left == middle || (right < end && before(values[right], values[left]));
                merged[i] = values[from_right ? right++ : left++];
            }
        }
        values.swap(merged);
    }
}

} // namespace leat::detail

#endif
