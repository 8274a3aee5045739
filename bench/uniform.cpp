// Uniform reals and integers, beside <random>, rand(), GSL, and memset as the limit: in the cache,
// and in memory.

#include "harness.hpp"

#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "leat/uniform/unit.hpp"

#include <cstdlib>
#include <cstring>

namespace {

using namespace leat_bench;
using leat::ends;

template <class Element>
void add_memset(const std::string& work, std::size_t length = elements) {
    add<Element>(
        work + "/memset",
        [] { return [](std::span<Element> out) { std::memset(out.data(), 1, out.size_bytes()); }; },
        length);
}

const bool registered = [] {
    using std::uniform_real_distribution;

    std::string work = "open doubles";
    add_loop<double>(work + "/std::uniform_real_distribution", twister,
                     uniform_real_distribution<double>{0, 1});
    add<double>(work + "/rand(), scaled", [] {
        return [](std::span<double> out) {
            for (double& x : out) {
                x = (std::rand() + 0.5) / (RAND_MAX + 1.0);
            }
        };
    });
    add_loop<double>(work + "/gsl_rng_uniform_pos", gsl_twister,
                     [](auto& g) { return gsl_rng_uniform_pos(g.get()); });
    add_memset<double>(work);
    add_ours<double>(work, leat::uniform{0, 1});

    work = "closed doubles";
    add_loop<double>(work + "/std::uniform_real_distribution", twister,
                     uniform_real_distribution<double>{0, 1});
    add_ours<double>(work, leat::uniform<double, ends::closed>{0, 1});

    work = "doubles in (-1, 1)";
    add_loop<double>(work + "/std::uniform_real_distribution", twister,
                     uniform_real_distribution<double>{-1, 1});
    add_ours<double>(work, leat::uniform{-1, 1});

    work = "open floats";
    add_loop<float>(work + "/std::uniform_real_distribution", twister,
                    uniform_real_distribution<float>{0, 1});
    add_memset<float>(work);
    add_ours<float>(work, leat::uniform<float>{0, 1});

    work = "integers 0..999";
    add_loop<int>(work + "/std::uniform_int_distribution", twister,
                  std::uniform_int_distribution<int>{0, 999});
    add<int>(work + "/rand() % 1000", [] {
        return [](std::span<int> out) {
            for (int& x : out) {
                x = std::rand() % 1000;
            }
        };
    });
    add_loop<int>(work + "/gsl_rng_uniform_int", gsl_twister,
                  [](auto& g) { return static_cast<int>(gsl_rng_uniform_int(g.get(), 1000)); });
    add_ours<int>(work, leat::uniform_integer{0, 999});

    work = "integers 0..10^12";
    add_loop<std::int64_t>(work + "/std::uniform_int_distribution", twister,
                           std::uniform_int_distribution<std::int64_t>{0, 1000000000000});
    add_ours<std::int64_t>(work, leat::uniform_integer<std::int64_t>{0, 1000000000000});

    // One GiB: the memory is the limit.
    constexpr std::size_t gibibyte = std::size_t{1} << 27;
    work = "open doubles, 1 GiB";
    add_memset<double>(work, gibibyte);
    add<double>(
        work + "/braid, filled",
        [] {
            return [g = braid()](std::span<double> out) mutable {
                leat::fill(out, leat::uniform{0, 1}, g);
            };
        },
        gibibyte);
    return true;
}();

} // namespace
