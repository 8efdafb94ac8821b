// A plant that exists in tests alone: Tern Quay Dairy with a chiller and a heat pump. Every figure
// is invented; the chiller's ledger adds up.
#pragma once

#include "daemon/plant_view.h"
#include "storage/history.h"

#include <vector>

namespace lostwork {

// 3 May 2024, 12:00 UTC.
[[nodiscard]] Instant made_up_noon();
// The chiller has drifted and has an alarm, the heat pump is well; all is read at made_up_noon().
[[nodiscard]] PlantView made_up_plant();
// A day's wave in buckets, with a hole in its middle.
[[nodiscard]] std::vector<Bucket> made_up_trend(const TrendRequest& request);

}  // namespace lostwork
