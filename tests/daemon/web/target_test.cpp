#include "daemon/web/target.h"

#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::ElementsAre;
using testing::IsEmpty;
using testing::Pair;

TEST(TargetOf, TakesPathAndQueryApart) {
  const auto target = target_of("/api/v1?a=1&b=");
  ASSERT_TRUE(target);
  EXPECT_THAT(target->segments, ElementsAre("api", "v1"));
  EXPECT_THAT(target->query, ElementsAre(Pair("a", "1"), Pair("b", "")));
}

TEST(TargetOf, HasNoSegmentsAtTheRoot) {
  const auto target = target_of("/");
  ASSERT_TRUE(target);
  EXPECT_THAT(target->segments, IsEmpty());
}

TEST(TargetOf, DecodesPercentSignsOnce) {
  const auto target = target_of("/caf%C3%A9?a=%2525");
  ASSERT_TRUE(target);
  EXPECT_THAT(target->segments, ElementsAre("caf\u00E9"));
  EXPECT_THAT(target->query, ElementsAre(Pair("a", "%25")));
}

TEST(TargetOf, LeavesAPlusAsItIs) {
  const auto target = target_of("/x?from=12:00+02:00");
  ASSERT_TRUE(target);
  EXPECT_THAT(target->query, ElementsAre(Pair("from", "12:00+02:00")));
}

TEST(TargetOf, KeepsASlashThatIsPartOfASegment) {
  const auto target = target_of("/a%2Fb");
  ASSERT_TRUE(target);
  EXPECT_THAT(target->segments, ElementsAre("a/b"));
}

class MalformedTarget : public testing::TestWithParam<std::string> {};

TEST_P(MalformedTarget, IsRefused) {
  EXPECT_FALSE(target_of(GetParam())) << GetParam();
}

INSTANTIATE_TEST_SUITE_P(Text, MalformedTarget,
                         testing::Values("", "x", "http://elsewhere/", "*", "//x", "/a//b", "/%",
                                         "/%4", "/%zz", "/%+1", "/%00", "/a%0Ab", "/%FF", "/\xFF",
                                         "/a?b=%C3", "/a#b", "/a?%7F=1"));

}  // namespace
}  // namespace lostwork
