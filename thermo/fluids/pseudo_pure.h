// Boiling of a blend of fixed composition that is treated as one fluid.
//
// Pure. Internal to thermo/fluids: programs ask thermo/fluids/state.h. Between the lines h, s and v
// go by the vapour's share of the mass, and the temperature in proportion to it.
// Source: E. W. Lemmon, Int. J. Thermophys. 24 (2003) 991-1006, doi:10.1023/A:1025048800563: the
// pressures of bubble and dew line are equations of their own, the densities on them those of the
// equation of state.
#pragma once

#include "thermo/fluids/fluid.h"
#include "thermo/fluids/state.h"

namespace lostwork {

[[nodiscard]] bool is_pseudo_pure(const Fluid& fluid);

// Each refuses: outside_fluid (at or above the critical point, or below Fluid::min_T_K),
// not_converged.
[[nodiscard]] Result<Saturation> pseudo_pure_at_T(const Fluid& fluid, double T_K);
[[nodiscard]] Result<Saturation> pseudo_pure_at_p(const Fluid& fluid, double p_Pa);
[[nodiscard]] Result<State> pseudo_pure_state(const Fluid& fluid, const GivenTx& given);
// Below the critical temperature.
[[nodiscard]] Result<State> pseudo_pure_state(const Fluid& fluid, const GivenTp& given);

}  // namespace lostwork
