// Heat and entropy of the whole machine and of its components.
#pragma once

#include "thermo/cycle/circuit_states.h"
#include "thermo/cycle/inputs.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/cycle/number.h"
#include "thermo/result.h"

namespace lostwork {

// What the two streams and the power meter tell. W, K.
struct MeteredMachine {
  Result<Number> power_W;
  Result<Number> cold_heat_W;
  Result<Number> hot_heat_W;
  Result<Number> cold_T_K;  // entropic means
  Result<Number> hot_T_K;
};

// Entropy generated, W/K; one heat flow for both sides of each exchanger, the refrigerant's.
struct ComponentEntropy {
  Result<Number> compressor;  // with its drive and its casing
  Result<Number> condenser;
  Result<Number> expansion;
  Result<Number> evaporator;
  Result<Number> lines;  // the suction line
};

struct MachineBalance {
  Result<Number> flow_kgs;    // refrigerant: the mean of least variance of both meters' figures
  Result<Number> around_T_K;  // of the casing's surroundings
  Result<Number> casing_W;    // heat from the casing, less what the suction line takes up
  Result<Number> product_W;   // useful heat: metered, or from the balance where only the other
                              // stream has a meter
  ComponentEntropy entropy_WK;
  Result<Number> total_WK;
};

// The routes and refusals are those of ledger.h.
[[nodiscard]] MachineBalance machine_balance(const MachineModel& model, const Inputs& inputs,
                                             const MeteredMachine& metered,
                                             const CircuitStates& states);

}  // namespace lostwork
