// A failure on purpose: to see beforehand that a job which fails is noticed, and gone on with.

#ifndef SKERRY_BANK_REHEARSAL_HPP
#define SKERRY_BANK_REHEARSAL_HPP

#include <optional>

#include "collector.hpp"
#include "options.hpp"

namespace skerry {

/// The same, but for the one replication that is to fail: it throws, or it kills its process.
replication_function rehearsed(replication_function run, const std::optional<rehearsal>& failure);

} // namespace skerry

#endif
