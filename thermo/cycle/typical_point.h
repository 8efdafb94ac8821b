// What a machine's sensors would read at a typical operating point.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/cycle/number.h"
#include "thermo/result.h"

#include <array>

namespace lostwork {

// By role, from cold_in_temperature to power; flows in m3/s, or kg/s where the machine has a mass
// flow point. The point is described at typical_scan in requirements.h.
// Refuses: outside_fluid, not_converged.
using TypicalValues = std::array<double, measured_inputs>;
[[nodiscard]] Result<TypicalValues> typical_values(const MachineModel& model);

}  // namespace lostwork
