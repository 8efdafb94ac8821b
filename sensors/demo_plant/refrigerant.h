// R134a for the simulated plant: tables made once from the equation of state, read in some 50 ns.
//
// The saturation temperature stands for the pressure, so that the saturation line is straight in
// every table. Cubic interpolation on even grids; against the equation of state, within the ranges
// below: pressures 2e-6 of themselves, enthalpies 2 J/kg, entropies 0.01 J/(kg K), temperatures
// 2 mK, densities 2e-5 of themselves (tests/sensors/demo_plant/refrigerant_test.cpp). Outside the
// ranges the nearest edge is taken: the solver of machine.cpp may look there, no answer lies there.
#pragma once

#include "thermo/fluids/state.h"

#include <array>
#include <cstddef>
#include <vector>

namespace lostwork {

// Even steps along one coordinate.
struct TableAxis {
  double first;
  double step;
  std::size_t count;  // >= 4
};

struct SaturationRow {
  double p_Pa;
  double liquid_h_Jkg;
  double vapour_h_Jkg;
  double liquid_s_JkgK;
  double vapour_s_JkgK;
  double liquid_v;  // m3/kg
  double vapour_v;  // m3/kg
};

struct VapourRow {
  double superheat_K;
  double excess_s_JkgK;  // above saturated vapour of the same pressure
  double rho_kgm3;
};

struct LiquidRow {
  double missing_h_Jkg;   // below saturated liquid of the same pressure, > 0
  double missing_s_JkgK;  // likewise
};

class Refrigerant {
 public:
  static constexpr double min_T_K = 248.15;  // of saturation
  static constexpr double max_T_K = 358.15;
  static constexpr double max_superheat_K = 30.0;     // excess_h_of_superheat
  static constexpr double max_excess_h_Jkg = 80e3;    // vapour
  static constexpr double max_excess_s_JkgK = 200.0;  // excess_h_of_entropy
  static constexpr double max_subcooling_K = 30.0;

  // Throws std::runtime_error where the equation of state has no answer.
  explicit Refrigerant(const Fluid& fluid);

  [[nodiscard]] SaturationRow saturation(double T_K) const;
  // Superheated vapour at the pressure of that saturation temperature; excess over saturated
  // vapour.
  [[nodiscard]] VapourRow vapour(double saturation_T_K, double excess_h_Jkg) const;
  [[nodiscard]] double excess_h_of_superheat(double saturation_T_K, double superheat_K) const;
  [[nodiscard]] double excess_h_of_entropy(double saturation_T_K, double excess_s_JkgK) const;
  [[nodiscard]] LiquidRow liquid(double saturation_T_K, double subcooling_K) const;

 private:
  std::vector<std::array<double, 7>> saturation_;
  std::vector<std::array<double, 3>> vapour_;
  std::vector<std::array<double, 1>> by_superheat_;
  std::vector<std::array<double, 1>> by_entropy_;
  std::vector<std::array<double, 2>> liquid_;
};

// Made at the first call, then shared; safe from any thread.
[[nodiscard]] const Refrigerant& plant_r134a();

}  // namespace lostwork
