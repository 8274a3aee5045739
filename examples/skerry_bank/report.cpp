#include "report.hpp"

#include <algorithm>
#include <cmath>
#include <type_traits> // is_same_v

#include "text.hpp"

namespace skerry {
namespace {

std::string seed_text(const seed_value& seed) {
    return std::visit(
        [](const auto& value) {
            if constexpr (std::is_same_v<std::decay_t<decltype(value)>, std::string>) {
                return '"' + value + '"';
            } else {
                return std::to_string(value);
            }
        },
        seed);
}

std::string heading(const input& in) {
    return in.title + ": " + std::to_string(in.turbines.count) + " turbines of " +
           shortest(in.turbines.rated_mw) + " MW over " + std::to_string(in.horizon_days) +
           " days, seed " + seed_text(in.seed) + "\n";
}

std::string plus_minus(const estimated_mean& x, double unit, int digits) {
    return fixed(x.mean / unit, digits) + " +/- " + fixed(x.interval.half_width() / unit, digits);
}

/// Writes the lines of the table: a label, then a column for each design, wide enough for its name.
class line_writer {
public:
    explicit line_writer(const input& in) {
        for (const design_input& design : in.designs) {
            width_ = std::max(width_, design.name.size() + 3);
        }
    }
    std::string operator()(std::string_view label, std::string_view first,
                           std::string_view second) const {
        return "  " + left(label, 24) + right(first, width_) + right(second, width_) + "\n";
    }

private:
    std::size_t width_ = 24;
};

constexpr double percent = 0.01;       // of a share
constexpr double gigawatt_hour = 1000; // megawatt-hours

} // namespace

std::string table(const input& in, const study_summary& summary) {
    const design_summary& a = summary.designs[0];
    const design_summary& b = summary.designs[1];
    const auto gain_line = [](std::string_view label, const estimated_mean& x) {
        return "  " + left(label, 38) + right(plus_minus(x, percent, 3), 18) + "   [" +
               fixed(x.interval.lower / percent, 3) + ", " + fixed(x.interval.upper / percent, 3) +
               "]\n";
    };
    const line_writer line(in);
    std::string text = heading(in);
    text += std::to_string(in.replications) + " replications; means with 95 % intervals\n\n";
    text += line("", in.designs[0].name, in.designs[1].name);
    text += line("vessels", std::to_string(in.designs[0].vessels),
                 std::to_string(in.designs[1].vessels));
    text += line("availability, %", plus_minus(a.availability, percent, 2),
                 plus_minus(b.availability, percent, 2));
    text += line("lost energy, GWh", plus_minus(a.lost_energy_mwh, gigawatt_hour, 2),
                 plus_minus(b.lost_energy_mwh, gigawatt_hour, 2));
    text += line("vessels at sea, %", plus_minus(a.vessel_use, percent, 2),
                 plus_minus(b.vessel_use, percent, 2));
    text += line("failures", plus_minus(a.failures, 1, 1), plus_minus(b.failures, 1, 1));
    text += "\nAvailability, " + in.designs[1].name + " less " + in.designs[0].name +
            ", in percentage points\n";
    text += gain_line("both under the same random events", summary.gain);
    text += gain_line("each under random events of its own", summary.gain_apart);
    const double times = narrowing(summary);
    if (std::isfinite(times)) {
        text += "  The same events make the interval " + fixed(times, 1) +
                " times as narrow, which would otherwise\n  take " + fixed(times * times, 1) +
                " times as many replications.\n";
    }
    return text + "\n" + notice + "\n";
}

std::string row_table(const input& in, const replication_row& row) {
    const outcome& a = row.designs[0];
    const outcome& b = row.designs[1];
    const line_writer line(in);
    std::string text = heading(in);
    text += "Replication " + std::to_string(row.replication) + " of 0 to " +
            std::to_string(in.replications - 1) + ", run alone\n\n";
    text += line("", in.designs[0].name, in.designs[1].name);
    text += line("vessels", std::to_string(in.designs[0].vessels),
                 std::to_string(in.designs[1].vessels));
    text += line("availability, %", fixed(a.availability / percent, 2),
                 fixed(b.availability / percent, 2));
    text += line("lost energy, GWh", fixed(a.lost_energy_mwh / gigawatt_hour, 2),
                 fixed(b.lost_energy_mwh / gigawatt_hour, 2));
    text += line("vessels at sea, %", fixed(a.vessel_use / percent, 2),
                 fixed(b.vessel_use / percent, 2));
    text += line("failures", std::to_string(a.failures), std::to_string(b.failures));
    return text + "\n" + notice + "\n";
}

} // namespace skerry
