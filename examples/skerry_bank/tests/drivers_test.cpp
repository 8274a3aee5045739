// The drivers for threads, and what collects for them: on tasks made up here, and through the
// program. The bytes are compared with expected/, which was made on one thread by std::thread,
// before there were drivers.

#include <algorithm>
#include <atomic>
#include <chrono>
#include <condition_variable>
#include <csignal>
#include <mutex>
#include <set>
#include <stdexcept>
#include <thread>

#include "../collector.hpp"
#include "../drivers/drivers.hpp"
#include "run_program.hpp"

namespace skerry_test {
namespace {

using skerry::collector;
using skerry::replication_row;
using skerry::row_set;
using skerry::thread_driver;

std::vector<thread_driver> built_drivers() {
    std::vector<thread_driver> built;
    for (const thread_driver& driver : skerry::thread_drivers()) {
        if (driver.run != nullptr) {
            built.push_back(driver);
        }
    }
    return built;
}

replication_row row_of(int replication) {
    const skerry::outcome some{.availability = 1.0 / (1 + replication),
                               .lost_energy_mwh = 0,
                               .vessel_use = 0,
                               .failures = replication};
    return {.replication = replication, .designs = {some, some}, .second_apart = some};
}

TEST(skerry_bank_drivers, run_each_missing_replication_once) {
    for (const thread_driver& driver : built_drivers()) {
        for (const int threads : {1, 2, 4, 300}) {
            row_set begun(200);
            begun[0] = row_of(0);
            begun[77] = row_of(77);
            collector rows(begun, {});
            std::vector<std::atomic<int>> runs(200);
            driver.run(
                [&](int r) {
                    ++runs[static_cast<std::size_t>(r)];
                    return row_of(r);
                },
                rows, threads);
            const std::vector<replication_row> all = rows.finish();
            ASSERT_EQ(all.size(), 200u);
            for (std::size_t r = 0; r < all.size(); ++r) {
                EXPECT_EQ(runs[r], begun[r] ? 0 : 1) << driver.name << " " << r;
                EXPECT_EQ(all[r].replication, static_cast<int>(r)) << driver.name;
            }
        }
    }
}

/// Whether an idle thread takes over from a busy one: the first half of the replications wait until
/// two threads have begun some of them.
bool takes_over(const thread_driver& driver, std::chrono::milliseconds patience) {
    std::mutex mutex;
    std::condition_variable changed;
    std::set<std::thread::id> in_first_half;
    bool in_vain = false;
    collector rows(row_set(64), {});
    driver.run(
        [&](int r) {
            if (r < 32) {
                std::unique_lock lock(mutex);
                in_first_half.insert(std::this_thread::get_id());
                changed.notify_all();
                const bool met = changed.wait_for(
                    lock, patience, [&] { return in_first_half.size() >= 2 || in_vain; });
                in_vain = in_vain || !met;
            }
            return row_of(r);
        },
        rows, 2);
    return !in_vain;
}

/// A planted fault: each thread has its share from the start.
void run_by_equal_shares(const skerry::replication_function& run, collector& rows, int threads) {
    const std::vector<int> tasks = rows.missing();
    const std::size_t share = tasks.size() / static_cast<std::size_t>(threads);
    std::vector<std::jthread> workers;
    for (std::size_t w = 0; w < static_cast<std::size_t>(threads); ++w) {
        workers.emplace_back([&, w] {
            for (std::size_t i = w * share; i < (w + 1) * share; ++i) {
                skerry::attempt(run, rows, tasks[i]);
            }
        });
    }
}

// "work dealt out dynamically, not by equal shares"
TEST(skerry_bank_drivers, let_an_idle_thread_take_over) {
    for (const thread_driver& driver : built_drivers()) {
        EXPECT_TRUE(takes_over(driver, std::chrono::seconds(20))) << driver.name;
    }
    EXPECT_FALSE(
        takes_over({"equal shares", run_by_equal_shares, ""}, std::chrono::milliseconds(100)));
}

TEST(skerry_bank_drivers, report_the_lowest_failure_whoever_was_first) {
    for (const thread_driver& driver : built_drivers()) {
        for (const int threads : {1, 2, 4}) {
            for (int repeat = 0; repeat < 20; ++repeat) {
                collector rows(row_set(60), {});
                driver.run(
                    [&](int r) {
                        if (r == 5 || r == 17 || r == 58) {
                            throw std::runtime_error("bad luck");
                        }
                        return row_of(r);
                    },
                    rows, threads);
                try {
                    rows.finish();
                    ADD_FAILURE() << driver.name << ": rows with a failure among them";
                } catch (const std::runtime_error& e) {
                    EXPECT_STREQ(e.what(), "replication 5: bad luck") << driver.name;
                }
            }
        }
    }
}

TEST(skerry_bank_drivers, run_nothing_further_after_a_failure) {
    for (const thread_driver& driver : built_drivers()) {
        collector rows(row_set(500), {});
        int runs = 0;
        driver.run(
            [&](int r) -> replication_row {
                ++runs;
                throw std::runtime_error(std::to_string(r));
            },
            rows, 1);
        EXPECT_EQ(runs, 1) << driver.name;
        EXPECT_THROW(rows.finish(), std::runtime_error) << driver.name;
    }
}

TEST(skerry_bank_collector, saves_every_so_many_rows_and_at_the_end) {
    std::vector<std::ptrdiff_t> saved;
    collector rows(row_set(8), {.save =
                                    [&](const row_set& now) {
                                        saved.push_back(std::count_if(
                                            now.begin(), now.end(),
                                            [](const auto& row) { return row.has_value(); }));
                                    },
                                .save_every = 3,
                                .progress = {}});
    for (const int r : {7, 0, 6, 1, 5, 2, 4, 3}) {
        rows.accept(row_of(r));
    }
    rows.finish();
    EXPECT_EQ(saved, (std::vector<std::ptrdiff_t>{3, 6, 8}));
}

// A full disk, say: the study stops rather than go on without what it was asked for.
TEST(skerry_bank_collector, stops_when_it_cannot_save) {
    for (const thread_driver& driver : built_drivers()) {
        int runs = 0;
        collector rows(row_set(100),
                       {.save = [](const row_set&) { throw std::runtime_error("full"); },
                        .save_every = 10,
                        .progress = {}});
        driver.run(
            [&](int r) {
                ++runs;
                return row_of(r);
            },
            rows, 1);
        EXPECT_EQ(runs, 10) << driver.name;
        try {
            rows.finish();
            ADD_FAILURE() << driver.name;
        } catch (const std::runtime_error& e) {
            EXPECT_STREQ(e.what(), "full");
        }
    }
}

// A driver that forgets one is a fault of the program: it must not pass for a study.
TEST(skerry_bank_collector, notices_a_row_that_never_came) {
    collector rows(row_set(3), {});
    rows.accept(row_of(0));
    rows.accept(row_of(2));
    EXPECT_ANY_THROW(rows.finish());
}

class skerry_bank_threads : public program_test {
protected:
    void expect_the_expected_results(const run_result& run, const std::string& what) {
        EXPECT_EQ(run.status, 0) << what << ": " << run.err;
        EXPECT_EQ(without_version(read_file(run.folder / "results.json")), expected_results())
            << what;
    }
};

// "OpenMP with 1, 2 and 4 threads, TBB and jthread: the same bytes"
TEST_F(skerry_bank_threads, give_the_same_bytes_on_every_driver) {
    for (const thread_driver& driver : built_drivers()) {
        for (const char* threads : {"1", "2", "4"}) {
            const std::string name(driver.name);
            expect_the_expected_results(
                run({"--input", small_, "--driver", name, "--threads", threads}), name + threads);
        }
    }
}

TEST_F(skerry_bank_threads, fail_with_a_message_and_no_results) {
    for (const thread_driver& driver : built_drivers()) {
        const run_result failed = run({"--input", small_, "--driver", std::string(driver.name),
                                       "--threads", "4", "--rehearse", "error:17"});
        EXPECT_EQ(failed.status, 1) << driver.name;
        EXPECT_EQ(failed.err, "leat_skerry_bank: replication 17: failed on purpose, as --rehearse "
                              "asked\n");
        EXPECT_FALSE(std::filesystem::exists(failed.folder / "results.json"));
    }
}

// Killed in replication 17, saved after every 3: replications 0 to 14 are there, and whoever goes
// on from them runs 15 and not 14.
TEST_F(skerry_bank_threads, go_on_from_the_checkpoint_of_a_killed_run) {
    const std::string file = own_file("saved.json");
    const run_result killed = run({"--input", small_, "--threads", "1", "--checkpoint", file,
                                   "--checkpoint-every", "3", "--rehearse", "crash:17"});
    EXPECT_EQ(killed.status, 128 + SIGKILL) << killed.err;
    EXPECT_FALSE(std::filesystem::exists(killed.folder / "results.json"));
    const run_result again = run({"--input", small_, "--resume", file, "--rehearse", "error:15"});
    EXPECT_EQ(again.status, 1) << "replication 15 was not in the checkpoint";
    for (const thread_driver& driver : built_drivers()) {
        const std::string name(driver.name);
        expect_the_expected_results(run({"--input", small_, "--driver", name, "--threads", "3",
                                         "--resume", file, "--rehearse", "error:14"}),
                                    name);
    }
}

// What was finished when a replication failed is kept, and a second failure later adds to it.
TEST_F(skerry_bank_threads, keep_what_was_finished_before_a_failure) {
    const std::string file = own_file("saved.json");
    run({"--input", small_, "--threads", "1", "--checkpoint", file, "--rehearse", "error:9"});
    const run_result second = run({"--input", small_, "--threads", "1", "--resume", file,
                                   "--checkpoint", file, "--rehearse", "error:20"});
    EXPECT_NE(second.err.find("replication 20"), std::string::npos) << second.err;
    expect_the_expected_results(
        run({"--input", small_, "--resume", file, "--rehearse", "error:19"}), "after two failures");
}

// A finished study of 10 replications is carried on to 24.
TEST_F(skerry_bank_threads, carry_a_finished_study_further) {
    const std::string file = own_file("saved.json");
    const run_result ten = run({"--input", small_, "--replications", "10", "--checkpoint", file});
    EXPECT_EQ(ten.status, 0) << ten.err;
    expect_the_expected_results(run({"--input", small_, "--resume", file, "--rehearse", "error:9"}),
                                "from 10 to 24");
}

TEST_F(skerry_bank_threads, refuse_to_overwrite_a_checkpoint_or_to_write_nowhere) {
    const std::string file = own_file("saved.json");
    run({"--input", small_, "--checkpoint", file});
    const std::string before = read_file(file);
    const run_result over = run({"--input", small_, "--checkpoint", file});
    EXPECT_EQ(over.status, 2);
    EXPECT_NE(over.err.find("--checkpoint: " + file + " exists already"), std::string::npos)
        << over.err;
    EXPECT_EQ(read_file(file), before);
    const run_result nowhere = run({"--input", small_, "--checkpoint", own_file("no/such/file")});
    EXPECT_EQ(nowhere.status, 2);
    EXPECT_NE(nowhere.err.find("cannot write"), std::string::npos) << nowhere.err;
}

} // namespace
} // namespace skerry_test
