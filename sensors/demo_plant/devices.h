// Names of what faults can hit besides the machines.
#pragma once

#include <span>
#include <string_view>

namespace lostwork {

[[nodiscard]] std::span<const std::string_view> plant_device_ids();
[[nodiscard]] std::span<const std::string_view> plant_temperature_sensors();

}  // namespace lostwork
