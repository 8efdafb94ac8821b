#include "thermo/health/features.h"

#include "thermo/fluids/state.h"

#include <cmath>

namespace lostwork {
namespace {

// Below these the entropy form would divide noise by noise.
constexpr double least_lift_K = 1.0;

constexpr std::array<Role, input_count> roles{Role::power,
                                              Role::cold_in_temperature,
                                              Role::cold_out_temperature,
                                              Role::cold_flow,
                                              Role::hot_in_temperature,
                                              Role::hot_out_temperature,
                                              Role::hot_flow,
                                              Role::suction_pressure,
                                              Role::suction_temperature,
                                              Role::discharge_pressure,
                                              Role::discharge_temperature,
                                              Role::liquid_temperature};

constexpr std::array<FeatureInfo, feature_count> infos{
    {
     {"power", Quantity::power, true, false, 0.05, 0.01},
     {"hot_approach", Quantity::hot_approach, false, false, 1.0, 0.15},
     {"cold_approach", Quantity::cold_approach, false, false, 1.0, 0.15},
     {"superheat", Quantity::superheat, false, false, 1.0, 0.3},
     {"subcooling", Quantity::subcooling, false, false, 1.0, 0.2},
     {"subcooling_share", std::nullopt, false, false, 0.1, 0.02},
     {"efficiency", Quantity::isentropic_efficiency, false, false, 0.02, 0.005},
     {"hot_range", std::nullopt, false, false, 0.5, 0.1},
     {"hot_flow", Quantity::hot_flow, true, false, 0.05, 0.01},
     {"cold_flow", Quantity::cold_flow, true, false, 0.05, 0.01},
     {"energy_balance", std::nullopt, false, false, 0.03, 0.006},
     {"compressor_balance", std::nullopt, false, false, 0.03, 0.006},
     {"lost_compressor", Quantity::lost_compressor, false, true, 0.02, 0.003},
     {"lost_condenser", Quantity::lost_condenser, false, true, 0.02, 0.003},
     {"lost_expansion", Quantity::lost_expansion, false, true, 0.02, 0.003},
     {"lost_evaporator", Quantity::lost_evaporator, false, true, 0.02, 0.003},
     }
};

// What conditions are made of, whatever they come from.
struct Ends {
  double heat_W;
  double cold_T_K;  // cooling: leaving; heating: entering
  double hot_T_K;   // cooling: entering; heating: leaving
};

Result<Conditions> conditions_from(Duty duty, const Ends& ends) {
  if (!(ends.heat_W > 0.0)) {
    return Refusal{
        Reason{
               .code = ReasonCode::load_too_small, .blame = "product heat", .value_SI = ends.heat_W}
    };
  }
  if (!(ends.cold_T_K > 0.0) || !(ends.hot_T_K - ends.cold_T_K >= least_lift_K)) {
    return Refusal{
        Reason{.code = ReasonCode::lift_too_small,
               .blame = "lift",
               .value_SI = ends.hot_T_K - ends.cold_T_K}
    };
  }
  const double difference_K = ends.hot_T_K - ends.cold_T_K;
  if (duty == Duty::cooling) {
    return Conditions{.heat_W = ends.heat_W,
                      .lift = difference_K / ends.cold_T_K,
                      .reference_T_K = ends.hot_T_K,
                      .product_T_K = ends.cold_T_K};
  }
  return Conditions{.heat_W = ends.heat_W,
                    .lift = difference_K / ends.hot_T_K,
                    .reference_T_K = ends.cold_T_K,
                    .product_T_K = ends.hot_T_K};
}

std::optional<double> mean(const Window& window, Quantity quantity) {
  const auto& value = window[quantity];
  return value ? std::optional{value->mean_SI} : std::nullopt;
}

std::optional<double> sum(std::optional<double> a, std::optional<double> b, double sign) {
  return a && b ? std::optional{*a + sign * *b} : std::nullopt;
}

// Heat per kg and K by the meters of one stream; 0 where they do not tell.
double cp_JkgK(std::optional<double> heat, std::optional<double> flow,
               std::optional<double> range_K) {
  if (!heat || !flow || !range_K || !(*flow > 0.0) || !(std::abs(*range_K) > 0.01)) {
    return 0.0;
  }
  return *heat / (*flow * *range_K);
}

void read_pressures(const MachineModel& machine, const Window& window, Inputs& inputs) {
  if (machine.refrigerant == nullptr) {
    return;
  }
  if (const auto evaporating = mean(window, Quantity::evaporating)) {
    const auto low = state(*machine.refrigerant, GivenTx{.T_K = *evaporating, .quality = 1.0});
    if (low) {
      inputs[Input::suction_pressure] = low->p_Pa;
      inputs[Input::suction_temperature] = sum(evaporating, mean(window, Quantity::superheat), 1.0);
    }
  }
  if (const auto condensing = mean(window, Quantity::condensing)) {
    const auto high = state(*machine.refrigerant, GivenTx{.T_K = *condensing, .quality = 1.0});
    const auto bubble =
        high ? state(*machine.refrigerant, GivenPx{.p_Pa = high->p_Pa, .quality = 0.0}) : high;
    if (bubble) {
      inputs[Input::discharge_pressure] = high->p_Pa;
      inputs[Input::discharge_temperature] = mean(window, Quantity::discharge);
      inputs[Input::liquid_temperature] =
          sum(bubble->T_K, mean(window, Quantity::subcooling), -1.0);
    }
  }
}

std::optional<double> heat_W(const std::optional<double>& flow, double cp,
                             const std::optional<double>& from, const std::optional<double>& to) {
  if (!flow || !from || !to || !(cp > 0.0)) {
    return std::nullopt;
  }
  return *flow * cp * (*from - *to);
}

std::optional<double> cold_heat_W(const Inputs& in) {
  return heat_W(in[Input::cold_flow], in.cold_cp_JkgK, in[Input::cold_in], in[Input::cold_out]);
}

std::optional<double> hot_heat_W(const Inputs& in) {
  return heat_W(in[Input::hot_flow], in.hot_cp_JkgK, in[Input::hot_out], in[Input::hot_in]);
}

// Enthalpies of the refrigerant circuit that both the efficiency and the balance need.
struct Circuit {
  double suction_Jkg;
  double discharge_Jkg;
  double isentropic_Jkg;
  double liquid_Jkg;
};

std::optional<Circuit> circuit_of(const Fluid& fluid, const Inputs& in) {
  const auto p_low = in[Input::suction_pressure];
  const auto p_high = in[Input::discharge_pressure];
  const auto T_suction = in[Input::suction_temperature];
  const auto T_discharge = in[Input::discharge_temperature];
  const auto T_liquid = in[Input::liquid_temperature];
  if (!p_low || !p_high || !T_suction || !T_discharge || !T_liquid) {
    return std::nullopt;
  }
  const auto suction = state(fluid, GivenTp{.T_K = *T_suction, .p_Pa = *p_low});
  const auto discharge = state(fluid, GivenTp{.T_K = *T_discharge, .p_Pa = *p_high});
  const auto bubble = state(fluid, GivenPx{.p_Pa = *p_high, .quality = 0.0});
  if (!suction || !discharge || !bubble) {
    return std::nullopt;
  }
  const auto isentropic = state(fluid, GivenPs{.p_Pa = *p_high, .s_JkgK = suction->s_JkgK});
  const auto liquid =
      *T_liquid < bubble->T_K ? state(fluid, GivenTp{.T_K = *T_liquid, .p_Pa = *p_high}) : bubble;
  if (!isentropic || !liquid) {
    return std::nullopt;
  }
  return Circuit{.suction_Jkg = suction->h_Jkg,
                 .discharge_Jkg = discharge->h_Jkg,
                 .isentropic_Jkg = isentropic->h_Jkg,
                 .liquid_Jkg = liquid->h_Jkg};
}

void put(FeatureValues& features, Feature feature, std::optional<double> value) {
  features.at(static_cast<std::size_t>(feature)) = value;
}

void add_suction_temperatures(const Fluid& fluid, double p_Pa, const Inputs& in,
                              FeatureValues& out) {
  if (const auto dew = state(fluid, GivenPx{.p_Pa = p_Pa, .quality = 1.0})) {
    put(out, Feature::cold_approach, sum(in[Input::cold_out], dew->T_K, -1.0));
    put(out, Feature::superheat, sum(in[Input::suction_temperature], dew->T_K, -1.0));
  }
}

void add_discharge_temperatures(const Fluid& fluid, double p_Pa, const Inputs& in,
                                FeatureValues& out) {
  const auto dew = state(fluid, GivenPx{.p_Pa = p_Pa, .quality = 1.0});
  const auto bubble = state(fluid, GivenPx{.p_Pa = p_Pa, .quality = 0.0});
  if (!dew || !bubble) {
    return;
  }
  put(out, Feature::hot_approach, sum(dew->T_K, in[Input::hot_out], -1.0));
  const auto subcooling_K = sum(bubble->T_K, in[Input::liquid_temperature], -1.0);
  put(out, Feature::subcooling, subcooling_K);
  const auto drive_K = sum(dew->T_K, in[Input::hot_in], -1.0);
  if (subcooling_K && drive_K && *drive_K > 1.0) {
    put(out, Feature::subcooling_share, *subcooling_K / *drive_K);
  }
}

void add_temperatures(const Fluid& fluid, const Inputs& in, FeatureValues& out) {
  if (const auto p_Pa = in[Input::suction_pressure]) {
    add_suction_temperatures(fluid, *p_Pa, in, out);
  }
  if (const auto p_Pa = in[Input::discharge_pressure]) {
    add_discharge_temperatures(fluid, *p_Pa, in, out);
  }
}

void add_circuit(Duty duty, const Circuit& circuit, const Inputs& in, FeatureValues& out) {
  const double rise = circuit.discharge_Jkg - circuit.suction_Jkg;
  if (!(rise > 0.0)) {
    return;
  }
  put(out, Feature::efficiency, (circuit.isentropic_Jkg - circuit.suction_Jkg) / rise);
  const auto heat = duty == Duty::cooling ? cold_heat_W(in) : hot_heat_W(in);
  const double per_kg =
      (duty == Duty::cooling ? circuit.suction_Jkg : circuit.discharge_Jkg) - circuit.liquid_Jkg;
  const auto power = in[Input::power];
  if (heat && power && *power > 0.0 && per_kg > 0.0) {
    put(out, Feature::compressor_balance, 1.0 - *heat / per_kg * rise / *power);
  }
}

void add_streams(const Inputs& in, FeatureValues& out) {
  put(out, Feature::power, in[Input::power]);
  put(out, Feature::cold_flow, in[Input::cold_flow]);
  if (in[Input::hot_flow]) {
    put(out, Feature::hot_flow, in[Input::hot_flow]);
  } else {
    put(out, Feature::hot_range, sum(in[Input::hot_out], in[Input::hot_in], -1.0));
  }
  const auto cold = cold_heat_W(in);
  const auto hot = hot_heat_W(in);
  const auto power = in[Input::power];
  if (cold && hot && power && *power + *cold > 0.0) {
    put(out, Feature::energy_balance, (*power + *cold - *hot) / (*power + *cold));
  }
}

Refusal missing(std::string_view what) {
  return Refusal{
      Reason{.code = ReasonCode::not_read, .blame = what}
  };
}

}  // namespace

Role role_of(Input input) {
  return roles.at(static_cast<std::size_t>(input));
}

const FeatureInfo& info(Feature feature) {
  return infos.at(static_cast<std::size_t>(feature));
}

Result<Conditions> conditions_of(Duty duty, const QuantityValues& values) {
  const bool cooling = duty == Duty::cooling;
  const auto& heat = values[cooling ? Quantity::cold_heat : Quantity::hot_heat];
  const auto& cold = values[cooling ? Quantity::cold_out : Quantity::cold_in];
  const auto& hot = values[cooling ? Quantity::hot_in : Quantity::hot_out];
  for (const auto* value : {&heat, &cold, &hot}) {
    if (!*value) {
      return Refusal{value->error()};
    }
  }
  return conditions_from(duty,
                         {.heat_W = heat->value, .cold_T_K = cold->value, .hot_T_K = hot->value});
}

Result<Conditions> conditions_of(Duty duty, const Inputs& inputs) {
  const bool cooling = duty == Duty::cooling;
  const auto heat = cooling ? cold_heat_W(inputs) : hot_heat_W(inputs);
  const auto cold = inputs[cooling ? Input::cold_out : Input::cold_in];
  const auto hot = inputs[cooling ? Input::hot_in : Input::hot_out];
  if (!heat) {
    return missing("product heat");
  }
  if (!cold || !hot) {
    return missing("stream temperature");
  }
  return conditions_from(duty, {.heat_W = *heat, .cold_T_K = *cold, .hot_T_K = *hot});
}

Inputs inputs_of(const MachineModel& machine, const Window& window) {
  Inputs in;
  in[Input::power] = mean(window, Quantity::power);
  in[Input::cold_in] = mean(window, Quantity::cold_in);
  in[Input::cold_out] = mean(window, Quantity::cold_out);
  in[Input::cold_flow] = mean(window, Quantity::cold_flow);
  in[Input::hot_in] = mean(window, Quantity::hot_in);
  in[Input::hot_out] = mean(window, Quantity::hot_out);
  in[Input::hot_flow] = mean(window, Quantity::hot_flow);
  in.cold_cp_JkgK = cp_JkgK(mean(window, Quantity::cold_heat), in[Input::cold_flow],
                            sum(in[Input::cold_in], in[Input::cold_out], -1.0));
  in.hot_cp_JkgK = cp_JkgK(mean(window, Quantity::hot_heat), in[Input::hot_flow],
                           sum(in[Input::hot_out], in[Input::hot_in], -1.0));
  read_pressures(machine, window, in);
  return in;
}

FeatureValues features_of(const MachineModel& machine, const Inputs& inputs) {
  FeatureValues out{};
  add_streams(inputs, out);
  if (machine.refrigerant != nullptr) {
    add_temperatures(*machine.refrigerant, inputs, out);
    if (const auto circuit = circuit_of(*machine.refrigerant, inputs)) {
      add_circuit(machine.duty, *circuit, inputs, out);
    }
  }
  return out;
}

Result<Sample> sample_of(const MachineModel& machine, const Window& window, const Inputs& inputs) {
  if (!inputs[Input::power] || !(*inputs[Input::power] > 0.0)) {
    return missing("power");
  }
  const auto conditions = conditions_of(machine.duty, inputs);
  if (!conditions) {
    return Refusal{conditions.error()};
  }
  Sample sample{.begin = window.begin,
                .end = window.end,
                .conditions = *conditions,
                .features = features_of(machine, inputs)};
  put(sample.features, Feature::lost_compressor, mean(window, Quantity::lost_compressor));
  put(sample.features, Feature::lost_condenser, mean(window, Quantity::lost_condenser));
  put(sample.features, Feature::lost_expansion, mean(window, Quantity::lost_expansion));
  put(sample.features, Feature::lost_evaporator, mean(window, Quantity::lost_evaporator));
  return sample;
}

}  // namespace lostwork
