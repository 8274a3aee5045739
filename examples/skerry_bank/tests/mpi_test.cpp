// The study on MPI, started as a user starts it.

#include <algorithm>

#include "run_program.hpp"

namespace skerry_test {
namespace {

class skerry_bank_mpi : public program_test {
protected:
    run_result run_ranks(int ranks, std::vector<std::string> arguments) {
        // More ranks than processors, and, in a container, as root: OpenMPI wants to be told.
        const std::string before = "OMPI_ALLOW_RUN_AS_ROOT=1 OMPI_ALLOW_RUN_AS_ROOT_CONFIRM=1 "
                                   "OMPI_MCA_rmaps_base_oversubscribe=1 " LEAT_MPIEXEC " " +
                                   std::to_string(ranks);
        arguments.insert(arguments.begin(), {"--input", small_});
        return run_by(before, LEAT_SKERRY_BANK_MPI_PROGRAM, std::move(arguments));
    }

    void expect_the_expected_results(const run_result& run, const std::string& what) {
        EXPECT_EQ(run.status, 0) << what << ": " << run.err;
        EXPECT_EQ(without_version(read_file(run.folder / "results.json")), expected_results())
            << what;
    }
};

// "MPI with 1, 2, 3 and 8 ranks: the same bytes", pictures included.
TEST_F(skerry_bank_mpi, gives_the_same_bytes_on_any_number_of_ranks) {
    const run_result threads = run({"--input", small_});
    for (const int ranks : {1, 2, 3, 8}) {
        const run_result many = run_ranks(ranks, {});
        expect_the_expected_results(many, std::to_string(ranks) + " ranks");
        for (const char* name : {"map.svg", "availability.svg"}) {
            EXPECT_EQ(read_file(many.folder / name), read_file(threads.folder / name)) << name;
        }
    }
}

// "saved on 8 ranks and resumed on 3: the same bytes". A rank is killed in replication 17; 7 ranks
// with two replications each at most leave four, then, that are finished and saved.
TEST_F(skerry_bank_mpi, killed_on_8_ranks_goes_on_on_3) {
    const std::string file = own_file("saved.json");
    const run_result killed =
        run_ranks(8, {"--checkpoint", file, "--checkpoint-every", "1", "--rehearse", "crash:17"});
    EXPECT_NE(killed.status, 0);
    EXPECT_NE(killed.err, "") << "mpirun says which rank died";
    EXPECT_FALSE(std::filesystem::exists(killed.folder / "results.json"));
    const std::string saved = read_file(file);
    EXPECT_GE(std::count(saved.begin(), saved.end(), '\n'), 9 + 4) << saved;
    expect_the_expected_results(run_ranks(3, {"--resume", file, "--rehearse", "error:0"}),
                                "on 3 ranks");
    expect_the_expected_results(run({"--input", small_, "--resume", file, "--rehearse", "error:0"}),
                                "on threads");
}

TEST_F(skerry_bank_mpi, fails_with_the_message_of_the_replication_that_failed) {
    for (const int ranks : {1, 3}) {
        const run_result failed = run_ranks(ranks, {"--rehearse", "error:17"});
        EXPECT_EQ(failed.status, 1);
        EXPECT_NE(failed.err.find("leat_skerry_bank_mpi: replication 17: failed on purpose"),
                  std::string::npos)
            << failed.err;
        EXPECT_FALSE(std::filesystem::exists(failed.folder / "results.json"));
    }
}

// A refusal comes from rank 0 alone, and nobody waits for ever.
TEST_F(skerry_bank_mpi, refuses_once_for_all_ranks) {
    const run_result refused = run_ranks(3, {"--threads", "2"});
    EXPECT_EQ(refused.status, 2);
    const std::string line = "leat_skerry_bank_mpi: unknown option: \"--threads\"";
    const std::size_t first = refused.err.find(line);
    EXPECT_NE(first, std::string::npos) << refused.err;
    EXPECT_EQ(refused.err.find(line, first + 1), std::string::npos) << refused.err;
}

} // namespace
} // namespace skerry_test
