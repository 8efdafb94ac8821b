#include "thermo/measure/operation.h"

#include <cmath>
#include <limits>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::hours;
using std::chrono::minutes;
using std::chrono::seconds;

constexpr double rated_W = 100e3;

MachineModel machine(Span period = Span{10000}) {
  MachineModel model;
  model.rated_power_W = rated_W;
  model.scan_period = period;
  for (const Role role : {Role::power, Role::speed, Role::defrost}) {
    model.points.emplace_back().role = role;
  }
  return model;
}

// Plays readings into the state, one scan a period.
class Operation : public testing::Test {
 protected:
  void play(Span length, double power_W, Quality quality = Quality::good) {
    for (const Instant end = now + length; now < end; now += model.scan_period) {
      one(power_W, quality);
    }
  }
  void one(double power_W, Quality quality = Quality::good) {
    Scan scan{.time = now, .readings = std::vector<Reading>(3)};
    scan.readings[0] = {.value_SI = power_W, .quality = quality, .time = now};
    scan.readings[1] = {.value_SI = speed_Hz,
                        .quality = speed_Hz < 0.0 ? Quality::timeout : Quality::good,
                        .time = now};
    scan.readings[2] = {.value_SI = defrost, .quality = Quality::good, .time = now};
    state = after_scan(options, model, state, scan);
  }

  OperationOptions options;
  MachineModel model = machine();
  OperationState state;
  Instant now{hours{24 * 365 * 50}};
  double speed_Hz = -1.0;  // below zero: not read
  double defrost = 0.0;
};

TEST_F(Operation, IsUnknownBeforeTheFirstScan) {
  EXPECT_EQ(state.mode, Mode::unknown);
}

TEST_F(Operation, RunsWithoutAStartWhenItIsOnAtFirstSight) {
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
  EXPECT_EQ(state.starts_seen, 0U);
  EXPECT_EQ(state.on_since, now);
}

TEST_F(Operation, StartsWhenPowerComes) {
  play(minutes{1}, 0.0);
  EXPECT_EQ(state.mode, Mode::off);
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::starting);
  EXPECT_EQ(state.starts_seen, 1U);
}

TEST_F(Operation, RunsThreeMinutesAfterAStart) {
  play(minutes{1}, 0.0);
  play(seconds{180}, 0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::starting);
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
}

TEST_F(Operation, DoesNotChatterBetweenTheTwoThresholds) {
  play(minutes{1}, 0.05 * rated_W);
  EXPECT_EQ(state.mode, Mode::unknown);
  play(minutes{1}, 0.0);
  play(minutes{1}, 0.05 * rated_W);
  EXPECT_EQ(state.mode, Mode::off);
  play(minutes{10}, 0.07 * rated_W);
  play(minutes{1}, 0.04 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
}

TEST_F(Operation, StopsBeforeItIsOff) {
  play(minutes{10}, 0.5 * rated_W);
  one(0.0);
  EXPECT_EQ(state.mode, Mode::stopping);
  play(seconds{40}, 0.0);
  EXPECT_EQ(state.mode, Mode::off);
}

TEST_F(Operation, AShortDipIsNoStart) {
  play(minutes{10}, 0.5 * rated_W);
  play(seconds{20}, 0.0);
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
  EXPECT_EQ(state.starts_seen, 0U);
}

TEST_F(Operation, KeepsItsModeThroughAShortLossOfThePowerReading) {
  play(minutes{10}, 0.5 * rated_W);
  play(seconds{50}, 0.0, Quality::timeout);
  EXPECT_EQ(state.mode, Mode::running);
}

TEST_F(Operation, IsUnknownWhenThePowerReadingStaysAway) {
  play(minutes{10}, 0.5 * rated_W);
  play(minutes{2}, 0.0, Quality::timeout);
  EXPECT_EQ(state.mode, Mode::unknown);
}

TEST_F(Operation, ComesBackFromUnknownWithoutAStart) {
  play(minutes{10}, 0.5 * rated_W);
  play(minutes{2}, 0.0, Quality::timeout);
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
  EXPECT_EQ(state.on_since, now);
  EXPECT_EQ(state.starts_seen, 0U);
}

TEST_F(Operation, SpeedDecidesWherePowerIsNotRead) {
  speed_Hz = 45.0;
  play(minutes{3}, 0.0, Quality::timeout);
  EXPECT_EQ(state.mode, Mode::running);
  speed_Hz = 0.0;
  play(minutes{2}, 0.0, Quality::timeout);
  EXPECT_EQ(state.mode, Mode::off);
}

TEST_F(Operation, PowerWellBelowZeroTellsNothing) {
  play(minutes{3}, -0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::unknown);
}

TEST_F(Operation, NotANumberTellsNothing) {
  play(minutes{3}, std::numeric_limits<double>::quiet_NaN());
  EXPECT_EQ(state.mode, Mode::unknown);
}

TEST_F(Operation, CyclesWithTheSeventhStartWithinAnHour) {
  play(minutes{1}, 0.0);
  for (int i = 0; i < 6; ++i) {
    play(minutes{4}, 0.5 * rated_W);
    play(minutes{2}, 0.0);
  }
  EXPECT_NE(state.mode, Mode::cycling);
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::cycling);
}

TEST_F(Operation, SixStartsAnHourAreNoCycling) {
  play(minutes{1}, 0.0);
  for (int i = 0; i < 20; ++i) {
    play(minutes{6}, 0.5 * rated_W);
    EXPECT_EQ(state.mode, Mode::running);
    play(minutes{4}, 0.0);
  }
}

TEST_F(Operation, StopsCyclingOnceTheStartsAreAnHourOld) {
  play(minutes{1}, 0.0);
  for (int i = 0; i < 7; ++i) {
    play(minutes{4}, 0.5 * rated_W);
    play(minutes{2}, 0.0);
  }
  play(minutes{70}, 0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
}

TEST_F(Operation, CountsTheTimeOn) {
  play(minutes{30}, 0.5 * rated_W);
  play(minutes{30}, 0.0);
  // Two scans more at most: the one that begins and the ones that end it.
  EXPECT_NEAR(static_cast<double>(state.run_time.count()), 30.0 * 60e3, 50e3);
}

TEST_F(Operation, DefrostsWhileTheBitIsSet) {
  play(minutes{10}, 0.5 * rated_W);
  defrost = 1.0;
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::defrost);
  defrost = 0.0;
  now += model.scan_period;
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
  EXPECT_EQ(state.defrost_ended, now);
}

TEST_F(Operation, AGapInTheScansHidesWhatHappenedMeanwhile) {
  play(minutes{30}, 0.5 * rated_W);
  now += hours{2};
  one(0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
  EXPECT_EQ(state.on_since, now);
}

TEST_F(Operation, WorksWithSlowScans) {
  model.scan_period = seconds{75};
  play(minutes{10}, 0.0);
  play(minutes{10}, 0.5 * rated_W);
  EXPECT_EQ(state.mode, Mode::running);
  EXPECT_EQ(state.starts_seen, 1U);
  one(0.0);
  EXPECT_EQ(state.mode, Mode::stopping);
  now += model.scan_period;
  one(0.0);
  EXPECT_EQ(state.mode, Mode::off);
}

}  // namespace
}  // namespace lostwork
