#include "thermo/fluids/pseudo_pure.h"

#include "thermo/fluids/ancillary.h"
#include "thermo/fluids/density.h"
#include "thermo/fluids/saturation.h"
#include "thermo/fluids/single_phase.h"

#include <cmath>

namespace lostwork {
namespace {

Result<State> phase_state(const Fluid& fluid, const GivenTp& at, Phase phase) {
  return on_branch(Isotherm{fluid, at.T_K},
                   phase == Phase::liquid ? Branch::liquid : Branch::vapour, phase, at.p_Pa);
}

Result<Saturation> between(const Fluid& fluid, const GivenTp& boiling, const GivenTp& condensing) {
  Result<State> liquid = phase_state(fluid, boiling, Phase::liquid);
  Result<State> vapour = phase_state(fluid, condensing, Phase::vapour);
  if (!liquid || !vapour) {
    return tl::unexpected{liquid ? vapour.error() : liquid.error()};
  }
  liquid->quality = 0.0;
  vapour->quality = 1.0;
  return Saturation{.liquid = *liquid,
                    .vapour = *vapour,
                    .bubble_dT_dp = line_dT_dp(fluid, Line::bubble, boiling.T_K),
                    .dew_dT_dp = line_dT_dp(fluid, Line::dew, condensing.T_K)};
}

struct Temperatures {
  double bubble_T_K;
  double dew_T_K;
};
// Near the critical point, where the lines are steep, Newton's method may need more steps than it
// has: not_converged.
Result<Temperatures> temperatures_at(const Fluid& fluid, double p_Pa) {
  const Temperatures at{boiling_T_K(fluid, Line::bubble, p_Pa, boiling_steps),
                        boiling_T_K(fluid, Line::dew, p_Pa, boiling_steps)};
  const auto is_on = [&fluid, p_Pa](Line line, double T_K) {
    return std::abs(line_p_Pa(fluid, line, T_K) - p_Pa) <= 1e-10 * p_Pa;
  };
  if (!is_on(Line::bubble, at.bubble_T_K) || !is_on(Line::dew, at.dew_T_K)) {
    return refusal(ReasonCode::not_converged, "pressure", p_Pa);
  }
  return at;
}

}  // namespace

bool is_pseudo_pure(const Fluid& fluid) {
  return !fluid.dew_pressure.empty();
}

Result<Saturation> pseudo_pure_at_T(const Fluid& fluid, double T_K) {
  if (!(T_K < fluid.critical_T_K)) {
    return refusal(ReasonCode::outside_fluid, "temperature", T_K);
  }
  return between(fluid, {T_K, line_p_Pa(fluid, Line::bubble, T_K)},
                 {T_K, line_p_Pa(fluid, Line::dew, T_K)});
}

Result<Saturation> pseudo_pure_at_p(const Fluid& fluid, double p_Pa) {
  if (!(p_Pa < fluid.critical_p_Pa)) {
    return refusal(ReasonCode::outside_fluid, "pressure", p_Pa);
  }
  return temperatures_at(fluid, p_Pa).and_then([&](const Temperatures& at) -> Result<Saturation> {
    if (!(at.bubble_T_K >= lowest_T_K(fluid))) {
      return refusal(ReasonCode::outside_fluid, "pressure", p_Pa);
    }
    return between(fluid, {at.bubble_T_K, p_Pa}, {at.dew_T_K, p_Pa});
  });
}

Result<State> pseudo_pure_state(const Fluid& fluid, const GivenTx& given) {
  const Result<Saturation> line = pseudo_pure_at_T(fluid, given.T_K);
  if (!line || given.quality == 0.0 || given.quality == 1.0) {
    return line.map([&](const Saturation& at) { return mixed(at, given.quality); });
  }
  // The pressure at which a mixture of this quality has the temperature: between the two lines.
  double low = line->vapour.p_Pa;
  double high = line->liquid.p_Pa;
  for (int halving = 0; halving < 60; ++halving) {
    const double middle = 0.5 * (low + high);
    const Result<Temperatures> at = temperatures_at(fluid, middle);
    if (!at) {
      return tl::unexpected{at.error()};
    }
    const double T_K = at->bubble_T_K + given.quality * (at->dew_T_K - at->bubble_T_K);
    (T_K > given.T_K ? high : low) = middle;
  }
  return pseudo_pure_at_p(fluid, low).map([&](const Saturation& at) {
    return mixed(at, given.quality);
  });
}

Result<State> pseudo_pure_state(const Fluid& fluid, const GivenTp& given) {
  if (given.p_Pa > line_p_Pa(fluid, Line::bubble, given.T_K)) {
    return phase_state(fluid, given, Phase::liquid);
  }
  if (given.p_Pa < line_p_Pa(fluid, Line::dew, given.T_K)) {
    return phase_state(fluid, given, Phase::vapour);
  }
  return pseudo_pure_at_p(fluid, given.p_Pa).map([&](const Saturation& at) {
    return mixed(at, (given.T_K - at.liquid.T_K) / (at.vapour.T_K - at.liquid.T_K));
  });
}

}  // namespace lostwork
