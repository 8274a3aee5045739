// A ledger: keeps a list of every stream that a study opens, finds an address that was opened
// twice, and counts the words drawn.
//
//   leat::ledger book;
//   const leat::source study{20261201, book};      // instead of study{20261201}
//   ...                                            // the program as it is
//   for (const auto& r : book.repeated()) std::puts(to_string(r).c_str());
//   std::puts(to_string(book).c_str());            // all of it
//
// Everything opened from a recorded source and from its branches is entered: streams, thin streams,
// engines, the chunks of fill_chunks, offspring and replicas; each with its path as the program
// spells it, such as source{1}.branch("wind", 3).stream(7), its address, and a number that counts
// the openings in the order in which they came (which threads may change from run to run). Where in
// the program that was is known if the source was told: study.here() is the same source, and names
// the file and line of that call. A function that is given a source may begin with
// `const leat::source mine = study.here();`.
//
// Opened twice means: two streams or engines at one address, so that both give the same numbers.
// Streams cannot be copied, but nothing else keeps two parts of a program from asking for the same
// path. A replica is a second stream on purpose and is not reported. With
// ledger{ledger::repeats::refuse} the second opening throws `repeated_stream` at once, is not
// entered, and a debugger shows where it happened. A program that runs the same paths twice on
// purpose (two designs under the same events) keeps a ledger for each run.
//
// Counted are words drawn, those of fills too; words of engines are not (0 is given). A stream that
// was saved and read back, or was made from an address, is in no ledger.
//
// The ledger must outlive the sources and streams that it records. All members may be called at any
// time from any thread; a stream that is being drawn from is shown as of one of its last words. The
// numbers drawn are the same with and without it. Without one, opening and drawing cost what they
// would if there were no ledgers; with one, an opening takes about a microsecond and some 300
// bytes, for good, and a word some nanoseconds. Not for more than some million openings. On a
// 32-bit target without 64-bit atomics, a program with a ledger is linked with the compiler's
// atomic library.

#ifndef LEAT_STREAMS_LEDGER_HPP
#define LEAT_STREAMS_LEDGER_HPP

#include "leat/core/errors.hpp"
#include "leat/streams/address.hpp"
#include "leat/streams/recorder.hpp"
#include "leat/streams/source.hpp"
#include "leat/streams/spelled_path.hpp"

#include <atomic>
#include <cstddef>
#include <cstdint>
#include <deque> // entries stay where they are
#include <mutex>
#include <span>
#include <string>
#include <string_view>
#include <unordered_map>
#include <utility> // pair, move
#include <vector>

namespace leat {

/// What a ledger knows of one opening.
struct ledger_entry {
    std::uint64_t opening = 0; ///< 1 for the first of the ledger
    std::string path;          ///< as the program spells it
    std::string place;         ///< file and line of source::here(), or empty
    stream_address address{};  ///< where the stream stands
    std::uint64_t limit = 0;   ///< the stream's limit
    std::uint64_t words = 0;   ///< drawn so far; 0 for an engine

    friend bool operator==(const ledger_entry&, const ledger_entry&) = default;
};

/// Two openings of one address.
struct repeated_opening {
    ledger_entry first; ///< the first of that address
    ledger_entry again; ///< the one that came later

    friend bool operator==(const repeated_opening&, const repeated_opening&) = default;
};

/// A stream was opened a second time, which the ledger was told to refuse.
class repeated_stream : public error {
public:
    using error::error;
};

namespace detail {

/// PATH (opening 17, from FILE:LINE
inline std::string named(const ledger_entry& e) {
    return e.path + " (opening " + std::to_string(e.opening) +
           (e.place.empty() ? "" : ", from " + e.place);
}

} // namespace detail

/// The opening as one line.
inline std::string to_string(const ledger_entry& e) {
    return "opening " + std::to_string(e.opening) + ": " + e.path +
           (e.place.empty() ? "" : ", from " + e.place) + ", at word " +
           std::to_string(e.address.position) + ", " + std::to_string(e.words) + " drawn";
}

/// Both openings in one line.
inline std::string to_string(const repeated_opening& r) {
    return "opened twice: " + detail::named(r.first) + ", " + std::to_string(r.first.words) +
           " words drawn) and " + detail::named(r.again) + ", " + std::to_string(r.again.words) +
           " words drawn)";
}

/// The list of what a study opens. See above.
class ledger : public detail::seed_recorder {
public:
    /// What happens when an address is opened a second time.
    enum class repeats {
        report, ///< repeated() lists it
        refuse, ///< it throws repeated_stream
    };

    /// An empty one.
    explicit ledger(repeats policy = repeats::report) noexcept : policy_(policy) {}
    ledger(const ledger&) = delete; // sources and streams point to it
    ledger& operator=(const ledger&) = delete;
    ~ledger() = default;

    /// The openings so far.
    [[nodiscard]] std::uint64_t size() const {
        const std::scoped_lock lock(mutex_);
        return entries_.size();
    }
    /// All openings, as they stand now.
    [[nodiscard]] std::vector<ledger_entry> entries() const {
        const std::scoped_lock lock(mutex_);
        std::vector<ledger_entry> list;
        list.reserve(entries_.size());
        for (const entry& e : entries_) {
            list.push_back(e.now());
        }
        return list;
    }
    /// The openings of an address that was open before, each with the first one of that address.
    [[nodiscard]] std::vector<repeated_opening> repeated() const {
        const std::scoped_lock lock(mutex_);
        std::vector<repeated_opening> list;
        list.reserve(repeated_.size());
        for (const auto& [first, again] : repeated_) {
            list.push_back({first->now(), again->now()});
        }
        return list;
    }
    /// The words drawn from all streams together.
    [[nodiscard]] std::uint64_t words() const {
        const std::scoped_lock lock(mutex_);
        std::uint64_t sum = 0;
        for (const entry& e : entries_) {
            sum += e.words();
        }
        return sum;
    }
    /// The sources that were given this ledger, as they are spelled: source{20261201}
    [[nodiscard]] std::vector<std::string> sources() const {
        const std::scoped_lock lock(mutex_);
        return sources_;
    }

private:
    /// One opening. It has a cache line of its own, since the thread that draws writes to it.
    class alignas(64) entry final : public detail::stream_record {
    public:
        entry(ledger& book, std::uint64_t number, std::string path, const stream_address& where,
              std::uint64_t limit, std::uint64_t descent, std::string_view place)
            : position_(where.position),
              limit_(limit),
              key_(where.key),
              upper_(where.upper),
              number_(number),
              descent_(descent),
              path_(std::move(path)),
              place_(place),
              book_(book) {}

        // One thread draws from a stream at a time, so that a sum need not be atomic as a whole.
        void drawn(std::uint64_t words, std::uint64_t position) noexcept override {
            words_.store(this->words() + words, std::memory_order_relaxed);
            position_.store(position, std::memory_order_relaxed);
        }
        void stands(std::uint64_t position, std::uint64_t limit) noexcept override {
            position_.store(position, std::memory_order_relaxed);
            limit_.store(limit, std::memory_order_relaxed);
        }
        stream_record* offspring(const detail::path_part& i, const stream_address& where) override {
            std::string path = path_;
            detail::spell_call(path, "offspring", std::span(&i, 1));
            return &book_.enter(std::move(path), where, detail::stream_capacity, descent_, place_);
        }
        stream_record* replica(const stream_address& where, std::uint64_t limit) override {
            return &book_.enter(path_ + ".replica()", where, limit, new_descent, place_);
        }

        [[nodiscard]] std::uint64_t words() const noexcept {
            return words_.load(std::memory_order_relaxed);
        }
        [[nodiscard]] ledger_entry now() const {
            return {number_,
                    path_,
                    std::string(place_),
                    {key_, upper_, position_.load(std::memory_order_relaxed)},
                    limit_.load(std::memory_order_relaxed),
                    words()};
        }

    private:
        std::atomic<std::uint64_t> position_;
        std::atomic<std::uint64_t> limit_;
        std::atomic<std::uint64_t> words_ = 0;
        std::uint64_t key_;
        std::uint64_t upper_;
        std::uint64_t number_;
        std::uint64_t descent_;
        std::string path_;
        std::string_view place_; // a branch_record's
        ledger& book_;
    };

    /// A seed and branches, and the place where what follows is opened.
    class branch_record final : public detail::source_record {
    public:
        branch_record(ledger& book, std::string path, std::string place)
            : book_(book), path_(std::move(path)), place_(std::move(place)) {}

        source_record* branch(std::span<const detail::path_part> parts) override {
            std::string path = path_;
            detail::spell_call(path, "branch", parts);
            return &book_.branch(std::move(path), place_);
        }
        source_record* at(const char* file, std::uint64_t line) override {
            std::string_view name(file);
            name.remove_prefix(name.find_last_of("/\\") + 1); // all of it where there is none
            return &book_.branch(path_, std::string(name) + ":" + std::to_string(line));
        }
        detail::stream_record* open(detail::opening as, std::span<const detail::path_part> parts,
                                    const stream_address& where) override {
            std::string path = path_;
            detail::spell_call(path, detail::opening_names[static_cast<std::size_t>(as)], parts);
            entry& e = book_.enter(std::move(path), where, detail::stream_capacity, 0, place_);
            return as == detail::opening::engine ? nullptr : &e;
        }

    private:
        ledger& book_;
        const std::string path_;
        const std::string place_;
    };

    /// An address and its descent: 0, or the number of the replica that it comes from. The
    /// offspring of a replica are meant to be those of the original.
    struct identity {
        std::uint64_t key;
        std::uint64_t upper;
        std::uint64_t descent;

        friend bool operator==(const identity&, const identity&) = default;
    };
    struct identity_hash {
        std::size_t operator()(const identity& i) const noexcept { // a key is a hash already
            return std::hash<std::uint64_t>{}(i.key ^ (i.upper + i.descent) * 0x9e3779b97f4a7c15u);
        }
    };
    static constexpr std::uint64_t new_descent = ~std::uint64_t{0};

    detail::source_record* start(const detail::path_part& seed) override {
        std::string path = "source{";
        detail::spell(path, seed);
        path += '}';
        branch_record& record = branch(path, {});
        const std::scoped_lock lock(mutex_);
        sources_.push_back(std::move(path));
        return &record;
    }

    branch_record& branch(std::string path, std::string place) {
        const std::scoped_lock lock(mutex_);
        std::string both = path + '\n' + place; // neither has a line end
        return branches_.try_emplace(std::move(both), *this, std::move(path), std::move(place))
            .first->second;
    }

    entry& enter(std::string path, const stream_address& where, std::uint64_t limit,
                 std::uint64_t descent, std::string_view place) {
        const std::scoped_lock lock(mutex_);
        const std::uint64_t number = entries_.size() + 1;
        const identity id{where.key, where.upper, descent == new_descent ? number : descent};
        const auto known = first_.find(id);
        if (known != first_.end() && policy_ == repeats::refuse) {
            refuse_repeated(known->second->now(), {number, path, std::string(place)});
        }
        entry& e =
            entries_.emplace_back(*this, number, std::move(path), where, limit, id.descent, place);
        if (known != first_.end()) {
            repeated_.emplace_back(known->second, &e);
        } else {
            first_.emplace(id, &e);
        }
        return e;
    }

    [[noreturn]] static void refuse_repeated(ledger_entry first, ledger_entry again) {
        constexpr std::size_t room = 120; // so that both fit in a message
        first.path.resize(first.path.size() < room ? first.path.size() : room);
        again.path.resize(again.path.size() < room ? again.path.size() : room);
        detail::message m;
        m.text("leat::ledger: opened twice: ").text(detail::named(again).c_str());
        detail::raise<repeated_stream>(
            m.text("), first as ").text(detail::named(first).c_str()).text(")"));
    }

    repeats policy_;
    mutable std::mutex mutex_; // guards all below, not what entries hold
    std::deque<entry> entries_;
    std::unordered_map<std::string, branch_record> branches_;
    std::unordered_map<identity, const entry*, identity_hash> first_;
    std::vector<std::pair<const entry*, const entry*>> repeated_;
    std::vector<std::string> sources_;
};

/// The ledger as text: a summary, the addresses opened twice, and all openings, a line each.
inline std::string to_string(const ledger& book) {
    const std::vector<repeated_opening> repeated = book.repeated();
    const std::vector<ledger_entry> entries = book.entries();
    std::uint64_t words = 0;
    for (const ledger_entry& e : entries) {
        words += e.words;
    }
    std::string text = "ledger: " + std::to_string(entries.size()) + " openings, " +
                       std::to_string(words) + " words drawn, " + std::to_string(repeated.size()) +
                       " openings of an address that was open before\n";
    for (const repeated_opening& r : repeated) {
        text += to_string(r) + "\n";
    }
    for (const ledger_entry& e : entries) {
        text += to_string(e) + "\n";
    }
    return text;
}

} // namespace leat

#endif
