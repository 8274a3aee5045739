// Golden digests, small enough for a start-up check: some hundred draws of every engine, mapping,
// law and region, with the digest that they must have on every machine and in every version of
// this major number (promises P1 and P7).
//
// To join: a line in `each_golden`, with 0 for the digest; the self-check's own test then fails and
// says the number, and fails as well as long as something that tests/digest covers has no line
// here. A number that stands here never changes but with the major version.
// The digest is FNV-1a, 64 bits (G. Fowler, L. C. Noll and K.-P. Vo, 1991; constants from memory),
// over the bytes of the values, the least significant first.

#ifndef LEAT_SELF_CHECK_GOLDEN_HPP
#define LEAT_SELF_CHECK_GOLDEN_HPP

#include "leat/bulk.hpp"
#include "leat/compat/historical.hpp"
#include "leat/distributions.hpp"
#include "leat/engines.hpp"
#include "leat/estimate/exact_sum.hpp"
#include "leat/estimate/mean_interval.hpp"
#include "leat/estimate/running_moments.hpp"
#include "leat/regions.hpp"
#include "leat/self_check/report.hpp"
#include "leat/streams.hpp"
#include "leat/uniform.hpp"

#include <array>
#include <bit>
#include <concepts>
#include <cstdint>

namespace leat::detail {

/// The digest of a row of values.
class golden_digest {
public:
    /// Integers count as 64 bits whatever their type, reals as their own bits.
    template <std::integral T>
    void add(T x) noexcept {
        add_bytes(static_cast<std::uint64_t>(x), 8);
    }
    void add(double x) noexcept { add_bytes(std::bit_cast<std::uint64_t>(x), 8); }
    void add(float x) noexcept { add_bytes(std::bit_cast<std::uint32_t>(x), 4); }
    /// Points and vectors.
    template <class Range>
    requires requires(const Range& r) { r.begin(); }
    void add(const Range& values) noexcept {
        for (const auto& value : values) {
            add(value);
        }
    }
    [[nodiscard]] std::uint64_t value() const noexcept { return value_; }

private:
    void add_bytes(std::uint64_t word, int count) noexcept {
        for (int i = 0; i < count; ++i) {
            value_ = (value_ ^ (word & 0xFFu)) * 0x100000001b3u;
            word >>= 8;
        }
    }

    std::uint64_t value_ = 0xcbf29ce484222325u;
};

inline constexpr int golden_draws = 200;

/// Takes one line: its name, the digest it must have, and the digest it has here.
using golden_line = void (*)(void* context, const char* name, std::uint64_t expected,
                             std::uint64_t computed);

/// Makes the lines. A digest that cannot be computed, because something throws that must not,
/// counts as 0.
class golden_lines {
public:
    golden_lines(golden_line line, void* context) noexcept : line_(line), context_(context) {}

    /// An engine, seeded and drawn. No jump: to instantiate those of all takes a compiler seconds.
    template <class Engine>
    void engine(const char* name, std::uint64_t expected) {
        compute(name, expected, [this](golden_digest& d) {
            Engine e(seed_);
            words(d, e);
        });
    }
    /// What is drawn from an engine by draw(g).
    template <class Draw>
    void draws(const char* name, std::uint64_t expected, Draw&& draw) {
        compute(name, expected, [&](golden_digest& d) {
            xoshiro256_plus_plus g{seed_};
            for (int i = 0; i < golden_draws; ++i) {
                d.add(draw(g));
            }
            d.add(g());
        });
    }
    /// A law or region, made anew so that what its constructor computes counts too.
    template <class Make>
    void sampler(const char* name, std::uint64_t expected, Make make) {
        compute(name, expected, [&](golden_digest& d) {
            const auto drawn = make();
            xoshiro256_plus_plus g{seed_};
            for (int i = 0; i < golden_draws; ++i) {
                d.add(drawn(g));
            }
            d.add(g());
        });
    }
    /// A stream: its address and its words.
    template <class Open>
    void stream(const char* name, std::uint64_t expected, Open open) {
        compute(name, expected, [&](golden_digest& d) {
            auto s = open(source{seed_});
            d.add(s.address().key);
            d.add(s.address().upper);
            words(d, s);
            s.seek(1000003);
            words(d, s);
        });
    }

private:
    template <class Engine>
    static void words(golden_digest& d, Engine& e) {
        for (int i = 0; i < golden_draws; ++i) {
            d.add(e());
        }
    }
    template <class Compute>
    void compute(const char* name, std::uint64_t expected, Compute work) {
        golden_digest d;
#if defined(__cpp_exceptions)
        try {
            work(d);
        } catch (...) {
            line_(context_, name, expected, std::uint64_t{0});
            return;
        }
#else
        work(d);
#endif
        line_(context_, name, expected, d.value());
    }

    // From memory, so that nothing is computed by the compiler instead of by this machine.
    static std::uint64_t stored_seed() noexcept {
        const volatile std::uint64_t seed = 20261201;
        return seed;
    }

    golden_line line_;
    void* context_;
    std::uint64_t seed_ = stored_seed();
};

/// All lines there are.
inline void each_golden(golden_line line, void* context) {
    golden_lines golden(line, context);

    golden.engine<minimal_standard>("engine.minimal_standard", 0x304839196e08049cu);
    golden.engine<minimal_standard_48271>("engine.minimal_standard_48271", 0xbcd7c8cd5c99361bu);
    golden.engine<minimal_standard_69621>("engine.minimal_standard_69621", 0xeb40c30aeb685a3bu);
    golden.engine<lehmer128>("engine.lehmer128", 0x95a3ebf65a011728u);
    golden.engine<mwc_lag4_32>("engine.mwc_lag4_32", 0x33d2b0d5597efdb1u);
    golden.engine<mwc_lag1_32>("engine.mwc_lag1_32", 0xfb6e96ffd94ce59fu);
    golden.engine<mwc_lag1_64>("engine.mwc_lag1_64", 0xdd9bcd85e49450d4u);
    golden.engine<xorshift32>("engine.xorshift32", 0xfc6bfc4dbab74f83u);
    golden.engine<xorshift64>("engine.xorshift64", 0xed16d5e08fc66ffau);
    golden.engine<xorshift128>("engine.xorshift128", 0x128656ffedf86a11u);
    golden.engine<xorshift64_star>("engine.xorshift64_star", 0x6b6bda9183c18925u);
    golden.engine<xorshift128_plus>("engine.xorshift128_plus", 0xfe12ec718762ca19u);
    golden.engine<xoroshiro128_plus_plus>("engine.xoroshiro128_plus_plus", 0x26c2927d0cacb996u);
    golden.engine<xoshiro256_plus>("engine.xoshiro256_plus", 0x8b3a368acce18e37u);
    golden.engine<xoshiro256_plus_plus>("engine.xoshiro256_plus_plus", 0xb65453e40a7f3e2fu);
    golden.engine<xoshiro256_star_star>("engine.xoshiro256_star_star", 0x91b6a8c1d522a9cfu);
    golden.engine<xoshiro256_braid>("engine.xoshiro256_braid", 0x35ad8de56c30825bu);
    golden.engine<mrg32k3a>("engine.mrg32k3a", 0x1eda09c0f7c31530u);
    golden.engine<splitmix64>("engine.splitmix64", 0x381b3d80e016048cu);
    golden.engine<philox4x32>("engine.philox4x32", 0xb43fba713f0ba14cu);
    golden.engine<philox4x64>("engine.philox4x64", 0x7df5fb0fbdd9b648u);
    golden.engine<shuffled<minimal_standard, 256>>("engine.shuffled", 0x67c9a3c1037e757eu);
    golden.engine<shuffled_by<minimal_standard, minimal_standard_48271, 128>>("engine.shuffled_by",
                                                                              0xae21941d21ca1e62u);
    golden.engine<iso_c_sample>("engine.iso_c_sample", 0xc2a9dd47fce0df5bu);
    golden.engine<posix48>("engine.posix48", 0x3542e9f8381f60fau);
    golden.engine<additive_feedback31>("engine.additive_feedback31", 0x8894bba86f5d3a75u);
    golden.engine<additive_feedback63>("engine.additive_feedback63", 0xa44966b51ca002d4u);

    golden.stream("stream.index", 0x5d1332143dbe5755u,
                  [](const source& study) { return study.stream("failures", 3, 4); });
    golden.stream("stream.text", 0x7075eb9e04c4e9b5u,
                  [](const source& study) { return study.branch("wind", -4).stream("gusts"); });
    golden.stream("stream.offspring", 0x72ecb76251c713bbu,
                  [](const source& study) { return study.stream("agents", 7).offspring(1); });
    golden.stream("stream.thin", 0xfd86295d8550631eu,
                  [](const source& study) { return study.thin_stream("agents", 8); });

    golden.draws("word64", 0x1026cd2bb9cb4948u,
                 [g = minimal_standard(1)](auto&) mutable { return word64(g); });
    golden.draws("word32", 0x73ba7dd3124dc582u,
                 [g = xorshift64(1)](auto&) mutable { return word32(g); });
    golden.draws("unit.double", 0x65397cd1679e7a53u, [](auto& g) { return unit(g); });
    golden.draws("unit.double.closed", 0x6bb815635697302bu,
                 [](auto& g) { return unit<double, ends::closed>(g); });
    golden.draws("unit.float.closed", 0xbb3db01815ee377eu,
                 [](auto& g) { return unit<float, ends::closed>(g); });
    golden.draws("below", 0xa5cd17040eaf9ae5u,
                 [](auto& g) { return below(std::int64_t{1} << 40, g); });
    golden.draws("pick", 0x9006413ecbda4f66u, [](auto& g) {
        const std::array primes{2, 3, 5, 7, 11};
        return pick(primes, g);
    });
    golden.draws("shuffle", 0x49f1cfd342f4e4f7u, [](auto& g) {
        std::array cards{1, 2, 3, 4, 5, 6, 7, 8};
        shuffle(cards, g);
        return cards;
    });
    golden.draws("sample_without_replacement", 0xed52ef6b3089c680u,
                 [](auto& g) { return sample_without_replacement(1000, 5, g); });
    golden.sampler("uniform.double", 0x3fa7f147a87025e1u, [] { return uniform{-1.0, 2.5}; });
    golden.sampler("uniform.double.wide", 0x0fb242dc242344e0u, [] { return uniform{1e-6, 1e6}; });
    golden.sampler("uniform.float", 0x9001f80b7a8559a5u, [] {
        return uniform<float>{-1.0f, 2.5f};
    });
    golden.sampler("uniform_integer.32_bits", 0x475afd484bb2ff7bu, [] {
        return uniform_integer{1, 6};
    });
    golden.sampler("uniform_integer.64_bits", 0xc96580b02273d388u, [] {
        return uniform_integer<std::uint64_t>{9, (std::uint64_t{1} << 63) + 9};
    });

    golden.sampler("beta.gammas", 0x6302904d01a4cd42u, [] { return beta{2.3, 3.1}; });
    golden.sampler("beta.johnk", 0x779b54485f56e783u, [] { return beta{0.3, 0.4}; });
    golden.sampler("chi_squared", 0x194f379cfefee310u, [] { return chi_squared{7.5}; });
    golden.sampler("erlang", 0x15260dbfd8bc4c46u, [] { return erlang{3, 0.3}; });
    golden.sampler("exponential.double", 0x6d6dc9f5d9bbbfd1u, [] { return exponential{0.3}; });
    golden.sampler("exponential.float", 0x8844522bb5959887u,
                   [] { return exponential<float>{0.3f}; });
    golden.sampler("fisher_f", 0xdd32a918adbf4eefu, [] { return fisher_f{5, 8}; });
    golden.sampler("gamma.shape_above_1", 0x5de4523e47232070u, [] { return gamma{2.7, 3}; });
    golden.sampler("gamma.shape_below_1", 0x3a141d0ab08ef176u, [] { return gamma{0.3, 3}; });
    golden.sampler("gamma.float", 0x5c01065bf7f59b2eu, [] { return gamma<float>{2.7f, 3.0f}; });
    golden.sampler("inverse_gaussian", 0xafa685b102b10ee8u, [] { return inverse_gaussian{3, 7}; });
    golden.sampler("lognormal.double", 0xa8a6294738e7774bu, [] { return lognormal{0.5, 0.8}; });
    golden.sampler("lognormal.float", 0x2a2b79a4afcb17c5u, [] {
        return lognormal<float>{0.5f, 0.8f};
    });
    golden.sampler("normal.double", 0xed0ac9404c02ed76u, [] { return normal{-3.7, 12.1}; });
    golden.sampler("normal.float", 0x747c1469474ebd6cu, [] { return normal<float>{10, 3}; });
    golden.sampler("student_t", 0x196f90568c9ebc3bu, [] { return student_t{4.5}; });
    golden.sampler("truncated_normal.wide", 0xd734772e4ce12476u, [] {
        return truncated_normal{1, 2, -0.5, 9};
    });
    golden.sampler("truncated_normal.far", 0x18d260c202d4bed6u, [] {
        return truncated_normal{1, 2, 5, 9};
    });
    golden.sampler("von_mises", 0x971daea422a60d3du, [] { return von_mises{-2, 2.5}; });
    golden.sampler("bernoulli", 0xf3d8514f6c59a23bu, [] { return bernoulli{0.3}; });
    golden.sampler("binomial.inversion", 0x367a3faed4c53e65u, [] { return binomial{20, 0.3}; });
    golden.sampler("binomial.rejection", 0x64ffe8f6ebf69e34u, [] { return binomial{1000, 0.3}; });
    golden.sampler("categorical", 0x440c6e729e5bc3bbu, [] {
        return categorical{{1, 0, 2.5, 1e-3}};
    });
    golden.sampler("cauchy", 0xfc61b1459e2eb1efu, [] { return cauchy{3, 2}; });
    golden.sampler("dirichlet", 0x12cd67069db979adu, [] { return dirichlet{{0.2, 1, 3.5}}; });
    golden.sampler("empirical", 0x8d186e523679cdfbu, [] { return empirical{{3, 1, 2, 2.5}}; });
    golden.sampler("geometric", 0xcc5bd18cc2a00bfcu, [] { return geometric{0.01}; });
    golden.sampler("gumbel", 0x7cce60b29aae0e80u, [] { return gumbel{5, 2}; });
    golden.sampler("hypergeometric.small", 0x81f046d332cd9f2du, [] {
        return hypergeometric{60, 20, 10};
    });
    golden.sampler("hypergeometric.large", 0x16d38fd045da6eb5u, [] {
        return hypergeometric{100000, 30000, 5000};
    });
    golden.sampler("laplace", 0x25b42da122bbebeau, [] { return laplace{2, 0.5}; });
    golden.sampler("logistic", 0x0ff770b979e9e980u, [] { return logistic{-1, 2}; });
    golden.sampler("maxwell", 0x8b8835412cb4c186u, [] { return maxwell{1.5}; });
    golden.sampler("multinomial", 0xf5584d5e58fa223fu, [] { return multinomial{100, {1, 2, 3}}; });
    golden.sampler("multivariate_normal", 0x07ec2223f01244fau, [] {
        return multivariate_normal{{1, -2}, {{4, 1.2}, {1.2, 1}}};
    });
    golden.sampler("negative_binomial", 0x8935948cc66e21a5u, [] {
        return negative_binomial{2.5, 0.2};
    });
    golden.sampler("pareto", 0x7c517e3acc36d21bu, [] { return pareto{2, 1.5}; });
    golden.sampler("piecewise_linear", 0xcc1f726c12fc7d6au, [] {
        return piecewise_linear{{0, 1, 3}, {0, 1, 0.5}};
    });
    golden.sampler("poisson.inversion", 0x148b81726ff1adc2u, [] { return poisson{4.5}; });
    golden.sampler("poisson.rejection", 0x859e48824ad64a7du, [] { return poisson{1000.5}; });
    golden.sampler("rayleigh", 0x8ac849264f1bb9b8u, [] { return rayleigh{1.5}; });
    golden.sampler("triangular", 0x84eaba49c225b068u, [] { return triangular{-1, 0.5, 4}; });
    golden.sampler("weighted_index", 0x4cf4f13f33801085u, [] {
        return weighted_index{{1, 0, 2, 0.25, 8}};
    });
    golden.sampler("zipf", 0x5b088ccd68b9bd5eu, [] { return zipf{1.1, 1000}; });
    golden.sampler("weibull.double", 0x13efbf2f69acffa5u, [] { return weibull{2.3, 1500}; });
    golden.sampler("weibull.float", 0x912d4ba50b12fee9u, [] { return weibull<float>{1.5f, 2.0f}; });

    golden.sampler("disk", 0x12b89d7c2c4ecb47u, [] { return disk{{1e6, -3e5}, 0.7}; });
    golden.sampler("ellipse", 0x1d4db3355e30491du, [] { return ellipse{{-1, 0.3}, 5, 2, 0.6}; });
    golden.sampler("affine_image", 0x41c3a483b0e37c27u, [] {
        return affine_image{
            ball<3>{{0, 0, 0}, 1}, {{{2, 0, 1}, {0, 1, 0}, {0, 0.5, 3}}}, {1, 2, 3}};
    });
    golden.sampler("annulus", 0x51801ecd39cbb434u, [] { return annulus{{1, 2}, 0.5, 2}; });
    golden.sampler("ball.3", 0xf7c9821b76a4e6afu, [] { return ball{{1, 2, 3}, 0.7}; });
    golden.sampler("ball.6", 0xcc1471375bddcc58u, [] { return ball{{0, 0, 0, 0, 0, 0}, 2}; });
    golden.sampler("box", 0xfe7ac2ad0d51b100u, [] { return box{{0, 1, 2}, {3, 5, 9}}; });
    golden.sampler("cap", 0x6c0203abe69c7484u, [] { return cap{{0, 0, 0}, 2, {1, -2, 0.5}, 0.7}; });
    golden.sampler("cone", 0x3b457a731e3b18beu, [] { return cone{{0, 0, 0}, {1, -2, 0.5}, 2, 3}; });
    golden.sampler("cylinder", 0xb6d140086e3d6211u, [] {
        return cylinder{{0, 0, 0}, {1, -2, 0.5}, 2, 3};
    });
    golden.sampler("direction", 0xbc66eb4ab99f6aebu, [] {
        return von_mises_fisher{{1, -2, 0.5}, 7};
    });
    golden.sampler("ellipsoid", 0x6ecfa5132ae5c8f2u, [] {
        return ellipsoid{{0, 0, 0}, {1, 2, 3}};
    });
    golden.sampler("float", 0x366690697a5b9d95u, [] { return ball<3, float>{{0, 0, 0}, 1}; });
    golden.sampler("polyline", 0x99b12277b9b5bb2au, [] {
        return polyline<2>{{{0, 0}, {1, 1}, {3, 0}}};
    });
    golden.sampler("rotation", 0x00260eb1389acb02u, [] { return rotation{}; });
    golden.sampler("sector", 0xf50371fbfdd17956u, [] { return sector{{0, 0}, 2, 0.3, 1.9}; });
    golden.sampler("segment", 0x0b4aa81c61552d1fu, [] { return segment{{0, 0, 0}, {1, 2, 3}}; });
    golden.sampler("shell", 0x730c4a944cad028bu, [] { return shell{{0, 0, 0}, 1, 1.5}; });
    golden.sampler("sphere.3", 0x3f884639e907fd3cu, [] { return sphere{{0, 0, 0}, 2}; });
    golden.sampler("sphere.5", 0x251a183a0ff80121u, [] { return sphere{{0, 0, 0, 0, 0}, 2}; });
    golden.sampler("torus", 0x7db62a0abda2e9f1u, [] { return torus{{0, 0, 0}, 3, 1}; });
    golden.sampler("either", 0x90beb94f6ea824d1u, [] {
        return either{disk{{0, 0}, 2}, box<2>{{5, 0}, {7, 3}}};
    });
    golden.sampler("polygon", 0x52109233c436c09au, [] {
        return polygon<double>{{{0, 0}, {6, -1}, {5, 4}, {3, 1.5}, {1, 4}}};
    });
    golden.sampler("simplex", 0x95573833dea09d4du, [] { return simplex<4>{}; });
    golden.sampler("tetrahedron", 0x3af2f8082627e37eu, [] {
        return tetrahedron{{1, 2, 3}, {4, 2, 3}, {1, 7, 3}, {2, 2, 5}};
    });
    golden.sampler("triangle", 0x75c4a7c62ec5c907u, [] {
        return triangle{{0, 0}, {4, 0.5}, {1, 3}};
    });
    golden.sampler("triangle_mesh", 0x8838aefdf5001ebcu, [] {
        return triangle_mesh<double>{{{0, 0, 0}, {1, 0, 0}, {0, 2, 0}, {0, 0, 3}},
                                     {{0, 1, 2}, {0, 1, 3}}};
    });
    golden.sampler("without", 0x90e91fdb98a39d08u, [] {
        return without{box<2>{{0, 0}, {4, 4}}, disk{{2, 2}, 1}};
    });

    golden.draws("fill.braid", 0xa348607007811b1fu, [braid = xoshiro256_braid(1)](auto&) mutable {
        std::array<double, 20> values{};
        fill(values, uniform{0, 0.3}, braid);
        return values;
    });
    golden.draws("fill.stream", 0xf043eb336892ae64u, [words = source(1).stream()](auto&) mutable {
        std::array<double, 20> values{};
        fill(values, normal{0, 1}, words);
        return values;
    });
    golden.draws("fill_chunks", 0x6c67ffae8a1ffbe6u, [i = 0](auto&) mutable {
        std::array<double, 3> values{};
        fill_chunks(values, exponential{1}, source(1).branch(++i));
        return values;
    });

    golden.draws(
        "estimate", 0xef2668c95e507899u,
        [m = running_moments{}, sum = leat::exact_sum{}](auto& g) mutable {
            m.add(unit(g));
            m.add(exponential{1}(g));
            sum.add(m.max());
            const interval mean = normal_interval(m);
            return std::array<double, 4>{mean.lower, mean.upper, m.skewness(), sum.value()};
        });
}

/// Adds every digest that is not what it must be.
inline void check_golden(self_check_report& report) {
    const auto compare = [](void* context, const char* name, std::uint64_t expected,
                            std::uint64_t computed) {
        if (computed != expected) {
            static_cast<self_check_report*>(context)->add(
                {"golden digests", name,
                 "this build does not give the numbers that leat promises for a seed",
                 "see to the failures above first; if there are none, the compiler is at "
                 "fault, or files of two leat versions are mixed: report it",
                 true});
        }
    };
    each_golden(compare, &report);
}

} // namespace leat::detail

#endif
