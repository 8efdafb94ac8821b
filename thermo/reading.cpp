#include "thermo/reading.h"

#include <array>
#include <cstddef>

namespace lostwork {
namespace {

constexpr std::array<std::string_view, static_cast<std::size_t>(Quality::count)> names{
    "good",    "stale", "sentinel", "out_of_range", "exception",
    "timeout", "stuck", "suspect",  "substituted"};

}  // namespace

std::string_view name(Quality quality) {
  return names.at(static_cast<std::size_t>(quality));
}

std::optional<Quality> quality_named(std::string_view name) {
  for (std::size_t i = 0; i < names.size(); ++i) {
    if (names.at(i) == name) {
      return static_cast<Quality>(i);
    }
  }
  return std::nullopt;
}

}  // namespace lostwork
