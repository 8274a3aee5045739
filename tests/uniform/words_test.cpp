// word64 and word32: exactly uniform words from an engine of any range.
//
// References: exact integer arithmetic by Boost.Multiprecision; complete enumeration of every
// sequence of draws on small words; the outputs of libstdc++'s engines.

#include "leat/uniform/words.hpp"

#include "leat/testing/engines.hpp"

#include <boost/multiprecision/cpp_int.hpp>
#include <gtest/gtest.h>

#include <cstdint>
#include <limits>
#include <random>
#include <string>
#include <vector>

namespace {

using boost::multiprecision::cpp_int;

struct out_of_digits {};

/// An engine of the range Lo .. Hi that returns Lo plus each of the given digits.
template <std::uint64_t Lo, std::uint64_t Hi>
class digits {
public:
    using result_type = std::uint64_t;
    static constexpr std::uint64_t min() { return Lo; }
    static constexpr std::uint64_t max() { return Hi; }

    explicit digits(std::vector<std::uint64_t> values) : values_(std::move(values)) {}
    std::uint64_t operator()() {
        if (used_ == values_.size()) {
            throw out_of_digits{};
        }
        return Lo + values_[used_++];
    }
    [[nodiscard]] std::size_t used() const { return used_; }

private:
    std::vector<std::uint64_t> values_;
    std::size_t used_ = 0;
};

/// What the head of words.hpp says of a range that is no power of two, in exact arithmetic.
struct specification {
    int words;
    cpp_int limit;
};
specification specified(const cpp_int& range, int width) {
    const cpp_int unit = cpp_int(1) << width;
    cpp_int power = range;
    for (int n = 1;; ++n) {
        const cpp_int limit = power / unit * unit;
        if ((power - limit) * 8 <= power) {
            return {n, limit};
        }
        power *= range;
    }
}

template <std::uint64_t Lo, std::uint64_t Hi, int Width>
void check_against_exact_arithmetic() {
    const cpp_int range = cpp_int(Hi) - Lo + 1;
    const specification want = specified(range, Width);
    using plan = leat::detail::word_plan<digits<Lo, Hi>, Width>;
    ASSERT_EQ(plan::words, want.words) << range << ' ' << Width;
    std::mt19937_64 random(7);
    std::uniform_int_distribution<std::uint64_t> any(0, Hi - Lo);
    for (int i = 0; i < 4000; ++i) {
        std::vector<std::uint64_t> drawn;
        cpp_int v = 0;
        cpp_int place = 1;
        for (int k = 0; k < want.words; ++k) {
            // The highest digits decide about rejection: see to it that they are often extreme.
            const bool extreme = i % 2 == 0 && k > 0;
            drawn.push_back(extreme ? Hi - Lo - (any(random) % 2) : any(random));
            v += place * drawn.back();
            place *= range;
        }
        digits<Lo, Hi> g(drawn);
        try {
            const std::uint64_t got = leat::detail::draw_bits<Width>(g);
            ASSERT_LT(v, want.limit) << range;
            ASSERT_EQ(cpp_int(got), v % (cpp_int(1) << Width)) << range;
        } catch (const out_of_digits&) {
            ASSERT_GE(v, want.limit) << range;
        }
    }
}

constexpr std::uint64_t top = std::numeric_limits<std::uint64_t>::max();

TEST(Words, RangesThatAreNoPowerOfTwoFollowTheSpecification) {
    check_against_exact_arithmetic<1, 2147483646, 64>(); // Lehmer: R = 2^31 - 2
    check_against_exact_arithmetic<1, 2147483646, 32>();
    check_against_exact_arithmetic<1, top, 64>(); // xorshift64: R = 2^64 - 1
    check_against_exact_arithmetic<1, top, 32>();
    check_against_exact_arithmetic<1, 0xFFFFFFFF, 64>(); // xorshift32
    check_against_exact_arithmetic<1, 0xFFFFFFFF, 32>();
    check_against_exact_arithmetic<0, 4294967086, 64>(); // mrg32k3a: R = 4294967087
    check_against_exact_arithmetic<0, top / 2 + 1, 64>();
    check_against_exact_arithmetic<0, 0x100000000, 64>(); // 2^32 + 1: rejects too often in two
    check_against_exact_arithmetic<0, 0x100000000, 32>();
    check_against_exact_arithmetic<1, 6, 64>(); // a die
    check_against_exact_arithmetic<0, 2, 64>();
    check_against_exact_arithmetic<0, 2, 32>();
}

/// Draws every sequence of n digits below R; each outcome must come equally often, and no fewer
/// draws than needed be rejected.
template <std::uint64_t Range, int Width>
void enumerate() {
    using engine = digits<5, 5 + Range - 1>;
    constexpr int n = leat::detail::word_plan<engine, Width>::words;
    std::vector<std::uint64_t> sequence(n, 0);
    std::vector<std::uint64_t> count(std::size_t{1} << Width, 0);
    std::uint64_t all = 0;
    std::uint64_t rejected = 0;
    for (bool more = true; more;) {
        ++all;
        engine g(sequence);
        try {
            ++count.at(leat::detail::draw_bits<Width>(g));
            ASSERT_EQ(g.used(), sequence.size());
        } catch (const out_of_digits&) {
            ++rejected;
        }
        more = false;
        for (std::uint64_t& digit : sequence) {
            if (++digit < Range) {
                more = true;
                break;
            }
            digit = 0;
        }
    }
    for (const std::uint64_t c : count) {
        ASSERT_EQ(c, all >> Width) << "range " << Range;
    }
    EXPECT_EQ(rejected, all % count.size());
    EXPECT_LE(8 * rejected, all);
}

TEST(Words, EveryOutcomeComesEquallyOften) {
    enumerate<2, 8>();
    enumerate<3, 8>();
    enumerate<5, 8>();
    enumerate<6, 8>();
    enumerate<8, 8>(); // three bits a word do not divide eight
    enumerate<255, 8>();
    enumerate<257, 8>();
    enumerate<1000, 8>();
    enumerate<1024, 8>();
    enumerate<6, 16>();
    enumerate<32, 16>();
    enumerate<300, 16>();
}

TEST(Words, PowersOfTwoAreLaidEndToEndFirstLeastSignificant) {
    leat::scripted32 halves{0x89ABCDEF, 0x01234567, 5};
    EXPECT_EQ(leat::word64(halves), 0x0123456789ABCDEFu);
    EXPECT_EQ(leat::word32(halves), 5u);

    leat::scripted whole{0x0123456789ABCDEF, 0x0123456789ABCDEF};
    EXPECT_EQ(leat::word64(whole), 0x0123456789ABCDEFu);
    EXPECT_EQ(leat::word32(whole), 0x01234567u); // the upper half

    // 48 bits: 96 in a row of two, of which the upper 64 are kept; 32 of one.
    digits<0, 0xFFFFFFFFFFFF> g({0x111122223333, 0x444455556666, 0x777788889999});
    EXPECT_EQ(leat::word64(g), 0x4444555566661111u);
    EXPECT_EQ(leat::word32(g), 0x77778888u);

    // A least value that is not zero is subtracted.
    digits<7, 0x100000006> offset({0, 0xFFFFFFFF});
    EXPECT_EQ(leat::word64(offset), 0xFFFFFFFF00000000u);
}

TEST(Words, StandardEnginesGiveTheirOwnWords) {
    // ISO C++ [rand.predef]: the 10000th value of mt19937_64, and of mt19937.
    std::mt19937_64 wide;
    wide.discard(9999);
    EXPECT_EQ(leat::word64(wide), 9981545732273789042u);
    std::mt19937 narrow;
    narrow.discard(9999);
    EXPECT_EQ(leat::word32(narrow), 4123659995u);
}

TEST(Words, TheHeaderSaysWhatADrawCosts) {
    using leat::detail::word_plan;
    using lehmer = std::minstd_rand;
    using die = digits<1, 6>;
    static_assert(word_plan<lehmer, 64>::words == 3 && word_plan<lehmer, 32>::words == 2);
    static_assert(word_plan<die, 64>::words == 26 && word_plan<die, 32>::words == 13);
    static_assert(word_plan<std::mt19937, 64>::words == 2);
    static_assert(word_plan<std::ranlux24_base, 64>::words == 3); // 24 bits
}

/// A three-valued engine that is broken.
struct last_of_three {
    using result_type = std::uint32_t;
    static constexpr std::uint32_t min() { return 0; }
    static constexpr std::uint32_t max() { return 2; }
    std::uint32_t operator()() { return 2; }
};

TEST(Words, AnEngineThatIsAlwaysRejectedIsStuckNotHung) {
    last_of_three g;
    try {
        leat::word64(g);
        FAIL() << "not stuck";
    } catch (const leat::engine_stuck& e) {
        EXPECT_EQ(std::string(e.what()).rfind("leat::word64: ", 0), 0u) << e.what();
    }
    EXPECT_THROW(leat::word32(g), leat::engine_stuck);
}

constexpr std::uint64_t at_compile_time() {
    leat::constant32 g{0xDEADBEEF};
    return leat::word64(g);
}
static_assert(at_compile_time() == 0xDEADBEEFDEADBEEFu);

} // namespace
