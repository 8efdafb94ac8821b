// Weather, loads and water loops of the simulated site. Invented throughout.
//
//  process load --> chilled tank --> chiller-1 --> process
//  chiller-1 condenser --> warm tank --> dry cooler --> cool tank --> chiller-1 condenser
//                             ^ heatpump-1's evaporator draws from it and returns to it
//  heatpump-1 condenser --> washing and heating --> hot return tank --> heatpump-1 condenser
//
// Every tank is well mixed and stepped by its exact exponential.
#pragma once

#include "sensors/demo_plant/machine.h"
#include "thermo/reading.h"

#include <cstdint>

namespace lostwork {

struct SiteTruth {
  double air_T_K = 0.0;
  double air_humidity = 0.0;     // 0..1
  double room_T_K = 0.0;         // plant room
  double chilled_load_W = 0.0;   // what the process gives to the chilled water
  double hot_load_W = 0.0;       // what is taken from the hot water
  double chilled_gain_W = 0.0;   // pipes, from the room
  double hot_pipe_loss_W = 0.0;  // pipes, to the room
  double cooler_heat_W = 0.0;    // from the dry cooler to the outdoor air
  double chilled_tank_T_K = 284.0;
  double warm_tank_T_K = 294.0;
  double cool_tank_T_K = 291.0;
  double hot_tank_T_K = 330.0;
  double refrigerant_in_air = 0.0;  // volume fraction at the leak detector, set by the plant
};

// Weather and loads: pure functions of the seed and the time (UTC).
[[nodiscard]] double air_T_K(std::uint64_t seed, Instant time);
[[nodiscard]] double air_humidity(std::uint64_t seed, Instant time);
[[nodiscard]] double chilled_load_W(std::uint64_t seed, Instant time, double air_T_K);
[[nodiscard]] double hot_load_W(std::uint64_t seed, Instant time, double air_T_K);

class Site {
 public:
  Site(std::uint64_t seed, Instant time) : seed_{seed} { set_weather(time); }

  // Air, humidity and plant room at that time.
  void set_weather(Instant time);

  // What the machines are given at that time; a flow_loss is the missing share of that machine's
  // condenser water.
  [[nodiscard]] MachineInlet chiller_inlet(Instant time, double flow_loss) const;
  [[nodiscard]] MachineInlet heat_pump_inlet(Instant time, double flow_loss) const;

  // The share of full capacity that the heat pump's source allows.
  [[nodiscard]] double heat_pump_limit() const;

  // The loops go on by dt to `time`, with what the machines gave during the step.
  void advance(Instant time, Seconds dt, const MachineTruth& chiller,
               const MachineTruth& heat_pump);

  [[nodiscard]] const SiteTruth& truth() const { return truth_; }

 private:
  void advance_chilled(Instant time, Seconds dt, const MachineTruth& chiller);
  void advance_condenser_loop(Seconds dt, const MachineTruth& chiller,
                              const MachineTruth& heat_pump);
  void advance_hot(Instant time, Seconds dt, const MachineTruth& heat_pump);

  std::uint64_t seed_;
  SiteTruth truth_;
};

}  // namespace lostwork
