// Scatters points in the shapes of a JSON file, draws them, and tests that they are uniform.
//
//   leat_scatter [FILE] [--out FOLDER] [--compare]
//
// Writes FOLDER/scatter.csv and FOLDER/scatter.svg, and prints a table: for each layer the counts
// in strips of equal area, across and along, with the probability of a chi-square so far from its
// mean if points are uniform. --compare draws the classic wrong samplers of disk and ellipse beside
// the right one. Bad input: one line, exit status 2.

#include "shapes.hpp"

#include <boost/math/distributions/chi_squared.hpp>

#include <algorithm>
#include <cstdio>
#include <filesystem>
#include <fstream>
#include <iostream>
#include <string>
#include <vector>

namespace {

using namespace scatter;

constexpr std::size_t strips = 16; // at least 100 points in each, for the chi-square

/// Points in one panel of the picture.
struct panel {
    std::string name;
    std::string sampler;
    const layer* from;
    std::vector<point> points;
};

std::vector<panel> draw(const scene& s, bool compare) {
    const leat::source study{s.seed};
    std::vector<panel> panels;
    for (const layer& l : s.layers) {
        const auto add = [&](const std::string& name, const sampler& draw_point) {
            panel p{l.name, name, &l, std::vector<point>(l.points)};
            leat::stream g = study.stream(l.name, name);
            for (point& q : p.points) {
                q = draw_point(g);
            }
            panels.push_back(std::move(p));
        };
        add("right", l.where.draw);
        if (compare) {
            for (const wrong_sampler& w : l.where.wrong) {
                add(w.name, w.draw);
            }
        }
    }
    return panels;
}

/// The counts in strips of equal area across an axis.
std::vector<std::size_t> count_in_strips(const panel& p, std::size_t axis) {
    const shape& where = p.from->where;
    const double area = where.area_below(axis, where.high[axis]);
    std::vector<double> cuts;
    for (std::size_t i = 1; i < strips; ++i) {
        const double wanted = area * static_cast<double>(i) / strips;
        double low = where.low[axis];
        double high = where.high[axis];
        for (int halving = 0; halving < 60; ++halving) {
            const double middle = low + (high - low) / 2;
            (where.area_below(axis, middle) < wanted ? low : high) = middle;
        }
        cuts.push_back(high);
    }
    std::vector<std::size_t> counts(strips, 0);
    for (const point& q : p.points) {
        const auto cut = std::upper_bound(cuts.begin(), cuts.end(), q[axis]);
        ++counts[static_cast<std::size_t>(cut - cuts.begin())];
    }
    return counts;
}

void print_table(const std::vector<panel>& panels) {
    for (const panel& p : panels) {
        std::printf("%s, %s sampler, %zu points\n", p.name.c_str(), p.sampler.c_str(),
                    p.points.size());
        for (std::size_t axis = 0; axis < 2; ++axis) {
            const std::vector<std::size_t> counts = count_in_strips(p, axis);
            const double expected = static_cast<double>(p.points.size()) / strips;
            double sum = 0;
            std::printf("  %c ", axis == 0 ? 'x' : 'y');
            for (const std::size_t n : counts) {
                const double excess = static_cast<double>(n) - expected;
                sum += excess * excess / expected;
                std::printf(" %4zu", n);
            }
            const boost::math::chi_squared law(strips - 1);
            const double chance = cdf(complement(law, sum));
            std::printf("   expected %.1f, chi-square %.1f, p %.2g%s\n", expected, sum, chance,
                        chance < 1e-6 ? "  NOT UNIFORM" : "");
        }
    }
}

void write_csv(const std::vector<panel>& panels, const std::filesystem::path& path) {
    std::ofstream out(path);
    out << "layer,sampler,x,y\n";
    out.precision(17);
    for (const panel& p : panels) {
        for (const point& q : p.points) {
            out << '"' << p.name << "\",\"" << p.sampler << "\"," << q[0] << ',' << q[1] << '\n';
        }
    }
    if (!out.flush()) {
        throw bad_input("cannot write " + path.string());
    }
}

std::string escaped(const std::string& text) {
    std::string out;
    for (const char c : text) {
        out += c == '&' ? "&amp;" : c == '<' ? "&lt;" : c == '>' ? "&gt;" : std::string(1, c);
    }
    return out;
}

/// One square panel beside the other, four to a row; y points up.
void write_svg(const scene& s, const std::vector<panel>& panels,
               const std::filesystem::path& path) {
    constexpr double side = 400;
    const std::size_t columns = std::min<std::size_t>(panels.size(), 4);
    const std::size_t rows = (panels.size() + columns - 1) / columns;
    std::ofstream out(path);
    out << "<svg xmlns=\"http://www.w3.org/2000/svg\" font-family=\"sans-serif\" width=\""
        << side * static_cast<double>(columns) << "\" height=\""
        << 40 + (side + 30) * static_cast<double>(rows) << "\">\n<text x=\"10\" y=\"26\" "
        << "font-size=\"20\">" << escaped(s.title) << "</text>\n";
    for (std::size_t i = 0; i < panels.size(); ++i) {
        const panel& p = panels[i];
        const shape& where = p.from->where;
        const double width = std::max(where.high[0] - where.low[0], where.high[1] - where.low[1]);
        const double scale = (side - 40) / width;
        const double x = side * static_cast<double>(i % columns) + 20;
        const double y = 40 + (side + 30) * static_cast<double>(i / columns) + 24;
        char label[32];
        std::snprintf(label, sizeof label, "%.3g", width);
        out << "<text x=\"" << x << "\" y=\"" << y - 8 << "\" font-size=\"11\">" << escaped(p.name)
            << ": " << escaped(p.sampler) << " (" << label << ' ' << escaped(s.unit)
            << " wide)</text>\n<g transform=\"translate(" << x << ' ' << y + side - 40 << ") scale("
            << scale << ' ' << -scale << ") translate(" << -where.low[0] << ' ' << -where.low[1]
            << ")\">\n<g fill=\"#e8f1f5\" "
            << "fill-rule=\"evenodd\" stroke=\"#31606f\" stroke-width=\"" << 1 / scale << "\">"
            << where.outline << "</g>\n<g fill=\"#b0413e\">\n";
        for (const point& q : p.points) {
            out << "<circle cx=\"" << q[0] << "\" cy=\"" << q[1] << "\" r=\"" << 0.8 / scale
                << "\"/>\n";
        }
        out << "</g>\n</g>\n";
    }
    out << "</svg>\n";
    if (!out.flush()) {
        throw bad_input("cannot write " + path.string());
    }
}

} // namespace

int main(int argc, char** argv) {
    try {
        std::filesystem::path file = LEAT_SCATTER_DIR "/scatter.json";
        std::filesystem::path folder = ".";
        bool compare = false;
        for (int i = 1; i < argc; ++i) {
            const std::string argument = argv[i];
            if (argument == "--compare") {
                compare = true;
            } else if (argument == "--out" && i + 1 < argc) {
                folder = argv[++i];
            } else if (!argument.empty() && argument[0] != '-') {
                file = argument;
            } else {
                throw bad_input("usage: leat_scatter [FILE] [--out FOLDER] [--compare]");
            }
        }
        std::ifstream in(file);
        if (!in) {
            throw bad_input("cannot read " + file.string());
        }
        const scene s = read_scene(nlohmann::json::parse(in));
        const std::vector<panel> panels = draw(s, compare);
        std::filesystem::create_directories(folder);
        write_csv(panels, folder / "scatter.csv");
        write_svg(s, panels, folder / "scatter.svg");
        print_table(panels);
    } catch (const std::exception& e) {
        std::string line = e.what();
        std::replace(line.begin(), line.end(), '\n', ' ');
        std::cerr << "scatter: " << line << '\n';
        return 2;
    }
}
