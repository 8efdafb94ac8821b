// One assessment with all quantities, uncertainties and sensitivities, beside the property calls
// that it cannot do without.
#include "sensors/demo_plant/plant_scan.h"
#include "thermo/cycle/ledger.h"
#include "thermo/fluids/state.h"

#include <benchmark/benchmark.h>

namespace lostwork {
namespace {

struct Running {
  MachineModel model = plant_machine_model(PlantMachine::chiller);
  Scan scan;

  Running() {
    Plant plant{PlantOptions{}};
    while (!plant.truth()[PlantMachine::chiller].running) {
      plant.step(Span{60000});
    }
    scan = plant_scan(plant, PlantMachine::chiller);
  }
};

void assessment(benchmark::State& run) {
  const Running machine;
  for (auto _ : run) {
    benchmark::DoNotOptimize(assess(machine.model, machine.scan, Mode::running));
  }
}
BENCHMARK(assessment);

// Two saturations, three single-phase states, one by entropy, four of water.
void its_property_calls(benchmark::State& run) {
  const Fluid& fluid = *fluid_named("R134a");
  const StreamFluid water = WaterStream{};
  for (auto _ : run) {
    const auto low = saturation_at_p(fluid, 350e3);
    const auto high = saturation_at_p(fluid, 900e3);
    const auto suction = state(fluid, GivenTp{.T_K = low->vapour.T_K + 5.0, .p_Pa = 350e3});
    benchmark::DoNotOptimize(state(fluid, GivenTp{.T_K = high->vapour.T_K + 15.0, .p_Pa = 900e3}));
    benchmark::DoNotOptimize(state(fluid, GivenTp{.T_K = high->liquid.T_K - 4.0, .p_Pa = 900e3}));
    benchmark::DoNotOptimize(state(fluid, GivenPs{.p_Pa = 900e3, .s_JkgK = suction->s_JkgK}));
    for (const double T_K : {280.0, 285.0, 303.0, 308.0}) {
      benchmark::DoNotOptimize(stream_state(water, T_K));
    }
  }
}
BENCHMARK(its_property_calls);

}  // namespace
}  // namespace lostwork
