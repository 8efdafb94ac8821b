#include "sensors/demo_plant/plant_scan.h"

#include "sensors/demo_plant/instrument.h"
#include "sensors/demo_plant/tern_quay.h"

#include <numbers>
#include <utility>

namespace lostwork {
namespace {

// As written in config/examples/tern_quay_dairy.toml.
constexpr double casing_loss = 0.06;
constexpr double casing_loss_limit = 0.04;

// Share of the variance that two instruments have in common when their difference is known better.
double shared_variance(const Instrument& instrument) {
  if (!instrument.pair) {
    return 0.0;
  }
  const double limit = std::get<AccuracyLimit>(instrument.point.accuracies.front()).limit;
  const double ratio = instrument.pair->difference_limit / limit;
  return 1.0 - 0.5 * ratio * ratio;
}

}  // namespace

MachineModel plant_machine_model(PlantMachine machine) {
  const bool chiller = machine == PlantMachine::chiller;
  MachineModel model;
  model.id = id(machine);
  model.name = chiller ? "Chiller 1" : "Heat pump 1";
  model.duty = chiller ? Duty::cooling : Duty::heating;
  model.refrigerant = fluid_named("R134a");
  model.rated_power_W = (chiller ? tern_quay_chiller() : tern_quay_heat_pump()).rated_power_W;
  model.casing_loss = {.value = casing_loss, .u = casing_loss_limit / std::numbers::sqrt3};
  for (const Instrument& instrument : instruments()) {
    if (instrument.point.machine != model.id) {
      continue;
    }
    ModelPoint point;
    point.id = instrument.point.id;
    point.role = instrument.point.role;
    if (instrument.pair) {
      point.pair = instrument.pair->number;
      point.shared_variance = shared_variance(instrument);
    }
    model.points.push_back(std::move(point));
  }
  return model;
}

Scan plant_scan(const Plant& plant, PlantMachine machine) {
  Scan scan;
  scan.time = plant.time();
  for (std::size_t i = 0; i < instruments().size(); ++i) {
    const PointSpec& point = instruments()[i].point;
    if (point.machine != id(machine)) {
      continue;
    }
    const auto value = shown(plant, i);
    if (!plant.answers(std::get<FromRegister>(point.source).device)) {
      scan.readings.push_back(missing(Quality::timeout, scan.time));
    } else if (!value) {
      scan.readings.push_back(missing(Quality::sentinel, scan.time));
    } else {
      scan.readings.push_back(reading_of(point, *value, plant_altitude_m, scan.time));
    }
  }
  return scan;
}

}  // namespace lostwork
