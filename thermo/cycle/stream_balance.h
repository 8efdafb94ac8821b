// What one of the two streams brings to the machine or takes from it.
#pragma once

#include "thermo/cycle/inputs.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/cycle/number.h"
#include "thermo/result.h"
#include "thermo/role.h"

namespace lostwork {

// The stream's three points.
struct StreamRoles {
  Role in;
  Role out;
  Role flow;
};
inline constexpr StreamRoles cold_roles{Role::cold_in_temperature, Role::cold_out_temperature,
                                        Role::cold_flow};
inline constexpr StreamRoles hot_roles{Role::hot_in_temperature, Role::hot_out_temperature,
                                       Role::hot_flow};

struct StreamBalance {
  // dH/dS between inlet and outlet, the temperature of a reservoir that would serve as well.
  Result<Number> mean_T_K;
  Result<Number> flow_kgs;    // may be 0 or slightly below
  Result<Number> released_W;  // heat that the stream gives away: < 0 where it is warmed
};

// Refuses as the readings do, and: outside_fluid (of the temperatures), zero_flow (the heat, where
// the flow cannot be told from none).
[[nodiscard]] StreamBalance stream_balance(const MachineModel& model, const ModelStream& stream,
                                           const StreamRoles& roles, const Inputs& inputs);

}  // namespace lostwork
