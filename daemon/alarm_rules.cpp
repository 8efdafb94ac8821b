#include "daemon/alarm_rules.h"

#include "daemon/alarm_text.h"
#include "daemon/alarm_watch.h"

#include <algorithm>
#include <string_view>

namespace lostwork {
namespace {

const SafetyLimit* limit_of(const AlarmRules& rules, SafetyKind kind) {
  const auto found = std::find_if(rules.limits.begin(), rules.limits.end(),
                                  [kind](const SafetyLimit& limit) { return limit.kind == kind; });
  return found == rules.limits.end() ? nullptr : &*found;
}

bool has_point(const MachineModel& model, Role role) {
  return std::any_of(model.points.begin(), model.points.end(),
                     [role](const ModelPoint& point) { return point.role == role; });
}

std::string sentence(const SafetyRule& rule, std::string_view what) {
  std::string out;
  if (!rule.configured) {
    return out.append("Not configured: nothing watches ")
        .append(what)
        .append(" here. It needs a set point from the machine's documents, with the local code.");
  }
  if (!rule.has_point) {
    return "Configured, but the machine has no point that shows it.";
  }
  return out.append("Watches ")
      .append(what)
      .append(". Information only: the machine's safety devices remain the protection.");
}

SafetyRule rule_of(const MachineModel& model, const AlarmRules& rules, SafetyKind kind) {
  SafetyRule rule;
  rule.kind = kind_of(kind);
  rule.has_point = has_point(model, role_of(kind));
  if (const SafetyLimit* limit = limit_of(rules, kind)) {
    rule.configured = true;
    rule.setting = setting_text(kind, limit->limit_SI);
    if (!limit->entered.empty()) {
      rule.setting += ", entered as " + limit->entered;
    }
    rule.document = limit->document;
    rule.jurisdiction = limit->jurisdiction;
  }
  rule.text = sentence(rule, watched(kind));
  return rule;
}

SafetyRule lost_rule(const MachineModel& model, const AlarmRules& rules) {
  SafetyRule rule;
  rule.kind = AlarmKind::detector_lost;
  for (const SafetyKind kind : {SafetyKind::oxygen, SafetyKind::refrigerant_detector}) {
    rule.has_point = rule.has_point || has_point(model, role_of(kind));
    if (const SafetyLimit* limit = limit_of(rules, kind)) {
      rule.configured = true;
      rule.setting = "2 scans";
      rule.document = "this program: a detector that is entered has to be seen";
      rule.jurisdiction = limit->jurisdiction;
    }
  }
  rule.text = sentence(rule, "whether the detectors are seen");
  return rule;
}

}  // namespace

std::vector<SafetyRule> safety_rules(const MachineModel& model, const AlarmRules& rules) {
  std::vector<SafetyRule> out;
  for (std::size_t i = 0; i < static_cast<std::size_t>(SafetyKind::count); ++i) {
    out.push_back(rule_of(model, rules, static_cast<SafetyKind>(i)));
  }
  out.push_back(lost_rule(model, rules));
  return out;
}

}  // namespace lostwork
