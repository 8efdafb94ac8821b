// What the rules see in one scan.
//
// Pure.
#pragma once

#include "config/safety_limit.h"
#include "daemon/alarm_book.h"
#include "daemon/alarm_rules.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/measured.h"
#include "thermo/reading.h"

#include <cstddef>
#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

enum class Condition : std::uint8_t {
  no,
  yes,
  unknown  // cannot be told, or does not count now: an alarm stays as it is
};

struct Watched {
  Condition condition = Condition::unknown;
  std::optional<Measured> value_SI = std::nullopt;
};

// `active`: the alarm is, so the value has to go back by the dead-band.
[[nodiscard]] Watched watch(const SafetyLimit& limit, const MachineModel& model,
                            const AlarmTimings& timings, const AlarmInput& input, bool active);

[[nodiscard]] AlarmTiming timing_of(AlarmKind kind, const AlarmTimings& timings);
[[nodiscard]] AlarmKind kind_of(SafetyKind kind);
[[nodiscard]] Role role_of(SafetyKind kind);  // what the rule needs to be read

// The value at which the rule speaks: 0.9 of a documented cut-out (methods.md 7.7), else the limit.
[[nodiscard]] double speaks_at_SI(const SafetyLimit& limit);

void take_up(std::vector<PointWatch>& watches, const MachineModel& model, const Scan& scan);
[[nodiscard]] bool is_lost(const PointWatch& watch, const AlarmTimings& timings, Instant now);
[[nodiscard]] bool is_detector_lost(const PointWatch& watch, const AlarmTimings& timings);
[[nodiscard]] bool is_silent(const PointWatch& watch, const AlarmTimings& timings, Instant now);

// The limit that makes the point a detector; none where the point is no detector, or the owner
// entered no set point for it.
[[nodiscard]] const SafetyLimit* detector_limit(const AlarmRules& rules, Role role);

}  // namespace lostwork
