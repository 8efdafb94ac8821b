#include "tests/thermo/cycle/test_machine.h"

#include <algorithm>
#include <cmath>
#include <limits>
#include <string>

#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

constexpr Instant noon{Span{1'700'000'000'000}};

double mean_T_K(const StreamFluid& fluid, double in_T_K, double out_T_K) {
  const StreamState in = stream_state(fluid, in_T_K).value();
  const StreamState out = stream_state(fluid, out_T_K).value();
  return (out.h_Jkg - in.h_Jkg) / (out.s_JkgK - in.s_JkgK);
}

double volume_flow_m3s(const StreamFluid& fluid, double in_T_K, double out_T_K, double heat_W) {
  const StreamState in = stream_state(fluid, in_T_K).value();
  const StreamState out = stream_state(fluid, out_T_K).value();
  return heat_W / std::abs(out.h_Jkg - in.h_Jkg) / in.rho_kgm3;
}

// A gas at the saturation temperature itself is on the line.
State gas(const Fluid& fluid, double p_Pa, double T_K, double superheat_K) {
  return superheat_K > 0.0 ? state(fluid, GivenTp{T_K, p_Pa}).value()
                           : saturation_at_p(fluid, p_Pa).value().vapour;
}

Truth truth_of(const Fluid& fluid, const Cycle& cycle) {
  Truth t{};
  const double low_Pa = saturation_at_T(fluid, cycle.evaporating_T_K).value().vapour.p_Pa;
  const double high_Pa = saturation_at_T(fluid, cycle.condensing_T_K).value().vapour.p_Pa;
  const double outlet_K = cycle.superheat_K - cycle.line_gain_K;
  t.suction = gas(fluid, low_Pa, cycle.evaporating_T_K + cycle.superheat_K, cycle.superheat_K);
  t.evaporator_out = gas(fluid, low_Pa, cycle.evaporating_T_K + outlet_K, outlet_K);
  const double ideal = state(fluid, GivenPs{high_Pa, t.suction.s_JkgK}).value().h_Jkg;
  const double h2 = t.suction.h_Jkg + (ideal - t.suction.h_Jkg) / cycle.isentropic_efficiency;
  t.discharge = state(fluid, GivenPh{high_Pa, h2}).value();
  t.liquid = cycle.subcooling_K > 0.0
                 ? state(fluid, GivenTp{cycle.condensing_T_K - cycle.subcooling_K, high_Pa}).value()
                 : saturation_at_p(fluid, high_Pa).value().liquid;
  t.valve_out = state(fluid, GivenPh{low_Pa, t.liquid.h_Jkg}).value();
  const double m = cycle.flow_kgs;
  t.power_W = m * (t.discharge.h_Jkg - t.suction.h_Jkg) / (1.0 - cycle.casing_share);
  t.compressor_heat_W = t.power_W * cycle.casing_share;
  t.line_heat_W = m * (t.suction.h_Jkg - t.evaporator_out.h_Jkg);
  t.cold_heat_W = m * (t.evaporator_out.h_Jkg - t.valve_out.h_Jkg);
  t.hot_heat_W = m * (t.discharge.h_Jkg - t.liquid.h_Jkg);
  t.cold_mean_T_K = mean_T_K(cycle.cold_fluid, cycle.cold_in_T_K, cycle.cold_out_T_K);
  t.hot_mean_T_K = mean_T_K(cycle.hot_fluid, cycle.hot_in_T_K, cycle.hot_out_T_K);
  return t;
}

Values values_of(const Cycle& cycle, const Truth& t) {
  using enum Role;
  Values values{
      {  cold_in_temperature,cycle.cold_in_T_K                             },
      { cold_out_temperature, cycle.cold_out_T_K},
      {            cold_flow,
       volume_flow_m3s(cycle.cold_fluid,         cycle.cold_in_T_K, cycle.cold_out_T_K, t.cold_heat_W)},
      {   hot_in_temperature,   cycle.hot_in_T_K      },
      {  hot_out_temperature,  cycle.hot_out_T_K},
      {             hot_flow,
       volume_flow_m3s(cycle.hot_fluid,cycle.hot_in_T_K, cycle.hot_out_T_K, t.hot_heat_W)},
      {     suction_pressure,     t.suction.p_Pa          },
      {  suction_temperature,      t.suction.T_K        },
      {   discharge_pressure,   t.discharge.p_Pa},
      {discharge_temperature,    t.discharge.T_K},
      {   liquid_temperature,       t.liquid.T_K},
      {                power,          t.power_W},
  };
  if (cycle.line_gain_K > 0.0) {
    values[evaporator_out_temperature] = t.evaporator_out.T_K;
  }
  return values;
}

double u_of(Role role, double value, const Accuracy& accuracy) {
  switch (dimension(role)) {
    case Dimension::pressure: return accuracy.pressure_Pa;
    case Dimension::flow: return accuracy.flow_share * value;
    case Dimension::power: return accuracy.power_share * value;
    default: break;
  }
  return role < Role::suction_pressure ? accuracy.stream_T_K : accuracy.refrigerant_T_K;
}

}  // namespace

Scan TestMachine::scan_of(const Values& readings) const {
  Scan other = scan;
  for (std::size_t i = 0; i < model.points.size(); ++i) {
    const auto found = readings.find(model.points[i].role);
    if (found == readings.end()) {
      other.readings[i].quality = Quality::timeout;
    } else {
      other.readings[i].value_SI = found->second;
    }
  }
  return other;
}

Reading& TestMachine::reading(Role role) {
  return scan.readings.at(model.index_of(role).value());
}

ModelPoint& TestMachine::point(Role role) {
  return model.points.at(model.index_of(role).value());
}

void TestMachine::remove(Role role) {
  const auto index = static_cast<std::ptrdiff_t>(model.index_of(role).value());
  model.points.erase(model.points.begin() + index);
  scan.readings.erase(scan.readings.begin() + index);
  values.erase(role);
}

TestMachine make_machine(const Cycle& cycle, const Accuracy& accuracy) {
  TestMachine machine;
  MachineModel& model = machine.model;
  model.id = "chiller-1";
  model.name = "Chiller 1";
  model.duty = cycle.duty;
  model.refrigerant = fluid_named(cycle.refrigerant);
  model.cold.fluid = cycle.cold_fluid;
  model.hot.fluid = cycle.hot_fluid;
  machine.truth = truth_of(*model.refrigerant, cycle);
  model.rated_power_W = machine.truth.power_W;
  model.casing_loss = {.value = cycle.casing_share, .u = 0.0};
  machine.values = values_of(cycle, machine.truth);
  machine.scan.time = noon;
  for (const auto& [role, value] : machine.values) {
    model.points.push_back({.id = std::string{name(role)}, .role = role, .pair = std::nullopt});
    machine.scan.readings.push_back({.value_SI = value,
                                     .u_SI = u_of(role, value, accuracy),
                                     .quality = Quality::good,
                                     .time = noon});
  }
  return machine;
}

double value(const Assessment& assessment, Quantity quantity) {
  const Result<Measured>& result = assessment.values[quantity];
  if (!result) {
    ADD_FAILURE() << info(quantity).name << " is missing: " << name(result.error().code) << ", "
                  << result.error().blame;
    return std::numeric_limits<double>::quiet_NaN();
  }
  return result->value;
}

double u(const Assessment& assessment, Quantity quantity) {
  const Result<Measured>& result = assessment.values[quantity];
  if (!result) {
    ADD_FAILURE() << info(quantity).name << " is missing: " << name(result.error().code) << ", "
                  << result.error().blame;
    return std::numeric_limits<double>::quiet_NaN();
  }
  return result->u;
}

Reason reason(const Assessment& assessment, Quantity quantity) {
  const Result<Measured>& result = assessment.values[quantity];
  if (result) {
    ADD_FAILURE() << info(quantity).name << " has the value " << result->value;
    return {.code = ReasonCode::count, .blame = {}};
  }
  return result.error();
}

}  // namespace lostwork::test
