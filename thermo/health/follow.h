// After each closed day: charts, and what they make of the findings.
//
// Pure, part of health.h.
#pragma once

#include "thermo/health/health.h"

#include <vector>

namespace lostwork {

// Takes the day into the charts.
void chart_day(const HealthOptions& options, HealthState& state, const DayRecord& day);

// Adds the day to those that are remembered.
void keep_day(HealthState& state, const DayRecord& day);

// Opens, changes and ends findings; hands back those that are new or changed. `now`: end of the
// day.
[[nodiscard]] std::vector<Finding> follow(const HealthModel& model, HealthState& state,
                                          Instant now);

}  // namespace lostwork
