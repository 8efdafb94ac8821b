#include "thermo/cycle/typical_point.h"

#include "thermo/fluids/state.h"
#include "thermo/role.h"

#include <cmath>

namespace lostwork {
namespace {

// Engineering judgement, no published figures.
constexpr double load_share = 0.8;  // of rated power
constexpr double approach_K = 3.0;
constexpr double superheat_K = 5.0;
constexpr double line_gain_K = 1.0;  // of it, in the suction line
constexpr double subcooling_K = 4.0;
constexpr double isentropic_efficiency = 0.7;

struct StreamTemperatures {
  double cold_in_T_K;
  double cold_out_T_K;
  double hot_in_T_K;
  double hot_out_T_K;
};
constexpr StreamTemperatures chiller{285.15, 280.15, 303.15, 308.15};
constexpr StreamTemperatures heat_pump{283.15, 280.15, 313.15, 318.15};

struct TypicalCycle {
  State suction;
  State discharge;
  State liquid;
  State evaporator_out;
};

Result<State> vapour(const Fluid& fluid, const State& dry, double above_K) {
  return above_K > 0.0 ? state(fluid, GivenTp{.T_K = dry.T_K + above_K, .p_Pa = dry.p_Pa})
                       : Result<State>{dry};
}

Result<TypicalCycle> typical_cycle(const MachineModel& model, const StreamTemperatures& at) {
  const Fluid& fluid = *model.refrigerant;
  const bool flooded = model.evaporator == EvaporatorKind::flooded;
  const auto low = saturation_at_T(fluid, at.cold_out_T_K - approach_K);
  const auto high = saturation_at_T(fluid, at.hot_out_T_K + approach_K);
  if (!low || !high) {
    return tl::unexpected{low ? high.error() : low.error()};
  }
  const auto suction = vapour(fluid, low->vapour, flooded ? 0.0 : superheat_K);
  const auto outlet = vapour(fluid, low->vapour, flooded ? 0.0 : superheat_K - line_gain_K);
  const double p_Pa = high->vapour.p_Pa;
  const auto liquid = state(fluid, GivenTp{.T_K = high->liquid.T_K - subcooling_K, .p_Pa = p_Pa});
  const auto ideal = suction.and_then([&](const State& from) {
    return state(fluid, GivenPs{.p_Pa = p_Pa, .s_JkgK = from.s_JkgK});
  });
  const auto discharge = ideal.and_then([&](const State& to) {
    const double rise_Jkg = (to.h_Jkg - suction->h_Jkg) / isentropic_efficiency;
    return state(fluid, GivenPh{.p_Pa = p_Pa, .h_Jkg = suction->h_Jkg + rise_Jkg});
  });
  return combine(
      [](const State& s, const State& d, const State& l, const State& o) {
        return TypicalCycle{.suction = s, .discharge = d, .liquid = l, .evaporator_out = o};
      },
      suction, discharge, liquid, outlet);
}

struct StreamDuty {
  double in_T_K;
  double out_T_K;
  double heat_W;
};

Result<double> stream_flow(const MachineModel& model, const ModelStream& stream, Role role,
                           const StreamDuty& duty) {
  const auto in = stream_state(stream.fluid, duty.in_T_K);
  const auto out = stream_state(stream.fluid, duty.out_T_K);
  const auto point = model.index_of(role);
  const bool by_mass = point && model.points[*point].mass_flow;
  return combine(
      [&](const StreamState& a, const StreamState& b) {
        const double kgs = duty.heat_W / std::abs(a.h_Jkg - b.h_Jkg);
        return by_mass ? kgs : kgs / (stream.flow_at == FlowPlace::in ? a : b).rho_kgm3;
      },
      in, out);
}

}  // namespace

Result<TypicalValues> typical_values(const MachineModel& model) {
  const StreamTemperatures& at = model.duty == Duty::cooling ? chiller : heat_pump;
  const auto cycle = typical_cycle(model, at);
  if (!cycle) {
    return tl::unexpected{cycle.error()};
  }
  const double power_W = load_share * model.rated_power_W;
  const double m =
      power_W * (1.0 - model.casing_loss.value) / (cycle->discharge.h_Jkg - cycle->suction.h_Jkg);
  const auto cold =
      stream_flow(model, model.cold, Role::cold_flow,
                  {.in_T_K = at.cold_in_T_K,
                   .out_T_K = at.cold_out_T_K,
                   .heat_W = m * (cycle->evaporator_out.h_Jkg - cycle->liquid.h_Jkg)});
  const auto hot = stream_flow(model, model.hot, Role::hot_flow,
                               {.in_T_K = at.hot_in_T_K,
                                .out_T_K = at.hot_out_T_K,
                                .heat_W = m * (cycle->discharge.h_Jkg - cycle->liquid.h_Jkg)});
  return combine(
      [&](double cold_flow, double hot_flow) {
        // In the order of the roles.
        return TypicalValues{at.cold_in_T_K,
                             at.cold_out_T_K,
                             cold_flow,
                             at.hot_in_T_K,
                             at.hot_out_T_K,
                             hot_flow,
                             cycle->suction.p_Pa,
                             cycle->suction.T_K,
                             cycle->discharge.p_Pa,
                             cycle->discharge.T_K,
                             cycle->liquid.T_K,
                             cycle->liquid.p_Pa,
                             cycle->evaporator_out.T_K,
                             power_W};
      },
      cold, hot);
}

}  // namespace lostwork
