#include "daemon/alarm_text.h"
#include "daemon/figures.h"
#include "daemon/finding_words.h"
#include "daemon/names.h"
#include "daemon/web/api_json.h"
#include "daemon/web/json_parts.h"

#include <array>
#include <cstddef>
#include <optional>
#include <string_view>

namespace lostwork {
namespace {

constexpr double percent = 100.0;
constexpr double kWh_per_joule = 1.0 / 3.6e6;

void evidence_figure(JsonWriter& json, const Figure& f) {
  json.begin_object();
  const FigureWords words = words_of(f.name);
  json.member("name", f.name).member("text", words.text).member("unit", words.unit);
  json.member("value", f.value);
  optional_member(json, "u", f.u);
  optional_member(json, "limit", f.limit);
  json.member("document", f.document).end_object();
}

void alarm_object(JsonWriter& json, const AlarmView& view) {
  const Alarm& alarm = view.alarm;
  json.begin_object();
  json.member("id", alarm.id).member("machine", view.machine).member("kind", name(alarm.kind));
  json.member("priority", static_cast<int>(alarm.priority))
      .member("state", name(alarm.state))
      .member("state_text", text(alarm.state))
      .member("safety_relevant", is_safety_relevant(alarm.kind))
      .member("chattering", alarm.chattering)
      .member("since", iso_text(alarm.since));
  time_member(json, "returned", alarm.returned);
  const SeenBy seen = alarm.acknowledged.value_or(SeenBy{});
  time_member(json, "acknowledged", alarm.acknowledged ? std::optional{seen.time} : std::nullopt);
  json.member("acknowledged_by", seen.user).member("comment", seen.comment);
  json.member("text", alarm.text);
  array_member(json, "evidence", alarm.evidence,
               [&json](const Figure& f) { evidence_figure(json, f); });
  json.end_object();
}

void size_members(JsonWriter& json, const Finding& finding) {
  std::optional<Measured> size;
  std::optional<Measured> energy;
  if (finding.kind == FindingKind::efficiency_drift) {
    size = scaled(finding.size, percent);
    energy = scaled(finding.extra_energy_J, kWh_per_joule);
  }
  figures_member(json, "extra_power_percent", size);
  figures_member(json, "extra_energy_kWh", energy);
  figures_member(json, "extra_cost", finding.extra_cost);
  json.member("currency", finding.currency);
  figures_member(json, "extra_co2_kg", finding.extra_co2_kg);
  json.member("compared_percent", percent * finding.compared_share);
}

void component_members(JsonWriter& json, const Finding& finding) {
  std::optional<std::string_view> component;
  std::optional<Measured> share;
  if (finding.component) {
    component = name(*finding.component);
    share = scaled(finding.component_share, percent);
  }
  optional_member(json, "component", component);
  figures_member(json, "component_share_percent", share);
  json.key("lost_change_kW").begin_object();
  for (std::size_t i = 0; i < component_count; ++i) {
    const std::optional<Measured>& change = finding.lost_change_W.at(i);
    figures_member(
        json, name(static_cast<Component>(i)),
        change ? std::optional{scaled(*change, info(Quantity::power).per_SI)} : std::nullopt);
  }
  json.end_object();
}

void cause_object(JsonWriter& json, const RankedCause& cause, const MachineView& machine) {
  json.begin_object();
  json.member("name", name(cause.cause)).member("text", text(cause, machine));
  json.member("probability", cause.probability);
  json.member("what_would_settle", what_would_settle(cause.cause)).end_object();
}

void evidence_object(JsonWriter& json, FindingKind kind, const Evidence& evidence) {
  const QuantityInfo& q = info(evidence.quantity);
  json.begin_object();
  json.member("quantity", q.name).member("text", text(kind, evidence));
  json.member("expected", evidence.before_SI * q.per_SI + q.offset)
      .member("found", evidence.after_SI * q.per_SI + q.offset)
      .member("u", evidence.u_SI * q.per_SI)
      .end_object();
}

void finding_object(JsonWriter& json, const Finding& finding, const MachineView& machine,
                    const WallClock& clock) {
  json.begin_object();
  json.member("id", finding.id).member("machine", machine.id).member("kind", name(finding.kind));
  json.member("state", name(finding.state)).member("headline", headline(finding, machine, clock));
  time_member(json, "since", finding.onset.best);
  time_member(json, "since_earliest", finding.onset.earliest);
  time_member(json, "since_latest", finding.onset.latest);
  time_member(json, "first_seen", finding.first_seen);
  time_member(json, "confirmed", finding.confirmed);
  size_members(json, finding);
  component_members(json, finding);
  strings_member(json, "consequences", consequences(finding));
  json.member("cause_is_clear", finding.cause_is_clear);
  array_member(json, "causes", finding.causes,
               [&json, &machine](const RankedCause& cause) { cause_object(json, cause, machine); });
  array_member(json, "suspect_sensors", finding.suspect_sensors, [&json, &machine](Role role) {
    json.begin_object();
    json.member("role", name(role)).member("name", text(role, machine)).end_object();
  });
  array_member(json, "evidence", finding.evidence,
               [&](const Evidence& evidence) { evidence_object(json, finding.kind, evidence); });
  strings_member(json, "cautions", cautions(finding));
  json.member("baseline", finding.baseline_id).end_object();
}

}  // namespace

std::string alarms_json(const PlantView& view) {
  JsonWriter json;
  json.begin_object().member("time", iso_text(view.time));
  array_member(json, "alarms", view.alarms,
               [&json](const AlarmView& alarm) { alarm_object(json, alarm); });
  json.end_object();
  return json.take();
}

std::string findings_json(const PlantView& view, const UtcOffset& offset) {
  const WallClock clock{.now = view.time, .offset = offset};
  JsonWriter json;
  json.begin_object().member("time", iso_text(view.time)).key("findings").begin_array();
  for (const MachineView& machine : view.machines) {
    for (const Finding& finding : machine.findings) {
      finding_object(json, finding, machine, clock);
    }
  }
  json.end_array().end_object();
  return json.take();
}

}  // namespace lostwork
