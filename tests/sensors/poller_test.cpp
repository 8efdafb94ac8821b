#include "sensors/poller.h"

#include "tests/sensors/test_wiring.h"

#include <algorithm>
#include <chrono>
#include <optional>
#include <set>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::minutes;
using std::chrono::seconds;
using test::addresses;
using test::failing;
using test::period;
using test::ScriptedBus;
using test::start;

std::optional<Reading> of(std::size_t point, const std::vector<PointReading>& readings) {
  const auto found = std::find_if(readings.begin(), readings.end(),
                                  [point](const PointReading& r) { return r.point == point; });
  return found == readings.end() ? std::nullopt : std::optional{found->reading};
}

std::vector<Quality> qualities(const std::vector<PointReading>& readings, std::size_t points) {
  std::vector<Quality> all;
  for (std::size_t i = 0; i < points; ++i) {
    all.push_back(of(i, readings).value().quality);
  }
  return all;
}

// Points at the registers given, of the panel.
Wiring panel_with(std::initializer_list<std::uint16_t> registers) {
  Wiring wiring = test::empty_wiring();
  for (const std::uint16_t address : registers) {
    wiring.points.push_back(test::power_at("chiller-1", "panel", address));
  }
  return wiring;
}

TEST(Poller, GivesEveryDuePointItsValueInSI) {
  ScriptedBus bus{addresses};
  Poller poller{panel_with({100, 105, 300}), "plc", bus};
  const auto readings = poller.poll(start);
  ASSERT_EQ(readings.size(), 3U);
  EXPECT_EQ(of(0, readings)->value_SI, 100e3);
  EXPECT_EQ(of(1, readings)->value_SI, 105e3);
  EXPECT_EQ(of(2, readings)->value_SI, 300e3);
  EXPECT_EQ(of(2, readings)->quality, Quality::good);
  EXPECT_EQ(of(2, readings)->time, start);
}

TEST(Poller, AsksForAsFewBlocksAsItCan) {
  ScriptedBus bus{addresses};
  Poller poller{panel_with({100, 105, 300}), "plc", bus};
  static_cast<void>(poller.poll(start));
  EXPECT_THAT(bus.asked,
              testing::UnorderedElementsAre(BlockRequest{.unit = 1, .address = 100, .count = 6},
                                            BlockRequest{.unit = 1, .address = 300, .count = 1}));
}

TEST(Poller, PassesOverOtherBusesAndPointsWithoutARegister) {
  Wiring wiring = panel_with({100});
  wiring.buses.push_back({.id = "other"});
  wiring.devices.push_back({.id = "elsewhere", .bus = "other"});
  wiring.points.push_back(test::power_at("chiller-1", "elsewhere", 1));
  wiring.points.push_back(test::power_at("chiller-1", "panel", 101));
  wiring.points.back().source = Constant{.value = 5.0};
  ScriptedBus bus{addresses};
  Poller poller{wiring, "plc", bus};
  EXPECT_EQ(poller.poll(start).size(), 1U);
}

TEST(Poller, ReadsAMachineAtTheMultiplesOfItsPeriod) {
  ScriptedBus bus{addresses};
  Poller poller{panel_with({100}), "plc", bus};
  EXPECT_EQ(poller.poll(start + seconds{3}).size(), 1U);  // the first time at once
  EXPECT_EQ(poller.next_due(), start + period);
  EXPECT_TRUE(poller.poll(start + seconds{9}).empty());
  EXPECT_EQ(poller.poll(start + period).size(), 1U);
  EXPECT_EQ(poller.poll(start + 7 * period + seconds{1}).size(), 1U);  // late, and once only
  EXPECT_EQ(poller.next_due(), start + 8 * period);
}

TEST(Poller, ReadsMachinesOfDifferentPeriodsEachInItsOwn) {
  Wiring wiring = panel_with({100});
  wiring.machines.push_back({.machine = "pump", .period = Span{1000}});
  wiring.points.push_back(test::power_at("pump", "panel", 101));
  ScriptedBus bus{addresses};
  Poller poller{wiring, "plc", bus};
  EXPECT_EQ(poller.poll(start).size(), 2U);
  const auto readings = poller.poll(start + seconds{1});
  ASSERT_EQ(readings.size(), 1U);
  EXPECT_EQ(readings[0].point, 1U);
}

TEST(Poller, GoesOnWhenTheClockIsSetBack) {
  ScriptedBus bus{addresses};
  Poller poller{panel_with({100}), "plc", bus};
  static_cast<void>(poller.poll(start));
  EXPECT_EQ(poller.poll(start - std::chrono::hours{1}).size(), 1U);
}

TEST(Poller, HasNothingDueWhereNothingIsWired) {
  ScriptedBus bus{addresses};
  Poller poller{test::empty_wiring(), "plc", bus};
  EXPECT_EQ(poller.next_due(), Instant::max());
  EXPECT_TRUE(poller.poll(start).empty());
}

struct FailureCase {
  std::string label;
  BlockAnswer answer;
  Quality quality;
};

class FailedBlock : public testing::TestWithParam<FailureCase> {};

TEST_P(FailedBlock, GivesItsPointsTheQualityAndNoValue) {
  ScriptedBus bus{[](const BlockRequest&) { return GetParam().answer; }};
  Poller poller{panel_with({100, 101}), "plc", bus};
  EXPECT_THAT(qualities(poller.poll(start), 2), testing::Each(GetParam().quality));
}

INSTANTIATE_TEST_SUITE_P(
    Each, FailedBlock,
    testing::Values(
        FailureCase{"timeout", failing(BusFailure::timeout), Quality::timeout},
        FailureCase{"connection", failing(BusFailure::connection), Quality::timeout},
        FailureCase{"malformed", failing(BusFailure::malformed), Quality::timeout},
        FailureCase{"illegal_function", failing(BusFailure::exception, 1), Quality::exception},
        FailureCase{"illegal_address", failing(BusFailure::exception, 2), Quality::exception},
        FailureCase{"device_failure", failing(BusFailure::exception, 4), Quality::exception},
        FailureCase{"busy", failing(BusFailure::exception, 6), Quality::exception},
        FailureCase{"gateway_target", failing(BusFailure::exception, 11), Quality::exception},
        FailureCase{"unknown", failing(BusFailure::exception, 0x55), Quality::exception},
        FailureCase{"no_words", BlockAnswer{}, Quality::out_of_range}),
    [](const auto& tested) { return tested.param.label; });

TEST(Poller, TellsASentinelAndAValueOutOfRange) {
  Wiring wiring = panel_with({100, 101, 102});
  std::get<FromRegister>(wiring.points[0].source).at.sentinels = {100};
  wiring.points[1].range = PointRange{.min = 0.0, .max = 50.0};
  ScriptedBus bus{addresses};
  Poller poller{wiring, "plc", bus};
  EXPECT_THAT(qualities(poller.poll(start), 3),
              testing::ElementsAre(Quality::sentinel, Quality::out_of_range, Quality::good));
}

TEST(Poller, MarksWordsSuspectThatTheBusIsNotSureOf) {
  ScriptedBus bus{[](const BlockRequest& request) {
    BlockAnswer answer = addresses(request);
    answer.suspect = true;
    return answer;
  }};
  Poller poller{panel_with({100}), "plc", bus};
  EXPECT_THAT(qualities(poller.poll(start), 1), testing::ElementsAre(Quality::suspect));
}

// A device that has no register 103 and refuses every block with it.
BlockAnswer without_103(const BlockRequest& request) {
  const bool touches = request.address <= 103 && request.address + request.count > 103;
  return touches ? failing(BusFailure::exception, 2) : addresses(request);
}

TEST(Poller, FindsTheOneRegisterThatTheDeviceDoesNotHave) {
  ScriptedBus bus{without_103};
  Poller poller{panel_with({100, 101, 102, 103, 104, 105}), "plc", bus};
  EXPECT_THAT(qualities(poller.poll(start), 6),
              testing::ElementsAre(Quality::good, Quality::good, Quality::good, Quality::exception,
                                   Quality::good, Quality::good));
}

TEST(Poller, RemembersWhatItFoundAndAsksNoMoreForIt) {
  ScriptedBus bus{without_103};
  Poller poller{panel_with({100, 101, 102, 103, 104, 105}), "plc", bus};
  static_cast<void>(poller.poll(start));
  bus.asked.clear();
  const auto readings = poller.poll(start + period);
  EXPECT_THAT(bus.asked,
              testing::UnorderedElementsAre(BlockRequest{.unit = 1, .address = 100, .count = 3},
                                            BlockRequest{.unit = 1, .address = 104, .count = 2}));
  EXPECT_EQ(of(3, readings)->quality, Quality::exception);
}

TEST(Poller, AsksForAMissingRegisterAgainAfterTenMinutes) {
  bool there = false;
  ScriptedBus bus{[&there](const BlockRequest& request) {
    return there ? addresses(request) : without_103(request);
  }};
  Poller poller{panel_with({100, 103}), "plc", bus};
  static_cast<void>(poller.poll(start));
  there = true;
  EXPECT_EQ(of(1, poller.poll(start + minutes{9}))->quality, Quality::exception);
  EXPECT_EQ(of(1, poller.poll(start + minutes{10}))->quality, Quality::good);
}

TEST(Poller, ReadsAroundARegisterInAGapThatTheDeviceDoesNotHave) {
  ScriptedBus bus{without_103};
  Poller poller{panel_with({100, 106}), "plc", bus};
  EXPECT_THAT(qualities(poller.poll(start), 2), testing::Each(Quality::good));
}

// A bus on which unit 1 says nothing.
BlockAnswer without_panel(const BlockRequest& request) {
  return request.unit == 1 ? failing(BusFailure::timeout) : addresses(request);
}

Wiring panel_and_meter() {
  Wiring wiring = panel_with({100, 500});
  wiring.points.push_back(test::power_at("chiller-1", "meter", 1));
  return wiring;
}

TEST(Poller, WaitsForASilentDeviceOnlyOnceInAPollAndReadsTheOthers) {
  ScriptedBus bus{without_panel};
  Poller poller{panel_and_meter(), "plc", bus};
  EXPECT_THAT(qualities(poller.poll(start), 3),
              testing::ElementsAre(Quality::timeout, Quality::timeout, Quality::good));
  EXPECT_EQ(bus.asked.size(), 2U);
}

// Pauses of 1, 2, 4, 8, 16, 32, 60, 60 ... s: in ten minutes of 10 s scans it is asked at 0, 10,
// 20, 30 and 40 s, then 20, 40, and from there every 60 s.
TEST(Poller, LeavesASilentDeviceAloneForAPauseThatDoubles) {
  ScriptedBus bus{without_panel};
  Poller poller{panel_and_meter(), "plc", bus};
  std::vector<Span> asked_after;
  for (Span after{0}; after < minutes{10}; after += period) {
    bus.asked.clear();
    static_cast<void>(poller.poll(start + after));
    if (std::any_of(bus.asked.begin(), bus.asked.end(),
                    [](const BlockRequest& r) { return r.unit == 1; })) {
      asked_after.push_back(after);
    }
  }
  EXPECT_THAT(
      asked_after,
      testing::ElementsAre(seconds{0}, seconds{10}, seconds{20}, seconds{30}, seconds{40},
                           seconds{60}, seconds{100}, seconds{160}, seconds{220}, seconds{280},
                           seconds{340}, seconds{400}, seconds{460}, seconds{520}, seconds{580}));
}

TEST(Poller, GivesAReadingForEveryPointWhileItLeavesADeviceAlone) {
  ScriptedBus bus{without_panel};
  Poller poller{panel_and_meter(), "plc", bus};
  for (Span after{0}; after < minutes{2}; after += period) {
    EXPECT_EQ(poller.poll(start + after).size(), 3U);
  }
}

TEST(Poller, ComesBackToADeviceThatAnswersAgain) {
  bool silent = true;
  ScriptedBus bus{[&silent](const BlockRequest& request) {
    return silent ? without_panel(request) : addresses(request);
  }};
  Poller poller{panel_and_meter(), "plc", bus};
  static_cast<void>(poller.poll(start));
  silent = false;
  EXPECT_THAT(qualities(poller.poll(start + period), 3), testing::Each(Quality::good));
}

TEST(Poller, SaysHowADeviceHasAnswered) {
  ScriptedBus bus{without_panel};
  Poller poller{panel_and_meter(), "plc", bus};
  static_cast<void>(poller.poll(start));
  static_cast<void>(poller.poll(start + period));
  const auto status = poller.status();
  ASSERT_EQ(status.size(), 2U);
  EXPECT_EQ(status[0].device, "panel");
  EXPECT_EQ(status[0].requests, 2U);
  EXPECT_EQ(status[0].timeouts, 2U);
  EXPECT_EQ(status[0].silent_since, start);
  EXPECT_EQ(status[1].answers, 2U);
  EXPECT_EQ(status[1].silent_since, std::nullopt);
}

}  // namespace
}  // namespace lostwork
