#include "daemon/web/acknowledge_question.h"

#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

TEST(CommentOf, IsTheMembersText) {
  EXPECT_EQ(comment_of(R"({"comment":"seen, cleaning on Monday"})").value(),
            "seen, cleaning on Monday");
}

TEST(CommentOf, IsEmptyWhereNoneIsGiven) {
  EXPECT_EQ(comment_of("{}").value(), "");
}

TEST(CommentOf, HoldsAsManyBytesAsAllowed) {
  const std::string longest(most_comment_bytes, 'a');
  EXPECT_EQ(comment_of("{\"comment\":\"" + longest + "\"}").value(), longest);
}

class BadBody : public testing::TestWithParam<std::string> {};

TEST_P(BadBody, IsRefused) {
  const auto comment = comment_of(GetParam());
  ASSERT_FALSE(comment);
  EXPECT_EQ(comment.error().status, 400);
}

INSTANTIATE_TEST_SUITE_P(Json, BadBody,
                         testing::Values("", "null", "[]", "\"text\"", "{", "{\"comment\":1}",
                                         "{\"comment\":null}", "{\"comment\":\"a\",\"user\":\"b\"}",
                                         "{\"Comment\":\"a\"}", "{\"comment\":\"a\"} x",
                                         "{'comment':'a'}", "{\"comment\":\"a\",}",
                                         "{\"comment\":\"\\u0000\"}", "{\"comment\":\"\xFF\"}",
                                         "{\"comment\":\"" + std::string(501, 'a') + "\"}",
                                         "{\"comment\":{\"a\":{\"b\":{\"c\":1}}}}",
                                         std::string(1000, '[')));

}  // namespace
}  // namespace lostwork
