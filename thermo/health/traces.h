// The traces that causes leave in the features.
//
// Pure. In natural units (FeatureInfo::natural) per unit of the cause's amount.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/health/baseline.h"
#include "thermo/health/features.h"
#include "thermo/health/finding.h"

#include <array>
#include <optional>
#include <vector>

namespace lostwork {

struct Trace {
  Cause cause{};
  std::optional<Role> role;
  double unit_SI = 1.0;  // amount 1 is so much: K, a ratio, or the sensor's unit, signed
  std::array<double, feature_count> mean{};
  std::array<double, feature_count> tolerance{};  // standard deviation between machines
};

// Directions after methods.md 6.1 to 6.3; the tolerances are engineering judgement.
[[nodiscard]] std::vector<Trace> machine_traces();

// A bias that is plain to see and small enough to begin a search with; K, or in the input's unit.
[[nodiscard]] double first_bias_SI(Input input, double value_SI);

// What a bias of one sensor leaves: the residuals as the inputs are now, less those without it.
// Exact for that bias alone: a search repeats it until the bias found is the bias assumed. None
// where the input is missing, moves nothing, or cannot be that far off: a residual is lost.
[[nodiscard]] std::optional<Trace> sensor_trace(const MachineModel& machine,
                                                const Baseline& baseline, const Inputs& inputs,
                                                Input input, double bias_SI);

}  // namespace lostwork
