// Densities and pressure of two phases in equilibrium.
//
// Pure. Internal to thermo/fluids: programs ask thermo/fluids/state.h.
// Source of the conditions: equal pressure and equal Gibbs energy; Newton's step after R. Akasaka,
// J. Thermal Sci. Technol. 3 (2008) 442-451, doi:10.1299/jtst.3.442.
#pragma once

#include "thermo/fluids/helmholtz.h"
#include "thermo/result.h"

namespace lostwork {

struct TwoPhases {
  double T_K;
  double p_Pa;
  double liquid_kgm3;
  double vapour_kgm3;
};

// A first guess, as good as Fluid says of its ancillaries. p below the critical pressure.
[[nodiscard]] TwoPhases guessed_phases_at_p(const Fluid& fluid, double p_Pa);

// Refuses: outside_fluid (at or above the critical temperature), not_converged.
[[nodiscard]] Result<TwoPhases> two_phases(const Isotherm& isotherm);

// Refuses: outside_fluid (at or above the critical pressure, or below that of Fluid::min_T_K),
// not_converged.
[[nodiscard]] Result<TwoPhases> two_phases_at_p(const Fluid& fluid, double p_Pa);

// The lowest temperature that still counts as inside: the published limit, with room for rounding.
[[nodiscard]] double lowest_T_K(const Fluid& fluid);

}  // namespace lostwork
