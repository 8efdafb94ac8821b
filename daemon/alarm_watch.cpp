#include "daemon/alarm_watch.h"

#include <algorithm>

namespace lostwork {
namespace {

constexpr double share_of_cut_out = 0.9;
// A reading older than one and a half scan periods was not read in this scan.
constexpr double oldest_reading = 1.5;

std::optional<Measured> good(const Reading& reading) {
  if (reading.quality != Quality::good) {
    return std::nullopt;
  }
  return Measured{.value = reading.value_SI, .u = reading.u_SI};
}

// The largest (or the smallest) of all good readings of a role.
std::optional<Measured> extreme(const MachineModel& model, const Scan& scan, Role role,
                                bool largest) {
  std::optional<Measured> out;
  for (std::size_t i = 0; i < model.points.size() && i < scan.readings.size(); ++i) {
    const auto value = model.points[i].role == role ? good(scan.readings[i]) : std::nullopt;
    if (value && (!out || (largest ? value->value > out->value : value->value < out->value))) {
      out = value;
    }
  }
  return out;
}

Watched above(const std::optional<Measured>& value, double limit, double dead_band, bool active) {
  if (!value) {
    return {};
  }
  const double line = active ? limit - dead_band : limit;
  return {.condition = value->value >= line ? Condition::yes : Condition::no, .value_SI = value};
}

Watched below(const std::optional<Measured>& value, double limit, double dead_band, bool active) {
  if (!value) {
    return {};
  }
  const double line = active ? limit + dead_band : limit;
  return {.condition = value->value <= line ? Condition::yes : Condition::no, .value_SI = value};
}

// Means something while the machine runs only. In a start and in a defrost a low evaporating
// temperature is usual: nothing is raised then, and nothing cleared.
Watched watch_freezing(const SafetyLimit& limit, const AlarmTimings& timings,
                       const AlarmInput& input, bool active) {
  switch (input.assessment.mode) {
    case Mode::off: return {.condition = Condition::no};
    case Mode::starting:
    case Mode::stopping:
    case Mode::defrost: return {};
    default: break;
  }
  const auto& evaporating = input.assessment.values[Quantity::evaporating];
  const auto value = evaporating ? std::optional{*evaporating} : std::nullopt;
  return below(value, limit.limit_SI, timings.temperature_dead_band_K, active);
}

bool is_silence(Quality quality) {
  return quality == Quality::stale || quality == Quality::timeout || quality == Quality::exception;
}

bool is_usable(Quality quality) {
  return quality == Quality::good || quality == Quality::suspect || quality == Quality::stuck ||
         quality == Quality::substituted;
}

bool missed_too_often(std::uint32_t missed, const std::optional<Instant>& last_good,
                      const AlarmTimings& timings, Instant now) {
  return missed >= timings.lost_polls ||
         (missed >= 2 && last_good && now - *last_good >= timings.lost_after);
}

}  // namespace

Watched watch(const SafetyLimit& limit, const MachineModel& model, const AlarmTimings& timings,
              const AlarmInput& input, bool active) {
  const double line = speaks_at_SI(limit);
  const auto found = [&](bool largest) {
    return extreme(model, input.scan, role_of(limit.kind), largest);
  };
  switch (limit.kind) {
    case SafetyKind::high_pressure:
      return above(found(true), line, timings.pressure.dead_band * line, active);
    case SafetyKind::refrigerant_detector:
      return above(found(true), line, timings.detector.dead_band * line, active);
    case SafetyKind::oxygen:
      return below(found(false), line, timings.detector.dead_band * line, active);
    case SafetyKind::freezing: return watch_freezing(limit, timings, input, active);
    default: return {};
  }
}

AlarmTiming timing_of(AlarmKind kind, const AlarmTimings& timings) {
  switch (kind) {
    case AlarmKind::high_pressure: return timings.pressure;
    case AlarmKind::freezing: return timings.temperature;
    case AlarmKind::refrigerant_detector:
    case AlarmKind::oxygen: return timings.detector;
    case AlarmKind::point_lost:
    case AlarmKind::device_lost:
    case AlarmKind::detector_lost: return {.off_delay = timings.lost_off_delay};
    default: return {};
  }
}

AlarmKind kind_of(SafetyKind kind) {
  switch (kind) {
    case SafetyKind::high_pressure: return AlarmKind::high_pressure;
    case SafetyKind::freezing: return AlarmKind::freezing;
    case SafetyKind::refrigerant_detector: return AlarmKind::refrigerant_detector;
    default: return AlarmKind::oxygen;
  }
}

Role role_of(SafetyKind kind) {
  switch (kind) {
    case SafetyKind::high_pressure: return Role::discharge_pressure;
    case SafetyKind::freezing: return Role::suction_pressure;
    case SafetyKind::refrigerant_detector: return Role::leak_concentration;
    default: return Role::oxygen;
  }
}

double speaks_at_SI(const SafetyLimit& limit) {
  return limit.kind == SafetyKind::high_pressure ? share_of_cut_out * limit.limit_SI
                                                 : limit.limit_SI;
}

void take_up(std::vector<PointWatch>& watches, const MachineModel& model, const Scan& scan) {
  for (std::size_t i = 0; i < watches.size() && i < scan.readings.size(); ++i) {
    PointWatch& watch = watches[i];
    const Reading& reading = scan.readings[i];
    const bool is_detector =
        model.points[i].role == Role::leak_concentration || model.points[i].role == Role::oxygen;
    const bool old = is_detector && reading.quality == Quality::good && reading.time != Instant{} &&
                     static_cast<double>((scan.time - reading.time).count()) >
                         oldest_reading * static_cast<double>(model.scan_period.count());
    watch.quality = old ? Quality::stale : reading.quality;
    if (is_usable(watch.quality)) {
      watch.last_good = scan.time;
      watch.missed_since.reset();
      watch.missed = 0;
      watch.silent = 0;
      continue;
    }
    watch.missed_since = watch.missed_since.value_or(scan.time);
    ++watch.missed;
    watch.silent = is_silence(watch.quality) ? watch.silent + 1 : 0;
  }
}

bool is_lost(const PointWatch& watch, const AlarmTimings& timings, Instant now) {
  return missed_too_often(watch.missed, watch.last_good, timings, now);
}

bool is_silent(const PointWatch& watch, const AlarmTimings& timings, Instant now) {
  return missed_too_often(watch.silent, watch.last_good, timings, now);
}

bool is_detector_lost(const PointWatch& watch, const AlarmTimings& timings) {
  return watch.missed >= timings.detector_lost_polls;
}

const SafetyLimit* detector_limit(const AlarmRules& rules, Role role) {
  const auto kind = role == Role::leak_concentration
                        ? std::optional{SafetyKind::refrigerant_detector}
                    : role == Role::oxygen ? std::optional{SafetyKind::oxygen}
                                           : std::nullopt;
  const auto found =
      std::find_if(rules.limits.begin(), rules.limits.end(),
                   [kind](const SafetyLimit& limit) { return kind && limit.kind == *kind; });
  return found == rules.limits.end() ? nullptr : &*found;
}

}  // namespace lostwork
