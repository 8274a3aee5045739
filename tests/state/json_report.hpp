// What every type must do that is saved as JSON: a document of the frozen form, which restores an
// equal object, from nlohmann's json and from text, and is refused by other types.
//
// One document of each type is frozen in tests/golden/documents.json. For a new type a test prints
// the line to add there.

#ifndef LEAT_TESTS_STATE_JSON_REPORT_HPP
#define LEAT_TESTS_STATE_JSON_REPORT_HPP

#include "leat/distributions/cauchy.hpp"
#include "leat/distributions/maxwell.hpp"
#include "leat/state/json.hpp"

#include <gtest/gtest.h>

#include <concepts>
#include <fstream>
#include <functional>
#include <iterator>
#include <set>
#include <string>
#include <string_view>

namespace leat_test {

using nlohmann::json;

/// The frozen documents, by the name of their type.
inline const json& golden_documents() {
    static const json documents = [] {
        std::ifstream file(LEAT_TEST_DIR "/golden/documents.json");
        const std::string text(std::istreambuf_iterator<char>{file}, {});
        return json::parse(std::string_view(text)); // one instance of the parser is enough
    }();
    return documents;
}

/// Checks the documents of one test: of each type the first must be the frozen one.
class frozen_documents {
public:
    void check(const json& document) {
        const auto type = document.at("leat").get<std::string>();
        if (!seen_.insert(type).second) {
            return;
        }
        const auto frozen = golden_documents().find(type);
        if (frozen == golden_documents().end()) {
            ADD_FAILURE() << "add to tests/golden/documents.json:\n\"" << type
                          << "\": " << document.dump();
        } else {
            EXPECT_EQ(*frozen, document)
                << "the frozen form has changed: see tests/golden/README.md";
        }
    }
    [[nodiscard]] std::size_t types() const { return seen_.size(); }

private:
    std::set<std::string> seen_;
};

/// The message of the refusal that f() ends in; empty, with a failure, where it ends otherwise.
inline std::string refusal_of(const std::function<void()>& f) {
    try {
        f();
    } catch (const leat::state_refused& refused) {
        return refused.what();
    } catch (const std::exception& other) {
        ADD_FAILURE() << "refused by another exception: " << other.what();
        return {};
    }
    ADD_FAILURE() << "not refused";
    return {};
}

/// An object without its type. `restore` reads a document, saves what it got into `again`, and says
/// whether it equals the original.
struct any_saved {
    const void* object;
    json document;
    bool (*restore)(const json& read, const void* original, json& again);
};

template <class T>
any_saved any(const T& x) {
    const auto restore = [](const json& read, const void* original, json& again) {
        const T restored = leat::detail::restore<T>(read);
        to_json(again, restored);
        if constexpr (std::equality_comparable<T>) {
            return restored == *static_cast<const T*>(original);
        } else {
            return true;
        }
    };
    any_saved erased{&x, {}, restore};
    to_json(erased.document, x);
    return erased;
}

/// Checks that an object is saved in the frozen form, and comes back to the bit.
inline void expect_returns(frozen_documents& frozen, const std::string& name,
                           const any_saved& saved) {
    SCOPED_TRACE(name);
    const json& document = saved.document;
    frozen.check(document);
    EXPECT_EQ(document.at("version"), 1);
    EXPECT_EQ(document.at("checksum").get<std::string>().size(), 16u);
    const std::string text = document.dump(1);
    json again;
    for (const json& read : {document, json::parse(std::string_view(text))}) {
        EXPECT_TRUE(saved.restore(read, saved.object, again)) << document;
        EXPECT_EQ(again.dump(), document.dump()); // -0.0 == 0.0, but not as text
    }
    const json other =
        document.at("leat") == "maxwell" ? json(leat::cauchy{0, 1}) : json(leat::maxwell{1});
    const std::string refused = refusal_of([&] { saved.restore(other, saved.object, again); });
    EXPECT_NE(refused.find("it was saved from another type"), std::string::npos) << refused;
    json later = document;
    later["version"] = 2;
    const std::string later_refused =
        refusal_of([&] { saved.restore(later, saved.object, again); });
    EXPECT_NE(later_refused.find(": version = 2, must be at most 1: it was saved by a later"),
              std::string::npos)
        << later_refused;
}

} // namespace leat_test

#endif
