#include "svg.hpp"

#include <algorithm>
#include <cmath>
#include <utility>

#include "text.hpp"

namespace skerry {
namespace {

std::string escaped(std::string_view words) {
    std::string safe;
    for (const char c : words) {
        switch (c) {
        case '&':
            safe += "&amp;";
            break;
        case '<':
            safe += "&lt;";
            break;
        case '>':
            safe += "&gt;";
            break;
        default:
            safe += c;
        }
    }
    return safe;
}

std::string attribute(const char* name, double value) {
    return std::string(" ") + name + "=\"" + coordinate(value) + "\"";
}

std::string closed(std::string_view style) { return " " + std::string(style) + "/>\n"; }

} // namespace

svg::svg(double width, double height, std::string_view title) {
    text_ = R"(<svg xmlns="http://www.w3.org/2000/svg" viewBox="0 0 )" + coordinate(width) + " " +
            coordinate(height) + "\"" + attribute("width", width) + attribute("height", height) +
            R"( font-family="'DejaVu Sans', Verdana, sans-serif" fill="#22303c" role="img">)"
            "\n<title>" +
            escaped(title) + "</title>\n";
    rectangle(0, 0, width, height, R"(fill="#ffffff")");
}

svg& svg::line(double x1, double y1, double x2, double y2, std::string_view style) {
    text_ += "<line" + attribute("x1", x1) + attribute("y1", y1) + attribute("x2", x2) +
             attribute("y2", y2) + closed(style);
    return *this;
}

svg& svg::rectangle(double x, double y, double width, double height, std::string_view style) {
    text_ += "<rect" + attribute("x", x) + attribute("y", y) + attribute("width", width) +
             attribute("height", height) + closed(style);
    return *this;
}

svg& svg::circle(double x, double y, double radius, std::string_view style) {
    text_ += "<circle" + attribute("cx", x) + attribute("cy", y) + attribute("r", radius) +
             closed(style);
    return *this;
}

svg& svg::ellipse(double x, double y, double rx, double ry, double degrees,
                  std::string_view style) {
    text_ += "<ellipse" + attribute("rx", rx) + attribute("ry", ry) + " transform=\"translate(" +
             coordinate(x) + " " + coordinate(y) + ") rotate(" + coordinate(degrees) + ")\"" +
             closed(style);
    return *this;
}

svg& svg::path(std::string_view data, std::string_view style) {
    text_ += "<path d=\"" + std::string(data) + "\"" + closed(style);
    return *this;
}

svg& svg::text(double x, double y, std::string_view words, double size, anchor at,
               std::string_view style) {
    const char* const where = at == anchor::start    ? "start"
                              : at == anchor::middle ? "middle"
                                                     : "end";
    text_ += "<text" + attribute("x", x) + attribute("y", y) + attribute("font-size", size) +
             " text-anchor=\"" + where + "\" " + std::string(style) + ">" + escaped(words) +
             "</text>\n";
    return *this;
}

std::string coordinate(double x) {
    std::string digits = fixed(x, 2);
    digits.erase(digits.find_last_not_of('0') + 1);
    if (digits.back() == '.') {
        digits.pop_back();
    }
    return digits == "-0" ? "0" : digits;
}

double round_step(double x) {
    const double power = std::pow(10, std::floor(std::log10(x)));
    const double ratio = x / power;
    return power * (ratio >= 5 ? 5 : ratio >= 2 ? 2 : 1);
}

int step_digits(double step) {
    return std::max(0, static_cast<int>(std::ceil(-std::log10(step) - 1e-9)));
}

} // namespace skerry
