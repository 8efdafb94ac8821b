// The fluids by their own names, for tests and for what needs one fluid in particular. Programs ask
// fluids() and fluid_named() of thermo/fluids/state.h.
#pragma once

#include "thermo/fluids/fluid.h"

namespace lostwork {

extern const Fluid r134a;
extern const Fluid r718;

}  // namespace lostwork
