// The shapes of a scatter file, each with its right sampler, and the area of it below any line.

#ifndef SCATTER_SHAPES_HPP
#define SCATTER_SHAPES_HPP

#include "leat/streams/source.hpp"

#include <nlohmann/json.hpp>

#include <array>
#include <cstddef>
#include <cstdint>
#include <functional>
#include <stdexcept>
#include <string>
#include <vector>

namespace scatter {

using point = std::array<double, 2>;
using sampler = std::function<point(leat::stream&)>;

/// An input that is not what it should be; the text says where.
class bad_input : public std::runtime_error {
public:
    using std::runtime_error::runtime_error;
};

/// A classic mistake, kept to show what it does.
struct wrong_sampler {
    std::string name;
    sampler draw;
};

struct shape {
    sampler draw;
    std::function<bool(const point&)> contains;
    /// The area of the part where coordinate `axis` is below t.
    std::function<double(std::size_t axis, double t)> area_below;
    point low; // corners of a box around it
    point high;
    std::string outline; // of SVG elements, in the shape's own coordinates
    std::vector<wrong_sampler> wrong;
};

/// A shape with a number of points to draw in it.
struct layer {
    std::string name;
    std::size_t points;
    shape where;
};

struct scene {
    std::string title;
    std::uint64_t seed;
    std::string unit;
    std::vector<layer> layers;
};

/// Throws bad_input, leat::error or an exception of nlohmann's.
scene read_scene(const nlohmann::json& root);

} // namespace scatter

#endif
