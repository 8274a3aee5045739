// A run manifest: what a run must be told again to be the same run. The library's version, the
// algorithms behind a stream's numbers, the seeds, and all that was opened, with the place where
// each stream stands.
//
//   leat::ledger book;                             // streams/ledger.hpp
//   const leat::source study{20261201, book};
//   ...
//   const leat::manifest run{book};                // at any moment, also in the middle of a run
//   std::puts(to_string(run).c_str());             // to be read
//   nlohmann::json saved = run;                    // to be read back (state/json.hpp)
//
//   const auto run = saved.get<leat::manifest>();
//   const leat::source study = run.study();        // the source, and from it, as ever,
//   leat::stream s = study.stream("failures", 7);
//   run.restore(s);                                // at its position, under its limit
//
// A manifest is refused, with the reason, where it was written by another major version (in which
// the same seed gives other numbers), names an algorithm that is not this library's, or has a path
// that does not lead to the address beside it. It keeps no state of engines: of these it names the
// path only; save them with state/json.hpp. What the streams were used for it does not know: keep
// the program's own version and input with it.
//
// Memory and text: some 200 bytes for each stream opened.

#ifndef LEAT_STATE_MANIFEST_HPP
#define LEAT_STATE_MANIFEST_HPP

#include "leat/core/errors.hpp"
#include "leat/streams/address.hpp"
#include "leat/streams/ledger.hpp"
#include "leat/streams/source.hpp"
#include "leat/streams/spelled_path.hpp"
#include "leat/streams/stream.hpp"
#include "leat/streams/thin_stream.hpp"
#include "leat/version.hpp"

#include <cstddef>
#include <cstdint>
#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <utility> // move, pair
#include <vector>

namespace leat {

/// An algorithm that a run's numbers rest on, and which form of it.
struct run_algorithm {
    std::string name; ///< what it is for
    std::string form; ///< which method, in which version

    friend bool operator==(const run_algorithm&, const run_algorithm&) = default;
};

/// What a run consists of. See above.
class manifest {
public:
    /// This library, and nothing opened.
    manifest() : library_(version), algorithms_(ours()) {}

    /// The run that a ledger has followed so far.
    explicit manifest(const ledger& book) : manifest() {
        sources_ = book.sources();
        openings_ = book.entries();
        for (ledger_entry& e : openings_) {
            e.place.clear(); // of the program's text, not of the run
        }
        make_index();
    }

    /// From its parts. Refused: what this library would not continue alike (see above).
    manifest(std::string library, std::vector<run_algorithm> algorithms,
             std::vector<std::string> sources, std::vector<ledger_entry> openings)
        : library_(std::move(library)),
          algorithms_(std::move(algorithms)),
          sources_(std::move(sources)),
          openings_(std::move(openings)) {
        check_library();
        check_algorithms();
        for (const std::string& s : sources_) {
            (void)source_of(s);
        }
        check_openings();
        make_index();
    }

    /// The version of leat that wrote it.
    [[nodiscard]] const std::string& library() const noexcept { return library_; }
    /// The algorithms that its numbers rest on.
    [[nodiscard]] const std::vector<run_algorithm>& algorithms() const noexcept {
        return algorithms_;
    }
    /// The sources with their seeds, as a program spells them: source{20261201}
    [[nodiscard]] const std::vector<std::string>& sources() const noexcept { return sources_; }
    /// All that was opened, in order.
    [[nodiscard]] const std::vector<ledger_entry>& openings() const noexcept { return openings_; }

    /// The run's source: number `which`, where there were several. Refused where there is none.
    [[nodiscard]] source study(std::size_t which = 0) const { return source_of(spelled(which)); }
    /// The same, with a ledger for what is opened from now on.
    [[nodiscard]] source study(ledger& book, std::size_t which = 0) const {
        return source_of(spelled(which), &book);
    }

    /// The stream of an opening, at its position and under its limit: the way to a replica or an
    /// offspring. Refused for engines, and for a number that is not one of an opening.
    [[nodiscard]] leat::stream stream(std::size_t opening) const {
        return opened<leat::stream>(opening);
    }
    /// The same as a thin stream.
    [[nodiscard]] leat::thin_stream thin_stream(std::size_t opening) const {
        return opened<leat::thin_stream>(opening);
    }

    /// Sends a stream that was opened anew to where it stood, under the limit it had. False, and
    /// nothing is changed, where it was not opened in this run. Replicas do not count. Refused
    /// where its address was opened twice, and the two do not stand at one place.
    bool restore(leat::stream& s) const { return restore_stream(s); }
    /// The same for a thin stream.
    bool restore(leat::thin_stream& s) const { return restore_stream(s); }

    friend bool operator==(const manifest& a, const manifest& b) {
        return a.library_ == b.library_ && a.algorithms_ == b.algorithms_ &&
               a.sources_ == b.sources_ && a.openings_ == b.openings_;
    }

private:
    /// The algorithms of this library. A form changes with what a seed yields.
    static std::vector<run_algorithm> ours() {
        return {{"path", "SipHash-2-4-128 over seed and parts, version 1"},
                {"stream", "philox4x32-10, two 64-bit words a block, version 1"},
                {"chunk", "a stream for each 4096 elements, version 1"},
                {"engine", "seeded from a stream, version 1"}};
    }

    [[noreturn]] static void refuse(const char* parameter, std::string_view value,
                                    std::string_view allowed) {
        constexpr std::size_t room = 120;
        detail::message m;
        m.text("leat::manifest: ").text(parameter).text(" = \"");
        m.text(value.data(), value.size() < room ? value.size() : room).text("\", ");
        detail::raise<invalid_parameter>(
            m.text(allowed.data(), allowed.size() < room ? allowed.size() : room));
    }

    void check_library() const {
        const std::string_view ours = version;
        const std::string_view major = ours.substr(0, ours.find('.') + 1);
        if (!std::string_view(library_).starts_with(major)) {
            const std::string allowed =
                "must be " + std::string(major) + "x: other major versions give other numbers";
            refuse("library", library_, allowed);
        }
    }
    void check_algorithms() const {
        const auto known = ours();
        for (std::size_t i = 0; i < algorithms_.size() && i < known.size(); ++i) {
            if (algorithms_[i].name != known[i].name) {
                refuse("algorithm", algorithms_[i].name, "must be \"" + known[i].name + "\"");
            }
            if (algorithms_[i].form != known[i].form) {
                refuse(known[i].name.c_str(), algorithms_[i].form,
                       "must be \"" + known[i].form + "\"");
            }
        }
        if (algorithms_.size() != known.size()) {
            detail::refuse("manifest", "size of algorithms", std::uint64_t{algorithms_.size()},
                           "must be that of this version of leat");
        }
    }
    void check_openings() const {
        for (std::size_t i = 0; i < openings_.size(); ++i) {
            const ledger_entry& e = openings_[i];
            const auto found = detail::place_of(e.path);
            if (!found) {
                refuse("path", e.path, "must be a path as a ledger spells it");
            }
            if (found->place.key != e.address.key || found->place.upper != e.address.upper) {
                refuse("path", e.path, "must lead to the address beside it");
            }
            if (e.opening != i + 1) {
                detail::refuse("manifest", "opening", e.opening, "must be counted from 1");
            }
        }
    }

    [[nodiscard]] const std::string& spelled(std::size_t which) const {
        if (which >= sources_.size()) {
            detail::refuse("manifest", "which", std::uint64_t{which},
                           "must be below the number of sources");
        }
        return sources_[which];
    }
    static source source_of(std::string_view spelled, ledger* book = nullptr) {
        detail::spelling_reader reader(spelled);
        const auto seed = reader.seed();
        if (!seed || !reader.at_end()) {
            refuse("source", spelled, "must be spelled as source{20261201} or source{\"a text\"}");
        }
        const auto make = [book](const auto& s) { return book ? source(s, *book) : source(s); };
        if (seed->is_text) {
            return make(seed->text);
        }
        const std::uint64_t word = seed->is_negative ? 0 - seed->magnitude : seed->magnitude;
        return seed->is_negative ? make(static_cast<std::int64_t>(word)) : make(word);
    }

    template <class Stream>
    [[nodiscard]] Stream opened(std::size_t opening) const {
        if (opening - 1 >= openings_.size()) {
            detail::refuse("manifest", "opening", std::uint64_t{opening},
                           "must be from 1 to the number of openings");
        }
        const ledger_entry& e = openings_[opening - 1];
        if (detail::place_of(e.path)->as == detail::opening::engine) {
            refuse("opening", e.path, "must be a stream; the state of engines is not kept here");
        }
        Stream s(e.address);
        s.limit(e.limit);
        return s;
    }

    using place = std::pair<std::uint64_t, std::uint64_t>;
    static place place_of(const stream_address& a) { return {a.key, a.upper}; }

    void make_index() {
        for (std::size_t i = 0; i < openings_.size(); ++i) {
            if (!detail::place_of(openings_[i].path)->is_replica) {
                index_.emplace(place_of(openings_[i].address), i);
            }
        }
    }

    template <class Stream>
    bool restore_stream(Stream& s) const {
        const auto [first, last] = index_.equal_range(place_of(s.address()));
        if (first == last) {
            return false;
        }
        const ledger_entry& e = openings_[first->second];
        for (auto at = first; at != last; ++at) {
            const ledger_entry& other = openings_[at->second];
            if (other.address != e.address || other.limit != e.limit) {
                refuse("stream", e.path,
                       "must have been opened once: another of its address stands elsewhere");
            }
        }
        s.seek(e.address.position);
        s.limit(e.limit);
        return true;
    }

    std::string library_;
    std::vector<run_algorithm> algorithms_;
    std::vector<std::string> sources_;
    std::vector<ledger_entry> openings_;
    std::multimap<place, std::size_t> index_; // where the openings stand that are no replicas
};

/// The manifest as text, to be read.
inline std::string to_string(const manifest& m) {
    std::string text = "leat " + m.library() + "\n";
    for (const run_algorithm& a : m.algorithms()) {
        text += a.name + ": " + a.form + "\n";
    }
    for (const std::string& s : m.sources()) {
        text += s + "\n";
    }
    for (const ledger_entry& e : m.openings()) {
        text += to_string(e);
        text +=
            e.limit == detail::stream_capacity ? "\n" : ", limit " + std::to_string(e.limit) + "\n";
    }
    return text;
}

} // namespace leat

#endif
