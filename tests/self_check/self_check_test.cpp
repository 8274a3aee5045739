// The self-check passes on a sound build, and catches what it is there for: every rounding mode,
// flush-to-zero, fused and twice rounded arithmetic, wrong digests. (fast_math.cpp and flags.cpp
// beside this file: builds with the wrong flags.)

#include "leat/self_check.hpp"

#include "support/sanitized.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cfenv>
#include <chrono>
#include <cmath>
#include <fstream>
#include <limits>
#include <set>
#include <sstream>
#include <string>
#include <vector>

#if defined(__SSE2__)
#include <xmmintrin.h> // the control register
#endif

namespace {

using leat::self_check;
using leat::self_check_finding;
using leat::self_check_report;

/// What stands under a check's name among the failures.
std::vector<std::string> failures_of(const self_check_report& report, const std::string& check) {
    std::vector<std::string> found;
    for (const self_check_finding& finding : report.findings()) {
        if (finding.failed && finding.check == check) {
            found.emplace_back(finding.found);
        }
    }
    return found;
}

bool holds(const std::vector<std::string>& names, const std::string& name) {
    return std::find(names.begin(), names.end(), name) != names.end();
}

TEST(SelfCheck, PassesOnThisBuild) {
    const self_check_report report = self_check();
    EXPECT_TRUE(report.ok());
    EXPECT_TRUE(report);
    EXPECT_EQ(report.failures(), 0u);
    EXPECT_TRUE(to_string(report).starts_with("leat self-check: passed\n")) << report;
    EXPECT_NO_THROW(leat::self_check_or_throw());
}

// "in well under 10 ms": the best of some runs, as others use this machine too.
TEST(SelfCheck, TakesNoTime) {
    auto best = std::chrono::nanoseconds::max();
    for (int i = 0; i < 20; ++i) {
        const auto start = std::chrono::steady_clock::now();
        EXPECT_TRUE(self_check().ok());
        const auto taken = std::chrono::steady_clock::now() - start;
        best = std::min(best, std::chrono::duration_cast<std::chrono::nanoseconds>(taken));
    }
#if defined(__OPTIMIZE__)
    constexpr bool optimised = true;
#else
    constexpr bool optimised = false;
#endif
    EXPECT_LT(best, std::chrono::milliseconds(optimised && !leat_test::sanitized ? 10 : 3000));
}

/// The report made under another rounding mode.
self_check_report under_rounding(int mode) {
    const int before = std::fegetround();
    EXPECT_EQ(std::fesetround(mode), 0);
    const self_check_report report = self_check();
    EXPECT_EQ(std::fesetround(before), 0);
    return report;
}

TEST(SelfCheck, CatchesEveryOtherRoundingMode) {
    struct mode {
        int value;
        const char* name;
    };
    for (const mode m :
         {mode{FE_UPWARD, "upward, not to nearest"}, mode{FE_DOWNWARD, "downward, not to nearest"},
          mode{FE_TOWARDZERO, "towards zero, not to nearest"}}) {
        SCOPED_TRACE(m.name);
        const self_check_report report = under_rounding(m.value);
        EXPECT_FALSE(report.ok());
        EXPECT_EQ(failures_of(report, "rounding mode"), std::vector<std::string>{m.name});
        // It is the reals that change, and nothing else is blamed.
        const std::vector<std::string> digests = failures_of(report, "golden digests");
        EXPECT_TRUE(holds(digests, "normal.double")) << report;
        EXPECT_FALSE(holds(digests, "engine.xoshiro256_plus_plus")) << report;
        EXPECT_FALSE(holds(digests, "uniform_integer.32_bits")) << report;
        EXPECT_EQ(report.failures(), 1 + digests.size()) << report;
    }
    EXPECT_TRUE(self_check().ok()) << "the mode was restored";
}

#if defined(__SSE2__)
/// The report made with bits of the control register set.
self_check_report with_control(unsigned bits) {
    const unsigned before = _mm_getcsr();
    _mm_setcsr(before | bits);
    const self_check_report report = self_check();
    _mm_setcsr(before);
    return report;
}

// Bits 15 and 6 of MXCSR: Intel 64 and IA-32 Software Developer's Manual, vol. 1, 10.2.3.
TEST(SelfCheck, CatchesFlushToZero) {
    constexpr unsigned flush_to_zero = 1u << 15;
    constexpr unsigned denormals_are_zero = 1u << 6;
    const auto found = [](unsigned bits) {
        return failures_of(with_control(bits), "subnormal numbers");
    };
    EXPECT_EQ(found(flush_to_zero), std::vector<std::string>{"flushed to zero"});
    EXPECT_EQ(found(denormals_are_zero), std::vector<std::string>{"taken for zero"});
    EXPECT_EQ(found(flush_to_zero | denormals_are_zero),
              std::vector<std::string>{"flushed to zero and taken for zero"});
    EXPECT_TRUE(self_check().ok()) << "the register was restored";
}
#endif

/// Arithmetic as it must not be: a * b + c rounded once.
template <class Real>
struct fused {
    struct product {
        Real a;
        Real b;
        friend fused operator+(product p, fused c) { return std::fma(p.a, p.b, c.value); }
    };

    Real value;
    fused(Real x) : value(x) {}
    explicit operator Real() const { return value; }
    friend product operator*(fused a, fused b) { return {a.value, b.value}; }
};

/// And rounded to 64 bits before it is rounded to 53.
struct extended {
    long double value;
    extended(double x) : value(x) {}
    explicit operator double() const { return static_cast<double>(value); }
    friend extended operator+(extended a, extended b) {
        a.value += b.value;
        return a;
    }
};

TEST(SelfCheck, SeesFusedAndTwiceRoundedArithmetic) {
    EXPECT_TRUE(leat::detail::fuses_doubles<fused<double>>());
    EXPECT_TRUE(leat::detail::fuses_floats<fused<float>>());
    EXPECT_FALSE(leat::detail::fuses_doubles<leat::detail::strict<double>>());
    EXPECT_FALSE(leat::detail::fuses_floats<leat::detail::strict<float>>());
    if (std::numeric_limits<long double>::digits == 64) {
        EXPECT_TRUE(leat::detail::rounds_twice<extended>());
    }
    EXPECT_FALSE(leat::detail::rounds_twice<leat::detail::strict<double>>());
}

struct golden_row {
    std::string name;
    std::uint64_t expected;
    std::uint64_t computed;
};

std::vector<golden_row> golden_rows() {
    std::vector<golden_row> rows;
    leat::detail::each_golden(
        [](void* context, const char* name, std::uint64_t expected, std::uint64_t computed) {
            static_cast<std::vector<golden_row>*>(context)->push_back({name, expected, computed});
        },
        &rows);
    return rows;
}

TEST(SelfCheck, HasTheGoldenDigests) {
    std::set<std::string> names;
    std::set<std::uint64_t> digests;
    for (const golden_row& row : golden_rows()) {
        leat::detail::message number;
        number.text("0x").hex(row.computed).text("u");
        EXPECT_EQ(row.expected, row.computed)
            << row.name << ": computed " << number.c_str()
            << ". A new line takes this number over; a change of one that stood there needs a new "
               "major version (promise P7).";
        EXPECT_TRUE(names.insert(row.name).second) << row.name << " stands there twice";
        EXPECT_TRUE(digests.insert(row.computed).second) << row.name << " adds nothing new";
    }
    EXPECT_GE(names.size(), 50u);
}

// Whatever tests/golden/digests.txt covers, one line or another of the self-check covers too:
// "engine.NAME", and for all else what stands before the first dot.
TEST(SelfCheck, CoversWhateverTheDigestsCover) {
    const auto thing = [](const std::string& name) {
        const bool engine = name.starts_with("engine.");
        return name.substr(0, name.find('.', engine ? 7 : 0));
    };
    // Beneath the laws, and only used by them; for tests, which no program runs when it starts.
    std::set<std::string> covered{"maths", "testing"};
    for (const golden_row& row : golden_rows()) {
        covered.insert(thing(row.name));
    }
    std::ifstream file(std::string(LEAT_TEST_DIR) + "/golden/digests.txt");
    std::string kind;
    std::string name;
    std::string digest;
    int lines = 0;
    while (file >> kind >> name >> digest) {
        ++lines;
        if (covered.insert(thing(name)).second) { // said once, however many lines it has
            ADD_FAILURE() << thing(name) << " needs a line in include/leat/self_check/golden.hpp";
        }
    }
    EXPECT_GE(lines, 100);
}

constexpr self_check_finding fault{"digests", "one", "results differ", "call for help", true};
constexpr self_check_finding same_fault{"digests", "another", fault.meaning, fault.remedy, true};
constexpr self_check_finding note{"flags", "odd", "nothing much", "nothing", false};

TEST(SelfCheckReport, SaysWhatFailedWhatItMeansAndWhatToDo) {
    self_check_report report;
    report.add(note);
    EXPECT_TRUE(report.ok()) << "a note fails nothing";
    report.add(fault);
    report.add(same_fault);
    EXPECT_FALSE(report.ok());
    const std::string text = "leat self-check: FAILED\n"
                             "- note: flags: odd\n"
                             "    it means: nothing much\n"
                             "    to do: nothing\n"
                             "- failed: digests: one, another\n"
                             "    it means: results differ\n"
                             "    to do: call for help\n";
    EXPECT_EQ(to_string(report), text);
    std::ostringstream out;
    out << report;
    EXPECT_EQ(out.str(), text);
    std::wostringstream wide;
    wide << report;
    EXPECT_EQ(wide.str(), std::wstring(text.begin(), text.end()));
}

TEST(SelfCheckReport, CountsWhatItHasNoRoomFor) {
    self_check_report report;
    for (std::size_t i = 0; i < self_check_report::capacity + 3; ++i) {
        report.add(fault);
    }
    EXPECT_EQ(report.findings().size(), self_check_report::capacity);
    EXPECT_EQ(report.failures(), self_check_report::capacity + 3);
    EXPECT_EQ(report.left_out(), 3u);
    EXPECT_TRUE(to_string(report).ends_with("- and more, left out\n"));
}

TEST(SelfCheckReport, IsThrownWithTheFirstFailure) {
    self_check_report report;
    report.add(note);
    EXPECT_NO_THROW(leat::detail::throw_failure(report));
    report.add(fault);
    report.add(same_fault);
    try {
        leat::detail::throw_failure(report);
        FAIL();
    } catch (const leat::error& e) {
        EXPECT_STREQ(e.what(), "leat::self_check: digests: one (and 1 more): results differ; "
                               "to do: call for help");
    }
}

TEST(SelfCheckReport, IsThrownUnderARoundingMode) {
    const int before = std::fegetround();
    ASSERT_EQ(std::fesetround(FE_UPWARD), 0);
    EXPECT_THROW(leat::self_check_or_throw(), leat::self_check_failed);
    ASSERT_EQ(std::fesetround(before), 0);
}

} // namespace
