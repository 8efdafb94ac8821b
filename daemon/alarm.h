// An alarm, and what the journal is told of it.
#pragma once

#include "daemon/alarm_state.h"
#include "thermo/reading.h"

#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// Stored in journals: the numbers are never changed, new ones go to the end.
enum class AlarmKind : std::uint8_t {
  drift = 0,
  sensor_suspect = 1,
  point_lost = 2,
  device_lost = 3,
  high_pressure = 4,
  freezing = 5,
  refrigerant_detector = 6,
  oxygen = 7,
  detector_lost = 8,
  count
};
[[nodiscard]] std::string_view name(AlarmKind kind);
[[nodiscard]] bool is_safety_relevant(AlarmKind kind);

// Stored in journals as its number. Methods.md 7.3.
enum class AlarmPriority : std::uint8_t {
  danger = 1,      // minutes
  protect = 2,     // an hour
  cost = 3,        // days
  diagnostic = 4,  // for those who look into it
};

// One named figure behind a transition.
struct Figure {
  std::string name;  // with its unit: "power_residual_percent"
  double value = 0.0;
  std::optional<double> u = std::nullopt;      // standard uncertainty, in the same unit
  std::optional<double> limit = std::nullopt;  // in the same unit
  std::string document = {};  // where the limit comes from; empty where there is none

  friend bool operator==(const Figure&, const Figure&) = default;
};

struct AlarmEvent {
  Instant time{};
  std::string machine;  // MachineModel::id
  std::string alarm;    // Alarm::id
  AlarmKind kind{};
  AlarmState from{};  // equal to `to`: a comment, nothing else
  AlarmState to{};
  AlarmPriority priority{};
  std::string text;  // whole sentences
  std::vector<Figure> evidence;
  std::string user;     // who acknowledged or commented; empty otherwise
  std::string comment;  // may be empty

  friend bool operator==(const AlarmEvent&, const AlarmEvent&) = default;
};

// Somebody said "seen".
struct SeenBy {
  Instant time{};
  std::string user;
  std::string comment;  // may be empty

  friend bool operator==(const SeenBy&, const SeenBy&) = default;
};

struct Alarm {
  std::string id;  // "chiller-1.point-lost.ch1_cold_in": unique in the plant
  AlarmKind kind{};
  AlarmPriority priority{};
  AlarmState state = AlarmState::normal;
  Instant since{};                  // the condition began
  std::optional<Instant> returned;  // the condition ended
  std::optional<SeenBy> acknowledged;
  bool chattering = false;  // three times active within a minute (methods.md 7.2)
  std::string text;
  std::vector<Figure> evidence;

  friend bool operator==(const Alarm&, const Alarm&) = default;
};

}  // namespace lostwork
