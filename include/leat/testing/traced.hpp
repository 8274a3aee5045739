// An engine that leaves a trace of its draws, to find where two runs part.
//
//   leat::trace trace{"monday.trace"};             // one a run
//   leat::traced g{trace, "replication 713", s};   // s: any engine or stream, by reference
//   g.label("repair time");                        // what the next draws are for
//   const double hours = repair(g);                // the same values as from s
//   trace.save();
//
// Record the run that was right and the run that is wrong, then compare the two files:
// compare_traces (testing/trace_comparison.hpp), or the program examples/divergence. It names the
// first stream, draw and label at which they differ.
//
// An engine repeats its words whatever they are used for. So a run that draws once too often gives
// the same words, for other purposes from there on: only labels show it. Give each kind of draw
// one. Draws are counted by the traced engine, from 0, whatever position the stream had.
//
// trace_options: marks are made every `stride` draws (1024), from `from` to `to`, for all streams
// or `only` for one of that name. A mark takes 20 bytes in the file. For the exact draw, run again
// with stride 1 on the range that the first comparison names.
//
// An lvalue engine is held by reference, an rvalue is moved in. traced is movable, not copyable.
// Each traced engine is for one thread at a time; several threads may open them on one trace.
// save() when none is drawing. Give every stream a name of its own: those of one name are told
// apart only by the order of opening. A draw costs some 2 ns more; fills draw one by one.
//
// Errors: invalid_parameter for a stride of 0 or from > to; `error` where the file cannot be
// written (save; the destructor saves what is unsaved, in silence) and when a moved-from traced is
// drawn from. Not for production runs that are fast and right: it is a diagnosis.

#ifndef LEAT_TESTING_TRACED_HPP
#define LEAT_TESTING_TRACED_HPP

#include "leat/core/concepts.hpp"
#include "leat/core/errors.hpp"
#include "leat/streams/address.hpp"
#include "leat/testing/trace_file.hpp"

#include <cstddef>
#include <cstdint>
#include <deque> // tracks keep their place
#include <limits>
#include <mutex>
#include <string>
#include <string_view>
#include <type_traits>
#include <utility>

namespace leat {
namespace testing {

/// What a trace records; see above.
struct trace_options {
    std::uint64_t stride = 1024;                                  ///< draws from mark to mark
    std::uint64_t from = 0;                                       ///< no mark before so many draws
    std::uint64_t to = std::numeric_limits<std::uint64_t>::max(); ///< nor after so many
    std::string only = {}; ///< marks for the stream of this name only
};

namespace detail {

/// The record of one stream while it is drawn from.
class track {
public:
    track(std::string_view name, std::string address, const trace_options& options) {
        stream_.name = name;
        stream_.address = std::move(address);
        if (options.only.empty() || options.only == name) {
            stride_ = options.stride;
            to_ = options.to;
            next_ = options.from;
        }
        if (next_ == 0) {
            mark();
        }
    }

    void add(std::uint64_t word) {
        stream_.words = rolled(stream_.words, word);
        stream_.labels = rolled(stream_.labels, label_word_);
        stream_.label = label_;
        if (++stream_.draws == next_) [[unlikely]] {
            mark();
        }
    }

    void label(std::string_view text) {
        if (text == stream_.label_texts[label_]) {
            return;
        }
        std::size_t i = 0;
        while (i < stream_.label_texts.size() && stream_.label_texts[i] != text) {
            ++i;
        }
        if (i == stream_.label_texts.size()) {
            stream_.label_texts.emplace_back(text);
        }
        label_ = static_cast<std::uint32_t>(i);
        label_word_ = label_word(text);
    }

    [[nodiscard]] const traced_stream& stream() const noexcept { return stream_; }

private:
    static constexpr std::uint64_t never = std::numeric_limits<std::uint64_t>::max();

    [[gnu::noinline]] void mark() {
        stream_.marks.push_back({stream_.words, stream_.labels, stream_.label});
        next_ = stride_ <= to_ - next_ ? next_ + stride_ : never;
    }

    traced_stream stream_;
    std::uint64_t stride_ = 1;
    std::uint64_t to_ = 0;
    std::uint64_t next_ = never; // the next mark comes after so many draws
    std::uint32_t label_ = 0;    // of the next draw
    std::uint64_t label_word_ = label_word("");
};

/// Where an engine stands, for those that have an address.
template <class Engine>
std::string address_of(const Engine& engine) {
    if constexpr (requires { parse_address(to_string(engine.address())); }) {
        return to_string(engine.address());
    } else {
        return {};
    }
}

} // namespace detail

/// The record of a run, and the file it goes to.
class trace {
public:
    /// A record that save() and the destructor write to the file `path`.
    explicit trace(std::string path, trace_options options = {})
        : path_(std::move(path)), options_(std::move(options)) {
        if (options_.stride == 0) {
            leat::detail::refuse("trace", "stride", 0, "must be at least 1");
        }
        if (options_.from > options_.to) {
            leat::detail::refuse("trace", "from", options_.from, "must be at most to");
        }
    }
    trace(const trace&) = delete; // two would write one file
    trace& operator=(const trace&) = delete;
    ~trace() {
        if (!saved_) {
            try_to_save();
        }
    }

    /// Writes the file, all draws so far. Drawing may go on, and it may be saved again.
    void save() {
        if (!try_to_save()) {
            detail::message m;
            leat::detail::raise<error>(m.text("leat::trace: cannot write ").text(path_.c_str()));
        }
    }

    /// A new stream of this name, for traced.
    [[nodiscard]] detail::track& open(std::string_view name, std::string address) {
        const std::lock_guard<std::mutex> guard(opening_);
        saved_ = false;
        return tracks_.emplace_back(name, std::move(address), options_);
    }

private:
    bool try_to_save() {
        const std::lock_guard<std::mutex> guard(opening_);
        recorded_trace all{options_.stride, options_.from, options_.to, {}};
        for (const detail::track& t : tracks_) {
            all.streams.push_back(t.stream());
        }
        saved_ = detail::write_file(path_, encode_trace(all));
        return saved_;
    }

    std::string path_;
    trace_options options_;
    std::mutex opening_;
    std::deque<detail::track> tracks_;
    bool saved_ = false;
};

/// Draws from an engine and records it; see above.
template <class Engine>
requires random_words<std::remove_reference_t<Engine>>
class traced {
    using engine_type = std::remove_reference_t<Engine>;

public:
    using result_type = std::invoke_result_t<engine_type&>;

    /// Traces an engine or stream under a name.
    // Engine is not deduced from here, but by the guide below: an lvalue is not to be copied.
    traced(trace& t, std::string_view name, std::type_identity_t<Engine> engine)
        : engine_(std::forward<Engine>(engine)),
          track_(&t.open(name, detail::address_of(engine_))) {}

    traced(const traced&) = delete; // the copy's draws would be recorded as this one's
    traced& operator=(const traced&) = delete;
    /// Takes over: the other may not be drawn from any more.
    traced(traced&& other) noexcept
        : engine_(std::forward<Engine>(other.engine_)),
          track_(std::exchange(other.track_, nullptr)) {}
    traced& operator=(traced&&) = delete;
    ~traced() = default;

    static constexpr result_type min() noexcept { return engine_type::min(); }
    static constexpr result_type max() noexcept { return engine_type::max(); }

    /// The engine's next word.
    result_type operator()() {
        if (track_ == nullptr) [[unlikely]] {
            moved_from();
        }
        const result_type word = engine_();
        track_->add(word);
        return word;
    }

    /// Says what the next draws are for, until the next label.
    void label(std::string_view text) {
        if (track_ == nullptr) {
            moved_from();
        }
        track_->label(text);
    }

    /// The engine. What is drawn from it directly leaves no trace.
    [[nodiscard]] const engine_type& engine() const noexcept { return engine_; }

private:
    [[noreturn, gnu::cold, gnu::noinline]] static void moved_from() {
        detail::message m;
        leat::detail::raise<error>(
            m.text("leat::traced: used after it was moved from; draw from where it went"));
    }

    Engine engine_;
    detail::track* track_;
};

template <class Engine>
traced(trace&, std::string_view, Engine&&) -> traced<Engine>;

} // namespace testing

using testing::trace;
using testing::trace_options;
using testing::traced;

} // namespace leat

#endif
