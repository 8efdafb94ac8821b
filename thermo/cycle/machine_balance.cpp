#include "thermo/cycle/machine_balance.h"

#include "thermo/role.h"

#include <algorithm>

namespace lostwork {
namespace {

Refusal refuse(ReasonCode code, Role role, double value_SI) {
  return Refusal{
      Reason{.code = code, .blame = name(role), .value_SI = value_SI}
  };
}

// Which meter the balance is built on, the product's own before the other: a fact of the machine's
// points, not of the moment.
enum class Route { cold_meter, hot_meter, power_meter };

Route route(const MachineModel& model) {
  const bool cold = model.index_of(Role::cold_flow).has_value();
  const bool hot = model.index_of(Role::hot_flow).has_value();
  if (!cold && !hot) {
    return Route::power_meter;
  }
  if (model.duty == Duty::cooling) {
    return cold ? Route::cold_meter : Route::hot_meter;
  }
  return hot ? Route::hot_meter : Route::cold_meter;
}

// `from` gives heat or work to `to`, and no flow of refrigerant is negative.
Result<Number> flow_of(const Number& heat_W, const Number& rise_Jkg, Role blame) {
  if (!(rise_Jkg.value > 0.0)) {
    return refuse(ReasonCode::contradicts, blame, rise_Jkg.value);
  }
  return heat_W / rise_Jkg;
}

Result<Number> flow_by_cold_meter_kgs(const MeteredMachine& metered, const CircuitStates& states) {
  return combine(
      [](const Number& Q, const Node& from, const Node& to) {
        return flow_of(Q, to.h_Jkg - from.h_Jkg, Role::liquid_temperature);
      },
      metered.cold_heat_W, states.valve_out, states.evaporator_out);
}

Result<Number> flow_by_hot_meter_kgs(const MeteredMachine& metered, const CircuitStates& states) {
  return combine(
      [](const Number& Q, const Node& from, const Node& to) {
        return flow_of(Q, from.h_Jkg - to.h_Jkg, Role::liquid_temperature);
      },
      metered.hot_heat_W, states.discharge, states.liquid);
}

Result<Number> flow_by_power_meter_kgs(const Inputs& inputs, const MeteredMachine& metered,
                                       const CircuitStates& states) {
  return combine(
      [&](const Number& W, const Node& from, const Node& to) {
        return flow_of(W * (1.0 - inputs.casing_loss), to.h_Jkg - from.h_Jkg,
                       Role::discharge_temperature);
      },
      metered.power_W, states.suction, states.discharge);
}

// Share of `a` in the mean of two measurements of one quantity that has the least variance (the
// best linear unbiased estimate; Lyons, Gibaut & Clifford 1988, doi:10.1016/0168-9002(88)90018-6).
// Two that share an error may ask for more than all of one: the mean stays between them. Without
// any uncertainty `a` is taken.
double share_of_first(const Errors& errors, const Number& a, const Number& b) {
  const double common = errors.covariance(a, b);
  const double a_alone = errors.covariance(a, a) - common;
  const double b_alone = errors.covariance(b, b) - common;
  if (!(a_alone + b_alone > 0.0)) {
    return 1.0;
  }
  return std::clamp(b_alone / (a_alone + b_alone), 0.0, 1.0);
}

// The product's meter and, where it tells something, the other one.
Result<Number> flow_by_meters_kgs(const Errors& errors, const Result<Number>& product,
                                  const Result<Number>& other) {
  if (!product || !other) {
    return product;
  }
  const double share = share_of_first(errors, *product, *other);
  return share * *product + (1.0 - share) * *other;
}

Result<Number> flow_kgs(Duty duty, Route by, const Inputs& inputs, const MeteredMachine& metered,
                        const CircuitStates& states) {
  if (by == Route::power_meter) {
    return flow_by_power_meter_kgs(inputs, metered, states);
  }
  const Result<Number> cold = flow_by_cold_meter_kgs(metered, states);
  const Result<Number> hot = flow_by_hot_meter_kgs(metered, states);
  if (by == Route::cold_meter) {
    return duty == Duty::cooling ? flow_by_meters_kgs(inputs.errors, cold, hot) : cold;
  }
  return duty == Duty::cooling ? hot : flow_by_meters_kgs(inputs.errors, hot, cold);
}

// What the suction line takes up.
Number line_gain_W(const Number& flow, const CircuitStates& states) {
  return flow * (states.suction->h_Jkg - states.evaporator_out->h_Jkg);
}

// Heat from the compressor's casing: what the refrigerant does not carry away.
Result<Number> compressor_casing_W(const Result<Number>& flow, const MeteredMachine& metered,
                                   const CircuitStates& states) {
  return combine([](const Number& m, const Number& W, const Node& from,
                    const Node& to) { return W - m * (to.h_Jkg - from.h_Jkg); },
                 flow, metered.power_W, states.suction, states.discharge);
}

Result<Number> casing_W(const Result<Number>& compressor, const Result<Number>& flow,
                        const Inputs& inputs, const MeteredMachine& metered,
                        const CircuitStates& states) {
  if (!compressor || !states.evaporator_out) {
    return combine([&](const Number& W) { return W * inputs.casing_loss; }, metered.power_W);
  }
  return states.has_suction_line ? *compressor - line_gain_W(*flow, states) : *compressor;
}

// W + Q_L = Q_H + Q_a.
Result<Number> cold_by_balance(const MeteredMachine& metered, const Result<Number>& hot_W,
                               const Result<Number>& casing) {
  return combine([](const Number& W, const Number& QH, const Number& Qa) { return QH + Qa - W; },
                 metered.power_W, hot_W, casing);
}
Result<Number> hot_by_balance(const MeteredMachine& metered, const Result<Number>& cold_W,
                              const Result<Number>& casing) {
  return combine([](const Number& W, const Number& QL, const Number& Qa) { return W + QL - Qa; },
                 metered.power_W, cold_W, casing);
}

Result<Number> product_W(const MachineModel& model, Route by, const MeteredMachine& metered,
                         const Result<Number>& casing) {
  if (model.duty == Duty::cooling) {
    return by == Route::hot_meter ? cold_by_balance(metered, metered.hot_heat_W, casing)
                                  : metered.cold_heat_W;
  }
  return by == Route::cold_meter ? hot_by_balance(metered, metered.cold_heat_W, casing)
                                 : metered.hot_heat_W;
}

Result<Number> lines_WK(const Inputs& inputs, const Result<Number>& flow,
                        const Result<Number>& around, const CircuitStates& states) {
  const Result<Number>& outlet = inputs[Role::evaporator_out_temperature];
  return combine(
      [&](const Number&, const Number& m, const Number& T_a, const Node& from, const Node& to) {
        return m * (to.s_JkgK - from.s_JkgK) - line_gain_W(m, states) / T_a;
      },
      outlet, flow, around, states.evaporator_out, states.suction);
}

ComponentEntropy component_entropy(const Inputs& inputs, const MeteredMachine& metered,
                                   const CircuitStates& states, const MachineBalance& so_far,
                                   const Result<Number>& compressor_heat) {
  // m (s_out - s_in) of the refrigerant, and what the stream's entropy loses or gains.
  const auto exchanger = [](const Number& m, const Number& stream_T_K, const Node& from,
                            const Node& to) {
    return m * (to.s_JkgK - from.s_JkgK - (to.h_Jkg - from.h_Jkg) / stream_T_K);
  };
  const Result<Number>& flow = so_far.flow_kgs;
  return {
      .compressor =
          combine([](const Number& m, const Number& Qa, const Number& T_a, const Node& from,
                     const Node& to) { return m * (to.s_JkgK - from.s_JkgK) + Qa / T_a; },
                  flow, compressor_heat, so_far.around_T_K, states.suction, states.discharge),
      .condenser = combine(exchanger, flow, metered.hot_T_K, states.discharge, states.liquid),
      .expansion = combine([](const Number& m, const Node& from,
                              const Node& to) { return m * (to.s_JkgK - from.s_JkgK); },
                           flow, states.liquid, states.valve_out),
      .evaporator =
          combine(exchanger, flow, metered.cold_T_K, states.valve_out, states.evaporator_out),
      .lines = lines_WK(inputs, flow, so_far.around_T_K, states),
  };
}

// From the reservoirs, the energy balance closed with the product heat.
Result<Number> reservoirs_WK(Duty duty, const MeteredMachine& metered,
                             const MachineBalance& balance) {
  const bool cooling = duty == Duty::cooling;
  const Result<Number> cold_W =
      cooling ? balance.product_W : cold_by_balance(metered, balance.product_W, balance.casing_W);
  const Result<Number> hot_W =
      cooling ? hot_by_balance(metered, balance.product_W, balance.casing_W) : balance.product_W;
  const auto over = [](const Number& Q, const Number& T) { return Q / T; };
  return combine(
      [](const Number& in, const Number& out, const Number& around) { return out + around - in; },
      combine(over, cold_W, metered.cold_T_K), combine(over, hot_W, metered.hot_T_K),
      combine(over, balance.casing_W, balance.around_T_K));
}

Result<Number> total_WK(Duty duty, const MeteredMachine& metered, const MachineBalance& balance) {
  const ComponentEntropy& part = balance.entropy_WK;
  const Result<Number> four =
      combine([](const Number& a, const Number& b, const Number& c,
                 const Number& d) { return a + b + c + d; },
              part.compressor, part.condenser, part.expansion, part.evaporator);
  if (!four) {
    return reservoirs_WK(duty, metered, balance);
  }
  return part.lines ? *four + *part.lines : *four;
}

}  // namespace

MachineBalance machine_balance(const MachineModel& model, const Inputs& inputs,
                               const MeteredMachine& metered, const CircuitStates& states) {
  const Route by = route(model);
  MachineBalance balance;
  balance.flow_kgs = flow_kgs(model.duty, by, inputs, metered, states);
  if (model.casing_T_K) {
    balance.around_T_K = Number{.value = *model.casing_T_K, .by = {}};
  } else {
    balance.around_T_K = model.duty == Duty::cooling ? metered.hot_T_K : metered.cold_T_K;
  }
  const Result<Number> compressor = compressor_casing_W(balance.flow_kgs, metered, states);
  balance.casing_W = casing_W(compressor, balance.flow_kgs, inputs, metered, states);
  balance.product_W = product_W(model, by, metered, balance.casing_W);
  balance.entropy_WK = component_entropy(inputs, metered, states, balance, compressor);
  balance.total_WK = total_WK(model.duty, metered, balance);
  return balance;
}

}  // namespace lostwork
