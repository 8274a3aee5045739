// compat::rand() in several threads: a stream of its own for each number, errors instead of copies,
// and the same numbers in every run, whatever the system makes of the threads.

#include "leat/compat/rand.hpp"

#include <gtest/gtest.h>

#include <array>
#include <atomic>
#include <cstdint>
#include <cstdlib>
#include <set>
#include <string>
#include <thread>
#include <vector>

namespace {

namespace compat = leat::compat;

using row = std::vector<std::uint64_t>;

/// Runs `work` in a thread to its end.
template <class Work>
void in_a_thread(Work work) {
    std::thread thread(work);
    thread.join();
}

row some_draws(int count) {
    row x;
    for (int i = 0; i < count; ++i) {
        x.push_back(compat::rand_stream()());
    }
    return x;
}

row words_of(leat::stream s, int count) {
    row x;
    for (int i = 0; i < count; ++i) {
        x.push_back(s());
    }
    return x;
}

template <class Call>
std::string error_of(Call call) {
    try {
        call();
    } catch (const leat::error& e) {
        return e.what();
    }
    return "no error";
}

bool contains(const std::string& text, const char* part) {
    return text.find(part) != std::string::npos;
}

// The main thread draws without a number in all tests here; being first, it may.
class CompatRandThreads : public testing::Test {
protected:
    CompatRandThreads() { compat::srand(1); }
};

TEST_F(CompatRandThreads, DrawFromStreamsOfTheirOwn) {
    constexpr int workers = 8;
    for (const int seed : {1, 20261201}) {
        compat::srand(seed);
        std::array<row, workers> drawn;
        std::vector<std::thread> threads;
        for (int i = 0; i < workers; ++i) {
            threads.emplace_back([i, &drawn] {
                compat::rand_thread(i);
                drawn[static_cast<std::size_t>(i)] = some_draws(3000);
            });
        }
        const row own = some_draws(3000); // at the same time
        for (std::thread& thread : threads) {
            thread.join();
        }
        std::set<std::uint64_t> all(own.begin(), own.end());
        EXPECT_EQ(own, words_of(leat::source{seed}.stream("compat.rand"), 3000));
        for (int i = 0; i < workers; ++i) {
            const row& x = drawn[static_cast<std::size_t>(i)];
            EXPECT_EQ(x, words_of(leat::source{seed}.stream("compat.rand", i), 3000)) << i;
            all.insert(x.begin(), x.end());
        }
        EXPECT_EQ(all.size(), 3000u * (workers + 1)); // no number is shared
    }
}

// Not a copy of another's numbers, not a number the system happens to give: an error that says what
// to do, from every function, and a numbered thread works.
TEST_F(CompatRandThreads, AnUnnumberedSecondThreadIsAnError) {
    compat::rand();
    in_a_thread([] {
        const std::string found = error_of([] { compat::rand(); });
        EXPECT_TRUE(contains(found, "leat::compat::rand: called in a thread without a number"))
            << found;
        EXPECT_TRUE(contains(found, "leat::compat::rand_thread(i)")) << found;
        EXPECT_TRUE(contains(error_of([] { compat::rand_unit(); }), "compat::rand_unit: called"));
        EXPECT_TRUE(
            contains(error_of([] { compat::rand_below(6); }), "compat::rand_below: called"));
        EXPECT_TRUE(contains(error_of([] { compat::srand(3); }), "compat::srand: called"));
        compat::rand_thread(2);
        EXPECT_EQ(some_draws(5), words_of(leat::source{1}.stream("compat.rand", 2), 5));
    });
    // That thread has ended; another one without a number is no better.
    in_a_thread(
        [] { EXPECT_TRUE(contains(error_of([] { compat::rand(); }), "without a number")); });
}

// In a process of its own, where nothing has drawn: the first thread is the one that may, be it a
// worker; then the main thread may not.
TEST(CompatRandThreadsDeathTest, TheFirstThreadNeedsNoNumberWhicheverItIs) {
    GTEST_FLAG_SET(death_test_style, "threadsafe");
    EXPECT_EXIT(
        {
            in_a_thread([] { compat::rand(); });
            const bool found = contains(error_of([] { compat::rand(); }), "without a number");
            std::_Exit(found ? 0 : 1);
        },
        testing::ExitedWithCode(0), "");
}

TEST_F(CompatRandThreads, OneNumberIsOneThreads) {
    std::atomic<bool> taken{false};
    std::atomic<bool> may_end{false};
    std::thread holder([&] {
        compat::rand_thread(4);
        compat::rand_thread(4); // again: nothing happens
        compat::rand();
        taken = true;
        while (!may_end) {
            std::this_thread::yield();
        }
    });
    while (!taken) {
        std::this_thread::yield();
    }
    in_a_thread([] {
        EXPECT_EQ(error_of([] { compat::rand_thread(4); }),
                  "leat::compat::rand_thread: i = 4, must not be the number of another running "
                  "thread");
        compat::rand_thread(5);
        compat::rand();
    });
    may_end = true;
    holder.join();
    in_a_thread([] { EXPECT_EQ(error_of([] { compat::rand_thread(4); }), "no error"); });
}

// Programs that begin new threads for every step of time: no step repeats the numbers of another.
TEST_F(CompatRandThreads, ALaterThreadGoesOnWhereItsNumberStopped) {
    row drawn;
    for (int step = 0; step < 10; ++step) {
        in_a_thread([&drawn] {
            compat::rand_thread(3);
            for (const std::uint64_t x : some_draws(17)) {
                drawn.push_back(x);
            }
        });
    }
    EXPECT_EQ(drawn, words_of(leat::source{1}.stream("compat.rand", 3), 170));
}

TEST_F(CompatRandThreads, AThreadCanChangeItsNumber) {
    in_a_thread([] {
        compat::rand_thread(6);
        const row six = some_draws(3);
        compat::rand_thread(7);
        EXPECT_EQ(some_draws(3), words_of(leat::source{1}.stream("compat.rand", 7), 3));
        compat::rand_thread(6); // goes on
        row all = six;
        for (const std::uint64_t x : some_draws(2)) {
            all.push_back(x);
        }
        EXPECT_EQ(all, words_of(leat::source{1}.stream("compat.rand", 6), 5));
    });
}

// srand() after threads have drawn: every number begins anew, in running threads too.
TEST_F(CompatRandThreads, SeedingStartsEveryNumberAnew) {
    std::atomic<int> stage{0};
    const auto wait_for = [&stage](int wanted) {
        while (stage != wanted) {
            std::this_thread::yield();
        }
    };
    row before;
    row after;
    std::thread worker([&] {
        compat::rand_thread(1);
        before = some_draws(40);
        stage = 1;
        wait_for(2); // the seed changes
        after = some_draws(40);
    });
    wait_for(1);
    some_draws(5);
    compat::srand(2);
    stage = 2;
    worker.join();
    EXPECT_EQ(before, words_of(leat::source{1}.stream("compat.rand", 1), 40));
    EXPECT_EQ(after, words_of(leat::source{2}.stream("compat.rand", 1), 40));
    EXPECT_EQ(some_draws(5), words_of(leat::source{2}.stream("compat.rand"), 5));
    in_a_thread([] { // the number is taken up under the new seed: on where it stopped
        compat::rand_thread(1);
        EXPECT_EQ(compat::rand_stream().position(), 40u);
    });
    compat::srand(3);
    in_a_thread([] { // a number that is taken up after the seed changed
        compat::rand_thread(1);
        EXPECT_EQ(some_draws(5), words_of(leat::source{3}.stream("compat.rand", 1), 5));
    });
}

// `srand(seed + thread)` in each worker is the habit that this turns into an error.
TEST_F(CompatRandThreads, OnlyTheFirstThreadSeeds) {
    in_a_thread([] {
        compat::rand_thread(9);
        compat::rand();
        const std::string found = error_of([] { compat::srand(10); });
        EXPECT_TRUE(contains(found, "leat::compat::srand: called in thread 9; one seed")) << found;
        EXPECT_EQ(compat::rand_stream().position(), 1u); // nothing began anew
        compat::rand_thread(0);                          // as OpenMP numbers the first thread
        EXPECT_EQ(error_of([] { compat::srand(10); }), "no error");
    });
}

// Seeding while others draw is no data race, and each draws from the old stream or the new one.
TEST_F(CompatRandThreads, SeedingWhileOthersDrawIsNoRace) {
    constexpr int draws = 20000;
    std::vector<std::thread> threads;
    for (int i = 0; i < 3; ++i) {
        threads.emplace_back([i] {
            compat::rand_thread(i);
            for (int k = 0; k < draws; ++k) {
                compat::rand();
            }
            EXPECT_LE(compat::rand_stream().position(), static_cast<std::uint64_t>(draws));
        });
    }
    for (int seed = 0; seed < 200; ++seed) {
        compat::srand(seed);
    }
    for (std::thread& thread : threads) {
        thread.join();
    }
    in_a_thread([] {
        compat::rand_thread(2);
        EXPECT_EQ(compat::rand_stream().address().key,
                  leat::source{199}.stream("compat.rand", 2).address().key);
    });
}

} // namespace
