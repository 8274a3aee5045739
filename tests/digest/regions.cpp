// Digests of the regions: points, and what is computed from the parameters.

#include "leat/regions.hpp"
#include "digest/digest.hpp"

#include <array>
#include <vector>

namespace digests {
namespace {

template <class Region>
void region(const char* name, const Region& where) {
    digest d;
    leat::xoshiro256_plus_plus g{20261201};
    for (int i = 0; i < 50000; ++i) {
        d.add(where(g));
    }
    d.add(where.measure());
    d.add(where.bounds().low);
    d.add(where.bounds().high);
    print(true, name, d);
}

} // namespace

void regions() {
    region("disk.unit", leat::disk{{0, 0}, 1});
    region("disk.far", leat::disk{{1e6, -3e5}, 0.7});
    region("ellipse.axes", leat::ellipse{{1, 2}, 5, 0.5});
    region("ellipse.turned", leat::ellipse{{-1, 0.3}, 5, 2, 0.6});
    region("segment", leat::segment<3>{{0, 0, -10}, {40, 5, -12}});
    region("polyline", leat::polyline<2>{
                           std::vector<std::array<double, 2>>{{0, 0}, {3, 0}, {3, 4}, {2.5, 4.1}}});
    region("box", leat::box<3>{{0, 0, -4}, {60, 12.5, 0}});
    region("annulus.thick", leat::annulus{{3, -4}, 0.1, 5});
    region("annulus.thin", leat::annulus{{3, -4}, 4.5, 5});
    region("sector", leat::sector{{1, 2}, 2, -1, 3.25});
    region("ball.3", leat::ball<3>{{1, 2, 3}, 2.5});
    region("ball.6", leat::ball<6>{{1, 2, 3, 4, 5, 6}, 2.5});
    region("sphere.2", leat::sphere<2>{{1, 2}, 2.5});
    region("sphere.3", leat::sphere<3>{{1, 2, 3}, 2.5});
    region("sphere.4", leat::sphere<4>{{1, 2, 3, 4}, 2.5});
    region("sphere.6", leat::sphere<6>{{1, 2, 3, 4, 5, 6}, 2.5});
    region("shell.thick", leat::shell<3>{{1, 2, 3}, 1, 2.5});
    region("shell.thin", leat::shell<3>{{1, 2, 3}, 2.25, 2.5});
    region("ellipsoid", leat::ellipsoid{{1, 2, 3}, {3, 0.25, 70}});
    region("cap", leat::cap{{1, 2, 3}, 2, {1, -2, 0.5}, 0.7});
    region("cylinder", leat::cylinder{{1, 2, 3}, {1, -2, 0.5}, 0.3, 20});
    region("cone", leat::cone{{1, 2, 3}, {1, -2, 0.5}, 0.3, 20});
    region("torus", leat::torus{{1, 2, 3}, 2, 0.7});
    region("rotation", leat::rotation{});
    region("affine_image", leat::affine_image{leat::ball<3>{{0, 0, 0}, 1},
                                              {{{2, 0, 0.5}, {0, 1, 1}, {0.25, 0, -1}}},
                                              {7, 8, 9}});
    region("triangle", leat::triangle{{0, 0}, {4, 0.5}, {1, 3}});
    region("tetrahedron", leat::tetrahedron{{1, 2, 3}, {4, 2, 3}, {1, 7, 3}, {2, 2, 5}});
    region("simplex.5", leat::simplex<5>{});
    using ring = std::vector<std::array<double, 2>>;
    const leat::polygon field{ring{{0, 0}, {6, -1}, {5, 4}, {3, 1.5}, {1, 4}},
                              {ring{{2, 0.5}, {2, 1}, {3, 1}}}};
    region("polygon", field);
    region("triangle_mesh", leat::triangle_mesh<>{{{0, 0, 0}, {1, 0, 0}, {0, 2, 0}, {0, 0, 3}},
                                                  {{0, 1, 2}, {0, 1, 3}, {0, 2, 3}, {1, 2, 3}}});
    region("either", leat::either{leat::disk{{0, 0}, 2}, leat::box<2>{{5, 0}, {7, 3}}});
    region("without", leat::without{leat::box<2>{{0, 0}, {4, 4}}, leat::disk{{2, 2}, 1}, 12.8584});
    region("float.triangle", leat::triangle<float>{{0, 0}, {4, 0.5}, {1, 3}});
    region("float.polygon", leat::polygon<float>{{{0, 0}, {6, -1}, {5, 4}, {3, 1.5}}});
    region("float.ball", leat::ball<3, float>{{1, 2, 3}, 2.5});
    region("float.sphere", leat::sphere<3, float>{{1, 2, 3}, 2.5});
    region("float.cylinder", leat::cylinder<float>{{1, 2, 3}, {1, -2, 0.5}, 0.3, 20});
    draws("direction.isotropic", leat::isotropic_direction{});
    draws("direction.in_cone", leat::direction_in_cone{{1, -2, 0.5}, 0.7});
    draws("direction.lambert", leat::lambert_direction{{1, -2, 0.5}});
    draws("direction.von_mises_fisher", leat::von_mises_fisher{{1, -2, 0.5}, 7});
    draws("direction.von_mises_fisher.weak", leat::von_mises_fisher{{1, -2, 0.5}, 0.25});
}

} // namespace digests
