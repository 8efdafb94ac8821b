#include "thermo/role.h"

#include <array>
#include <cstddef>

namespace lostwork {
namespace {

struct Row {
  std::string_view name;
  Dimension dimension;
};

constexpr std::array<Row, static_cast<std::size_t>(Role::count)> rows{
    {
     {"cold.in.temperature", Dimension::temperature},
     {"cold.out.temperature", Dimension::temperature},
     {"cold.flow", Dimension::flow},
     {"hot.in.temperature", Dimension::temperature},
     {"hot.out.temperature", Dimension::temperature},
     {"hot.flow", Dimension::flow},
     {"suction.pressure", Dimension::pressure},
     {"suction.temperature", Dimension::temperature},
     {"discharge.pressure", Dimension::pressure},
     {"discharge.temperature", Dimension::temperature},
     {"liquid.temperature", Dimension::temperature},
     {"liquid.pressure", Dimension::pressure},
     {"evaporator_out.temperature", Dimension::temperature},
     {"power", Dimension::power},
     {"power.fan", Dimension::power},
     {"power.pump", Dimension::power},
     {"speed", Dimension::frequency},
     {"ambient.temperature", Dimension::temperature},
     {"ambient.humidity", Dimension::fraction},
     {"mode", Dimension::state},
     {"defrost", Dimension::state},
     {"leak.concentration", Dimension::concentration},
     {"oxygen", Dimension::concentration},
     }
};

}  // namespace

std::string_view name(Role role) {
  return rows.at(static_cast<std::size_t>(role)).name;
}

std::optional<Role> role_named(std::string_view name) {
  for (std::size_t i = 0; i < rows.size(); ++i) {
    if (rows.at(i).name == name) {
      return static_cast<Role>(i);
    }
  }
  return std::nullopt;
}

Dimension dimension(Role role) {
  return rows.at(static_cast<std::size_t>(role)).dimension;
}

}  // namespace lostwork
