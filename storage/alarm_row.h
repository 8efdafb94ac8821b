// One line of the alarm journal: a transition, or what a person did to an alarm.
#pragma once

#include "thermo/reading.h"

#include <chrono>
#include <cstdint>
#include <string>

namespace lostwork {

// The journal is append-only: a row is never changed and never removed. All texts are UTF-8.
struct AlarmRow {
  Instant time{};
  // Local time of the plant less UTC at that moment, for whoever reads the journal later.
  std::chrono::minutes utc_offset{0};
  std::string machine;    // machine id; empty: of the whole plant
  std::string alarm;      // alarm id
  std::uint8_t kind = 0;  // these four are the numbers of the enumerations of alarms,
  std::uint8_t from = 0;  // which storage does not know: they are kept and given back
  std::uint8_t to = 0;    // the same as `from` for a comment
  std::uint8_t priority = 3;
  std::string text;                  // whole sentences, as they were shown
  std::string evidence_json = "{}";  // what was known: inputs, uncertainties, version of the rule
  std::string user;                  // who acted; empty: the program
  std::string comment;

  friend bool operator==(const AlarmRow&, const AlarmRow&) = default;
};

}  // namespace lostwork
