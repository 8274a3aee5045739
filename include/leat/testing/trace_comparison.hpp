// Where two traced runs part: stream by stream, the first draw at which they differ.
//
//   const auto found = leat::compare_traces(leat::read_trace("monday.trace"),
//                                           leat::read_trace("tuesday.trace"));
//   if (!found.same()) { ... found.parted[0].stream, .first, .last, .label_a, .label_b ... }
//
// Streams are matched by name; several of one name by the order of opening. `parted` is in the
// order in which run A opened them. The draw is known to within a stride of the marks: from `first`
// to `last`, counted from 0; exactly, where both are equal.
//
// Errors: invalid_parameter where the runs were recorded with other strides or ranges.

#ifndef LEAT_TESTING_TRACE_COMPARISON_HPP
#define LEAT_TESTING_TRACE_COMPARISON_HPP

#include "leat/core/errors.hpp"
#include "leat/testing/trace_file.hpp"

#include <algorithm> // min
#include <cstddef>
#include <cstdint>
#include <map>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace leat {
namespace testing {

/// How two runs of a stream part.
enum class parting {
    words,  ///< the words differ: another seed, address, state or engine, or words skipped
    labels, ///< the same words under other labels: there was a draw more or fewer, or another order
    end     ///< the same until one run drew no more
};

/// Where two runs of a stream part.
struct divergence {
    std::string stream;           ///< its name
    parting how = parting::words; ///< in words, labels or length
    std::uint64_t first = 0;      ///< the draws that both runs share, surely
    std::uint64_t last = 0;       ///< the first draw that differs is one of `first` to `last`
    std::uint64_t draws_a = 0;    ///< how many run A drew
    std::uint64_t draws_b = 0;    ///< and run B
    std::string label_before;     ///< of the last draw that both runs share, surely
    std::string label_a;          ///< of draw `last` in run A, where it has one
    std::string label_b;          ///< and in run B
    std::string address_a;        ///< where the stream began, for those that have an address
    std::string address_b;        ///< and in run B
};

/// What two runs have in common, and what not.
struct trace_comparison {
    std::vector<divergence> parted;     ///< streams that differ
    std::vector<std::string> only_in_a; ///< streams that the other run did not open
    std::vector<std::string> only_in_b; ///< and the same of run B
    std::uint64_t alike = 0;            ///< how many streams are the same in both

    /// Whether no difference was found.
    [[nodiscard]] bool same() const noexcept {
        return parted.empty() && only_in_a.empty() && only_in_b.empty();
    }
};

namespace detail {

/// The labels of two runs need not be numbered alike.
inline const std::string& label_at(const traced_stream& s, std::uint32_t label) {
    return s.label_texts[label];
}

/// The label of a draw, as far as marks tell: that of the first mark after it, or of the end.
inline std::string label_of_draw(const recorded_trace& t, const traced_stream& s,
                                 std::uint64_t draw) {
    if (draw >= s.draws) {
        return {};
    }
    const std::uint64_t after = draw + 1; // a mark after so many draws holds it
    const std::uint64_t i =
        after <= t.from ? 0 : (after - t.from) / t.stride + ((after - t.from) % t.stride != 0);
    return label_at(s, i < s.marks.size() ? s.marks[static_cast<std::size_t>(i)].label : s.label);
}

inline divergence where_parted(const recorded_trace& ta, const traced_stream& a,
                               const recorded_trace& tb, const traced_stream& b) {
    divergence d;
    d.stream = a.name;
    d.draws_a = a.draws;
    d.draws_b = b.draws;
    d.address_a = a.address;
    d.address_b = b.address;

    const std::size_t marks = std::min(a.marks.size(), b.marks.size());
    std::size_t i = 0;
    while (i < marks && a.marks[i].words == b.marks[i].words &&
           a.marks[i].labels == b.marks[i].labels) {
        ++i;
    }
    const auto place = [&](std::size_t mark) { return ta.from + ta.stride * mark; };
    if (i > 0) {
        d.first = place(i - 1);
        d.label_before = label_at(a, a.marks[i - 1].label);
    }
    if (i < marks) {
        d.how = a.marks[i].words != b.marks[i].words ? parting::words : parting::labels;
        d.last = place(i) - 1;
    } else if (a.draws == b.draws) {
        d.how = a.words != b.words ? parting::words : parting::labels;
        d.last = a.draws - 1;
    } else {
        d.how = parting::end;
        d.last = std::min(a.draws, b.draws);
    }
    d.label_a = label_of_draw(ta, a, d.last);
    d.label_b = label_of_draw(tb, b, d.last);
    return d;
}

} // namespace detail

/// Compares two runs.
[[nodiscard]] inline trace_comparison compare_traces(const recorded_trace& a,
                                                     const recorded_trace& b) {
    constexpr const char* name = "compare_traces";
    if (a.stride != b.stride) {
        leat::detail::refuse(name, "stride of the second run", b.stride,
                             "must be that of the first: record both alike");
    }
    if (a.from != b.from || a.to != b.to) {
        leat::detail::refuse(name, "both runs must be recorded over the same range: from, to");
    }
    // How often a name was opened before makes it one of a kind.
    using key = std::pair<std::string_view, std::uint64_t>;
    std::map<key, const traced_stream*> others;
    std::map<std::string_view, std::uint64_t> opened;
    for (const traced_stream& s : b.streams) {
        others[{s.name, opened[s.name]++}] = &s;
    }
    opened.clear();
    trace_comparison result;
    for (const traced_stream& s : a.streams) {
        const auto found = others.find({s.name, opened[s.name]++});
        if (found == others.end()) {
            result.only_in_a.push_back(s.name);
            continue;
        }
        const traced_stream& other = *found->second;
        if (s.draws == other.draws && s.words == other.words && s.labels == other.labels) {
            ++result.alike;
        } else {
            result.parted.push_back(detail::where_parted(a, s, b, other));
        }
    }
    for (const traced_stream& s : b.streams) {
        if (opened[s.name] == 0) {
            result.only_in_b.push_back(s.name);
        } else {
            --opened[s.name];
        }
    }
    return result;
}

} // namespace testing

using testing::compare_traces;
using testing::divergence;
using testing::trace_comparison;

} // namespace leat

#endif
