// What is said of an alarm when it comes or goes: the sentences and the figures behind them.
//
// Pure.
#pragma once

#include "daemon/alarm_book.h"
#include "daemon/alarm_rules.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/measured.h"
#include "thermo/reading.h"

#include <optional>
#include <string>
#include <vector>

namespace lostwork {

struct AlarmScene {
  const MachineModel& model;
  const AlarmRules& rules;
  const AlarmBook& book;  // after the scan's readings were taken up
};

struct Description {
  std::string text;
  std::vector<Figure> evidence;
};

// For the rules of points, devices and set points; a finding describes itself. The slot has a
// subject. `value_SI`: what is compared with the limit, where it is read.
[[nodiscard]] Description describe(const AlarmScene& scene, const AlarmSlot& slot, bool occurs,
                                   const std::optional<Measured>& value_SI);

// Since when the condition holds, now that the alarm occurs.
[[nodiscard]] Instant begin_of(const AlarmScene& scene, const AlarmSlot& slot, Instant now);

}  // namespace lostwork
