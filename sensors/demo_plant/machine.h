// One simulated R134a machine: compressor, condenser, valve and dry evaporator between two streams
// of water.
//
// The refrigerant is in step with itself (its own inertia is seconds); the shells with their metal
// and liquid store heat, and are stepped by the implicit Euler rule, stable for any step. Signs as
// in the ledger: cold heat into the machine, hot heat out of it, power in, casing heat out, all > 0
// in normal running.
#pragma once

#include "sensors/demo_plant/compressor.h"
#include "sensors/demo_plant/exchanger.h"
#include "sensors/demo_plant/refrigerant.h"
#include "sensors/demo_plant/water.h"

#include <chrono>
#include <cstdint>

namespace lostwork {

using Seconds = std::chrono::duration<double>;

enum class ProductSide : std::uint8_t { cold, hot };

struct MachineParameters {
  ProductSide product;
  double product_T_K;         // the set point: water leaving on the product's side
  double start_difference_K;  // starts when the entering product water is that far off
  double stop_difference_K;   // stops at least capacity when the leaving water is that far beyond
  double rated_power_W;
  double least_capacity;  // of the full one; below it, the machine switches itself off
  CompressorParameters compressor;
  ExchangerParameters evaporator;
  ExchangerParameters condenser;
  double superheat_set_K;
  double subcooler_area;      // share of the condenser that a full charge floods
  double subcooler_transfer;  // heat transfer there / in the condensing part
  double subcooler_charge;    // share of the charge that can leak before it is empty
  double suction_line_K;      // pressure drop at full flow, as kelvin of saturation
  double suction_gain_WK;     // heat taken up from the room
  double valve_flow_area_m2;  // fully open, contraction included
  double standby_W;           // controls and sump heater
};

struct MachineInlet {
  double cold_in_T_K;
  double cold_kgs;
  double hot_in_T_K;
  double hot_kgs;
  double room_T_K;
};

// All 0 for a machine as delivered. Missing water flow is part of the inlet.
struct MachineHealth {
  double fouling = 0.0;  // resistance added to the condenser / its clean resistance at rated flow
  double charge_lost = 0.0;  // share of the charge
  double wear = 0.0;         // share of the isentropic efficiency; the volumetric loses half of it
};

// One thermodynamic state of the refrigerant.
struct RefrigerantPoint {
  double T_K = 0.0;
  double p_Pa = 0.0;
  double h_Jkg = 0.0;
  double s_JkgK = 0.0;
};

struct MachineTruth {
  bool running = false;
  bool starting = false;  // running, for less than three minutes
  double capacity = 0.0;  // 0..1
  MachineInlet inlet{};
  MachineHealth health{};
  double cold_out_T_K = 0.0;
  double hot_out_T_K = 0.0;
  double power_W = 0.0;
  double cold_heat_W = 0.0;
  double hot_heat_W = 0.0;
  double casing_heat_W = 0.0;         // out of compressor and drive
  double suction_gain_W = 0.0;        // into the suction line
  double evaporator_storage_W = 0.0;  // heat going into the shells' metal: power + cold heat +
  double condenser_storage_W = 0.0;   // suction gain = hot heat + casing + both storages
  double refrigerant_kgs = 0.0;
  double evaporating_T_K = 0.0;  // saturation at the evaporator's and the condenser's pressure
  double condensing_T_K = 0.0;
  double superheat_K = 0.0;  // at the evaporator's outlet
  double subcooling_K = 0.0;
  double liquid_quality = 0.0;  // > 0: flash gas before the valve
  double valve_opening = 0.0;   // above 1: it cannot pass the flow, the superheat rises
  double isentropic_efficiency = 0.0;
  double volumetric_efficiency = 0.0;
  RefrigerantPoint evaporator_out;
  RefrigerantPoint suction;
  RefrigerantPoint discharge;
  RefrigerantPoint liquid;
  RefrigerantPoint evaporator_in;
  // Entropy generated, W/K, each with the heat exchanged at the temperature where it is.
  double compressor_entropy_WK = 0.0;  // with motor and drive
  double condenser_entropy_WK = 0.0;
  double valve_entropy_WK = 0.0;
  double evaporator_entropy_WK = 0.0;
  double suction_line_entropy_WK = 0.0;
};

// What the machine carries from step to step.
struct MachineMemory {
  bool running = false;
  double capacity = 0.0;
  Seconds since_switch{3600.0};
  double evaporating_T_K = 285.0;
  double condensing_T_K = 285.0;
  double superheat_K = 5.0;
  double valve_opening = 0.0;
  double casing_T_K = 293.0;  // lags the discharge
  double refrigerant_kgs = 0.0;
  double motor_heat_W = 0.0;   // into the suction gas
  double product_ratio = 1.0;  // product heat wanted / given in the last step
  double cold_drop_K = 0.0;    // of the waters in the last step
  double hot_rise_K = 0.0;
};

struct MachineOrder {
  Seconds dt;
  double most_capacity = 1.0;    // 0..1: a limit from outside; 0 stops it
  double superheat_noise_K = 0;  // what the valve's control is off by
};

class Machine {
 public:
  // Both outlive the machine.
  Machine(const MachineParameters& parameters, const Refrigerant& refrigerant)
      : parameters_{&parameters}, refrigerant_{&refrigerant} {}

  // The truth at the end of the step. Throws std::runtime_error where no balance is found.
  MachineTruth step(const MachineInlet& inlet, const MachineHealth& health,
                    const MachineOrder& order);

  [[nodiscard]] const MachineMemory& state() const { return state_; }
  [[nodiscard]] const MachineParameters& parameters() const { return *parameters_; }
  [[nodiscard]] const Refrigerant& refrigerant() const { return *refrigerant_; }

 private:
  MachineTruth stand(const MachineInlet& inlet, const MachineHealth& health,
                     const MachineOrder& order);
  MachineTruth run(const MachineInlet& inlet, const MachineHealth& health,
                   const MachineOrder& order);
  void switch_if_due(const MachineInlet& inlet, const MachineOrder& order);
  void remember(const MachineTruth& truth, const MachineOrder& order);

  const MachineParameters* parameters_;
  const Refrigerant* refrigerant_;
  MachineMemory state_;
};

// The steady state in which the machine gives that product heat (> 0), whatever its controls would
// do. Throws std::runtime_error where it cannot.
[[nodiscard]] MachineTruth steady_point(const Machine& machine, const MachineInlet& inlet,
                                        const MachineHealth& health, double wanted_W);

}  // namespace lostwork
