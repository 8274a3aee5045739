// Digests of the distributions: every branch of a method has a line that reaches it.

#include "digest/digest.hpp"
#include "leat/distributions.hpp"
#include "leat/engines/philox.hpp"

namespace digests {

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
    draws("gamma.draw_log", [law = leat::gamma{0.01, 1}](auto& g) { return law.draw_log(g); });
}

} // namespace digests
