// Laws, beside those of <random> and of GSL. A law joins by one line in `registered`.

#include "harness.hpp"

#include "leat/bulk/fill_chunks.hpp"
#include "leat/distributions.hpp"

#include <gsl/gsl_randist.h>

#include <thread>
#include <vector>

namespace {

using namespace leat_bench;

/// `ours` beside `standard` and `gsl`, a function of a gsl_rng*.
template <class Ours, class Standard, class Gsl>
void compare(const std::string& law, Ours ours, Standard standard, Gsl gsl) {
    using element = typename Ours::result_type;
    add_loop<element>(law + "/<random>", twister, standard);
    add_loop<element>(law + "/GSL", gsl_twister,
                      [gsl](auto& g) { return static_cast<element>(gsl(g.get())); });
    add_ours<element>(law, ours);
}

/// gamma made anew for each draw, as by a program whose parameters always change.
struct fresh_gamma {
    using result_type = double;
    double shape;

    template <class G>
    double operator()(G& g) const {
        const volatile double any_shape = shape; // the compiler must not know that it stays
        return leat::gamma<double>{double{any_shape}, 1.0}(g);
    }
};

/// The same with the standard law.
struct fresh_standard_gamma {
    double shape;

    template <class G>
    double operator()(G& g) const {
        const volatile double any_shape = shape;
        return std::gamma_distribution<double>{any_shape, 1}(g);
    }
};

/// An array of normals shared by some threads.
void add_chunks(const std::string& entry, unsigned threads) {
    add<double>(
        "normals in chunks/" + entry,
        [threads] {
            return [threads](std::span<double> out) {
                const leat::source study{20261201};
                const std::uint64_t count = leat::chunk_count(out.size());
                std::vector<std::thread> pool;
                for (unsigned t = 0; t < threads; ++t) {
                    pool.emplace_back([=] {
                        leat::fill_chunks(out, leat::normal{0, 1}, study, count * t / threads,
                                          count * (t + 1) / threads);
                    });
                }
                for (std::thread& thread : pool) {
                    thread.join();
                }
            };
        },
        std::size_t{1} << 21)
        ->UseRealTime();
}

const bool registered = [] {
    compare("normal", leat::normal{0, 1}, std::normal_distribution<double>{0, 1},
            [](gsl_rng* g) { return gsl_ran_gaussian_ziggurat(g, 1); });
    compare("exponential", leat::exponential{1}, std::exponential_distribution<double>{1},
            [](gsl_rng* g) { return gsl_ran_exponential(g, 1); });
    compare("lognormal", leat::lognormal{0, 1}, std::lognormal_distribution<double>{0, 1},
            [](gsl_rng* g) { return gsl_ran_lognormal(g, 0, 1); });
    compare("weibull", leat::weibull{1.5, 1}, std::weibull_distribution<double>{1.5, 1},
            [](gsl_rng* g) { return gsl_ran_weibull(g, 1, 1.5); });
    compare("gamma, shape 2.5", leat::gamma{2.5, 1}, std::gamma_distribution<double>{2.5, 1},
            [](gsl_rng* g) { return gsl_ran_gamma(g, 2.5, 1); });
    compare("gamma, shape 0.3", leat::gamma{0.3, 1}, std::gamma_distribution<double>{0.3, 1},
            [](gsl_rng* g) { return gsl_ran_gamma(g, 0.3, 1); });

    compare("gamma, new parameters", fresh_gamma{2.5}, fresh_standard_gamma{2.5},
            [](gsl_rng* g) { return gsl_ran_gamma(g, 2.5, 1); });
    compare("chi_squared, 6.5", leat::chi_squared{6.5}, std::chi_squared_distribution<double>{6.5},
            [](gsl_rng* g) { return gsl_ran_chisq(g, 6.5); });
    compare("student_t, 4.5", leat::student_t{4.5}, std::student_t_distribution<double>{4.5},
            [](gsl_rng* g) { return gsl_ran_tdist(g, 4.5); });

    add_chunks("1 thread", 1);
    add_chunks("2 threads", 2);
    return true;
}();

} // namespace
