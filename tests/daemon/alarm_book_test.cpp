#include "daemon/alarm_book.h"

#include <algorithm>
#include <map>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::seconds;
using testing::AllOf;
using testing::HasSubstr;
using testing::IsEmpty;
using testing::SizeIs;

using Bad = std::map<std::string, Quality>;

SafetyLimit limit_of(SafetyKind kind, double limit_SI) {
  return {.kind = kind,
          .machine = "chiller-1",
          .limit_SI = limit_SI,
          .entered = {},
          .document = "manual",
          .jurisdiction = "EN 378",
          .entered_by = {}};
}

// One machine whose points hang on two devices; each scan is 10 s after the last.
class Book : public testing::Test {
 protected:
  Book() {
    model.id = "chiller-1";
    model.name = "Chiller 1";
    add("p_high", Role::discharge_pressure, "panel");
    add("p_low", Role::suction_pressure, "panel");
    add("t_in", Role::cold_in_temperature, "panel");
    add("gas", Role::leak_concentration, "room");
    add("o2", Role::oxygen, "room");
    values = {12e5, 3.5e5, 285.0, 0.0, 0.209};
  }
  void add(std::string id, Role role, std::string device) {
    ModelPoint point;
    point.id = std::move(id);
    point.role = role;
    model.points.push_back(std::move(point));
    rules.device_of_point.push_back(std::move(device));
  }

  std::vector<AlarmEvent> scan(const Bad& bad = {}, const std::vector<Finding>& findings = {}) {
    now += model.scan_period;
    Scan scan{.time = now, .readings = {}};
    for (std::size_t i = 0; i < values.size(); ++i) {
      const auto found = bad.find(model.points[i].id);
      scan.readings.push_back({.value_SI = values[i],
                               .u_SI = 0.01 * values[i],
                               .quality = found == bad.end() ? Quality::good : found->second,
                               .time = now - age});
    }
    Assessment assessment;
    assessment.time = now;
    assessment.mode = mode;
    if (evaporating_K) {
      assessment.values[Quantity::evaporating] = Measured{*evaporating_K, 0.2};
    }
    AlarmUpdate update = after_scan(model, rules, std::move(book),
                                    {.scan = scan, .assessment = assessment, .findings = findings});
    book = std::move(update.next);
    all.insert(all.end(), update.events.begin(), update.events.end());
    return update.events;
  }
  std::vector<AlarmEvent> scans(int n, const Bad& bad = {}) {
    std::vector<AlarmEvent> out;
    for (int i = 0; i < n; ++i) {
      const auto events = scan(bad);
      out.insert(out.end(), events.begin(), events.end());
    }
    return out;
  }
  [[nodiscard]] AlarmState state(const std::string& id) const {
    const auto found = std::find_if(book.slots.begin(), book.slots.end(),
                                    [&id](const AlarmSlot& slot) { return slot.alarm.id == id; });
    return found == book.slots.end() ? AlarmState::normal : found->alarm.state;
  }
  ActionResult press(const std::string& id, const std::string& user = "ann") {
    ActionUpdate update = acknowledge(
        std::move(book),
        {.machine = model.id, .alarm = id, .user = user, .comment = "seen", .time = now});
    book = std::move(update.next);
    all.insert(all.end(), update.events.begin(), update.events.end());
    return update.result;
  }

  MachineModel model;
  AlarmRules rules;
  AlarmBook book;
  std::vector<double> values;
  std::optional<double> evaporating_K = 278.0;
  Mode mode = Mode::running;
  Span age{0};
  Instant now{std::chrono::hours{24 * 20000}};
  std::vector<AlarmEvent> all;
};

TEST_F(Book, IsSilentWhileAllIsWell) {
  EXPECT_THAT(scans(100), IsEmpty());
  EXPECT_THAT(current_alarms(book), IsEmpty());
}

// Whatever the plant reads: without a set point of the owner nothing safety-relevant is said.
TEST_F(Book, NeverRaisesASafetyRuleThatIsNotConfigured) {
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

TEST_F(Book, SpeaksAtNineTenthsOfTheCutOutAfterFifteenSeconds) {
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

TEST_F(Book, CarriesTheFiguresBehindATransition) {
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

TEST_F(Book, AShortExcursionIsNoAlarm) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  for (int i = 0; i < 20; ++i) {
    values[0] = i % 3 == 0 ? 17e5 : 12e5;
    EXPECT_THAT(scan(), IsEmpty());
  }
}

TEST_F(Book, StaysActiveWithinTheDeadBand) {
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

TEST_F(Book, NoiseAboutTheLimitGivesOneAlarmOnly) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  for (int i = 0; i < 500; ++i) {
    values[0] = i % 7 < 3 ? 16.1e5 : 16.3e5;
    scan();
  }
  EXPECT_THAT(all, SizeIs(1));
}

TEST_F(Book, AReadingThatIsNotGoodClearsNothing) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  values[0] = 17e5;
  scans(3);
  scans(30, {
                {"p_high", Quality::timeout}
  });
  EXPECT_EQ(state("chiller-1.high-pressure"), AlarmState::active_unacknowledged);
}

TEST_F(Book, WatchesThePressureOfAMachineThatStandsToo) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  mode = Mode::off;
  values[0] = 17e5;
  EXPECT_THAT(scans(3), SizeIs(1));
}

TEST_F(Book, SaysPossibleFreezingAfterAMinute) {
  rules.limits = {limit_of(SafetyKind::freezing, 274.15)};
  evaporating_K = 273.0;
  EXPECT_THAT(scans(6), IsEmpty());
  const auto events = scan();
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_THAT(events[0].text, HasSubstr("Possible freezing of the evaporator"));
}

TEST_F(Book, DoesNotWatchFreezingOfAMachineThatIsOff) {
  rules.limits = {limit_of(SafetyKind::freezing, 274.15)};
  evaporating_K = 260.0;
  mode = Mode::off;
  EXPECT_THAT(scans(100), IsEmpty());
}

TEST_F(Book, HoldsOffFreezingInAStart) {
  rules.limits = {limit_of(SafetyKind::freezing, 274.15)};
  evaporating_K = 260.0;
  mode = Mode::starting;
  EXPECT_THAT(scans(18), IsEmpty());
  mode = Mode::running;
  EXPECT_THAT(scans(7), SizeIs(1));
}

TEST_F(Book, ADetectorSpeaksAtOnceAndIsDanger) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  values[3] = 500e-6;
  const auto events = scan();
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].kind, AlarmKind::refrigerant_detector);
  EXPECT_EQ(events[0].priority, AlarmPriority::danger);
}

TEST_F(Book, OxygenSpeaksBelowItsLimit) {
  rules.limits = {limit_of(SafetyKind::oxygen, 0.195)};
  EXPECT_THAT(scans(10), IsEmpty());
  values[4] = 0.194;
  EXPECT_THAT(scan(), SizeIs(1));
}

TEST_F(Book, ADetectorIsLostAfterTwoPolls) {
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

TEST_F(Book, ADetectorWhoseValueIsOldIsLost) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  scan();
  age = seconds{30};
  EXPECT_THAT(scans(2), SizeIs(1));
}

TEST_F(Book, ALostDetectorIsNeverHiddenBehindItsDevice) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  scans(5);
  scans(10, {
                {"gas", Quality::timeout},
                { "o2", Quality::timeout}
  });
  EXPECT_EQ(state("chiller-1.detector-lost.gas"), AlarmState::active_unacknowledged);
  EXPECT_EQ(state("chiller-1.device-lost.room"), AlarmState::active_unacknowledged);
}

TEST_F(Book, APointIsLostAfterThreePolls) {
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

TEST_F(Book, APointIsLostAfterAMinuteOfSlowPolls) {
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

TEST_F(Book, AStuckOrSuspectPointIsNotLost) {
  EXPECT_THAT(scans(20,
                    {
                        { "t_in",   Quality::stuck},
                        {"p_low", Quality::suspect}
  }),
              IsEmpty());
}

TEST_F(Book, ALostDeviceStandsForItsPoints) {
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

TEST_F(Book, APointThatStaysAwayWhenItsDeviceIsBackIsLostItself) {
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

TEST_F(Book, SaysWhichRuleALostPointBlinds) {
  rules.limits = {limit_of(SafetyKind::high_pressure, 18e5)};
  scan();
  const auto events = scans(3, {
                                   {"p_high", Quality::timeout}
  });
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].priority, AlarmPriority::protect);
  EXPECT_THAT(events[0].text, HasSubstr("cannot see"));
}

TEST_F(Book, GoesThroughAllStates) {
  const std::string id = "chiller-1.point-lost.t_in";
  const Bad bad{
      {"t_in", Quality::timeout}
  };
  scans(3, bad);
  EXPECT_EQ(press(id), ActionResult::done);
  EXPECT_EQ(state(id), AlarmState::active_acknowledged);
  scans(7);
  EXPECT_EQ(state(id), AlarmState::normal);
  scans(3, bad);
  scans(7);
  EXPECT_EQ(state(id), AlarmState::returned_unacknowledged);
  scans(3, bad);
  EXPECT_EQ(state(id), AlarmState::active_unacknowledged);
  scans(7);
  EXPECT_EQ(press(id), ActionResult::done);
  EXPECT_EQ(state(id), AlarmState::normal);
  EXPECT_THAT(all, SizeIs(8));
  for (std::size_t i = 1; i < all.size(); ++i) {
    EXPECT_EQ(all[i].from, all[i - 1].to);
  }
}

TEST_F(Book, KeepsWhoSawAnAlarmAndTheComment) {
  const std::string id = "chiller-1.point-lost.t_in";
  scans(3, {
               {"t_in", Quality::timeout}
  });
  const ActionUpdate update = acknowledge(std::move(book), {.machine = "chiller-1",
                                                            .alarm = id,
                                                            .user = "Ann",
                                                            .comment = "sensor ordered",
                                                            .time = Instant{}});
  ASSERT_EQ(update.result, ActionResult::done);
  const std::vector<Alarm> shown = current_alarms(update.next);
  ASSERT_THAT(shown, SizeIs(1));
  ASSERT_TRUE(shown[0].acknowledged);
  EXPECT_EQ(shown[0].acknowledged->user, "Ann");
  EXPECT_EQ(shown[0].acknowledged->comment, "sensor ordered");
}

TEST_F(Book, MarksAnAlarmThatComesAndGoes) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  rules.timings.detector.off_delay = Span{0};
  for (int i = 0; i < 3; ++i) {
    values[3] = 600e-6;
    scan();
    values[3] = 0.0;
    scan();
  }
  ASSERT_THAT(current_alarms(book), SizeIs(1));
  EXPECT_TRUE(current_alarms(book)[0].chattering);
  EXPECT_THAT(current_alarms(book)[0].text, HasSubstr("three times within a minute"));
}

TEST_F(Book, RefusesAnAcknowledgementWithASentence) {
  EXPECT_EQ(press("chiller-1.nothing"), ActionResult::no_such_alarm);
  scans(3, {
               {"t_in", Quality::timeout}
  });
  EXPECT_EQ(press("chiller-1.point-lost.t_in", ""), ActionResult::no_user);
  EXPECT_EQ(press("chiller-1.point-lost.t_in"), ActionResult::done);
  EXPECT_EQ(press("chiller-1.point-lost.t_in"), ActionResult::already);
  EXPECT_THAT(text(ActionResult::no_such_alarm), HasSubstr("no such alarm"));
}

TEST_F(Book, JournalsWhoAcknowledgedAndWhatTheySaid) {
  scans(3, {
               {"t_in", Quality::timeout}
  });
  press("chiller-1.point-lost.t_in");
  EXPECT_EQ(all.back().user, "ann");
  EXPECT_EQ(all.back().comment, "seen");
  EXPECT_EQ(all.back().time, now);
}

TEST_F(Book, ACommentChangesNoState) {
  scans(3, {
               {"t_in", Quality::timeout}
  });
  const ActionUpdate update = comment(book, {.machine = model.id,
                                             .alarm = "chiller-1.point-lost.t_in",
                                             .user = "ann",
                                             .comment = "cable is being replaced",
                                             .time = now});
  ASSERT_THAT(update.events, SizeIs(1));
  EXPECT_EQ(update.events[0].from, update.events[0].to);
  EXPECT_EQ(update.result, ActionResult::done);
}

Finding drift(const std::string& id, FindingState state) {
  Finding f;
  f.id = id;
  f.machine = "chiller-1";
  f.kind = FindingKind::efficiency_drift;
  f.state = state;
  f.size = {.value = 0.06, .u = 0.01};
  return f;
}

TEST_F(Book, AWatchIsNotAnnounced) {
  EXPECT_THAT(scan({}, {drift("chiller-1.d.1", FindingState::watch)}), IsEmpty());
}

TEST_F(Book, AConfirmedDriftIsAnAlarmOfItsOwn) {
  const auto events = scan({}, {drift("chiller-1.d.1", FindingState::active)});
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].kind, AlarmKind::drift);
  EXPECT_EQ(events[0].alarm, "chiller-1.d.1");
  EXPECT_THAT(events[0].text, HasSubstr("Chiller 1 needs 6.0 %"));
}

TEST_F(Book, ADriftThatGrowsKeepsItsAlarmAndRenewsItsText) {
  scan({}, {drift("chiller-1.d.1", FindingState::active)});
  Finding grown = drift("chiller-1.d.1", FindingState::active);
  grown.size.value = 0.08;
  EXPECT_THAT(scan({}, {grown}), IsEmpty());
  ASSERT_THAT(current_alarms(book), SizeIs(1));
  EXPECT_THAT(current_alarms(book)[0].text, HasSubstr("needs 8.0 %"));
}

TEST_F(Book, ADriftThatIsOverIsForgottenOnceItWasSeen) {
  scan({}, {drift("chiller-1.d.1", FindingState::active)});
  scan({}, {drift("chiller-1.d.1", FindingState::over)});
  EXPECT_EQ(state("chiller-1.d.1"), AlarmState::returned_unacknowledged);
  press("chiller-1.d.1");
  scan();
  EXPECT_THAT(current_alarms(book), IsEmpty());
}

TEST_F(Book, PutsDangerFirst) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  values[3] = 600e-6;
  scan();
  scans(3, {
               {"t_in", Quality::timeout}
  });
  ASSERT_THAT(current_alarms(book), SizeIs(2));
  EXPECT_EQ(current_alarms(book)[0].priority, AlarmPriority::danger);
}

TEST_F(Book, AnAlarmWhoseRuleIsGoneReturns) {
  rules.limits = {limit_of(SafetyKind::refrigerant_detector, 500e-6)};
  values[3] = 600e-6;
  scan();
  rules.limits.clear();
  book = fitted(model, rules, std::move(book));
  const auto events = scan();
  ASSERT_THAT(events, SizeIs(1));
  EXPECT_EQ(events[0].to, AlarmState::returned_unacknowledged);
  EXPECT_THAT(events[0].text, HasSubstr("rule is gone"));
}

TEST_F(Book, KeepsItsAlarmsThroughANewPlantFile) {
  scans(3, {
               {"t_in", Quality::timeout}
  });
  rules.limits = {limit_of(SafetyKind::oxygen, 0.195)};
  book = fitted(model, rules, std::move(book));
  EXPECT_EQ(state("chiller-1.point-lost.t_in"), AlarmState::active_unacknowledged);
}

}  // namespace
}  // namespace lostwork
