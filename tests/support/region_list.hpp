// The regions that every region's test goes over: each_region_sample(visit) calls
// visit(name, region) with regions of every size and place that a type must get right. A new region
// joins by its lines here; disk and ellipses have lists of their own in requirements_test.cpp.

#ifndef LEAT_TESTS_SUPPORT_REGION_LIST_HPP
#define LEAT_TESTS_SUPPORT_REGION_LIST_HPP

#include "leat/regions.hpp"

#include <array>
#include <initializer_list>
#include <vector>

namespace leat_test {

template <class Visit, class Region>
void visit_all(Visit& visit, const char* name, const std::vector<Region>& regions) {
    for (const Region& region : regions) {
        visit(name, region);
    }
}

/// Lines and planes.
template <class Visit>
void each_flat_region(Visit visit) {
    using namespace leat;
    visit_all(visit, "segment<1>", std::vector{segment<1>{{-1}, {3}}});
    visit_all(visit, "segment<2>",
              std::vector{segment{{0, 0}, {3, 4}}, segment<2>{{1e15, 3}, {1e15 + 300, 3}},
                          segment<2>{{-1.7e308, 1}, {1.7e308, -1}}, segment<2>{{5, 7}, {5, 9}},
                          segment<2>{{0, 0}, {0, 0x1p-960}}});
    visit_all(visit, "segment<3, float>",
              std::vector{segment<3, float>{{0, 0, 0}, {1, -2, 0.1}},
                          segment<3, float>{{-3e38, 0, 5}, {3e38, 1, 5}}});
    using plane = std::vector<std::array<double, 2>>;
    visit_all(visit, "polyline<2>",
              std::vector{polyline<2>{plane{{0, 0}, {1, 0}, {1, 0}, {1, 1}, {-3, 2}}},
                          polyline<2>{plane{{0, 0}, {1e300, 0}, {1e300, 1}, {-1e300, -1e299}}},
                          polyline<2>{plane{{0, 0}, {1e-280, 0}, {1e-280, 1e-281}}}});
    visit_all(visit, "polyline<3, float>",
              std::vector{polyline<3, float>{
                  std::vector<std::array<float, 3>>{{0, 0, 0}, {1, 2, 3}, {1, 2, 4}}}});
    visit_all(visit, "box<1>", std::vector{box<1>{{-2}, {5}}});
    visit_all(visit, "box<2>",
              std::vector{box{{0, 0}, {1, 1}}, box<2>{{-1e308, 0}, {1e308, 1e-280}},
                          box<2>{{1e15, -1}, {1e15 + 64, 1}}, box<2>{{0, 0}, {0x1p-960, 1}}});
    visit_all(visit, "box<3, float>",
              std::vector{box<3, float>{{0, 0, -4}, {60, 12, 0}},
                          box<3, float>{{-3e38, -1, -1}, {3e38, 1, 0}}});
    visit_all(visit, "annulus",
              std::vector{annulus{{0, 0}, 1, 2}, annulus{{3, -4}, 0.1, 5}, annulus{{0, 0}, 0, 1},
                          annulus{{1, 1}, 1, 1 + 1e-12}, annulus{{0, 0}, 1e300, 1.5e308},
                          annulus{{0, 0}, 0x1p-960, 0x1p-959}, annulus{{1e15, 1e15}, 40, 80}});
    visit_all(visit, "annulus<float>",
              std::vector{annulus<float>{{0, 0}, 1, 2}, annulus<float>{{5, 5}, 0.25, 3}});
    visit_all(visit, "sector",
              std::vector{sector{{0, 0}, 1, 0, 1}, sector{{3, -4}, 2, 0.5, 6},
                          sector{{0, 0}, 1e300, -1e-9, 1e-9}, sector{{1, 2}, 2, -1, 5.25},
                          sector{{0, 0}, 1, 3.0, 3.0 + 6.283185307179586},
                          sector{{1e15, 1e15}, 64, -2, -1}, sector{{0, 0}, 0x1p-960, 2, 4}});
    visit_all(visit, "sector<float>",
              std::vector{sector<float>{{0, 0}, 1, 0, 1}, sector<float>{{1, 2}, 2, -1, 5.25}});
    visit_all(visit, "affine_image<box<2>>",
              std::vector{affine_image{box{{0, 0}, {2, 1}}, {{{1, 0.5}, {0, 1}}}, {3, 4}},
                          affine_image{box{{0, 0}, {1, 1}}, {{{0, -1e100}, {1e-100, 0}}}, {0, 0}},
                          affine_image{box{{1, 1}, {2, 2}}, {{{1, 1}, {1, 1.0001}}}, {-2, -2}}});
    visit_all(visit, "affine_image<disk<float>>",
              std::vector{affine_image{disk<float>{{0, 0}, 1}, {{{3, 1}, {0, -2}}}, {1, 1}}});
}

/// Round shapes of space and above.
template <class Visit>
void each_round_region(Visit visit) {
    using namespace leat;
    visit_all(visit, "ball<1>", std::vector{ball<1>{{2}, 3}});
    visit_all(visit, "ball<2>", std::vector{ball<2>{{2, 5}, 3}});
    visit_all(visit, "ball<3>",
              std::vector{ball{{0, 0, 0}, 1}, ball<3>{{1e15, 0, -1e15}, 32},
                          ball<3>{{0, 0, 0}, 1.5e308}, ball<3>{{0, 0, 0}, 0x1p-960}});
    visit_all(visit, "ball<3, float>",
              std::vector{ball<3, float>{{0, 0, 1}, 2}, ball<3, float>{{0, 0, 0}, 0x1p-100}});
    visit_all(visit, "ball<7>",
              std::vector{ball<7>{{0, 0, 0, 0, 0, 0, 0}, 1e300},
                          ball<7>{{1e15, 1e15, 1e15, 1e15, 1e15, 1e15, 1e15}, 33}});
    visit_all(visit, "sphere<2>", std::vector{sphere{{0, 0}, 1}, sphere<2>{{1e15, 3}, 50}});
    visit_all(visit, "sphere<3>",
              std::vector{sphere{{0, 0, 0}, 1}, sphere<3>{{1, 2, 3}, 1e-3},
                          sphere<3>{{0, 0, 0}, 1.7e308}, sphere<3>{{0, 0, 0}, 0x1p-960},
                          sphere<3>{{1e15, -1e15, 0}, 32}});
    visit_all(visit, "sphere<3, float>", std::vector{sphere<3, float>{{0, 0, 4}, 2}});
    visit_all(visit, "sphere<4>", std::vector{sphere{{0, 0, 0, 0}, 1}});
    visit_all(visit, "sphere<6>", std::vector{sphere{{0, 0, 0, 0, 0, 0}, 1}});
    visit_all(visit, "shell<3>",
              std::vector{shell{{0, 0, 0}, 1, 2}, shell<3>{{1, 2, 3}, 0.5, 0.75},
                          shell<3>{{0, 0, 0}, 1, 1 + 1e-12}, shell<3>{{0, 0, 0}, 0, 1e308}});
    visit_all(visit, "shell<5, float>", std::vector{shell<5, float>{{0, 0, 0, 0, 0}, 1, 2}});
    visit_all(visit, "ellipsoid",
              std::vector{ellipsoid{{0, 0, 0}, {3, 2, 1}}, ellipsoid{{1, 2, 3}, {1e300, 0.5, 1}},
                          ellipsoid{{0, 0, 0}, {0x1p-960, 1, 1.5e308}}});
    visit_all(visit, "ellipsoid<float>", std::vector{ellipsoid<float>{{0, 0, 0}, {3, 2, 1}}});
    visit_all(visit, "cap",
              std::vector{cap{{0, 0, 0}, 1, {0, 0, 1}, 0.5}, cap{{1, 2, 3}, 2, {1, -2, 0.5}, 2.5},
                          cap{{0, 0, 0}, 1, {0, 0, -1}, 1e-9},
                          cap{{0, 0, 0}, 1e300, {1e-200, 1e200, 1e200}, 1},
                          cap{{5, 5, 5}, 1, {1, 1, 1}, 3.141592653589793}});
    visit_all(visit, "cap<float>", std::vector{cap<float>{{0, 0, 0}, 1, {0, 3, 1}, 0.5}});
    visit_all(visit, "cylinder",
              std::vector{cylinder{{0, 0, 0}, {0, 0, 1}, 1, 2},
                          cylinder{{1, 2, 3}, {1, -2, 0.5}, 0.1, 20},
                          cylinder{{0, 0, 0}, {0, 0, 1}, 1e100, 1e-10},
                          cylinder{{-1e308, -1e308, -1e308}, {1, 1, 1}, 5e307, 1.5e308},
                          cylinder{{0, 0, 0}, {-1, 1e-20, 0}, 0x1p-960, 0x1p-959}});
    visit_all(visit, "cylinder<float>", std::vector{cylinder<float>{{0, 0, 1}, {1, 0, 1}, 1, 2}});
    visit_all(visit, "cone",
              std::vector{cone{{0, 0, 0}, {0, 0, 1}, 1, 2}, cone{{1, 2, 3}, {1, -2, 0.5}, 0.1, 20},
                          cone{{0, 0, 0}, {0, 0, -5}, 1e100, 1e-10},
                          cone{{0, 0, 0}, {1, 2, 2}, 1e300, 1e299}});
    visit_all(visit, "cone<float>", std::vector{cone<float>{{0, 0, 1}, {1, 0, 1}, 1, 2}});
    visit_all(visit, "torus",
              std::vector{torus{{0, 0, 0}, 2, 0.5}, torus{{1, 2, 3}, 1, 1},
                          torus{{0, 0, 0}, 1e300, 1e290}, torus{{0, 0, 0}, 0x1p-958, 0x1p-960}});
    visit_all(visit, "torus<float>", std::vector{torus<float>{{0, 0, 0}, 2, 0.5}});
    visit_all(visit, "rotation", std::vector{rotation{}});
    visit_all(visit, "rotation<float>", std::vector{rotation<float>{}});
    visit_all(visit, "affine_image<ball<3>>",
              std::vector{affine_image{
                  ball{{0, 0, 0}, 1}, {{{2, 0, 0.5}, {0, 1, 1}, {0, 0, -1}}}, {7, 8, 9}}});
}

/// A predicate for `rejection`.
struct signs_differ {
    bool operator()(const std::array<double, 2>& p) const { return p[0] * p[1] < 0; }
    friend bool operator==(const signs_differ&, const signs_differ&) = default;
};

/// Shapes with corners, and those made of other regions.
template <class Visit>
void each_cornered_region(Visit visit) {
    using namespace leat;
    visit_all(visit, "triangle",
              std::vector{triangle{{0, 0}, {4, 0}, {1, 3}}, triangle{{0, 0}, {0, 1}, {1, 0}},
                          triangle{{1e15, 0}, {1e15 + 300, 1}, {1e15, 300}},
                          triangle{{-1.5e308, 0}, {1.5e308, 0}, {0, 1.7e308}},
                          triangle{{0, 0}, {0x1p-959, 0}, {0, 0x1p-959}},
                          triangle{{0, 0}, {1, 1}, {1, 1 + 1e-11}}});
    visit_all(visit, "triangle<float>",
              std::vector{triangle<float>{{0, 0}, {4, 0}, {1, 3}},
                          triangle<float>{{1e6, 0}, {1e6 + 100, 1}, {1e6, 50}}});
    visit_all(visit, "tetrahedron",
              std::vector{tetrahedron{{0, 0, 0}, {1, 0, 0}, {0, 1, 0}, {0, 0, 1}},
                          tetrahedron{{1e100, 0, 0}, {0, 1, 0}, {0, 0, 1e-10}, {0, 0, 0}}});
    visit_all(visit, "tetrahedron<float>",
              std::vector{tetrahedron<float>{{9, 0, 0}, {1, 0, 0}, {0, 1, 0}, {0, 0, 1}}});
    visit_all(visit, "simplex<1>", std::vector{simplex<1>{}});
    visit_all(visit, "simplex<3>", std::vector{simplex<3>{}});
    visit_all(visit, "simplex<3, float>", std::vector{simplex<3, float>{}});
    visit_all(visit, "simplex<2>",
              std::vector{simplex<2>{{{{1e15, 0}, {1e15 + 1e4, 0}, {1e15, 1}}}}});
    using ring = std::vector<std::array<double, 2>>;
    const ring square{{0, 0}, {0, 4}, {4, 4}, {4, 0}};
    const ring hole{{1, 1}, {2, 1}, {2, 3}};
    ring comb;
    for (int i = 0; i < 1000; ++i) {
        comb.push_back({static_cast<double>(i), i % 2 == 0 ? 1e-3 : 1.0});
    }
    comb.push_back({999, 0});
    comb.push_back({0, 0});
    visit_all(visit, "polygon",
              std::vector{polygon{square}, polygon{square, {hole}}, polygon{comb},
                          polygon<>{{{0, 0}, {1.7e308, 0}, {-1.7e308, 1e300}}},
                          polygon<>{{{1e15, 0}, {1e15 + 300, 1}, {1e15, 300}}},
                          polygon<>{{{0, 0}, {0x1p-959, 0}, {0, 0x1p-959}}}});
    visit_all(visit, "polygon<float>",
              std::vector{polygon<float>{{{0, 0}, {7, 1}, {3, 3}, {1, 0.5}}}});
    const std::vector<std::array<double, 3>> corners{{0, 0, 0}, {1, 0, 0}, {0, 1, 0}, {0, 0, 1}};
    visit_all(
        visit, "triangle_mesh",
        std::vector{triangle_mesh{corners, {{0, 1, 2}, {1, 3, 2}, {0, 0, 0}}},
                    triangle_mesh<>{{{0, 0, 0}, {1e300, 0, 0}, {0, 1e300, 1e299}}, {{0, 1, 2}}},
                    triangle_mesh<>{{{5, 5, 1e15}, {600, 5, 1e15}, {5, 600, 1e15}}, {{0, 1, 2}}}});
    visit_all(visit, "triangle_mesh<float>",
              std::vector{triangle_mesh<float>{{{0, 0, 0}, {1, 2, 3}, {1, 0, 1}}, {{0, 1, 2}}}});
    visit_all(visit, "rejection",
              std::vector{rejection{disk{{0, 0}, 1}, signs_differ{}, 1.5707963267948966}});
    visit_all(visit, "without",
              std::vector{without{box{{0, 0}, {4, 4}}, disk{{2, 2}, 1}, 12.858407346410207}});
    visit_all(
        visit, "either",
        std::vector{either{disk{{-5, 0}, 1}, box{{0, 0}, {1, 2}},
                           without{box{{2, 0}, {6, 4}}, disk{{4, 2}, 1}, 12.858407346410207}}});
    visit_all(visit, "either<segment>",
              std::vector{either{segment{{0, 0}, {1, 1}}, segment{{2, 3}, {2, 9}}}});
}

template <class Visit>
void each_region_sample(Visit visit) {
    each_flat_region(visit);
    each_round_region(visit);
    each_cornered_region(visit);
}

} // namespace leat_test

#endif
