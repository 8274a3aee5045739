// fill and fill_words: what the typed test of all samplers (fill_equals_loop.hpp) does not reach:
// limits and exceptions, element types, engines and callables of other kinds, constant evaluation.
// The expected values are those of the loop, which promise P6 names.

#include "bulk/fill_equals_loop.hpp"
#include "leat/bulk.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/regions/disk.hpp"
#include "leat/streams/split.hpp"
#include "leat/testing/engines.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstddef>
#include <cstdint>
#include <initializer_list>
#include <random>
#include <span>
#include <stdexcept>
#include <string>
#include <utility>
#include <vector>

namespace {

using leat_test::same;

using sizes = std::initializer_list<std::size_t>;

leat::source study() { return leat::source{20261201}; }

TEST(FillWords, AreThoseOfWord64) {
    const auto check = [](auto one_by_one, auto filled) {
        for (const std::size_t length : sizes{0, 1, 5, 31, 32, 33, 100, 513, 2000}) {
            std::vector<std::uint64_t> words(length);
            leat::fill_words(words, filled);
            for (const std::uint64_t word : words) {
                ASSERT_EQ(word, leat::word64(one_by_one));
            }
        }
        EXPECT_TRUE(leat_test::same_state(filled, one_by_one));
    };
    check(study().stream("w"), study().stream("w"));
    check(leat::xoshiro256_braid{3}, leat::xoshiro256_braid{3});
    check(leat::xoshiro256_plus_plus{3}, leat::xoshiro256_plus_plus{3});
    check(leat::minimal_standard{3}, leat::minimal_standard{3});
    check(leat_test::die{}, leat_test::die{});
    check(std::mt19937_64{3}, std::mt19937_64{3});
    check(std::mt19937{3}, std::mt19937{3});
}

TEST(FillWords, FromAThinStreamAreThoseOfTheStream) {
    auto thin = study().thin_stream("t");
    auto whole = study().stream("t");
    std::vector<std::uint64_t> words(777);
    for (const std::size_t length : sizes{1, 2, 31, 0, 64, 777, 3}) {
        leat::fill_words(std::span(words).first(length), thin);
        for (std::size_t i = 0; i < length; ++i) {
            ASSERT_EQ(words[i], whole());
        }
        ASSERT_EQ(thin.position(), whole.position());
        ASSERT_EQ(thin(), whole());
    }
}

/// The loop, up to where it throws; then the same by fill. `open()` gives the engine.
template <class T, class Open, class Sampler>
void expect_the_same_end(const Open& open, const Sampler& sampler, std::size_t length) {
    auto one_by_one = open();
    auto filled = open();
    std::vector<T> expected(length, T{});
    std::size_t drawn = 0;
    bool threw = false;
    std::string why;
    try {
        for (; drawn < length; ++drawn) {
            expected[drawn] = sampler(one_by_one);
        }
    } catch (const leat::error& e) {
        threw = true;
        why = e.what();
    }
    ASSERT_TRUE(threw);
    std::vector<T> got(length, T{});
    try {
        leat::fill(std::span(got), sampler, filled);
        ADD_FAILURE() << "the loop throws after " << drawn << ", the fill does not";
    } catch (const leat::error& e) {
        EXPECT_EQ(why, e.what());
    }
    for (std::size_t i = 0; i < drawn; ++i) {
        ASSERT_TRUE(same(got[i], expected[i])) << i << " of " << drawn;
    }
    if constexpr (requires { filled.position(); }) {
        EXPECT_EQ(filled.position(), one_by_one.position());
    }
    if constexpr (requires { filled == one_by_one; }) {
        EXPECT_TRUE(filled == one_by_one);
    }
}

// Design: a variate that runs into the limit leaves the position after the last word it drew.
TEST(Fill, MeetsALimitAtTheDrawOfTheLoop) {
    for (const unsigned limit :
         {0U, 1U, 2U, 15U, 31U, 32U, 33U, 64U, 100U, 511U, 512U, 513U, 700U, 1024U, 1025U}) {
        SCOPED_TRACE(limit);
        const auto stream = [limit] {
            auto s = study().stream("limited");
            s.limit(limit);
            return s;
        };
        const auto thin = [limit] {
            auto s = study().thin_stream("limited");
            s.limit(limit);
            return s;
        };
        const auto block = [limit] {
            return leat::block(leat::xoshiro256_plus_plus{4}, 0, limit == 0 ? 1 : limit);
        };
        for (const std::size_t length : sizes{1300, 5000}) {
            expect_the_same_end<double>(stream, leat::uniform{0, 1}, length);
            expect_the_same_end<double>(stream, leat::normal{}, length);
            expect_the_same_end<double>(stream, leat::gamma{2.5, 3}, length);
            expect_the_same_end<std::array<double, 2>>(stream, leat::disk{{0, 0}, 1}, length);
            expect_the_same_end<int>(stream, leat::uniform_integer{0, 999}, length);
            expect_the_same_end<double>(thin, leat::normal{}, length);
            expect_the_same_end<std::array<double, 2>>(thin, leat::disk{{0, 0}, 1}, length);
            expect_the_same_end<double>(block, leat::gamma{2.5, 3}, length);
        }
    }
}

TEST(FillWords, MeetALimitAtTheWordOfTheLoop) {
    for (const std::uint64_t limit : sizes{0, 1, 31, 32, 33, 64, 100}) {
        auto s = study().stream("limited");
        auto expected = study().stream("limited");
        s.limit(limit);
        std::vector<std::uint64_t> words(200, 0);
        EXPECT_THROW(leat::fill_words(words, s), leat::stream_exhausted);
        EXPECT_EQ(s.position(), limit);
        for (std::size_t i = 0; i < words.size(); ++i) {
            ASSERT_EQ(words[i], i < limit ? expected() : 0);
        }
    }
}

// A stream holds 2^64 - 1 words, no more (design, "Streams").
TEST(FillWords, EndWhereTheStreamEnds) {
    constexpr std::uint64_t capacity = ~std::uint64_t{0};
    for (const std::size_t left : sizes{0, 1, 31, 32, 33, 100}) {
        auto s = study().stream("last");
        auto thin = study().thin_stream("last");
        s.seek(capacity - left);
        thin.seek(capacity - left);
        auto expected = s.replica();
        std::vector<std::uint64_t> words(200, 0);
        std::vector<std::uint64_t> thin_words(200, 0);
        EXPECT_THROW(leat::fill_words(words, s), leat::stream_exhausted);
        EXPECT_THROW(leat::fill_words(thin_words, thin), leat::stream_exhausted);
        EXPECT_EQ(s.position(), capacity);
        EXPECT_EQ(thin.position(), capacity);
        EXPECT_EQ(words, thin_words);
        for (std::size_t i = 0; i < words.size(); ++i) {
            ASSERT_EQ(words[i], i < left ? expected() : 0);
        }
    }
}

TEST(Fill, FromAStreamThatWasMovedFromThrowsAsADrawDoes) {
    auto first = study().stream("moved");
    const auto second = std::move(first);
    std::vector<double> x(100);
    EXPECT_THROW(leat::fill(x, leat::uniform{}, first), leat::error); // NOLINT: that is the test
    EXPECT_NO_THROW(leat::fill(std::span(x).first(0), leat::uniform{}, first));
    auto thin = study().thin_stream("moved");
    const auto thin_second = std::move(thin);
    EXPECT_THROW(leat::fill(x, leat::uniform{}, thin), leat::error);
    std::vector<std::uint64_t> none;
    EXPECT_NO_THROW(leat::fill_words(none, thin));
}

/// A sampler that throws at its n-th draw, after two words.
struct fails_at {
    using result_type = std::uint64_t;
    int* left;
    template <class G>
    std::uint64_t operator()(G& g) const {
        const std::uint64_t first = g();
        const std::uint64_t second = g();
        if (--*left < 0) {
            throw std::runtime_error("planned");
        }
        return first ^ second;
    }
};

TEST(Fill, LeavesTheEngineWhereASamplerThrew) {
    const auto check = [](auto one_by_one, auto filled, int draws) {
        std::vector<std::uint64_t> got(1000, 0);
        int left = draws;
        EXPECT_THROW(leat::fill(got, fails_at{&left}, filled), std::runtime_error);
        left = draws;
        for (int i = 0; i < draws; ++i) {
            ASSERT_EQ(got[static_cast<std::size_t>(i)], fails_at{&left}(one_by_one));
        }
        one_by_one(); // what the failed draw took
        one_by_one();
        EXPECT_TRUE(leat_test::same_state(filled, one_by_one)) << draws;
    };
    for (const int draws : {0, 1, 100, 255, 256, 257, 400, 999}) {
        check(study().stream("s"), study().stream("s"), draws);
        check(leat::xoshiro256_braid{9}, leat::xoshiro256_braid{9}, draws);
        check(leat::xoshiro256_plus_plus{9}, leat::xoshiro256_plus_plus{9}, draws);
        check(std::mt19937_64{9}, std::mt19937_64{9}, draws);
    }
}

/// A sampler that takes two words a draw, and looks ahead for them in fills.
struct two_words {
    using result_type = std::uint64_t;
    template <class G>
    std::uint64_t operator()(G& g) const {
        const std::uint64_t first = g();
        const std::uint64_t second = g();
        return first - second;
    }
    template <class Words>
    void fill_from_words(std::span<std::uint64_t> out, Words& words) const {
        ++*calls;
        std::size_t i = 0;
        while (i < out.size()) {
            const auto ahead = words.ahead(2 * (out.size() - i));
            std::size_t used = 0;
            for (; ahead.size() - used >= 2; used += 2) {
                out[i++] = ahead[used] - ahead[used + 1];
            }
            words.skip(used);
            if (used < ahead.size()) { // a pair that two blocks share
                out[i++] = (*this)(words);
            }
        }
    }
    int* calls;
};

TEST(Fill, UsesTheSamplersOwnFill) {
    int calls = 0;
    leat_test::expect_fill_equals_loop(two_words{&calls}, [] { return study().stream("two"); });
    EXPECT_GT(calls, 0);
    const int from_streams = calls;
    leat_test::expect_fill_equals_loop(two_words{&calls}, [] { return leat::xoshiro256_braid{2}; });
    EXPECT_GT(calls, from_streams);
}

/// A broken engine that makes words in bulk: zeros, which the ranges below reject (common practice:
/// 2^w is no multiple of their lengths). Counts what was drawn.
class stuck_in_bulk {
public:
    using result_type = std::uint64_t;
    static constexpr result_type min() { return 0; }
    static constexpr result_type max() { return ~result_type{0}; }
    result_type operator()() {
        ++drawn;
        return 0;
    }
    void draw_into(std::span<std::uint64_t> out) {
        for (auto& word : out) {
            word = (*this)();
        }
    }
    friend bool operator==(const stuck_in_bulk&, const stuck_in_bulk&) = default;
    std::uint64_t drawn = 0;
};

// P5: engine_stuck comes as in the loop, after as many words.
TEST(Fill, FromABrokenEngineIsStuckLikeTheLoop) {
    const auto open = [] { return stuck_in_bulk{}; };
    expect_the_same_end<std::uint64_t>(open, leat::uniform_integer<std::uint64_t>{0, 1ULL << 63},
                                       100);
    expect_the_same_end<int>(open, leat::uniform_integer{0, 999}, 100);
}

struct vec {
    double x;
    double y;
};

TEST(Fill, TakesTheElementTypesThatLoseNothing) {
    auto a = study().stream("e");
    auto b = study().stream("e");
    std::vector<double> wide(50); // a float fits
    leat::fill(wide, leat::normal<float>{0, 1}, a);
    for (const double x : wide) {
        ASSERT_EQ(x, double{leat::normal<float>(0, 1)(b)});
    }
    std::array<std::int64_t, 40> integers{}; // an int fits
    leat::fill(integers, leat::uniform_integer{-5, 5}, a);
    for (const std::int64_t i : integers) {
        ASSERT_EQ(i, leat::uniform_integer(-5, 5)(b));
    }
    std::vector<vec> points(40); // draw<vec>
    leat::fill(points, leat::disk{{1, 2}, 3}, a);
    for (const vec& p : points) {
        const auto [x, y] = leat::disk{{1, 2}, 3}(b);
        ASSERT_TRUE(p.x == x && p.y == y);
    }
    EXPECT_EQ(a.address(), b.address());
}

TEST(Fill, TakesAnyCallable) {
    auto a = study().stream("c");
    auto b = study().stream("c");
    std::vector<std::uint64_t> positions(100);
    // Made for streams alone, which no cursor could be.
    const auto position_after = [](leat::stream& s) {
        s();
        return s.position();
    };
    leat::fill(positions, position_after, a);
    for (const std::uint64_t p : positions) {
        ASSERT_EQ(p, position_after(b));
    }
    // A distribution of <random>, with a state of its own.
    std::normal_distribution<double> by_fill;
    std::normal_distribution<double> by_loop;
    std::vector<double> x(101);
    leat::fill(x, by_fill, a);
    for (const double value : x) {
        ASSERT_EQ(value, by_loop(b));
    }
    EXPECT_EQ(by_fill, by_loop);
    EXPECT_EQ(a.address(), b.address());
}

// Nothing outside the span is written.
TEST(Fill, WritesNothingBeyondItsSpan) {
    leat::xoshiro256_braid g{5};
    for (const std::size_t length : sizes{0, 1, 17, 63, 200}) {
        std::vector<double> x(length + 32, -7);
        leat::fill(std::span(x).subspan(16, length), leat::uniform{0, 1}, g);
        std::vector<float> y(length + 32, -7);
        leat::fill(std::span(y).subspan(16, length), leat::uniform<float>{0, 1}, g);
        std::vector<int> z(length + 32, -7);
        leat::fill(std::span(z).subspan(16, length), leat::uniform_integer{0, 9}, g);
        for (std::size_t i = 0; i < length + 32; ++i) {
            const bool inside = i >= 16 && i < 16 + length;
            ASSERT_EQ(x[i] != -7, inside);
            ASSERT_EQ(y[i] != -7, inside);
            ASSERT_EQ(z[i] != -7, inside);
        }
    }
}

template <class Sampler>
constexpr auto filled_by_constant_evaluation(Sampler sampler) {
    std::array<typename Sampler::result_type, 40> values{};
    leat::xoshiro256_braid g{12};
    leat::fill(values, sampler, g);
    return values;
}

// One function, run by the compiler and by the machine with its kernels.
TEST(Fill, IsTheSameWhenTheCompilerRunsIt) {
    const auto check = [](const auto& by_compiler, const auto& sampler) {
        const auto by_machine = filled_by_constant_evaluation(sampler);
        EXPECT_TRUE(same(by_compiler, by_machine));
    };
    constexpr leat::uniform unit{0, 1};
    constexpr auto units = filled_by_constant_evaluation(unit);
    check(units, unit);
    constexpr leat::uniform_integer die{1, 6};
    constexpr auto faces = filled_by_constant_evaluation(die);
    check(faces, die);
    constexpr leat::normal normal{0, 1};
    constexpr auto normals = filled_by_constant_evaluation(normal);
    check(normals, normal);
}

} // namespace
