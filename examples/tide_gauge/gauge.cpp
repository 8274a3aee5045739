#include "gauge.hpp"

#include <algorithm>
#include <cmath>

namespace tide_gauge {
namespace {

constexpr int hours_a_month = 30 * 24;
constexpr int readings_an_hour = 10;

/// Metres above chart datum, so many hours after the start.
double tide(double hours) {
    constexpr double turn = 6.283185307179586;
    return 2.1 + 1.4 * std::sin(hours * turn / 12.4206) + 0.5 * std::sin(hours * turn / 12.0);
}

} // namespace

month_result observe(const instrument& gauge, int month, leat::stream& s) {
    month_result result{};
    double squares = 0;
    double highest = -100;
    double highest_read = -100;
    for (int hour = month * hours_a_month; hour < (month + 1) * hours_a_month; ++hour) {
        double level = 0;
        double read = 0;
        int sent = 0;
        for (int i = 0; i < readings_an_hour; ++i) {
            double x = tide(hour + static_cast<double>(i) / readings_an_hour);
            level += x / readings_an_hour;
            if (gauge.lost(s)) {
                ++result.readings_lost;
                continue;
            }
            x += gauge.waves(s);
            if (gauge.wake(s)) {
                ++result.wakes;
                x += gauge.wake_height(s);
            }
            read += x;
            ++sent;
        }
        if (sent == 0) {
            continue;
        }
        read /= sent;
        squares += (read - level) * (read - level);
        result.hours_off += std::abs(read - level) > 0.03 ? 1 : 0;
        highest = std::max(highest, level);
        highest_read = std::max(highest_read, read);
    }
    result.rms_error = 1000 * std::sqrt(squares / hours_a_month);
    result.top_overstated = 1000 * (highest_read - highest);
    return result;
}

} // namespace tide_gauge
