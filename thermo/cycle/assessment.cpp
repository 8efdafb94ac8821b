#include "thermo/cycle/assessment.h"

#include <array>
#include <cstddef>

namespace lostwork {

std::string_view name(Mode mode) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(Mode::count)> names{
      "off", "starting", "running", "stopping", "defrost", "cycling", "unknown"};
  return names.at(static_cast<std::size_t>(mode));
}

std::string_view name(Level level) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(Level::count)> names{
      "L0", "L1", "L2", "L3", "L4", "L5"};
  return names.at(static_cast<std::size_t>(level));
}

}  // namespace lostwork
