// Streams, sources and limited engines as text. ISO C++ [rand.req.eng] asks of an engine that >>
// restores what << wrote, and leaves it as it was, with failbit set, on anything else; leat's
// promise is: in any locale, with any flags, in wide characters too. (Engines and laws: see
// tests/engines/requirements_test.cpp and tests/distributions.)

#include "leat/engines/lehmer.hpp"
#include "leat/engines/lehmer128.hpp"
#include "leat/engines/philox.hpp"
#include "leat/engines/splitmix64.hpp"
#include "leat/engines/xoshiro.hpp"
#include "leat/streams/source.hpp"
#include "leat/streams/split.hpp"

#include <gtest/gtest.h>

#include <iomanip>
#include <locale>
#include <random>
#include <sstream>
#include <string>

namespace {

/// Facets that would wreck careless number formatting.
template <class Char>
struct grouping : std::numpunct<Char> {
protected:
    Char do_thousands_sep() const override { return static_cast<Char>('.'); }
    std::string do_grouping() const override { return "\3"; }
};

template <class Char, class T>
std::basic_string<Char> text_of(const T& x) {
    std::basic_ostringstream<Char> os;
    os.imbue(std::locale{std::locale::classic(), new grouping<Char>});
    os << std::hex << std::showbase << std::uppercase << std::setfill(static_cast<Char>('*'))
       << std::setw(30) << std::left << x;
    EXPECT_TRUE(os);
    return os.str();
}

/// Reads x back from what << wrote between other things, by the same hostile stream.
template <class Char, class T>
void return_through_text(const T& x, T& target) {
    std::basic_istringstream<Char> is(std::basic_string<Char>{' ', '\n'} + text_of<Char>(x) +
                                      std::basic_string<Char>{' ', '7'});
    is.imbue(std::locale{std::locale::classic(), new grouping<Char>});
    is >> std::oct >> target;
    EXPECT_TRUE(is);
    int after = 0;
    is >> std::dec >> after;
    EXPECT_EQ(after, 7);
}

/// Whether the text is refused, and the target left as it was.
template <class T>
bool refuses(const std::string& text, T& target) {
    const std::string before = text_of<char>(target);
    std::istringstream is(text);
    is >> target;
    EXPECT_EQ(text_of<char>(target), before) << text;
    return is.fail() && !is.bad();
}

// ---- streams ----

template <class Stream>
class TextOfStreams : public testing::Test {};
using kinds = testing::Types<leat::stream, leat::thin_stream>;
TYPED_TEST_SUITE(TextOfStreams, kinds);

TYPED_TEST(TextOfStreams, ReturnsAddressPositionAndLimit) {
    TypeParam s(leat::source{1}.stream("text", 5).address());
    for (const std::uint64_t position : {std::uint64_t{0}, std::uint64_t{37}, ~std::uint64_t{0}}) {
        s.limit(~std::uint64_t{0} - 1000 + position % 7);
        s.seek(position);
        TypeParam narrow{leat::stream_address{}};
        TypeParam wide{leat::stream_address{}};
        return_through_text<char>(s, narrow);
        return_through_text<wchar_t>(s, wide);
        for (TypeParam* restored : {&narrow, &wide}) {
            EXPECT_EQ(restored->address(), s.address());
            EXPECT_EQ(restored->limit(), s.limit());
        }
        if (position < s.limit()) {
            const std::uint64_t word = s();
            EXPECT_EQ(narrow(), word);
            EXPECT_EQ(wide(), word);
        }
    }
}

TYPED_TEST(TextOfStreams, RefusesGarbage) {
    TypeParam s(leat::source{1}.stream("text", 6).address());
    (void)s();
    TypeParam twin = s.replica();
    for (const char* text :
         {"", " ", "1", "1 2 3", "1 2 3 ", "1 2 3 x", "1 2 3 -4", "-1 2 3 4", "1,2,3,4",
          "1 2 3 18446744073709551616", "0x1 2 3 4", "1 2.5 3 4", "a stream"}) {
        EXPECT_TRUE(refuses(text, s)) << text;
    }
    EXPECT_EQ(s(), twin());
}

TYPED_TEST(TextOfStreams, HasNoTextWhereItWasMovedFrom) {
    // It would come to life again, and repeat the words of the stream it was moved to.
    TypeParam s(leat::source{1}.stream("text", 7).address());
    EXPECT_FALSE(s.was_moved_from());
    TypeParam other = std::move(s);
    EXPECT_TRUE(s.was_moved_from()); // NOLINT: the point
    EXPECT_FALSE(other.was_moved_from());
    std::ostringstream os;
    os << s; // NOLINT
    EXPECT_TRUE(os.fail());
    EXPECT_EQ(os.str(), "");
    // One may be read into.
    return_through_text<char>(other, s);
    EXPECT_FALSE(s.was_moved_from());
    EXPECT_EQ(s(), other());
}

TEST(TextOfStreams, IsTheSameForBothKinds) {
    leat::stream s = leat::source{1}.stream("text", 8);
    leat::thin_stream t{leat::stream_address{}};
    (void)s();
    std::stringstream text;
    text << s;
    text >> t;
    EXPECT_EQ(t(), s());
}

// ---- sources ----

TEST(TextOfSources, ReturnsSeedAndPath) {
    const leat::source study{"a study"};
    for (const leat::source& x :
         {study, study.branch("wind"), study.branch("wind", 5), study.branch(-5),
          study.branch(~std::uint64_t{0}), study.branch(0), study.branch("wind", 5, "x"),
          leat::source{-1}, leat::source{""}}) {
        leat::source narrow{0};
        leat::source wide{0};
        return_through_text<char>(x, narrow);
        return_through_text<wchar_t>(x, wide);
        for (const leat::source& restored : {narrow, wide}) {
            EXPECT_EQ(restored, x);
            EXPECT_EQ(restored.stream().address(), x.stream().address());
            EXPECT_EQ(restored.stream("a", 1).address(), x.stream("a", 1).address());
            EXPECT_EQ(restored.stream(-1).address(), x.stream(-1).address());
        }
        EXPECT_EQ(leat::source::from_state(x.state()), x);
    }
}

TEST(TextOfSources, RefusesGarbage) {
    leat::source x = leat::source{1}.branch("wind", 5);
    for (const char* text :
         {"", "1 2 3 4 5 6", "1 2 3 4 5 6 4", "1 2 3 4 5 6 18446744073709551615", "1 2 3 4 5 6 -1",
          "1 2 3 x 5 6 1", "18446744073709551616 2 3 4 5 6 1"}) {
        EXPECT_TRUE(refuses(text, x)) << text;
    }
    EXPECT_EQ(x, leat::source{1}.branch("wind", 5));
    EXPECT_THROW((void)leat::source::from_state({1, 2, 3, 4, 5, 6, 4}), leat::invalid_parameter);
}

// ---- limited engines ----

template <class Engine>
void return_limited(leat::limited<Engine> x) {
    for (int i = 0; i < 3; ++i) {
        leat::limited<Engine> narrow(x.engine(), leat::wide_integer{1});
        (void)narrow();
        leat::limited<Engine> wide = narrow;
        return_through_text<char>(x, narrow);
        return_through_text<wchar_t>(x, wide);
        for (leat::limited<Engine> restored : {narrow, wide}) {
            EXPECT_EQ(restored, x);
            EXPECT_EQ(restored.length(), x.length());
            EXPECT_EQ(restored.position(), x.position());
            leat::limited<Engine> twin = x;
            EXPECT_EQ(restored(), twin());
        }
        for (int draw = 0; draw < 1000; ++draw) {
            (void)x();
        }
    }
}

TEST(TextOfLimited, ReturnsLengthPositionAndEngine) {
    return_limited(leat::block(leat::xoshiro256_plus_plus{7}, 3, leat::pow2(200)));
    return_limited(leat::block(leat::minimal_standard{7}, 3, 5000));
    return_limited(leat::leapfrog(leat::minimal_standard{7}, 1, 8));
    return_limited(leat::leapfrog(leat::lehmer128{7}, 1, 8));
    return_limited(leat::leapfrog(leat::philox4x32{7}, 1, 8));
    return_limited(leat::leapfrog(leat::splitmix64{7}, 7, 8));
    return_limited(leat::limited{std::mt19937{3}, leat::wide_integer{5000}});
}

TEST(TextOfLimited, EndsWhereTheOriginalDoes) {
    auto x = leat::block(leat::minimal_standard{7}, 0, 10);
    x.discard(9);
    auto restored = leat::block(leat::minimal_standard{1}, 0, 1);
    return_through_text<char>(x, restored);
    EXPECT_EQ(restored(), x());
    EXPECT_THROW((void)restored(), leat::stream_exhausted);
    return_through_text<char>(x, restored); // at its end
    EXPECT_EQ(restored.remaining(), leat::wide_integer{});
    EXPECT_THROW((void)restored(), leat::stream_exhausted);
}

TEST(TextOfLimited, RefusesLeapsThatNoEngineMakes) {
    auto lehmer = leat::minimal_standard{7}.leap(3);
    for (const char* text : {"0 1", "1 0", "2147483647 1", "1 2147483647", "5", "x"}) {
        EXPECT_TRUE(refuses(text, lehmer)) << text;
    }
    auto lehmer128 = leat::lehmer128{7}.leap(3);
    for (const char* text : {"2 0 1 0", "1 0 2 0", "1 0 1", "x"}) {
        EXPECT_TRUE(refuses(text, lehmer128)) << text;
    }
    auto counter = leat::splitmix64{7}.leap(3);
    for (const char* text : {"2", "x 1", "1 18446744073709551616"}) {
        EXPECT_TRUE(refuses(text, counter)) << text;
    }
}

TEST(TextOfLimited, RefusesGarbage) {
    auto x = leat::block(leat::minimal_standard{7}, 0, 10);
    (void)x();
    const std::string tenth = "1" + std::string(308, '0'); // has 309 digits
    for (const std::string& text :
         {std::string(""), std::string("10"), std::string("10 1"), std::string("10 11 7"),
          std::string("10 1 0"), std::string("10 1 2147483647"), std::string("x 1 7"),
          std::string("10 -1 7"), tenth + " 1 7"}) {
        EXPECT_TRUE(refuses(text, x)) << text;
    }
    std::istringstream longest(std::string(308, '9') + " 1 7");
    EXPECT_TRUE(longest >> x);
    EXPECT_THROW((void)leat::limited<leat::minimal_standard>::at(leat::minimal_standard{1}, 4, 5),
                 leat::invalid_parameter);
}

} // namespace
