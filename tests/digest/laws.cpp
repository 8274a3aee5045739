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
    draws("gamma.draw_log", [law = leat::gamma{0.01, 1}](auto& g) { return law.draw_log(g); });
}

} // namespace digests
