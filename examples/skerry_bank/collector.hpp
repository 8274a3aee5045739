// Where the rows of a study come together, whoever ran them and in whatever order they come.
//
// A replication is a function of its number alone, so the finished rows are all there is to know
// about a study half done: they are kept by number, a checkpoint saves them, and a run goes on from
// them with another driver, or another number of threads or processes, as if nothing had happened.

#ifndef SKERRY_BANK_COLLECTOR_HPP
#define SKERRY_BANK_COLLECTOR_HPP

#include <functional>
#include <mutex>
#include <optional>
#include <string>
#include <vector>

#include "rows.hpp"

namespace skerry {

/// Runs one replication. Any thread of any process may call it, for any number.
using replication_function = std::function<replication_row(int)>;

/// The rows that are finished, each at its replication's number.
using row_set = std::vector<std::optional<replication_row>>;

/// What is done beside collecting; an empty function is not called.
struct collector_duties {
    std::function<void(const row_set&)> save; ///< keeps what is finished
    int save_every = 0;                       ///< after so many rows more
    std::function<void(int)> progress;        ///< told how many are finished
};

/// All members may be called by any number of threads at once, but for finish().
class collector {
public:
    collector(row_set rows, collector_duties duties);

    /// The replications still to be run, in order.
    [[nodiscard]] std::vector<int> missing() const;

    /// Whether this replication should still be run. Once one has failed, only those of a lower
    /// number are: so the failure reported is the same on every driver.
    [[nodiscard]] bool wants(int replication) const;

    /// Takes a row. Should it not be kept, for lack of memory or of space on a disk, the study
    /// fails.
    void accept(const replication_row& row) noexcept;

    /// Notes that a replication failed.
    void fail(int replication, const std::string& why) noexcept;

    /// Notes that the study cannot go on.
    void stop(const std::string& why) noexcept;

    /// All rows, in order. Where something failed: saves what is finished, then throws
    /// std::runtime_error with the failure of the lowest number.
    std::vector<replication_row> finish();

private:
    void save(std::unique_lock<std::mutex>& lock);
    void note(int number, const std::string& why) noexcept;

    mutable std::mutex mutex_; // for all that follows
    row_set rows_;
    const collector_duties duties_;
    int finished_ = 0;
    int unsaved_ = 0;
    bool saving_ = false;
    std::optional<int> failed_; // the lowest number that failed; below 0 where all must stop
    std::string failure_;
};

/// Runs one replication, if it is still wanted, and hands over what comes of it.
void attempt(const replication_function& run, collector& rows, int replication) noexcept;

} // namespace skerry

#endif
