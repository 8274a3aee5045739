// What every engine of leat must do. The specification: ISO C++ [rand.req.eng] (N4860 26.6.2.4,
// random number engine requirements) and [rand.req.seedseq]; beyond it, leat's own: state
// constructors, refusals that change nothing, constant evaluation, exact jumps.

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "support/engine_list.hpp"

#include <gtest/gtest.h>

#include <array>
#include <concepts>
#include <cstdint>
#include <limits>
#include <locale>
#include <random> // std::seed_seq, an outside seed sequence
#include <sstream>
#include <string>
#include <type_traits>
#include <vector>

namespace {

/// A seed sequence that gives one word over and over.
struct constant_sequence {
    using result_type = std::uint32_t;
    std::uint32_t value;

    template <class Iterator>
    constexpr void generate(Iterator first, Iterator last) const {
        for (; first != last; ++first) {
            *first = value;
        }
    }
};

/// An engine away from its start, and away from the start of a block.
template <class E>
E used_engine() {
    E e;
    for (int i = 0; i < 11; ++i) {
        e();
    }
    return e;
}

template <class Char, class E>
std::basic_string<Char> text_of(const E& e) {
    std::basic_ostringstream<Char> os;
    os << e;
    return os.str();
}

/// Reads `text`, which must fail with failbit set and leave the engine untouched.
template <class E>
void expect_text_refused(const std::string& text) {
    E e = used_engine<E>();
    const E before = e;
    std::istringstream is{text};
    is >> e;
    EXPECT_TRUE(is.fail()) << '"' << text << '"';
    EXPECT_TRUE(e == before) << '"' << text << '"';
}

template <class Callable>
void expect_refused(Callable call) {
    try {
        call();
        ADD_FAILURE() << "not refused";
    } catch (const leat::invalid_parameter& refusal) {
        const std::string what = refusal.what();
        EXPECT_EQ(what.rfind("leat::", 0), 0u) << what;
        EXPECT_NE(what.find(" = "), std::string::npos) << what;
        EXPECT_NE(what.find("must"), std::string::npos) << what;
    }
}

/// Facets that would wreck careless number formatting.
template <class Char>
struct grouping : std::numpunct<Char> {
protected:
    Char do_thousands_sep() const override { return static_cast<Char>('.'); }
    Char do_decimal_point() const override { return static_cast<Char>(','); }
    std::string do_grouping() const override { return "\3"; }
};

/// The first draws of a default engine and of one from a seed sequence, and a check of ==.
template <class E>
constexpr std::array<typename E::result_type, 24> trace() {
    std::array<typename E::result_type, 24> result{};
    E a;
    for (std::size_t i = 0; i < 12; ++i) {
        result[i] = a();
    }
    constant_sequence q{0x12345678u};
    E b{q};
    const E c{a.state()};
    result[12] = c == a && !(b == a) ? 1 : 0;
    b.seed();
    result[13] = b == E{} ? 1 : 0;
    b.discard(13);
    for (std::size_t i = 14; i < 24; ++i) {
        result[i] = b();
    }
    return result;
}

template <class E>
class engine_test : public ::testing::Test {};
TYPED_TEST_SUITE(engine_test, leat_test::engines);

// "E::result_type"; "u()": of type result_type; min() and max() constant, min() < max().
TYPED_TEST(engine_test, is_a_uniform_random_bit_generator) {
    using E = TypeParam;
    static_assert(leat::random_words<E>);
    static_assert(std::uniform_random_bit_generator<E>);
    static_assert(std::same_as<decltype(E::default_seed), const std::uint64_t>);
    static_assert(E::state_bits > 0);
    E e;
    for (int i = 0; i < 20000; ++i) {
        const auto x = e();
        ASSERT_GE(x, E::min());
        ASSERT_LE(x, E::max());
    }
}

// "E()": all default-constructed engines are equal; "E(s)" with default_seed makes an equal one;
// "e.seed()" postcondition e == E(); "e.seed(s)" postcondition e == E(s).
TYPED_TEST(engine_test, seeds_as_it_constructs) {
    using E = TypeParam;
    EXPECT_TRUE(E{} == E{});
    EXPECT_TRUE(E{} == E{E::default_seed});
    E e = used_engine<E>();
    EXPECT_FALSE(e == E{});
    e.seed();
    EXPECT_TRUE(e == E{});
    for (const std::uint64_t s : {1u, 3u, 12345677u}) {
        e.seed(s);
        EXPECT_TRUE(e == E{s}) << s;
        E other{s};
        EXPECT_EQ(e(), other()) << s;
    }
    EXPECT_FALSE(E{1u} == E{3u});
    static_assert(!std::is_convertible_v<std::uint64_t, E>); // no seeding by accident
}

// "E(q)", "e.seed(q)" postcondition e == E(q). No seed sequence is refused, be it all zeros.
TYPED_TEST(engine_test, seeds_from_any_seed_sequence) {
    using E = TypeParam;
    std::seed_seq iso{1, 2, 3};
    const E from_iso{iso};
    E e;
    e.seed(iso);
    EXPECT_TRUE(e == from_iso);
    EXPECT_FALSE(e == E{});
    for (const std::uint32_t value : {0u, 1u, 0x80000000u, 0xFFFFFFFFu}) {
        constant_sequence q{value};
        const E from_constant{q};
        e.seed(q);
        EXPECT_TRUE(e == from_constant);
        // The state is a sound one: its own text and state() are accepted.
        E again;
        std::istringstream is{text_of<char>(e)};
        is >> again;
        EXPECT_FALSE(is.fail());
        EXPECT_TRUE(again == e);
        EXPECT_TRUE(E{e.state()} == e);
    }
}

// Copy construction and assignment; x == y implies equal draws for ever (here 1000).
TYPED_TEST(engine_test, copies_and_compares) {
    using E = TypeParam;
    static_assert(std::regular<E>);
    static_assert(std::is_nothrow_copy_constructible_v<E> && std::is_nothrow_move_assignable_v<E>);
    E a = used_engine<E>();
    E b = a;
    EXPECT_TRUE(a == b);
    a();
    EXPECT_TRUE(a != b);
    b();
    EXPECT_TRUE(a == b);
    E c;
    c = b;
    for (int i = 0; i < 1000; ++i) {
        const auto x = a();
        ASSERT_EQ(x, b());
        ASSERT_EQ(x, c());
    }
}

// "e.discard(z)": as z draws.
TYPED_TEST(engine_test, discards_as_it_draws) {
    using E = TypeParam;
    E drawn = used_engine<E>();
    const E start = drawn;
    unsigned long long done = 0;
    for (const unsigned long long z :
         {0ull, 1ull, 2ull, 3ull, 4ull, 5ull, 15ull, 16ull, 17ull, 1000ull, 100000ull}) {
        for (; done < z; ++done) {
            drawn();
        }
        E discarded = start;
        discarded.discard(z);
        EXPECT_TRUE(discarded == drawn) << z;
        E next = drawn;
        EXPECT_EQ(discarded(), next()) << z;
    }
}

// "os << x", "is >> v": a text that restores the state, whatever the stream's locale and flags
// ([rand.req.eng] demands it for the classic locale and default flags; leat for all).
template <class E, class Char>
void round_trip() {
    const E e = used_engine<E>();
    std::basic_stringstream<Char> plain;
    plain << e;
    E back;
    plain >> back;
    EXPECT_FALSE(plain.fail());
    EXPECT_TRUE(back == e);

    std::basic_stringstream<Char> odd;
    odd.imbue(std::locale{std::locale::classic(), new grouping<Char>});
    odd.flags(std::ios_base::hex | std::ios_base::showbase | std::ios_base::showpos |
              std::ios_base::uppercase | std::ios_base::left);
    odd.fill(static_cast<Char>('*'));
    odd.width(40);
    odd << e;
    odd.width(0);
    EXPECT_TRUE(odd.str() == plain.str());
    const auto flags = odd.flags();
    E again;
    odd >> again;
    EXPECT_FALSE(odd.fail());
    EXPECT_TRUE(again == e);
    EXPECT_TRUE(odd.flags() == flags);

    // Two engines in one stream, apart by any white space.
    std::basic_stringstream<Char> two;
    two << E{} << static_cast<Char>('\n') << static_cast<Char>('\t') << e;
    two >> back >> again;
    EXPECT_FALSE(two.fail());
    EXPECT_TRUE(back == E{});
    EXPECT_TRUE(again == e);
}
TYPED_TEST(engine_test, goes_through_text_in_any_locale) {
    round_trip<TypeParam, char>();
    round_trip<TypeParam, wchar_t>();
}

// "is >> v": "if bad input is encountered, ensures that v's value is unchanged ... and calls
// is.setstate(ios::failbit)".
TYPED_TEST(engine_test, refuses_bad_text_and_stays_as_it_was) {
    using E = TypeParam;
    // "0x10" is not among them: a one-word engine reads 0 and stops, as ISO lets it.
    for (const char* garbage :
         {"", " ", "garbage", "-1", "+1", ",", "99999999999999999999999999"}) {
        expect_text_refused<E>(garbage);
    }
    // Truncated: every whole number of words but all of them.
    const std::string text = text_of<char>(used_engine<E>());
    for (std::size_t i = 0; i < text.size(); ++i) {
        if (text[i] == ' ') {
            expect_text_refused<E>(text.substr(0, i));
            expect_text_refused<E>(text.substr(0, i) + " x");
        }
    }
    for (const std::string& state : leat_test::refused_by(static_cast<const E*>(nullptr)).states) {
        expect_text_refused<E>(state);
    }
}

// P5: a state the method forbids is refused by every way in, by name and value, and nothing is
// half-changed.
TYPED_TEST(engine_test, refuses_forbidden_seeds_and_states) {
    using E = TypeParam;
    const leat_test::refusals refused = leat_test::refused_by(static_cast<const E*>(nullptr));
    for (const std::uint64_t s : refused.seeds) {
        SCOPED_TRACE(s);
        expect_refused([s] { return E{s}; });
        E e = used_engine<E>();
        const E before = e;
        expect_refused([s, &e] { e.seed(s); });
        EXPECT_TRUE(e == before);
    }
    if constexpr (std::integral<typename E::state_type>) {
        return; // its state constructor is the seed constructor
    } else if constexpr (requires(typename E::state_type s) { s[0]; }) {
        using word = typename E::state_type::value_type;
        for (const std::string& text : refused.states) {
            SCOPED_TRACE(text);
            typename E::state_type state{};
            std::istringstream is{text};
            bool fits = true;
            for (word& w : state) {
                std::uint64_t x = 0;
                is >> x;
                fits = fits && x <= std::numeric_limits<word>::max();
                w = static_cast<word>(x);
            }
            ASSERT_FALSE(is.fail());
            if (fits) {
                expect_refused([&state] { return E{state}; });
            }
        }
    }
}

// The state constructor is the inverse of state().
TYPED_TEST(engine_test, returns_from_its_state) {
    using E = TypeParam;
    E e = used_engine<E>();
    for (int i = 0; i < 20; ++i) {
        E again{e.state()};
        ASSERT_TRUE(again == e);
        E copy = e;
        ASSERT_EQ(again(), copy());
        e();
    }
}

// P1: constant evaluation and run time agree.
TYPED_TEST(engine_test, works_in_constant_evaluation) {
    using E = TypeParam;
    constexpr auto at_compile_time = trace<E>();
    static_assert(at_compile_time[12] == 1 && at_compile_time[13] == 1);
    EXPECT_EQ(trace<E>(), at_compile_time);
}

} // namespace
