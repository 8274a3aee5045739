#include "mpi.hpp"

#include <chrono>
#include <cstdlib>
#include <exception>
#include <thread>

#include <mpi.h>

#include "../flat_row.hpp"

namespace skerry {
namespace {

// What a message is.
constexpr int study_tag = 1;   // to a rank: the study's text
constexpr int task_tag = 2;    // to a rank: a replication to run, or `leave`
constexpr int row_tag = 3;     // to the dealer: a flat row
constexpr int failure_tag = 4; // to the dealer: the replication that failed, then why
constexpr int reason_tag = 5;

constexpr int leave = -1;
constexpr int dealer = 0;

void send_number(int number, int to, int tag) {
    MPI_Send(&number, 1, MPI_INT, to, tag, MPI_COMM_WORLD);
}

int receive_number(int from, int tag) {
    int number = 0;
    MPI_Recv(&number, 1, MPI_INT, from, tag, MPI_COMM_WORLD, MPI_STATUS_IGNORE);
    return number;
}

void send_text(const std::string& text, int to, int tag) {
    MPI_Send(text.data(), static_cast<int>(text.size()), MPI_CHAR, to, tag, MPI_COMM_WORLD);
}

std::string receive_text(int from, int tag) {
    MPI_Status status;
    MPI_Probe(from, tag, MPI_COMM_WORLD, &status);
    int size = 0;
    MPI_Get_count(&status, MPI_CHAR, &size);
    std::string text(static_cast<std::size_t>(size), ' ');
    MPI_Recv(text.data(), size, MPI_CHAR, from, tag, MPI_COMM_WORLD, MPI_STATUS_IGNORE);
    return text;
}

void send_row(const replication_row& row) {
    const flat_row numbers = flatten(row);
    MPI_Send(numbers.data(), static_cast<int>(numbers.size()), MPI_DOUBLE, dealer, row_tag,
             MPI_COMM_WORLD);
}

replication_row receive_row(int from) {
    flat_row numbers{};
    MPI_Recv(numbers.data(), static_cast<int>(numbers.size()), MPI_DOUBLE, from, row_tag,
             MPI_COMM_WORLD, MPI_STATUS_IGNORE);
    return unflatten(numbers);
}

/// Waits for any rank's message and says whose it is. Asleep between looks: MPI's own waiting would
/// keep a processor busy.
MPI_Status next_message() {
    MPI_Status status;
    int here = 0;
    while (MPI_Iprobe(MPI_ANY_SOURCE, MPI_ANY_TAG, MPI_COMM_WORLD, &here, &status), here == 0) {
        std::this_thread::sleep_for(std::chrono::microseconds(50));
    }
    return status;
}

/// Takes in what the next rank to be done with a replication sends, and says which rank.
int collect_one(collector& rows) {
    const MPI_Status message = next_message();
    const int from = message.MPI_SOURCE;
    if (message.MPI_TAG == row_tag) {
        rows.accept(receive_row(from));
    } else {
        const int replication = receive_number(from, failure_tag);
        rows.fail(replication, receive_text(from, reason_tag));
    }
    return from;
}

void run_and_send(const replication_function& run, int replication) {
    std::string why;
    try {
        const replication_row row = run(replication);
        send_row(row);
        return;
    } catch (const std::exception& e) {
        why = e.what();
    } catch (...) {
        why = "an unknown error";
    }
    send_number(replication, dealer, failure_tag);
    send_text(why, dealer, reason_tag);
}

} // namespace

mpi_session::mpi_session(int& count, char**& arguments) {
    MPI_Init(&count, &arguments);
    MPI_Comm_rank(MPI_COMM_WORLD, &rank_);
}

mpi_session::~mpi_session() { MPI_Finalize(); }

void mpi_session::abort(int status) {
    MPI_Abort(MPI_COMM_WORLD, status);
    std::abort(); // not reached: the standard's header does not say that MPI_Abort stays away
}

mpi_dealer::mpi_dealer() : ranks_(0) { MPI_Comm_size(MPI_COMM_WORLD, &ranks_); }

mpi_dealer::~mpi_dealer() {
    for (int rank = 1; rank < ranks_; ++rank) {
        send_number(leave, rank, task_tag);
    }
}

void mpi_dealer::announce(const std::string& study) const {
    for (int rank = 1; rank < ranks_; ++rank) {
        send_text(study, rank, study_tag);
    }
}

void mpi_dealer::run(const replication_function& run, collector& rows) const {
    const std::vector<int> tasks = rows.missing();
    if (ranks_ == 1) {
        for (const int replication : tasks) {
            attempt(run, rows, replication);
        }
        return;
    }
    std::size_t next = 0;
    int under_way = 0;
    const auto deal_to = [&](int rank) {
        if (next < tasks.size() && rows.wants(tasks[next])) {
            send_number(tasks[next], rank, task_tag);
            ++next;
            ++under_way;
        }
    };
    // Two at first: one to run, and one more so that nobody waits for the dealer.
    for (int round = 0; round < 2; ++round) {
        for (int rank = 1; rank < ranks_; ++rank) {
            deal_to(rank);
        }
    }
    while (under_way > 0) {
        const int rank = collect_one(rows);
        --under_way;
        deal_to(rank);
    }
}

void serve_mpi_dealer(const std::function<replication_function(const std::string&)>& set_up) {
    replication_function run;
    for (;;) {
        MPI_Status status;
        MPI_Probe(dealer, MPI_ANY_TAG, MPI_COMM_WORLD, &status);
        if (status.MPI_TAG == study_tag) {
            run = set_up(receive_text(dealer, study_tag));
        } else {
            const int replication = receive_number(dealer, task_tag);
            if (replication == leave) {
                return;
            }
            run_and_send(run, replication);
        }
    }
}

} // namespace skerry
