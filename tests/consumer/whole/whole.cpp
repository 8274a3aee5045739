// All of leat at once, something of every area used, as a stranger's compiler and flags see it.

#include "leat/compat.hpp"
#include "leat/estimate.hpp"
#include "leat/leat.hpp"
#include "leat/state.hpp"
#include "leat/testing.hpp"

#include <array>
#include <cstdint>
#include <vector>

namespace {

double use_laws(leat::stream& s) {
    double sum = leat::normal{0, 1}(s) + leat::gamma{{.shape = 2.5, .scale = 1}}(s);
    sum += static_cast<double>(leat::poisson{4.0}(s)) + leat::uniform{-1, 1}(s);
    sum += static_cast<double>(leat::categorical{std::vector<double>{1, 2, 3}}(s));
    sum += leat::dirichlet{std::vector<double>{1, 2}}(s).front();
    return sum + leat::multivariate_normal{{0, 0}, {{1, 0.5}, {0.5, 1}}}(s).back();
}

double use_regions(leat::stream& s) {
    const leat::polygon harbour{{{0, 0}, {4, 0}, {4, 3}}};
    return leat::ball<3>{{0, 0, 0}, 2}(s)[2] + harbour(s)[0] + leat::rotation{}(s)[0];
}

std::uint64_t use_engines(const leat::source& study) {
    auto e = study.engine<leat::xoshiro256_plus_plus>("engine");
    leat::jump(e, leat::pow2(192));
    leat::minimal_standard old{1};
    auto mine = leat::leapfrog(old, 1, 4);
    return e() + mine() + leat::philox4x32{7}() + leat::testing::all_ones{}();
}

double use_the_rest(leat::stream& s) {
    leat::compat::srand(20261201);
    leat::running_moments waits;
    for (int i = 0; i < 10; ++i) {
        waits.add(leat::exponential{2.0}(s) + leat::compat::rand_unit());
    }
    const leat::manifest nothing_opened;
    return leat::student_interval(waits, 0.95).upper +
           static_cast<double>(nothing_opened.openings().size());
}

} // namespace

int main() {
    const leat::source study{1};
    leat::stream s = study.stream("whole");
    std::array<double, 100> filled{};
    leat::fill(filled, leat::exponential{1.0}, s);
    std::vector<int> cards{1, 2, 3};
    leat::shuffle(cards, s);
    double sum = use_laws(s) + use_regions(s) + filled[0] + leat::unit(s);
    sum += use_the_rest(s);
    return use_engines(study) == 0 || sum == 0 || leat::below(6u, s) > 5 ? 1 : 0;
}
