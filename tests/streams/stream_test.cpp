// stream and thin_stream: words, positions, limits, moves, replicas, offspring.

#include "leat/streams/source.hpp"

#include <gtest/gtest.h>

#include <string>
#include <type_traits>
#include <vector>

namespace {

using leat::source;
using leat::stream;
using leat::thin_stream;

static_assert(!std::is_copy_constructible_v<stream> && !std::is_copy_assignable_v<stream>);
static_assert(!std::is_copy_constructible_v<thin_stream> &&
              !std::is_copy_assignable_v<thin_stream>);
static_assert(std::is_nothrow_move_constructible_v<stream> &&
              std::is_nothrow_move_assignable_v<stream>);
static_assert(std::is_nothrow_move_constructible_v<thin_stream> &&
              std::is_nothrow_move_assignable_v<thin_stream>);
static_assert(sizeof(stream) <= 320 && sizeof(thin_stream) <= 48);
static_assert(stream::min() == 0 && stream::max() == ~std::uint64_t{0});

constexpr source study{4711};

template <class Stream>
Stream opened(int i) {
    return Stream(study.stream("stream test", i).address());
}

template <class Stream>
class Streams : public testing::Test {};
using kinds = testing::Types<stream, thin_stream>;
TYPED_TEST_SUITE(Streams, kinds);

TYPED_TEST(Streams, GiveTheWordsOfTheBlocksInOrder) {
    // Specification: refill.hpp; the block function is tested against published vectors.
    TypeParam s = opened<TypeParam>(1);
    const auto a = s.address();
    for (std::uint64_t b = 0; b < 100; ++b) {
        const auto pair = leat::detail::stream_block({a.key, a.upper}, b);
        ASSERT_EQ(s(), pair[0]) << b;
        ASSERT_EQ(s(), pair[1]) << b;
        ASSERT_EQ(s.position(), 2 * b + 2);
    }
}

TYPED_TEST(Streams, SeekAnywhereAndDiscard) {
    TypeParam reference = opened<TypeParam>(2);
    std::vector<std::uint64_t> words;
    for (int i = 0; i < 200; ++i) {
        words.push_back(reference());
    }
    TypeParam s = opened<TypeParam>(2);
    for (std::size_t n : {0u, 1u, 31u, 32u, 33u, 63u, 64u, 5u, 4u, 199u, 0u, 100u, 101u, 99u}) {
        s.seek(n);
        EXPECT_EQ(s.position(), n);
        EXPECT_EQ(s(), words[n]) << n;
        EXPECT_EQ(s.position(), n + 1);
    }
    for (std::size_t skip : {0u, 1u, 2u, 31u, 32u, 33u, 95u}) {
        s.seek(3);
        (void)s();
        s.discard(skip);
        EXPECT_EQ(s(), words[4 + skip]) << skip;
    }
}

TYPED_TEST(Streams, ThrowAtTheLimitAndStayThere) {
    TypeParam s = opened<TypeParam>(3);
    s.limit(37);
    for (int i = 0; i < 37; ++i) {
        (void)s();
    }
    for (int again = 0; again < 3; ++again) {
        try {
            (void)s();
            FAIL() << "word 38 was drawn";
        } catch (const leat::stream_exhausted& e) {
            EXPECT_NE(std::string(e.what()).find(to_string(s.address())), std::string::npos)
                << e.what();
            EXPECT_EQ(std::string(e.what()).rfind("leat::", 0), 0u) << e.what();
        }
        EXPECT_EQ(s.position(), 37u);
    }
    s.limit(38);
    EXPECT_NO_THROW(s());
    EXPECT_THROW(s(), leat::stream_exhausted);
    s.seek(1000); // past the limit: allowed
    EXPECT_THROW(s(), leat::stream_exhausted);
    EXPECT_EQ(s.position(), 1000u);
    s.seek(0);
    EXPECT_NO_THROW(s());
}

TYPED_TEST(Streams, HonourALimitSetInMidBuffer) {
    for (std::uint64_t limit : {0u, 1u, 5u, 31u, 32u, 33u, 64u}) {
        TypeParam s = opened<TypeParam>(4);
        (void)s();
        s.limit(limit);
        std::uint64_t drawn = 1;
        try {
            for (; drawn < 200; ++drawn) {
                (void)s();
            }
        } catch (const leat::stream_exhausted&) {
        }
        EXPECT_EQ(drawn, limit < 1 ? 1 : limit) << limit;
        EXPECT_EQ(s.limit(), limit);
    }
}

TYPED_TEST(Streams, EndAfterTheirLastWordAndNeverWrap) {
    constexpr std::uint64_t last = ~std::uint64_t{0};
    TypeParam s = opened<TypeParam>(5);
    s.seek(last - 1);
    EXPECT_NO_THROW(s());
    EXPECT_EQ(s.position(), last);
    EXPECT_THROW(s(), leat::stream_exhausted);
    EXPECT_EQ(s.position(), last);
    s.seek(10);
    EXPECT_THROW(s.discard(last - 9), leat::stream_exhausted);
    EXPECT_EQ(s.position(), 10u);
    EXPECT_NO_THROW(s.discard(last - 10));
    EXPECT_EQ(s.position(), last);
}

TYPED_TEST(Streams, MoveAndLeaveNothingToDrawFrom) {
    TypeParam a = opened<TypeParam>(6);
    TypeParam twin = opened<TypeParam>(6);
    (void)a();
    (void)twin();
    a.limit(50);
    TypeParam b = std::move(a);
    EXPECT_EQ(b(), twin());
    EXPECT_EQ(b.limit(), 50u);
    for (const auto draw : {0, 1}) {
        try {
            (void)a(); // NOLINT: the point
            FAIL() << draw;
        } catch (const leat::error& e) {
            EXPECT_NE(std::string(e.what()).find("moved from"), std::string::npos) << e.what();
        }
        a.seek(0); // NOLINT
        a.limit(1000);
    }
    EXPECT_THROW((void)a.replica()(), leat::error);
    a = opened<TypeParam>(7);
    EXPECT_EQ(a(), opened<TypeParam>(7)());
    a = std::move(b);
    EXPECT_EQ(a(), twin());
    auto& itself = a;
    a = std::move(itself);
    EXPECT_EQ(a(), twin());
}

TYPED_TEST(Streams, ReplicasKeepPositionAndLimit) {
    TypeParam s = opened<TypeParam>(8);
    s.discard(33);
    s.limit(35);
    TypeParam r = s.replica();
    EXPECT_EQ(r.position(), 33u);
    EXPECT_EQ(r(), s());
    EXPECT_EQ(r(), s());
    EXPECT_THROW(r(), leat::stream_exhausted);
}

TYPED_TEST(Streams, OffspringDoNotDependOnThePosition) {
    TypeParam s = opened<TypeParam>(9);
    const auto early = s.offspring(3).address();
    s.discard(12345);
    s.limit(1);
    EXPECT_EQ(s.offspring(3).address(), early);
    EXPECT_EQ(s.offspring(3).limit(), ~std::uint64_t{0});
    EXPECT_NE(s.offspring(4).address(), early);
    EXPECT_NE(opened<TypeParam>(10).offspring(3).address(), early);
}

TYPED_TEST(Streams, StartAgainFromAnAddress) {
    TypeParam s = opened<TypeParam>(11);
    s.discard(77);
    TypeParam again{leat::parse_address(to_string(s.address()))};
    EXPECT_EQ(again.position(), 77u);
    EXPECT_EQ(again(), s());
}

TEST(Stream, GivesTheWordsOfAThinStream) {
    stream s = study.stream("both", 1);
    thin_stream t = study.thin_stream("both", 1);
    for (int i = 0; i < 1000; ++i) {
        ASSERT_EQ(s(), t()) << i;
    }
}

} // namespace
