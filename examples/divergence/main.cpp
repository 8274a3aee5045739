// Compares the traces of two runs (leat/testing/traced.hpp) and says where they part.
//
//   leat_divergence A.trace B.trace
//
// Prints the streams that only one run opened, and of those that differ the first ones, in the
// order in which run A opened them: which draw, drawn for what, and how to find it more exactly.
// Exit status 0: the runs are the same; 1: they part; 2: bad arguments or a file that cannot be
// used.

#include "leat/streams/address.hpp"
#include "leat/testing/trace_comparison.hpp"
#include "leat/testing/trace_file.hpp"

#include <cstddef>
#include <cstdint>
#include <exception>
#include <iostream>
#include <string>
#include <vector>

namespace {

constexpr std::size_t shown = 5; // streams told in full

std::string counted(std::uint64_t n, const std::string& what) {
    return std::to_string(n) + " " + what + (n == 1 ? "" : "s");
}

void describe_run(char which, const std::string& path, const leat::recorded_trace& t) {
    std::uint64_t draws = 0;
    for (const auto& s : t.streams) {
        draws += s.draws;
    }
    std::cout << "run " << which << ": " << path << ": " << counted(t.streams.size(), "stream")
              << ", " << counted(draws, "draw") << ", marks every " << counted(t.stride, "draw")
              << "\n";
}

void list_only(char which, const std::vector<std::string>& names) {
    if (names.empty()) {
        return;
    }
    std::cout << "only run " << which << " opened " << counted(names.size(), "stream") << ":";
    for (std::size_t i = 0; i < names.size() && i < shown; ++i) {
        std::cout << (i == 0 ? " " : ", ") << names[i];
    }
    std::cout << (names.size() > shown ? ", ...\n" : "\n");
}

/// What a run drew the word for.
std::string purpose(const std::string& label, std::uint64_t draw, std::uint64_t draws) {
    return draw >= draws   ? "not drawn: the run ended after " + counted(draws, "draw")
           : label.empty() ? "drawn without a label"
                           : "drawn for \"" + label + "\"";
}

void explain(const leat::divergence& d) {
    using leat::testing::parting;
    const bool exact = d.first == d.last;
    std::cout << "\n" << d.stream << ": the runs part at ";
    if (exact) {
        std::cout << "draw " << d.first << " (counted from 0)\n";
    } else {
        std::cout << "one of the draws " << d.first << " to " << d.last << " (counted from 0)\n";
    }
    const std::string which = exact ? "" : "draw " + std::to_string(d.last) + " ";
    std::cout << "  in A: " << which << purpose(d.label_a, d.last, d.draws_a) << "\n"
              << "  in B: " << which << purpose(d.label_b, d.last, d.draws_b) << "\n";
    if (d.first > 0 && !d.label_before.empty()) {
        std::cout << "  draw " << d.first - 1 << ", the last that both surely share, was for \""
                  << d.label_before << "\"\n";
    }
    switch (d.how) {
    case parting::words:
        std::cout
            << "  The words differ: another seed, address, state or engine, or words skipped.\n";
        break;
    case parting::labels:
        std::cout
            << "  The words are the same, what they are drawn for is not: one run drew more or "
               "fewer,\n  or in another order.\n";
        break;
    case parting::end:
        std::cout << "  No difference was seen until one run ended.\n";
        break;
    }
    if (d.address_a != d.address_b) {
        std::cout << "  The streams began at different addresses:\n    " << d.address_a << "\n    "
                  << d.address_b << "\n";
    } else if (!d.address_a.empty()) {
        leat::stream_address a = leat::parse_address(d.address_a);
        a.position += d.first;
        std::cout << "  To go there: leat::stream{leat::parse_address(\"" << to_string(a)
                  << "\")}\n";
    }
    if (!exact) {
        std::cout
            << "  For the exact draw, record both runs again with leat::trace_options{.stride = "
               "1,\n  .from = "
            << d.first << ", .to = " << d.last + 1 << ", .only = \"" << d.stream
            << "\"} and compare those.\n";
    }
}

int compare(const std::string& path_a, const std::string& path_b) {
    const leat::recorded_trace a = leat::read_trace(path_a);
    const leat::recorded_trace b = leat::read_trace(path_b);
    const leat::trace_comparison found = leat::compare_traces(a, b);
    describe_run('A', path_a, a);
    describe_run('B', path_b, b);
    if (found.same()) {
        std::cout << "The runs are the same: every stream, every draw, every label.\n";
        return 0;
    }
    std::cout << counted(found.parted.size(), "stream") << " of both runs "
              << (found.parted.size() == 1 ? "differs, " : "differ, ") << found.alike
              << (found.alike == 1 ? " is" : " are") << " the same.\n";
    list_only('A', found.only_in_a);
    list_only('B', found.only_in_b);
    for (std::size_t i = 0; i < found.parted.size() && i < shown; ++i) {
        explain(found.parted[i]);
    }
    if (found.parted.size() > shown) {
        std::cout << "\n... and " << found.parted.size() - shown << " more.\n";
    }
    return 1;
}

} // namespace

int main(int argc, char** argv) {
    if (argc != 3) {
        std::cerr << "usage: leat_divergence A.trace B.trace\n";
        return 2;
    }
    try {
        return compare(argv[1], argv[2]);
    } catch (const std::exception& e) {
        std::cerr << "divergence: " << e.what() << "\n";
        return 2;
    }
}
