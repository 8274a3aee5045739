// How well the tide gauge in Skerry Bank harbour tells the level of an hour: the model.
// (Harbour, gauge and figures are invented.)

#ifndef TIDE_GAUGE_GAUGE_HPP
#define TIDE_GAUGE_GAUGE_HPP

#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/streams/stream.hpp"
#include "leat/uniform/open_interval.hpp"

namespace tide_gauge {

/// What happens to a reading. Lengths in metres.
struct instrument {
    leat::bernoulli lost{1.0 / 100};     // on its way
    leat::normal<> waves{0, 0.02};       // what the well lets through
    leat::bernoulli wake{1.0 / 250};     // of a boat
    leat::uniform<> wake_height{0, 0.6}; // lifts the reading
    friend bool operator==(const instrument&, const instrument&) = default;
};

/// What a month of hourly means shows, against the true mean of the same hour.
struct month_result {
    double rms_error;      ///< mm
    int hours_off;         ///< by more than 30 mm
    int readings_lost;     //
    int wakes;             //
    double top_overstated; ///< by how much the highest hour seems too high, mm
};

/// A month of 30 days, counted from 0, with the numbers that `s` gives.
month_result observe(const instrument& gauge, int month, leat::stream& s);

} // namespace tide_gauge

#endif
