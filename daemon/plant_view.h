// What the plant looks like now: filled by the loop after every scan, read by the page and the API
// on the same thread. Plain values; nothing in here points into the loop.
#pragma once

#include "daemon/alarm.h"
#include "daemon/alarm_rules.h"
#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/health/finding.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"
#include "thermo/role.h"

#include <cstdint>
#include <optional>
#include <string>
#include <vector>

namespace lostwork {

// One measured thing, with the last that was heard of it.
struct PointView {
  std::string id;    // as in the plant file
  std::string name;  // for people; empty: made from the role ("cold water leaving")
  Role role{};
  int circuit = 1;
  std::string unit;     // as in the plant file: "degC"
  double per_SI = 1.0;  // value in unit = SI value * per_SI + offset
  double offset = 0.0;
  Reading reading;  // SI
};

struct AlarmView {
  std::string machine;  // MachineView::id; empty: of the whole plant
  Alarm alarm;          // its id names it in the API: [A-Za-z0-9._-], at most 200 characters
};

struct LearningView {
  bool learned = false;  // the machine can be compared with itself
  std::string text;      // "31 of 60 steady windows in 9 of 14 days"; may be empty
};

struct MachineView {
  std::string id;
  std::string name;
  Duty duty = Duty::cooling;
  std::string refrigerant;           // "R134a"
  std::string cold_fluid = "water";  // for names: "cold water leaving"
  std::string hot_fluid = "water";
  double rated_power_W = 0.0;
  bool casing_surroundings_known = false;  // the plant file says how warm it is around the casing
  Span scan_period{10000};
  // The last scan that any reading of the machine was good in; none: not read since the start.
  std::optional<Instant> last_read;
  Assessment latest;  // of the last scan; its mode, level and steadiness are the machine's
  LearningView learning;
  std::vector<Finding> findings;  // those not over, most important first
  std::vector<PointView> points;
  std::vector<SafetyRule> safety_rules;  // configured or not
  std::optional<Span> run_time;          // counted since the first scan on record
  std::optional<std::uint64_t> starts;
};

struct PlantView {
  std::string site;              // "Tern Quay Dairy"
  std::string timezone = "UTC";  // IANA name, for times shown to people
  std::string version;           // of the program
  bool demonstration = false;    // a simulated plant: the page says so
  Instant time{};                // the plant's clock (the simulated one in a demonstration)
  // Raised by the loop at every change of anything in here, time included: answers are made once
  // for each number.
  std::uint64_t revision = 0;
  std::vector<MachineView> machines;
  std::vector<AlarmView> alarms;  // all that are not normal, newest first
};

}  // namespace lostwork
