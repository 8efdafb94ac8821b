#include "daemon/alarm.h"

#include <array>
#include <cstddef>

namespace lostwork {

std::string_view name(AlarmKind kind) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(AlarmKind::count)> names{
      "drift",    "sensor-suspect",       "point-lost", "device-lost",  "high-pressure",
      "freezing", "refrigerant-detector", "oxygen",     "detector-lost"};
  return names.at(static_cast<std::size_t>(kind));
}

bool is_safety_relevant(AlarmKind kind) {
  switch (kind) {
    case AlarmKind::high_pressure:
    case AlarmKind::freezing:
    case AlarmKind::refrigerant_detector:
    case AlarmKind::oxygen:
    case AlarmKind::detector_lost: return true;
    default: return false;
  }
}

}  // namespace lostwork
