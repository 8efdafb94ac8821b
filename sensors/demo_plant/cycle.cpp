#include "sensors/demo_plant/cycle.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

// Engineering judgement, no published figure: how a short charge shows once no liquid stands in the
// condenser any more, and how superheat takes area from boiling.
constexpr double flash_per_missing_charge = 0.25;
constexpr double dry_per_missing_charge = 1.5;
constexpr double area_per_superheat_K = 0.012;
constexpr double normal_superheat_K = 5.0;
constexpr double reachable_superheat = 0.8;  // of the water's entering temperature difference
constexpr double least_work_Jkg = 500.0;     // while pressures are still level after a start

double boiling_share(double superheat_K, double missing_charge) {
  const double wetted = std::max(0.2, 1.0 - dry_per_missing_charge * missing_charge);
  const double boiling =
      std::clamp(1.0 - area_per_superheat_K * (superheat_K - normal_superheat_K), 0.3, 1.06);
  return wetted * boiling;
}

// Evaporator's outlet, suction line and the gas after the motor, as enthalpies.
struct SuctionPath {
  double saturation_T_K;  // at the compressor
  double out_h_Jkg;       // of the evaporator
  double suction_h_Jkg;
  double superheat_K;
};

SuctionPath suction_path(const CycleFrame& frame, double evaporating_T_K,
                         const SaturationRow& low) {
  const MachineParameters& machine = *frame.machine;
  const double reach = reachable_superheat * (frame.inlet.cold_in_T_K - evaporating_T_K);
  const double superheat_K = std::clamp(frame.superheat_K, 0.0, std::max(0.0, reach));
  const double out_h_Jkg =
      low.vapour_h_Jkg + frame.refrigerant->excess_h_of_superheat(evaporating_T_K, superheat_K);
  const double gain_W =
      machine.suction_gain_WK * (frame.inlet.room_T_K - evaporating_T_K - superheat_K);
  return {
      .saturation_T_K = evaporating_T_K - machine.suction_line_K * frame.capacity * frame.capacity,
      .out_h_Jkg = out_h_Jkg,
      .suction_h_Jkg = out_h_Jkg + gain_W / frame.refrigerant_kgs,
      .superheat_K = superheat_K};
}

void compress(const CycleFrame& frame, const SuctionPath& path, const SaturationRow& high,
              CycleTrial& trial) {
  const CompressorParameters& compressor = frame.machine->compressor;
  MachineTruth& truth = trial.truth;
  const SaturationRow low = frame.refrigerant->saturation(path.saturation_T_K);
  const double inside_h_Jkg = path.suction_h_Jkg + frame.motor_heat_W / frame.refrigerant_kgs;
  const VapourRow inside =
      frame.refrigerant->vapour(path.saturation_T_K, inside_h_Jkg - low.vapour_h_Jkg);
  const CompressorQuestion question{.capacity = frame.capacity,
                                    .pressure_ratio = high.p_Pa / low.p_Pa,
                                    .wear = frame.health.wear};
  truth.volumetric_efficiency = volumetric_efficiency(compressor, question);
  truth.isentropic_efficiency = isentropic_efficiency(compressor, question);
  truth.refrigerant_kgs =
      inside.rho_kgm3 * compressor.swept_m3s * frame.capacity * truth.volumetric_efficiency;
  const double excess_s_JkgK = low.vapour_s_JkgK + inside.excess_s_JkgK - high.vapour_s_JkgK;
  const double ideal_h_Jkg = high.vapour_h_Jkg + frame.refrigerant->excess_h_of_entropy(
                                                     truth.condensing_T_K, excess_s_JkgK);
  const double work_Jkg =
      std::max(ideal_h_Jkg - inside_h_Jkg, least_work_Jkg) / truth.isentropic_efficiency;
  trial.shaft_W = truth.refrigerant_kgs * work_Jkg;
  trial.motor_heat_W = loss_W(compressor.motor, trial.shaft_W, compressor.rated_shaft_W);
  const double drive_W = loss_W(compressor.drive, trial.shaft_W, compressor.rated_shaft_W);
  const double casing_W =
      compressor.casing_conductance_WK * (frame.casing_T_K - frame.inlet.room_T_K);
  truth.power_W = trial.shaft_W + trial.motor_heat_W + drive_W + frame.machine->standby_W;
  truth.casing_heat_W = casing_W + drive_W + frame.machine->standby_W;
  truth.suction.p_Pa = low.p_Pa;
  truth.suction.h_Jkg = path.suction_h_Jkg;
  truth.discharge.p_Pa = high.p_Pa;
  truth.discharge.h_Jkg =
      path.suction_h_Jkg + (trial.shaft_W + trial.motor_heat_W - casing_W) / truth.refrigerant_kgs;
}

// Liquid stands in the part of the condenser where the water enters: it is cooled there first.
void condense(const CycleFrame& frame, const SaturationRow& high, CycleTrial& trial) {
  MachineTruth& truth = trial.truth;
  const double reach_K = truth.condensing_T_K - frame.inlet.hot_in_T_K;
  truth.subcooling_K = 0.0;
  double h_Jkg = high.liquid_h_Jkg + frame.liquid_quality * (high.vapour_h_Jkg - high.liquid_h_Jkg);
  if (frame.subcooler_WK > 0.0 && reach_K > 0.0) {
    constexpr double liquid_cp_JkgK = 1480.0;  // R134a near 35 degC; only shares out area
    const double liquid_WK = truth.refrigerant_kgs * liquid_cp_JkgK;
    const double share = counterflow_effectiveness(frame.subcooler_WK / liquid_WK,
                                                   liquid_WK / frame.hot_capacity_WK);
    truth.subcooling_K = share * reach_K;
    h_Jkg -= frame.refrigerant->liquid(truth.condensing_T_K, truth.subcooling_K).missing_h_Jkg;
  }
  truth.liquid.p_Pa = high.p_Pa;
  truth.liquid.h_Jkg = h_Jkg;
  truth.liquid_quality = frame.liquid_quality;
  const double subcooler_W = truth.refrigerant_kgs * (high.liquid_h_Jkg - h_Jkg);
  const double warmed_K = std::max(0.0, subcooler_W) / frame.hot_capacity_WK;
  truth.hot_heat_W = std::max(0.0, subcooler_W) +
                     frame.condenser_effectiveness * frame.hot_capacity_WK * (reach_K - warmed_K);
  trial.condenser_refrigerant_W = truth.refrigerant_kgs * (truth.discharge.h_Jkg - h_Jkg);
}

void add_points(const CycleFrame& frame, MachineTruth& truth) {
  const Refrigerant& r = *frame.refrigerant;
  const SaturationRow low = r.saturation(truth.evaporating_T_K);
  const SaturationRow high = r.saturation(truth.condensing_T_K);
  const double suction_T_K =
      truth.evaporating_T_K - frame.machine->suction_line_K * frame.capacity * frame.capacity;
  const SaturationRow inlet = r.saturation(suction_T_K);
  const VapourRow out =
      r.vapour(truth.evaporating_T_K, truth.evaporator_out.h_Jkg - low.vapour_h_Jkg);
  truth.evaporator_out.p_Pa = low.p_Pa;
  truth.evaporator_out.T_K = truth.evaporating_T_K + out.superheat_K;
  truth.evaporator_out.s_JkgK = low.vapour_s_JkgK + out.excess_s_JkgK;
  const VapourRow suction = r.vapour(suction_T_K, truth.suction.h_Jkg - inlet.vapour_h_Jkg);
  truth.suction.T_K = suction_T_K + suction.superheat_K;
  truth.suction.s_JkgK = inlet.vapour_s_JkgK + suction.excess_s_JkgK;
  const VapourRow hot = r.vapour(truth.condensing_T_K, truth.discharge.h_Jkg - high.vapour_h_Jkg);
  truth.discharge.T_K = truth.condensing_T_K + hot.superheat_K;
  truth.discharge.s_JkgK = high.vapour_s_JkgK + hot.excess_s_JkgK;
  truth.liquid.T_K = truth.condensing_T_K - truth.subcooling_K;
  truth.liquid.s_JkgK = high.liquid_s_JkgK +
                        truth.liquid_quality * (high.vapour_s_JkgK - high.liquid_s_JkgK) -
                        r.liquid(truth.condensing_T_K, truth.subcooling_K).missing_s_JkgK;
  const double quality =
      (truth.liquid.h_Jkg - low.liquid_h_Jkg) / (low.vapour_h_Jkg - low.liquid_h_Jkg);
  truth.evaporator_in = {
      .T_K = truth.evaporating_T_K,
      .p_Pa = low.p_Pa,
      .h_Jkg = truth.liquid.h_Jkg,
      .s_JkgK = low.liquid_s_JkgK + quality * (low.vapour_s_JkgK - low.liquid_s_JkgK)};
  const double density =
      1.0 / (high.liquid_v + truth.liquid_quality * (high.vapour_v - high.liquid_v));
  truth.valve_opening =
      truth.refrigerant_kgs / (frame.machine->valve_flow_area_m2 *
                               std::sqrt(2.0 * density * std::max(high.p_Pa - low.p_Pa, 1.0)));
}

void add_entropies(const CycleFrame& frame, MachineTruth& truth) {
  const double m = truth.refrigerant_kgs;
  const double room_T_K = frame.inlet.room_T_K;
  truth.compressor_entropy_WK =
      m * (truth.discharge.s_JkgK - truth.suction.s_JkgK) + truth.casing_heat_W / room_T_K;
  truth.condenser_entropy_WK =
      m * (truth.liquid.s_JkgK - truth.discharge.s_JkgK) +
      frame.hot_capacity_WK * std::log(truth.hot_out_T_K / frame.inlet.hot_in_T_K) +
      truth.condenser_storage_W / truth.condensing_T_K;
  truth.valve_entropy_WK = m * (truth.evaporator_in.s_JkgK - truth.liquid.s_JkgK);
  truth.evaporator_entropy_WK =
      m * (truth.evaporator_out.s_JkgK - truth.evaporator_in.s_JkgK) -
      frame.cold_capacity_WK * std::log(frame.inlet.cold_in_T_K / truth.cold_out_T_K) +
      truth.evaporator_storage_W / truth.evaporating_T_K;
  truth.suction_line_entropy_WK =
      m * (truth.suction.s_JkgK - truth.evaporator_out.s_JkgK) - truth.suction_gain_W / room_T_K;
}

}  // namespace

CycleFrame frame(const MachineParameters& machine, const Refrigerant& refrigerant,
                 const CycleFrameInput& input, const MachineMemory& state) {
  const Water& water = plant_water();
  CycleFrame f{.machine = &machine,
               .refrigerant = &refrigerant,
               .inlet = input.inlet,
               .health = input.health,
               .capacity = input.capacity,
               .superheat_K = state.superheat_K,
               .refrigerant_kgs = state.refrigerant_kgs,
               .motor_heat_W = state.motor_heat_W,
               .casing_T_K = state.casing_T_K,
               .cold_capacity_WK = 0.0,
               .hot_capacity_WK = 0.0,
               .evaporator_effectiveness = 0.0,
               .condenser_effectiveness = 0.0,
               .subcooler_WK = 0.0,
               .liquid_quality = 0.0};
  const MachineInlet& inlet = input.inlet;
  f.cold_capacity_WK = inlet.cold_kgs * water.cp_JkgK(inlet.cold_in_T_K - 0.5 * state.cold_drop_K);
  f.hot_capacity_WK = inlet.hot_kgs * water.cp_JkgK(inlet.hot_in_T_K + 0.5 * state.hot_rise_K);
  const double missing = std::max(0.0, input.health.charge_lost - machine.subcooler_charge);
  const double evaporator_WK = conductance_WK(machine.evaporator, inlet.cold_kgs, 0.0) *
                               boiling_share(state.superheat_K, missing);
  f.evaporator_effectiveness = effectiveness(evaporator_WK / f.cold_capacity_WK);
  const double flooded = machine.subcooler_area *
                         std::max(0.0, 1.0 - input.health.charge_lost / machine.subcooler_charge);
  const double condenser_WK =
      conductance_WK(machine.condenser, inlet.hot_kgs, input.health.fouling);
  f.condenser_effectiveness = effectiveness(condenser_WK * (1.0 - flooded) / f.hot_capacity_WK);
  f.subcooler_WK = condenser_WK * flooded * machine.subcooler_transfer;
  f.liquid_quality = flash_per_missing_charge * missing;
  return f;
}

CycleTrial trial(const CycleFrame& frame, const Saturations& at) {
  CycleTrial result{.truth = {},
                    .evaporator_refrigerant_W = 0.0,
                    .condenser_refrigerant_W = 0.0,
                    .shaft_W = 0.0,
                    .motor_heat_W = 0.0};
  MachineTruth& truth = result.truth;
  truth.evaporating_T_K = at.evaporating_T_K;
  truth.condensing_T_K = at.condensing_T_K;
  const SaturationRow low = frame.refrigerant->saturation(at.evaporating_T_K);
  const SaturationRow high = frame.refrigerant->saturation(at.condensing_T_K);
  const SuctionPath path = suction_path(frame, at.evaporating_T_K, low);
  truth.superheat_K = path.superheat_K;
  truth.evaporator_out.h_Jkg = path.out_h_Jkg;
  compress(frame, path, high, result);
  truth.suction_gain_W = truth.refrigerant_kgs * (path.suction_h_Jkg - path.out_h_Jkg);
  condense(frame, high, result);
  truth.cold_heat_W = frame.evaporator_effectiveness * frame.cold_capacity_WK *
                      (frame.inlet.cold_in_T_K - at.evaporating_T_K);
  result.evaporator_refrigerant_W = truth.refrigerant_kgs * (path.out_h_Jkg - truth.liquid.h_Jkg);
  return result;
}

MachineTruth full(const CycleFrame& frame, const CycleTrial& trial) {
  MachineTruth truth = trial.truth;
  truth.running = true;
  truth.capacity = frame.capacity;
  truth.inlet = frame.inlet;
  truth.health = frame.health;
  truth.cold_out_T_K = frame.inlet.cold_in_T_K - truth.cold_heat_W / frame.cold_capacity_WK;
  truth.hot_out_T_K = frame.inlet.hot_in_T_K + truth.hot_heat_W / frame.hot_capacity_WK;
  truth.evaporator_storage_W = truth.cold_heat_W - trial.evaporator_refrigerant_W;
  truth.condenser_storage_W = trial.condenser_refrigerant_W - truth.hot_heat_W;
  add_points(frame, truth);
  add_entropies(frame, truth);
  return truth;
}

}  // namespace lostwork
