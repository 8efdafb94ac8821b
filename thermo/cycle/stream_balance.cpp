#include "thermo/cycle/stream_balance.h"

#include <cmath>

namespace lostwork {
namespace {

// One end of the stream.
struct StreamEnd {
  Number T_K;
  Number rho_kgm3;
  Number h_Jkg;
  Number s_JkgK;
};

Result<StreamEnd> stream_end(const StreamFluid& fluid, const Result<Number>& T_K, Role role) {
  if (!T_K) {
    return tl::unexpected{T_K.error()};
  }
  const Result<StreamState> at = stream_state(fluid, T_K->value);
  if (!at) {
    return Refusal{
        Reason{.code = at.error().code, .blame = name(role), .value_SI = T_K->value}
    };
  }
  return StreamEnd{
      .T_K = *T_K,
      .rho_kgm3 = chain(at->rho_kgm3, -at->rho_kgm3 * at->expansion_beta, *T_K),
      .h_Jkg = chain(at->h_Jkg, at->cp_JkgK, *T_K),
      .s_JkgK = chain(at->s_JkgK, at->cp_JkgK / T_K->value, *T_K),
  };
}

Number entropic_mean_T_K(const StreamEnd& in, const StreamEnd& out) {
  if (std::abs(out.T_K.value - in.T_K.value) >= 1e-3 * in.T_K.value) {
    return (out.h_Jkg - in.h_Jkg) / (out.s_JkgK - in.s_JkgK);
  }
  // dH/dS is 0/0 where nothing changes: its series for a constant heat capacity, exact to d^4/180.
  const Number mean_T_K = 0.5 * (in.T_K + out.T_K);
  const Number d = (out.T_K - in.T_K) / mean_T_K;
  return mean_T_K * (1.0 - (1.0 / 12.0) * (d * d));
}

bool is_mass_flow(const MachineModel& model, Role flow) {
  const auto index = model.index_of(flow);
  return index && model.points[*index].mass_flow;
}

}  // namespace

StreamBalance stream_balance(const MachineModel& model, const ModelStream& stream,
                             const StreamRoles& roles, const Inputs& inputs) {
  const Result<StreamEnd> in = stream_end(stream.fluid, inputs[roles.in], roles.in);
  const Result<StreamEnd> out = stream_end(stream.fluid, inputs[roles.out], roles.out);
  const Result<Number>& flow = inputs[roles.flow];

  const Result<StreamEnd>& meter = stream.flow_at == FlowPlace::in ? in : out;
  const Result<Number> flow_kgs =
      is_mass_flow(model, roles.flow)
          ? flow
          : combine(
                [](const Number& flow_m3s, const StreamEnd& at) { return flow_m3s * at.rho_kgm3; },
                flow, meter);

  const auto released_W = [&](const Number& kgs, const StreamEnd& a,
                              const StreamEnd& b) -> Result<Number> {
    if (!(flow->value > inputs.errors.u(*flow))) {
      return Refusal{
          Reason{
                 .code = ReasonCode::zero_flow, .blame = name(roles.flow), .value_SI = flow->value}
      };
    }
    return kgs * (a.h_Jkg - b.h_Jkg);
  };
  return {.mean_T_K = combine(entropic_mean_T_K, in, out),
          .flow_kgs = flow_kgs,
          .released_W = combine(released_W, flow_kgs, in, out)};
}

}  // namespace lostwork
