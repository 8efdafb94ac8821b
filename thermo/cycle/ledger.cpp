#include "thermo/cycle/ledger.h"

#include "thermo/cycle/circuit_states.h"
#include "thermo/cycle/inputs.h"
#include "thermo/cycle/machine_balance.h"
#include "thermo/cycle/number.h"
#include "thermo/cycle/stream_balance.h"

#include <array>
#include <limits>
#include <optional>

namespace lostwork {
namespace {

using enum Quantity;

constexpr double not_known = std::numeric_limits<double>::quiet_NaN();
constexpr double off_share = 0.02;    // of rated power: standby and oil heaters (judgement)
constexpr double low_share = 0.10;    // of rated power (judgement, no published figure)
constexpr double least_lift_K = 3.0;  // (judgement, no published figure)

// Every quantity with its derivatives.
struct Ledger {
  Inputs inputs;
  std::array<Result<Number>, quantity_count> values;

  Result<Number>& operator[](Quantity q) { return values.at(static_cast<std::size_t>(q)); }
  const Result<Number>& operator[](Quantity q) const {
    return values.at(static_cast<std::size_t>(q));
  }
};

Refusal refuse(ReasonCode code, std::string_view blame, double value_SI) {
  return Refusal{
      Reason{.code = code, .blame = blame, .value_SI = value_SI}
  };
}

// Why the balance of the machine has no meaning now.
std::optional<Reason> why_idle(const MachineModel& model, const Inputs& inputs, Mode mode) {
  const Result<Number>& W = inputs[Role::power];
  if (mode == Mode::off || (W && W->value < off_share * model.rated_power_W)) {
    Reason why{.code = ReasonCode::machine_off, .blame = name(Role::power)};
    why.value_SI = W ? W->value : why.value_SI;
    return why;
  }
  if (mode == Mode::defrost) {
    return Reason{.code = ReasonCode::not_applicable, .blame = name(Role::defrost)};
  }
  if (mode == Mode::unknown) {
    return W ? Reason{.code = ReasonCode::not_read, .blame = name(Role::mode)} : W.error();
  }
  return std::nullopt;
}

// A running machine cools its cold stream and warms its hot one.
Result<Number> right_way(const Result<Number>& heat_W, const Errors& errors, Mode mode,
                         Role leaving) {
  return combine(
      [&](const Number& W) -> Result<Number> {
        if (mode == Mode::running && W.value < -2.0 * errors.u(W)) {
          return refuse(ReasonCode::contradicts, name(leaving), W.value);
        }
        return W;
      },
      heat_W);
}

void fill_streams(Ledger& ledger, const MachineModel& model, Mode mode) {
  const Inputs& inputs = ledger.inputs;
  const StreamBalance from = stream_balance(model, model.cold, cold_roles, inputs);
  const StreamBalance to = stream_balance(model, model.hot, hot_roles, inputs);
  ledger[cold_in] = inputs[Role::cold_in_temperature];
  ledger[cold_out] = inputs[Role::cold_out_temperature];
  ledger[cold_flow] = from.flow_kgs;
  ledger[cold_mean] = from.mean_T_K;
  ledger[cold_heat] = right_way(from.released_W, inputs.errors, mode, Role::cold_out_temperature);
  ledger[hot_in] = inputs[Role::hot_in_temperature];
  ledger[hot_out] = inputs[Role::hot_out_temperature];
  ledger[hot_flow] = to.flow_kgs;
  ledger[hot_mean] = to.mean_T_K;
  const Result<Number> taken_W = combine([](const Number& W) { return -W; }, to.released_W);
  ledger[hot_heat] = right_way(taken_W, inputs.errors, mode, Role::hot_out_temperature);
}

void fill_lift(Ledger& ledger, Duty duty) {
  ledger[lift] = combine([](const Number& hot, const Number& cold) { return hot - cold; },
                         ledger[hot_mean], ledger[cold_mean]);
  const auto cop_rev = [&](const Number& lift_K, const Number& hot,
                           const Number& cold) -> Result<Number> {
    if (!(lift_K.value > 0.0)) {
      return refuse(ReasonCode::not_needed, "lift", lift_K.value);
    }
    if (lift_K.value < least_lift_K) {
      return refuse(ReasonCode::lift_too_small, "lift", lift_K.value);
    }
    return (duty == Duty::cooling ? cold : hot) / lift_K;
  };
  ledger[cop_reversible] = combine(cop_rev, ledger[lift], ledger[hot_mean], ledger[cold_mean]);
  ledger[reference] = duty == Duty::cooling ? ledger[hot_mean] : ledger[cold_mean];
}

void fill_circuit(Ledger& ledger, const CircuitStates& states) {
  const auto difference = [](const Number& a, const Number& b) { return a - b; };
  ledger[evaporating] = states.evaporating_T_K;
  ledger[condensing] = states.condensing_T_K;
  ledger[pressure_ratio] = states.pressure_ratio;
  ledger[superheat] = states.superheat_K;
  ledger[subcooling] = states.subcooling_K;
  ledger[discharge] = ledger.inputs[Role::discharge_temperature];
  ledger[cold_approach] = combine(difference, ledger[cold_out], states.evaporating_T_K);
  ledger[hot_approach] = combine(difference, states.condensing_T_K, ledger[hot_out]);
  ledger[isentropic_efficiency] = combine(
      [](const Number& ideal, const Node& suction, const Node& discharge) -> Result<Number> {
        const Number rise = discharge.h_Jkg - suction.h_Jkg;
        if (!(rise.value > 0.0)) {
          return refuse(ReasonCode::contradicts, name(Role::discharge_temperature), rise.value);
        }
        return (ideal - suction.h_Jkg) / rise;
      },
      states.isentropic_h_Jkg, states.suction, states.discharge);
}

void fill_balance(Ledger& ledger, const MachineBalance& balance) {
  ledger[refrigerant_flow] = balance.flow_kgs;
  ledger[casing_heat] = balance.casing_W;
  ledger[entropy_compressor] = balance.entropy_WK.compressor;
  ledger[entropy_condenser] = balance.entropy_WK.condenser;
  ledger[entropy_expansion] = balance.entropy_WK.expansion;
  ledger[entropy_evaporator] = balance.entropy_WK.evaporator;
  ledger[entropy_lines] = balance.entropy_WK.lines;
  ledger[entropy_total] = balance.total_WK;

  const auto times = [](const Number& a, const Number& b) { return a * b; };
  const Result<Number>& T0_K = ledger[reference];  // NOLINT(readability-identifier-naming)
  ledger[lost_compressor] = combine(times, ledger[entropy_compressor], T0_K);
  ledger[lost_condenser] = combine(times, ledger[entropy_condenser], T0_K);
  ledger[lost_expansion] = combine(times, ledger[entropy_expansion], T0_K);
  ledger[lost_evaporator] = combine(times, ledger[entropy_evaporator], T0_K);
  ledger[lost_lines] = combine(times, ledger[entropy_lines], T0_K);
  ledger[lost_total] = combine(times, ledger[entropy_total], T0_K);
  ledger[casing] =
      combine([](const Number& heat_W, const Number& T0,
                 const Number& around_T_K) { return heat_W * (1.0 - T0 / around_T_K); },
              balance.casing_W, T0_K, balance.around_T_K);
}

// W_rev = Q_L (T_H/T_L - 1) for cooling, Q_H (1 - T_L/T_H) for heating.
Number least_power_W(Duty duty, const Number& product_W, const Number& hot, const Number& cold) {
  return duty == Duty::cooling ? product_W * (hot / cold - 1.0) : product_W * (1.0 - cold / hot);
}

// Why the second-law efficiency would be noise or nonsense, though it could be computed.
std::optional<Reason> guard(const Ledger& ledger, const MachineModel& model,
                            const Number& product_W) {
  const Errors& errors = ledger.inputs.errors;
  const Number& W = *ledger[power];
  const Number& lift_K = *ledger[lift];
  const auto reason = [](ReasonCode code, std::string_view blame, double value_SI) {
    return Reason{.code = code, .blame = blame, .value_SI = value_SI};
  };
  if (W.value < low_share * model.rated_power_W) {
    return reason(ReasonCode::load_too_small, name(Role::power), W.value);
  }
  if (!(lift_K.value > 0.0)) {
    return reason(ReasonCode::not_needed, "lift", lift_K.value);
  }
  if (lift_K.value < least_lift_K) {
    return reason(ReasonCode::lift_too_small, "lift", lift_K.value);
  }
  if (!(product_W.value > 2.0 * errors.u(product_W))) {
    return reason(ReasonCode::load_too_small, "product heat", product_W.value);
  }
  return std::nullopt;
}

// The second law as a lie detector.
std::optional<Reason> impossible(const Ledger& ledger, const Number& efficiency) {
  const Errors& errors = ledger.inputs.errors;
  if (efficiency.value > 1.0 + 2.0 * errors.u(efficiency)) {
    return Reason{
        .code = ReasonCode::contradicts, .blame = "second law", .value_SI = efficiency.value};
  }
  const Result<Number>& S = ledger[entropy_total];
  if (S && S->value < -2.0 * errors.u(*S)) {
    return Reason{.code = ReasonCode::contradicts, .blame = "second law", .value_SI = S->value};
  }
  return std::nullopt;
}

Result<Number> efficiency_of(const Ledger& ledger, const MachineModel& model,
                             const Result<Number>& product_W) {
  return combine(
      [&](const Number& W, const Number& W_rev, const Number& product) -> Result<Number> {
        if (const auto why = guard(ledger, model, product)) {
          return tl::unexpected{*why};
        }
        const Number efficiency = W_rev / W;
        if (const auto why = impossible(ledger, efficiency)) {
          return tl::unexpected{*why};
        }
        return efficiency;
      },
      ledger[power], ledger[reversible_power], product_W);
}

void fill_headline(Ledger& ledger, const MachineModel& model, const Result<Number>& product_W) {
  ledger[cop] =
      combine([](const Number& Q, const Number& W) { return Q / W; }, product_W, ledger[power]);
  ledger[reversible_power] =
      combine([&](const Number& Q, const Number& hot,
                  const Number& cold) { return least_power_W(model.duty, Q, hot, cold); },
              product_W, ledger[hot_mean], ledger[cold_mean]);
  ledger[second_law_efficiency] = efficiency_of(ledger, model, product_W);
  ledger[unaccounted] =
      combine([](const Number& W, const Number& W_rev, const Number& lost,
                 const Number& around) { return W - W_rev - lost - around; },
              ledger[power], ledger[reversible_power], ledger[lost_total], ledger[casing]);
  ledger[energy_residual] =
      combine([](const Number& W, const Number& QL, const Number& QH,
                 const Number& Qa) { return W + QL - QH - Qa; },
              ledger[power], ledger[cold_heat], ledger[hot_heat], ledger[casing_heat]);
}

// What has a meaning in a machine at work alone.
void refuse_balance(Ledger& ledger, const Reason& why) {
  for (const Quantity q : {cop,
                           second_law_efficiency,
                           reversible_power,
                           entropy_total,
                           entropy_compressor,
                           entropy_condenser,
                           entropy_expansion,
                           entropy_evaporator,
                           entropy_lines,
                           lost_compressor,
                           lost_condenser,
                           lost_expansion,
                           lost_evaporator,
                           lost_lines,
                           lost_total,
                           casing,
                           unaccounted,
                           cold_approach,
                           hot_approach,
                           refrigerant_flow,
                           energy_residual,
                           casing_heat,
                           reference}) {
    ledger[q] = tl::unexpected{why};
  }
  if (why.code == ReasonCode::machine_off) {
    ledger[lift] = tl::unexpected{why};
    ledger[cop_reversible] = tl::unexpected{why};
  }
}

Ledger ledger_of(const MachineModel& model, const Scan& scan, Mode mode) {
  Ledger ledger{.inputs = read_inputs(model, scan), .values = {}};
  const std::optional<Reason> idle = why_idle(model, ledger.inputs, mode);
  ledger[power] = ledger.inputs[Role::power];
  ledger[power_expected] = refuse(ReasonCode::no_baseline, {}, not_known);
  ledger[power_residual] = ledger[power_expected];
  fill_streams(ledger, model, mode);
  fill_lift(ledger, model.duty);
  const CircuitStates states = circuit_states(model, ledger.inputs, idle);
  fill_circuit(ledger, states);
  if (idle) {
    refuse_balance(ledger, *idle);
    return ledger;
  }
  const MachineBalance balance = machine_balance(model, ledger.inputs,
                                                 {.power_W = ledger[power],
                                                  .cold_heat_W = ledger[cold_heat],
                                                  .hot_heat_W = ledger[hot_heat],
                                                  .cold_T_K = ledger[cold_mean],
                                                  .hot_T_K = ledger[hot_mean]},
                                                 states);
  fill_balance(ledger, balance);
  fill_headline(ledger, model, balance.product_W);
  return ledger;
}

std::vector<Contribution> contributions(const Number& number, const Errors& errors) {
  std::vector<Contribution> parts;
  for (std::size_t i = 0; i < input_count; ++i) {
    if (number.by.at(i) != 0.0) {
      parts.push_back(
          {.input = input_name(i), .sensitivity_SI = number.by.at(i), .u_SI = errors.u(i)});
    }
  }
  return parts;
}

}  // namespace

Assessment assess(const MachineModel& model, const Scan& scan, Mode mode) {
  const Ledger ledger = ledger_of(model, scan, mode);
  Assessment assessment;
  assessment.time = scan.time;
  assessment.mode = mode;
  assessment.level = level_of(usable_roles(ledger.inputs));
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto q = static_cast<Quantity>(i);
    assessment.values[q] = ledger[q].map(
        [&ledger](const Number& number) { return ledger.inputs.errors.measured(number); });
  }
  return assessment;
}

Result<std::vector<Contribution>> uncertainty_budget(const MachineModel& model, const Scan& scan,
                                                     Mode mode, Quantity quantity) {
  const Ledger ledger = ledger_of(model, scan, mode);
  return ledger[quantity].map([&errors = ledger.inputs.errors](const Number& number) {
    return contributions(number, errors);
  });
}

}  // namespace lostwork
