// The rules that raise alarms for one machine, and how they may be asked about.
#pragma once

#include "config/safety_limit.h"
#include "config/tariff.h"
#include "daemon/alarm.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/reading.h"

#include <cstdint>
#include <string>
#include <vector>

namespace lostwork {

// How long a condition must hold, and by how much it must go back (share of the limit).
struct AlarmTiming {
  Span on_delay{0};
  Span off_delay{0};
  double dead_band = 0.0;
};

// Starting values of methods.md 7.2 (EEMUA 191 by memory); dead-bands there are of the span, here
// of the limit, for no span is known.
struct AlarmTimings {
  AlarmTiming pressure{.on_delay = Span{15000}, .off_delay = Span{15000}, .dead_band = 0.02};
  AlarmTiming temperature{.on_delay = Span{60000}, .off_delay = Span{60000}, .dead_band = 0.0};
  double temperature_dead_band_K = 0.5;
  AlarmTiming detector{.on_delay = Span{0}, .off_delay = Span{60000}, .dead_band = 0.02};
  Span lost_after{60000};  // or three missed polls, whichever is first; two at least
  std::uint32_t lost_polls = 3;
  std::uint32_t detector_lost_polls = 2;
  Span lost_off_delay{60000};
};

struct AlarmRules {
  std::vector<SafetyLimit> limits;  // of this machine; at most one of each kind
  // One a point of the model: the id of the device that it is read from; empty for a constant and
  // for a column of a file. May be empty altogether.
  std::vector<std::string> device_of_point;
  Tariff tariff;
  AlarmTimings timings;
};

// Every safety-relevant rule, configured or not.
struct SafetyRule {
  AlarmKind kind{};
  bool configured = false;
  bool has_point = false;    // the machine has the point that the rule needs
  std::string setting;       // "18.00 bar (absolute)"; empty where not configured
  std::string document;      // where the owner took it from
  std::string jurisdiction;  // the local code that it defers to
  std::string text;          // one sentence: what it watches, or that it is not configured
};
[[nodiscard]] std::vector<SafetyRule> safety_rules(const MachineModel& model,
                                                   const AlarmRules& rules);

}  // namespace lostwork
