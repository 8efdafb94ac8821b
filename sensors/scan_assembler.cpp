#include "sensors/scan_assembler.h"

#include <algorithm>
#include <utility>
#include <variant>

namespace lostwork {

ScanAssembler::ScanAssembler(const Wiring& wiring, std::string_view machine)
    : altitude_m_{wiring.altitude_m} {
  for (const MachineScan& scan : wiring.machines) {
    if (scan.machine == machine) {
      period_ = scan.period;
    }
  }
  for (const std::size_t point : points_of(wiring, machine)) {
    const PointSpec& spec = wiring.points[point];
    slots_.push_back({.point = point,
                      .wired = std::holds_alternative<FromRegister>(spec.source),
                      .spec = spec,
                      .last = std::nullopt});
  }
}

void ScanAssembler::take(std::span<const PointReading> readings) {
  for (const PointReading& incoming : readings) {
    const auto slot = std::find_if(slots_.begin(), slots_.end(), [&incoming](const Slot& s) {
      return s.point == incoming.point;
    });
    if (slot != slots_.end()) {
      slot->last = incoming.reading;
      slot->fresh = true;
    }
  }
}

bool ScanAssembler::complete(Instant time) const {
  return std::all_of(slots_.begin(), slots_.end(), [time](const Slot& slot) {
    return !slot.wired || (slot.fresh && slot.last && slot.last->time >= time);
  });
}

Reading ScanAssembler::current(Slot& slot, Instant time) const {
  if (const auto* constant = std::get_if<Constant>(&slot.spec.source)) {
    return reading_of(slot.spec, constant->value, altitude_m_, time);
  }
  if (!slot.last) {
    return missing(Quality::timeout, time);
  }
  const bool fresh = std::exchange(slot.fresh, false);
  const Span age = time - slot.last->time;
  if (fresh && age <= period_) {
    return *slot.last;
  }
  return missing(age > 3 * period_ ? Quality::stale : Quality::timeout, slot.last->time);
}

Scan ScanAssembler::scan(Instant time) {
  Scan scan;
  scan.time = time;
  scan.readings.reserve(slots_.size());
  for (Slot& slot : slots_) {
    scan.readings.push_back(current(slot, time));
  }
  return scan;
}

}  // namespace lostwork
