// Water of the simulated loops: density and heat capacity at 300 kPa, read from a table made once
// from IAPWS-95. Linear between nodes 1 K apart: density within 3e-6 of itself, heat capacity
// within 1e-5. From 1 to 99 degC; outside, the nearest edge.
#pragma once

#include "thermo/fluids/state.h"

#include <vector>

namespace lostwork {

class Water {
 public:
  // Throws std::runtime_error where the equation of state has no answer.
  explicit Water(const Fluid& fluid);
  [[nodiscard]] double rho_kgm3(double T_K) const;
  [[nodiscard]] double cp_JkgK(double T_K) const;

 private:
  std::vector<double> rho_;
  std::vector<double> cp_;
};

// Made at the first call, then shared; safe from any thread.
[[nodiscard]] const Water& plant_water();

}  // namespace lostwork
