// A picture in SVG, written element by element. Lengths are pixels, y runs down.

#ifndef SKERRY_BANK_SVG_HPP
#define SKERRY_BANK_SVG_HPP

#include <string>
#include <string_view>

namespace skerry {

/// Where a text stands: its start, middle or end at the point given.
enum class anchor { start, middle, end };

class svg {
public:
    /// `title` is what a screen reader says.
    svg(double width, double height, std::string_view title);

    // `style` holds further attributes, as in R"(fill="none" stroke="#333")".
    svg& line(double x1, double y1, double x2, double y2, std::string_view style);
    svg& rectangle(double x, double y, double width, double height, std::string_view style);
    svg& circle(double x, double y, double radius, std::string_view style);
    /// Turned clockwise by `degrees` about its centre.
    svg& ellipse(double x, double y, double rx, double ry, double degrees, std::string_view style);
    /// A path in SVG's own notation, such as "M 10 10 L 20 20".
    svg& path(std::string_view data, std::string_view style);
    svg& text(double x, double y, std::string_view words, double size, anchor at = anchor::start,
              std::string_view style = "");

    /// The whole picture.
    [[nodiscard]] std::string finish() const { return text_ + "</svg>\n"; }

private:
    std::string text_;
};

/// A coordinate as SVG has it, to a hundredth of a pixel.
std::string coordinate(double x);

/// The largest of 1, 2 and 5 times a power of ten that is at most x > 0: a step for an axis.
double round_step(double x);

/// Digits after the point that multiples of such a step need.
int step_digits(double step);

} // namespace skerry

#endif
