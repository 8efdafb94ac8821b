// What `lostwork props` is asked: which two figures are given, and the points.
#pragma once

#include "thermo/fluids/state.h"

#include <array>
#include <filesystem>
#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include <tl/expected.hpp>

namespace lostwork {

using Point = std::array<double, 2>;  // in the order and the customary units of the pair

struct GivenPair {
  std::string_view name;                    // "T,p"
  std::array<std::string_view, 2> columns;  // "T_degC", "p_kPa"
  Result<State> (*answer)(const Fluid& fluid, const Point& point);
};

[[nodiscard]] std::span<const GivenPair> given_pairs();
[[nodiscard]] const GivenPair* given_pair(std::string_view name);  // null where there is none

// A finite number that fills the text.
[[nodiscard]] std::optional<double> finite_number(std::string_view text);

// The points of a CSV whose header names the pair's columns, in either order; other columns are
// passed over. The error is one sentence with file, line, column, value and what is allowed.
[[nodiscard]] tl::expected<std::vector<Point>, std::string> read_points(
    const std::filesystem::path& file, const GivenPair& pair);

}  // namespace lostwork
