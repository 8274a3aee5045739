// Sorting in constant evaluation and without <algorithm>, which costs as much to include as a law.

#ifndef LEAT_DISTRIBUTIONS_DETAIL_ASCENDING_HPP
#define LEAT_DISTRIBUTIONS_DETAIL_ASCENDING_HPP

#include <cstddef>
#include <span>

namespace leat::detail {

/// Lets the value at `place` sink until the heap below it is one, greatest first.
template <class T>
constexpr void sink(std::span<T> heap, std::size_t place) noexcept {
    const T value = heap[place];
    for (std::size_t child = 2 * place + 1; child < heap.size(); child = 2 * place + 1) {
        if (child + 1 < heap.size() && heap[child] < heap[child + 1]) {
            ++child;
        }
        if (!(value < heap[child])) {
            break;
        }
        heap[place] = heap[child];
        place = child;
    }
    heap[place] = value;
}

/// Brings the values into ascending order (heapsort: J. W. J. Williams, CACM 7(6), 1964).
template <class T>
constexpr void sort_ascending(std::span<T> values) noexcept {
    for (std::size_t i = values.size() / 2; i > 0; --i) {
        sink(values, i - 1);
    }
    for (std::size_t left = values.size(); left > 1; --left) {
        const T greatest = values[0];
        values[0] = values[left - 1];
        values[left - 1] = greatest;
        sink(values.first(left - 1), 0);
    }
}

} // namespace leat::detail

#endif
