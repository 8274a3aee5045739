// The weather of one replication: windows in which vessels can work, and the waits between them.

#ifndef SKERRY_BANK_WEATHER_HPP
#define SKERRY_BANK_WEATHER_HPP

#include <vector>

#include <leat/streams/source.hpp>

#include "farm.hpp"
#include "units.hpp"

namespace skerry {

/// A stretch of workable weather, from `begin` up to but not at `end`.
struct weather_window {
    seconds begin, end;
    seconds workable_before; ///< workable time before `begin`
};

class weather {
public:
    /// Draws windows and waits in turn, beginning with a window, until the horizon is covered.
    weather(const farm& place, const leat::source& replication);

    /// Workable time from the start to t.
    [[nodiscard]] seconds workable_before(seconds t) const;

    /// When a job that starts at `start` and needs `work` > 0 of workable time is done; `never`
    /// where the horizon comes first.
    [[nodiscard]] seconds done(seconds start, seconds work) const;

    [[nodiscard]] const std::vector<weather_window>& windows() const { return windows_; }

private:
    std::vector<weather_window> windows_;
};

} // namespace skerry

#endif
