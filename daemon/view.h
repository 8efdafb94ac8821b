// What page and API are shown, made from the machines' states.
#pragma once

#include "config/plant_config.h"
#include "daemon/pipeline.h"
#include "daemon/plant_view.h"

#include <cstddef>

namespace lostwork {

// Everything that does not change from scan to scan.
[[nodiscard]] PlantView plant_view(const PlantConfig& plant, const Pipeline& pipeline);

// After a scan of that machine, or after a change of its alarms.
void refresh(PlantView& view, std::size_t machine, const Pipeline& pipeline);

}  // namespace lostwork
