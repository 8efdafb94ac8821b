// The fluids by their own names, for tests and for what needs one fluid in particular. Programs ask
// fluids() and fluid_named() of thermo/fluids/state.h.
#pragma once

#include "thermo/fluids/fluid.h"

namespace lostwork {

extern const Fluid r134a;
extern const Fluid r1234yf;
extern const Fluid r1234ze_e;
extern const Fluid r32;
extern const Fluid r125;
extern const Fluid r143a;
extern const Fluid r152a;
extern const Fluid r22;
extern const Fluid r123;
extern const Fluid r245fa;
extern const Fluid r1233zd_e;
extern const Fluid r227ea;
extern const Fluid r13i1;
extern const Fluid r290;
extern const Fluid r600;
extern const Fluid r600a;
extern const Fluid r1270;
extern const Fluid r717;
extern const Fluid r744;
extern const Fluid r410a;
extern const Fluid r407c;
extern const Fluid r404a;
extern const Fluid r507a;
extern const Fluid r718;

}  // namespace lostwork
