// First guesses on the saturation line.
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

}  // namespace lostwork
