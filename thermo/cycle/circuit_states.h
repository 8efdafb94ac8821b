// The refrigerant's states around the circuit, from pressures and temperatures.
//
// Suction (1), discharge (2), liquid before the valve (3), evaporator inlet (4) and outlet (1e).
// Derivatives by the property's own identities, none by differences.
#pragma once

#include "thermo/cycle/inputs.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/cycle/number.h"
#include "thermo/result.h"

#include <optional>

namespace lostwork {

struct Node {
  Number h_Jkg;
  Number s_JkgK;
};

struct CircuitStates {
  Result<Number> evaporating_T_K;  // dew at the suction pressure
  Result<Number> condensing_T_K;   // dew at the discharge pressure
  Result<Number> pressure_ratio;
  Result<Number> superheat_K;
  Result<Number> subcooling_K;
  Result<Node> suction;
  Result<Node> discharge;
  Result<Node> liquid;
  Result<Node> valve_out;
  Result<Node> evaporator_out;  // the suction state where its temperature is not usable
  bool has_suction_line = false;
  Result<Number> isentropic_h_Jkg;  // at the discharge pressure, with the suction entropy
};

// `idle`: why the machine's balance has no meaning now; then the states, superheat and subcooling
// carry that reason, and what the pressures tell stays.
// Rules near saturation, u being the standard uncertainty of the distance from it:
// - vapour below saturation by up to 2 u, and in a flooded evaporator up to u above it, is dry
//   saturated; at the suction with a quality of 0.98 to 1;
// - liquid less than u below its bubble temperature, or up to 2 u above it, is saturated liquid;
// - further on the wrong side: contradicts.
// The liquid's pressure is that of its own sensor, or the discharge pressure where that is not
// usable. Refuses: as the readings, outside_fluid, not_converged, contradicts (also suction above
// discharge pressure by more than 2 u in a machine at work).
[[nodiscard]] CircuitStates circuit_states(const MachineModel& model, const Inputs& inputs,
                                           const std::optional<Reason>& idle);

}  // namespace lostwork
