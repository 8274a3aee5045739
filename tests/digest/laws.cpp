// Digests of the distributions: every branch of a method has a line that reaches it.

#include "digest/digest.hpp"
#include "leat/distributions.hpp"
#include "leat/engines/philox.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <string>
#include <vector>

namespace digests {
namespace {

/// The squares of 1 to n, as weights.
std::vector<double> squares(int n) {
    std::vector<double> result;
    for (int i = 1; i <= n; ++i) {
        result.push_back(static_cast<double>(i) * i);
    }
    return result;
}

/// What a law says of itself: quantiles at even chances, and density and cumulative chance there.
template <class Law>
void of_itself(const std::string& law_name, const Law& law) {
    draws((law_name + ".of_itself").c_str(),
          [&law](auto& g) {
              const double p = leat::unit(g);
              const double x = law.quantile(p);
              return std::array<double, 3>{x, law.density(x), law.cumulative(x)};
          },
          20000);
}

} // namespace

void laws() {
    draws("normal.standard", leat::normal{0, 1}, 200000); // wedges and the tail too
    draws("normal.other", leat::normal{-3.7, 12.1});
    draws("normal.float", leat::normal<float>{10, 3});
    draws("normal.from_32_bit_words", leat::normal{0, 1}, 50000, leat::philox4x32{1});
    draws("exponential.rate_1", leat::exponential{1}, 200000); // wedges and the tail too
    draws("exponential.other", leat::exponential{0.3});
    draws("exponential.float", leat::exponential<float>{0.3f});
    draws("weibull.wear", leat::weibull{2.3, 1500});
    draws("weibull.infant", leat::weibull{0.4, 12});
    draws("weibull.float", leat::weibull<float>{1.5f, 2.0f});
    draws("lognormal.plain", leat::lognormal{0.5, 0.8});
    draws("lognormal.wide", leat::lognormal{-20, 9});
    draws("lognormal.from_mean_sd", leat::lognormal<>::from_mean_sd(30, 18));
    draws("lognormal.float", leat::lognormal<float>{0.5f, 0.8f});
    draws("gamma.shape_above_1", leat::gamma{2.7, 3});
    draws("gamma.shape_1", leat::gamma{1, 3});
    draws("gamma.shape_below_1", leat::gamma{0.3, 3});
    draws("gamma.tiny_shape", leat::gamma{1e-6, 1});
    draws("gamma.huge_shape", leat::gamma{1e10, 1e-10});
    draws("gamma.float", leat::gamma<float>{2.7f, 3.0f});
    draws("chi_squared.1", leat::chi_squared{1}, 200000); // below 2^-8 too
    draws("chi_squared.2", leat::chi_squared{2}, 200000); // likewise
    draws("chi_squared.3", leat::chi_squared{3});
    draws("chi_squared.4", leat::chi_squared{4});
    draws("chi_squared.other", leat::chi_squared{7.5});
    draws("chi_squared.below_2", leat::chi_squared{0.3});
    draws("chi_squared.float", leat::chi_squared<float>{5});
    draws("erlang.few_stages", leat::erlang{2, 0.3});
    draws("erlang.many_stages", leat::erlang{50, 7});
    draws("erlang.float", leat::erlang<float>{3, 7});
    draws("student_t.1", leat::student_t{1});
    draws("student_t.other", leat::student_t{4.5});
    draws("student_t.below_2", leat::student_t{0.3});
    draws("student_t.float", leat::student_t<float>{5});
    draws("fisher_f.plain", leat::fisher_f{5, 8});
    draws("fisher_f.1", leat::fisher_f{1, 2});
    draws("fisher_f.below_2", leat::fisher_f{0.3, 1.2});
    draws("fisher_f.float", leat::fisher_f<float>{5, 8});
    draws("beta.b_1", leat::beta{0.3, 1});
    draws("beta.a_1", leat::beta{1, 3.3});
    draws("beta.johnk", leat::beta{0.3, 0.4});
    draws("beta.gammas", leat::beta{2.3, 3.1});
    draws("beta.halves", leat::beta{0.5, 0.5});
    draws("beta.boosted", leat::beta{0.7, 3.1});
    draws("beta.float", leat::beta<float>{2.3f, 0.2f});
    draws("inverse_gaussian.plain", leat::inverse_gaussian{3, 7});
    draws("inverse_gaussian.wide", leat::inverse_gaussian{1e12, 1}); // the exponential decides
    draws("inverse_gaussian.widest", leat::inverse_gaussian{1e200, 1});
    draws("inverse_gaussian.float", leat::inverse_gaussian<float>{3, 7});
    draws("von_mises.uniform", leat::von_mises{1, 0});
    draws("von_mises.plain", leat::von_mises{-2, 2.5});
    draws("von_mises.narrow", leat::von_mises{0.1, 1e9});
    draws("von_mises.narrowest", leat::von_mises{0, 1e30});
    draws("von_mises.float", leat::von_mises<float>{1, 3});
    draws("truncated_normal.narrow", leat::truncated_normal{1, 2, 0.5, 3});
    draws("truncated_normal.narrow_below", leat::truncated_normal{1, 2, -3, -2.5});
    draws("truncated_normal.wide", leat::truncated_normal{1, 2, -0.5, 9});
    draws("truncated_normal.folded", leat::truncated_normal{1, 2, 1.25, 9});
    draws("truncated_normal.folded_below", leat::truncated_normal{1, 2, -9, 0.75});
    draws("truncated_normal.far", leat::truncated_normal{1, 2, 5, 9});
    draws("truncated_normal.far_below", leat::truncated_normal{1, 2, -900, -5});
    draws("truncated_normal.float", leat::truncated_normal<float>{1, 2, 0, 3});
    draws("gumbel.plain", leat::gumbel{5, 2}, 200000); // the upper tail too
    draws("gumbel.float", leat::gumbel<float>{-3, 10});
    draws("logistic.plain", leat::logistic{-1, 2}, 200000); // both tails too
    draws("logistic.float", leat::logistic<float>{0, 10});
    draws("laplace.plain", leat::laplace{2, 0.5});
    draws("laplace.float", leat::laplace<float>{-3, 10});
    draws("cauchy.plain", leat::cauchy{3, 2}, 200000); // denominators near 0 too
    draws("cauchy.float", leat::cauchy<float>{-3, 10});
    draws("pareto.plain", leat::pareto{2, 1.5});
    draws("pareto.heavy", leat::pareto{1, 0.01});
    draws("pareto.float", leat::pareto<float>{3, 2});
    draws("rayleigh.plain", leat::rayleigh{1.5});
    draws("rayleigh.float", leat::rayleigh<float>{8});
    draws("maxwell.plain", leat::maxwell{297.3});
    draws("maxwell.float", leat::maxwell<float>{3});
    draws("triangular.plain", leat::triangular{-1, 0.5, 3});
    draws("triangular.one_sided", leat::triangular{-1, -1, 3});
    draws("triangular.float", leat::triangular<float>{-1, 0, 3});
    draws("empirical.plain", leat::empirical({3, 1, 2.5, 2.5, 8}));
    draws("empirical.float", leat::empirical<float>({3, 1, 2.5F}));
    draws("piecewise_linear.plain", leat::piecewise_linear({0, 1, 3}, {0, 1, 0.5}));
    draws("piecewise_linear.gap", leat::piecewise_linear({0, 1, 2, 3}, {2, 0, 0, 6}));
    draws("piecewise_linear.float", leat::piecewise_linear<float>({-2, 1, 3}, {4, 0, 1}));
    draws("gamma.draw_log", [law = leat::gamma{0.01, 1}](auto& g) { return law.draw_log(g); });
    of_itself("normal", leat::normal{-2.5, 3});
    of_itself("lognormal", leat::lognormal{1, 0.25});
    of_itself("exponential", leat::exponential{0.25});
    of_itself("weibull", leat::weibull{1.5, 2});
    of_itself("gumbel", leat::gumbel{5, 2});
    of_itself("logistic", leat::logistic{-1, 2});
    of_itself("laplace", leat::laplace{2, 0.5});
    of_itself("cauchy", leat::cauchy{3, 2});
    of_itself("pareto", leat::pareto{2, 1.5});
    of_itself("rayleigh", leat::rayleigh{1.5});
    of_itself("triangular", leat::triangular{-1, 0.5, 3});
    of_itself("piecewise_linear", leat::piecewise_linear({0, 1, 3}, {0, 1, 0.5}));
    draws("gamma.density", [u = leat::uniform{0, 60}](auto& g) {
        return leat::gamma{20, 1}.density(u(g));
    });
    draws("maxwell.cumulative",
          [u = leat::uniform{0, 9}](auto& g) { return leat::maxwell{1}.cumulative(u(g)); });
    draws("categorical.die", leat::categorical({1, 1, 1, 1, 1, 1}));
    draws("categorical.holes", leat::categorical({0, 3, 0, 0, 1, 1e-3, 0, 2.5, 0}));
    draws("categorical.wide", leat::categorical({1e300, 4.9e-324, 0, 1, 1.7e308, 1e307}));
    draws("categorical.many", leat::categorical(squares(1000)));
    draws("weighted_index.plain", leat::weighted_index({0.1, 0, 1e-9, 3, 7e5, 2e5, 1}));
    draws("weighted_index.many", leat::weighted_index(squares(1000)));
    draws("multivariate_normal.plain",
          leat::multivariate_normal({1, -2, 0.5}, {{4, 1.2, -0.4}, {1.2, 9, 2}, {-0.4, 2, 1}}));
    draws("multivariate_normal.singular",
          leat::multivariate_normal({1, 2, 0}, {{2, 1, 3}, {1, 5, 6}, {3, 6, 9}}));
    draws("dirichlet.plain", leat::dirichlet({0.5, 2, 1, 7}));
    draws("dirichlet.small", leat::dirichlet({1e-3, 1e-8, 2e-3}));
    draws("multinomial.few", leat::multinomial(12, {1, 2, 0, 3}));
    draws("multinomial.many", leat::multinomial(1000000000000, {0.02, 0.97, 1e-11, 0.01}));
}

} // namespace digests
