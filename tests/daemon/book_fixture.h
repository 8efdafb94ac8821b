// An alarm book of one machine, which a test scans and acknowledges.
#pragma once

#include "daemon/alarm_book.h"

#include <algorithm>
#include <chrono>
#include <map>
#include <optional>
#include <string>
#include <utility>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {

using Bad = std::map<std::string, Quality>;  // by point

inline SafetyLimit limit_of(SafetyKind kind, double limit_SI) {
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

}  // namespace lostwork
