// A set point of a safety-relevant rule, entered by the owner. None is built in: a rule without one
// is off and shown as "not configured".
#pragma once

#include <cstdint>
#include <string>

namespace lostwork {

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class SafetyKind : std::uint8_t {
  high_pressure = 0,         // limit_SI: the documented cut-out, Pa absolute
  freezing = 1,              // limit_SI: lowest evaporating temperature allowed, K
  refrigerant_detector = 2,  // limit_SI: concentration that the detector alarms at, volume fraction
  oxygen = 3,                // limit_SI: least volume fraction of oxygen
  count
};

struct SafetyLimit {
  SafetyKind kind{};
  std::string machine;       // MachineModel::id
  double limit_SI = 0.0;     // > 0
  std::string entered;       // as in the plant file: "16 bar_gauge"; may be empty
  std::string document;      // where the owner took it from; not empty
  std::string jurisdiction;  // the local code that it defers to; not empty
  std::string entered_by;    // may be empty
};

}  // namespace lostwork
