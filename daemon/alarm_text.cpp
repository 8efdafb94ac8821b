#include "daemon/alarm_text.h"

#include "daemon/finding_words.h"
#include "daemon/names.h"

#include <array>
#include <charconv>
#include <initializer_list>
#include <utility>

namespace lostwork {
namespace {

using Parts = std::initializer_list<std::string_view>;

std::string said(Parts parts) {
  std::string out;
  for (const std::string_view part : parts) {
    out.append(part);
  }
  return out;
}

std::string fixed(double value, int decimals) {
  std::array<char, 400> buffer{};  // a double has at most 309 digits before the point
  const auto end = std::to_chars(buffer.data(), buffer.data() + buffer.size(), value,
                                 std::chars_format::fixed, decimals);
  return {buffer.data(), end.ptr};
}

std::string two(unsigned value) {
  return said({value < 10 ? "0" : "", std::to_string(value)});
}

struct Words {
  std::string_view suffix;  // of the evidence
  double per_SI;
  double offset;
  int decimals;
  std::string_view unit;      // for people
  std::string_view measured;  // what is compared with the limit
  std::string_view occurs;
  std::string_view returns;
  std::string_view watched;
};

const Words& words(SafetyKind kind) {
  static constexpr std::array<Words, static_cast<std::size_t>(SafetyKind::count)> table{
      {
       {"discharge_pressure_bar", 1e-5, 0.0, 2, "bar (absolute)", "discharge pressure",
       "Approaching the machine's own high-pressure limit; the safety pressure device remains "
       "the "
       "protection",
       "No longer near the machine's own high-pressure limit; the safety pressure device "
       "remains "
       "the protection",
       "the approach to the high-pressure limit"},
       {"evaporating_degC", 1.0, -273.15, 1, "degC", "evaporating temperature",
       "Possible freezing of the evaporator",
       "Evaporating temperature above its limit again; what froze before may still be frozen",
       "possible freezing of the evaporator"},
       {"concentration_ppm", 1e6, 0.0, 0, "ppm", "refrigerant detector",
       "Refrigerant detector at or above its set point",
       "Refrigerant detector below its set point again; this does not say that the room may be "
       "entered",
       "the refrigerant detector"},
       {"oxygen_percent", 100.0, 0.0, 1, "% vol", "oxygen detector",
       "Oxygen at or below its set point",
       "Oxygen above its set point again; this does not say that the room may be entered",
       "the oxygen in the room"},
       }
  };
  return table.at(static_cast<std::size_t>(kind));
}

std::string sentence_of(const SafetyMatter& matter, bool returned) {
  const Words& w = words(matter.limit.kind);
  if (matter.kind != AlarmKind::detector_lost) {
    return std::string{returned ? w.returns : w.occurs};
  }
  return returned ? said({"Detector ", matter.point,
                          " seen again; what happened meanwhile is not known"})
                  : said({"Detector ", matter.point, " not seen: nothing is known of ", w.watched});
}

std::string value_of(const SafetyMatter& matter) {
  if (!matter.value_SI) {
    return "no value";
  }
  const SafetyKind kind = matter.limit.kind;
  return said({words(kind).measured, " ", setting_text(kind, *matter.value_SI)});
}

constexpr std::string_view monitor_only =
    "This is information from a monitor, not a safety function. Follow the site's emergency and "
    "refrigerant procedures and the local code (";
constexpr std::string_view licensed_only =
    "); work on the refrigerant circuit only by a licensed/certified person. The machine's safety "
    "devices must stay in service whatever this message says.";

std::string whole_safety_text(const SafetyMatter& matter, bool returned) {
  const SafetyLimit& limit = matter.limit;
  return said({matter.machine, ": ", sentence_of(matter, returned), " (", value_of(matter),
               ", limit ", setting_text(limit.kind, limit.limit_SI), " from ", limit.document,
               ", since ", time_text(matter.since), "). ", monitor_only, limit.jurisdiction,
               licensed_only});
}

std::string_view trouble(Quality quality) {
  switch (quality) {
    case Quality::stale: return "its last value is too old";
    case Quality::sentinel: return "the device reports that it has no value";
    case Quality::out_of_range: return "its values are outside the range of the point";
    case Quality::exception: return "the device refuses to give it";
    default: return "no answer";
  }
}

std::string blind_text(const std::vector<SafetyKind>& blind) {
  std::string out;
  for (const SafetyKind kind : blind) {
    out += said({" Meanwhile the rule that watches ", words(kind).watched,
                 " cannot see; the machine's safety devices remain the protection."});
  }
  return out;
}

// "6.2 % (4.1 to 8.3 %, 95 %)"
struct InUnit {
  double per_SI;
  int decimals;
  std::string_view unit;
};
std::string interval_text(const Measured& value, const InUnit& in) {
  const auto edge = [&in](double x) { return fixed(x * in.per_SI, in.decimals); };
  return said({edge(value.value), " ", in.unit, " (", edge(value.value - 2.0 * value.u), " to ",
               edge(value.value + 2.0 * value.u), " ", in.unit, ", 95 %)"});
}

constexpr double percent = 100.0;
constexpr double kWh_per_J = 1.0 / 3.6e6;
constexpr double kW_per_W = 1e-3;

std::string cost_text(const Finding& finding) {
  std::string out =
      said({" So far ", interval_text(finding.extra_energy_J, {kWh_per_J, 0, "kWh"}), " more"});
  if (finding.extra_cost) {
    out += said({", which cost ", interval_text(*finding.extra_cost, {1.0, 0, finding.currency})});
  }
  return said({out, "."});
}

std::string place_text(const Finding& finding) {
  if (!finding.component) {
    return " Which component it is cannot be told from the present sensors.";
  }
  return said({" The lost work of the ", name(*finding.component), " grew most: ",
               interval_text(finding.component_share, {percent, 0, "%"}), " of the extra power."});
}

std::string causes_text(const Finding& finding) {
  if (finding.causes.empty()) {
    return {};
  }
  const std::string first = cause_text(finding.causes.front());
  if (finding.cause_is_clear || finding.causes.size() == 1) {
    return said({finding.cause_is_clear ? " Most likely " : " Perhaps ", first, "."});
  }
  return said({" Perhaps ", first, ", or ", cause_text(finding.causes[1]), "."});
}

std::string suspects_text(const Finding& finding, std::string_view before,
                          std::string_view between) {
  if (finding.suspect_sensors.empty()) {
    return " Which one cannot be told.";
  }
  std::string out;
  for (const Role role : finding.suspect_sensors) {
    out += said({out.empty() ? before : between, "'", text(role), "'"});
  }
  return out + '.';
}

std::string since_text(const OnsetInterval& onset) {
  if (date_text(onset.earliest) == date_text(onset.latest)) {
    return date_text(onset.best);
  }
  return said({date_text(onset.best), " (between ", date_text(onset.earliest), " and ",
               date_text(onset.latest), ")"});
}

}  // namespace

std::string time_text(Instant time) {
  const auto day = std::chrono::floor<std::chrono::days>(time);
  const std::chrono::year_month_day date{day};
  const std::chrono::hh_mm_ss clock{std::chrono::floor<std::chrono::minutes>(time - day)};
  const auto part = [](auto value) { return two(static_cast<unsigned>(value)); };
  return said({std::to_string(static_cast<int>(date.year())), "-",
               two(static_cast<unsigned>(date.month())), "-",
               two(static_cast<unsigned>(date.day())), " ", part(clock.hours().count()), ":",
               part(clock.minutes().count()), " UTC"});
}

std::string date_text(Instant time) {
  static constexpr std::array<std::string_view, 12> months{
      "January", "February", "March",     "April",   "May",      "June",
      "July",    "August",   "September", "October", "November", "December"};
  const std::chrono::year_month_day date{std::chrono::floor<std::chrono::days>(time)};
  return said({std::to_string(static_cast<unsigned>(date.day())), " ",
               months.at(static_cast<unsigned>(date.month()) - 1), " ",
               std::to_string(static_cast<int>(date.year()))});
}

std::string setting_text(SafetyKind kind, double value_SI) {
  const Words& w = words(kind);
  return said({fixed(value_SI * w.per_SI + w.offset, w.decimals), " ", w.unit});
}

EdgeUnit edge_unit(SafetyKind kind) {
  const Words& w = words(kind);
  return {.suffix = w.suffix, .per_SI = w.per_SI, .offset = w.offset};
}

std::string_view watched(SafetyKind kind) {
  return words(kind).watched;
}

std::string safety_text(const SafetyMatter& matter) {
  return whole_safety_text(matter, false);
}

std::string safety_return_text(const SafetyMatter& matter) {
  return whole_safety_text(matter, true);
}

std::string point_lost_text(const Loss& loss, Role role, Quality quality) {
  return said({loss.machine, ": no usable value of ", loss.subject, " (", text(role), ") since ",
               time_text(loss.since), ": ", trouble(quality), ".", blind_text(loss.blind)});
}

std::string device_lost_text(const Loss& loss, std::size_t points) {
  return said({loss.machine, ": the device ", loss.subject, " has not answered since ",
               time_text(loss.since), ". With it ", std::to_string(points),
               points == 1 ? " point is" : " points are",
               " lost. Look at the device, its supply and its bus first.", blind_text(loss.blind)});
}

std::string heard_again_text(const Loss& loss) {
  return said({loss.machine, ": ", loss.subject, " is read again; it was not from ",
               time_text(loss.since), "."});
}

std::string finding_text(std::string_view machine, const Finding& finding) {
  if (finding.kind == FindingKind::efficiency_drift) {
    return said({machine, " needs ", interval_text(finding.size, {percent, 1, "%"}),
                 " more power than it did under the same conditions, since ",
                 since_text(finding.onset), ".", cost_text(finding), place_text(finding),
                 causes_text(finding)});
  }
  if (finding.kind == FindingKind::law_broken) {
    return said({machine,
                 ": the readings cannot all be true, for together they break the first or ",
                 "the second law of thermodynamics, since ", since_text(finding.onset), ".",
                 suspects_text(finding, " At least one of these is most likely wrong: ", ", "),
                 " Figures that rest on a wrong one are in doubt until it is checked."});
  }
  return said({machine, ": a sensor no longer fits the others, since ", since_text(finding.onset),
               ".", suspects_text(finding, " Most likely ", ", then "),
               " Figures that use it are in doubt until it is checked."});
}

std::string finding_over_text(std::string_view machine, const Finding& finding) {
  const std::string since = date_text(finding.onset.best);
  if (finding.kind == FindingKind::efficiency_drift) {
    return said({machine, " is no longer found to need more power under the same conditions; it ",
                 "had needed more since ", since, "."});
  }
  return said({machine, ": the readings are no longer found to contradict each other; they had ",
               "done so since ", since, "."});
}

std::vector<Figure> finding_figures(const Finding& finding) {
  const auto figure = [](std::string name, const Measured& value, double scale) {
    return Figure{.name = std::move(name),
                  .value = scale * value.value,
                  .u = scale * value.u,
                  .limit = std::nullopt,
                  .document = {}};
  };
  std::vector<Figure> out;
  if (finding.kind == FindingKind::efficiency_drift) {
    out.push_back(figure("power_residual_percent", finding.size, percent));
    out.push_back(figure("extra_energy_kWh", finding.extra_energy_J, kWh_per_J));
    if (finding.extra_cost) {
      out.push_back(figure(said({"extra_cost_", finding.currency}), *finding.extra_cost, 1.0));
    }
  }
  for (std::size_t i = 0; i < component_count; ++i) {
    if (const auto& change = finding.lost_change_W.at(i)) {
      const std::string_view component = name(static_cast<Component>(i));
      out.push_back(figure(said({"lost_", component, "_change_kW"}), *change, kW_per_W));
    }
  }
  for (const Evidence& e : finding.evidence) {
    const QuantityInfo& q = info(e.quantity);
    out.push_back({.name = std::string{q.name},
                   .value = e.after_SI * q.per_SI + q.offset,
                   .u = e.u_SI * q.per_SI,
                   .limit = e.before_SI * q.per_SI + q.offset,
                   .document = said({"expected by ", finding.baseline_id})});
  }
  return out;
}

FigureWords words_of(std::string_view figure) {
  constexpr std::string_view speaks_at = "speaks_at_";
  constexpr std::string_view cost = "extra_cost_";
  const bool is_setting = figure.starts_with(speaks_at);
  const std::string_view measured = is_setting ? figure.substr(speaks_at.size()) : figure;
  for (std::size_t i = 0; i < static_cast<std::size_t>(SafetyKind::count); ++i) {
    const Words& w = words(static_cast<SafetyKind>(i));
    if (w.suffix == measured) {
      return {.text = std::string{is_setting ? "the alarm comes at" : w.measured},
              .unit = std::string{w.unit}};
    }
  }
  if (const auto quantity = quantity_named(figure)) {
    const QuantityInfo& q = info(*quantity);
    return {.text = std::string{q.meaning}, .unit = std::string{q.unit}};
  }
  if (figure.starts_with(cost)) {
    return {.text = "cost of the extra energy", .unit = std::string{figure.substr(cost.size())}};
  }
  for (std::size_t i = 0; i < component_count; ++i) {
    const auto component = static_cast<Component>(i);
    if (figure == said({"lost_", name(component), "_change_kW"})) {
      return {.text = said({"more work that the ", text(component), " loses"}), .unit = "kW"};
    }
  }
  static constexpr std::array<std::array<std::string_view, 3>, 3> others{
      {
       {"points", "sensors without a value", ""},
       {"missed_scans", "scans missed in a row", ""},
       {"extra_energy_kWh", "extra energy", "kWh"},
       }
  };
  for (const auto& [key, plain, unit] : others) {
    if (figure == key) {
      return {.text = std::string{plain}, .unit = std::string{unit}};
    }
  }
  return {.text = std::string{figure}, .unit = {}};
}

}  // namespace lostwork
