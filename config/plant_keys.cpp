#include "config/plant_keys.h"

#include "config/toml_reader.h"

namespace lostwork::keys {
namespace {

std::string standard_text(const std::string& value) {
  return value.empty() ? "" : '"' + value + '"';
}
std::string standard_text(double value) {
  return number_text(value);
}
std::string standard_text(std::int64_t value) {
  return std::to_string(value);
}
std::string standard_text(bool value) {
  return value ? "true" : "false";
}
template <class T>
std::string standard_text(const std::optional<T>& value) {
  return value ? standard_text(*value) : "";
}

template <class S>
std::string allowed_text(const Key<S>& key) {
  return std::visit(
      [&key](auto member) -> std::string {
        using M = decltype(member);
        if constexpr (std::is_same_v<M, Other>) {
          return "see its meaning";
        } else if constexpr (std::is_same_v<M, std::string S::*> ||
                             std::is_same_v<M, std::optional<std::string> S::*>) {
          return key.choices.empty() ? "text" : allowed_choices(key.choices);
        } else if constexpr (std::is_same_v<M, bool S::*>) {
          return "true or false";
        } else {
          return allowed_number(
              key.min, key.max,
              !std::is_same_v<M, double S::*> && !std::is_same_v<M, std::optional<double> S::*>);
        }
      },
      key.member);
}

template <class S>
std::string standard_of(const Key<S>& key, const S& standard) {
  return std::visit(
      [&standard](auto member) -> std::string {
        if constexpr (std::is_same_v<decltype(member), Other>) {
          return "";
        } else {
          return standard_text(standard.*member);
        }
      },
      key.member);
}

template <class S, std::size_t n>
void add(std::vector<KeyRow>& rows, std::string_view table, const std::array<Key<S>, n>& keys) {
  const S standard{};
  for (const Key<S>& key : keys) {
    rows.push_back({.table = std::string{table},
                    .key = std::string{key.name},
                    .allowed = allowed_text(key),
                    .standard = key.required ? "required" : standard_of(key, standard),
                    .meaning = std::string{key.meaning}});
  }
}

}  // namespace

std::vector<KeyRow> all() {
  std::vector<KeyRow> rows;
  add(rows, "[site]", site);
  add(rows, "[storage]", storage);
  add(rows, "[web]", web);
  add(rows, "[tariff]", tariff);
  add(rows, "[[bus]]", bus);
  add(rows, "[[device]]", device);
  add(rows, "[[machine]]", machine);
  add(rows, "[[pair]]", pair);
  add(rows, "[[point]]", point);
  add(rows, "[[safety_limit]]", safety_limit);
  return rows;
}

}  // namespace lostwork::keys
