#include "tests/daemon/book_fixture.h"

#include <chrono>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::seconds;
using testing::AllOf;
using testing::HasSubstr;
using testing::IsEmpty;
using testing::SizeIs;

using LossAlarms = Book;

TEST_F(LossAlarms, ADetectorIsLostAfterTwoPolls) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  scan();
  EXPECT_THAT(scan({
                  {"gas", Quality::timeout}
  }),
              IsEmpty());
  const auto events = scan({
      {"gas", Quality::timeout}
  });
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].alarm, "chiller-1.detector-lost.gas");
  EXPECT_EQ(events[0].priority, AlarmPriority::danger);
  EXPECT_THAT(events[0].text, AllOf(HasSubstr("Detector gas not seen"), HasSubstr("no value")));
}

TEST_F(LossAlarms, ADetectorWhoseValueIsOldIsLost) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  scan();
  age = seconds{30};
  EXPECT_THAT(scans(2), SizeIs(1));
}

TEST_F(LossAlarms, ALostDetectorIsNeverHiddenBehindItsDevice) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  scans(5);
  scans(10, {
                {"gas", Quality::timeout},
                { "o2", Quality::timeout}
  });
  EXPECT_EQ(state("chiller-1.detector-lost.gas"), AlarmState::active_unacknowledged);
  EXPECT_EQ(state("chiller-1.device-lost.room"), AlarmState::active_unacknowledged);
}

TEST_F(LossAlarms, APointIsLostAfterThreePolls) {
  scan();
  EXPECT_THAT(scans(2,
                    {
                        {"t_in", Quality::sentinel}
  }),
              IsEmpty());
  const auto events = scan({
      {"t_in", Quality::sentinel}
  });
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].alarm, "chiller-1.point-lost.t_in");
  EXPECT_THAT(events[0].text, HasSubstr("the device reports that it has no value"));
}

TEST_F(LossAlarms, APointIsLostAfterAMinuteOfSlowPolls) {
  model.scan_period = seconds{30};
  scan();
  EXPECT_THAT(scan({
                  {"t_in", Quality::timeout}
  }),
              IsEmpty());
  EXPECT_THAT(scan({
                  {"t_in", Quality::timeout}
  }),
              SizeIs(1));
}

TEST_F(LossAlarms, AStuckOrSuspectPointIsNotLost) {
  EXPECT_THAT(scans(20,
                    {
                        { "t_in",   Quality::stuck},
                        {"p_low", Quality::suspect}
  }),
              IsEmpty());
}

TEST_F(LossAlarms, ALostDeviceStandsForItsPoints) {
  scan();
  const auto events = scans(
      10, {
              {"p_high", Quality::timeout},
              { "p_low",   Quality::stale},
              {  "t_in", Quality::timeout}
  });
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].alarm, "chiller-1.device-lost.panel");
  EXPECT_THAT(events[0].text, HasSubstr("With it 3 points are lost"));
  EXPECT_EQ(events[0].evidence[0], (Figure{.name = "points", .value = 3.0}));
}

TEST_F(LossAlarms, APointThatStaysAwayWhenItsDeviceIsBackIsLostItself) {
  scan();
  scans(10,
        {
            {"p_high", Quality::timeout},
            { "p_low", Quality::timeout},
            {  "t_in", Quality::timeout}
  });
  scans(2, {
               {"t_in", Quality::timeout}
  });
  EXPECT_EQ(state("chiller-1.point-lost.t_in"), AlarmState::active_unacknowledged);
}

TEST_F(LossAlarms, SaysWhichRuleALostPointBlinds) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  scan();
  const auto events = scans(3, {
                                   {"p_high", Quality::timeout}
  });
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].priority, AlarmPriority::protect);
  EXPECT_THAT(events[0].text, HasSubstr("cannot see"));
}

}  // namespace
}  // namespace lostwork
