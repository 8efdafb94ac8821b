#include "daemon/view.h"

#include "daemon/alarm_book.h"
#include "daemon/version.h"
#include "thermo/fluids/fluid.h"
#include "thermo/health/health.h"

#include <algorithm>
#include <utility>

namespace lostwork {
namespace {

PointView point_view(const PointSpec& point, double altitude_m) {
  const double per_SI = 1.0 / scale_SI(point.unit);
  return {.id = point.id,
          .name = {},
          .role = point.role,
          .circuit = point.circuit,
          .unit = std::string{name(point.unit)},
          .per_SI = per_SI,
          .offset = from_SI(point.unit, 0.0, altitude_m),
          .reading = {}};
}

MachineView machine_view(const PlantConfig& plant, const StepModel& model) {
  MachineView out;
  const MachineModel& machine = model.machine;
  out.id = machine.id;
  out.name = machine.name;
  out.duty = machine.duty;
  out.refrigerant = machine.refrigerant->name;
  out.rated_power_W = machine.rated_power_W;
  out.casing_surroundings_known = machine.casing_T_K.has_value();
  out.scan_period = machine.scan_period;
  for (const std::size_t i : points_of(plant.wiring, machine.id)) {
    out.points.push_back(point_view(plant.wiring.points[i], plant.wiring.altitude_m));
  }
  out.safety_rules = safety_rules(machine, model.alarms);
  return out;
}

// A constant is always good and tells of no device that answers.
void show_readings(MachineView& view, const Scan& scan, const AlarmRules& rules) {
  const auto constant = [&rules](std::size_t point) {
    return point < rules.device_of_point.size() && rules.device_of_point[point].empty();
  };
  for (std::size_t i = 0; i < view.points.size() && i < scan.readings.size(); ++i) {
    view.points[i].reading = scan.readings[i];
    if (scan.readings[i].quality == Quality::good && !constant(i)) {
      view.last_read = scan.time;
    }
  }
}

void show_alarms(PlantView& view, const Pipeline& pipeline) {
  view.alarms.clear();
  for (std::size_t m = 0; m < pipeline.size(); ++m) {
    for (const Alarm& alarm : current_alarms(pipeline.state(m).alarms)) {
      view.alarms.push_back({.machine = pipeline.model(m).machine.id, .alarm = alarm});
    }
  }
  std::stable_sort(view.alarms.begin(), view.alarms.end(),
                   [](const AlarmView& a, const AlarmView& b) {
                     return std::pair{a.alarm.priority, b.alarm.since} <
                            std::pair{b.alarm.priority, a.alarm.since};
                   });
}

}  // namespace

PlantView plant_view(const PlantConfig& plant, const Pipeline& pipeline) {
  PlantView out;
  out.site = plant.site;
  out.timezone = plant.timezone;
  out.version = version;
  for (std::size_t m = 0; m < pipeline.size(); ++m) {
    out.machines.push_back(machine_view(plant, pipeline.model(m)));
    refresh(out, m, pipeline);
  }
  return out;
}

void refresh(PlantView& view, std::size_t machine, const Pipeline& pipeline) {
  MachineView& shown = view.machines[machine];
  const StepModel& model = pipeline.model(machine);
  const MachineState& state = pipeline.state(machine);
  shown.latest = pipeline.last_step(machine).assessment;
  const LearningStatus learning = learning_status(model.health, state.health);
  shown.learning = {.learned = learning.learned, .text = text(learning, model.health.options)};
  shown.findings = open_findings(state.health);
  shown.run_time = state.operation.run_time;
  shown.starts = state.operation.starts_seen;
  show_readings(shown, pipeline.last_scan(machine), model.alarms);
  show_alarms(view, pipeline);
  ++view.revision;
}

}  // namespace lostwork
