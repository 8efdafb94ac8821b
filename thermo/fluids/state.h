// Equilibrium states of a fluid by its fundamental equation of state.
//
// Pure, and safe from any thread. SI, specific (per kg); pressure absolute. Reference state: IIR (h
// = 200 kJ/kg, s = 1 kJ/(kg K), saturated liquid at 0 degC); water keeps that of IAPWS-95.
#pragma once

#include "thermo/result.h"

#include <cstdint>
#include <optional>
#include <span>
#include <string_view>

namespace lostwork {

struct Fluid;  // thermo/fluids/fluid.h

enum class Phase : std::uint8_t { liquid, vapour, two_phase, supercritical };
[[nodiscard]] std::string_view name(Phase phase);

// What only a single-phase state has.
struct SinglePhase {
  double cp_JkgK;        // isobaric heat capacity
  double sound_speed_w;  // m/s
  double expansion_T;  // (T/v)(dv/dT) at constant p: (dh/dp)_T = v (1 - it), (ds/dp)_T = -v it / T
};

struct State {
  Phase phase;
  double T_K;
  double p_Pa;
  double rho_kgm3;
  double h_Jkg;
  double s_JkgK;
  std::optional<double> quality;      // vapour fraction by mass; set on saturation and between
  std::optional<SinglePhase> single;  // of the phase named; none for 0 < quality < 1
};

struct GivenTp {
  double T_K;
  double p_Pa;
};
struct GivenTx {
  double T_K;
  double quality;  // 0..1
};
struct GivenPx {
  double p_Pa;
  double quality;  // 0..1
};
struct GivenPh {
  double p_Pa;
  double h_Jkg;
};
struct GivenPs {
  double p_Pa;
  double s_JkgK;
};

// Each refuses: implausible (an input not finite, a pressure or temperature not above 0, a quality
// outside 0..1), outside_fluid (outside the published limits, or a saturation asked at or above the
// critical point), not_converged (never the last guess).
[[nodiscard]] Result<State> state(const Fluid& fluid, const GivenTp& given);
[[nodiscard]] Result<State> state(const Fluid& fluid, const GivenTx& given);
[[nodiscard]] Result<State> state(const Fluid& fluid, const GivenPx& given);
[[nodiscard]] Result<State> state(const Fluid& fluid, const GivenPh& given);
[[nodiscard]] Result<State> state(const Fluid& fluid, const GivenPs& given);

// The liquid on its bubble line and the vapour on its dew line, and how their temperatures move
// with pressure, K/Pa. A pure fluid has one line and both phases are in equilibrium; those of a
// blend have one pressure but two temperatures, or one temperature but two pressures.
struct Saturation {
  State liquid;
  State vapour;
  double bubble_dT_dp;
  double dew_dT_dp;
};
[[nodiscard]] Result<Saturation> saturation_at_T(const Fluid& fluid, double T_K);
[[nodiscard]] Result<Saturation> saturation_at_p(const Fluid& fluid, double p_Pa);

// By (p, s) where the saturation at that very pressure is known already: half the time.
[[nodiscard]] Result<State> state(const Fluid& fluid, const GivenPs& given, const Saturation& at_p);

// Every fluid of the program, and one by its name or second name, however it is written ("R134a",
// "r-134a", "R1234ze(E)", "Propane"): letters and digits count, their case does not. Null where
// there is none.
[[nodiscard]] std::span<const Fluid* const> fluids();
[[nodiscard]] const Fluid* fluid_named(std::string_view name);

}  // namespace lostwork
