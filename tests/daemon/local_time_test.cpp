#include "daemon/local_time.h"

#include <chrono>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using namespace std::chrono_literals;
using std::chrono::sys_days;

const Instant noon = Instant{sys_days{2024y / std::chrono::May / 3}} + 12h;

// The European Union's summer time (directive 2000/84/EC): last Sunday of March to last Sunday of
// October, at 01:00 UTC; the United Kingdom keeps the same dates.
TEST(UtcOffsetOf, KnowsSummerTime) {
  const auto london = utc_offset_of("Europe/London");
  ASSERT_TRUE(london);
  EXPECT_EQ((*london)(noon), 1h);
  EXPECT_EQ((*london)(Instant{sys_days{2024y / std::chrono::January / 3}}), 0h);
}

TEST(UtcOffsetOf, HasNoZoneOfAnInventedName) {
  EXPECT_FALSE(utc_offset_of("Europe/Tern_Quay"));
}

TEST(UtcOffsetOf, DoesNotTakeAPathForAName) {
  EXPECT_FALSE(utc_offset_of("../../../etc/passwd"));
}

UtcOffset utc() {
  return [](Instant /*time*/) { return std::chrono::seconds{0}; };
}

TEST(TimeText, LeavesOutToday) {
  EXPECT_EQ(time_text(noon - 9h, noon, utc()), "03:00");
}

TEST(TimeText, NamesAnotherDay) {
  EXPECT_EQ(time_text(noon - 24h, noon, utc()), "2 May, 12:00");
}

TEST(DayText, NamesAnotherYear) {
  EXPECT_EQ(day_text(noon - 24h * 366, noon, utc()), "3 May 2023");
}

TEST(IsoText, IsUtcWithZ) {
  EXPECT_EQ(iso_text(noon + 5s), "2024-05-03T12:00:05Z");
}

TEST(IsoText, ShowsMillisecondsWhereThereAreAny) {
  EXPECT_EQ(iso_text(noon + 50ms), "2024-05-03T12:00:00.050Z");
}

TEST(InstantOf, ReadsWhatIsoTextWrites) {
  const Instant time = noon + 3h + 4min + 5s + 678ms;
  EXPECT_EQ(instant_of(iso_text(time)), time);
}

TEST(InstantOf, TakesAnOffset) {
  EXPECT_EQ(instant_of("2024-05-03T14:00:00+02:00"), noon);
}

TEST(InstantOf, TakesAWesternOffset) {
  EXPECT_EQ(instant_of("2024-05-03T08:30-03:30"), noon);
}

TEST(InstantOf, TakesTenthsForWhatTheyAre) {
  EXPECT_EQ(instant_of("2024-05-03T12:00:00.5Z"), noon + 500ms);
}

class InstantOfNonsense : public testing::TestWithParam<std::string> {};

TEST_P(InstantOfNonsense, IsNone) {
  EXPECT_FALSE(instant_of(GetParam())) << GetParam();
}

INSTANTIATE_TEST_SUITE_P(Text, InstantOfNonsense,
                         testing::Values("", "now", "2024-05-03", "2024-05-03T12:00:00",
                                         "2024-05-03 12:00:00Z", "2024-13-03T12:00:00Z",
                                         "2023-02-29T12:00:00Z", "2024-05-03T24:00:00Z",
                                         "2024-05-03T12:60:00Z", "2024-05-03T12:00:60Z",
                                         "2024-05-03T12:00:00.Z", "2024-05-03T12:00:00.1234Z",
                                         "2024-05-03T12:00:00+99:00", "1969-12-31T23:59:59Z",
                                         "2024-05-03T12:00:00Zx", "-024-05-03T12:00:00Z",
                                         "2024-05-03T12:00:00+2:00", "2024-05-03T1 :00:00Z"));

}  // namespace
}  // namespace lostwork
