#include "daemon/advance.h"

#include "tests/daemon/step_run.h"

#include <algorithm>
#include <limits>
#include <string>
#include <utility>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using test::Outcome;
using test::play;
using test::StepRun;
using testing::IsEmpty;
using testing::SizeIs;

constexpr int hour = 360;  // scans

std::uint64_t count_of(const MachineState& state, ScanFate fate) {
  return state.scans.at(static_cast<std::size_t>(fate));
}

TEST(Advance, GivesTheSameBitsForTheSameScans) {
  const std::vector<Scan> scans = StepRun{3}.scans(12 * hour);
  Outcome first;
  Outcome second;
  play(StepRun{3}.model(), scans, first);
  play(StepRun{3}.model(), scans, second);
  test::expect_same(first, second);
}

TEST(Advance, HasSomethingToTellOfALifelyMachine) {
  StepRun run{3};
  Outcome outcome;
  play(run.model(), run.scans(12 * hour), outcome);
  EXPECT_GE(outcome.windows.size(), 10U);
  EXPECT_GE(outcome.alarms.size(), 10U);
  EXPECT_GE(outcome.state.operation.starts_seen, 5U);
}

class RestartAt : public testing::TestWithParam<int> {};

TEST_P(RestartAt, ChangesNoLaterResult) {
  const StepModel model = StepRun{5}.model();
  const std::vector<Scan> scans = StepRun{5}.scans(8 * hour);
  Outcome whole;
  play(model, scans, whole);

  const auto middle = scans.begin() + GetParam();
  Outcome restarted;
  play(model, {scans.begin(), middle}, restarted);
  auto loaded = load(model, save(restarted.state));
  ASSERT_TRUE(loaded) << loaded.error();
  restarted.state = std::move(*loaded);
  play(model, {middle, scans.end()}, restarted);
  test::expect_same(whole, restarted);
}

// In a start, in the middle of a minute's sums, just before and after a window, while a device is
// silent, while the machine is off.
INSTANTIATE_TEST_SUITE_P(Scan, RestartAt, testing::Values(1, 3, 89, 123, 150, 243, 490, 600, 2001));

TEST(Advance, IgnoresADoubledScanAndCountsIt) {
  StepRun run{7};
  const std::vector<Scan> scans = run.scans(3 * hour);
  Outcome plain;
  play(run.model(), scans, plain);
  Outcome doubled;
  for (const Scan& scan : scans) {
    play(run.model(), {scan}, doubled);
    MachineStep again = advance(run.model(), std::move(doubled.state), scan);
    EXPECT_EQ(again.fate, ScanFate::doubled);
    EXPECT_THAT(again.alarms, IsEmpty());
    EXPECT_THAT(again.windows, IsEmpty());
    doubled.state = std::move(again.next);
  }
  EXPECT_EQ(count_of(doubled.state, ScanFate::doubled), scans.size());
  doubled.state.scans = plain.state.scans;
  test::expect_same(plain, doubled);
}

TEST(Advance, IgnoresAScanThatGoesBackAndCountsIt) {
  StepRun run{7};
  const std::vector<Scan> scans = run.scans(hour);
  Outcome plain;
  play(run.model(), scans, plain);
  Outcome shuffled;
  for (std::size_t i = 0; i < scans.size(); ++i) {
    play(run.model(), {scans[i]}, shuffled);
    if (i % 7 == 6) {
      MachineStep old = advance(run.model(), std::move(shuffled.state), scans[i - 5]);
      EXPECT_EQ(old.fate, ScanFate::going_back);
      shuffled.state = std::move(old.next);
    }
  }
  EXPECT_EQ(count_of(shuffled.state, ScanFate::going_back), scans.size() / 7);
  shuffled.state.scans = plain.state.scans;
  test::expect_same(plain, shuffled);
}

TEST(Advance, RefusesAScanOfAnotherMachine) {
  StepRun run{1};
  Scan scan = run.scans(1).front();
  scan.readings.pop_back();
  const MachineStep step = advance(run.model(), {}, scan);
  EXPECT_EQ(step.fate, ScanFate::wrong_shape);
  EXPECT_EQ(step.assessment.values[Quantity::power].error().code, ReasonCode::not_read);
  EXPECT_EQ(count_of(step.next, ScanFate::wrong_shape), 1U);
}

TEST(Advance, ClosesAWindowEveryTenMinutesOfSteadyRunning) {
  StepRun run{1};
  run.calm = true;
  Outcome outcome;
  play(run.model(), run.scans(2 * hour), outcome);
  EXPECT_GE(outcome.windows.size(), 10U);
  EXPECT_TRUE(outcome.assessments.back().steady);
  ASSERT_TRUE(outcome.windows[0][Quantity::cop]);
  EXPECT_DOUBLE_EQ(outcome.windows[0][Quantity::cop]->mean_SI,
                   outcome.windows[0][Quantity::cold_heat]->mean_SI /
                       outcome.windows[0][Quantity::power]->mean_SI);
}

TEST(Advance, SaysThatItIsStillLearning) {
  StepRun run{1};
  run.calm = true;
  Outcome outcome;
  play(run.model(), run.scans(10), outcome);
  const auto& expected = outcome.assessments.back().values[Quantity::power_expected];
  ASSERT_FALSE(expected);
  EXPECT_EQ(expected.error().code, ReasonCode::no_baseline);
}

TEST(Advance, RaisesTheAlarmsOfItsRules) {
  StepRun run{1};
  run.calm = true;
  StepModel model = run.model();
  model.alarms.limits[0].limit_SI *= 0.9;
  Outcome outcome;
  play(model, run.scans(4), outcome);
  ASSERT_THAT(outcome.alarms, SizeIs(1));
  EXPECT_EQ(outcome.alarms[0].kind, AlarmKind::high_pressure);
}

TEST(Advance, SurvivesReadingsThatNobodyExpects) {
  StepRun run{9};
  std::vector<Scan> scans = run.scans(3 * hour);
  std::mt19937_64 random{9};
  const std::vector<double> odd{0.0,
                                -1.0,
                                1e300,
                                -1e300,
                                std::numeric_limits<double>::denorm_min(),
                                std::numeric_limits<double>::quiet_NaN(),
                                std::numeric_limits<double>::infinity()};
  for (Scan& scan : scans) {
    for (Reading& reading : scan.readings) {
      if (random() % 10 == 0) {
        reading.value_SI = odd[random() % odd.size()];
        reading.quality = static_cast<Quality>(random() % static_cast<int>(Quality::count));
      }
    }
  }
  Outcome outcome;
  play(run.model(), scans, outcome);
  EXPECT_EQ(outcome.assessments.size(), scans.size());
  EXPECT_TRUE(load(run.model(), save(outcome.state)));
}

TEST(Advance, TakesScansAgainAfterTheClockWasSetBack) {
  StepRun run{1};
  run.calm = true;
  const std::vector<Scan> scans = run.scans(2 * hour);
  Outcome outcome;
  play(run.model(), scans, outcome);
  const std::size_t closed = outcome.windows.size();
  outcome.state = clock_set_back(std::move(outcome.state), scans.front().time);
  play(run.model(), scans, outcome);
  EXPECT_EQ(count_of(outcome.state, ScanFate::taken), 2 * scans.size());
  EXPECT_EQ(outcome.windows.size(), 2 * closed);
}

TEST(Advance, KeepsWhatItLearnedWhenAPointIsAdded) {
  StepRun run{1};
  run.calm = true;
  Outcome outcome;
  play(run.model(), run.scans(5 * hour), outcome);
  StepModel larger = run.model();
  ModelPoint added;
  added.id = "new";
  added.role = Role::ambient_temperature;
  larger.machine.points.insert(larger.machine.points.begin(), added);
  larger.alarms.device_of_point.insert(larger.alarms.device_of_point.begin(), "panel");
  const auto before = outcome.state.steady.signals;
  const MachineState state = fitted(larger, outcome.state);
  ASSERT_THAT(state.steady.signals, SizeIs(before.size() + 1));
  EXPECT_GT(before.back().windows, 0U);
  EXPECT_EQ(state.steady.signals.back().windows, before.back().windows);
  EXPECT_EQ(state.steady.signals.front().windows, 0U);
}

TEST(StepModel, GivesHealthTheMachineAndThePriceOfAJoule) {
  MachineModel machine;
  machine.id = "chiller-1";
  AlarmRules rules;
  rules.tariff.price_per_kWh = 0.36;
  rules.tariff.currency = "GBP";
  const StepModel model = step_model(machine, rules);
  EXPECT_EQ(model.health.machine.id, "chiller-1");
  EXPECT_DOUBLE_EQ(*model.health.tariff.price_per_J, 1e-7);
  EXPECT_EQ(model.health.tariff.currency, "GBP");
}

}  // namespace
}  // namespace lostwork
