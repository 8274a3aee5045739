// The farm that is studied: where the turbines stand, and the laws of what happens to them.
//
// A farm is built once and only read afterwards: samplers hold no state that a draw could change,
// so all threads use these same ones.

#ifndef SKERRY_BANK_FARM_HPP
#define SKERRY_BANK_FARM_HPP

#include <string>
#include <vector>

#include <leat/distributions/exponential.hpp>
#include <leat/distributions/gamma.hpp>
#include <leat/distributions/lognormal.hpp>
#include <leat/distributions/weibull.hpp>
#include <leat/regions/ellipse.hpp>
#include <leat/streams/source.hpp>

#include "input.hpp"
#include "units.hpp"

namespace skerry {

/// Where a turbine stands.
struct site {
    double x_km, y_km;
    seconds sail; ///< one way from the port
};

/// The laws of one kind of component.
struct component_laws {
    std::string name;
    seconds spares;                 ///< from a failure until the spare part is in the port
    leat::weibull<> life_hours;     ///< of operating time
    leat::lognormal<> repair_hours; ///< of work in workable weather
};

struct farm {
    seconds horizon;
    std::vector<site> sites;
    std::vector<component_laws> components;
    leat::gamma<> window_hours;
    leat::exponential<> wait_hours;
};

/// The root of every stream of the study.
leat::source root_of(const input& in);

/// Places the turbines and sets up the laws. Throws refusal where the turbines do not fit.
farm build_farm(const input& in, const leat::source& study);

/// The lease as a region to draw from, in kilometres.
leat::ellipse<> region_of(const lease_input& lease);

} // namespace skerry

#endif
