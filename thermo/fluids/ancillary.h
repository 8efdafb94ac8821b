// Short equations on the saturation line.
//
// Pure. T below the ancillary's own scale_T_K.
#pragma once

#include "thermo/fluids/fluid.h"

namespace lostwork {

// In the unit of y_scale_SI.
[[nodiscard]] double ancillary_value(const Ancillary& ancillary, double T_K);

struct LogAncillary {
  double log_value;     // ln(value / y_scale_SI)
  double by_inverse_T;  // its derivative by 1/T, K
};
[[nodiscard]] LogAncillary log_ancillary(const Ancillary& ancillary, double T_K);

// Where an ancillary for the pressure has this one, after so many steps of Newton's method: two are
// a first guess, boiling_steps reach double precision. p below y_scale_SI.
constexpr int boiling_steps = 8;
[[nodiscard]] double boiling_T_K(const Ancillary& pressure, double p_Pa, int steps);

}  // namespace lostwork
