// Every sampler of leat, for the tests that all of them must pass (a fill equals the loop). A new
// one joins by one line: a name and a sampler, with parameters that reach its branches.

#ifndef LEAT_TESTS_SUPPORT_SAMPLER_LIST_HPP
#define LEAT_TESTS_SUPPORT_SAMPLER_LIST_HPP

#include "leat/distributions.hpp"
#include "leat/regions.hpp"
#include "leat/uniform.hpp"

#include <cstdint>
#include <limits>

namespace leat_test {

/// Calls visit(name, sampler) for each of uniform/.
template <class Visit>
void each_uniform_sampler(Visit visit) {
    using leat::ends;
    visit("uniform unit", leat::uniform{0, 1});
    visit("uniform unit [)", leat::uniform<double, ends::closed_open>{0, 1});
    visit("uniform unit (]", leat::uniform<double, ends::open_closed>{0, 1});
    visit("uniform unit []", leat::uniform<double, ends::closed>{0, 1});
    visit("uniform from 0", leat::uniform{0, 0.3});
    visit("uniform from 0 [)", leat::uniform<double, ends::closed_open>{0, 1e-200});
    visit("uniform from 0 (]", leat::uniform<double, ends::open_closed>{0, 1e300});
    visit("uniform from 0 []", leat::uniform<double, ends::closed>{0, 7});
    visit("uniform narrow", leat::uniform{-1.5, 2});
    visit("uniform narrow [)", leat::uniform<double, ends::closed_open>{1, 2});
    visit("uniform narrow (]", leat::uniform<double, ends::open_closed>{-3, -1});
    visit("uniform narrow []", leat::uniform<double, ends::closed>{100, 101});
    visit("uniform wide", leat::uniform{1e-300, 1});
    visit("float uniform unit", leat::uniform<float>{0, 1});
    visit("float uniform unit [)", leat::uniform<float, ends::closed_open>{0, 1});
    visit("float uniform unit (]", leat::uniform<float, ends::open_closed>{0, 1});
    visit("float uniform unit []", leat::uniform<float, ends::closed>{0, 1});
    visit("float uniform from 0", leat::uniform<float>{0, 0.3});
    visit("float uniform narrow", leat::uniform<float>{-1.5, 2});
    visit("float uniform narrow (]", leat::uniform<float, ends::open_closed>{5, 6});
    visit("float uniform wide", leat::uniform<float>{1e-30, 1e30});
    visit("int8 all", leat::uniform_integer<std::int8_t>{-128, 127});
    visit("uint16 0..999", leat::uniform_integer<std::uint16_t>{0, 999});
    visit("int 1..6", leat::uniform_integer{1, 6});
    visit("int often rejected", leat::uniform_integer<std::int32_t>{-2147483647, 3});
    visit("uint32 all", leat::uniform_integer<std::uint32_t>{0, ~std::uint32_t{0}});
    visit("int64 0..999", leat::uniform_integer<std::int64_t>{0, 999});
    visit("int64 a little above 32 bits", leat::uniform_integer<std::int64_t>{-5, 1LL << 32});
    visit("uint64 often rejected", leat::uniform_integer<std::uint64_t>{9, (1ULL << 63) + 9});
    visit("uint64 all", leat::uniform_integer<std::uint64_t>{0, ~std::uint64_t{0}});
}

/// Calls visit(name, sampler) for each of distributions/.
template <class Visit>
void each_law(Visit visit) {
    visit("beta by exponentials", leat::beta{0.3, 0.4});
    visit("beta by gammas", leat::beta{2, 3});
    visit("cauchy", leat::cauchy{3, 2});
    visit("chi_squared", leat::chi_squared{5});
    visit("chi_squared of 1", leat::chi_squared{1});
    visit("empirical", leat::empirical({3, 1, 2, 2}));
    visit("erlang", leat::erlang{2, 0.5});
    visit("exponential", leat::exponential{0.25});
    visit("fisher_f", leat::fisher_f{0.7, 9});
    visit("gamma", leat::gamma{2.5, 3});
    visit("gamma of small shape", leat::gamma{0.3, 2});
    visit("gumbel", leat::gumbel{5, 2});
    visit("inverse_gaussian", leat::inverse_gaussian{3, 0.5});
    visit("laplace", leat::laplace{2, 0.5});
    visit("logistic", leat::logistic{-1, 2});
    visit("lognormal", leat::lognormal{2, 0.3});
    visit("maxwell", leat::maxwell{1.5});
    visit("normal", leat::normal{-3, 0.5});
    visit("normal that is constant", leat::normal{2, 0});
    visit("pareto", leat::pareto{2, 3});
    visit("piecewise_linear", leat::piecewise_linear({0, 1, 3}, {0, 1, 0.5}));
    visit("rayleigh", leat::rayleigh{1.5});
    visit("student_t", leat::student_t{4.5});
    visit("triangular", leat::triangular{-1, 0, 4});
    visit("truncated_normal, far", leat::truncated_normal{0, 1, 3, 9});
    visit("truncated_normal, narrow", leat::truncated_normal{0, 1, -0.5, 0.5});
    visit("truncated_normal, wide", leat::truncated_normal{0, 1, -0.5, 4});
    visit("von_mises", leat::von_mises{2, 3});
    visit("weibull", leat::weibull{1.5, 8});
    visit("categorical", leat::categorical({1, 0, 7.5, 1e-3, 300}));
    visit("categorical of 8 bits", leat::categorical<std::uint8_t>({1, 0, 3}));
    visit("dirichlet", leat::dirichlet({0.2, 1, 30}));
    visit("multinomial", leat::multinomial(100, {1, 5, 3}));
    visit("multivariate_normal", leat::multivariate_normal({1, 2}, {{4, 1}, {1, 9}}));
    visit("weighted_index", leat::weighted_index({1, 0, 2, 0.25, 8}));
    visit("float exponential", leat::exponential<float>{3});
    visit("float gamma", leat::gamma<float>{40, 0.5});
    visit("float laplace", leat::laplace<float>{2, 0.5});
    visit("float lognormal", leat::lognormal<float>{-1, 2});
    visit("float normal", leat::normal<float>{10, 2});
    visit("float rayleigh", leat::rayleigh<float>{1.5});
    visit("float weibull", leat::weibull<float>{0.5, 2});
}

/// Calls visit(name, sampler) for each of regions/.
template <class Visit>
void each_region(Visit visit) {
    visit("disk", leat::disk{{3, 4}, 2.5});
    visit("ellipse", leat::ellipse{{0, 0}, 8.5, 3.2, 0.4});
    visit("float disk", leat::disk<float>{{3, 4}, 2.5F});
    visit("box", leat::box<3>{{0, 0, -4}, {60, 12.5, 0}});
    visit("float box", leat::box<2, float>{{0, 0}, {60, 12.5}});
    visit("ball", leat::ball<3>{{1, 2, 3}, 2.5});
    visit("ball of six dimensions", leat::ball<6>{{1, 2, 3, 4, 5, 6}, 2.5});
    visit("sphere", leat::sphere<3>{{1, 2, 3}, 2.5});
    visit("thin shell", leat::shell<3>{{1, 2, 3}, 2.25, 2.5});
    visit("cone", leat::cone{{1, 2, 3}, {1, -2, 0.5}, 0.3, 20});
    visit("torus", leat::torus{{1, 2, 3}, 2, 0.7});
    visit("rotation", leat::rotation{});
    visit("affine image", leat::affine_image{leat::disk{{0, 0}, 1}, {{{1, 3}, {-2, 4}}}, {3, 4}});
    visit("triangle", leat::triangle{{0, 0}, {4, 0}, {1, 3}});
    visit("simplex", leat::simplex<4>{});
    visit("float polygon", leat::polygon<float>{{{0, 0}, {7, 1}, {3, 3}, {1, 0.5}}});
    visit("polygon", leat::polygon<>{{{0, 0}, {7, 1}, {3, 3}, {1, 0.5}}});
    visit("triangle_mesh", leat::triangle_mesh<>{{{0, 0, 0}, {1, 2, 3}, {1, 0, 1}}, {{0, 1, 2}}});
    visit("either", leat::either{leat::disk{{0, 0}, 1}, leat::box{{2, 2}, {3, 4}}});
    visit("without", leat::without{leat::box{{0, 0}, {1, 1}}, leat::disk{{0, 0}, 1}});
}

} // namespace leat_test

#endif
