#include "thermo/fluids/state.h"

#include "thermo/fluids/ancillary.h"
#include "thermo/fluids/density.h"
#include "thermo/fluids/pseudo_pure.h"
#include "thermo/fluids/single_phase.h"

#include <array>
#include <cstddef>

namespace lostwork {
namespace {

// The ancillary for the saturation pressure is better than this everywhere; a pressure further away
// from it is on the side that it shows.
constexpr double sure_side = 0.001;

// Liquid or vapour below the critical temperature.
Result<Phase> side(const Isotherm& isotherm, double p_Pa) {
  const Fluid& fluid = isotherm.fluid();
  const double T_K = isotherm.temperature_K();
  if (p_Pa >= fluid.critical_p_Pa) {
    return Phase::liquid;
  }
  const double guess_Pa = line_p_Pa(fluid, Line::bubble, T_K);
  if (p_Pa > (1.0 + sure_side) * guess_Pa) {
    return Phase::liquid;
  }
  if (p_Pa < (1.0 - sure_side) * guess_Pa) {
    return Phase::vapour;
  }
  return two_phases(isotherm).map(
      [p_Pa](const TwoPhases& at) { return p_Pa > at.p_Pa ? Phase::liquid : Phase::vapour; });
}

Result<State> mixed_state(const Result<Saturation>& at, double quality) {
  return at.map([quality](const Saturation& found) { return mixed(found, quality); });
}

bool is_quality(double value) {
  return value >= 0.0 && value <= 1.0;
}

}  // namespace

std::string_view name(Phase phase) {
  static constexpr std::array<std::string_view, 4> names{"liquid", "vapour", "two_phase",
                                                         "supercritical"};
  return names.at(static_cast<std::size_t>(phase));
}

Result<State> state(const Fluid& fluid, const GivenTp& given) {
  if (const auto reason = refused_T(fluid, given.T_K)) {
    return tl::unexpected{*reason};
  }
  if (const auto reason = refused_p(fluid, given.p_Pa)) {
    return tl::unexpected{*reason};
  }
  const Isotherm isotherm{fluid, given.T_K};
  if (given.T_K >= fluid.critical_T_K) {
    const Phase phase = given.p_Pa >= fluid.critical_p_Pa ? Phase::supercritical : Phase::vapour;
    return on_branch(isotherm, Branch::fluid, phase, given.p_Pa);
  }
  if (is_pseudo_pure(fluid)) {
    return pseudo_pure_state(fluid, given);
  }
  return side(isotherm, given.p_Pa).and_then([&](Phase phase) {
    return on_branch(isotherm, phase == Phase::liquid ? Branch::liquid : Branch::vapour, phase,
                     given.p_Pa);
  });
}

Result<State> state(const Fluid& fluid, const GivenTx& given) {
  if (!is_quality(given.quality)) {
    return refusal(ReasonCode::implausible, "quality", given.quality);
  }
  if (const auto reason = refused_T(fluid, given.T_K)) {
    return tl::unexpected{*reason};
  }
  return is_pseudo_pure(fluid) ? pseudo_pure_state(fluid, given)
                               : mixed_state(saturation_at_T(fluid, given.T_K), given.quality);
}

Result<State> state(const Fluid& fluid, const GivenPx& given) {
  if (!is_quality(given.quality)) {
    return refusal(ReasonCode::implausible, "quality", given.quality);
  }
  return mixed_state(saturation_at_p(fluid, given.p_Pa), given.quality);
}

Result<Saturation> saturation_at_T(const Fluid& fluid, double T_K) {
  if (const auto reason = refused_T(fluid, T_K)) {
    return tl::unexpected{*reason};
  }
  if (is_pseudo_pure(fluid)) {
    return pseudo_pure_at_T(fluid, T_K);
  }
  const Isotherm isotherm{fluid, T_K};
  return two_phases(isotherm).and_then(
      [&](const TwoPhases& at) { return saturation_of(isotherm, at); });
}

Result<Saturation> saturation_at_p(const Fluid& fluid, double p_Pa) {
  if (const auto reason = refused_p(fluid, p_Pa)) {
    return tl::unexpected{*reason};
  }
  if (is_pseudo_pure(fluid)) {
    return pseudo_pure_at_p(fluid, p_Pa);
  }
  return two_phases_at_p(fluid, p_Pa).and_then([&](const TwoPhases& at) {
    return saturation_of(Isotherm{fluid, at.T_K}, at);
  });
}

}  // namespace lostwork
