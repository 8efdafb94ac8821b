#include "thermo/fluids/saturation.h"

#include "thermo/fluids/ancillary.h"
#include "thermo/fluids/density.h"
#include "thermo/fluids/single_phase.h"

#include <algorithm>
#include <cmath>
#include <optional>

namespace lostwork {
namespace {

constexpr int most_steps = 40;

Refusal not_converged(double T_K) {
  return refusal(ReasonCode::not_converged, "saturation", T_K);
}

// A step of this share of both densities may be the last: its square, times about 5 over the
// distance, is what remains; below rounding over the distance no step gets.
double close_enough(const Fluid& fluid, double T_K) {
  const double distance = std::max(1.0 - T_K / fluid.critical_T_K, 1e-12);
  return std::max(1e-7 * std::sqrt(distance), 1e-14 / distance);
}

// The densities alone are guessed: Newton's method asks for no pressure to begin with.
TwoPhases guessed_phases(const Fluid& fluid, double T_K, double p_Pa) {
  return {T_K, p_Pa, line_liquid_kgm3(fluid, T_K), line_vapour_kgm3(fluid, T_K)};
}

// The gap between the Gibbs energies of the liquid and the vapour, J/kg: g / (R T) is alphar +
// delta alphar_delta + ln(rho), but for what depends on T alone.
double gibbs_gap(const Isotherm& isotherm, const Slope& liquid, const Slope& vapour,
                 const TwoPhases& at) {
  const double rt_Jkg = isotherm.fluid().gas_constant_JkgK * isotherm.temperature_K();
  return rt_Jkg * (liquid.a - vapour.a + std::log(at.liquid_kgm3 / at.vapour_kgm3)) +
         liquid.p_Pa / at.liquid_kgm3 - vapour.p_Pa / at.vapour_kgm3;
}

// One common pressure change y moves both phases: dG = dp / (rho R T) along an isotherm.
std::optional<TwoPhases> newton(const Isotherm& isotherm, TwoPhases at) {
  const double close = close_enough(isotherm.fluid(), at.T_K);
  for (int step = 0; step < most_steps; ++step) {
    const Slope liquid = isotherm.slope(at.liquid_kgm3);
    const Slope vapour = isotherm.slope(at.vapour_kgm3);
    if (!(liquid.p_by_rho > 0.0 && vapour.p_by_rho > 0.0)) {
      return std::nullopt;
    }
    const double p_gap = liquid.p_Pa - vapour.p_Pa;
    const double g_gap = gibbs_gap(isotherm, liquid, vapour, at);
    const double y =
        (p_gap / at.liquid_kgm3 - g_gap) / (1.0 / at.liquid_kgm3 - 1.0 / at.vapour_kgm3);
    const double vapour_step = y / vapour.p_by_rho;
    const double liquid_step = (y - p_gap) / liquid.p_by_rho;
    if (!(std::abs(vapour_step) < 0.5 * at.vapour_kgm3 &&
          std::abs(liquid_step) < 0.2 * at.liquid_kgm3)) {
      return std::nullopt;
    }
    at.vapour_kgm3 += vapour_step;
    at.liquid_kgm3 += liquid_step;
    at.p_Pa = vapour.p_Pa + y;
    if (!(at.liquid_kgm3 > at.vapour_kgm3 * (1.0 + 1e-6))) {
      return std::nullopt;
    }
    if (std::abs(vapour_step) <= close * at.vapour_kgm3 &&
        std::abs(liquid_step) <= close * at.liquid_kgm3) {
      return at;
    }
  }
  return std::nullopt;
}

// Where dp/drho = 0 between the critical density and the stable branch.
double spinodal_kgm3(const Isotherm& isotherm, bool liquid) {
  const double critical = isotherm.fluid().critical_rho_kgm3;
  double unstable = critical;
  double stable = critical;
  double step = 1e-5;
  while (step < 0.9) {
    stable = critical * (liquid ? 1.0 + step : 1.0 - step);
    if (isotherm.slope(stable).p_by_rho > 0.0) {
      break;
    }
    unstable = stable;
    step *= 1.5;
  }
  for (int halving = 0; halving < 50; ++halving) {
    const double middle = 0.5 * (stable + unstable);
    (isotherm.slope(middle).p_by_rho > 0.0 ? stable : unstable) = middle;
  }
  return stable;
}

// Near the critical point, where the first guesses are poor: a pressure between those of the two
// spinodals, by Newton's method on the difference of the Gibbs energies, dg/dp = v.
std::optional<TwoPhases> bracketed(const Isotherm& isotherm) {
  TwoPhases at{isotherm.temperature_K(), 0.0, spinodal_kgm3(isotherm, true),
               spinodal_kgm3(isotherm, false)};
  double low = std::max(isotherm.slope(at.liquid_kgm3).p_Pa, 0.0);
  double high = isotherm.slope(at.vapour_kgm3).p_Pa;
  at.p_Pa = 0.5 * (low + high);
  for (int step = 0; step < most_steps; ++step) {
    const auto liquid = density_kgm3(isotherm, Branch::liquid, at.p_Pa, at.liquid_kgm3);
    const auto vapour = density_kgm3(isotherm, Branch::vapour, at.p_Pa, at.vapour_kgm3);
    if (!liquid || !vapour) {
      return std::nullopt;
    }
    at.liquid_kgm3 = *liquid;
    at.vapour_kgm3 = *vapour;
    const double gap = gibbs_gap(isotherm, isotherm.slope(*liquid), isotherm.slope(*vapour), at);
    (gap > 0.0 ? low : high) = at.p_Pa;
    double next = at.p_Pa - gap / (1.0 / *liquid - 1.0 / *vapour);
    if (!(next > low && next < high)) {
      next = 0.5 * (low + high);
    }
    const double change = std::abs(next - at.p_Pa);
    at.p_Pa = next;
    if (change <= 1e-12 * next) {
      return at;
    }
  }
  return std::nullopt;
}

// Temperature and both densities at once: dg = v dp - s dT in each phase.
std::optional<TwoPhases> newton_at_p(const Fluid& fluid, double p_Pa, TwoPhases at) {
  for (int step = 0; step < 10; ++step) {
    const Isotherm isotherm{fluid, at.T_K};
    const Properties liquid = isotherm.properties(at.liquid_kgm3);
    const Properties vapour = isotherm.properties(at.vapour_kgm3);
    if (!(liquid.p_by_rho > 0.0 && vapour.p_by_rho > 0.0)) {
      return std::nullopt;
    }
    const double liquid_gap = p_Pa - liquid.p_Pa;
    const double vapour_gap = p_Pa - vapour.p_Pa;
    const double g_gap =
        (vapour.h_Jkg - at.T_K * vapour.s_JkgK) - (liquid.h_Jkg - at.T_K * liquid.s_JkgK);
    const double step_K = (g_gap + vapour_gap / at.vapour_kgm3 - liquid_gap / at.liquid_kgm3) /
                          (vapour.s_JkgK - liquid.s_JkgK);
    const double liquid_step = (liquid_gap - liquid.p_by_T * step_K) / liquid.p_by_rho;
    const double vapour_step = (vapour_gap - vapour.p_by_T * step_K) / vapour.p_by_rho;
    if (!(std::abs(step_K) < 0.05 * at.T_K && std::abs(vapour_step) < 0.5 * at.vapour_kgm3 &&
          std::abs(liquid_step) < 0.2 * at.liquid_kgm3)) {
      return std::nullopt;
    }
    at = {at.T_K + step_K, p_Pa, at.liquid_kgm3 + liquid_step, at.vapour_kgm3 + vapour_step};
    if (!(at.liquid_kgm3 > at.vapour_kgm3 * (1.0 + 1e-6)) || !(at.T_K < fluid.critical_T_K)) {
      return std::nullopt;
    }
    const double close = close_enough(fluid, at.T_K);
    if (std::abs(step_K) <= close * at.T_K && std::abs(vapour_step) <= close * at.vapour_kgm3 &&
        std::abs(liquid_step) <= close * at.liquid_kgm3) {
      return at;
    }
  }
  return std::nullopt;
}

// By halving the temperature: for what the quick way does not reach.
Result<TwoPhases> halved_at_p(const Fluid& fluid, double p_Pa, double guess_T_K) {
  double low = lowest_T_K(fluid);
  double high = fluid.critical_T_K;
  double T_K = std::clamp(guess_T_K, low, 0.5 * (guess_T_K + high));
  for (int step = 0; step < most_steps; ++step) {
    const Isotherm isotherm{fluid, T_K};
    const auto at = two_phases(isotherm);
    if (!at) {
      return at;
    }
    const double s_gap =
        isotherm.properties(at->vapour_kgm3).s_JkgK - isotherm.properties(at->liquid_kgm3).s_JkgK;
    (at->p_Pa < p_Pa ? low : high) = T_K;
    double next_T_K =
        T_K + (p_Pa - at->p_Pa) * (1.0 / at->vapour_kgm3 - 1.0 / at->liquid_kgm3) / s_gap;
    if (std::abs(next_T_K - T_K) <= 1e-12 * T_K) {
      return TwoPhases{T_K, p_Pa, at->liquid_kgm3, at->vapour_kgm3};
    }
    if (!(next_T_K > low && next_T_K < high)) {
      next_T_K = 0.5 * (low + high);
    }
    T_K = next_T_K;
  }
  return not_converged(T_K);
}

}  // namespace

TwoPhases guessed_phases_at_p(const Fluid& fluid, double p_Pa) {
  return guessed_phases(fluid, boiling_T_K(fluid, Line::bubble, p_Pa, 2), p_Pa);
}

double lowest_T_K(const Fluid& fluid) {
  return fluid.min_T_K * (1.0 - 1e-9);
}

Result<TwoPhases> two_phases(const Isotherm& isotherm) {
  const Fluid& fluid = isotherm.fluid();
  const double T_K = isotherm.temperature_K();
  if (!(T_K < fluid.critical_T_K)) {
    return refusal(ReasonCode::outside_fluid, "temperature", T_K);
  }
  if (const auto quick = newton(isotherm, guessed_phases(fluid, T_K, 0.0))) {
    return *quick;
  }
  const auto start = bracketed(isotherm);
  if (!start) {
    return not_converged(T_K);
  }
  const auto found = newton(isotherm, *start);
  return found ? Result<TwoPhases>{*found} : Result<TwoPhases>{*start};
}

Result<TwoPhases> two_phases_at_p(const Fluid& fluid, double p_Pa) {
  if (!(p_Pa < fluid.critical_p_Pa)) {
    return refusal(ReasonCode::outside_fluid, "pressure", p_Pa);
  }
  const TwoPhases guess = guessed_phases_at_p(fluid, p_Pa);
  if (!(guess.T_K > 0.99 * fluid.min_T_K)) {
    return refusal(ReasonCode::outside_fluid, "pressure", p_Pa);
  }
  const auto quick = newton_at_p(fluid, p_Pa, guess);
  const Result<TwoPhases> found =
      quick ? Result<TwoPhases>{*quick} : halved_at_p(fluid, p_Pa, guess.T_K);
  if (found && !(found->T_K >= lowest_T_K(fluid))) {
    return refusal(ReasonCode::outside_fluid, "pressure", p_Pa);
  }
  return found;
}

}  // namespace lostwork
