// The readings of one scan as numbers that the ledger can work with.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/cycle/number.h"
#include "thermo/reading.h"
#include "thermo/result.h"
#include "thermo/role.h"

#include <array>
#include <string_view>

namespace lostwork {

struct Inputs {
  Inputs();

  std::array<Result<Number>, measured_inputs> measured;
  Number casing_loss;  // share of the power
  Errors errors;

  [[nodiscard]] const Result<Number>& operator[](Role role) const {
    return measured.at(static_cast<std::size_t>(role));
  }
};

// A reading is refused: no_sensor, not_read (no answer), bad_quality, implausible (value or
// uncertainty not finite, absolute temperature or pressure not above 0, flow or power below 0 by
// more than 2 u), not_applicable (the role has a point on a second circuit; every role of the
// refrigerant, where one of them has).
[[nodiscard]] Inputs read_inputs(const MachineModel& model, const Scan& scan);

// "power", "casing loss", "suction quality".
[[nodiscard]] std::string_view input_name(std::size_t input);

// The roles from cold_in_temperature to power.
using UsableRoles = std::array<bool, measured_inputs>;
// The highest level whose own needs are met: L1 power and a flow, L2 both flows, L3 the two
// pressures, L4 the pressures, the three refrigerant temperatures and power; each with the four
// stream temperatures.
[[nodiscard]] Level level_of(const UsableRoles& usable);
[[nodiscard]] UsableRoles usable_roles(const Inputs& inputs);

}  // namespace lostwork
