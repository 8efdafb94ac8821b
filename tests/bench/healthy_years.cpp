// Counts alarms over many simulated healthy years of both machines: `healthy_years [SEEDS]` (20).
// The budget is one false drift alarm per machine and year over all charts together (goals E6).
#include "daemon/advance.h"
#include "sensors/demo_plant/plant_scan.h"

#include <array>
#include <cstdint>
#include <cstdlib>
#include <iostream>
#include <string>
#include <utility>
#include <vector>

namespace lostwork {
namespace {

constexpr Span scan_period{60000};
constexpr std::array machines{PlantMachine::chiller, PlantMachine::heat_pump};

struct Watched {
  StepModel model;
  MachineState state;
};

Watched watched(PlantMachine machine) {
  MachineModel model = plant_machine_model(machine);
  model.scan_period = scan_period;
  StepModel step = step_model(std::move(model), AlarmRules{});
  MachineState state = fitted(step, MachineState{});
  return {.model = std::move(step), .state = std::move(state)};
}

int tell_alarms(const std::vector<AlarmEvent>& events) {
  int count = 0;
  for (const AlarmEvent& event : events) {
    if (event.to == AlarmState::active_unacknowledged) {
      ++count;
      std::cout << "  " << event.text << '\n';
    }
  }
  return count;
}

int alarms_in_a_year(std::uint64_t seed) {
  PlantOptions options;
  options.seed = seed;
  Plant plant{options};
  std::array<Watched, machines.size()> all{watched(machines[0]), watched(machines[1])};
  int count = 0;
  const Instant end = options.start + std::chrono::days{365};
  while (plant.time() < end) {
    plant.step(scan_period);
    for (std::size_t m = 0; m < all.size(); ++m) {
      MachineStep step =
          advance(all.at(m).model, std::move(all.at(m).state), plant_scan(plant, machines.at(m)));
      all.at(m).state = std::move(step.next);
      count += tell_alarms(step.alarms);
    }
  }
  return count;
}

}  // namespace
}  // namespace lostwork

int main(int count, char** values) {
  const std::uint64_t seeds = count > 1 ? std::stoull(values[1]) : 20;
  int alarms = 0;
  for (std::uint64_t seed = 1; seed <= seeds; ++seed) {
    alarms += lostwork::alarms_in_a_year(seed);
    std::cout << seed << " years of 2 machines: " << alarms << " alarms" << std::endl;
  }
}
