#include "weather.hpp"

#include <algorithm>

namespace skerry {

weather::weather(const farm& place, const leat::source& replication) {
    // Windows and waits have streams of their own: the k-th wait is the same whatever law the
    // windows follow.
    leat::stream windows = replication.stream("weather", "window");
    leat::stream waits = replication.stream("weather", "wait");
    seconds now = 0;
    seconds workable = 0;
    while (now < place.horizon) {
        const double length = place.window_hours(windows);
        const seconds end = std::min(place.horizon, now + from_hours(length));
        windows_.push_back({now, end, workable});
        workable += end - now;
        const double wait = place.wait_hours(waits);
        now = end + from_hours(wait);
    }
}

seconds weather::workable_before(seconds t) const {
    const auto after = std::upper_bound(
        windows_.begin(), windows_.end(), t,
        [](seconds time, const weather_window& window) { return time < window.begin; });
    if (after == windows_.begin()) {
        return 0;
    }
    const weather_window& window = *(after - 1);
    return window.workable_before + std::min(t, window.end) - window.begin;
}

seconds weather::done(seconds start, seconds work) const {
    if (start >= never) {
        return never;
    }
    const seconds target = workable_before(start) + work;
    const auto window = std::lower_bound(windows_.begin(), windows_.end(), target,
                                         [](const weather_window& w, seconds needed) {
                                             return w.workable_before + (w.end - w.begin) < needed;
                                         });
    return window == windows_.end() ? never : window->begin + (target - window->workable_before);
}

} // namespace skerry
