// One table of keys for each option struct: the reader, the checks and the printed list of keys all
// use it.
#pragma once

#include <cstdint>
#include <limits>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <variant>
#include <vector>

namespace lostwork {

// How one key of a table [x] or [[x]] of the plant file fills one member of its option struct S.
// Keys that hold tables or arrays (accuracy, range, streams) have readers of their own and stand
// here as `Other`.
struct Other {};

template <class S>
using Member = std::variant<std::string S::*, std::optional<std::string> S::*, double S::*,
                            std::optional<double> S::*, std::int64_t S::*,
                            std::optional<std::int64_t> S::*, bool S::*, Other>;

template <class S>
struct Key {
  std::string_view name;  // with its unit: "altitude_m"
  Member<S> member;
  std::string_view meaning;
  bool required = false;
  double min = -std::numeric_limits<double>::infinity();
  double max = std::numeric_limits<double>::infinity();
  std::span<const std::string_view> choices{};  // of a text; empty = any
};

// A row of the printed list of keys.
struct KeyRow {
  std::string table;
  std::string key;
  std::string allowed;
  std::string standard;  // the default, or "required"
  std::string meaning;
};

}  // namespace lostwork
