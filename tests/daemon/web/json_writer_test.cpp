#include "daemon/web/json_writer.h"

#include <cmath>
#include <limits>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

TEST(JsonWriter, PutsCommasBetweenMembersAndItems) {
  JsonWriter json;
  json.begin_object().member("a", 1).key("b").begin_array().value(true).null().end_array();
  json.key("c").begin_object().end_object().end_object();
  EXPECT_EQ(json.take(), R"({"a":1,"b":[true,null],"c":{}})");
}

TEST(JsonWriter, EscapesWhatWouldEndTheStringOrThePage) {
  JsonWriter json;
  json.value("a\"b\\c</script>&\n\x01");
  EXPECT_EQ(json.take(), R"("a\"b\\c\u003c/script\u003e\u0026\n\u0001")");
}

TEST(JsonWriter, ReplacesWhatIsNoUtf8) {
  JsonWriter json;
  json.value("caf\xC3\xA9 \xFF\xC3");
  EXPECT_EQ(json.take(), "\"caf\u00E9 \uFFFD\uFFFD\"");
}

TEST(JsonWriter, WritesADoubleThatReadsBackAsItself) {
  JsonWriter json;
  json.value(0.1 + 0.2);
  EXPECT_EQ(std::stod(json.take()), 0.1 + 0.2);
}

TEST(JsonWriter, RoundsToSignificantDigits) {
  JsonWriter json;
  json.rounded(123456.789, 4);
  EXPECT_EQ(std::stod(json.take()), 123500.0);
}

TEST(JsonWriter, WritesNullForWhatIsNotFinite) {
  JsonWriter json;
  json.begin_array()
      .value(std::nan(""))
      .rounded(std::numeric_limits<double>::infinity(), 3)
      .end_array();
  EXPECT_EQ(json.take(), "[null,null]");
}

}  // namespace
}  // namespace lostwork
