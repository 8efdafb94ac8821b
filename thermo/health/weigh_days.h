// What the closed days say together: how far each feature stands, since when, and what it has cost.
//
// Pure, part of health.h.
#pragma once

#include "thermo/health/diagnosis.h"
#include "thermo/health/health.h"
#include "thermo/health/onset.h"

#include <array>
#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

// Standard uncertainty of one day's residual: day-to-day scatter, widened for autocorrelation.
[[nodiscard]] double day_u(const Baseline& baseline, Feature feature);

// The last days with residuals, at most a fortnight and not before `from_day`.
[[nodiscard]] std::vector<const DayRecord*> last_days(const HealthState& state,
                                                      std::int64_t from_day);

// Means over those days.
[[nodiscard]] Shift shift_of(const Baseline& baseline, const std::vector<const DayRecord*>& days);

// Onset of a rise of sign * residual of the feature; days before state.history_from left out.
[[nodiscard]] Result<OnsetEstimate> onset_of(const HealthState& state, Feature feature,
                                             double sign);

struct Cost {
  Measured energy_J;
  double compared_share = 1.0;
};
[[nodiscard]] Cost cost_since(const HealthState& state, std::int64_t from_day);

// Mean power that was expected on those days, W.
[[nodiscard]] double expected_power_W(const std::vector<const DayRecord*>& days,
                                      const Shift& shift);

// Expected and found means of every feature that people can be shown.
[[nodiscard]] std::vector<Evidence> evidence_of(const Baseline& baseline,
                                                const std::vector<const DayRecord*>& days,
                                                const Shift& shift);

}  // namespace lostwork
