// One trial of the refrigerant's round: for given saturation temperatures of both shells, what the
// compressor, the valve and the exchangers would do. The solvers of machine.cpp turn its residuals
// to zero.
#pragma once

#include "sensors/demo_plant/machine.h"

namespace lostwork {

// What stays the same during the trials of one step.
struct CycleFrame {
  const MachineParameters* machine;
  const Refrigerant* refrigerant;
  MachineInlet inlet;
  MachineHealth health;
  double capacity;
  double superheat_K;  // wanted; less where the water is not warm enough for it
  // From the step before: they change slowly and only correct small terms.
  double refrigerant_kgs;
  double motor_heat_W;
  double casing_T_K;
  // Made from the above by frame().
  double cold_capacity_WK;  // m cp of the water
  double hot_capacity_WK;
  double evaporator_effectiveness;
  double condenser_effectiveness;  // of the condensing part
  double subcooler_WK;             // UA of the part that liquid floods
  double liquid_quality;           // flash gas of a short charge
};

struct CycleFrameInput {
  MachineInlet inlet;
  MachineHealth health;
  double capacity;
};
[[nodiscard]] CycleFrame frame(const MachineParameters& machine, const Refrigerant& refrigerant,
                               const CycleFrameInput& input, const MachineMemory& state);

struct Saturations {
  double evaporating_T_K;
  double condensing_T_K;
};

// A truth without storage terms, entropies and outlet temperatures; full() adds these. Only the
// heats of the two shells decide a trial.
struct CycleTrial {
  MachineTruth truth;
  double evaporator_refrigerant_W;  // heat that the refrigerant takes from the evaporator's shell
  double condenser_refrigerant_W;   // heat that it gives to the condenser's shell
  double shaft_W;
  double motor_heat_W;
};
[[nodiscard]] CycleTrial trial(const CycleFrame& frame, const Saturations& at);

// Outlet temperatures, storage and entropy generation of a trial that balances.
[[nodiscard]] MachineTruth full(const CycleFrame& frame, const CycleTrial& trial);

}  // namespace lostwork
