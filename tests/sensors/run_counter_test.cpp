#include "sensors/run_counter.h"

#include "thermo/archive.h"

#include <chrono>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::seconds;

constexpr RunRule rule{.on_W = 5000.0, .off_W = 3000.0};
constexpr Instant start{std::chrono::sys_days{std::chrono::year{2024} / 3 / 1}};

Reading at(seconds after, double power_W, Quality quality = Quality::good) {
  return {.value_SI = power_W, .u_SI = 0.0, .quality = quality, .time = start + after};
}

RunCount count_of(const std::vector<Reading>& readings) {
  RunCount count;
  for (const Reading& reading : readings) {
    count = counted(count, rule, reading);
  }
  return count;
}

TEST(RunCount, AddsUpTheTimeInWhichTheMachineRan) {
  const RunCount count = count_of({at(seconds{0}, 0.0), at(seconds{10}, 9000.0),
                                   at(seconds{20}, 9000.0), at(seconds{30}, 0.0)});
  EXPECT_EQ(count.run, seconds{20});
  EXPECT_EQ(count.starts, 1U);
  EXPECT_FALSE(count.running);
}

TEST(RunCount, DoesNotTakeTheFirstScanForAStart) {
  EXPECT_EQ(count_of({at(seconds{0}, 9000.0)}).starts, 0U);
  EXPECT_TRUE(count_of({at(seconds{0}, 9000.0)}).running);
}

TEST(RunCount, DoesNotFlutterBetweenItsTwoThresholds) {
  const RunCount count = count_of({at(seconds{0}, 0.0), at(seconds{10}, 5100.0),
                                   at(seconds{20}, 4000.0), at(seconds{30}, 5100.0)});
  EXPECT_EQ(count.starts, 1U);
  EXPECT_EQ(count.run, seconds{20});
}

TEST(RunCount, LeavesOutATimeThatNobodySaw) {
  const RunCount count = count_of({at(seconds{0}, 9000.0), at(seconds{3600}, 9000.0)});
  EXPECT_EQ(count.run, Span{0});
}

TEST(RunCount, PassesOverReadingsThatAreNotGood) {
  const RunCount count = count_of(
      {at(seconds{0}, 9000.0), at(seconds{10}, 0.0, Quality::timeout), at(seconds{20}, 9000.0)});
  EXPECT_EQ(count.run, seconds{20});
  EXPECT_EQ(count.starts, 0U);
}

TEST(RunCount, LosesNothingWhenTheClockGoesBack) {
  const RunCount count = count_of({at(seconds{3600}, 9000.0), at(seconds{3610}, 9000.0),
                                   at(seconds{0}, 9000.0), at(seconds{10}, 9000.0)});
  EXPECT_EQ(count.run, seconds{20});
}

TEST(RunCount, ComesBackFromItsArchive) {
  RunCount count = count_of({at(seconds{0}, 0.0), at(seconds{10}, 9000.0)});
  ArchiveWriter writer;
  writer(count);
  ArchiveReader reader{writer.bytes()};
  RunCount back;
  reader(back);
  EXPECT_EQ(back, count);
}

}  // namespace
}  // namespace lostwork
