// shuffle, pick, sample_without_replacement: exactly uniform, with draws as specified.
//
// References: complete enumeration of the draws of small cases (each outcome must come from equally
// many), and plain models of the definitions: Durstenfeld's loop, CACM 7(7), 1964.

#include "leat/uniform/permute.hpp"

#include "leat/testing/engines.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <cstdint>
#include <deque>
#include <limits>
#include <map>
#include <numeric>
#include <random>
#include <set>
#include <span>
#include <string>
#include <vector>

namespace {

/// A word for which below(n) gives i: in the middle of i's words.
std::uint64_t word_for(std::uint64_t i, std::uint64_t n) {
    return ((i << 32) / n + (std::uint64_t{1} << 31) / n) << 32;
}

/// Calls run(engine) once for every choice of draws out of sizes[0], sizes[1], ... values.
template <class Run>
void for_every_draw(const std::vector<std::uint64_t>& sizes, Run run) {
    std::vector<std::uint64_t> choice(sizes.size(), 0);
    for (;;) {
        std::vector<std::uint64_t> words;
        for (std::size_t i = 0; i < sizes.size(); ++i) {
            words.push_back(word_for(choice[i], sizes[i]));
        }
        leat::scripted g(words);
        run(g, choice);
        ASSERT_EQ(g.asked(), sizes.size()) << "draws differ from the specification";
        std::size_t i = 0;
        while (i < choice.size() && ++choice[i] == sizes[i]) {
            choice[i++] = 0;
        }
        if (i == choice.size()) {
            return;
        }
    }
}

TEST(Shuffle, EveryOrderComesFromExactlyOneSequenceOfDraws) {
    std::map<std::vector<int>, int> count;
    for_every_draw({5, 4, 3, 2}, [&](leat::scripted& g, const auto& choice) {
        std::vector<int> v{0, 1, 2, 3, 4};
        leat::shuffle(v, g);
        ++count[v];
        // The definition, word for word: i from the end down, j = below(i + 1).
        std::vector<int> model{0, 1, 2, 3, 4};
        for (std::size_t i = 4; i >= 1; --i) {
            std::swap(model[i], model[choice[4 - i]]);
        }
        EXPECT_EQ(v, model);
    });
    EXPECT_EQ(count.size(), 120u);
    for (const auto& [order, times] : count) {
        EXPECT_EQ(times, 1);
    }
}

TEST(Shuffle, TheEnumerationFindsAnUnfairShuffle) {
    // The planted fault: j from the whole range every time. 3^3 = 27 draws cannot fall evenly on 6.
    std::map<std::vector<int>, int> count;
    for_every_draw({3, 3, 3}, [&](leat::scripted& g, const auto&) {
        std::vector<int> v{0, 1, 2};
        for (std::size_t i = 0; i < 3; ++i) {
            std::swap(v[i], v[static_cast<std::size_t>(leat::below(3, g))]);
        }
        ++count[v];
    });
    std::set<int> times;
    for (const auto& [order, n] : count) {
        times.insert(n);
    }
    EXPECT_GT(times.size(), 1u);
}

TEST(Shuffle, TakesAnyRandomAccessRangeAndSmallOnesTakeNoDraw) {
    std::mt19937_64 g(1);
    int array[4] = {1, 2, 3, 4};
    std::deque<int> deque{1, 2, 3, 4};
    std::vector<bool> bits{true, false, true, true};
    leat::shuffle(array, g);
    leat::shuffle(std::span(array), g);
    leat::shuffle(deque, g);
    leat::shuffle(bits, g);
    EXPECT_EQ(std::accumulate(std::begin(array), std::end(array), 0), 10);
    EXPECT_EQ(std::accumulate(deque.begin(), deque.end(), 0), 10);
    EXPECT_EQ(std::count(bits.begin(), bits.end(), true), 3);

    leat::scripted none(std::vector<std::uint64_t>{});
    std::vector<int> empty;
    std::vector<int> one{7};
    leat::shuffle(empty, none);
    leat::shuffle(one, none);
    EXPECT_EQ(none.asked(), 0u);
}

TEST(Pick, EveryElementComesFromOneDraw) {
    std::array<int, 5> v{0, 0, 0, 0, 0};
    for_every_draw({5}, [&](leat::scripted& g, const auto& choice) {
        int& picked = leat::pick(v, g); // a reference
        EXPECT_EQ(&picked, &v[choice[0]]);
        ++picked;
    });
    EXPECT_EQ(v, (std::array<int, 5>{1, 1, 1, 1, 1}));
    const std::vector<std::string> words{"only"};
    leat::constant g{0};
    const std::string& word = leat::pick(words, g);
    EXPECT_EQ(&word, &words[0]);
}

template <class Action>
std::string refusal(Action action) {
    try {
        action();
    } catch (const leat::invalid_parameter& e) {
        return e.what();
    }
    return "accepted";
}

TEST(Pick, RefusesAnEmptyRange) {
    const std::vector<int> empty;
    leat::constant g{0};
    EXPECT_EQ(refusal([&] { (void)leat::pick(empty, g); }),
              "leat::pick: size of the range = 0, must be at least 1");
}

TEST(Sample, EveryOrderedSampleComesFromExactlyOneSequenceOfDraws) {
    for (std::uint64_t n = 1; n <= 6; ++n) {
        for (std::uint64_t k = 1; k <= n; ++k) {
            std::vector<std::uint64_t> sizes;
            std::size_t outcomes = 1;
            for (std::uint64_t i = 0; i < k; ++i) {
                sizes.push_back(n - i);
                outcomes *= n - i;
            }
            std::set<std::vector<std::uint64_t>> seen;
            for_every_draw(sizes, [&](leat::scripted& g, const auto& choice) {
                const auto sample = leat::sample_without_replacement(n, k, g);
                seen.insert(sample);
                // The definition: the first k places of a shuffle from the front.
                std::vector<std::uint64_t> all(n);
                std::iota(all.begin(), all.end(), 0u);
                for (std::size_t i = 0; i < k; ++i) {
                    std::swap(all[i], all[i + choice[i]]);
                }
                all.resize(k);
                ASSERT_EQ(sample, all) << n << " " << k;
            });
            EXPECT_EQ(seen.size(), outcomes) << n << " " << k;
        }
    }
}

TEST(Sample, LargeSamplesFollowTheDefinition) {
    // Against the whole shuffle in memory, for shares k / n from few to all: the table is full of
    // collisions and re-used places here.
    for (const std::uint64_t k : {1u, 10u, 1000u, 20000u, 39999u, 40000u}) {
        const std::uint64_t n = 40000;
        std::mt19937_64 g(k);
        std::mt19937_64 h(k);
        const auto sample = leat::sample_without_replacement(n, k, g);
        std::vector<std::uint64_t> all(n);
        std::iota(all.begin(), all.end(), 0u);
        for (std::size_t i = 0; i < k; ++i) {
            const std::uint64_t offset = leat::below(n - i, h);
            std::swap(all[i], all[i + offset]);
        }
        all.resize(k);
        ASSERT_EQ(sample, all) << k;
        EXPECT_EQ(g, h);
    }
}

TEST(Sample, HugeRangesTakeMemoryOfOrderK) {
    const std::uint64_t n = std::numeric_limits<std::uint64_t>::max();
    std::mt19937_64 g(5);
    auto sample = leat::sample_without_replacement(n, 100000, g);
    ASSERT_EQ(sample.size(), 100000u);
    std::sort(sample.begin(), sample.end());
    EXPECT_EQ(std::adjacent_find(sample.begin(), sample.end()), sample.end());
    EXPECT_LT(sample.back(), n);
    // The middle one has a standard deviation of 0.0016 (a beta law's): six of them, fixed seed.
    EXPECT_NEAR(static_cast<double>(sample[50000]) / static_cast<double>(n), 0.5, 0.01);

    leat::all_ones last; // always the last place: n - 1, then what was moved there: 0, 1, ...
    EXPECT_EQ(leat::sample_without_replacement(n, 3, last),
              (std::vector<std::uint64_t>{n - 1, 0, 1}));
}

TEST(Sample, RefusesWhatCannotBe) {
    leat::constant g{0};
    EXPECT_EQ(refusal([&] { (void)leat::sample_without_replacement(3, 4, g); }),
              "leat::sample_without_replacement: k = 4, must not exceed n");
    EXPECT_EQ(refusal([&] { (void)leat::sample_without_replacement(-3, 1, g); }),
              "leat::sample_without_replacement: n = -3, must not be negative");
    EXPECT_EQ(refusal([&] { (void)leat::sample_without_replacement(3, -1, g); }),
              "leat::sample_without_replacement: k = -1, must not be negative");
    EXPECT_EQ(refusal([&] {
                  (void)leat::sample_without_replacement(~std::uint64_t{0}, ~std::uint64_t{0}, g);
              }),
              "leat::sample_without_replacement: k = 18446744073709551615, must fit in memory");
    EXPECT_TRUE(leat::sample_without_replacement(3, 0, g).empty());
    EXPECT_TRUE(leat::sample_without_replacement(0, 0, g).empty());
}

constexpr bool at_compile_time() {
    leat::constant g{0xFEDCBA9876543210};
    std::array<int, 3> v{1, 2, 3};
    leat::shuffle(v, g);
    return leat::pick(v, g) >= 1;
}
static_assert(at_compile_time());

} // namespace
