// The driver for MPI: rank 0 deals and collects, the other ranks run what they are dealt.
//
// Every rank is dealt its next replication when it is done with one: ranks on slower machines do
// fewer. The others read no file: rank 0 tells them the study, so that all run the same one. Rows
// go as doubles of MPI's own kind, which ranks of another byte order read as the same numbers.
//
// A replication that fails is reported to rank 0, where the study fails with its message. A rank
// that dies takes the job with it: MPI ends all the others, and mpirun ends with an error.

#ifndef SKERRY_BANK_MPI_HPP
#define SKERRY_BANK_MPI_HPP

#include <functional>
#include <string>

#include "../collector.hpp"

namespace skerry {

/// MPI from its start to its end. main makes one before anything else.
class mpi_session {
public:
    mpi_session(int& count, char**& arguments);
    ~mpi_session();
    mpi_session(const mpi_session&) = delete;
    mpi_session& operator=(const mpi_session&) = delete;

    [[nodiscard]] int rank() const { return rank_; }

    /// Ends all ranks at once, with this status: for what leaves the others waiting.
    [[noreturn]] static void abort(int status);

private:
    int rank_ = 0;
};

/// Rank 0's side. Where it ends, whatever the reason, the other ranks are sent home.
class mpi_dealer {
public:
    mpi_dealer();
    ~mpi_dealer();
    mpi_dealer(const mpi_dealer&) = delete;
    mpi_dealer& operator=(const mpi_dealer&) = delete;

    /// Tells the other ranks the study.
    void announce(const std::string& study) const;

    /// Runs all that `rows` misses: on the other ranks or, where there are none, here.
    void run(const replication_function& run, collector& rows) const;

private:
    int ranks_;
};

/// The side of all other ranks: set_up makes a study that was announced ready, then its
/// replications are run as they are dealt, until rank 0 sends this rank home.
void serve_mpi_dealer(const std::function<replication_function(const std::string&)>& set_up);

} // namespace skerry

#endif
