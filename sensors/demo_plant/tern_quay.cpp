#include "sensors/demo_plant/tern_quay.h"

#include "sensors/unit.h"

namespace lostwork {
namespace {

double celsius(double value) {
  return to_SI(Unit::degC, value, 0.0);
}

// The cost grows with the fault: doubled until it is too much, then halved in between.
double size_for(const Machine& machine, const RatingPoint& rating, double extra,
                double MachineHealth::*fault) {
  const auto cost = [&](double size) {
    MachineHealth health;
    health.*fault = size;
    return extra_power(machine, rating, health);
  };
  const double most = fault == &MachineHealth::wear ? 0.4 : 6.0;
  double high = 0.02;
  while (high < most && cost(high) < extra) {
    high *= 2.0;
  }
  double low = 0.0;
  for (int i = 0; i < 40; ++i) {
    const double middle = 0.5 * (low + high);
    (cost(middle) < extra ? low : high) = middle;
  }
  return high;
}

}  // namespace

const MachineParameters& tern_quay_chiller() {
  static const MachineParameters parameters{
      .product = ProductSide::cold,
      .product_T_K = celsius(6.0),
      .start_difference_K = 3.5,
      .stop_difference_K = 1.2,
      .rated_power_W = 75e3,
      .least_capacity = 0.22,
      .compressor = {           .swept_m3s = 0.148,
                     .clearance = 0.015,
                     .leakage = 0.018,
                     .best_efficiency = 0.69,
                     .best_pressure_ratio = 2.6,
                     .ratio_penalty = 0.40,
                     .part_speed_penalty = 0.28,
                     .rated_shaft_W = 72e3,
                     .motor = {.constant = 0.028, .linear = 0.012, .quadratic = 0.030},
                     .drive = {.constant = 0.014, .linear = 0.014, .quadratic = 0.006},
                     .casing_conductance_WK = 22.0},
      .evaporator = {.water_resistance_SI = 9.0e-6,
                     .refrigerant_resistance_SI = 9.5e-6,
                     .rated_kgs = 13.6,
                     .heat_capacity_SI = 420e3  },
      .condenser = {.water_resistance_SI = 6.5e-6,
                     .refrigerant_resistance_SI = 6.0e-6,
                     .rated_kgs = 16.8,
                     .heat_capacity_SI = 380e3  },
      .superheat_set_K = 5.0,
      .subcooler_area = 0.12,
      .subcooler_transfer = 0.24,
      .subcooler_charge = 0.10,
      .suction_line_K = 0.35,
      .suction_gain_WK = 12.0,
      .valve_flow_area_m2 = 1.05e-4,
      .standby_W = 180.0
  };
  return parameters;
}

const MachineParameters& tern_quay_heat_pump() {
  static const MachineParameters parameters{
      .product = ProductSide::hot,
      .product_T_K = celsius(65.0),
      .start_difference_K = 5.0,
      .stop_difference_K = 1.2,
      .rated_power_W = 48e3,
      .least_capacity = 0.25,
      .compressor = {          .swept_m3s = 0.0500,
                     .clearance = 0.018,
                     .leakage = 0.014,
                     .best_efficiency = 0.76,
                     .best_pressure_ratio = 3.8,
                     .ratio_penalty = 0.20,
                     .part_speed_penalty = 0.14,
                     .rated_shaft_W = 45e3,
                     .motor = {.constant = 0.013, .linear = 0.012, .quadratic = 0.030},
                     .drive = {.constant = 0.007, .linear = 0.013, .quadratic = 0.006},
                     .casing_conductance_WK = 16.0},
      .evaporator = {.water_resistance_SI = 2.2e-5,
                     .refrigerant_resistance_SI = 2.5e-5,
                     .rated_kgs = 6.0,
                     .heat_capacity_SI = 160e3  },
      .condenser = {.water_resistance_SI = 1.7e-5,
                     .refrigerant_resistance_SI = 1.7e-5,
                     .rated_kgs = 3.8,
                     .heat_capacity_SI = 150e3  },
      .superheat_set_K = 6.0,
      .subcooler_area = 0.12,
      .subcooler_transfer = 0.30,
      .subcooler_charge = 0.10,
      .suction_line_K = 0.30,
      .suction_gain_WK = 6.0,
      .valve_flow_area_m2 = 3.4e-5,
      .standby_W = 150.0
  };
  return parameters;
}

const RatingPoint& chiller_rating() {
  static const RatingPoint rating{
      .inlet = {.cold_in_T_K = celsius(11.0),
                .cold_kgs = 13.6,
                .hot_in_T_K = celsius(28.0),
                .hot_kgs = 16.8,
                .room_T_K = celsius(20.0)},
      .product_heat_W = 280e3
  };
  return rating;
}

const RatingPoint& heat_pump_rating() {
  static const RatingPoint rating{
      .inlet = {.cold_in_T_K = celsius(25.0),
                .cold_kgs = 6.0,
                .hot_in_T_K = celsius(56.0),
                .hot_kgs = 3.8,
                .room_T_K = celsius(20.0)},
      .product_heat_W = 140e3
  };
  return rating;
}

double extra_power(const Machine& machine, const RatingPoint& rating, const MachineHealth& health) {
  const double sick_W = steady_point(machine, rating.inlet, health, rating.product_heat_W).power_W;
  const double well_W = steady_point(machine, rating.inlet, {}, rating.product_heat_W).power_W;
  return sick_W / well_W - 1.0;
}

double fouling_for(const Machine& machine, const RatingPoint& rating, double extra) {
  return size_for(machine, rating, extra, &MachineHealth::fouling);
}

double wear_for(const Machine& machine, const RatingPoint& rating, double extra) {
  return size_for(machine, rating, extra, &MachineHealth::wear);
}

}  // namespace lostwork
