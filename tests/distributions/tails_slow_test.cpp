// Laws at length: 10^8 draws each, which shows what a million cannot, the tails beyond 5 standard
// deviations.
//
// Reference: Boost.Math's distribution functions.
// The draws of a law are 1000 chunks, each of its own stream, so that the result does not depend on
// the number of threads that share them out.
//
// A normal deviate passes 8 sd once in 10^15 draws: no count of plain draws can tell that a tail
// ends there. NormalBeyondEight draws under a condition instead; see there.

#include "distributions/law_report.hpp" // in_double, operator+
#include "support/alarm_budget.hpp"
#include "support/seeds.hpp"
#include "support/statistics.hpp"

#include "leat/bulk/fill.hpp"
#include "leat/distributions/binomial.hpp"
#include "leat/distributions/exponential.hpp"
#include "leat/distributions/gamma.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/poisson.hpp"

#include <boost/math/distributions/binomial.hpp>
#include <boost/math/distributions/exponential.hpp>
#include <boost/math/distributions/gamma.hpp>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/distributions/poisson.hpp>
#include <gtest/gtest.h>

#include <algorithm>
#include <atomic>
#include <cmath>
#include <cstdint>
#include <cstdio>
#include <limits>
#include <numeric> // accumulate
#include <span>
#include <stdexcept>
#include <string>
#include <thread>
#include <utility>
#include <vector>

namespace {

using namespace leat_test;

constexpr std::size_t chunks = 1000;
constexpr std::size_t chunk_size = 100000;
constexpr double many = 1.0 * chunks * chunk_size;

/// Calls work(chunk) for every chunk, on all processors, and says on stderr how far it is.
template <class Work>
void for_each_chunk(const std::string& what, const Work& work) {
    std::atomic<std::size_t> next = 0;
    const auto run = [&] {
        for (std::size_t chunk = next++; chunk < chunks; chunk = next++) {
            work(chunk);
            if ((chunk + 1) % 250 == 0) {
                std::fprintf(stderr, "  %s: %zu %% of 10^8\n", what.c_str(),
                             (chunk + 1) * 100 / chunks);
            }
        }
    };
    std::vector<std::thread> others(std::max(1u, std::thread::hardware_concurrency()) - 1);
    for (auto& thread : others) {
        thread = std::thread(run);
    }
    run();
    for (auto& thread : others) {
        thread.join();
    }
}

/// How many draws fell into each cell, and their first two moments about the reference's mean.
struct tally {
    std::vector<std::uint64_t> counts;
    double sum = 0;
    double squares = 0;
};

/// 10^8 draws sorted into the cells that `edges` bound: cell i has edges[i - 1] < x <= edges[i].
template <class Law>
tally draw_many(const std::string& name, const Law& law, std::span<const double> edges,
                double centre) {
    using value = decltype(law(std::declval<leat::stream&>()));
    const leat::source source = source_of_this_test();
    std::vector<tally> parts(chunks);
    for_each_chunk(name, [&](std::size_t chunk) {
        auto g = source.stream(name, chunk);
        std::vector<value> draws(chunk_size);
        leat::fill(std::span<value>(draws), law, g);
        tally part{std::vector<std::uint64_t>(edges.size() + 1)};
        for (const value draw : draws) {
            const auto x = static_cast<double>(draw);
            const auto edge = std::lower_bound(edges.begin(), edges.end(), x);
            ++part.counts[static_cast<std::size_t>(edge - edges.begin())];
            part.sum += x - centre;
            part.squares += (x - centre) * (x - centre);
        }
        parts[chunk] = std::move(part);
    });
    tally all{std::vector<std::uint64_t>(edges.size() + 1)};
    for (const tally& part : parts) {
        for (std::size_t i = 0; i < all.counts.size(); ++i) {
            all.counts[i] += part.counts[i];
        }
        all.sum += part.sum;
        all.squares += part.squares;
    }
    return all;
}

/// Chi-square over neighbouring cells joined until they expect 100 draws.
template <class Reference>
outcome cells_test(std::string what, const tally& found, std::span<const double> edges,
                   const Reference& law) {
    const double least = 100 / many * (1 + 1e-9);
    std::vector<double> chances;
    std::vector<std::uint64_t> counts(1);
    double below = 0; // where the open cell begins
    double above = 1;
    for (std::size_t i = 0; i < edges.size(); ++i) {
        counts.back() += found.counts[i];
        const double up_to = cdf(law, edges[i]);
        const double beyond = cdf(complement(law, edges[i]));
        const double inside = up_to < 0.5 ? up_to - below : above - beyond; // the one with digits
        if (inside >= least && beyond >= least) {
            chances.push_back(inside);
            counts.push_back(0);
            below = up_to;
            above = beyond;
        }
    }
    counts.back() += found.counts.back();
    chances.push_back(above);
    return chi_square_test(std::move(what), counts, chances);
}

/// How many draws fell into the cells up to an edge.
std::uint64_t count_up_to(const tally& found, std::span<const double> edges, double point) {
    const auto edge = std::find(edges.begin(), edges.end(), point);
    if (edge == edges.end()) {
        throw std::logic_error("count_up_to: the point is no edge");
    }
    const auto cells = edge - edges.begin() + 1;
    return std::accumulate(found.counts.begin(), found.counts.begin() + cells, std::uint64_t{0});
}

/// Cells, mean, variance, and the counts beyond `above` and up to `below`, which must be edges.
template <class Law, class Reference>
std::vector<outcome> report_at_length(const std::string& name, const Law& law,
                                      const Reference& reference, std::span<const double> edges,
                                      const std::vector<double>& below,
                                      const std::vector<double>& above) {
    const double spread = variance(reference);
    const tally found = draw_many(name, law, edges, mean(reference));
    std::vector<outcome> report;
    report.push_back(cells_test(name + ", cells", found, edges, reference));
    report.push_back(mean_test(name + ", mean", found.sum, many, {0, spread, skewness(reference)}));
    report.push_back(mean_test(name + ", variance", found.squares / spread, many,
                               {1, kurtosis_excess(reference) + 2}));
    constexpr std::uint64_t n = chunks * chunk_size;
    for (const double point : below) { // exact, however few are expected
        report.push_back(count_test(name + ", count up to " + std::to_string(point),
                                    count_up_to(found, edges, point), n, cdf(reference, point)));
    }
    for (const double point : above) {
        report.push_back(count_test(name + ", count above " + std::to_string(point),
                                    n - count_up_to(found, edges, point), n,
                                    cdf(complement(reference, point))));
    }
    return report;
}

/// A continuous law: cells of half a per cent, halved again and again towards both ends, and the
/// counts beyond 5, 5.5 and 6 standard deviations.
template <class Law, class Reference>
std::vector<outcome> continuous_report(const std::string& name, const Law& law,
                                       const Reference& reference) {
    std::vector<double> edges;
    for (int i = 1; i < 200; ++i) {
        edges.push_back(quantile(reference, 0.005 * i));
    }
    for (double p = 0.0025; p * many >= 100; p /= 2) {
        edges.push_back(quantile(reference, p));
        edges.push_back(quantile(complement(reference, p)));
    }
    std::vector<double> below;
    std::vector<double> above;
    const double sd = std::sqrt(variance(reference));
    for (const double k : {5.0, 5.5, 6.0}) {
        if (mean(reference) - k * sd > support(reference).first) {
            below.push_back(mean(reference) - k * sd);
        }
        above.push_back(mean(reference) + k * sd);
    }
    edges.insert(edges.end(), below.begin(), below.end());
    edges.insert(edges.end(), above.begin(), above.end());
    std::sort(edges.begin(), edges.end());
    return report_at_length(name, law, reference, edges, below, above);
}

/// A law of whole numbers, not negative: every value within 12 standard deviations, and the counts
/// beyond 5.
template <class Law, class Reference>
std::vector<outcome> discrete_report(const std::string& name, const Law& law,
                                     const Reference& reference) {
    const double sd = std::sqrt(variance(reference));
    std::vector<double> edges;
    for (double k = std::max(0.0, std::floor(mean(reference) - 12 * sd));
         k <= mean(reference) + 12 * sd && k < support(reference).second; ++k) {
        edges.push_back(k);
    }
    std::vector<double> below;
    std::vector<double> above;
    if (mean(reference) - 5 * sd >= 0) {
        below.push_back(std::floor(mean(reference) - 5 * sd));
    }
    if (mean(reference) + 5 * sd < support(reference).second) {
        above.push_back(std::floor(mean(reference) + 5 * sd));
    }
    return report_at_length(name, law, reference, edges, below, above);
}

/// A planted fault: a law whose tails end, draws beyond being drawn again.
template <class Law>
auto cut_between(const Law& law, double low, double high) {
    return [=](auto& g) {
        for (;;) {
            const auto x = law(g);
            if (low <= static_cast<double>(x) && static_cast<double>(x) <= high) {
                return x;
            }
        }
    };
}

using normal_reference = boost::math::normal_distribution<double, in_double>;

TEST(LawsAtLength, Normal) {
    check(continuous_report("normal", leat::normal{0, 1}, normal_reference(0, 1)));
}

TEST(LawsAtLength, Exponential) {
    check(continuous_report("exponential", leat::exponential{1},
                            boost::math::exponential_distribution<double, in_double>(1)));
}

TEST(LawsAtLength, Gamma) {
    check(continuous_report("gamma", leat::gamma{2.5, 3},
                            boost::math::gamma_distribution<double, in_double>(2.5, 3)));
}

TEST(LawsAtLength, Poisson) {
    for (const double mean : {0.5, 4.0, 40.0, 1000.0}) {
        check(discrete_report("poisson " + std::to_string(mean), leat::poisson{mean},
                              boost::math::poisson_distribution<double, in_double>(mean)));
    }
}

TEST(LawsAtLength, Binomial) {
    const std::pair<int, double> sets[] = {{10, 0.3}, {100, 0.3}, {1000000, 0.7}};
    for (const auto& [trials, chance] : sets) {
        check(
            discrete_report("binomial " + std::to_string(trials), leat::binomial{trials, chance},
                            boost::math::binomial_distribution<double, in_double>(trials, chance)));
    }
}

TEST(LawsAtLength, TailsCutAtFiveAreRejected) {
    EXPECT_TRUE(is_rejected(continuous_report("normal cut", cut_between(leat::normal{0, 1}, -5, 5),
                                              normal_reference(0, 1))));
    // 1000 + 5 sqrt(1000)
    EXPECT_TRUE(
        is_rejected(discrete_report("poisson cut", cut_between(leat::poisson{1000}, 0, 1158),
                                    boost::math::poisson_distribution<double, in_double>(1000))));
}

// Beyond 8 standard deviations.
//
// The specified sampler reaches its tail by words of layer 0 that pass the layer's core: from a
// normal's first word into the tail beyond r, from an exponential's into the tail beyond t. An
// engine that begins with such words, one for the normal and two for the tail's first exponential,
// and goes on at random, proposes x = (2 t + E) / r beyond r and accepts it if 2 E' > x^2, with E
// and E' exponential: density exp(-r x - x^2 / 2) for the result z = x + r, a normal's beyond
// z0 = r + 2 t / r = 7.87. It accepts with the probability
//   integral of r exp(-r (x - 2t/r)) exp(-x^2 / 2) dx from 2t/r
//     = r sqrt(2 pi) exp(2 t + r^2 / 2) P(Z > z0) = 6.4e-5,
// and then the result is beyond z0. When it refuses, the tail starts again with random words, which
// lead there with a probability of 5e-12: a normal deviate all the same.
// So of 10^8 such draws some thousands are beyond z0, and a third of these beyond 8.

/// Words at random after three that lead to the tails.
class into_the_tail {
public:
    using result_type = std::uint64_t;
    static constexpr result_type min() { return 0; }
    static constexpr result_type max() { return std::numeric_limits<result_type>::max(); }

    explicit into_the_tail(leat::stream& rest) : rest_(&rest) {}

    result_type operator()() {
        if (led_ == 3) {
            return (*rest_)();
        }
        ++led_;
        // bits 0 to 7: layer 0; bit 8: the sign, here positive; the rest: the place, the outermost.
        return ~result_type{0} << 9;
    }

private:
    leat::stream* rest_;
    int led_ = 0;
};

// Where the ziggurats' tails begin (Marsaglia and Tsang 2000, 256 layers; distributions.json has
// the normal's, the exponential's is from memory, and a wrong one would shift every count below).
constexpr double r = 3.65415288536100877;
constexpr double t = 7.69711747013104972;

template <class Law>
std::vector<outcome> report_beyond_eight(const std::string& name, const Law& law) {
    const double z0 = r + 2 * t / r;
    const normal_reference reference(0, 1);
    const double beyond = cdf(complement(reference, z0));
    const double chance = r * std::sqrt(2 * std::acos(-1.0)) * std::exp(2 * t + r * r / 2) * beyond;

    const leat::source source = source_of_this_test();
    std::vector<std::vector<double>> parts(chunks);
    for_each_chunk(name, [&](std::size_t chunk) {
        auto g = source.stream(name, chunk);
        for (std::size_t i = 0; i < chunk_size; ++i) {
            into_the_tail words(g);
            const double z = law(words);
            if (z > z0) {
                parts[chunk].push_back(z);
            }
        }
    });
    std::vector<double> all;
    for (const auto& part : parts) {
        all.insert(all.end(), part.begin(), part.end());
    }
    std::vector<outcome> report{
        count_test(name + ", count beyond z0", all.size(), chunks * chunk_size, chance)};
    report.push_back(kolmogorov_smirnov_test(name + ", beyond z0", all, [&](double z) {
        return 1 - cdf(complement(reference, z)) / beyond;
    }));
    return report;
}

TEST(NormalBeyondEight, IsComplete) { check(report_beyond_eight("tail", leat::normal{0, 1})); }

TEST(NormalBeyondEight, ATailCutAtEightIsRejected) {
    EXPECT_TRUE(
        is_rejected(report_beyond_eight("cut tail", cut_between(leat::normal{0, 1}, -8, 8))));
}

} // namespace
