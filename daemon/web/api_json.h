// The bodies of the API as JSON. Pure. Described by openapi.json, to which tests hold them.
//
// Figures are in the units that their names end in; u is the standard uncertainty (k = 1), and
// decimals say how many of them are worth showing. A missing figure carries its reason. A machine
// that is not read shows nothing old as if it were new: all its quantities are missing.
#pragma once

#include "daemon/local_time.h"
#include "daemon/plant_view.h"
#include "storage/history.h"

#include <string>
#include <vector>

namespace lostwork {

[[nodiscard]] bool is_read(const MachineView& machine, Instant now);
// The latest values, or none at all of a machine that is not read.
[[nodiscard]] QuantityValues current_values(const MachineView& machine, Instant now);

[[nodiscard]] std::string machines_json(const PlantView& view, const UtcOffset& offset);
[[nodiscard]] std::string assessment_json(const MachineView& machine, Instant now);
[[nodiscard]] std::string alarms_json(const PlantView& view);
[[nodiscard]] std::string findings_json(const PlantView& view, const UtcOffset& offset);
[[nodiscard]] std::string quantities_json();
[[nodiscard]] std::string trend_json(const TrendRequest& request,
                                     const std::vector<Bucket>& buckets);
[[nodiscard]] std::string health_json(const PlantView& view);
// What an open page is told at a change: the sentences, and that there is more to ask for.
[[nodiscard]] std::string event_json(const PlantView& view, const UtcOffset& offset);

}  // namespace lostwork
