// What state.cpp and state_search.cpp share: the checks of an input and the making of a state.
//
// Pure. Internal to thermo/fluids.
#pragma once

#include "thermo/fluids/density.h"
#include "thermo/fluids/helmholtz.h"
#include "thermo/fluids/saturation.h"
#include "thermo/fluids/state.h"

#include <optional>
#include <string_view>

namespace lostwork {

[[nodiscard]] Refusal refusal(ReasonCode code, std::string_view blame, double value_SI);

// Why this temperature or pressure is no input for the fluid: implausible or outside_fluid.
[[nodiscard]] std::optional<Reason> refused_T(const Fluid& fluid, double T_K);
[[nodiscard]] std::optional<Reason> refused_p(const Fluid& fluid, double p_Pa);

// The state of these properties, without a quality. The pressure is the given one.
[[nodiscard]] State state_of(const Properties& at, Phase phase, const GivenTp& given,
                             double rho_kgm3);

// Refuses: not_converged (a property is not finite).
[[nodiscard]] Result<State> single_phase(const Isotherm& isotherm, Phase phase, double p_Pa,
                                         double rho_kgm3);
// The state on one branch of the isotherm; refuses as density_kgm3 does, too.
[[nodiscard]] Result<State> on_branch(const Isotherm& isotherm, Branch branch, Phase phase,
                                      double p_Pa);
[[nodiscard]] Result<Saturation> saturation_of(const Isotherm& isotherm, const TwoPhases& at);
// The phases of one pressure, by mass; between the temperatures of a blend, in proportion.
[[nodiscard]] State mixed(const Saturation& at, double quality);

}  // namespace lostwork
