#include "daemon/alarm_book.h"
#include "daemon/alarm_watch.h"

#include <algorithm>
#include <utility>

namespace lostwork {
namespace {

// What a point's loss does to the safety-relevant rules decides how soon it matters.
bool feeds_a_safety_rule(const AlarmRules& rules, Role role) {
  return std::any_of(rules.limits.begin(), rules.limits.end(),
                     [role](const SafetyLimit& limit) { return role_of(limit.kind) == role; });
}

AlarmPriority priority_of(SafetyKind kind) {
  return kind == SafetyKind::refrigerant_detector || kind == SafetyKind::oxygen
             ? AlarmPriority::danger
             : AlarmPriority::protect;
}

class Fitting {
 public:
  Fitting(const MachineModel& model, const AlarmRules& rules, AlarmBook book)
      : model_{model}, rules_{rules}, old_{std::move(book)} {}

  AlarmBook fitted() {
    find_devices();
    next_.watches.resize(model_.points.size());
    if (old_.watches.size() == model_.points.size()) {
      next_.watches = old_.watches;
    }
    add_devices();
    add_points();
    add_limits();
    keep_the_rest();
    return std::move(next_);
  }

 private:
  void find_devices() {
    next_.device_of_point.resize(model_.points.size());
    for (std::size_t i = 0; i < model_.points.size() && i < rules_.device_of_point.size(); ++i) {
      const std::string& device = rules_.device_of_point[i];
      if (device.empty()) {
        continue;
      }
      const auto found = std::find(next_.devices.begin(), next_.devices.end(), device);
      next_.device_of_point[i] = static_cast<std::uint32_t>(found - next_.devices.begin());
      if (found == next_.devices.end()) {
        next_.devices.push_back(device);
      }
    }
  }

  void add_devices() {
    for (std::size_t i = 0; i < next_.devices.size(); ++i) {
      bool urgent = false;
      for (std::size_t p = 0; p < model_.points.size(); ++p) {
        urgent = urgent || (next_.device_of_point[p] == i &&
                            feeds_a_safety_rule(rules_, model_.points[p].role));
      }
      add(AlarmKind::device_lost, urgent ? AlarmPriority::protect : AlarmPriority::cost, i,
          next_.devices[i]);
    }
  }

  void add_points() {
    for (std::size_t i = 0; i < model_.points.size(); ++i) {
      const ModelPoint& point = model_.points[i];
      if (detector_limit(rules_, point.role) != nullptr) {
        add(AlarmKind::detector_lost, AlarmPriority::danger, i, point.id);
      } else {
        add(AlarmKind::point_lost,
            feeds_a_safety_rule(rules_, point.role) ? AlarmPriority::protect
                                                    : AlarmPriority::diagnostic,
            i, point.id);
      }
    }
  }

  void add_limits() {
    for (std::size_t i = 0; i < rules_.limits.size(); ++i) {
      const SafetyKind kind = rules_.limits[i].kind;
      add(kind_of(kind), priority_of(kind), i, {});
    }
  }

  void add(AlarmKind kind, AlarmPriority priority, std::size_t subject, std::string_view of) {
    std::string id = model_.id;
    id.append(1, '.').append(name(kind));
    if (!of.empty()) {
      id.append(1, '.').append(of);
    }
    AlarmSlot slot;
    const auto found = std::find_if(old_.slots.begin(), old_.slots.end(),
                                    [&id](const AlarmSlot& old) { return old.alarm.id == id; });
    if (found != old_.slots.end()) {
      slot = std::move(*found);
      old_.slots.erase(found);
    }
    slot.alarm.id = std::move(id);
    slot.alarm.kind = kind;
    slot.alarm.priority = priority;
    slot.subject = static_cast<std::uint32_t>(subject);
    next_.slots.push_back(std::move(slot));
  }

  void keep_the_rest() {
    for (AlarmSlot& slot : old_.slots) {
      if (slot.alarm.state != AlarmState::normal) {
        slot.subject.reset();
        next_.slots.push_back(std::move(slot));
      }
    }
  }

  const MachineModel& model_;
  const AlarmRules& rules_;
  AlarmBook old_;
  AlarmBook next_;
};

}  // namespace

AlarmBook fitted(const MachineModel& model, const AlarmRules& rules, AlarmBook book) {
  return Fitting{model, rules, std::move(book)}.fitted();
}

}  // namespace lostwork
