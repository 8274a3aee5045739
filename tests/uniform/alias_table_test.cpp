// The table behind choices by weight: how many words each outcome has, counted. The definition is
// the reference: shares of the sum, in exact rational arithmetic (GMP).

#include "leat/uniform/alias_table.hpp"

#include "leat/engines/xoshiro.hpp"

#include <gmp.h>
#include <gtest/gtest.h>

#include <cmath>
#include <cstdint>
#include <limits>
#include <numeric>
#include <vector>

namespace {

using leat::detail::alias_table;

/// How many of all words each outcome has, word by word.
template <class Word>
std::vector<std::uint32_t> counted(const std::vector<double>& weights) {
    const alias_table<Word> table(weights);
    std::vector<std::uint32_t> count(weights.size());
    Word word = 0;
    do {
        ++count.at(table.at(word));
    } while (++word != 0);
    return count;
}

/// The number that the header promises, for weights that are small whole numbers.
template <class Word>
std::vector<std::uint32_t> promised(const std::vector<double>& weights) {
    const auto total =
        static_cast<std::uint64_t>(std::accumulate(weights.begin(), weights.end(), 0.0));
    std::vector<std::uint32_t> count;
    std::uint64_t sum = 0;
    std::uint64_t before = 0;
    for (const double w : weights) {
        sum += static_cast<std::uint64_t>(w);
        const std::uint64_t upto = (sum << std::numeric_limits<Word>::digits) / total;
        count.push_back(static_cast<std::uint32_t>(upto - before));
        before = upto;
    }
    return count;
}

TEST(AliasTable, EveryShortWordGoesToItsOutcome) {
    leat::xoshiro256_plus_plus g{1};
    std::vector<std::vector<double>> cases{{1},         {7, 0},       {0, 0, 5, 0},   {1, 1},
                                           {1, 2},      {1, 1, 1},    {1, 255},       {3, 0, 5},
                                           {256, 1, 1}, {1, 0, 9000}, {1000, 1, 1000}};
    for (const std::size_t n : {4u, 5u, 16u, 31u, 100u, 256u}) {
        std::vector<double> weights(n);
        cases.push_back(std::vector<double>(n, 3)); // all alike
        for (double& w : weights) {
            w = static_cast<double>(g() >> 54);
        }
        cases.push_back(weights);
        for (double& w : weights) {
            w = (g() >> 62) == 0 ? static_cast<double>(g() >> 44) : 0; // most never drawn
        }
        weights[n / 2] = 1;
        cases.push_back(weights);
    }
    for (const auto& weights : cases) {
        EXPECT_EQ(counted<std::uint8_t>(weights), promised<std::uint8_t>(weights));
        EXPECT_EQ(counted<std::uint16_t>(weights), promised<std::uint16_t>(weights));
    }
}

TEST(AliasTable, AsManyOutcomesAsShortWords) {
    std::vector<double> weights(65536, 0.25);
    EXPECT_EQ(counted<std::uint16_t>(weights), std::vector<std::uint32_t>(65536, 1));
}

/// How many 64-bit words each outcome has. Within a column of the table at() changes once, from
/// the column's own outcome to its alias: where, is found by halving.
std::vector<std::uint64_t> words_of(const std::vector<double>& weights) {
    const alias_table<> table(weights);
    std::size_t columns = 2;
    int rest_bits = 63;
    for (; columns < weights.size(); columns *= 2) {
        --rest_bits;
    }
    std::vector<std::uint64_t> count(weights.size());
    for (std::uint64_t j = 0; j < columns; ++j) {
        const std::uint64_t first = j << rest_bits;
        const std::uint64_t last = first + ((std::uint64_t{1} << rest_bits) - 1);
        const std::size_t alias = table.at(last);
        std::uint64_t low = first; // at(x) is the alias from some x on, which lies in low .. high
        std::uint64_t high = last;
        while (low < high) {
            const std::uint64_t middle = low + (high - low) / 2;
            if (table.at(middle) == alias) {
                high = middle;
            } else {
                EXPECT_EQ(table.at(middle), j);
                low = middle + 1;
            }
        }
        count.at(alias) += last - low + 1;
        if (low > first) {
            count.at(j) += low - first;
        }
    }
    return count;
}

/// c - 2^64 w / total, exactly computed and then rounded.
class share_in_words {
public:
    explicit share_in_words(const std::vector<double>& weights) {
        mpq_inits(total_, x_, nullptr);
        for (const double w : weights) {
            mpq_set_d(x_, w);
            mpq_add(total_, total_, x_);
        }
    }
    share_in_words(const share_in_words&) = delete;
    share_in_words& operator=(const share_in_words&) = delete;
    ~share_in_words() { mpq_clears(total_, x_, nullptr); }

    double excess(std::uint64_t count, double weight) {
        mpq_set_d(x_, weight);
        mpq_div(x_, x_, total_);
        mpq_mul_2exp(x_, x_, 64);
        mpq_t c;
        mpq_init(c);
        mpq_set_d(c, static_cast<double>(count >> 32));
        mpq_mul_2exp(c, c, 32);
        mpq_t low;
        mpq_init(low);
        mpq_set_d(low, static_cast<double>(count & 0xFFFFFFFFu));
        mpq_add(c, c, low);
        mpq_sub(c, c, x_);
        const double result = mpq_get_d(c);
        mpq_clears(c, low, nullptr);
        return result;
    }

private:
    mpq_t total_;
    mpq_t x_;
};

void expect_exact_shares(const std::vector<double>& weights) {
    const auto count = words_of(weights);
    share_in_words share(weights);
    std::uint64_t sum = 0;
    for (std::size_t i = 0; i < weights.size(); ++i) {
        sum += count[i];
        if (weights[i] == 0) {
            EXPECT_EQ(count[i], 0u) << i;
        } else {
            EXPECT_LT(std::abs(share.excess(count[i], weights[i])), 1 + 1e-5) << i;
        }
    }
    EXPECT_EQ(sum, 0u); // 2^64
}

TEST(AliasTable, SharesOfAllWordsAreExact) {
    leat::xoshiro256_plus_plus g{2};
    for (const std::size_t n : {2u, 3u, 10u, 255u, 256u, 257u, 1000u}) {
        std::vector<double> alike(n, 0.1);
        expect_exact_shares(alike);
        std::vector<double> mixed(n);
        for (double& w : mixed) {
            w = (g() >> 63) == 0 ? 0.0 : static_cast<double>(g() >> 11) * 0x1p-53;
        }
        mixed[0] = 1;
        mixed[1] = 0.3;
        expect_exact_shares(mixed);
    }
    expect_exact_shares({0.1, 0.7, 0.2});
    expect_exact_shares({1, 0x1p-63, 0x1p-64, 0x1p-65, 1}); // about one word
}

TEST(AliasTable, WeightsOfEverySize) {
    constexpr double least = std::numeric_limits<double>::denorm_min();
    constexpr double most = std::numeric_limits<double>::max();
    expect_exact_shares({most, most, most, most});
    expect_exact_shares({least, 3 * least, 0, least});
    expect_exact_shares({1e300, 1, 1e-300, 9e299});
    std::vector<double> ladder;
    for (int i = -1074; i < 1024; ++i) {
        ladder.push_back(std::ldexp(1.0, i));
    }
    expect_exact_shares(ladder);
    // One outcome has all words.
    for (const auto& weights : {std::vector<double>{1e-300, most, least}, {0, 0, least, 0}}) {
        const alias_table<> table(weights);
        const std::size_t owner = weights[1] > 0 ? 1 : 2;
        for (const std::uint64_t word : {std::uint64_t{0}, ~std::uint64_t{0} >> 2,
                                         ~std::uint64_t{0} >> 1, ~std::uint64_t{0}}) {
            EXPECT_EQ(table.at(word), owner);
        }
    }
}

TEST(AliasTable, ConstantEvaluationAgrees) {
    constexpr auto sum = [] {
        const std::vector<double> weights{0.5, 0, 3, 1e-3, 2};
        const alias_table<> table(weights);
        leat::xoshiro256_plus_plus g{3};
        std::size_t total = 0;
        for (int i = 0; i < 100; ++i) {
            total = 3 * total + table(g);
        }
        return total;
    };
    constexpr std::size_t at_compile_time = sum();
    EXPECT_EQ(sum(), at_compile_time);
}

} // namespace
