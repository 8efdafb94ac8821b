#include "daemon/web/api_json.h"

#include "daemon/figures.h"
#include "daemon/names.h"
#include "daemon/web/json_parts.h"
#include "daemon/web/ledger_rows.h"
#include "daemon/words.h"

#include <algorithm>
#include <chrono>
#include <optional>
#include <string_view>

namespace lostwork {
namespace {

using Hours = std::chrono::duration<double, std::ratio<3600>>;
using Seconds = std::chrono::duration<double>;

// Digits of a trend: finer than any sensor, and half the bytes.
constexpr int trend_digits = 7;

void point_object(JsonWriter& json, const PointView& p, const MachineView& machine) {
  json.begin_object();
  json.member("id", p.id).member("name", text(p, machine)).member("role", name(p.role));
  json.member("circuit", p.circuit).member("unit", p.unit);
  json.member("quality", name(p.reading.quality))
      .member("quality_text", text(p.reading.quality))
      .member("time", iso_text(p.reading.time));
  if (p.reading.quality == Quality::good || p.reading.quality == Quality::substituted) {
    figure_members(
        json, {.value = p.reading.value_SI * p.per_SI + p.offset, .u = p.reading.u_SI * p.per_SI});
  }
  json.end_object();
}

void rule_object(JsonWriter& json, const SafetyRule& rule) {
  json.begin_object();
  json.member("kind", name(rule.kind)).member("name", text(rule.kind));
  json.member("configured", rule.configured).member("has_point", rule.has_point);
  json.member("setting", rule.setting).member("document", rule.document);
  json.member("jurisdiction", rule.jurisdiction).member("text", rule.text).end_object();
}

void state_members(JsonWriter& json, const MachineView& machine, Instant now) {
  const bool read = is_read(machine, now);
  const Mode mode = read ? machine.latest.mode : Mode::unknown;
  json.member("read", read).member("mode", name(mode)).member("mode_text", text(mode));
  json.member("steady", read && machine.latest.steady);
  json.member("level", name(machine.latest.level)).member("level_text", text(machine.latest.level));
}

void sentence_members(JsonWriter& json, const MachineView& machine, const PlantView& view,
                      const UtcOffset& offset) {
  const Sentence said = sentence(machine, view.alarms, {.now = view.time, .offset = offset});
  json.member("condition", name(said.condition))
      .member("condition_text", text(said.condition))
      .member("sentence", said.text);
}

void machine_object(JsonWriter& json, const MachineView& machine, const PlantView& view,
                    const UtcOffset& offset) {
  json.begin_object();
  json.member("id", machine.id).member("name", machine.name);
  sentence_members(json, machine, view, offset);
  json.member("duty", name(machine.duty)).member("refrigerant", machine.refrigerant);
  json.member("rated_power_kW", machine.rated_power_W * info(Quantity::power).per_SI);
  json.member("scan_s", Seconds{machine.scan_period}.count());
  state_members(json, machine, view.time);
  time_member(json, "last_read", machine.last_read);
  std::optional<double> run_hours;
  if (machine.run_time) {
    run_hours = Hours{*machine.run_time}.count();
  }
  optional_member(json, "run_hours", run_hours);
  optional_member(json, "starts", machine.starts);
  json.key("learning").begin_object();
  json.member("learned", machine.learning.learned).member("text", machine.learning.text);
  json.end_object();
  array_member(json, "points", machine.points,
               [&json, &machine](const PointView& p) { point_object(json, p, machine); });
  array_member(json, "safety_rules", machine.safety_rules,
               [&json](const SafetyRule& rule) { rule_object(json, rule); });
  json.end_object();
}

void ledger_row(JsonWriter& json, const LedgerRow& row, const MachineView& machine) {
  json.begin_object();
  json.member("quantity", info(row.quantity).name)
      .member("part", name(row.part))
      .member("text", row.text)
      .member("note", row.note);
  json.key("power_kW");
  quantity_value(json, row.quantity, row.power_W, machine);
  constexpr double percent = 100.0;
  figures_member(json, "percent",
                 row.share ? std::optional{scaled(*row.share, percent)} : std::nullopt);
  json.end_object();
}

void ledger_member(JsonWriter& json, const QuantityValues& values, const MachineView& machine) {
  const LedgerTable table = ledger_table(values, machine.casing_surroundings_known);
  json.key("ledger").begin_object();
  json.member("split", table.split).member("complete", table.complete).key("input");
  quantity_value(json, Quantity::power, table.input_W, machine);
  array_member(json, "rows", table.rows,
               [&json, &machine](const LedgerRow& row) { ledger_row(json, row, machine); });
  json.end_object();
}

template <class Value>
void column(JsonWriter& json, std::string_view name, const std::vector<Bucket>& buckets,
            const Value& value_of) {
  array_member(json, name, buckets, [&json, &value_of](const Bucket& bucket) {
    if (bucket.mean) {
      json.rounded(value_of(bucket), trend_digits);
    } else {
      json.null();
    }
  });
}

}  // namespace

bool is_read(const MachineView& machine, Instant now) {
  return machine.last_read && now - *machine.last_read <= patience(machine);
}

QuantityValues current_values(const MachineView& machine, Instant now) {
  return is_read(machine, now) ? machine.latest.values : QuantityValues{};
}

std::string machines_json(const PlantView& view, const UtcOffset& offset) {
  JsonWriter json;
  json.begin_object();
  json.member("site", view.site).member("timezone", view.timezone).member("version", view.version);
  json.member("demonstration", view.demonstration).member("time", iso_text(view.time));
  json.member("revision", view.revision);
  array_member(json, "machines", view.machines, [&json, &view, &offset](const MachineView& m) {
    machine_object(json, m, view, offset);
  });
  json.end_object();
  return json.take();
}

std::string assessment_json(const MachineView& machine, Instant now) {
  const QuantityValues values = current_values(machine, now);
  JsonWriter json;
  json.begin_object();
  json.member("machine", machine.id).member("time", iso_text(machine.latest.time));
  state_members(json, machine, now);
  json.key("quantities").begin_object();
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto quantity = static_cast<Quantity>(i);
    json.key(info(quantity).name);
    quantity_value(json, quantity, values[quantity], machine);
  }
  json.end_object();
  ledger_member(json, values, machine);
  json.end_object();
  return json.take();
}

std::string quantities_json() {
  JsonWriter json;
  json.begin_object();
  array_member(json, "quantities", quantities(), [&json](const QuantityInfo& q) {
    json.begin_object().member("name", q.name).member("unit", q.unit).member("symbol", q.symbol);
    json.member("meaning", q.meaning).end_object();
  });
  json.end_object();
  return json.take();
}

std::string trend_json(const TrendRequest& request, const std::vector<Bucket>& buckets) {
  const QuantityInfo& q = info(request.quantity);
  const auto edge = [&q](double value_SI) { return value_SI * q.per_SI + q.offset; };
  JsonWriter json;
  json.begin_object();
  json.member("machine", request.machine).member("quantity", q.name).member("unit", q.unit);
  json.member("from", iso_text(request.from)).member("to", iso_text(request.to));
  array_member(json, "times", buckets, [&json](const Bucket& b) { json.value(iso_text(b.begin)); });
  column(json, "values", buckets, [&edge](const Bucket& b) { return edge(b.mean->value); });
  column(json, "u", buckets, [&q](const Bucket& b) { return b.mean->u * q.per_SI; });
  column(json, "lowest", buckets, [&edge](const Bucket& b) { return edge(b.min_SI); });
  column(json, "highest", buckets, [&edge](const Bucket& b) { return edge(b.max_SI); });
  array_member(json, "reasons", buckets, [&json](const Bucket& b) {
    if (b.mean) {
      json.null();
    } else {
      json.value(name(b.mean.error().code));
    }
  });
  json.end_object();
  return json.take();
}

std::string health_json(const PlantView& view) {
  const auto read =
      std::count_if(view.machines.begin(), view.machines.end(),
                    [&view](const MachineView& machine) { return is_read(machine, view.time); });
  JsonWriter json;
  const bool all = static_cast<std::size_t>(read) == view.machines.size();
  json.begin_object().member("status", all ? "ok" : "not_all_read");
  json.member("time", iso_text(view.time));
  json.member("machines", view.machines.size()).member("machines_read", read).end_object();
  return json.take();
}

std::string event_json(const PlantView& view, const UtcOffset& offset) {
  JsonWriter json;
  json.begin_object();
  json.member("revision", view.revision).member("time", iso_text(view.time));
  array_member(json, "machines", view.machines, [&json, &view, &offset](const MachineView& m) {
    json.begin_object().member("id", m.id);
    sentence_members(json, m, view, offset);
    json.end_object();
  });
  json.end_object();
  return json.take();
}

}  // namespace lostwork
