#include "rehearsal.hpp"

#include <csignal>
#include <stdexcept>
#include <utility>

namespace skerry {

replication_function rehearsed(replication_function run, const std::optional<rehearsal>& failure) {
    if (!failure) {
        return run;
    }
    return [run = std::move(run), failure = *failure](int replication) {
        if (replication == failure.replication) {
            if (failure.crash) {
                std::raise(SIGKILL); // nothing is cleaned up, as when the machine fails
            }
            throw std::runtime_error("failed on purpose, as --rehearse asked");
        }
        return run(replication);
    };
}

} // namespace skerry
