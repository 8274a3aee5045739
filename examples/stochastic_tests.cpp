// How code that draws random numbers can be tested, on a small piece of such code. The page
// testing_stochastic_code.md explains each step; a test framework would take the place of `expect`.

#include "leat/distributions/exponential.hpp"
#include "leat/streams/source.hpp"
#include "leat/testing.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <array>
#include <cstdint>
#include <cstdio>
#include <string>
#include <vector>

namespace {

// ---- the code under test ----

/// Hours until a pump is back: a visit of 5 h on average, and one time in six a second one.
template <class G>
double hours_down(G& g) {
    const leat::exponential visit{0.2};
    double hours = visit(g);
    if (leat::below(6, g) == 0) {
        hours += visit(g);
    }
    return hours;
}

/// Somebody's shortcut for the one time in six, on an engine of bytes.
template <class G>
bool one_in_six(G& g) {
    return g() % 6 == 0;
}

// ---- its tests ----

int failures = 0;

void expect(bool right, const char* what, const std::string& why = {}) {
    std::printf("%s  %s\n", right ? "passes" : "FAILS ", what);
    if (!why.empty()) {
        std::printf("        %s\n", why.c_str());
    }
    failures += right ? 0 : 1;
}

void expect(const leat::agreement& found, const char* what) {
    expect(found.agrees, what, found.message);
}

void scripted() {
    // A first visit, then the die: 0 asks for a second visit, 1 does not.
    const auto low = leat::word_for_unit(0.5 / 6);
    const auto high = leat::word_for_unit(1.5 / 6);
    leat::scripted twice{1u << 20, low, 1u << 20};
    leat::scripted once{1u << 20, high};
    const double both = hours_down(twice);
    const double one = hours_down(once);
    expect(both == 2 * one && twice.asked() == 3 && once.asked() == 2,
           "a second visit is added when the die says so");
}

void worst_engines() {
    leat::alternating g;
    bool sound = true;
    for (int i = 0; i < 1000; ++i) {
        const double hours = hours_down(g);
        sound = sound && hours > 0 && hours < 1e6;
    }
    expect(sound, "no zero and no infinity, whatever the engine returns");
}

void counted() {
    leat::enumerating<8, 1> byte;
    int times = 0;
    do {
        times += one_in_six(byte) ? 1 : 0;
    } while (byte.next_case());
    std::printf("        of %d bytes, %d say yes; one in six are %.2f: a bias\n",
                static_cast<int>(byte.cases()), times, static_cast<double>(byte.cases()) / 6);
    expect(times == 43, "the shortcut's bias is counted, not guessed");
}

void statistical() {
    constexpr double rate = 1e-6; // each check's; three of them: 3e-6 in all
    leat::stream g = leat::source{"PumpTest.HoursDown"}.stream();
    std::vector<double> hours(20000);
    std::vector<int> dice(6, 0);
    for (double& h : hours) {
        h = hours_down(g);
        ++dice[leat::below(std::uint64_t{6}, g)];
    }
    expect(leat::agrees_with_mean(hours, 5 + 5 / 6.0, rate), "the mean");
    expect(leat::agrees_with_counts(dice, std::array{1, 1, 1, 1, 1, 1}, rate), "the die");
    expect(leat::agrees_with_mean_within([&g] { return hours_down(g); }, 5 + 5 / 6.0, 0.1, rate),
           "the mean, to within 0.1 h");

    // Can the check fail? A planted fault says.
    const auto forgets_the_second_visit = [&g] { return leat::exponential{0.2}(g); };
    std::vector<double> wrong(20000);
    for (double& h : wrong) {
        h = forgets_the_second_visit();
    }
    const auto found = leat::agrees_with_mean(wrong, 5 + 5 / 6.0, rate);
    expect(!found, "a forgotten second visit would be seen", found.message);
}

} // namespace

int main() {
    scripted();
    worst_engines();
    counted();
    statistical();
    return failures == 0 ? 0 : 1;
}
