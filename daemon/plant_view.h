// What the plant looks like now: filled by the loop after every scan, read by the page and the API
// on the same thread. Plain values; nothing in here points into the loop.
#pragma once

#include "daemon/alarm.h"
#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/measured.h"
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

// One possible cause of a finding, most likely first.
struct CauseView {
  std::string text;                   // "fouled condenser"
  std::optional<double> probability;  // 0..1, where the method gives one
  std::vector<std::string> evidence;  // one line each, for and against
};

enum class FindingKind : std::uint8_t {
  drift,   // needs more power than it should
  sensor,  // a sensor does not fit the others
  other,
  count
};

struct FindingView {
  std::string id;  // same characters as an alarm's id
  FindingKind kind = FindingKind::other;
  std::string headline;                   // one sentence
  std::optional<Instant> since;           // most likely onset
  std::optional<Instant> since_earliest;  // 95 % interval of the onset
  std::optional<Instant> since_latest;
  std::optional<Measured> extra_power;  // ratio, like for like: 0.06 = 6 % more than it should
  std::string component;  // whose lost work grew most: "condenser"; empty: cannot tell
  std::string point;      // PointView::id of the sensor that does not fit; empty: none
  std::optional<Measured> extra_energy_J;  // since the onset
  std::optional<Measured> extra_cost;      // since the onset, in currency
  std::string currency;                    // "EUR"
  std::vector<CauseView> causes;
  std::vector<std::string> evidence;
  std::vector<std::string> cautions;
  std::string what_would_settle;  // the check or the sensor that decides; may be empty
};

// A safety-relevant rule exists only where the owner entered its set point.
struct SafetyRuleView {
  std::string name;  // "approach to the high-pressure limit"
  bool configured = false;
  std::string setting;       // "18.0 bar (absolute)"; empty where not configured
  std::string document;      // where the owner took it from
  std::string jurisdiction;  // whose code
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
  Span scan_period{10000};
  // The last scan that any reading of the machine was good in; none: not read since the start.
  std::optional<Instant> last_read;
  Assessment latest;  // of the last scan; its mode, level and steadiness are the machine's
  LearningView learning;
  std::vector<FindingView> findings;  // current ones, most important first
  std::vector<PointView> points;
  std::vector<SafetyRuleView> safety_rules;
  std::optional<Span> run_time;  // counted since the first scan on record
  std::optional<std::uint64_t> starts;
};

struct PlantView {
  std::string site;              // "Tern Quay Dairy"
  std::string timezone = "UTC";  // IANA name, for times shown to people
  std::string version;           // of the program
  bool demonstration = false;    // a simulated plant: the page says so
  Instant time{};                // the plant's clock (the simulated one in a demonstration)
  // Raised by the loop at every change of anything in here; answers are made once for each number.
  std::uint64_t revision = 0;
  std::vector<MachineView> machines;
  std::vector<AlarmView> alarms;  // all that are not normal, newest first
};

}  // namespace lostwork
