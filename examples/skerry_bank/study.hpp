// A study from its input to what is handed over, but for the driver that runs its replications.
//
// Both programs, that for the threads of one machine and that for MPI, are this and a driver.

#ifndef SKERRY_BANK_STUDY_HPP
#define SKERRY_BANK_STUDY_HPP

#include <functional>

#include <leat/self_check/report.hpp>
#include <leat/streams/source.hpp>

#include "collector.hpp"
#include "farm.hpp"
#include "input_file.hpp"
#include "options.hpp"

namespace skerry {

/// A study that is ready to be run. Const, and shared by all threads.
class study {
public:
    /// Checks this build of leat, then places the turbines. Throws refusal, and leat's
    /// self_check_failed.
    explicit study(loaded_input in);

    /// Runs one replication: a pure function.
    [[nodiscard]] replication_row run(int replication) const;

    [[nodiscard]] const loaded_input& loaded() const { return in_; }
    [[nodiscard]] const input& in() const { return in_.values; }
    [[nodiscard]] const farm& place() const { return place_; }
    [[nodiscard]] const leat::source& root() const { return root_; }
    [[nodiscard]] const leat::self_check_report& build() const { return build_; }

private:
    leat::self_check_report build_; // first: nothing is drawn before it
    loaded_input in_;
    leat::source root_;
    farm place_;
};

/// The input that was chosen, with the options' values in place of the file's.
loaded_input chosen_input(const options& chosen);

/// What runs the replications that a collector misses.
using driver_function = std::function<void(const replication_function&, collector&)>;

/// Runs the study, or the one replication that was chosen; writes the files and prints the report.
void run_study(const study& made, const options& chosen, const driver_function& driver);

} // namespace skerry

#endif
