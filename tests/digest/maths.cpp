// Digests of the portable maths below the laws: a difference there shows here first.

#include "digest/digest.hpp"
#include "leat/core/arctangent.hpp"
#include "leat/core/exponential.hpp"
#include "leat/core/log_gamma.hpp"
#include "leat/core/logarithm.hpp"
#include "leat/core/power.hpp"
#include "leat/core/sine_cosine.hpp"
#include "leat/core/square_root.hpp"
#include "leat/testing/detail/tail_areas.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <array>
#include <bit>

namespace digests {
namespace {

/// The function at points spread evenly over (low, high).
template <class Function>
void over(const char* name, double low, double high, const Function& f) {
    draws(name, [x = leat::uniform{low, high}, &f](auto& g) { return f(x(g)); });
}

/// The function at positive normal numbers of every size.
template <class Function>
void over_all_sizes(const char* name, const Function& f) {
    draws(name, [&f](auto& g) {
        const std::uint64_t exponent = 1 + leat::below(std::uint64_t{2046}, g);
        return f(std::bit_cast<double>(exponent << 52 | g() >> 12));
    });
}

} // namespace

void maths() {
    namespace m = leat::detail;
    over("maths.natural_exp", -708, 709, [](double x) { return m::natural_exp(x); });
    over("maths.exp_minus_one", -0.5, 3, [](double x) { return m::exp_minus_one(x); });
    over("maths.natural_log.near_1", 0.5, 2, [](double x) { return m::natural_log(x); });
    over_all_sizes("maths.natural_log", [](double x) { return m::natural_log(x); });
    over("maths.log_one_plus", -0.5, 1, [](double x) { return m::log_one_plus(x); });
    over("maths.power.third", 1e-3, 1e3, [](double x) { return m::power(x, 1.0 / 3); });
    over("maths.power.large", 0.5, 2, [](double x) { return m::power(x, 900); });
    over("maths.sine_cosine", 0, 1, [](double x) {
        const m::sine_and_cosine point = m::sine_cosine(x);
        return std::array<double, 2>{point.sine, point.cosine};
    });
    over("maths.arctangent", 0, 5, [](double x) { return m::arctangent(x, 2); });
    over_all_sizes("maths.square_root", [](double x) { return m::square_root(x); });
    over("maths.log_gamma", 0.1, 100, [](double x) { return m::log_gamma(x); });

    namespace t = leat::testing::detail;
    over("testing.student_t_beyond", 0, 10, [](double x) { return t::student_t_beyond(x, 30); });
    over("testing.chi_squared_tails", 0, 30, [](double x) {
        const t::tail_areas areas = t::chi_squared_tails(x, 9);
        return std::array<double, 2>{areas.below, areas.above};
    });
    over("testing.kolmogorov_beyond", 0.5, 10, [](double x) { return t::kolmogorov_beyond(x, 9); });
}

} // namespace digests
