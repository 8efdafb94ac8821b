#include "sensors/scan_assembler.h"

#include "tests/sensors/test_wiring.h"

#include <chrono>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::seconds;
using test::period;
using test::start;

// Points 0 and 2 of the chiller, 1 of another machine, 3 constant, 4 from a file only.
Wiring wiring() {
  Wiring site = test::empty_wiring();
  site.points = {test::power_at("chiller-1", "panel", 0), test::power_at("other", "panel", 1),
                 test::power_at("chiller-1", "meter", 2), test::power_at("chiller-1", "panel", 3),
                 test::power_at("chiller-1", "panel", 4)};
  site.points[3].source = Constant{.value = 12.5};
  site.points[3].accuracies = {StandardUncertainty{0.5}};
  site.points[4].source = FileOnly{};
  return site;
}

PointReading good(std::size_t point, double value_SI, Instant time) {
  return {
      .point = point,
      .reading = {.value_SI = value_SI, .u_SI = 1.0, .quality = Quality::good, .time = time}
  };
}

TEST(ScanAssembler, PutsReadingsInTheOrderOfTheMachinesPoints) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  assembler.take(std::vector{good(2, 22.0, start), good(1, 11.0, start), good(0, 33.0, start)});
  const Scan scan = assembler.scan(start);
  EXPECT_EQ(scan.time, start);
  ASSERT_EQ(scan.readings.size(), 4U);
  EXPECT_EQ(scan.readings[0], good(0, 33.0, start).reading);
  EXPECT_EQ(scan.readings[1], good(2, 22.0, start).reading);
}

TEST(ScanAssembler, GivesAConstantPointItsValueAtEveryScan) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  const Reading constant = assembler.scan(start).readings[2];
  EXPECT_EQ(constant.quality, Quality::good);
  EXPECT_EQ(constant.value_SI, 12500.0);
  EXPECT_EQ(constant.u_SI, 500.0);
  EXPECT_EQ(assembler.scan(start + period).readings[2].time, start + period);
}

TEST(ScanAssembler, HasNoValueForAPointThatComesFromAFile) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  EXPECT_EQ(assembler.scan(start).readings[3].quality, Quality::timeout);
}

TEST(ScanAssembler, HasNoValueBeforeTheFirstReading) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  EXPECT_EQ(assembler.scan(start).readings[0].quality, Quality::timeout);
}

TEST(ScanAssembler, NeverUsesAReadingTwice) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  assembler.take(std::vector{good(0, 33.0, start)});
  EXPECT_EQ(assembler.scan(start + seconds{1}).readings[0].quality, Quality::good);
  EXPECT_EQ(assembler.scan(start + seconds{2}).readings[0].quality, Quality::timeout);
}

TEST(ScanAssembler, DoesNotUseAReadingOlderThanAPeriod) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  assembler.take(std::vector{good(0, 33.0, start)});
  EXPECT_EQ(assembler.scan(start + period + Span{1}).readings[0].quality, Quality::timeout);
}

TEST(ScanAssembler, UsesAReadingThatIsJustAPeriodOldAndOneTakenDuringTheSweep) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  assembler.take(std::vector{good(0, 33.0, start), good(2, 22.0, start + period + Span{80})});
  const Scan scan = assembler.scan(start + period);
  EXPECT_EQ(scan.readings[0].quality, Quality::good);
  EXPECT_EQ(scan.readings[1].quality, Quality::good);
}

TEST(ScanAssembler, CallsAPointStaleAfterThreePeriods) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  assembler.take(std::vector{good(0, 33.0, start)});
  static_cast<void>(assembler.scan(start));
  EXPECT_EQ(assembler.scan(start + 3 * period).readings[0].quality, Quality::timeout);
  const Reading stale = assembler.scan(start + 3 * period + Span{1}).readings[0];
  EXPECT_EQ(stale.quality, Quality::stale);
  EXPECT_EQ(stale.time, start);
}

TEST(ScanAssembler, PassesOnWhyThereIsNoValue) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  PointReading refused = good(0, 0.0, start);
  refused.reading.quality = Quality::exception;
  assembler.take(std::vector{refused});
  EXPECT_EQ(assembler.scan(start).readings[0].quality, Quality::exception);
}

TEST(ScanAssembler, IsCompleteWhenEveryWiredPointHasANewReading) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  EXPECT_FALSE(assembler.complete(start));
  assembler.take(std::vector{good(0, 33.0, start)});
  EXPECT_FALSE(assembler.complete(start));
  assembler.take(std::vector{good(2, 22.0, start)});
  EXPECT_TRUE(assembler.complete(start));
  static_cast<void>(assembler.scan(start));
  EXPECT_FALSE(assembler.complete(start));
}

// Else a reading that came after its scan would put every later scan one period behind.
TEST(ScanAssembler, IsNotCompleteWithAReadingFromBeforeTheScan) {
  ScanAssembler assembler{wiring(), "chiller-1"};
  assembler.take(std::vector{good(0, 33.0, start + Span{1}), good(2, 22.0, start + Span{1})});
  EXPECT_FALSE(assembler.complete(start + period));
  assembler.take(std::vector{good(0, 34.0, start + period), good(2, 23.0, start + period)});
  EXPECT_TRUE(assembler.complete(start + period));
}

}  // namespace
}  // namespace lostwork
