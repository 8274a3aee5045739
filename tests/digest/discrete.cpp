// Digests of the laws of whole numbers: every branch of a method has a line that reaches it.

#include "digest/digest.hpp"
#include "leat/distributions/bernoulli.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/geometric.hpp"
#include "leat/distributions/hypergeometric.hpp"
#include "leat/distributions/negative_binomial.hpp"
#include "leat/distributions/poisson.hpp"
#include "leat/distributions/zipf.hpp"
#include "leat/engines/philox.hpp"
#include "leat/uniform/unit.hpp"

#include <array>
#include <cstdint>
#include <string>

namespace digests {
namespace {

constexpr std::int64_t two_to_53 = std::int64_t{1} << 53;

/// The masses at draws of a law, which reach its mode and its tails.
template <class Law>
void masses(const std::string& law_name, const Law& law) {
    draws((law_name + ".density").c_str(),
          [&law](auto& g) { return law.density(static_cast<double>(law(g))); }, 20000);
}

} // namespace

void discrete() {
    draws("bernoulli.plain", leat::bernoulli{0.3});
    draws("bernoulli.rare", leat::bernoulli{1e-3});
    draws("poisson.tiny", leat::poisson{1e-3});
    draws("poisson.inversion", leat::poisson{4});
    draws("poisson.inversion_at_its_end", leat::poisson{9.99});
    draws("poisson.rejection_at_its_start", leat::poisson{10});
    draws("poisson.rejection", leat::poisson{1000});
    draws("poisson.huge", leat::poisson{1e15});
    draws("poisson.int8", leat::poisson<std::int8_t>{40});
    draws("poisson.from_32_bit_words", leat::poisson{4}, 20000, leat::philox4x32{1});
    draws("binomial.by_multiplication", leat::binomial{10, 0.3});
    draws("binomial.by_logarithm", leat::binomial{1000, 0.004});
    draws("binomial.flipped", leat::binomial{10, 0.8});
    draws("binomial.rejection", leat::binomial{100, 0.3});
    draws("binomial.rejection_flipped", leat::binomial{100, 0.8});
    draws("binomial.huge", leat::binomial{two_to_53, 0.3});
    draws("geometric.plain", leat::geometric{0.1});
    draws("geometric.likely", leat::geometric{0.9});
    draws("geometric.two_parts", leat::geometric{1e-9});
    draws("negative_binomial.plain", leat::negative_binomial{2.5, 0.2});
    draws("negative_binomial.small_r", leat::negative_binomial{0.01, 0.05});
    draws("negative_binomial.large_r", leat::negative_binomial{1e9, 0.1});
    draws("hypergeometric.inversion", leat::hypergeometric{100, 30, 10});
    draws("hypergeometric.inversion_flipped", leat::hypergeometric{20, 15, 13});
    draws("hypergeometric.half", leat::hypergeometric{20, 10, 10}); // nobody in the fourth cell
    draws("hypergeometric.rejection", leat::hypergeometric{1000, 300, 100});
    draws("hypergeometric.rejection_flipped", leat::hypergeometric{1000, 700, 600});
    draws("hypergeometric.huge", leat::hypergeometric{two_to_53, two_to_53 / 3, two_to_53 / 5});
    draws("zipf.harmonic", leat::zipf{1, 1000});
    draws("zipf.flat", leat::zipf{0.3, 100});
    draws("zipf.steep", leat::zipf{3.5, 1000000});
    draws("zipf.uniform", leat::zipf{0, 6});
    draws("zipf.many_digits", leat::zipf{0.1, std::int64_t{1} << 62});
    masses("poisson", leat::poisson{1000.5});
    masses("binomial", leat::binomial{1000, 0.3});
    masses("negative_binomial", leat::negative_binomial{2.5, 0.2});
    masses("hypergeometric", leat::hypergeometric{1000, 300, 100});
    masses("zipf", leat::zipf{1.1, 100000});
    draws("geometric.of_itself", [law = leat::geometric{0.01}](auto& g) {
        const double k = law.quantile(leat::unit(g));
        return std::array<double, 3>{k, law.density(k), law.cumulative(k)};
    });
    draws(
        "zipf.of_itself",
        [law = leat::zipf{1.2, 1000}](auto& g) {
            const double k = law.quantile(leat::unit(g));
            return std::array<double, 3>{k, law.mean(), law.cumulative(k)};
        },
        2000);
}

} // namespace digests
