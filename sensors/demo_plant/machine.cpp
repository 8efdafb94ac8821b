#include "sensors/demo_plant/machine.h"

#include "sensors/demo_plant/cycle.h"

#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace lostwork {
namespace {

// Time constants of an invented machine; their size is common practice, no source.
constexpr Seconds capacity_lag{80.0};
constexpr Seconds capacity_run_up{180.0};  // from nothing to full
constexpr Seconds superheat_lag{40.0};
constexpr Seconds casing_lag{600.0};
constexpr Seconds standing_shell_lag{300.0};
constexpr Seconds standing_level_lag{480.0};  // until the pressures are level
constexpr Seconds standing_casing_lag{2400.0};
constexpr Seconds least_rest{600.0};
constexpr double starved_valve_K = 12.0;  // superheat per unit of opening that is not there

// The share of a way to its end that is gone after dt.
double gone(Seconds dt, Seconds lag) {
  return -std::expm1(-dt / lag);
}

// Heat that the shells do not account for in a trial, W.
struct Imbalance {
  double evaporator_W;
  double condenser_W;
  [[nodiscard]] double size_W() const {
    return std::max(std::abs(evaporator_W), std::abs(condenser_W));
  }
};

struct ShellStep {
  Saturations before;
  double evaporator_WK;  // heat capacity / step: 0 for the steady state
  double condenser_WK;
};

Imbalance imbalance(const CycleTrial& trial, const ShellStep& shells) {
  const MachineTruth& truth = trial.truth;
  return {
      .evaporator_W =
          truth.cold_heat_W - trial.evaporator_refrigerant_W -
          shells.evaporator_WK * (truth.evaporating_T_K - shells.before.evaporating_T_K),
      .condenser_W = trial.condenser_refrigerant_W - truth.hot_heat_W -
                     shells.condenser_WK * (truth.condensing_T_K - shells.before.condensing_T_K)};
}

// d imbalance / d saturation temperature, W/K.
struct Jacobian {
  double ee;
  double ec;
  double ce;
  double cc;
};

Jacobian jacobian(const CycleFrame& frame, const ShellStep& shells, const Saturations& at,
                  const Imbalance& here) {
  constexpr double d_K = 1e-3;
  const Imbalance e =
      imbalance(trial(frame, {at.evaporating_T_K + d_K, at.condensing_T_K}), shells);
  const Imbalance c =
      imbalance(trial(frame, {at.evaporating_T_K, at.condensing_T_K + d_K}), shells);
  return {.ee = (e.evaporator_W - here.evaporator_W) / d_K,
          .ec = (c.evaporator_W - here.evaporator_W) / d_K,
          .ce = (e.condenser_W - here.condenser_W) / d_K,
          .cc = (c.condenser_W - here.condenser_W) / d_K};
}

Saturations improved(const Saturations& at, const Imbalance& here, const Jacobian& j) {
  constexpr double most_K = 10.0;
  const double determinant = j.ee * j.cc - j.ec * j.ce;
  const double e_K = (j.ec * here.condenser_W - j.cc * here.evaporator_W) / determinant;
  const double c_K = (j.ce * here.evaporator_W - j.ee * here.condenser_W) / determinant;
  const double low = Refrigerant::min_T_K + 2.0;
  const double high = Refrigerant::max_T_K - 1.0;
  return {.evaporating_T_K =
              std::clamp(at.evaporating_T_K + std::clamp(e_K, -most_K, most_K), low, high),
          .condensing_T_K =
              std::clamp(at.condensing_T_K + std::clamp(c_K, -most_K, most_K), low, high)};
}

// Newton's method; the derivatives are made anew only when it slows down.
CycleTrial balanced(const CycleFrame& frame, const ShellStep& shells) {
  constexpr int most_trials = 60;
  constexpr double close_W = 0.01;  // of some 1e5 W
  Saturations at = shells.before;
  CycleTrial now = trial(frame, at);
  Imbalance here = imbalance(now, shells);
  Jacobian slope = jacobian(frame, shells, at, here);
  for (int i = 0; i < most_trials && !(here.size_W() < close_W); ++i) {
    at = improved(at, here, slope);
    now = trial(frame, at);
    const double before_W = here.size_W();
    here = imbalance(now, shells);
    if (here.size_W() > 0.1 * before_W) {
      slope = jacobian(frame, shells, at, here);
    }
  }
  if (!(here.size_W() < close_W)) {
    throw std::runtime_error{"simulated plant: a machine finds no balance"};
  }
  return now;
}

double product_heat_W(const MachineParameters& machine, const MachineTruth& truth) {
  return machine.product == ProductSide::cold ? truth.cold_heat_W : truth.hot_heat_W;
}

// How far the product's water is from its set point in the direction of more capacity, K.
double lacking_K(const MachineParameters& machine, double product_T_K) {
  return machine.product == ProductSide::cold ? product_T_K - machine.product_T_K
                                              : machine.product_T_K - product_T_K;
}

double entering_T_K(const MachineParameters& machine, const MachineInlet& inlet) {
  return machine.product == ProductSide::cold ? inlet.cold_in_T_K : inlet.hot_in_T_K;
}

// Before the first step of a run nothing is known of it: a guess that no term depends on strongly.
double first_guess_kgs(const MachineParameters& machine, double capacity) {
  constexpr double work_Jkg = 30e3;
  return capacity * machine.rated_power_W / work_Jkg;
}

double wanted_ratio(const MachineParameters& machine, const CycleFrame& frame,
                    const MachineTruth& truth) {
  const double water_WK =
      machine.product == ProductSide::cold ? frame.cold_capacity_WK : frame.hot_capacity_WK;
  const double wanted_W = water_WK * lacking_K(machine, entering_T_K(machine, frame.inlet));
  return std::clamp(wanted_W / std::max(product_heat_W(machine, truth), 1.0), 0.0, 4.0);
}

}  // namespace

MachineTruth Machine::step(const MachineInlet& inlet, const MachineHealth& health,
                           const MachineOrder& order) {
  state_.since_switch += order.dt;
  switch_if_due(inlet, order);
  return state_.running ? run(inlet, health, order) : stand(inlet, health, order);
}

void Machine::switch_if_due(const MachineInlet& inlet, const MachineOrder& order) {
  const MachineParameters& machine = *parameters_;
  if (state_.since_switch < least_rest && order.most_capacity > 0.0) {
    return;
  }
  if (state_.running) {
    const double leaving_K =
        lacking_K(machine, entering_T_K(machine, inlet)) -
        (machine.product == ProductSide::cold ? state_.cold_drop_K : state_.hot_rise_K);
    const bool too_much =
        state_.capacity <= 1.001 * machine.least_capacity && leaving_K < -machine.stop_difference_K;
    if (too_much || order.most_capacity < 0.5 * machine.least_capacity) {
      state_.running = false;
      state_.capacity = 0.0;
      state_.since_switch = Seconds{0.0};
    }
  } else if (order.most_capacity >= machine.least_capacity &&
             lacking_K(machine, entering_T_K(machine, inlet)) > machine.start_difference_K) {
    state_.running = true;
    state_.capacity = machine.least_capacity;
    state_.since_switch = Seconds{0.0};
    state_.refrigerant_kgs = first_guess_kgs(machine, state_.capacity);
    state_.motor_heat_W = 0.0;
    state_.product_ratio = 1.0;
  }
}

MachineTruth Machine::stand(const MachineInlet& inlet, const MachineHealth& health,
                            const MachineOrder& order) {
  state_.evaporating_T_K +=
      gone(order.dt, standing_shell_lag) * (inlet.cold_in_T_K - state_.evaporating_T_K);
  state_.condensing_T_K +=
      gone(order.dt, standing_level_lag) * (state_.evaporating_T_K - state_.condensing_T_K);
  state_.casing_T_K += gone(order.dt, standing_casing_lag) * (inlet.room_T_K - state_.casing_T_K);
  state_.cold_drop_K = 0.0;
  state_.hot_rise_K = 0.0;
  state_.superheat_K = parameters_->superheat_set_K;
  MachineTruth truth;
  truth.inlet = inlet;
  truth.health = health;
  truth.cold_out_T_K = inlet.cold_in_T_K;
  truth.hot_out_T_K = inlet.hot_in_T_K;
  truth.power_W = parameters_->standby_W;
  truth.casing_heat_W = truth.power_W;
  truth.evaporating_T_K = state_.evaporating_T_K;
  truth.condensing_T_K = state_.condensing_T_K;
  const double low_Pa = refrigerant_->saturation(truth.evaporating_T_K).p_Pa;
  const double high_Pa = refrigerant_->saturation(truth.condensing_T_K).p_Pa;
  truth.evaporator_out = {.T_K = truth.evaporating_T_K, .p_Pa = low_Pa};
  truth.suction = {.T_K = inlet.room_T_K, .p_Pa = low_Pa};
  truth.discharge = {.T_K = state_.casing_T_K, .p_Pa = high_Pa};
  truth.liquid = {.T_K = truth.condensing_T_K, .p_Pa = high_Pa};
  truth.evaporator_in = {.T_K = truth.evaporating_T_K, .p_Pa = low_Pa};
  return truth;
}

MachineTruth Machine::run(const MachineInlet& inlet, const MachineHealth& health,
                          const MachineOrder& order) {
  const MachineParameters& machine = *parameters_;
  const double most = std::clamp(order.most_capacity, machine.least_capacity, 1.0);
  const double wanted =
      std::clamp(state_.capacity * state_.product_ratio, machine.least_capacity, most);
  const double change = gone(order.dt, capacity_lag) * (wanted - state_.capacity);
  const double quickest = order.dt / capacity_run_up;
  state_.capacity =
      std::clamp(state_.capacity + std::clamp(change, -quickest, quickest), 0.0, most);
  const double starved = std::max(0.0, state_.valve_opening - 1.0);
  const double superheat_K =
      machine.superheat_set_K + order.superheat_noise_K + starved_valve_K * starved;
  state_.superheat_K += gone(order.dt, superheat_lag) * (superheat_K - state_.superheat_K);
  const CycleFrame f =
      frame(machine, *refrigerant_, {.inlet = inlet, .health = health, .capacity = state_.capacity},
            state_);
  const CycleTrial solved =
      balanced(f, {
                      .before = {state_.evaporating_T_K, state_.condensing_T_K},
                      .evaporator_WK = machine.evaporator.heat_capacity_SI / order.dt.count(),
                      .condenser_WK = machine.condenser.heat_capacity_SI / order.dt.count()
  });
  MachineTruth truth = full(f, solved);
  truth.starting = state_.since_switch < capacity_run_up;
  state_.product_ratio = wanted_ratio(machine, f, truth);
  state_.motor_heat_W = solved.motor_heat_W;
  remember(truth, order);
  return truth;
}

void Machine::remember(const MachineTruth& truth, const MachineOrder& order) {
  state_.evaporating_T_K = truth.evaporating_T_K;
  state_.condensing_T_K = truth.condensing_T_K;
  state_.valve_opening = truth.valve_opening;
  state_.casing_T_K += gone(order.dt, casing_lag) * (truth.discharge.T_K - state_.casing_T_K);
  state_.refrigerant_kgs = truth.refrigerant_kgs;
  state_.cold_drop_K = truth.inlet.cold_in_T_K - truth.cold_out_T_K;
  state_.hot_rise_K = truth.hot_out_T_K - truth.inlet.hot_in_T_K;
}

namespace {

MachineMemory steady_start(const MachineParameters& machine, const MachineInlet& inlet) {
  MachineMemory state;
  state.capacity = 0.5;
  state.evaporating_T_K = inlet.cold_in_T_K - 8.0;
  state.condensing_T_K = inlet.hot_in_T_K + 8.0;
  state.casing_T_K = inlet.hot_in_T_K + 25.0;
  state.superheat_K = machine.superheat_set_K;
  state.refrigerant_kgs = first_guess_kgs(machine, state.capacity);
  return state;
}

// Takes over what a balanced round says; returns how much the slow temperatures still moved, K.
double take_over(MachineMemory& state, const MachineTruth& truth, const CycleTrial& round,
                 double superheat_set_K) {
  const double starved = std::max(0.0, truth.valve_opening - 1.0);
  const double superheat_K = superheat_set_K + starved_valve_K * starved;
  const double moved_K = std::max(std::abs(truth.discharge.T_K - state.casing_T_K),
                                  std::abs(superheat_K - state.superheat_K));
  state.superheat_K += 0.5 * (superheat_K - state.superheat_K);
  state.evaporating_T_K = truth.evaporating_T_K;
  state.condensing_T_K = truth.condensing_T_K;
  state.casing_T_K = truth.discharge.T_K;
  state.refrigerant_kgs = truth.refrigerant_kgs;
  state.motor_heat_W = round.motor_heat_W;
  state.cold_drop_K = truth.inlet.cold_in_T_K - truth.cold_out_T_K;
  state.hot_rise_K = truth.hot_out_T_K - truth.inlet.hot_in_T_K;
  return moved_K;
}

}  // namespace

MachineTruth steady_point(const Machine& machine, const MachineInlet& inlet,
                          const MachineHealth& health, double wanted_W) {
  constexpr int most_rounds = 400;
  constexpr double close = 2e-7;
  constexpr double still_K = 1e-5;
  const MachineParameters& parameters = machine.parameters();
  MachineMemory state = steady_start(parameters, inlet);
  for (int i = 0; i < most_rounds; ++i) {
    const CycleFrame f =
        frame(parameters, machine.refrigerant(),
              {.inlet = inlet, .health = health, .capacity = state.capacity}, state);
    const CycleTrial round =
        balanced(f, {
                        .before = {state.evaporating_T_K, state.condensing_T_K},
                        .evaporator_WK = 0.0,
                        .condenser_WK = 0.0
    });
    const MachineTruth truth = full(f, round);
    const double ratio = wanted_W / product_heat_W(parameters, truth);
    const double moved_K = take_over(state, truth, round, parameters.superheat_set_K);
    if (std::abs(ratio - 1.0) < close && moved_K < still_K) {
      return truth;
    }
    state.capacity = std::clamp(state.capacity * ratio, 0.02, 2.0);
  }
  throw std::runtime_error{"simulated plant: a machine cannot give that heat"};
}

}  // namespace lostwork
