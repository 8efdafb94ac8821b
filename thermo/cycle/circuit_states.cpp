#include "thermo/cycle/circuit_states.h"

#include "thermo/fluids/state.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

Refusal refuse(ReasonCode code, Role role, double value_SI) {
  return Refusal{
      Reason{.code = code, .blame = name(role), .value_SI = value_SI}
  };
}

// Both phases at one measured pressure.
struct Boundary {
  Saturation at;
  Number p_Pa;

  [[nodiscard]] Number dew_T_K() const { return chain(at.vapour.T_K, at.dew_dT_dp, p_Pa); }
  [[nodiscard]] Number bubble_T_K() const { return chain(at.liquid.T_K, at.bubble_dT_dp, p_Pa); }
};

Result<Boundary> boundary(const Fluid& fluid, const Result<Number>& p_Pa, Role role) {
  if (!p_Pa) {
    return tl::unexpected{p_Pa.error()};
  }
  const Result<Saturation> at = saturation_at_p(fluid, p_Pa->value);
  if (!at) {
    return refuse(at.error().code, role, p_Pa->value);
  }
  if (!at->liquid.single || !at->vapour.single) {
    return refuse(ReasonCode::outside_fluid, role, p_Pa->value);
  }
  return Boundary{.at = *at, .p_Pa = *p_Pa};
}

// dh = cp dT + v (1 - it) dp, ds = cp dT / T - v it dp / T, with it = (T/v)(dv/dT)_p.
Node node(const State& at, const SinglePhase& phase, const Number& T_K, const Number& p_Pa) {
  const double v = 1.0 / at.rho_kgm3;
  return {.h_Jkg = chain(at.h_Jkg, phase.cp_JkgK, T_K, v * (1.0 - phase.expansion_T), p_Pa),
          .s_JkgK =
              chain(at.s_JkgK, phase.cp_JkgK / at.T_K, T_K, -v * phase.expansion_T / at.T_K, p_Pa)};
}

Result<Node> single_phase_node(const Fluid& fluid, const Number& T_K, const Number& p_Pa,
                               Role role) {
  const Result<State> at = state(fluid, GivenTp{.T_K = T_K.value, .p_Pa = p_Pa.value});
  if (!at) {
    return refuse(at.error().code, role, T_K.value);
  }
  if (!at->single) {
    return refuse(ReasonCode::outside_fluid, role, T_K.value);
  }
  return node(*at, *at->single, T_K, p_Pa);
}

// Dry saturated vapour that may carry liquid: h = h" - (1 - x)(h" - h'), at x = 1.
Node nearly_dry(const Boundary& low) {
  const Saturation& at = low.at;
  const Number dew_T_K = low.dew_T_K();
  const Number wetness = input<input_count>(0.0, suction_quality_input);  // x - 1
  const Node dry = node(at.vapour, *at.vapour.single, dew_T_K, low.p_Pa);
  return {.h_Jkg = dry.h_Jkg + wetness * (at.vapour.h_Jkg - at.liquid.h_Jkg),
          .s_JkgK = dry.s_JkgK + wetness * (at.vapour.s_JkgK - at.liquid.s_JkgK)};
}

// What the vapour rule needs to know of a place.
struct VapourPlace {
  Role role;
  bool at_suction;
  bool flooded;
};

// Readings and saturation lines are rounded: a distance below this is none.
constexpr double rounding_K = 1e-3;

// Distance from saturation on the right side. Refuses: contradicts, below 0 by more than 2 u.
Result<Number> on_its_side(const Number& distance_K, const Inputs& inputs, Role role) {
  if (distance_K.value < -2.0 * inputs.errors.u(distance_K) - rounding_K) {
    return refuse(ReasonCode::contradicts, role, inputs[role]->value);
  }
  return distance_K;
}

Result<Number> superheat_K(const Inputs& inputs, const Boundary& line, Role role) {
  return combine([&](const Number& T_K) { return on_its_side(T_K - line.dew_T_K(), inputs, role); },
                 inputs[role]);
}

Result<Number> subcooling_K(const Inputs& inputs, const Boundary& line) {
  const Role role = Role::liquid_temperature;
  return combine(
      [&](const Number& T_K) { return on_its_side(line.bubble_T_K() - T_K, inputs, role); },
      inputs[role]);
}

Result<Node> vapour(const MachineModel& model, const Inputs& inputs, const Boundary& line,
                    const VapourPlace& place) {
  const Result<Number> above_K = superheat_K(inputs, line, place.role);
  if (!above_K) {
    return tl::unexpected{above_K.error()};
  }
  const Number& T_K = *inputs[place.role];
  if (above_K->value > std::max(rounding_K, place.flooded ? inputs.errors.u(*above_K) : 0.0)) {
    return single_phase_node(*model.refrigerant, T_K, line.p_Pa, place.role);
  }
  return place.at_suction ? nearly_dry(line)
                          : node(line.at.vapour, *line.at.vapour.single, T_K, line.p_Pa);
}

Result<Node> liquid(const MachineModel& model, const Inputs& inputs, const Boundary& line) {
  const Result<Number> below_K = subcooling_K(inputs, line);
  if (!below_K) {
    return tl::unexpected{below_K.error()};
  }
  const Number& T_K = *inputs[Role::liquid_temperature];
  if (below_K->value > std::max(rounding_K, inputs.errors.u(*below_K))) {
    return single_phase_node(*model.refrigerant, T_K, line.p_Pa, Role::liquid_temperature);
  }
  return node(line.at.liquid, *line.at.liquid.single, T_K, line.p_Pa);
}

// h4 = h3 at the suction pressure; ds = dh / T - v dp / T holds in either region.
Result<Node> throttled(const MachineModel& model, const Node& before, const Boundary& low) {
  const Saturation& at = low.at;
  const double x = (before.h_Jkg.value - at.liquid.h_Jkg) / (at.vapour.h_Jkg - at.liquid.h_Jkg);
  const bool pure = std::abs(at.vapour.T_K - at.liquid.T_K) < 1e-6;  // no glide: a straight line
  if (pure && x >= 0.0 && x <= 1.0) {
    const double T_K = at.liquid.T_K;
    const double v = (1.0 - x) / at.liquid.rho_kgm3 + x / at.vapour.rho_kgm3;
    const double s_JkgK = at.liquid.s_JkgK + x * (at.vapour.s_JkgK - at.liquid.s_JkgK);
    return Node{.h_Jkg = before.h_Jkg,
                .s_JkgK = chain(s_JkgK, 1.0 / T_K, before.h_Jkg, -v / T_K, low.p_Pa)};
  }
  const Result<State> found =
      state(*model.refrigerant, GivenPh{.p_Pa = low.p_Pa.value, .h_Jkg = before.h_Jkg.value});
  if (!found) {
    return refuse(found.error().code, Role::suction_pressure, low.p_Pa.value);
  }
  const double v = 1.0 / found->rho_kgm3;
  return Node{
      .h_Jkg = before.h_Jkg,
      .s_JkgK = chain(found->s_JkgK, 1.0 / found->T_K, before.h_Jkg, -v / found->T_K, low.p_Pa)};
}

// dh = T ds + v dp.
Result<Number> isentropic_h_Jkg(const MachineModel& model, const Node& suction,
                                const Boundary& high) {
  const Result<State> at =
      state(*model.refrigerant, GivenPs{.p_Pa = high.p_Pa.value, .s_JkgK = suction.s_JkgK.value},
            high.at);
  if (!at) {
    return refuse(at.error().code, Role::discharge_pressure, high.p_Pa.value);
  }
  return chain(at->h_Jkg, at->T_K, suction.s_JkgK, 1.0 / at->rho_kgm3, high.p_Pa);
}

std::optional<Reason> swapped_pressures(const Inputs& inputs) {
  const Result<Number>& low = inputs[Role::suction_pressure];
  const Result<Number>& high = inputs[Role::discharge_pressure];
  if (!low || !high) {
    return std::nullopt;
  }
  const Number rise_Pa = *high - *low;
  if (rise_Pa.value >= -2.0 * inputs.errors.u(rise_Pa)) {
    return std::nullopt;
  }
  return Reason{.code = ReasonCode::contradicts,
                .blame = name(Role::suction_pressure),
                .value_SI = low->value};
}

CircuitStates all_refused(const Reason& why) {
  const tl::unexpected<Reason> refused{why};
  return {.evaporating_T_K = refused,
          .condensing_T_K = refused,
          .pressure_ratio = refused,
          .superheat_K = refused,
          .subcooling_K = refused,
          .suction = refused,
          .discharge = refused,
          .liquid = refused,
          .valve_out = refused,
          .evaporator_out = refused,
          .isentropic_h_Jkg = refused};
}

// The three pressures' boundaries.
struct Boundaries {
  Result<Boundary> low;
  Result<Boundary> high;
  Result<Boundary> liquid;
};

Boundaries boundaries(const MachineModel& model, const Inputs& inputs, bool idle) {
  const Fluid& fluid = *model.refrigerant;
  const Result<Boundary> high =
      boundary(fluid, inputs[Role::discharge_pressure], Role::discharge_pressure);
  const bool own_liquid = !idle && inputs[Role::liquid_pressure].has_value();
  return {.low = boundary(fluid, inputs[Role::suction_pressure], Role::suction_pressure),
          .high = high,
          .liquid = own_liquid
                        ? boundary(fluid, inputs[Role::liquid_pressure], Role::liquid_pressure)
                        : high};
}

void fill_states(CircuitStates& states, const MachineModel& model, const Inputs& inputs,
                 const Boundaries& lines) {
  const bool flooded = model.evaporator == EvaporatorKind::flooded;
  const auto vapour_at = [&](const VapourPlace& place) {
    return [&, place](const Boundary& line) { return vapour(model, inputs, line, place); };
  };
  states.superheat_K = combine(
      [&](const Boundary& line) { return superheat_K(inputs, line, Role::suction_temperature); },
      lines.low);
  states.subcooling_K =
      combine([&](const Boundary& line) { return subcooling_K(inputs, line); }, lines.liquid);
  states.suction = combine(vapour_at({Role::suction_temperature, true, flooded}), lines.low);
  states.discharge = combine(vapour_at({Role::discharge_temperature, false, false}), lines.high);
  states.liquid =
      combine([&](const Boundary& line) { return liquid(model, inputs, line); }, lines.liquid);
  states.valve_out = combine(
      [&](const Node& before, const Boundary& line) { return throttled(model, before, line); },
      states.liquid, lines.low);
  states.has_suction_line = inputs[Role::evaporator_out_temperature].has_value();
  states.evaporator_out =
      states.has_suction_line
          ? combine(vapour_at({Role::evaporator_out_temperature, true, flooded}), lines.low)
          : states.suction;
  states.isentropic_h_Jkg = combine(
      [&](const Node& from, const Boundary& line) { return isentropic_h_Jkg(model, from, line); },
      states.suction, lines.high);
}

}  // namespace

CircuitStates circuit_states(const MachineModel& model, const Inputs& inputs,
                             const std::optional<Reason>& idle) {
  const auto swapped = idle ? std::nullopt : swapped_pressures(inputs);
  if (swapped) {
    return all_refused(*swapped);
  }
  const Boundaries lines = boundaries(model, inputs, idle.has_value());
  CircuitStates states = all_refused(idle.value_or(Reason{}));
  states.evaporating_T_K = combine([](const Boundary& b) { return b.dew_T_K(); }, lines.low);
  states.condensing_T_K = combine([](const Boundary& b) { return b.dew_T_K(); }, lines.high);
  states.pressure_ratio = combine([](const Number& low, const Number& high) { return high / low; },
                                  inputs[Role::suction_pressure], inputs[Role::discharge_pressure]);
  if (!idle) {
    fill_states(states, model, inputs, lines);
  }
  return states;
}

}  // namespace lostwork
