#include "sensors/demo_plant/water.h"

#include <algorithm>
#include <cstddef>
#include <stdexcept>

namespace lostwork {
namespace {

constexpr double first_T_K = 274.15;
constexpr std::size_t nodes = 99;
constexpr double loop_p_Pa = 300e3;  // common in closed loops; liquid water hardly feels it

double between(const std::vector<double>& values, double T_K) {
  const double at = std::clamp(T_K - first_T_K, 0.0, static_cast<double>(nodes - 1));
  const std::size_t i = std::min(static_cast<std::size_t>(at), nodes - 2);
  const double part = at - static_cast<double>(i);
  return values[i] + part * (values[i + 1] - values[i]);
}

}  // namespace

Water::Water(const Fluid& fluid) {
  for (std::size_t i = 0; i < nodes; ++i) {
    const auto at =
        state(fluid, GivenTp{.T_K = first_T_K + static_cast<double>(i), .p_Pa = loop_p_Pa});
    if (!at || !at->single) {
      throw std::runtime_error{"simulated plant: no property of water"};
    }
    rho_.push_back(at->rho_kgm3);
    cp_.push_back(at->single->cp_JkgK);
  }
}

double Water::rho_kgm3(double T_K) const {
  return between(rho_, T_K);
}

double Water::cp_JkgK(double T_K) const {
  return between(cp_, T_K);
}

const Water& plant_water() {
  static const Water tables = [] {
    const Fluid* fluid = fluid_named("R718");
    if (fluid == nullptr) {
      throw std::runtime_error{"simulated plant: this build has no water"};
    }
    return Water{*fluid};
  }();
  return tables;
}

}  // namespace lostwork
