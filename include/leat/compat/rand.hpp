// compat::rand() and its kin: in place of the C library's, in programs that call rand() all over.
//
//     #include "leat/compat/rand.hpp"
//     leat::compat::srand(20261201);              // once, in the thread that begins
//     leat::compat::rand_thread(worker);          // first thing in every other thread
//     int face = leat::compat::rand_between(1, 6);
//
//   the habit                                        instead
//   srand(seed)                                      srand(seed), a text or a leat::source too
//   rand(), RAND_MAX, random()                       rand(), rand_max: 0 to 2^31 - 1
//   rand() / (RAND_MAX + 1.0), drand48()             rand_unit(): open, neither 0 nor 1
//   a + (b - a) * rand() / RAND_MAX                  rand_real(a, b): open
//   rand() % n, (int)(n * drand48())                 rand_below(n): unbiased
//   lo + rand() % (hi - lo + 1)                      rand_between(lo, hi): unbiased, both ends in
//   rand() < p * RAND_MAX, rand() % 100 < 30         rand_chance(p), rand_chance(0.3)
//   (rand() << 16) | rand(), mrand48()               rand_stream()(): 64 bits
//   -log(rand() / ...), a sum of 12, a shuffle       samplers of leat, drawing from rand_stream()
//
// Threads. Under one process seed each thread has a stream of its own. The caller numbers the
// threads, because a number given by the system would differ from run to run: rand_thread(i) makes
// the calling thread number i. One thread needs no number: the first that calls anything here
// without one. Any other thread without a number gets an error that says what to do. So does a
// number that another running thread has. Where a thread ends and a later one takes its number, the
// later one goes on where the earlier stopped: a number is drawn from once, whoever draws.
// Nothing here locks but the first draw after srand(), rand_thread(), and the end of a thread.
//
// srand() in the thread without a number, or in number 0; elsewhere it is an error, as a seed for
// each thread is not what it sets. It starts every number anew: the next draw of each thread, also
// of one that is running and has drawn, is the first of its stream under the new seed. So call it
// while no other thread draws, or that thread changes seeds wherever it happens to be. Without
// srand() the seed is 1, as in C.
//
// Consumed: one 64-bit word a call; more, rarely, by rand_below, rand_between and rand_chance.
// Frozen: the stream is source{seed}.stream("compat.rand", i), without a number
// source{seed}.stream("compat.rand"); rand() is the upper 31 bits of a word.
//
// Errors: `error` in a thread that may not draw or seed; refusals as the samplers called have them.
// This is hidden state, the one exemption from promise P8, and a program has it once. A child made
// by fork() begins with a copy and repeats its parent's numbers: call rand_thread(i) in it, with
// numbers of its own. Windows DLLs, and shared libraries with hidden symbols, have a copy each:
// draw in one.
//
// For the way out of rand() calls. New code, and code that can be changed, takes a leat::stream&
// from its caller. To replay what rand() gave before, see historical.hpp. Not for keys, tokens,
// lotteries or gambling.

#ifndef LEAT_COMPAT_RAND_HPP
#define LEAT_COMPAT_RAND_HPP

#include "leat/core/errors.hpp"
#include "leat/distributions/bernoulli.hpp"
#include "leat/streams/source.hpp"
#include "leat/uniform/open_interval.hpp"
#include "leat/uniform/uniform_integer.hpp"
#include "leat/uniform/unit.hpp"

#include <atomic>
#include <cstdint>
#include <limits>
#include <map>
#include <mutex>

namespace leat {
namespace detail {

/// What the thread of one number, or the one without, draws from.
struct rand_sequence {
    leat::stream words;
    std::uint64_t number;
    bool is_numbered;
    bool is_held;          // by a running thread; changed under the lock only
    std::uint32_t seeding; // the srand() that `words` belong to
};

/// The state behind compat::rand(), one for the whole process.
class rand_process {
public:
    /// Never destroyed: a thread may draw until the very end.
    static rand_process& only() {
        static rand_process* const process = new rand_process;
        return *process;
    }

    /// The words of the calling thread. `name` is the function that asks.
    static leat::stream& words(const char* name) {
        if (held == nullptr) [[unlikely]] {
            only().hold_unnumbered(name);
        }
        if (held->seeding != seeding.load(std::memory_order_acquire)) [[unlikely]] {
            only().start_anew();
        }
        return held->words;
    }

    void seed(const source& study) {
        const std::scoped_lock lock(mutex_);
        if (held == nullptr) {
            take_unnumbered("srand");
        } else if (held->is_numbered && held->number != 0) {
            message m;
            m.text("leat::compat::srand: called in thread ").value(held->number);
            raise<error>(m.text("; one seed serves all threads: call it once, in the thread "
                                "without a number or in thread 0, while no other one draws"));
        }
        study_ = study;
        seeding.store(seeding.load(std::memory_order_relaxed) + 1, std::memory_order_release);
    }

    void number_thread(std::uint64_t i) {
        const std::scoped_lock lock(mutex_);
        const auto [place, is_new] = numbered_.try_emplace(
            i, rand_sequence{opened(i, true), i, true, false, seeding.load()});
        rand_sequence& wanted = place->second;
        if (&wanted != held) {
            if (wanted.is_held) {
                refuse("compat::rand_thread", "i", i,
                       "must not be the number of another running thread");
            }
            hold(wanted);
        }
    }

private:
    rand_process() = default;

    void hold_unnumbered(const char* name) {
        const std::scoped_lock lock(mutex_);
        take_unnumbered(name);
    }
    void take_unnumbered(const char* name) {
        if (is_unnumbered_taken_) {
            message m;
            raise<error>(m.text("leat::compat::")
                             .text(name)
                             .text(": called in a thread without a number, and another thread drew "
                                   "or seeded without one; begin each further thread with "
                                   "leat::compat::rand_thread(i), i = 0, 1, 2, ... as the program "
                                   "counts its workers, the same in every run"));
        }
        is_unnumbered_taken_ = true; // for good: which thread comes first must not matter later
        hold(unnumbered_);
    }
    void hold(rand_sequence& wanted) {
        struct at_end {
            ~at_end() { only().let_go(); }
        };
        static thread_local const at_end release; // runs when the thread ends
        if (held != nullptr) {
            held->is_held = false;
        }
        wanted.is_held = true;
        held = &wanted;
    }
    void let_go() {
        const std::scoped_lock lock(mutex_);
        held->is_held = false;
        held = nullptr;
    }

    void start_anew() {
        const std::scoped_lock lock(mutex_);
        held->words = opened(held->number, held->is_numbered);
        held->seeding = seeding.load(std::memory_order_relaxed);
    }
    [[nodiscard]] leat::stream opened(std::uint64_t number, bool is_numbered) const {
        return is_numbered ? study_.stream("compat.rand", number) : study_.stream("compat.rand");
    }

    static inline constinit thread_local rand_sequence* held = nullptr;
    static inline constinit std::atomic<std::uint32_t> seeding{0}; // counts calls of srand()

    std::mutex mutex_; // guards all below, and `is_held`
    source study_{1};
    std::map<std::uint64_t, rand_sequence> numbered_;
    rand_sequence unnumbered_{opened(0, false), 0, false, false, 0};
    bool is_unnumbered_taken_ = false;
};

} // namespace detail

/// In place of the C library's rand() and of the habits around it. See the head of rand.hpp.
namespace compat {

/// The largest number that rand() gives.
inline constexpr int rand_max = 2147483647;
static_assert(std::numeric_limits<int>::max() >= rand_max);

/// Seeds all threads, which begin anew: by an integer, a text, or a source. In the thread without
/// a number or in thread 0, while no other thread draws.
template <class Seed>
void srand(const Seed& seed) {
    leat::detail::rand_process::only().seed(source{seed});
}

/// Makes the calling thread number i, 0 or above; a number that another running thread has is
/// refused. First thing in every thread but one.
template <leat::detail::number_integer Int>
void rand_thread(Int i) {
    if (i < 0) {
        leat::detail::refuse("compat::rand_thread", "i", leat::detail::message_value(i),
                             "must not be negative");
    }
    leat::detail::rand_process::only().number_thread(static_cast<std::uint64_t>(i));
}

/// The calling thread's stream, for any sampler: normal{0, 1}(rand_stream()). Ask for it at each
/// use; one kept does not notice srand(), and must not go to another thread.
inline leat::stream& rand_stream() { return leat::detail::rand_process::words("rand_stream"); }

/// 0 to rand_max, each with the same probability: in place of rand() and random().
inline int rand() {
    const std::uint64_t word = leat::detail::rand_process::words("rand")();
    return static_cast<int>(word >> 33);
}

/// In the open interval (0, 1): in place of rand() / (double)RAND_MAX, which can be 0 and 1, of
/// rand() / (RAND_MAX + 1.0) and of drand48(), which can be 0.
inline double rand_unit() { return unit(leat::detail::rand_process::words("rand_unit")); }

/// In the open interval (a, b): in place of a + (b - a) * rand() / RAND_MAX, which can be a and b.
inline double rand_real(double a, double b) {
    const uniform interval{a, b};
    return interval(leat::detail::rand_process::words("rand_real"));
}

/// 0 to n - 1, exactly unbiased: in place of rand() % n, which favours small numbers and takes the
/// low digits, and of (int)(n * drand48()).
template <leat::detail::number_integer Int>
Int rand_below(Int n) {
    return below(n, leat::detail::rand_process::words("rand_below"));
}

/// lo to hi, both ends in, exactly unbiased: in place of lo + rand() % (hi - lo + 1), which
/// overflows for wide ranges too.
template <leat::detail::number_integer Int>
Int rand_between(Int lo, Int hi) {
    const uniform_integer range{lo, hi};
    return range(leat::detail::rand_process::words("rand_between"));
}

/// True with probability p, from never (0) to always (1): in place of rand() < p * RAND_MAX, which
/// can fail for p = 1, and of rand() % 100 < 30.
inline bool rand_chance(double p) {
    const bernoulli event{p};
    return event(leat::detail::rand_process::words("rand_chance"));
}

} // namespace compat
} // namespace leat

#endif
