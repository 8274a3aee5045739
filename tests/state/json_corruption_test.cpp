// Saved documents that were flipped, cut and spliced: each is refused with `state_refused`, the
// target being left as it was, or restores exactly what was saved. The counts are printed.
//
// Three ways to damage them: the text, byte by byte; the JSON, value by value; and the JSON with a
// checksum that fits again, as a forger would, where the fields' own checks decide: what is then
// accepted must be saved again as the very document that was read.

#include "support/sanitized.hpp"

#include "leat/distributions/categorical.hpp"
#include "leat/distributions/multivariate_normal.hpp"
#include "leat/distributions/normal.hpp"
#include "leat/distributions/truncated_normal.hpp"
#include "leat/distributions/zipf.hpp"
#include "leat/engines/lehmer.hpp"
#include "leat/engines/multiply_with_carry.hpp"
#include "leat/engines/shuffled.hpp"
#include "leat/engines/xorshift.hpp"
#include "leat/regions/box.hpp"
#include "leat/regions/combination.hpp"
#include "leat/regions/disk.hpp"
#include "leat/regions/simplex.hpp"
#include "leat/regions/triangle_mesh.hpp"
#include "leat/state/json.hpp"
#include "leat/streams/source.hpp"
#include "leat/streams/split.hpp"
#include "leat/uniform/permute.hpp"
#include "leat/uniform/uniform_integer.hpp"

#include <gtest/gtest.h>

#include <array>
#include <cstdint>
#include <cstdio>
#include <iterator>
#include <limits>
#include <memory>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

namespace {

using nlohmann::json;

/// How often each document is damaged, in each of the three ways.
constexpr int rounds = leat_test::sanitized ? 100 : 680;
constexpr int least_tried = leat_test::sanitized ? 1500 : 10000;

/// What reading a damaged document came to.
enum class ending { refused, exact, another, target_changed, other_exception };

/// A document, and a target that holds another object of its type, without the type.
struct saved_object {
    json document;
    json before; // what the target holds
    std::shared_ptr<void> target;
    void (*read)(const json& from, void* target);
    json (*save)(const void* target);

    /// What comes of reading a document into the target, exact being what `wanted` says.
    [[nodiscard]] ending restore(const json& damaged, const json& wanted) const {
        try {
            read(damaged, target.get());
        } catch (const leat::state_refused&) {
            return save(target.get()) == before ? ending::refused : ending::target_changed;
        } catch (...) {
            return ending::other_exception;
        }
        // By value: 2 may be written for 2.0. To the bit all the same, by the checksum.
        const bool exact = save(target.get()) == wanted;
        read(before, target.get());
        return exact ? ending::exact : ending::another;
    }
};

template <class T>
saved_object object(const T& x, T other) {
    saved_object one;
    one.read = [](const json& from, void* target) { from_json(from, *static_cast<T*>(target)); };
    one.save = [](const void* target) {
        json saved;
        to_json(saved, *static_cast<const T*>(target));
        return saved;
    };
    one.document = one.save(&x);
    one.before = one.save(&other);
    one.target = std::make_shared<T>(std::move(other));
    return one;
}

/// At least one of every form that a document has.
std::vector<saved_object> objects() {
    std::vector<saved_object> all;
    all.push_back(object(leat::xorshift32{7}, leat::xorshift32{8}));
    all.push_back(object(leat::mwc_lag4_32{7}, leat::mwc_lag4_32{8}));
    using shuffled = leat::shuffled<leat::minimal_standard, 8>;
    all.push_back(object(shuffled{7}, shuffled{8}));
    const auto block = [](int i) { return leat::block(leat::xorshift32{7}, i, 1000); };
    all.push_back(object(block(3), block(4)));
    const leat::source study{7};
    all.push_back(object(study, study.branch("a", 3)));
    all.push_back(object(study.stream("x", 1), study.stream(2)));
    all.push_back(object(study.stream(1).address(), study.stream(2).address()));
    all.push_back(object(leat::normal<float>{0.5F, 2}, leat::normal<float>{3, 4}));
    constexpr double infinity = std::numeric_limits<double>::infinity();
    all.push_back(object(leat::truncated_normal{0.1, 0.7, 2, infinity},
                         leat::truncated_normal{0, 1, -infinity, 0}));
    all.push_back(object(leat::zipf{1.5, std::int64_t{1} << 60}, leat::zipf{2, 9}));
    all.push_back(object(leat::categorical({1, 0, 7.5, 1e-3}), leat::categorical({1, 2})));
    all.push_back(object(leat::multivariate_normal({1, 2}, {{4, 1}, {1, 9}}),
                         leat::multivariate_normal({0}, {{1}})));
    using bytes = leat::uniform_integer<std::int8_t>;
    all.push_back(object(bytes{-128, 5}, bytes{0, 1}));
    all.push_back(object(leat::simplex<2>{}, leat::simplex<2>{{{{0, 0}, {5, 0}, {0, 5}}}}));
    using mesh = leat::triangle_mesh<>;
    all.push_back(object(mesh{{{0, 0, 0}, {1, 2, 3}, {1, 0, 1}, {0, 1, 1}}, {{0, 1, 2}, {1, 2, 3}}},
                         mesh{{{0, 0, 0}, {1, 0, 0}, {0, 1, 0}}, {{0, 1, 2}}}));
    const auto parts = [](double x) {
        return leat::either{leat::box{{5, 5}, {6, 7}},
                            leat::without{leat::box{{0, 0}, {4, 4}}, leat::disk{{2, 2}, x}, 12}};
    };
    all.push_back(object(parts(1), parts(0.5)));
    const auto rest = [](double x) {
        return leat::without{leat::box{{0, 0}, {4, 4}}, leat::disk{{2, 2}, x}};
    };
    all.push_back(object(rest(1), rest(0.5)));
    return all;
}

/// Draws for the damage, from a stream of the test's own.
class damage {
public:
    explicit damage(const char* kind) : draws_(leat::source{"JsonCorruption"}.stream(kind)) {}

    std::size_t below(std::size_t n) { return leat::below(n, draws_); }

    /// The text flipped, cut, repeated, or spliced with another.
    std::string text(std::string text, const std::string& other) {
        const std::size_t at = below(text.size());
        const std::size_t length = 1 + below(below(4) == 0 ? text.size() - at : 4);
        switch (below(9)) {
        case 0: // a bit
            text[at] = static_cast<char>(text[at] ^ (1 << below(8)));
            break;
        case 1: // a byte
            text[at] = static_cast<char>(below(256));
            break;
        case 2: // a digit or a letter
            text[at] = "0123456789abcdefxyz.-+ehnt\"{}[],: "[below(34)];
            break;
        case 3: // the end lost
            text.resize(at);
            break;
        case 4: // a part lost
            text.erase(at, length);
            break;
        case 5: // a part twice
            text.insert(at, text.substr(at, length));
            break;
        case 6: // two parts exchanged
            std::swap(text[at], text[below(text.size())]);
            break;
        case 7: // the end of another document
            text = text.substr(0, at) + other.substr(below(other.size()));
            break;
        default: // a part of another document
            text.replace(at, length, other.substr(below(other.size()), length));
        }
        return text;
    }

    /// The document with a value, a name or a whole part changed.
    json value(json document, const json& other) {
        json* place = &document;
        while (!place->empty() && place->is_structured() && below(5) != 0) {
            auto inside = place->begin();
            std::advance(inside, static_cast<std::ptrdiff_t>(below(place->size())));
            place = &*inside;
        }
        if (place->is_structured() && !place->empty() && below(2) == 0) {
            auto inside = place->begin();
            std::advance(inside, static_cast<std::ptrdiff_t>(below(place->size())));
            if (place->is_object()) {
                json kept = *inside;
                const std::string name = inside.key();
                place->erase(inside);
                if (below(2) == 0) { // another name
                    (*place)[name + "s"] = std::move(kept);
                } else if (other.contains(name)) { // another object's value
                    (*place)[name] = other.at(name);
                }
            } else if (below(2) == 0) {
                place->erase(inside);
            } else {
                place->push_back(*inside);
            }
            return document;
        }
        if (place->is_number_float() && below(2) == 0) {
            *place = place->get<double>() * (1 + static_cast<double>(below(3)) * 0x1p-52) +
                     static_cast<double>(below(3));
        } else if (place->is_number_integer() && below(2) == 0) {
            *place = place->get<std::int64_t>() + static_cast<std::int64_t>(below(5)) - 2;
        } else if (place->is_string() && below(2) == 0) {
            *place = text(place->get<std::string>() + " ", "18446744073709551615");
        } else {
            const json others[] = {
                nullptr, true, 0,  -1,  1e300, -0.0, 5e-324,         "",           "infinity",
                "0",     "-7", {}, {1}, 0.5,   7,    json::object(), json::array()};
            *place = others[below(std::size(others))];
        }
        return document;
    }

private:
    leat::stream draws_;
};

/// The endings counted; any but the first two is a failure.
struct tally {
    int tried = 0;
    int ended[5] = {};

    void add(ending e, const json& read) {
        ++tried;
        const auto kind = static_cast<std::size_t>(e);
        ++ended[kind];
        if (kind >= 2 && failures_++ < 5) {
            ADD_FAILURE() << "ending " << kind << " of "
                          << read.dump(-1, ' ', true, json::error_handler_t::replace);
        }
    }
    void print(const char* what) const {
        std::printf("%s: %d damaged documents: %d refused, %d restored exactly, %d otherwise\n",
                    what, tried, ended[0], ended[1], tried - ended[0] - ended[1]);
    }

private:
    int failures_ = 0;
};

TEST(JsonCorruption, DamagedTextIsRefusedOrRestoresExactly) {
    damage harm("text");
    tally count;
    const auto all = objects();
    for (int round = 0; round < rounds; ++round) {
        for (const saved_object& one : all) {
            const std::string sound = one.document.dump();
            const std::string other = all[harm.below(all.size())].document.dump();
            const std::string text = harm.text(sound, other);
            const json read = json::parse(std::string_view(text), nullptr, false);
            if (read.is_discarded()) { // from_json_text refuses it, as another test shows
                count.add(ending::refused, text);
            } else {
                count.add(one.restore(read, one.document), read);
            }
        }
    }
    count.print("text");
    EXPECT_GE(count.tried, least_tried);
    EXPECT_GT(count.ended[1], 0); // white space, a digit more: the reading is no blind refusal
}

TEST(JsonCorruption, DamagedValuesAreRefusedOrRestoreExactly) {
    damage harm("value");
    tally count;
    const auto all = objects();
    for (int round = 0; round < rounds; ++round) {
        for (const saved_object& one : all) {
            const json& other = all[harm.below(all.size())].document;
            const json read = harm.value(one.document, other);
            count.add(one.restore(read, one.document), read);
        }
    }
    count.print("values");
    EXPECT_GE(count.tried, least_tried);
}

/// The document with a checksum that fits, of the type that it was saved from.
json forged(json content, const json& original) {
    for (const char* const name : {"leat", "version", "checksum"}) {
        content.erase(name);
    }
    return leat::detail::seal(original.at("leat").get<std::string>(), 1, content);
}

TEST(JsonCorruption, WithoutTheChecksumDamageWouldPass) {
    damage harm("value");
    const auto all = objects();
    int wrong = 0;
    for (int round = 0; round < rounds / 8; ++round) {
        for (const saved_object& one : all) {
            const json& other = all[harm.below(all.size())].document;
            const json read = harm.value(one.document, other);
            wrong += read.is_object() &&
                     one.restore(forged(read, one.document), one.document) == ending::another;
        }
    }
    EXPECT_GT(wrong, rounds / 8);
}

TEST(JsonCorruption, ForgedDocumentsAreRefusedOrRestoreWhatTheySay) {
    damage harm("forged");
    tally count;
    const auto all = objects();
    for (int round = 0; round < rounds; ++round) {
        for (const saved_object& one : all) {
            const json content = harm.value(one.document, all[harm.below(all.size())].document);
            if (!content.is_object()) {
                continue;
            }
            const json read = forged(content, one.document);
            count.add(one.restore(read, read), read);
        }
    }
    count.print("forged");
    EXPECT_GE(count.tried, least_tried);
    EXPECT_GT(count.ended[1], least_tried / 10);
}

} // namespace
