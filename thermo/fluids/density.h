// The density of one phase at a temperature and a pressure.
//
// Pure. Newton's method on p(rho) = p with the equation's own slope, kept inside a bracket that
// shrinks at each step.
#pragma once

#include "thermo/fluids/helmholtz.h"
#include "thermo/result.h"

namespace lostwork {

enum class Branch : unsigned char {
  liquid,  // below the critical temperature, denser than the unstable region; also metastable
  vapour,  // the same on the thin side
  fluid    // at and above the critical temperature, where the isotherm rises everywhere
};

// A density to begin with.
[[nodiscard]] double guessed_rho_kgm3(const Isotherm& isotherm, Branch branch, double p_Pa);

// Refuses: not_converged (also where the branch does not exist at this pressure), outside_fluid
// (denser than Fluid::densest_kgm3).
[[nodiscard]] Result<double> density_kgm3(const Isotherm& isotherm, Branch branch, double p_Pa,
                                          double first_kgm3);

}  // namespace lostwork
