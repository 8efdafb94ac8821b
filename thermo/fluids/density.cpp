#include "thermo/fluids/density.h"

#include "thermo/fluids/ancillary.h"
#include "thermo/fluids/single_phase.h"

#include <algorithm>
#include <cmath>

namespace lostwork {
namespace {

constexpr int most_steps = 100;
// A step of this share of the density may be the last: its square, times about R T / (dp/drho),
// is what remains; below rounding / (dp/drho) no step gets.
double close_enough(double reduced_slope) {
  return std::max(3e-8 * std::min(1.0, reduced_slope), 1e-14 / reduced_slope);
}
// Above this share of the critical temperature an isotherm has one unstable region and the critical
// density lies in it; below, the equations may have several, between the two ancillaries.
constexpr double one_loop = 0.9;

struct Bracket {
  double low;
  double high;
};

Bracket bracket(const Isotherm& isotherm, Branch branch) {
  const Fluid& fluid = isotherm.fluid();
  const double T_K = isotherm.temperature_K();
  const bool near_critical = T_K > one_loop * fluid.critical_T_K;
  if (branch == Branch::fluid) {
    return {0.0, fluid.densest_kgm3};
  }
  if (branch == Branch::liquid) {
    return {near_critical ? fluid.critical_rho_kgm3 : 0.95 * line_liquid_kgm3(fluid, T_K),
            fluid.densest_kgm3};
  }
  return {0.0, near_critical ? fluid.critical_rho_kgm3 : 1.05 * line_vapour_kgm3(fluid, T_K)};
}

}  // namespace

double guessed_rho_kgm3(const Isotherm& isotherm, Branch branch, double p_Pa) {
  const Fluid& fluid = isotherm.fluid();
  const double T_K = isotherm.temperature_K();
  if (branch == Branch::liquid) {
    return line_liquid_kgm3(fluid, T_K);
  }
  // p = rho R T (1 + B rho), where that has a solution; else the density at its highest pressure.
  const double ideal = p_Pa / (fluid.gas_constant_JkgK * T_K);
  const double inside = 1.0 + 4.0 * isotherm.second_virial() * ideal;
  return 2.0 * ideal / (1.0 + std::sqrt(std::max(inside, 0.0)));
}

Result<double> density_kgm3(const Isotherm& isotherm, Branch branch, double p_Pa,
                            double first_kgm3) {
  auto [low, high] = bracket(isotherm, branch);
  const double rt_Jkg = isotherm.fluid().gas_constant_JkgK * isotherm.temperature_K();
  double rho = first_kgm3 > low && first_kgm3 < high ? first_kgm3 : 0.5 * (low + high);
  for (int step = 0; step < most_steps; ++step) {
    const Slope slope = isotherm.slope(rho);
    const bool stable = slope.p_by_rho > 0.0;
    const bool too_dense =
        stable || branch == Branch::fluid ? slope.p_Pa > p_Pa : branch == Branch::vapour;
    (too_dense ? high : low) = rho;
    double next = rho - (slope.p_Pa - p_Pa) / slope.p_by_rho;
    if (stable && std::abs(next - rho) <= close_enough(slope.p_by_rho / rt_Jkg) * rho) {
      return next;
    }
    if (!stable || !(next > low && next < high)) {
      next = 0.5 * (low + high);
    }
    if (!(high - low > 1e-14 * high)) {
      break;
    }
    rho = next;
  }
  if (rho > 0.999 * isotherm.fluid().densest_kgm3) {
    return refusal(ReasonCode::outside_fluid, "density", rho);
  }
  return refusal(ReasonCode::not_converged, "density", p_Pa);
}

}  // namespace lostwork
