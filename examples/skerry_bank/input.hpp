// The study's input, as the model sees it.
//
// input_file.hpp reads it and checks every value; nothing after that checks one again.

#ifndef SKERRY_BANK_INPUT_HPP
#define SKERRY_BANK_INPUT_HPP

#include <array>
#include <cstdint>
#include <string>
#include <variant>
#include <vector>

namespace skerry {

/// A study's seed: a number, or a text that somebody can remember.
using seed_value = std::variant<std::uint64_t, std::string>;

/// The elliptical lease that the turbines stand in.
struct lease_input {
    double centre_x_km, centre_y_km; ///< east and north of the chart's origin
    double semi_x_km, semi_y_km;     ///< half-axes, before the turn
    double angle_degrees;            ///< turned anticlockwise
    friend bool operator==(const lease_input&, const lease_input&) = default;
};

struct port_input {
    double x_km, y_km;
    friend bool operator==(const port_input&, const port_input&) = default;
};

struct turbines_input {
    int count;
    double rated_mw;
    double min_spacing_m; ///< no two turbines stand nearer than this
    friend bool operator==(const turbines_input&, const turbines_input&) = default;
};

/// One kind of component, of which every turbine has one.
struct component_input {
    std::string name;   ///< part of the address of its streams
    double spares_days; ///< from a failure until the spare part is in the port
    double life_shape;  ///< Weibull, of operating time
    double life_scale_days;
    double repair_mean_hours; ///< lognormal, of work in workable weather
    double repair_sd_hours;
    friend bool operator==(const component_input&, const component_input&) = default;
};

/// Workable weather comes in windows, with waits between them.
struct weather_input {
    double window_shape, window_scale_hours; ///< gamma
    double wait_mean_hours;                  ///< exponential
    double capacity_workable; ///< what a running turbine yields in a window, share of rated power
    double capacity_waiting;  ///< and between windows, when it blows
    friend bool operator==(const weather_input&, const weather_input&) = default;
};

struct design_input {
    std::string name;
    int vessels;
    friend bool operator==(const design_input&, const design_input&) = default;
};

struct input {
    std::string title;
    seed_value seed;
    int replications;
    int horizon_days;
    lease_input lease;
    port_input port;
    turbines_input turbines;
    std::vector<component_input> components;
    weather_input weather;
    double vessel_speed_knots;
    std::array<design_input, 2> designs; ///< the second is compared with the first
};

inline constexpr int least_replications = 2; ///< an interval needs two
inline constexpr int most_replications = 1'000'000;

} // namespace skerry

#endif
