// What a point measures on its machine.
#pragma once

#include <cstdint>
#include <optional>
#include <string_view>

namespace lostwork {

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class Role : std::uint8_t {
  cold_in_temperature = 0,
  cold_out_temperature = 1,
  cold_flow = 2,
  hot_in_temperature = 3,
  hot_out_temperature = 4,
  hot_flow = 5,
  suction_pressure = 6,
  suction_temperature = 7,
  discharge_pressure = 8,
  discharge_temperature = 9,
  liquid_temperature = 10,
  liquid_pressure = 11,
  evaporator_out_temperature = 12,
  power = 13,
  power_fan = 14,
  power_pump = 15,
  speed = 16,
  ambient_temperature = 17,
  ambient_humidity = 18,
  mode = 19,
  defrost = 20,
  leak_concentration = 21,
  oxygen = 22,
  count
};

// What kind of quantity a role is; decides which units its point may have.
enum class Dimension : std::uint8_t {
  temperature,    // K
  pressure,       // Pa absolute
  flow,           // m3/s, or kg/s for a point whose unit is a mass flow
  power,          // W
  frequency,      // Hz
  fraction,       // 1 (relative humidity, valve position)
  concentration,  // 1 (volume fraction; 1 ppm = 1e-6)
  state           // whole number without a unit (mode, defrost)
};

// "cold.in.temperature", as in the plant file.
[[nodiscard]] std::string_view name(Role role);
[[nodiscard]] std::optional<Role> role_named(std::string_view name);
[[nodiscard]] Dimension dimension(Role role);

}  // namespace lostwork
