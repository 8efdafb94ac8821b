// Reads tables of a TOML file by their key tables, and remembers every problem.
#pragma once

#include "config/entry_place.h"
#include "config/key_table.h"
#include "config/problem.h"

#include <algorithm>
#include <cmath>
#include <string>
#include <string_view>
#include <toml++/toml.h>

namespace lostwork {

[[nodiscard]] std::string number_text(double value);  // shortest that reads back the same
[[nodiscard]] std::string found_text(const toml::node& node);
[[nodiscard]] std::string allowed_number(double min, double max, bool whole);
[[nodiscard]] std::string allowed_choices(std::span<const std::string_view> choices);
[[nodiscard]] std::uint32_t line_of(const toml::node& node);

// The value of a key; where it is not written, that of a key that looks like it, mistyped.
[[nodiscard]] const toml::node* node_of(const toml::table& table, std::string_view key);

// One table of the file.
struct TomlPlace {
  const toml::table& table;
  EntryPlace& entry;
  Problems& problems;

  // Both note the problem and mark the key in the entry.
  void refuse(const toml::node& node, std::string_view key, std::string allowed) const;
  void missing(std::string_view key, std::string allowed) const;
};

struct NumberRange {
  double min;
  double max;
};

// Each fills `out` or notes a problem.
void take(const TomlPlace& place, std::string_view key, const toml::node& node, std::string& out,
          std::span<const std::string_view> choices);
void take_number(const TomlPlace& place, std::string_view key, const toml::node& node, double& out,
                 const NumberRange& allowed);
void take_whole(const TomlPlace& place, std::string_view key, const toml::node& node,
                std::int64_t& out, const NumberRange& allowed);
void take(const TomlPlace& place, std::string_view key, const toml::node& node, bool& out);

template <class S>
void take_member(const TomlPlace& place, const Key<S>& key, const toml::node& node, S& out) {
  const NumberRange allowed{.min = key.min, .max = key.max};
  std::visit(
      [&place, &key, &node, &out, &allowed](auto member) {
        using M = decltype(member);
        if constexpr (std::is_same_v<M, std::string S::*>) {
          take(place, key.name, node, out.*member, key.choices);
        } else if constexpr (std::is_same_v<M, std::optional<std::string> S::*>) {
          take(place, key.name, node, (out.*member).emplace(), key.choices);
        } else if constexpr (std::is_same_v<M, double S::*>) {
          take_number(place, key.name, node, out.*member, allowed);
        } else if constexpr (std::is_same_v<M, std::optional<double> S::*>) {
          take_number(place, key.name, node, (out.*member).emplace(), allowed);
        } else if constexpr (std::is_same_v<M, std::int64_t S::*>) {
          take_whole(place, key.name, node, out.*member, allowed);
        } else if constexpr (std::is_same_v<M, std::optional<std::int64_t> S::*>) {
          take_whole(place, key.name, node, (out.*member).emplace(), allowed);
        } else if constexpr (std::is_same_v<M, bool S::*>) {
          take(place, key.name, node, out.*member);
        }
      },
      key.member);
}

template <class S>
[[nodiscard]] std::string names_of(std::span<const Key<S>> keys) {
  std::string names;
  for (const Key<S>& key : keys) {
    names += (names.empty() ? "" : ", ") + std::string{key.name};
  }
  return names;
}

// Fills S from its table: unknown keys, wrong types, values out of range and missing required keys
// are problems. A mistyped key is unknown, and is then read as the one that is meant.
template <class S>
[[nodiscard]] S read_by_keys(const TomlPlace& place, std::span<const Key<S>> keys) {
  S out{};
  for (const auto& [written, node] : place.table) {
    const std::string_view name = written.str();
    if (std::none_of(keys.begin(), keys.end(),
                     [name](const Key<S>& key) { return key.name == name; })) {
      place.refuse(node, name, "no such key; known here: " + names_of(keys));
    }
  }
  for (const Key<S>& key : keys) {
    if (const toml::node* node = node_of(place.table, key.name)) {
      place.entry.written.emplace(key.name,
                                  WrittenKey{.line = line_of(*node), .text = found_text(*node)});
      take_member(place, key, *node, out);
    } else if (key.required) {
      place.missing(key.name, std::string{key.meaning});
    }
  }
  return out;
}

}  // namespace lostwork
