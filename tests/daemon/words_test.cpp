#include "daemon/words.h"

#include "tests/daemon/web/made_up_plant.h"

#include <chrono>
#include <functional>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::days;
using std::chrono::hours;
using std::chrono::minutes;
using std::chrono::seconds;

// Two hours east, so that a test that forgets the zone fails.
WallClock two_hours_east(Instant now) {
  return {.now = now, .offset = [](Instant /*time*/) { return hours{2}; }};
}

MachineView well_chiller() {
  MachineView machine = made_up_plant().machines.front();
  machine.findings.clear();
  return machine;
}

Finding finding_of(FindingKind kind, FindingState state) {
  Finding finding = made_up_plant().machines.front().findings.front();
  finding.kind = kind;
  finding.state = state;
  return finding;
}

AlarmView alarm_of(AlarmKind kind, AlarmState state) {
  AlarmView alarm = made_up_plant().alarms.front();
  alarm.alarm.kind = kind;
  alarm.alarm.state = state;
  return alarm;
}

struct Case {
  std::string name;
  std::function<void(MachineView&, std::vector<AlarmView>&)> change;
  Condition condition;
  std::string text;
};

void PrintTo(const Case& c, std::ostream* out) {
  *out << c.name;
}

class SentenceOfAMachine : public testing::TestWithParam<Case> {};

TEST_P(SentenceOfAMachine, SaysWhatHolds) {
  MachineView machine = well_chiller();
  std::vector<AlarmView> alarms;
  GetParam().change(machine, alarms);
  const Sentence said = sentence(machine, alarms, two_hours_east(made_up_noon()));
  EXPECT_EQ(said.text, GetParam().text);
  EXPECT_EQ(name(said.condition), name(GetParam().condition));
}

std::vector<Case> cases() {  // NOLINT(readability-function-size): one table
  using M = MachineView;
  using A = std::vector<AlarmView>;
  return {
      {                     "Well",[](M&,                                                                            A&) {},Condition::well,                        "Chiller 1 is well"                                                                                                                                                           },
      {                      "Off", [](M& m,                                                A&) { m.latest.mode = Mode::off; },             Condition::off,                                                     "Chiller 1 is off"},
      {                "NeverRead", [](M& m,                                                      A&) { m.last_read.reset(); },        Condition::not_read,
       "Chiller 1 has not been read yet"                                                                                                                                                                                          },
      {        "NotReadSinceToday", [](M& m,                                A&) { m.last_read = made_up_noon() - minutes{3}; },
       Condition::not_read,                              "Chiller 1 has not been read since 13:57"                                                                                                                                },
      {   "NotReadSinceAnotherDay", [](M& m,                                   A&) { m.last_read = made_up_noon() - days{3}; },
       Condition::not_read,                    "Chiller 1 has not been read since 30 April, 14:00"                                                                                                                                },
      {      "StillWithinPatience", [](M& m,                               A&) { m.last_read = made_up_noon() - seconds{30}; },
       Condition::well,                                                    "Chiller 1 is well"                                                                                                                                    },
      {       "NotReadIsNeverWell",
       [](M& m,                                                                           A& a) {
                                                                           m.last_read = made_up_noon() - seconds{31};
                                                                           a = {alarm_of(AlarmKind::high_pressure, AlarmState::active_unacknowledged)};
                                                                           },        Condition::not_read,                              "Chiller 1 has not been read since 13:59"                                   },
      {                   "Danger",
       [](M& m,                                                                           A& a) {
                                                                           m.findings = {finding_of(FindingKind::efficiency_drift, FindingState::active)};
                                                                           a = {alarm_of(AlarmKind::high_pressure, AlarmState::active_acknowledged)};
                                                                           },          Condition::danger, "Chiller 1 needs attention at once: a safety-relevant alarm is active"                                   },
      {            "SensorSuspect",
       [](M& m,                                                                           A&) {
                                                                           Finding f = finding_of(FindingKind::sensor_suspect, FindingState::active);
                                                                           f.suspect_sensors = {Role::cold_out_temperature};
                                                                           m.findings = {f};
                                                                           },  Condition::sensor_suspect,
       "Chiller 1: the sensor 'cold water leaving' does not fit the others, since 18 April"                                                                                                                                       },
      {"SensorSuspectByItsOwnName",
       [](M& m,                                                                           A&) {
                                                                           Finding f = finding_of(FindingKind::sensor_suspect, FindingState::active);
                                                                           f.suspect_sensors = {Role::power};
                                                                           m.findings = {f};
                                                                           },  Condition::sensor_suspect,
       "Chiller 1: the sensor 'main meter' does not fit the others, since 18 April"                                                                                                                                               },
      {                "LawBroken",
       [](M& m, A&) { m.findings = {finding_of(FindingKind::law_broken, FindingState::active)}; },
       Condition::sensor_suspect,           "Chiller 1: its readings cannot all be true, since 18 April"                                                                                                                          },
      {             "SensorFailed", [](M& m,                   A&) { m.points.at(1).reading.quality = Quality::out_of_range; },
       Condition::sensor_failed,
       "Chiller 1: the sensor 'cold water leaving' gives no good reading"                                                                                                                                                         },
      {            "SensorsFailed",
       [](M& m,                                                                           A&) {
                                                                           m.points.at(0).reading.quality = Quality::timeout;
                                                                           m.points.at(1).reading.quality = Quality::timeout;
                                                                           },   Condition::sensor_failed,                       "Chiller 1: 2 of 5 sensors give no good reading"                                   },
      {                  "Drifted",
       [](M& m,                                                                           A&) {
                                                                           m.findings = {finding_of(FindingKind::efficiency_drift, FindingState::active)};
                                                                           },         Condition::drifted,
       "Chiller 1 needs 6 % more power than it should, since 18 April; the condenser loses most of "
       "it"                                                                                                                                                                                                                       },
      {  "DriftedInAnUnknownPlace",
       [](M& m,                                                                           A&) {
                                                                           m.findings = {finding_of(FindingKind::efficiency_drift, FindingState::active)};
                                                                           m.findings.front().component.reset();
                                                                           },         Condition::drifted,        "Chiller 1 needs 6 % more power than it should, since 18 April"                                   },
      {            "DriftedAndOff",
       [](M& m,                                                                           A&) {
                                                                           m.findings = {finding_of(FindingKind::efficiency_drift, FindingState::active)};
                                                                           m.findings.front().component = Component::expansion;
                                                                           m.latest.mode = Mode::off;
                                                                           },         Condition::drifted,
       "Chiller 1 needs 6 % more power than it should, since 18 April; the expansion valve loses "
       "most of it. It is off now"                                                                                                                                                                                                },
      {                "NeedsLess",
       [](M& m,                                                                           A&) {
                                                                           m.findings = {finding_of(FindingKind::efficiency_drift, FindingState::active)};
                                                                           m.findings.front().size.value = -0.041;
                                                                           },         Condition::drifted,       "Chiller 1 needs 4 % less power than it used to, since 18 April"                                   },
      {            "DriftLastYear",
       [](M& m,                                                                           A&) {
                                                                           m.findings = {finding_of(FindingKind::efficiency_drift, FindingState::active)};
                                                                           m.findings.front().component.reset();
                                                                           m.findings.front().onset.best = made_up_noon() - days{200};
                                                                           },         Condition::drifted, "Chiller 1 needs 6 % more power than it should, since 16 October 2023"                                   },
      {                  "Watched",
       [](M& m,                                                                           A&) {
                                                                           m.findings = {finding_of(FindingKind::efficiency_drift, FindingState::watch)};
                                                                           },         Condition::watched,             "Chiller 1 seems well; a possible change is being watched"                                   },
      {                 "OneAlarm",
       [](M&,      A& a) { a = {alarm_of(AlarmKind::drift, AlarmState::active_acknowledged)}; },
       Condition::alarm,                                        "Chiller 1 has an active alarm"                                                                                                                                   },
      {                "TwoAlarms",
       [](M&,                                                                           A& a) {
                                                                           a = {alarm_of(AlarmKind::drift, AlarmState::active_acknowledged),
                                                                           alarm_of(AlarmKind::point_lost, AlarmState::active_unacknowledged)};
                                                                           },           Condition::alarm,                                        "Chiller 1 has 2 active alarms"                                     },
      {        "AnAlarmThatIsOver",
       [](M&,  A& a) { a = {alarm_of(AlarmKind::drift, AlarmState::returned_unacknowledged)}; },
       Condition::well,                                                    "Chiller 1 is well"                                                                                                                                    },
      {     "AnotherMachinesAlarm",
       [](M&,                                                                           A& a) {
                                                                           a = {alarm_of(AlarmKind::drift, AlarmState::active_unacknowledged)};
                                                                           a.front().machine = "heat-pump-1";
                                                                           },            Condition::well,                                                    "Chiller 1 is well"                                     },
      {                 "Learning", [](M& m,              A&) { m.learning = {.learned = false, .text = "31 of 60 windows"}; },
       Condition::learning,
       "Chiller 1 runs; what is normal for it is still being learned (31 of 60 windows)"                                                                                                                                          },
      {           "LearningAndOff",
       [](M& m,                                                                           A&) {
                                                                           m.learning = {.learned = false, .text = {}};
                                                                           m.latest.mode = Mode::off;
                                                                           },        Condition::learning,       "Chiller 1 is off; what is normal for it is still being learned"                                   },
      {            "TooFewSensors",
       [](M& m,                                                                                   A&) {
         m.latest.level = Level::L0;
         m.latest.values[Quantity::second_law_efficiency] = Refusal{
             {                                                                                   .code = ReasonCode::no_sensor,                                                                           .blame = "cold.flow"}};
                                                                           }, Condition::too_few_sensors,
       "Chiller 1 has too few sensors to be judged: 'cold water flow' is missing"                                                                                                                                     },
      {              "ModeUnknown", [](M& m,                                            A&) { m.latest.mode = Mode::unknown; }, Condition::too_few_sensors,
       "Chiller 1: it cannot be told whether it runs"},
  };
}

INSTANTIATE_TEST_SUITE_P(Of, SentenceOfAMachine, testing::ValuesIn(cases()),
                         [](const auto& tested) { return tested.param.name; });

TEST(ConditionNames, AreAllThere) {
  for (std::size_t i = 0; i < static_cast<std::size_t>(Condition::count); ++i) {
    EXPECT_FALSE(name(static_cast<Condition>(i)).empty());
    EXPECT_FALSE(text(static_cast<Condition>(i)).empty());
  }
}

}  // namespace
}  // namespace lostwork
