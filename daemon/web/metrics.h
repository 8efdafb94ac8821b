// The plant's figures in OpenMetrics text (version 1.0.0). Pure.
//
// One gauge a quantity, named as everywhere else ("lostwork_power_kW"), and one for its standard
// uncertainty. What is missing has no sample, but one in lostwork_missing with its reason.
#pragma once

#include "daemon/plant_view.h"

#include <string>
#include <string_view>

namespace lostwork {

inline constexpr std::string_view openmetrics_type =
    "application/openmetrics-text; version=1.0.0; charset=utf-8";

[[nodiscard]] std::string metrics_text(const PlantView& view);

}  // namespace lostwork
