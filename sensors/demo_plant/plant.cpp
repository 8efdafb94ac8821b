#include "sensors/demo_plant/plant.h"

#include "sensors/demo_plant/devices.h"
#include "sensors/demo_plant/noise.h"
#include "sensors/demo_plant/tern_quay.h"

#include <algorithm>

namespace lostwork {
namespace {

constexpr std::array<std::string_view, plant_machine_count> machine_ids{"chiller-1", "heatpump-1"};
constexpr Span longest_step{60000};
constexpr std::uint64_t superheat_stream = 100;  // of the chiller; the heat pump has the next
constexpr double superheat_sd_K = 0.15;

Machine made(PlantMachine machine) {
  return machine == PlantMachine::chiller ? Machine{tern_quay_chiller(), plant_r134a()}
                                          : Machine{tern_quay_heat_pump(), plant_r134a()};
}

PlantMachine machine_named(std::string_view name) {
  return name == machine_ids[0] ? PlantMachine::chiller : PlantMachine::heat_pump;
}

// Turns "five percent of power after 60 days" into a rate and a limit.
void work_out_goal(PlantFault& fault) {
  if (!fault.goal) {
    return;
  }
  const PlantMachine machine = machine_named(fault.target);
  const RatingPoint& rating =
      machine == PlantMachine::chiller ? chiller_rating() : heat_pump_rating();
  const double size = fault.kind == FaultKind::compressor_wear
                          ? wear_for(made(machine), rating, fault.goal->extra_power)
                          : fouling_for(made(machine), rating, fault.goal->extra_power);
  using Days = std::chrono::duration<double, std::chrono::days::period>;
  fault.size = size / Days{fault.goal->after}.count();
  fault.limit = size;
}

template <class Names>
bool known(const Names& names, const std::string& name) {
  return std::find(names.begin(), names.end(), name) != names.end();
}

void check_target(const PlantFault& fault) {
  const FaultTargets targets = plant_fault_targets();
  auto names = targets.machines;
  if (fault.kind == FaultKind::sensor_drift || fault.kind == FaultKind::sensor_broken) {
    names = targets.sensors;
  } else if (fault.kind == FaultKind::device_silent) {
    names = targets.devices;
  }
  if (!known(names, fault.target)) {
    throw BadFault{"fault: " + std::string{name(fault.kind)} + " of \"" + fault.target +
                   "\", which this plant does not have"};
  }
}

}  // namespace

std::string_view id(PlantMachine machine) {
  return machine_ids.at(static_cast<std::size_t>(machine));
}

FaultTargets plant_fault_targets() {
  return {.machines = machine_ids,
          .sensors = plant_temperature_sensors(),
          .devices = plant_device_ids()};
}

Plant::Plant(const PlantOptions& options)
    : seed_{options.seed},
      faults_{options.faults},
      site_{options.seed, options.start},
      machines_{made(PlantMachine::chiller), made(PlantMachine::heat_pump)} {
  for (PlantFault& fault : faults_) {
    check_target(fault);
    work_out_goal(fault);
  }
  truth_.time = options.start;
  truth_.site = site_.truth();
  step(Span{1});  // so that there is a truth from the first moment on
}

void Plant::step(Span dt) {
  const std::int64_t parts = (dt + longest_step - Span{1}) / longest_step;
  Instant from = truth_.time;
  const Instant begin = from;
  for (std::int64_t i = 1; i <= parts; ++i) {
    const Instant to = begin + dt * i / parts;
    substep(to, to - from);
    from = to;
  }
}

void Plant::substep(Instant to, Span dt) {
  truth_.time = to;
  site_.set_weather(to);
  const std::array<MachineInlet, plant_machine_count> inlets{
      site_.chiller_inlet(to, flow_loss(PlantMachine::chiller)),
      site_.heat_pump_inlet(to, flow_loss(PlantMachine::heat_pump))};
  const std::array<double, plant_machine_count> most{1.0, site_.heat_pump_limit()};
  for (std::size_t i = 0; i < plant_machine_count; ++i) {
    const bool was_running = truth_.machines.at(i).running;
    const NoiseStream valve{.seed = seed_, .stream = superheat_stream + i};
    const MachineOrder order{
        .dt = dt,
        .most_capacity = most.at(i),
        .superheat_noise_K = superheat_sd_K * wander(valve, to, std::chrono::seconds{90})};
    truth_.machines.at(i) =
        machines_.at(i).step(inlets.at(i), health(static_cast<PlantMachine>(i)), order);
    count(i, dt);
    truth_.counters.at(i).starts += !was_running && truth_.machines.at(i).running ? 1U : 0U;
  }
  site_.advance(to, dt, truth_[PlantMachine::chiller], truth_[PlantMachine::heat_pump]);
  truth_.site = site_.truth();
  truth_.site.refrigerant_in_air = refrigerant_in_air();
}

void Plant::count(std::size_t machine, Span dt) {
  const MachineTruth& truth = truth_.machines.at(machine);
  PlantCounters& counters = truth_.counters.at(machine);
  const double seconds = Seconds{dt}.count();
  counters.energy_J += truth.power_W * seconds;
  counters.cold_heat_J += truth.cold_heat_W * seconds;
  counters.hot_heat_J += truth.hot_heat_W * seconds;
  counters.running += truth.running ? dt : Span{0};
}

MachineHealth Plant::health(PlantMachine machine) const {
  constexpr double most = 0.5;  // beyond that the machine's own safety devices would stop it
  return {.fouling = extent_of(FaultKind::condenser_fouling, id(machine)),
          .charge_lost = std::min(extent_of(FaultKind::refrigerant_leak, id(machine)), most),
          .wear = std::min(extent_of(FaultKind::compressor_wear, id(machine)), most)};
}

// What leaks in the plant room is carried off by its ventilation; all figures invented.
double Plant::refrigerant_in_air() const {
  constexpr double charge_kg = 90.0;
  constexpr double air_m3_per_day = 12e3;
  constexpr double vapour_kgm3 = 4.25;  // R134a at room temperature and pressure, from memory
  double leaked_kg_per_day = 0.0;
  for (const PlantFault& fault : faults_) {
    const bool leaks = fault.kind == FaultKind::refrigerant_leak &&
                       fault.extent(truth_.time) > 0.0 &&
                       fault.extent(truth_.time) < fault.limit.value_or(1.0);
    leaked_kg_per_day += leaks ? charge_kg * fault.size : 0.0;
  }
  return leaked_kg_per_day / air_m3_per_day / vapour_kgm3;
}

double Plant::flow_loss(PlantMachine machine) const {
  double left = 1.0;
  for (const PlantFault& fault : faults_) {
    if (fault.kind == FaultKind::low_condenser_flow && fault.target == id(machine)) {
      left *= 1.0 - fault.extent(truth_.time);
    }
  }
  return 1.0 - left;
}

double Plant::truth_extra_power_percent(PlantMachine machine) const {
  const MachineTruth& now = truth_[machine];
  if (!now.running) {
    return 0.0;
  }
  const Machine& model = machines_.at(static_cast<std::size_t>(machine));
  const double heat_W =
      model.parameters().product == ProductSide::cold ? now.cold_heat_W : now.hot_heat_W;
  MachineInlet well = now.inlet;
  well.hot_kgs /= 1.0 - flow_loss(machine);
  const double sick_W = steady_point(model, now.inlet, now.health, heat_W).power_W;
  const double well_W = steady_point(model, well, {}, heat_W).power_W;
  return 100.0 * (sick_W / well_W - 1.0);
}

bool Plant::answers(std::string_view device) const {
  return extent_of(FaultKind::device_silent, device) == 0.0;
}

double Plant::drift_K(std::string_view sensor) const {
  return extent_of(FaultKind::sensor_drift, sensor);
}

bool Plant::broken(std::string_view sensor) const {
  return extent_of(FaultKind::sensor_broken, sensor) > 0.0;
}

double Plant::extent_of(FaultKind kind, std::string_view target) const {
  double sum = 0.0;
  for (const PlantFault& fault : faults_) {
    if (fault.kind == kind && fault.target == target) {
      sum += fault.extent(truth_.time);
    }
  }
  return sum;
}

}  // namespace lostwork
