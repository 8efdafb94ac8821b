#include "thermo/fluids/single_phase.h"

#include <cmath>

namespace lostwork {
namespace {

bool positive(double value) {
  return std::isfinite(value) && value > 0.0;
}

}  // namespace

Refusal refusal(ReasonCode code, std::string_view blame, double value_SI) {
  return Refusal{
      Reason{code, blame, value_SI}
  };
}

std::optional<Reason> refused_T(const Fluid& fluid, double T_K) {
  if (!positive(T_K)) {
    return Reason{ReasonCode::implausible, "temperature", T_K};
  }
  if (T_K < lowest_T_K(fluid) || T_K > fluid.max_T_K) {
    return Reason{ReasonCode::outside_fluid, "temperature", T_K};
  }
  return std::nullopt;
}

std::optional<Reason> refused_p(const Fluid& fluid, double p_Pa) {
  if (!positive(p_Pa)) {
    return Reason{ReasonCode::implausible, "pressure", p_Pa};
  }
  if (p_Pa > fluid.max_p_Pa) {
    return Reason{ReasonCode::outside_fluid, "pressure", p_Pa};
  }
  return std::nullopt;
}

State state_of(const Properties& at, Phase phase, const GivenTp& given, double rho_kgm3) {
  return {
      .phase = phase,
      .T_K = given.T_K,
      .p_Pa = given.p_Pa,
      .rho_kgm3 = rho_kgm3,
      .h_Jkg = at.h_Jkg,
      .s_JkgK = at.s_JkgK,
      .quality = std::nullopt,
      .single = SinglePhase{.cp_JkgK = at.cp_JkgK,
                            .sound_speed_w = at.sound_speed_w,
                            .expansion_T = given.T_K / rho_kgm3 * at.p_by_T / at.p_by_rho}
  };
}

Result<State> single_phase(const Isotherm& isotherm, Phase phase, double p_Pa, double rho_kgm3) {
  const Properties at = isotherm.properties(rho_kgm3);
  const State state = state_of(at, phase, {isotherm.temperature_K(), p_Pa}, rho_kgm3);
  const bool whole = std::isfinite(state.h_Jkg) && std::isfinite(state.s_JkgK) &&
                     std::isfinite(state.single->cp_JkgK) &&
                     std::isfinite(state.single->sound_speed_w) &&
                     std::isfinite(state.single->expansion_T);
  if (!whole) {
    return refusal(ReasonCode::not_converged, "state", state.T_K);
  }
  return state;
}

Result<State> on_branch(const Isotherm& isotherm, Branch branch, Phase phase, double p_Pa) {
  return density_kgm3(isotherm, branch, p_Pa, guessed_rho_kgm3(isotherm, branch, p_Pa))
      .and_then([&](double rho_kgm3) { return single_phase(isotherm, phase, p_Pa, rho_kgm3); });
}

Result<Saturation> saturation_of(const Isotherm& isotherm, const TwoPhases& at) {
  Result<State> liquid = single_phase(isotherm, Phase::liquid, at.p_Pa, at.liquid_kgm3);
  Result<State> vapour = single_phase(isotherm, Phase::vapour, at.p_Pa, at.vapour_kgm3);
  if (!liquid || !vapour) {
    return tl::unexpected{liquid ? vapour.error() : liquid.error()};
  }
  liquid->quality = 0.0;
  vapour->quality = 1.0;
  const double v_gap = 1.0 / at.vapour_kgm3 - 1.0 / at.liquid_kgm3;
  const double clapeyron = at.T_K * v_gap / (vapour->h_Jkg - liquid->h_Jkg);
  return Saturation{
      .liquid = *liquid, .vapour = *vapour, .bubble_dT_dp = clapeyron, .dew_dT_dp = clapeyron};
}

State mixed(const Saturation& at, double quality) {
  if (quality == 0.0) {
    return at.liquid;
  }
  if (quality == 1.0) {
    return at.vapour;
  }
  const auto between = [quality](double liquid, double vapour) {
    return liquid + quality * (vapour - liquid);
  };
  return {.phase = Phase::two_phase,
          .T_K = between(at.liquid.T_K, at.vapour.T_K),
          .p_Pa = at.liquid.p_Pa,
          .rho_kgm3 = 1.0 / between(1.0 / at.liquid.rho_kgm3, 1.0 / at.vapour.rho_kgm3),
          .h_Jkg = between(at.liquid.h_Jkg, at.vapour.h_Jkg),
          .s_JkgK = between(at.liquid.s_JkgK, at.vapour.s_JkgK),
          .quality = quality,
          .single = std::nullopt};
}

}  // namespace lostwork
