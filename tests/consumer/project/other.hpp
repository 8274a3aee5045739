// What the consumer's two files share.

#ifndef CONSUMER_OTHER_HPP
#define CONSUMER_OTHER_HPP

#include "leat/distributions/exponential.hpp"
#include "leat/regions/disk.hpp"
#include "leat/streams/source.hpp"

#include <array>

/// A wait and a place, drawn from the replication's own stream.
struct event {
    double wait;
    std::array<double, 2> place;

    friend bool operator==(const event&, const event&) = default;
};

inline event draw_event(const leat::source& study, int replication) {
    leat::stream s = study.stream("consumer", replication);
    const leat::exponential wait{0.5};
    const leat::disk place{{1, 2}, 3};
    event e{};
    e.wait = wait(s);
    e.place = place(s);
    return e;
}

/// The same, from the other file.
event draw_elsewhere(const leat::source& study, int replication);

#endif
