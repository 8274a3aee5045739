// The two ziggurats: their tables against the published construction, and what each word does.
// Whether the values are distributed as they should be is tested in goodness_test.cpp.

#include "leat/distributions/detail/ziggurat.hpp"

#include "leat/engines/xoshiro.hpp"
#include "leat/testing/engines.hpp"
#include "support/reference.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <cstdint>
#include <string>

namespace {

namespace ld = leat::detail;
using leat_test::json;

double number(const json& value) { return std::stod(value.get<std::string>()); }

double normal_density(double x) { return std::exp(-x * x / 2); }
double exponential_density(double x) { return std::exp(-x); }

/// Width of a layer as a number (the table holds it over 2^53).
double width(const ld::ziggurat_layer& layer) { return std::ldexp(layer.width, 53); }

/// Marsaglia and Tsang's conditions: layer 0 is the base with the tail, x[1] = r; every layer has
/// area v; a word is accepted at once below x[i + 1] / x[i].
template <class Density>
void expect_equal_layers(const ld::ziggurat_layer (&layers)[256], const double (&heights)[257],
                         double r, double v, Density density) {
    EXPECT_DOUBLE_EQ(width(layers[1]), r);
    EXPECT_DOUBLE_EQ(width(layers[0]), v / density(r));
    EXPECT_DOUBLE_EQ(heights[0], density(r));
    EXPECT_EQ(heights[256], 1);
    for (std::size_t i = 1; i < 256; ++i) {
        const double height = density(width(layers[i]));
        EXPECT_NEAR(heights[i], height, 4e-15 * height) << i; // the test's own rounding
        EXPECT_NEAR(width(layers[i]) * (heights[i + 1] - heights[i]), v, 1e-14) << i;
    }
    for (std::size_t i = 0; i < 256; ++i) {
        const double next = i == 255 ? 0 : width(layers[i + 1]);
        const double share = std::ldexp(static_cast<double>(layers[i].bar), -64);
        EXPECT_NEAR(share, next / width(layers[i]), 1e-15) << i;
        EXPECT_LE(share * width(layers[i]), next * (1 + 0x1p-52)) << i; // never beyond the density
        EXPECT_EQ(layers[i].bar & 0xFFFu, 0u) << i; // only the place decides, not layer or sign
    }
}

TEST(Ziggurat, NormalLayersAreThePublishedOnes) {
    const json entry = leat_test::reference_entry("distributions.ziggurat.normal.256");
    LEAT_TEST_REFERENCE(entry);
    const double r = number(entry["expected"]["r"]);
    EXPECT_DOUBLE_EQ(ld::normal_tail, r);
    EXPECT_NEAR(r, number(entry["expected"]["printed_r"]), 5e-14);
    const double v = number(entry["expected"]["v"]);
    expect_equal_layers(ld::normal_layers, ld::normal_heights, r, v, normal_density);
}

// r and v of 256 layers of exp(-x) are the paper's 7.69711747013104972 and
// 0.0039496598225815571993, from memory; that all layers have one area and end at the top pins
// both.
TEST(Ziggurat, ExponentialLayersAreThePublishedOnes) {
    const double r = 7.69711747013104972;
    const double v = 0.0039496598225815571993;
    EXPECT_DOUBLE_EQ(ld::exponential_tail, r);
    EXPECT_NEAR(v, (r + 1) * std::exp(-r), 1e-17); // the area of base and tail, in closed form
    expect_equal_layers(ld::exponential_layers, ld::exponential_heights, r, v, exponential_density);
}

/// A word that falls in a layer, with a sign, at a place k.
std::uint64_t word_of(std::uint64_t layer, std::uint64_t sign, std::uint64_t k) {
    return (k << 12) | (sign << 8) | layer;
}

TEST(Ziggurat, AWordBelowTheBarGivesItsPlaceInTheLayer) {
    for (const std::uint64_t layer : {0u, 1u, 100u, 254u}) {
        const std::uint64_t k = (ld::normal_layers[layer].bar >> 12) - 1; // the last one accepted
        const double place = std::ldexp(static_cast<double>(k) + 0.5, -52);
        leat::scripted plus{word_of(layer, 0, k)};
        leat::scripted minus{word_of(layer, 1, k) | 0xE00u}; // bits 9 to 11 do nothing
        const double x = ld::standard_normal(plus);
        EXPECT_DOUBLE_EQ(x, place * width(ld::normal_layers[layer]));
        EXPECT_EQ(ld::standard_normal(minus), -x);

        const std::uint64_t last = (ld::exponential_layers[layer].bar >> 12) - 1;
        leat::scripted g{word_of(layer, 1, last)};
        EXPECT_DOUBLE_EQ(ld::standard_exponential(g),
                         std::ldexp(static_cast<double>(last) + 0.5, -52) *
                             width(ld::exponential_layers[layer]));
    }
}

TEST(Ziggurat, ZeroIsNeverDrawn) {
    leat::all_zeros g;
    EXPECT_GT(ld::standard_exponential(g), 0);
    EXPECT_GT(ld::standard_normal(g), 0);
    leat::constant top{255}; // the narrowest layer accepts none at once, but with a low second word
    EXPECT_GT(ld::standard_exponential(top), 0);
}

// Between the edges of a layer a second word is held against the density, at a height of its own.
TEST(Ziggurat, BetweenTheEdgesTheDensityDecides) {
    const std::uint64_t layer = 128;
    const std::uint64_t k = (std::uint64_t{1} << 52) - (std::uint64_t{1} << 42);
    const double x = width(ld::normal_layers[layer]) * std::ldexp(static_cast<double>(k), -52);
    const double low = ld::normal_heights[layer];
    const double share = (normal_density(x) - low) / (ld::normal_heights[layer + 1] - low);
    ASSERT_GT(share, 1e-6);
    ASSERT_LT(share, 1);
    const auto height = [&](double factor) {
        return static_cast<std::uint64_t>(std::ldexp(share * factor, 64));
    };
    leat::scripted under{word_of(layer, 1, k), height(0.9999)};
    EXPECT_NEAR(ld::standard_normal(under), -x, 1e-12);
    leat::scripted over{word_of(layer, 1, k), height(1.0001), word_of(1, 0, 0)};
    EXPECT_DOUBLE_EQ(ld::standard_normal(over), std::ldexp(width(ld::normal_layers[1]), -53));
    EXPECT_EQ(over.asked(), 3u);
}

// The tail: r + E for the exponential; r + E1 / r with 2 E2 > (E1 / r)^2 for the normal.
TEST(Ziggurat, TailsGoOnWithExponentials) {
    const std::uint64_t outside = word_of(0, 1, (std::uint64_t{1} << 52) - 1);
    const std::uint64_t one = word_of(3, 0, std::uint64_t{1} << 51);
    leat::scripted alone{one};
    const double e = ld::standard_exponential(alone);

    leat::scripted once{outside, one};
    EXPECT_DOUBLE_EQ(ld::standard_exponential(once), ld::exponential_tail + e);
    leat::scripted twice{outside, outside, one};
    EXPECT_DOUBLE_EQ(ld::standard_exponential(twice), 2 * ld::exponential_tail + e);

    leat::scripted normal{outside, one, one};
    EXPECT_DOUBLE_EQ(ld::standard_normal(normal), -(ld::normal_tail + e / ld::normal_tail));
    const std::uint64_t tiny = word_of(3, 0, 0); // E2 too small at first, E1 next to 0 then
    leat::scripted again{outside, one, tiny, tiny, one};
    EXPECT_DOUBLE_EQ(ld::standard_normal(again), -ld::normal_tail);
    EXPECT_EQ(again.asked(), 5u);
}

/// How many words a million draws take.
template <class Draw>
double words_per_draw(Draw draw) {
    struct counting {
        static constexpr std::uint64_t min() { return 0; }
        static constexpr std::uint64_t max() { return ~std::uint64_t{0}; }
        std::uint64_t operator()() {
            ++drawn;
            return g();
        }
        leat::xoshiro256_plus_plus g{12};
        double drawn = 0;
    } g;
    for (int i = 0; i < 1000000; ++i) {
        static_cast<void>(draw(g));
    }
    return g.drawn / 1e6;
}

// The reference gives the share of the layers' area that the density takes up, a: 1 / a trials of
// one word; besides, each trial that is not accepted at once takes a word or two more.
TEST(Ziggurat, WordsConsumedAreAsTheHeaderSays) {
    const json entry = leat_test::reference_entry("distributions.ziggurat.normal.256");
    LEAT_TEST_REFERENCE(entry);
    const double trials = 1 / entry["expected"]["total_area_ratio"].get<double>();
    const double normal = words_per_draw([](auto& g) { return ld::standard_normal(g); });
    EXPECT_GT(normal, trials);
    EXPECT_NEAR(normal, 1.022, 0.001); // measured; its standard error is 0.0002
    EXPECT_NEAR(words_per_draw([](auto& g) { return ld::standard_exponential(g); }), 1.033, 0.001);
}

} // namespace
