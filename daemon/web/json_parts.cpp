#include "daemon/web/json_parts.h"

#include "daemon/figures.h"
#include "daemon/local_time.h"
#include "daemon/names.h"

namespace lostwork {

void time_member(JsonWriter& json, std::string_view name, const std::optional<Instant>& time) {
  optional_member(json, name, time ? std::optional{iso_text(*time)} : std::nullopt);
}

void strings_member(JsonWriter& json, std::string_view name,
                    const std::vector<std::string>& lines) {
  array_member(json, name, lines, [&json](const std::string& line) { json.value(line); });
}

void figure_members(JsonWriter& json, const Measured& value) {
  json.member("value", value.value).member("u", value.u).member("decimals", decimals(value));
}

void figures_member(JsonWriter& json, std::string_view name, const std::optional<Measured>& value) {
  json.key(name);
  if (!value) {
    json.null();
    return;
  }
  json.begin_object();
  figure_members(json, *value);
  json.end_object();
}

void quantity_value(JsonWriter& json, Quantity quantity, const Result<Measured>& value_SI,
                    const MachineView& machine) {
  json.begin_object();
  if (value_SI) {
    figure_members(json, at_the_edge(quantity, *value_SI));
  } else {
    const Reason& why = value_SI.error();
    json.key("reason").begin_object();
    json.member("name", name(why.code)).member("text", text(why, machine)).end_object();
  }
  json.end_object();
}

}  // namespace lostwork
