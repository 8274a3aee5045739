// Deals one classic engine to a number of workers, a block each, and proves that none meets
// another.
//
//     leat_block_deal [workers [draws]]        default: 8 workers, 1000000 draws each
//
// The engine is Park and Miller's minimal standard (48271), whose period of 2^31 - 2 is short
// enough for two workers to meet by bad luck. The proof is a count of steps from each worker's
// start to each other's: where all of them are at least the draws planned, no worker reaches a
// number that another one uses. Beside the blocks stands the habit they replace: seeds 1, 2, 3, ...

#include "leat/engines/lehmer.hpp"
#include "leat/streams/split.hpp"
#include "leat/streams/steps.hpp"

#include <charconv>
#include <cstdint>
#include <cstdio>
#include <string_view>
#include <vector>

namespace {

using engine_type = leat::minimal_standard_48271;

constexpr std::uint64_t first_seed = 20261201;

std::uint64_t steps(const engine_type& from, const engine_type& to) {
    // A primitive root has one cycle, so that there always is a number of steps.
    return static_cast<std::uint64_t>(*leat::steps_between(from, to));
}

/// The least number of steps from one start to any other; the period where there is no other.
std::uint64_t steps_to_next(const std::vector<engine_type>& starts, std::size_t worker) {
    auto least = static_cast<std::uint64_t>(engine_type::period());
    for (std::size_t other = 0; other < starts.size(); ++other) {
        if (other != worker) {
            const std::uint64_t distance = steps(starts[worker], starts[other]);
            least = distance < least ? distance : least;
        }
    }
    return least;
}

/// Prints a row a worker; whether every one can make the planned draws without meeting another.
bool report(const std::vector<engine_type>& starts, std::uint64_t planned) {
    std::puts("  worker  start state  steps to the nearest start  verdict");
    bool apart = true;
    for (std::size_t worker = 0; worker < starts.size(); ++worker) {
        const std::uint64_t distance = steps_to_next(starts, worker);
        const bool sound = distance >= planned;
        apart = apart && sound;
        std::printf("  %6zu  %11u  %26llu  %s\n", worker, starts[worker].state(),
                    static_cast<unsigned long long>(distance), sound ? "apart" : "MEETS");
    }
    return apart;
}

/// Reads a number of 1 to `most`; false for anything else.
bool read(std::string_view text, std::uint64_t most, std::uint64_t& number) {
    const auto [end, failure] = std::from_chars(text.data(), text.data() + text.size(), number);
    return failure == std::errc{} && end == text.data() + text.size() && number >= 1 &&
           number <= most;
}

} // namespace

int main(int count, char** arguments) {
    const auto period = static_cast<std::uint64_t>(engine_type::period());
    std::uint64_t workers = 8;
    std::uint64_t planned = 1000000;
    if (count > 3 || (count > 1 && !read(arguments[1], 1000, workers)) ||
        (count > 2 && !read(arguments[2], period / workers, planned))) {
        std::fputs("usage: leat_block_deal [workers [draws]]: 1 to 1000 workers, and together at "
                   "most 2^31 - 2 draws\n",
                   stderr);
        return 2;
    }

    // Equal blocks that use the whole period leave every worker all the room there is.
    const engine_type engine{first_seed};
    const std::uint64_t length = period / workers;
    std::vector<engine_type> dealt;
    std::vector<engine_type> seeded;
    bool whole = true;
    for (std::uint64_t worker = 0; worker < workers; ++worker) {
        auto mine = leat::block(engine, worker, length);
        const engine_type start = mine.engine();
        for (std::uint64_t i = 0; i < planned; ++i) {
            mine(); // here a worker would do its work
        }
        whole = whole && steps(start, mine.engine()) == planned % period;
        dealt.push_back(start);
        seeded.push_back(engine_type{worker + 1});
    }

    std::printf("%llu workers, %llu draws each, from one minimal standard engine (48271)\n\n",
                static_cast<unsigned long long>(workers), static_cast<unsigned long long>(planned));
    std::printf("Blocks of %llu draws, from seed %llu:\n", static_cast<unsigned long long>(length),
                static_cast<unsigned long long>(first_seed));
    const bool blocks_apart = report(dealt, planned);
    std::printf("\nConsecutive seeds instead:\n");
    const bool seeds_apart = report(seeded, planned);

    std::printf("\nBlocks: %s, and every worker was found just its planned draws further on: %s.\n",
                blocks_apart ? "no worker meets another" : "SOME WORKERS MEET",
                whole ? "yes" : "NO");
    std::printf(
        "Consecutive seeds: %s; nobody chose these distances, and the draws of seed k are k "
        "times those of seed 1, modulo 2^31 - 1.\n",
        seeds_apart ? "apart this time" : "some workers meet");
    return blocks_apart && whole ? 0 : 1;
}
