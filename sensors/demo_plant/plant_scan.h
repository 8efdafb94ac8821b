// The simulated plant as the engine sees it, without registers and without a plant file: for tests
// of what comes after the sensors, many years at a time.
#pragma once

#include "sensors/demo_plant/plant.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/reading.h"

namespace lostwork {

// The same points, accuracies and pairs as config/examples/tern_quay_dairy.toml, in the order of
// instruments().
[[nodiscard]] MachineModel plant_machine_model(PlantMachine machine);

// What its instruments show now, with errors and noise but not rounded to registers; points of a
// silent device have quality timeout, of a broken sensor sentinel.
[[nodiscard]] Scan plant_scan(const Plant& plant, PlantMachine machine);

}  // namespace lostwork
