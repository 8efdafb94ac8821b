// Which cause explains how the features moved: faults of the machine against sensors that read
// wrong.
//
// Pure. Every cause has a trace: the direction in which it moves the features. A fault of the
// machine moves the one feature that is its own (methods.md 6.3) and, by a share that differs
// between machines, a few others; a biased sensor moves what is computed from it, and the
// conditions too: that trace is computed from the baseline and the equation of state. The residuals
// are normal about amount * trace, with their own uncertainty and that of the trace; each cause
// gets the likelihood of its best amount.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/health/baseline.h"
#include "thermo/health/features.h"
#include "thermo/health/finding.h"
#include "thermo/measured.h"

#include <array>
#include <optional>
#include <vector>

namespace lostwork {

// How far each feature stands from the baseline, in its residual's unit; none: not compared.
using Shift = std::array<std::optional<Measured>, feature_count>;

struct Diagnosis {
  std::vector<RankedCause> causes;  // most likely first
  bool clear = false;               // the first is at least `margin` times as likely as the second
  bool explained = false;           // the first beats "nothing has happened" beyond chance
};

struct DiagnosisInput {
  Shift shift;
  Inputs inputs;  // where the machine runs now
};

[[nodiscard]] Diagnosis diagnose(const MachineModel& machine, const Baseline& baseline,
                                 const DiagnosisInput& input, double margin);

// The features that diagnosis compares: neither the power nor the lost-work lines, which follow,
// and of the subcooling the share, which fouling leaves alone.
[[nodiscard]] bool compared(Feature feature);

}  // namespace lostwork
