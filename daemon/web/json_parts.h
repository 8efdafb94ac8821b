// Pieces that several bodies of the API are made of.
#pragma once

#include "daemon/plant_view.h"
#include "daemon/web/json_writer.h"
#include "thermo/measured.h"

#include <optional>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

// Writes the member `name` as an array, each item by `write(item)`.
template <class List, class Write>
void array_member(JsonWriter& json, std::string_view name, const List& list, const Write& write) {
  json.key(name).begin_array();
  for (const auto& item : list) {
    write(item);
  }
  json.end_array();
}

template <class T>
void optional_member(JsonWriter& json, std::string_view name, const std::optional<T>& content) {
  json.key(name);
  if (content) {
    json.value(*content);
  } else {
    json.null();
  }
}

void time_member(JsonWriter& json, std::string_view name, const std::optional<Instant>& time);
void strings_member(JsonWriter& json, std::string_view name, const std::vector<std::string>& lines);
// value, u and decimals, into the object that is open.
void figure_members(JsonWriter& json, const Measured& value);
// The same as an object of its own, or null.
void figures_member(JsonWriter& json, std::string_view name, const std::optional<Measured>& value);
// One quantity as an object: its figures in the unit of its name, or the reason for there being
// none.
void quantity_value(JsonWriter& json, Quantity quantity, const Result<Measured>& value_SI,
                    const MachineView& machine);

}  // namespace lostwork
