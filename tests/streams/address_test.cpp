// The text of an address: exact round trip, and every change refused.

#include "leat/streams/address.hpp"

#include <gtest/gtest.h>

#include <string>

namespace {

using leat::parse_address;
using leat::stream_address;

TEST(Address, RoundTrips) {
    for (const stream_address a : {stream_address{0, 0, 0}, stream_address{~0ull, ~0ull, ~0ull},
                                   stream_address{0x0123456789abcdef, 1, 37}}) {
        EXPECT_EQ(parse_address(to_string(a)), a) << to_string(a);
    }
}

TEST(Address, RefusesEveryChangedCharacter) {
    const std::string line = to_string(stream_address{0x0123456789abcdef, 0xfedcba9876543210, 370});
    int refused = 0;
    for (std::size_t i = 0; i < line.size(); ++i) {
        for (const char c : std::string("0123456789abcdefkeyF x\n\t\0", 24)) {
            std::string changed = line;
            changed[i] = c;
            if (changed == line) {
                continue;
            }
            EXPECT_THROW(parse_address(changed), leat::malformed_text) << changed;
            ++refused;
        }
    }
    EXPECT_GT(refused, 1500);
}

TEST(Address, RefusesCutAndLongerLines) {
    const std::string line = to_string(stream_address{1, 2, 3});
    for (std::size_t i = 0; i < line.size(); ++i) {
        EXPECT_THROW(parse_address(line.substr(0, i)), leat::malformed_text) << i;
        EXPECT_THROW(parse_address(line.substr(i + 1)), leat::malformed_text) << i;
    }
    EXPECT_THROW(parse_address(line + " "), leat::malformed_text);
    EXPECT_THROW(parse_address(" " + line), leat::malformed_text);
}

TEST(Address, SaysWhatIsWrong) {
    const auto reason = [](const std::string& text) -> std::string {
        try {
            (void)parse_address(text);
        } catch (const leat::malformed_text& e) {
            return e.what();
        }
        return "accepted";
    };
    std::string line = to_string(stream_address{1, 2, 3});
    line.replace(line.find(" 1 "), 3, " 2 ");
    EXPECT_NE(reason(line).find("version"), std::string::npos) << reason(line);
    EXPECT_EQ(reason("nonsense").rfind("leat::parse_address: text = \"nonsense\", must be", 0), 0u)
        << reason("nonsense");
    line = to_string(stream_address{1, 2, 3});
    line[line.find("word 3") + 5] = '4';
    EXPECT_NE(reason(line).find("sum"), std::string::npos) << reason(line);
    EXPECT_NE(reason("leat-stream 1 key 0000000000000001 upper 0000000000000002 word "
                     "18446744073709551616 sum 00000000")
                  .find("2^64"),
              std::string::npos);
}

} // namespace
