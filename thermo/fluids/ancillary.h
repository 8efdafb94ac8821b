// Short equations on the saturation line.
//
// Pure. With theta = 1 - T / Tc and the sum of n theta^t over a fluid's rows: ln(p / pc) = Tc / T
// sum, liquid rho / rhoc = 1 + sum, vapour ln(rho / rhoc) = Tc / T sum. T below Tc.
#pragma once

#include "thermo/fluids/fluid.h"

namespace lostwork {

enum class Line : unsigned char { bubble, dew };  // one and the same of a pure fluid

[[nodiscard]] double line_p_Pa(const Fluid& fluid, Line line, double T_K);
[[nodiscard]] double line_dT_dp(const Fluid& fluid, Line line, double T_K);  // K/Pa
[[nodiscard]] double line_liquid_kgm3(const Fluid& fluid, double T_K);
[[nodiscard]] double line_vapour_kgm3(const Fluid& fluid, double T_K);

// Where a line has this pressure, after so many steps of Newton's method: two are a first guess,
// boiling_steps reach double precision up to 0.997 of the critical pressure; above, the caller
// checks. p below the critical pressure.
constexpr int boiling_steps = 8;
[[nodiscard]] double boiling_T_K(const Fluid& fluid, Line line, double p_Pa, int steps);

}  // namespace lostwork
