// The historical engines against what they replay: the C library of this machine at run time,
// stored values of glibc (tests/reference/historical.json), GSL, <random>'s congruential engine,
// and the text of the C standard. The requirements of an engine, jumps included, are in
// tests/engines and tests/streams.

#include "leat/compat/historical.hpp"
#include "leat/streams/jump.hpp"
#include "support/reference.hpp"

#include <gsl/gsl_rng.h>
#include <gtest/gtest.h>

#include <cstdint>
#include <cstdio>
#include <cstdlib> // the functions that are replayed
#include <functional>
#include <memory>
#include <random>
#include <string>
#include <vector>

namespace {

using leat::additive_feedback31;
using leat::additive_feedback63;
using leat::iso_c_sample;
using leat::posix48;

using draw_function = std::function<std::int64_t()>;

constexpr int draws = 5000;

/// The value that srand48(), whose argument is signed, takes from a seed's text.
std::uint64_t seed_of(const std::string& text) {
    return text[0] == '-' ? 0 - std::stoull(text.substr(1)) : std::stoull(text);
}

std::int64_t times_2_48(double x) { return static_cast<std::int64_t>(x * 0x1p48); }

/// The engine that replays a function of the C library, seeded as that function's seeding does it.
draw_function replay(const std::string& function, std::uint64_t seed) {
    if (function == "rand" || function == "random") {
        return [e = additive_feedback31{seed}]() mutable { return std::int64_t{e()}; };
    }
    if (function == "random_256") {
        return [e = additive_feedback63{seed}]() mutable { return std::int64_t{e()}; };
    }
    if (function == "random_8") {
        // The method of the C standard's sample, which gives the upper 15 of its 31 bits; random()
        // makes the seed 0 a 1.
        return [e = iso_c_sample{seed == 0 ? 1 : seed}]() mutable { return std::int64_t{e()}; };
    }
    if (function == "drand48") {
        return [e = posix48{seed}]() mutable { return times_2_48(e.unit()); };
    }
    if (function == "lrand48") {
        return [e = posix48{seed}]() mutable { return std::int64_t{e.nonnegative()}; };
    }
    if (function == "mrand48") {
        return [e = posix48{seed}]() mutable { return std::int64_t{e.signed_word()}; };
    }
    throw std::invalid_argument(function);
}

/// What the stored value of a function stands for in the replay.
std::int64_t as_replayed(const std::string& function, std::int64_t value) {
    return function == "random_8" ? value >> 16 : value;
}

void expect_stored(const leat_test::json& entry, draw_function draw) {
    LEAT_TEST_REFERENCE(entry);
    const auto function = entry["group"].get<std::string>();
    const auto& expected = entry["expected"];
    std::vector<std::int64_t> values;
    std::uint64_t sum = 0;
    for (std::uint64_t i = 1; i <= draws; ++i) {
        values.push_back(draw());
        sum += i * static_cast<std::uint64_t>(values.back());
    }
    for (std::size_t i = 0; i < 10; ++i) {
        EXPECT_EQ(values[i],
                  as_replayed(function, std::stoll(expected["first"][i].get<std::string>())));
    }
    for (std::size_t i = 0; i < 5; ++i) {
        EXPECT_EQ(values[draws - 5 + i],
                  as_replayed(function, std::stoll(expected["last"][i].get<std::string>())));
    }
    if (function != "random_8") { // whose lower bits the replay has not
        EXPECT_EQ(sum, std::stoull(expected["sum"].get<std::string>()));
    }
}

void expect_all_stored() {
    int compared = 0;
    for (const auto& entry : leat_test::reference_entries("historical")) {
        const auto seed = entry["parameters"]["seed"].get<std::string>();
        if (seed != "none") {
            expect_stored(entry, replay(entry["group"].get<std::string>(), seed_of(seed)));
            ++compared;
        }
    }
    EXPECT_EQ(compared, 44);
}

TEST(Historical, ReplaysTheStoredValuesOfGlibc) { expect_all_stored(); }

// A glibc program that never seeds: X begins at 0. GSL documents the other start, the BSD family's.
TEST(Historical, ReplaysUnseededPrograms) {
    expect_stored(
        leat_test::reference_entry("historical.drand48.none"),
        [e = posix48{posix48::state_type{0, 0, 0}}]() mutable { return times_2_48(e.unit()); });
    posix48 by_default;
    posix48 as_bsd{posix48::state_type{0x330E, 0xABCD, 0x1234}};
    EXPECT_TRUE(by_default == as_bsd);
}

#if defined(__GLIBC__)

/// `seed` as the C library is seeded for a function, and the function.
draw_function c_library(const std::string& function, std::uint64_t seed) {
    static char state[256];
    const auto word = static_cast<unsigned>(seed);
    if (function == "rand") {
        std::srand(word);
        return [] { return std::int64_t{std::rand()}; };
    }
    if (function == "random") {
        static char own[128]; // the size of the state that the library begins with
        initstate(word, own, sizeof own);
        srandom(word);
        return [] { return std::int64_t{random()}; };
    }
    if (function == "random_256") {
        initstate(word, state, 256);
        return [] { return std::int64_t{random()}; };
    }
    if (function == "random_8") {
        initstate(word, state, 8);
        return [] { return std::int64_t{random()}; };
    }
    srand48(static_cast<long>(seed));
    if (function == "drand48") {
        return [] { return times_2_48(drand48()); };
    }
    if (function == "lrand48") {
        return [] { return std::int64_t{lrand48()}; };
    }
    return [] { return std::int64_t{mrand48()}; };
}

/// The first of 5000 values that differs, or 5000.
int first_difference(const std::string& function, const draw_function& library,
                     const draw_function& ours) {
    for (int i = 0; i < draws; ++i) {
        if (as_replayed(function, library()) != ours()) {
            return i;
        }
    }
    return draws;
}

TEST(Historical, ReplaysTheCLibraryOfThisMachine) {
    std::vector<std::uint64_t> seeds{1, 2,          42,         123456789,  4294967295,
                                     0, 2147483647, 2147483648, 2147483649, 3};
    std::mt19937 more; // ISO C++'s default seed
    for (int i = 0; i < 200; ++i) {
        seeds.push_back(more());
    }
    for (const char* function : {"rand", "random", "random_256", "random_8"}) {
        for (const std::uint64_t seed : seeds) {
            const draw_function library = c_library(function, seed);
            ASSERT_EQ(first_difference(function, library, replay(function, seed)), draws)
                << function << " after " << seed;
        }
    }
    for (const char* function : {"drand48", "lrand48", "mrand48"}) {
        for (const char* text : {"0", "1", "12345", "-7", "2147483647", "-2147483648"}) {
            const std::uint64_t seed = seed_of(text);
            const draw_function library = c_library(function, seed);
            ASSERT_EQ(first_difference(function, library, replay(function, seed)), draws)
                << function << " after " << text;
        }
    }
}

// The comparison is sharp: another seed, or one draw too many, is noticed within a few values.
TEST(Historical, NoticesAnotherSeedAndALostDraw) {
    for (const char* function : {"rand", "random_256", "random_8", "drand48"}) {
        draw_function library = c_library(function, 42);
        EXPECT_LT(first_difference(function, library, replay(function, 43)), 3) << function;
        library = c_library(function, 42);
        const draw_function late = replay(function, 42);
        late();
        EXPECT_LT(first_difference(function, library, late), 3) << function;
    }
}

TEST(Historical, TakesAStateAsSeed48Does) {
    unsigned short words[3] = {1, 65535, 4660};
    seed48(words);
    posix48 e{posix48::state_type{1, 65535, 4660}};
    for (int i = 0; i < draws; ++i) {
        ASSERT_EQ(drand48(), e.unit()) << i;
    }
    // erand48() leaves its state behind: ours is the same.
    posix48 stepped{posix48::state_type{9, 8, 7}};
    unsigned short own[3] = {9, 8, 7};
    EXPECT_EQ(erand48(own), stepped.unit());
    EXPECT_EQ(stepped.state(), (posix48::state_type{own[0], own[1], own[2]}));
}

TEST(Historical, JumpsWhereTheCLibraryWalks) {
    c_library("random", 2024);
    srand48(2024);
    for (int i = 0; i < 1000000; ++i) {
        static_cast<void>(random());
        static_cast<void>(lrand48());
    }
    additive_feedback31 sums{2024};
    posix48 product{2024};
    jump(sums, 1000000);
    jump(product, 1000000);
    for (int i = 0; i < 100; ++i) {
        ASSERT_EQ(sums(), static_cast<std::uint32_t>(random()));
        ASSERT_EQ(product.nonnegative(), lrand48());
    }
}

#else

TEST(Historical, ReplaysTheCLibraryOfThisMachine) {
    std::puts("The C library here is not glibc: compared with the stored values of glibc instead.");
    expect_all_stored();
}

#endif

/// A generator of GSL.
class gsl {
public:
    gsl(const gsl_rng_type* method, unsigned long seed)
        : rng_(gsl_rng_alloc(method), gsl_rng_free) {
        gsl_rng_set(rng_.get(), seed);
    }
    unsigned long operator()() { return gsl_rng_get(rng_.get()); }
    double unit() { return gsl_rng_uniform(rng_.get()); }

private:
    std::unique_ptr<gsl_rng, decltype(&gsl_rng_free)> rng_;
};

// GSL's random_glibc2 and random256_glibc2, seeds below 2^31; its rand48, for which the seed 0
// means the start of the BSD family; and its rand, the C standard's recurrence before any bits are
// cut.
TEST(Historical, AgreesWithGsl) {
    for (const unsigned long seed : {1ul, 2ul, 42ul, 123456789ul, 2147483646ul}) {
        gsl sums(gsl_rng_random_glibc2, seed);
        gsl longer(gsl_rng_random256_glibc2, seed);
        gsl product(gsl_rng_rand48, seed);
        gsl product_unit(gsl_rng_rand48, seed);
        gsl sample(gsl_rng_rand, seed);
        additive_feedback31 our_sums{seed};
        additive_feedback63 our_longer{seed};
        posix48 our_product{seed};
        posix48 our_product_unit{seed};
        iso_c_sample our_sample{seed};
        for (int i = 0; i < draws; ++i) {
            ASSERT_EQ(sums(), our_sums()) << seed << ", " << i;
            ASSERT_EQ(longer(), our_longer()) << seed << ", " << i;
            ASSERT_EQ(product(), our_product()) << seed << ", " << i;
            ASSERT_EQ(product_unit.unit(), our_product_unit.unit()) << seed << ", " << i;
            ASSERT_EQ(sample() >> 16, our_sample()) << seed << ", " << i;
        }
    }
    gsl bsd(gsl_rng_rand48, 0);
    posix48 by_default;
    for (int i = 0; i < draws; ++i) {
        ASSERT_EQ(bsd(), by_default()) << i;
    }
}

// ISO/IEC 9899:2018, 7.22.2.2, the example as printed; its unsigned long has 32 bits or 64.
template <class UnsignedLong>
struct sample_of_the_standard {
    UnsignedLong next = 1;
    int rand() {
        next = next * 1103515245 + 12345;
        return static_cast<int>(static_cast<unsigned>(next / 65536) % 32768);
    }
    void srand(unsigned seed) { next = seed; }
};

TEST(Historical, ReplaysTheSampleOfTheCStandard) {
    sample_of_the_standard<std::uint32_t> narrow;
    sample_of_the_standard<std::uint64_t> wide;
    iso_c_sample unseeded;
    for (int i = 0; i < draws; ++i) {
        const auto ours = static_cast<int>(unseeded());
        ASSERT_EQ(narrow.rand(), ours);
        ASSERT_EQ(wide.rand(), ours);
    }
    for (const unsigned seed : {0u, 1u, 2u, 42u, 123456789u, 2147483648u, 4294967295u}) {
        narrow.srand(seed);
        wide.srand(seed);
        iso_c_sample e{seed};
        for (int i = 0; i < draws; ++i) {
            const auto ours = static_cast<int>(e());
            ASSERT_EQ(narrow.rand(), ours) << seed;
            ASSERT_EQ(wide.rand(), ours) << seed;
        }
    }
}

// States and seed sequences as <random> has them for the same constants.
TEST(Historical, IsTheCongruentialEngineOfIsoCpp) {
    using std_sample =
        std::linear_congruential_engine<std::uint32_t, 1103515245, 12345, 2147483648>;
    using std_48 =
        std::linear_congruential_engine<std::uint64_t, 25214903917, 11, std::uint64_t{1} << 48>;
    const auto joined = [](const posix48& e) {
        const auto words = e.state();
        return words[0] | std::uint64_t{words[1]} << 16 | std::uint64_t{words[2]} << 32;
    };
    for (const std::uint32_t word : {0u, 1u, 77u, 4294967295u}) {
        std::seed_seq q{word, 5u, word};
        std_sample sample(q);
        std_48 product(q);
        iso_c_sample our_sample{q};
        posix48 our_product{q};
        for (int i = 0; i < draws; ++i) {
            our_sample();
            our_product();
            ASSERT_EQ(sample(), our_sample.state());
            ASSERT_EQ(product(), joined(our_product));
        }
    }
}

// The period, by the order of x modulo the trinomial: 2^31 (2^31 - 1), both of whose kinds of prime
// factors count (2^31 - 1 is prime, Euler 1772). For 63: 2^63 - 1 = 7^2 73 127 337 92737 649657
// (factors from memory, their product is checked).
template <class Engine>
void expect_period(const std::vector<std::uint64_t>& odd_factors) {
    leat::wide_integer product{1};
    for (const std::uint64_t f : odd_factors) {
        product = product * leat::wide_integer{f};
    }
    ASSERT_TRUE((product << 31) == Engine::period());
    const auto moved = [](const leat::wide_integer& distance) {
        Engine e{20261201};
        e.advance(distance);
        return e == Engine{20261201};
    };
    Engine once_round{20261201};
    once_round.advance(Engine::period() - 1); // the whole one may be reduced to nothing
    once_round();
    EXPECT_TRUE(once_round == Engine{20261201});
    EXPECT_FALSE(moved(Engine::period() / leat::wide_integer{2}));
    for (const std::uint64_t f : odd_factors) {
        EXPECT_FALSE(moved(Engine::period() / leat::wide_integer{f})) << f;
    }
}

TEST(Historical, HasThePeriodOfAPrimitiveTrinomial) {
    expect_period<additive_feedback31>({2147483647});
    expect_period<additive_feedback63>({7, 7, 73, 127, 337, 92737, 649657});
}

TEST(Historical, RefusesASumOfEvenWords) {
    additive_feedback31::state_type state{};
    state[5] = 6;
    try {
        const additive_feedback31 e{state};
        FAIL();
    } catch (const leat::invalid_parameter& refusal) {
        EXPECT_STREQ(refusal.what(),
                     "leat::additive_feedback31: lowest bit of every word = 0, must "
                     "be 1 in at least one");
    }
    state[30] = 1;
    EXPECT_NO_THROW(additive_feedback31{state});
}

// drand48() can give 0, and unit() with it: the state before X = 0 is one that some seed reaches.
TEST(Historical, GivesZeroAsDrand48Does) {
    posix48 e{posix48::state_type{0, 0, 0}};
    rewind(e, 1);
    EXPECT_EQ(e.unit(), 0.0);
}

} // namespace
