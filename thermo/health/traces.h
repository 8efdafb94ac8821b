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
  bool either_sign = false;  // a sensor may read too high or too low; a fault has one sign
  double unit_SI = 1.0;      // amount 1 is so much: K, a ratio, or the sensor's unit
  std::array<double, feature_count> mean{};
  std::array<double, feature_count> tolerance{};  // standard deviation between machines
};

// Directions after methods.md 6.1 to 6.3; the tolerances are engineering judgement.
[[nodiscard]] std::vector<Trace> machine_traces();

// One for each input that is there and moves something, at the conditions given.
[[nodiscard]] std::vector<Trace> sensor_traces(const MachineModel& machine,
                                               const Baseline& baseline, const Inputs& inputs);

}  // namespace lostwork
