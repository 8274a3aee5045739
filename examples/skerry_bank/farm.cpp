#include "farm.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

#include "refusal.hpp"
#include "text.hpp"

namespace skerry {
namespace {

constexpr double km_per_nautical_mile = 1.852;

double distance_km(double dx, double dy) { return std::sqrt(dx * dx + dy * dy); }

/// Places the turbines one after another, each uniform in the lease and drawn again until it keeps
/// its distance from those before it (random sequential addition). Every turbine draws from its own
/// stream: one more at the end moves none of the others.
std::vector<site> place_turbines(const input& in, const leat::source& study) {
    constexpr int most_tries = 20'000;
    const leat::ellipse lease = region_of(in.lease);
    const double spacing_km = in.turbines.min_spacing_m / 1000;
    std::vector<site> sites;
    for (int t = 0; t < in.turbines.count; ++t) {
        leat::stream words = study.stream("site", t);
        int tries = 0;
        for (bool placed = false; !placed; ++tries) {
            if (tries == most_tries) {
                throw refusal("turbines.min_spacing_m",
                              "is " + shortest(in.turbines.min_spacing_m) + ", too wide for " +
                                  std::to_string(in.turbines.count) +
                                  " turbines in this lease: no place left for number " +
                                  std::to_string(t + 1));
            }
            const auto [x, y] = lease(words);
            placed = std::all_of(sites.begin(), sites.end(), [&, x = x, y = y](const site& other) {
                return distance_km(x - other.x_km, y - other.y_km) >= spacing_km;
            });
            if (placed) {
                const double speed_km_h = in.vessel_speed_knots * km_per_nautical_mile;
                const double way_km = distance_km(x - in.port.x_km, y - in.port.y_km);
                sites.push_back({x, y, from_hours(way_km / speed_km_h)});
            }
        }
    }
    return sites;
}

} // namespace

leat::source root_of(const input& in) {
    return std::visit([](const auto& seed) { return leat::source{seed}; }, in.seed);
}

leat::ellipse<> region_of(const lease_input& lease) {
    return leat::ellipse<>{{lease.centre_x_km, lease.centre_y_km},
                           lease.semi_x_km,
                           lease.semi_y_km,
                           lease.angle_degrees * (std::numbers::pi / 180)};
}

farm build_farm(const input& in, const leat::source& study) {
    std::vector<component_laws> components;
    for (const component_input& c : in.components) {
        components.push_back({.name = c.name,
                              .spares = std::llround(c.spares_days * static_cast<double>(day)),
                              .life_hours = leat::weibull<>{c.life_shape, c.life_scale_days * 24},
                              .repair_hours = leat::lognormal<>::from_mean_sd(c.repair_mean_hours,
                                                                              c.repair_sd_hours)});
    }
    return {.horizon = in.horizon_days * day,
            .sites = place_turbines(in, study),
            .components = std::move(components),
            .window_hours = leat::gamma<>{in.weather.window_shape, in.weather.window_scale_hours},
            .wait_hours = leat::exponential<>::from_mean(in.weather.wait_mean_hours)};
}

} // namespace skerry
