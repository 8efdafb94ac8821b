// States by pressure and enthalpy or entropy: the temperature is searched along the isobar.
#include "thermo/fluids/density.h"
#include "thermo/fluids/pseudo_pure.h"
#include "thermo/fluids/quick_search.h"
#include "thermo/fluids/single_phase.h"

#include <algorithm>
#include <cmath>
#include <optional>

namespace lostwork {
namespace {

constexpr int most_steps = 100;
constexpr double good_heat = 1e-11;
constexpr double worst_heat = 1e-7;

double value_of(const Wanted& wanted, const State& state) {
  return wanted.entropy ? state.s_JkgK : state.h_Jkg;
}

// The part of the isobar that is searched, on which the value rises with the temperature.
struct Span {
  double low_T_K;
  double high_T_K;
  double first_T_K;
  Branch branch;  // of the temperatures below the critical one
};

// Whether a search that left the bracket has tried its end: only then is the value outside.
struct Ends {
  bool low = false;
  bool high = false;
};

Phase phase_at(const Fluid& fluid, double T_K, double p_Pa, Branch branch) {
  if (T_K >= fluid.critical_T_K) {
    return p_Pa >= fluid.critical_p_Pa ? Phase::supercritical : Phase::vapour;
  }
  return branch == Branch::liquid ? Phase::liquid : Phase::vapour;
}

double inside(const Span& span, double next_T_K, Ends& tried) {
  if (next_T_K > span.low_T_K && next_T_K < span.high_T_K) {
    return next_T_K;
  }
  if (next_T_K <= span.low_T_K && !tried.low) {
    tried.low = true;
    return span.low_T_K;
  }
  if (next_T_K >= span.high_T_K && !tried.high) {
    tried.high = true;
    return span.high_T_K;
  }
  return 0.5 * (span.low_T_K + span.high_T_K);
}

// The state at one temperature of the search, with the density before it as first guess.
Result<State> probe(const Fluid& fluid, const Wanted& wanted, const Span& span, double T_K,
                    double first_kgm3) {
  const Isotherm isotherm{fluid, T_K};
  const Branch branch = T_K < fluid.critical_T_K ? span.branch : Branch::fluid;
  const double first =
      first_kgm3 > 0.0 ? first_kgm3 : guessed_rho_kgm3(isotherm, branch, wanted.p_Pa);
  return density_kgm3(isotherm, branch, wanted.p_Pa, first).and_then([&](double rho_kgm3) {
    return single_phase(isotherm, phase_at(fluid, T_K, wanted.p_Pa, span.branch), wanted.p_Pa,
                        rho_kgm3);
  });
}

// Takes no state whose value misses the wanted one by more than the rounding leaves: near the
// critical point that is worst_heat of R T, everywhere else good_heat.
Result<State> search(const Fluid& fluid, const Wanted& wanted, Span span) {
  const Span whole = span;
  Ends tried;
  double T_K = inside(span, span.first_T_K, tried);
  double first_kgm3 = 0.0;
  for (int step = 0; step < most_steps; ++step) {
    const Result<State> at = probe(fluid, wanted, span, T_K, first_kgm3);
    if (!at) {
      return at;
    }
    const double gap = value_of(wanted, *at) - wanted.value_SI;
    const double heat = wanted.entropy ? gap * T_K : gap;
    const double step_K = -heat / at->single->cp_JkgK;
    const bool at_end =
        (T_K == whole.low_T_K && heat > 0.0) || (T_K == whole.high_T_K && heat < 0.0);
    const bool last = at_end || !(span.high_T_K - span.low_T_K > 1e-14 * T_K);
    const double share = std::abs(heat) / (fluid.gas_constant_JkgK * T_K);
    if (share <= (last ? worst_heat : good_heat)) {
      return at;
    }
    if (last) {
      return refusal(at_end ? ReasonCode::outside_fluid : ReasonCode::not_converged, wanted.blame,
                     wanted.value_SI);
    }
    (gap > 0.0 ? span.high_T_K : span.low_T_K) = T_K;
    const double next_T_K = inside(span, T_K + step_K, tried);
    first_kgm3 = at->rho_kgm3 * (1.0 - at->single->expansion_T * (next_T_K - T_K) / T_K);
    T_K = next_T_K;
  }
  return refusal(ReasonCode::not_converged, wanted.blame, wanted.value_SI);
}

double first_T_K(const Wanted& wanted, const State& from) {
  const double gap = wanted.value_SI - value_of(wanted, from);
  const double cp = from.single->cp_JkgK;
  return wanted.entropy ? from.T_K * std::exp(std::min(gap / cp, 1.0)) : from.T_K + gap / cp;
}

// Where the isobar crosses the two-phase region.
Result<State> across(const Fluid& fluid, const Wanted& wanted, const Saturation& line) {
  const double liquid = value_of(wanted, line.liquid);
  const double vapour = value_of(wanted, line.vapour);
  if (wanted.value_SI >= liquid && wanted.value_SI <= vapour) {
    return mixed(line, (wanted.value_SI - liquid) / (vapour - liquid));
  }
  const bool is_liquid = wanted.value_SI < liquid;
  const double boiling_T_K = is_liquid ? line.liquid.T_K : line.vapour.T_K;
  const TwoPhases phases{boiling_T_K, wanted.p_Pa, line.liquid.rho_kgm3, line.vapour.rho_kgm3};
  const std::optional<State> quick =
      is_liquid ? quick_liquid(fluid, wanted, phases) : quick_vapour(fluid, wanted, phases);
  if (quick) {
    return *quick;
  }
  if (is_liquid) {
    return search(fluid, wanted,
                  {std::min(lowest_T_K(fluid), boiling_T_K), boiling_T_K,
                   first_T_K(wanted, line.liquid), Branch::liquid});
  }
  return search(fluid, wanted,
                {boiling_T_K, fluid.max_T_K, first_T_K(wanted, line.vapour), Branch::vapour});
}

Result<State> below_critical(const Fluid& fluid, const Wanted& wanted) {
  const Result<Saturation> line = saturation_at_p(fluid, wanted.p_Pa);
  if (line) {
    return across(fluid, wanted, *line);
  }
  if (line.error().code != ReasonCode::outside_fluid) {
    return tl::unexpected{line.error()};
  }
  // Below the saturation pressure at the lowest temperature there is only vapour.
  return search(fluid, wanted,
                {fluid.min_T_K, fluid.max_T_K, 0.8 * fluid.critical_T_K, Branch::vapour});
}

Result<State> on_isobar(const Fluid& fluid, const Wanted& wanted) {
  if (const auto reason = refused_p(fluid, wanted.p_Pa)) {
    return tl::unexpected{*reason};
  }
  if (!std::isfinite(wanted.value_SI)) {
    return refusal(ReasonCode::implausible, wanted.blame, wanted.value_SI);
  }
  if (wanted.p_Pa < fluid.critical_p_Pa) {
    const std::optional<State> quick =
        is_pseudo_pure(fluid) ? std::nullopt : quick_state(fluid, wanted);
    return quick ? Result<State>{*quick} : below_critical(fluid, wanted);
  }
  return search(fluid, wanted,
                {lowest_T_K(fluid), fluid.max_T_K, fluid.critical_T_K, Branch::liquid});
}

}  // namespace

Result<State> state(const Fluid& fluid, const GivenPh& given) {
  return on_isobar(fluid, {given.p_Pa, given.h_Jkg, false, "enthalpy"});
}

Result<State> state(const Fluid& fluid, const GivenPs& given) {
  return on_isobar(fluid, {given.p_Pa, given.s_JkgK, true, "entropy"});
}

Result<State> state(const Fluid& fluid, const GivenPs& given, const Saturation& at_p) {
  if (!std::isfinite(given.s_JkgK)) {
    return refusal(ReasonCode::implausible, "entropy", given.s_JkgK);
  }
  return across(fluid, {given.p_Pa, given.s_JkgK, true, "entropy"}, at_p);
}

}  // namespace lostwork
