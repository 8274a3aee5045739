// Regions that there are none of, and points that do not fit.
//
// refused 1: leat::affine_image takes solids: the image of a surface is not uniform by area
// refused 2: leat::sphere<1> would be two points
// refused 3: leat: draw<Vec>(g) needs a Vec that the coordinates of a point in braces initialise

#include "leat/regions.hpp"
#include "leat/engines/xoshiro.hpp"

#if !defined(REFUSED)
#define REFUSED 0
#endif

struct plane_vector {
    double x, y;
};
struct space_vector {
    double x, y, z;
};

int main() {
    leat::xoshiro256_plus_plus g;

#if REFUSED == 1
    const leat::sphere solid{{0, 0}, 1};
#else
    const leat::disk solid{{0, 0}, 1};
#endif
    const leat::affine_image image{solid, {{{1, 2}, {0, 1}}}, {3, 4}};

#if REFUSED == 2
    const leat::sphere<1> round{{0}, 1};
#else
    const leat::sphere<2> round{{0, 0}, 1};
#endif

#if REFUSED == 3
    const auto v = leat::ball<3>{{0, 0, 0}, 1}.draw<plane_vector>(g);
#else
    const auto v = leat::ball<3>{{0, 0, 0}, 1}.draw<space_vector>(g);
#endif

    return image.contains({3, 4}) && round.contains({0, 1}) && v.x < 2 ? 0 : 1;
}
