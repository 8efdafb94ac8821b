#include "thermo/cycle/inputs.h"

#include <algorithm>
#include <cmath>
#include <initializer_list>
#include <iterator>
#include <limits>
#include <numbers>

namespace lostwork {
namespace {

static_assert(static_cast<std::size_t>(Role::cold_in_temperature) == 0 &&
              static_cast<std::size_t>(Role::power) == 13);

// Dry saturated vapour may carry liquid: quality 0.98 to 1, all alike likely (engineering
// judgement, no published figure). The root mean square distance from 1.
constexpr double suction_quality_u = 0.02 / std::numbers::sqrt3;

Refusal refuse(ReasonCode code, Role role, double value_SI) {
  return Refusal{
      Reason{.code = code, .blame = name(role), .value_SI = value_SI}
  };
}

bool possible(Role role, const Reading& reading) {
  if (!std::isfinite(reading.value_SI) || !(std::isfinite(reading.u_SI) && reading.u_SI >= 0.0)) {
    return false;
  }
  switch (dimension(role)) {
    case Dimension::temperature:
    case Dimension::pressure: return reading.value_SI > 0.0;
    default: return reading.value_SI >= -2.0 * reading.u_SI;
  }
}

Result<Number> number_of(Role role, const Reading& reading) {
  if (reading.quality == Quality::timeout) {
    return refuse(ReasonCode::not_read, role, std::numeric_limits<double>::quiet_NaN());
  }
  if (reading.quality != Quality::good) {
    return refuse(ReasonCode::bad_quality, role, reading.value_SI);
  }
  if (!possible(role, reading)) {
    return refuse(ReasonCode::implausible, role, reading.value_SI);
  }
  return input<input_count>(reading.value_SI, static_cast<std::size_t>(role));
}

bool of_refrigerant(Role role) {
  return role >= Role::suction_pressure && role <= Role::evaporator_out_temperature;
}

void take(Inputs& inputs, const ModelPoint& point, const Reading& reading) {
  const auto slot = static_cast<std::size_t>(point.role);
  if (point.circuit != 1) {
    return;
  }
  inputs.measured.at(slot) = number_of(point.role, reading);
  if (inputs.measured.at(slot)) {
    inputs.errors.set_u(slot, reading.u_SI);
  }
}

// What is measured on a second circuit too is not the machine's own figure.
void refuse_second_circuit(Inputs& inputs, const ModelPoint& point) {
  const auto slot = static_cast<std::size_t>(point.role);
  if (point.circuit == 1 || slot >= measured_inputs) {
    return;
  }
  const auto circuit = static_cast<double>(point.circuit);
  inputs.measured.at(slot) = refuse(ReasonCode::not_applicable, point.role, circuit);
  for (std::size_t i = 0; i < measured_inputs && of_refrigerant(point.role); ++i) {
    if (of_refrigerant(static_cast<Role>(i))) {
      inputs.measured.at(i) = refuse(ReasonCode::not_applicable, point.role, circuit);
    }
  }
}

// GUM F.1.2.3: the errors of a matched pair's points have a part in common.
void correlate_pair(Inputs& inputs, const ModelPoint& a, const ModelPoint& b) {
  const auto first = static_cast<std::size_t>(a.role);
  const auto second = static_cast<std::size_t>(b.role);
  if (a.pair && a.pair == b.pair && first != second && first < measured_inputs &&
      second < measured_inputs && inputs[a.role] && inputs[b.role]) {
    inputs.errors.correlate(first, second, std::sqrt(a.shared_variance * b.shared_variance));
  }
}

void correlate_pairs(Inputs& inputs, const MachineModel& model) {
  for (auto a = model.points.begin(); a != model.points.end(); ++a) {
    for (auto b = std::next(a); b != model.points.end(); ++b) {
      correlate_pair(inputs, *a, *b);
    }
  }
}

bool all(const UsableRoles& usable, std::initializer_list<Role> roles) {
  return std::ranges::all_of(
      roles, [&usable](Role role) { return usable.at(static_cast<std::size_t>(role)); });
}

}  // namespace

Inputs::Inputs() {
  for (std::size_t i = 0; i < measured_inputs; ++i) {
    const auto role = static_cast<Role>(i);
    measured.at(i) = refuse(ReasonCode::no_sensor, role, std::numeric_limits<double>::quiet_NaN());
  }
}

Inputs read_inputs(const MachineModel& model, const Scan& scan) {
  Inputs inputs;
  for (std::size_t i = 0; i < model.points.size(); ++i) {
    if (static_cast<std::size_t>(model.points[i].role) < measured_inputs) {
      take(inputs, model.points[i], i < scan.readings.size() ? scan.readings[i] : Reading{});
    }
  }
  for (const ModelPoint& point : model.points) {
    refuse_second_circuit(inputs, point);
  }
  correlate_pairs(inputs, model);
  inputs.casing_loss = input<input_count>(model.casing_loss.value, casing_loss_input);
  inputs.errors.set_u(casing_loss_input, model.casing_loss.u);
  inputs.errors.set_u(suction_quality_input, suction_quality_u);
  return inputs;
}

std::string_view input_name(std::size_t input) {
  if (input == casing_loss_input) {
    return "casing loss";
  }
  return input == suction_quality_input ? "suction quality" : name(static_cast<Role>(input));
}

UsableRoles usable_roles(const Inputs& inputs) {
  UsableRoles usable{};
  for (std::size_t i = 0; i < measured_inputs; ++i) {
    usable.at(i) = inputs.measured.at(i).has_value();
  }
  return usable;
}

Level level_of(const UsableRoles& usable) {
  using enum Role;
  if (!all(usable,
           {cold_in_temperature, cold_out_temperature, hot_in_temperature, hot_out_temperature})) {
    return Level::L0;
  }
  const bool pressures = all(usable, {suction_pressure, discharge_pressure});
  const bool has_power = all(usable, {power});
  if (pressures && has_power &&
      all(usable, {suction_temperature, discharge_temperature, liquid_temperature})) {
    return Level::L4;
  }
  if (pressures) {
    return Level::L3;
  }
  if (has_power && all(usable, {cold_flow, hot_flow})) {
    return Level::L2;
  }
  return has_power && (all(usable, {cold_flow}) || all(usable, {hot_flow})) ? Level::L1 : Level::L0;
}

}  // namespace lostwork
