// The liquids that give heat to a machine and take it away.
//
// Pure. h and s at the stream's pressure; only differences along one stream mean anything.
#pragma once

#include "thermo/result.h"
#include "thermo/streams/brine.h"

#include <optional>
#include <string_view>
#include <variant>

namespace lostwork {

// Water by IAPWS-95 at 300 kPa (a pressure common in closed loops; 100 kPa more changes h by 0.1
// kJ/kg and differences of h by less than 1e-4 of themselves). Above 133.5 degC, where 300 kPa
// would boil, the liquid's isobar is continued to 150 degC: a loop that hot is kept liquid by a
// higher pressure, and differences of h agree with those at 600 kPa to 3e-4.
struct WaterStream {};

// A liquid of constant volumetric heat capacity, for sources that state one.
struct ConstantStream {
  double rho_cp_SI = 4.18e6;  // J/(m3 K)
  double rho_kgm3 = 1000.0;   // turns a mass flow into a volume flow, nothing else
};

using StreamFluid = std::variant<WaterStream, ConstantStream, Brine>;

// "water", or a solution of brine.h with its concentration: "propylene glycol 30 %". nullopt where
// it is neither.
[[nodiscard]] std::optional<StreamFluid> stream_named(std::string_view name);

struct StreamState {
  double rho_kgm3;
  double h_Jkg;
  double s_JkgK;
  double cp_JkgK;         // dh/dT; ds/dT = cp/T
  double expansion_beta;  // -(1/rho) drho/dT, 1/K
};

// Refuses: implausible (not finite), outside_fluid (water outside 0.01..150 degC: it freezes or
// boils; a solution below its freezing point or above its published fit).
[[nodiscard]] Result<StreamState> stream_state(const StreamFluid& fluid, double T_K);

}  // namespace lostwork
