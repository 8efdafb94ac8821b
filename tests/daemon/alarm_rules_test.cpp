#include "daemon/alarm_rules.h"

#include <algorithm>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::HasSubstr;
using testing::IsEmpty;

MachineModel machine() {
  MachineModel model;
  model.id = "chiller-1";
  for (const Role role : {Role::discharge_pressure, Role::leak_concentration}) {
    model.points.emplace_back().role = role;
  }
  return model;
}

SafetyRule rule(const std::vector<SafetyRule>& rules, AlarmKind kind) {
  const auto found = std::find_if(rules.begin(), rules.end(),
                                  [kind](const SafetyRule& r) { return r.kind == kind; });
  return found == rules.end() ? SafetyRule{} : *found;
}

TEST(SafetyRules, ListsEveryRuleAsNotConfiguredBeforeAnythingIsEntered) {
  const auto rules = safety_rules(machine(), {});
  EXPECT_EQ(rules.size(), 5U);
  for (const SafetyRule& r : rules) {
    EXPECT_FALSE(r.configured);
    EXPECT_THAT(r.text, HasSubstr("Not configured"));
    EXPECT_THAT(r.setting, IsEmpty());
  }
}

TEST(SafetyRules, ShowsTheSetPointWithItsDocumentAndCode) {
  AlarmRules entered;
  entered.limits = {
      {.kind = SafetyKind::high_pressure,
       .machine = "chiller-1",
       .limit_SI = 18e5,
       .entered = "17 bar_gauge",
       .document = "name plate",
       .jurisdiction = "EN 378",
       .entered_by = {}}
  };
  const auto r = rule(safety_rules(machine(), entered), AlarmKind::high_pressure);
  EXPECT_TRUE(r.configured);
  EXPECT_TRUE(r.has_point);
  EXPECT_EQ(r.setting, "18.00 bar (absolute), entered as 17 bar_gauge");
  EXPECT_EQ(r.document, "name plate");
  EXPECT_EQ(r.jurisdiction, "EN 378");
  EXPECT_THAT(r.text, HasSubstr("safety devices remain the protection"));
}

TEST(SafetyRules, SaysThatTheMachineHasNoSensorForARule) {
  AlarmRules entered;
  entered.limits = {
      {.kind = SafetyKind::oxygen,
       .machine = "chiller-1",
       .limit_SI = 0.195,
       .entered = {},
       .document = "room's data sheet",
       .jurisdiction = "local code",
       .entered_by = {}}
  };
  const auto r = rule(safety_rules(machine(), entered), AlarmKind::oxygen);
  EXPECT_TRUE(r.configured);
  EXPECT_FALSE(r.has_point);
  EXPECT_THAT(r.text, HasSubstr("no point"));
}

TEST(SafetyRules, WatchesForLostDetectorsOnceADetectorHasASetPoint) {
  AlarmRules entered;
  entered.limits = {
      {.kind = SafetyKind::refrigerant_detector,
       .machine = "chiller-1",
       .limit_SI = 500e-6,
       .entered = {},
       .document = "detector's manual",
       .jurisdiction = "local code",
       .entered_by = {}}
  };
  EXPECT_TRUE(rule(safety_rules(machine(), entered), AlarmKind::detector_lost).configured);
}

}  // namespace
}  // namespace lostwork
