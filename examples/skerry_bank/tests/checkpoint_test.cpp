// Checkpoints that were changed: each is refused by a line that says why, or restores every bit.

#include <sstream>

#include <leat/streams/source.hpp>
#include <leat/uniform/uniform_integer.hpp>

#include "../checkpoint.hpp"
#include "../files.hpp"
#include "../flat_row.hpp"
#include "../refusal.hpp"
#include "run_program.hpp"

namespace skerry_test {
namespace {

using skerry::json;
using skerry::row_set;

class skerry_bank_checkpoint : public program_test {
protected:
    skerry_bank_checkpoint() {
        for (int r = 0; r < in_.values.replications; r += 2) {
            const double x = 1.0 / (3 + r);
            const skerry::outcome some{x, 1234.567 * x, x * x, r};
            rows_[static_cast<std::size_t>(r)] = {r, {some, some}, some};
        }
        skerry::save_checkpoint(file_, in_, rows_);
        text_ = read_file(file_);
    }

    [[nodiscard]] bool restores(const std::string& text) const {
        write_file(file_, text);
        const row_set found = skerry::load_checkpoint(file_, in_);
        bool same = found.size() == rows_.size();
        for (std::size_t r = 0; same && r < rows_.size(); ++r) {
            same = found[r].has_value() == rows_[r].has_value() &&
                   (!found[r] || skerry::flatten(*found[r]) == skerry::flatten(*rows_[r]));
        }
        return same;
    }

    /// The text of the refusal, or nothing.
    [[nodiscard]] std::string refusal_of(const std::string& text) const {
        try {
            return restores(text) ? "" : "RESTORED WRONGLY";
        } catch (const skerry::refusal& e) {
            return e.what();
        }
    }

    /// The checkpoint with a change and a checksum that fits it, as checkpoint.cpp describes it.
    template <class Change>
    std::string forged(Change change) const {
        json document = json::parse(text_);
        change(document);
        document.erase("checksum");
        leat::stream words = leat::source{"leat_skerry_bank checkpoint"}.stream(document.dump());
        document["checksum"] = (std::ostringstream() << std::hex << words()).str();
        return document.dump();
    }

    const skerry::loaded_input in_ = skerry::load_input(small_);
    row_set rows_ = row_set(static_cast<std::size_t>(in_.values.replications));
    const std::string file_ = own_file("saved.json");
    std::string text_;
};

TEST_F(skerry_bank_checkpoint, restores_every_bit) {
    EXPECT_TRUE(restores(text_));
    EXPECT_TRUE(restores(json::parse(text_).dump(4))) << "laid out otherwise";
    EXPECT_TRUE(restores(forged([](json&) {})));
}

TEST_F(skerry_bank_checkpoint, refuses_or_restores_whatever_is_damaged) {
    int refused = 0;
    int restored = 0;
    const auto judge = [&](const std::string& text, const std::string& what) {
        const std::string why = refusal_of(text);
        EXPECT_NE(why, "RESTORED WRONGLY") << what;
        EXPECT_EQ(why.find('\n'), std::string::npos) << why;
        ++(why.empty() ? restored : refused);
    };
    for (std::size_t length = 0; length < text_.size(); length += 13) {
        judge(text_.substr(0, length), "cut to " + std::to_string(length));
    }
    leat::stream words = leat::source{"skerry_bank_checkpoint"}.stream("damage");
    const leat::uniform_integer<std::size_t> place{0, text_.size() - 1};
    for (int i = 0; i < 300; ++i) {
        std::string flipped = text_;
        const std::size_t at = place(words);
        flipped[at] = static_cast<char>(flipped[at] ^ (1 << leat::below(8, words)));
        judge(flipped, "flipped at " + std::to_string(at));
        std::string spliced = text_;
        const std::size_t from = place(words);
        const std::size_t to = place(words);
        spliced.replace(to, 40, text_.substr(from, 40));
        judge(spliced, "spliced " + std::to_string(from) + " to " + std::to_string(to));
    }
    RecordProperty("refused", refused);
    RecordProperty("restored", restored);
    EXPECT_GT(refused, 50 * restored) << "blanks alone may change unnoticed";
}

TEST_F(skerry_bank_checkpoint, says_why_it_is_refused) {
    const auto expect = [&](const std::string& text, const std::string& part) {
        const std::string why = refusal_of(text);
        EXPECT_TRUE(why.starts_with(file_ + ": ")) << why;
        EXPECT_NE(why.find(part), std::string::npos) << why << "\nlacks\n" << part;
    };
    std::string changed_digit = text_;
    changed_digit.replace(changed_digit.find("[2,"), 3, "[3,");
    expect(changed_digit, "checksum: does not fit");
    expect(text_.substr(0, text_.size() / 2), "not JSON");
    expect("{}", "is no checkpoint");
    expect("[]", "is no checkpoint");
    expect(read_file(small_), "is no checkpoint");
    expect(forged([](json& d) { d["version"] = 2; }), "version: must be 1");
    expect(forged([](json& d) { d["leat_version"] = "99.0.0"; }), "leat_version: is \"99.0.0\"");
    expect(forged([](json& d) { d["remark"] = 1; }), "remark: unknown key");
    expect(forged([](json& d) { d["rows"][1][0] = 0; }), "rows: replication 0 must");
    expect(forged([](json& d) { d["rows"][1][0] = 24; }), "rows: replication 24 must be below");
    expect(forged([](json& d) { d["rows"][1][0] = 1.5; }), "rows: holds 1.5 in place of a count");
    expect(forged([](json& d) { d["rows"][1][0] = 1e300; }), "rows: holds 1e+300");
    expect(forged([](json& d) { d["rows"][1][2] = nullptr; }), "rows: holds null");
    expect(forged([](json& d) { d["rows"][1].push_back(1); }), "rows: must each be a list of 13");
    // Whatever changes a row makes it another study; title and note do not.
    for (const auto& [key, value] :
         std::vector<std::pair<const char*, json>>{{"/seed", 5},
                                                   {"/horizon_days", 366},
                                                   {"/lease/semi_x_km", 3.5},
                                                   {"/port/y_km", 1},
                                                   {"/turbines/rated_mw", 7},
                                                   {"/components/1/repair/sd_hours", 8},
                                                   {"/weather/capacity_factor/waiting", 0.5},
                                                   {"/vessels/speed_knots", 19},
                                                   {"/designs/0/vessels", 3}}) {
        const std::string path = std::string("/input") + key;
        const std::string text =
            forged([&, v = value](json& d) { d[json::json_pointer(path)] = v; });
        expect(text, "differs: the checkpoint is of another study");
    }
    EXPECT_TRUE(restores(forged([](json& d) { d["input"]["title"] = "Renamed"; })));
}

} // namespace
} // namespace skerry_test
