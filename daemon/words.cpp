#include "daemon/words.h"

#include "daemon/figures.h"
#include "daemon/names.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <cstddef>

namespace lostwork {
namespace {

std::string quoted(const std::string& name) {
  return '\'' + name + '\'';
}

bool usable(const Reading& reading) {
  return reading.quality == Quality::good || reading.quality == Quality::substituted;
}

const Finding* confirmed(const MachineView& machine, FindingKind kind) {
  const auto found = std::find_if(
      machine.findings.begin(), machine.findings.end(),
      [kind](const Finding& f) { return f.kind == kind && f.state == FindingState::active; });
  return found == machine.findings.end() ? nullptr : &*found;
}

bool is_watched(const MachineView& machine) {
  return std::any_of(machine.findings.begin(), machine.findings.end(),
                     [](const Finding& f) { return f.state == FindingState::watch; });
}

std::string since_text(const Finding& finding, const WallClock& clock) {
  return ", since " + day_text(finding.onset.best, clock.now, clock.offset);
}

// Whole per cent: the interval stands with the finding, below the sentence.
std::string percent_text(double ratio) {
  const double percent = std::abs(ratio) * 100.0;
  return fixed(percent, percent < 1.0 ? 1 : 0) + " %";
}

std::string drift_text(const MachineView& machine, const Finding& drift, const WallClock& clock) {
  const bool less = drift.size.value < 0.0;
  std::string text = machine.name + " needs " + percent_text(drift.size.value) + ' ' +
                     (less ? "less power than it used to" : "more power than it should") +
                     since_text(drift, clock);
  if (!less && drift.component) {
    text += "; the " + std::string{lostwork::text(*drift.component)} + " loses most of it";
  }
  return machine.latest.mode == Mode::off ? text + ". It is off now" : text;
}

// The sensor's own name where the machine has the point.
std::string sensor_name(const MachineView& machine, Role role) {
  const auto point = std::find_if(machine.points.begin(), machine.points.end(),
                                  [role](const PointView& p) { return p.role == role; });
  return quoted(point == machine.points.end() ? text(role, machine) : text(*point, machine));
}

std::string suspect_text(const MachineView& machine, const Finding& finding,
                         const WallClock& clock) {
  if (finding.kind == FindingKind::law_broken || finding.suspect_sensors.empty()) {
    return machine.name + ": its readings cannot all be true" + since_text(finding, clock);
  }
  return machine.name + ": the sensor " + sensor_name(machine, finding.suspect_sensors.front()) +
         " does not fit the others" + since_text(finding, clock);
}

std::string failed_text(const MachineView& machine, std::size_t failed) {
  if (failed > 1) {
    return machine.name + ": " + std::to_string(failed) + " of " +
           std::to_string(machine.points.size()) + " sensors give no good reading";
  }
  const auto point = std::find_if(machine.points.begin(), machine.points.end(),
                                  [](const PointView& p) { return !usable(p.reading); });
  return machine.name + ": the sensor " + quoted(text(*point, machine)) + " gives no good reading";
}

struct ActiveAlarms {
  std::size_t all = 0;
  bool danger = false;
};

ActiveAlarms active_alarms(const MachineView& machine, std::span<const AlarmView> alarms) {
  ActiveAlarms found;
  for (const AlarmView& alarm : alarms) {
    if (alarm.machine == machine.id && is_active(alarm.alarm.state)) {
      ++found.all;
      found.danger = found.danger || is_safety_relevant(alarm.alarm.kind);
    }
  }
  return found;
}

std::string not_read_text(const MachineView& machine, const WallClock& clock) {
  return machine.last_read ? machine.name + " has not been read since " +
                                 time_text(*machine.last_read, clock.now, clock.offset)
                           : machine.name + " has not been read yet";
}

std::string too_few_text(const MachineView& machine) {
  std::string text = machine.name + " has too few sensors to be judged";
  const Result<Measured>& efficiency = machine.latest.values[Quantity::second_law_efficiency];
  if (!efficiency && efficiency.error().code == ReasonCode::no_sensor) {
    if (const auto role = role_named(efficiency.error().blame)) {
      text += ": " + quoted(lostwork::text(*role, machine)) + " is missing";
    }
  }
  return text;
}

std::string learning_text(const MachineView& machine) {
  std::string text = machine.name + (machine.latest.mode == Mode::off ? " is off" : " runs") +
                     "; what is normal for it is still being learned";
  return machine.learning.text.empty() ? text : text + " (" + machine.learning.text + ')';
}

// What is left when nothing is wrong.
Sentence quiet_sentence(const MachineView& machine) {
  if (machine.latest.level == Level::L0 && machine.latest.mode != Mode::off) {
    return {.condition = Condition::too_few_sensors, .text = too_few_text(machine)};
  }
  if (!machine.learning.learned) {
    return {.condition = Condition::learning, .text = learning_text(machine)};
  }
  if (is_watched(machine)) {
    return {.condition = Condition::watched,
            .text = machine.name + " seems well; a possible change is being watched"};
  }
  if (machine.latest.mode == Mode::off) {
    return {.condition = Condition::off, .text = machine.name + " is off"};
  }
  if (machine.latest.mode == Mode::unknown) {
    return {.condition = Condition::too_few_sensors,
            .text = machine.name + ": it cannot be told whether it runs"};
  }
  return {.condition = Condition::well, .text = machine.name + " is well"};
}

}  // namespace

std::string_view name(Condition condition) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(Condition::count)> names{
      "not_read",        "danger",   "sensor_suspect", "sensor_failed", "drifted", "alarm",
      "too_few_sensors", "learning", "watched",        "off",           "well"};
  return names.at(static_cast<std::size_t>(condition));
}

std::string_view text(Condition condition) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(Condition::count)> texts{
      "not read",   "look at once",    "sensor in doubt", "sensor fails",  "needs more power",
      "has alarms", "too few sensors", "still learning",  "being watched", "off",
      "well"};
  return texts.at(static_cast<std::size_t>(condition));
}

Span patience(const MachineView& machine) {
  return 3 * machine.scan_period;  // the rule by which a reading counts as stale
}

Sentence sentence(const MachineView& machine, std::span<const AlarmView> alarms,
                  const WallClock& clock) {
  if (!machine.last_read || clock.now - *machine.last_read > patience(machine)) {
    return {.condition = Condition::not_read, .text = not_read_text(machine, clock)};
  }
  const ActiveAlarms active = active_alarms(machine, alarms);
  if (active.danger) {
    return {.condition = Condition::danger,
            .text = machine.name + " needs attention at once: a safety-relevant alarm is active"};
  }
  for (const FindingKind kind : {FindingKind::sensor_suspect, FindingKind::law_broken}) {
    if (const Finding* finding = confirmed(machine, kind)) {
      return {.condition = Condition::sensor_suspect,
              .text = suspect_text(machine, *finding, clock)};
    }
  }
  const auto failed = static_cast<std::size_t>(
      std::count_if(machine.points.begin(), machine.points.end(),
                    [](const PointView& p) { return !usable(p.reading); }));
  if (failed > 0) {
    return {.condition = Condition::sensor_failed, .text = failed_text(machine, failed)};
  }
  if (const Finding* finding = confirmed(machine, FindingKind::efficiency_drift)) {
    return {.condition = Condition::drifted, .text = drift_text(machine, *finding, clock)};
  }
  if (active.all > 0) {
    return {.condition = Condition::alarm,
            .text = machine.name + (active.all == 1
                                        ? " has an active alarm"
                                        : " has " + std::to_string(active.all) + " active alarms")};
  }
  return quiet_sentence(machine);
}

}  // namespace lostwork
