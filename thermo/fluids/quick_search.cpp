#include "thermo/fluids/quick_search.h"

#include "thermo/fluids/helmholtz.h"
#include "thermo/fluids/saturation.h"
#include "thermo/fluids/single_phase.h"

#include <cmath>

namespace lostwork {
namespace {

constexpr int most_steps = 12;
constexpr double close_enough = 1e-11;  // of temperature and density, where the state is taken
// The guessed line is believed to this share of cp T: its own errors (Fluid) make a tenth of it.
constexpr double near_line = 0.003;

struct Place {
  double T_K;
  double rho_kgm3;
};

// Temperature and volume at once: dh = cp dT + v (1 - it) dp and T ds = cp dT - v it dp with it =
// (T/v)(dv/dT) at constant p. The volume of a vapour is nearly linear in T, its density is not.
std::optional<State> newton(const Fluid& fluid, const Wanted& wanted, Place place, Phase phase) {
  for (int step = 0; step < most_steps; ++step) {
    const Isotherm isotherm{fluid, place.T_K};
    const Properties at = isotherm.properties(place.rho_kgm3);
    if (!(at.p_by_rho > 0.0 && at.cp_JkgK > 0.0)) {
      return std::nullopt;
    }
    const double v = 1.0 / place.rho_kgm3;
    const double expansion = place.T_K * v * at.p_by_T / at.p_by_rho;
    const double p_gap = wanted.p_Pa - at.p_Pa;
    const double heat = wanted.entropy
                            ? place.T_K * (wanted.value_SI - at.s_JkgK) + v * expansion * p_gap
                            : wanted.value_SI - at.h_Jkg - v * (1.0 - expansion) * p_gap;
    const double step_K = heat / at.cp_JkgK;
    const double denser = v * (p_gap - at.p_by_T * step_K) / at.p_by_rho;  // a share of rho
    if (!(std::abs(step_K) < 0.5 * place.T_K && denser < 0.5 && denser > -5.0)) {
      return std::nullopt;
    }
    if (std::abs(step_K) <= close_enough * place.T_K && std::abs(denser) <= close_enough) {
      return state_of(at, phase, {place.T_K, wanted.p_Pa}, place.rho_kgm3);
    }
    place = {place.T_K + step_K, place.rho_kgm3 / (1.0 - denser)};
  }
  return std::nullopt;
}

// How far the wanted value lies above that of a state, as heat at its temperature, in shares of cp
// T.
double above(const Wanted& wanted, const Properties& at, double T_K) {
  const double heat =
      wanted.entropy ? T_K * (wanted.value_SI - at.s_JkgK) : wanted.value_SI - at.h_Jkg;
  return heat / (at.cp_JkgK * T_K);
}

}  // namespace

std::optional<State> quick_vapour(const Fluid& fluid, const Wanted& wanted, const TwoPhases& line) {
  const auto found = newton(fluid, wanted, {line.T_K, line.vapour_kgm3}, Phase::vapour);
  const bool whole = found && found->T_K >= line.T_K && found->T_K <= fluid.max_T_K &&
                     found->rho_kgm3 <= line.vapour_kgm3;
  return whole ? found : std::nullopt;
}

std::optional<State> quick_liquid(const Fluid& fluid, const Wanted& wanted, const TwoPhases& line) {
  const auto found = newton(fluid, wanted, {line.T_K, line.liquid_kgm3}, Phase::liquid);
  const bool whole = found && found->T_K <= line.T_K && found->T_K >= fluid.min_T_K &&
                     found->rho_kgm3 > fluid.critical_rho_kgm3;
  return whole ? found : std::nullopt;
}

std::optional<State> quick_state(const Fluid& fluid, const Wanted& wanted) {
  const TwoPhases line = guessed_phases_at_p(fluid, wanted.p_Pa);
  if (!(line.T_K > fluid.min_T_K && line.T_K < 0.98 * fluid.critical_T_K)) {
    return std::nullopt;
  }
  const Isotherm isotherm{fluid, line.T_K};
  if (above(wanted, isotherm.properties(line.vapour_kgm3), line.T_K) > near_line) {
    return quick_vapour(fluid, wanted, line);
  }
  if (above(wanted, isotherm.properties(line.liquid_kgm3), line.T_K) < -near_line) {
    return quick_liquid(fluid, wanted, line);
  }
  return std::nullopt;
}

}  // namespace lostwork
