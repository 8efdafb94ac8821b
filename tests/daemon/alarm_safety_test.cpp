#include "tests/daemon/book_fixture.h"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;
using testing::IsEmpty;
using testing::SizeIs;

using SafetyAlarms = Book;

// Whatever the plant reads: without a set point of the owner nothing safety-relevant is said.
TEST_F(SafetyAlarms, NeverRaisesASafetyRuleThatIsNotConfigured) {
  values = {60e5, 0.1e5, 285.0, 1.0, 0.0};
  evaporating_K = 230.0;
  scans(100);
  scans(100, {
                 {"gas", Quality::timeout},
                 { "o2", Quality::timeout}
  });
  for (const AlarmEvent& event : all) {
    EXPECT_FALSE(is_safety_relevant(event.kind)) << event.alarm;
  }
}

TEST_F(SafetyAlarms, SpeaksAtNineTenthsOfTheCutOutAfterFifteenSeconds) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  values[0] = 16.19e5;
  EXPECT_THAT(scans(10), IsEmpty());
  values[0] = 16.21e5;
  EXPECT_THAT(scans(2), IsEmpty());
  const auto events = scan();
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].kind, AlarmKind::high_pressure);
  EXPECT_EQ(events[0].from, AlarmState::normal);
  EXPECT_EQ(events[0].to, AlarmState::active_unacknowledged);
  EXPECT_EQ(events[0].machine, "chiller-1");
  EXPECT_EQ(events[0].priority, AlarmPriority::protect);
}

TEST_F(SafetyAlarms, CarriesTheFiguresBehindATransition) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  values[0] = 17e5;
  const auto events = scans(3);
  ASSERT_THAT(events, SizeIs(1));
  ASSERT_THAT(events[0].evidence, SizeIs(2));
  const Figure& figure = events[0].evidence[0];
  EXPECT_EQ(figure.name, "discharge_pressure_bar");
  EXPECT_DOUBLE_EQ(figure.value, 17.0);
  EXPECT_DOUBLE_EQ(*figure.u, 0.17);
  EXPECT_DOUBLE_EQ(*figure.limit, 18.0);
  EXPECT_EQ(figure.document, "manual");
}

TEST_F(SafetyAlarms, AShortExcursionIsNoAlarm) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  for (int i = 0; i < 20; ++i) {
    values[0] = i % 3 == 0 ? 17e5 : 12e5;
    EXPECT_THAT(scan(), IsEmpty());
  }
}

TEST_F(SafetyAlarms, StaysActiveWithinTheDeadBand) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  values[0] = 16.3e5;
  scans(3);
  values[0] = 15.9e5;  // 2 % of 16.2 bar is 0.32 bar: it ends at 15.88 bar
  EXPECT_THAT(scans(20), IsEmpty());
  values[0] = 15.8e5;
  const auto events = scans(3);
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].to, AlarmState::returned_unacknowledged);
}

TEST_F(SafetyAlarms, NoiseAboutTheLimitGivesOneAlarmOnly) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  for (int i = 0; i < 500; ++i) {
    values[0] = i % 7 < 3 ? 16.1e5 : 16.3e5;
    scan();
  }
  EXPECT_THAT(all, SizeIs(1));
}

TEST_F(SafetyAlarms, AReadingThatIsNotGoodClearsNothing) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  values[0] = 17e5;
  scans(3);
  scans(30, {
                {"p_high", Quality::timeout}
  });
  EXPECT_EQ(state("chiller-1.high-pressure"), AlarmState::active_unacknowledged);
}

TEST_F(SafetyAlarms, WatchesThePressureOfAMachineThatStandsToo) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  mode = Mode::off;
  values[0] = 17e5;
  EXPECT_THAT(scans(3), SizeIs(1));
}

TEST_F(SafetyAlarms, SaysPossibleFreezingAfterAMinute) {
  rules.limits = {limit_of(SafetyKind::freezing, 274.15)};
  evaporating_K = 273.0;
  EXPECT_THAT(scans(6), IsEmpty());
  const auto events = scan();
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_THAT(events[0].text, HasSubstr("Possible freezing of the evaporator"));
}

TEST_F(SafetyAlarms, DoesNotWatchFreezingOfAMachineThatIsOff) {
  rules.limits = {limit_of(SafetyKind::freezing, 274.15)};
  evaporating_K = 260.0;
  mode = Mode::off;
  EXPECT_THAT(scans(100), IsEmpty());
}

TEST_F(SafetyAlarms, HoldsOffFreezingInAStart) {
  rules.limits = {limit_of(SafetyKind::freezing, 274.15)};
  evaporating_K = 260.0;
  mode = Mode::starting;
  EXPECT_THAT(scans(18), IsEmpty());
  mode = Mode::running;
  EXPECT_THAT(scans(7), SizeIs(1));
}

TEST_F(SafetyAlarms, ADetectorSpeaksAtOnceAndIsDanger) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  values[3] = 500e-6;
  const auto events = scan();
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].kind, AlarmKind::refrigerant_detector);
  EXPECT_EQ(events[0].priority, AlarmPriority::danger);
}

TEST_F(SafetyAlarms, OxygenSpeaksBelowItsLimit) {
  rules.limits = {limit_of(SafetyKind::oxygen, 0.195)};
  EXPECT_THAT(scans(10), IsEmpty());
  values[4] = 0.194;
  EXPECT_THAT(scan(), SizeIs(1));
}

}  // namespace
}  // namespace lostwork
