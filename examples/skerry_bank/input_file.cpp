#include "input_file.hpp"

#include <set>
#include <utility>

#include "files.hpp"
#include "refusal.hpp"

namespace skerry {
namespace {

seed_value read_seed(const json_section& whole) {
    const json& found = whole.value("seed");
    if (found.is_number_unsigned()) {
        return found.get<std::uint64_t>();
    }
    if (found.is_string() && is_plain_text(found.get<std::string>())) {
        return found.get<std::string>();
    }
    throw refusal("seed", "must be a whole number from 0 to 18446744073709551615, "
                          "or a text of 1 to 60 characters");
}

lease_input read_lease(const json_section& at) {
    return {.centre_x_km = at.number("centre_x_km", -500, 500),
            .centre_y_km = at.number("centre_y_km", -500, 500),
            .semi_x_km = at.number("semi_x_km", 0.1, 100),
            .semi_y_km = at.number("semi_y_km", 0.1, 100),
            .angle_degrees = at.number("angle_degrees", -180, 180)};
}

component_input read_component(const json_section& at) {
    const json_section life = at.object("life", {"shape", "scale_days"});
    const json_section repair = at.object("repair", {"mean_hours", "sd_hours"});
    return {.name = at.text("name"),
            .spares_days = at.number("spares_days", 0, 1000),
            .life_shape = life.number("shape", 0.25, 20),
            .life_scale_days = life.number("scale_days", 1, 100'000),
            .repair_mean_hours = repair.number("mean_hours", 0.1, 10'000),
            .repair_sd_hours = repair.number("sd_hours", 0, 10'000)};
}

std::vector<component_input> read_components(const json_section& whole) {
    std::vector<component_input> components;
    std::set<std::string> names;
    for (const json_section& at :
         whole.objects("components", 1, 20, {"name", "spares_days", "life", "repair"})) {
        components.push_back(read_component(at));
        // The name is the address of the component's streams: two of a name would share draws.
        if (!names.insert(components.back().name).second) {
            throw refusal(at.path("name"), "must differ from the other components' names");
        }
    }
    return components;
}

weather_input read_weather(const json_section& at) {
    const json_section window = at.object("window", {"shape", "scale_hours"});
    const json_section wait = at.object("wait", {"mean_hours"});
    const json_section capacity = at.object("capacity_factor", {"workable", "waiting"});
    return {.window_shape = window.number("shape", 0.5, 100),
            .window_scale_hours = window.number("scale_hours", 0.5, 10'000),
            .wait_mean_hours = wait.number("mean_hours", 0.5, 10'000),
            .capacity_workable = capacity.number("workable", 0, 1),
            .capacity_waiting = capacity.number("waiting", 0, 1)};
}

std::array<design_input, 2> read_designs(const json_section& whole) {
    std::array<design_input, 2> designs;
    std::size_t i = 0;
    for (const json_section& at : whole.objects("designs", 2, 2, {"name", "vessels"})) {
        designs[i++] = {.name = at.text("name"), .vessels = at.whole("vessels", 1, 100)};
    }
    if (designs[0].name == designs[1].name) {
        throw refusal("designs[1].name", "must differ from the first design's name");
    }
    return designs;
}

/// The values of a document; the refusal names the key alone.
input read_document(const json& document) {
    const json_section whole(document, "",
                             {"title", "note", "seed", "replications", "horizon_days", "lease",
                              "port", "turbines", "components", "weather", "vessels", "designs"});
    if (!whole.value("note").is_string()) {
        throw refusal("note", "must be a text");
    }
    const json_section port = whole.object("port", {"x_km", "y_km"});
    const json_section turbines = whole.object("turbines", {"count", "rated_mw", "min_spacing_m"});
    return {
        .title = whole.text("title"),
        .seed = read_seed(whole),
        .replications = whole.whole("replications", least_replications, most_replications),
        .horizon_days = whole.whole("horizon_days", 1, 36'525),
        .lease = read_lease(whole.object(
            "lease", {"centre_x_km", "centre_y_km", "semi_x_km", "semi_y_km", "angle_degrees"})),
        .port = {.x_km = port.number("x_km", -500, 500), .y_km = port.number("y_km", -500, 500)},
        .turbines = {.count = turbines.whole("count", 1, 500),
                     .rated_mw = turbines.number("rated_mw", 0.1, 50),
                     .min_spacing_m = turbines.number("min_spacing_m", 0, 10'000)},
        .components = read_components(whole),
        .weather = read_weather(whole.object("weather", {"window", "wait", "capacity_factor"})),
        .vessel_speed_knots = whole.object("vessels", {"speed_knots"}).number("speed_knots", 1, 60),
        .designs = read_designs(whole)};
}

} // namespace

loaded_input parse_input(const json& document) { return {read_document(document), document}; }

loaded_input load_input(const std::string& file) {
    const std::string text = read_file(file);
    try {
        return parse_input(parse_json(text));
    } catch (const refusal& e) {
        throw refusal(file, e.what());
    }
}

void replace_seed(loaded_input& in, const seed_value& seed) {
    in.values.seed = seed;
    std::visit([&](const auto& value) { in.document["seed"] = value; }, seed);
}

void replace_replications(loaded_input& in, int replications) {
    in.values.replications = replications;
    in.document["replications"] = replications;
}

} // namespace skerry
