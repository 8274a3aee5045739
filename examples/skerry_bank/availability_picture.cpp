#include "availability_picture.hpp"

#include <algorithm>
#include <array>
#include <cmath>

#include "svg.hpp"
#include "text.hpp"

namespace skerry {
namespace {

constexpr double width = 960;
constexpr double height = 560;
constexpr double plot_left = 84;
constexpr double plot_right = width - 32;
constexpr double plot_top = 128;
constexpr double plot_bottom = height - 96;
constexpr std::array colours = {"#c8553d", "#1f7a8c"};

/// Counts of one quantity, in percent, over bins that both designs share.
class histogram {
public:
    explicit histogram(const std::vector<replication_row>& rows) {
        double low = 100;
        double high = 0;
        for (const replication_row& row : rows) {
            for (const outcome& x : row.designs) {
                low = std::min(low, 100 * x.availability);
                high = std::max(high, 100 * x.availability);
            }
        }
        // 25 to 63 bins across what occurs; at least a thousandth of a point wide, so that values
        // that are all alike still make a picture.
        bin_ = round_step(std::max((high - low) / 25, 1e-3));
        first_ = std::floor(low / bin_) - 1;
        const auto bins = static_cast<std::size_t>(std::floor(high / bin_) - first_) + 2;
        for (std::size_t d = 0; d < counts_.size(); ++d) {
            counts_[d].resize(bins);
            for (const replication_row& row : rows) {
                const double x = 100 * row.designs[d].availability;
                ++counts_[d][static_cast<std::size_t>(std::floor(x / bin_) - first_)];
            }
            most_ = std::max(most_, *std::max_element(counts_[d].begin(), counts_[d].end()));
        }
    }
    [[nodiscard]] double bin() const { return bin_; }
    [[nodiscard]] double low() const { return first_ * bin_; }
    [[nodiscard]] double high() const {
        return (first_ + static_cast<double>(counts_[0].size())) * bin_;
    }
    [[nodiscard]] int most() const { return most_; }
    [[nodiscard]] const std::vector<int>& counts(std::size_t design) const {
        return counts_[design];
    }

private:
    double bin_ = 0;
    double first_ = 0; // the left edge is first_ * bin_
    std::array<std::vector<int>, 2> counts_;
    int most_ = 1;
};

/// The way from percent and counts to pixels.
struct frame {
    double low, high, top_count;
    [[nodiscard]] double x(double percent) const {
        return plot_left + (percent - low) / (high - low) * (plot_right - plot_left);
    }
    [[nodiscard]] double y(double count) const {
        return plot_bottom - count / top_count * (plot_bottom - plot_top);
    }
};

void draw_axes(svg& picture, const frame& at, double bin) {
    const double count_step = std::max(1.0, round_step(at.top_count / 5));
    for (double count = 0; count <= at.top_count; count += count_step) {
        const double y = at.y(count);
        picture.line(plot_left, y, plot_right, y, R"(stroke="#dfe6ea")");
        picture.text(plot_left - 10, y + 4.5, fixed(count, 0), 13, anchor::end);
    }
    const double step = std::max(bin, round_step((at.high - at.low) / 7));
    const int digits = step_digits(step);
    for (double k = std::ceil(at.low / step - 1e-9); k * step <= at.high + 1e-9 * step; ++k) {
        const double x = at.x(k * step);
        picture.line(x, plot_bottom, x, plot_bottom + 6, R"(stroke="#22303c")");
        picture.text(x, plot_bottom + 23, fixed(k * step, digits), 13, anchor::middle);
    }
    picture.line(plot_left, plot_bottom, plot_right, plot_bottom, R"(stroke="#22303c")");
    picture.text((plot_left + plot_right) / 2, plot_bottom + 48,
                 "availability of the farm over the horizon, %", 14, anchor::middle);
    picture.text(0, 0, "replications in a bin of " + shortest(bin) + " points", 14, anchor::middle,
                 "transform=\"translate(30 " + coordinate((plot_top + plot_bottom) / 2) +
                     ") rotate(-90)\"");
}

void draw_steps(svg& picture, const histogram& bars, const frame& at, std::size_t design) {
    std::string outline = "M " + coordinate(at.x(at.low)) + " " + coordinate(at.y(0));
    double edge = at.low;
    for (const int count : bars.counts(design)) {
        outline += " V " + coordinate(at.y(count));
        edge += bars.bin();
        outline += " H " + coordinate(at.x(edge));
    }
    outline += " V " + coordinate(at.y(0));
    const std::string colour = colours[design];
    picture.path(outline, "fill=\"" + colour + "\" fill-opacity=\"0.30\" stroke=\"" + colour +
                              "\" stroke-width=\"1.6\" stroke-linejoin=\"round\"");
}

void draw_mean(svg& picture, const frame& at, double percent, std::size_t design) {
    picture.line(at.x(percent), plot_top - 6, at.x(percent), plot_bottom,
                 "stroke=\"" + std::string(colours[design]) +
                     "\" stroke-width=\"2\" stroke-dasharray=\"6 4\"");
}

void draw_legend(svg& picture, const input& in, const study_summary& summary) {
    for (std::size_t d = 0; d < colours.size(); ++d) {
        const double y = 82 + 22 * static_cast<double>(d);
        const estimated_mean& x = summary.designs[d].availability;
        const std::string colour = colours[d];
        picture.rectangle(plot_left, y - 11, 22, 13,
                          "fill=\"" + colour + "\" fill-opacity=\"0.30\" stroke=\"" + colour +
                              "\" stroke-width=\"1.6\"");
        picture.text(plot_left + 32, y,
                     in.designs[d].name + ": mean " + fixed(100 * x.mean, 2) +
                         " % (95 % interval " + fixed(100 * x.interval.lower, 2) + " to " +
                         fixed(100 * x.interval.upper, 2) + "), dashed",
                     14);
    }
}

} // namespace

std::string availability_picture(const input& in, const std::vector<replication_row>& rows,
                                 const study_summary& summary) {
    const histogram bars(rows);
    const frame at{bars.low(), bars.high(), std::max(5.0, std::ceil(1.06 * bars.most()))};
    svg picture(width, height, "Distribution of availability, " + in.title);
    picture.text(plot_left, 34, in.title + ": availability of two designs", 22, anchor::start,
                 R"(font-weight="bold")");
    picture.text(plot_left, 56,
                 std::to_string(in.replications) + " replications of " +
                     std::to_string(in.horizon_days) +
                     " days, both designs under the same random events",
                 14);
    draw_legend(picture, in, summary);
    draw_axes(picture, at, bars.bin());
    for (std::size_t d = 0; d < colours.size(); ++d) {
        draw_steps(picture, bars, at, d);
    }
    for (std::size_t d = 0; d < colours.size(); ++d) {
        draw_mean(picture, at, 100 * summary.designs[d].availability.mean, d);
    }
    picture.text(plot_left, height - 16, "Planning illustration on invented data.", 12,
                 anchor::start, R"(fill="#5d6b76")");
    return picture.finish();
}

} // namespace skerry
