// What alarms say to people: whole sentences.
//
// Pure. Safety-relevant texts follow the template of methods.md 7.7: they inform, name the limit
// and the document that it comes from, defer to the local code and to licensed persons, and say
// that the machine's safety devices stay in service. None says that anything is safe, or that there
// is no leak. Times are UTC; pages show them in the site's zone beside the text.
#pragma once

#include "config/safety_limit.h"
#include "daemon/alarm.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/health/finding.h"
#include "thermo/measured.h"
#include "thermo/reading.h"

#include <cstddef>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// "2026-05-03 14:20 UTC" and "3 May 2026".
[[nodiscard]] std::string time_text(Instant time);
[[nodiscard]] std::string date_text(Instant time);

// "18.00 bar (absolute)", "2.0 degC", "500 ppm", "19.5 % vol"; the figure and its unit for
// evidence.
[[nodiscard]] std::string setting_text(SafetyKind kind, double value_SI);
struct EdgeUnit {
  std::string_view suffix;  // "discharge_pressure_bar"
  double per_SI;
  double offset;
};
[[nodiscard]] EdgeUnit edge_unit(SafetyKind kind);

// What a safety-relevant alarm is about.
struct SafetyMatter {
  AlarmKind kind{};
  std::string_view machine;  // for people
  const SafetyLimit& limit;
  std::optional<double> value_SI;  // none: not read
  std::string_view point;          // the detector's id; used by detector_lost
  Instant since{};
};
[[nodiscard]] std::string safety_text(const SafetyMatter& matter);
[[nodiscard]] std::string safety_return_text(const SafetyMatter& matter);

// "the approach to the high-pressure limit"
[[nodiscard]] std::string_view watched(SafetyKind kind);

// A point or a device that gives nothing.
struct Loss {
  std::string_view machine;
  std::string_view subject;  // id of the point or the device
  Instant since{};
  std::vector<SafetyKind> blind;  // safety-relevant rules that cannot watch meanwhile
};
[[nodiscard]] std::string point_lost_text(const Loss& loss, Role role, Quality quality);
[[nodiscard]] std::string device_lost_text(const Loss& loss, std::size_t points);
[[nodiscard]] std::string heard_again_text(const Loss& loss);

[[nodiscard]] std::string finding_text(std::string_view machine, const Finding& finding);
[[nodiscard]] std::string finding_over_text(std::string_view machine, const Finding& finding);
[[nodiscard]] std::vector<Figure> finding_figures(const Finding& finding);

// A figure's name in plain words, and its unit: "discharge_pressure_bar" is the "discharge
// pressure" in "bar (absolute)". A name that is not known is its own words.
struct FigureWords {
  std::string text;
  std::string unit;
};
[[nodiscard]] FigureWords words_of(std::string_view figure);

}  // namespace lostwork
