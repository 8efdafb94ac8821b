// One evaluator for every fluid: a fundamental equation at one temperature, for many densities.
//
// What depends on tau alone is done once, in the constructor; a density then costs a few
// multiplications and one exponential for each power of delta in an exponential. Pure; a value is
// safe from any thread and must not outlive its Fluid. Domain: T > 0 and rho > 0, not checked here;
// no value is refused for the published limits (thermo/fluids/state.h does that).
// Source: R. Span, Multiparameter Equations of State, Springer 2000, ch. 3 (relations to the
// Helmholtz energy).
#pragma once

#include "thermo/fluids/fluid.h"

#include <array>
#include <cstddef>
#include <span>

namespace lostwork {

// alphar and its derivatives at one (tau, delta), each times the powers that make it dimensionless.
struct Reduced {
  double a;   // alphar
  double d;   // delta alphar_delta
  double dd;  // delta^2 alphar_delta_delta
  double t;   // tau alphar_tau
  double dt;  // delta tau alphar_delta_tau
  double tt;  // tau^2 alphar_tau_tau
};

// What a search for a density needs.
struct Slope {
  double p_Pa;
  double p_by_rho;  // dp/drho at constant T, J/kg
  double a;         // alphar
};

// All properties at (T, rho), per kg.
struct Properties {
  double p_Pa;
  double h_Jkg;
  double s_JkgK;
  double cv_JkgK;
  double cp_JkgK;
  double sound_speed_w;  // m/s; NaN where the state is not stable
  double p_by_rho;       // dp/drho at constant T, J/kg
  double p_by_T;         // dp/dT at constant rho, Pa/K
};

class Isotherm {
 public:
  Isotherm(const Fluid& fluid, double T_K);

  [[nodiscard]] double temperature_K() const { return T_K_; }
  [[nodiscard]] const Fluid& fluid() const { return *fluid_; }
  // The second virial coefficient, m3/kg: p = rho R T (1 + B rho + ...).
  [[nodiscard]] double second_virial() const;
  [[nodiscard]] Slope slope(double rho_kgm3) const;
  [[nodiscard]] Properties properties(double rho_kgm3) const;
  // The residual part alone, at the fluid's own reducing parameters.
  [[nodiscard]] Reduced residual(double delta) const;

 private:
  struct Coefficient {  // of one delta^d exp(-delta^l): sums of f = n tau^t exp(-tau^m)
    double c;           // f
    double ct;          // tau f'
    double ctt;         // tau^2 f''
  };
  void set_ideal_part();
  void add_row(const PowerTerms::Row& row, double value, Coefficient& sum) const;
  void set_groups();
  template <bool with_tau>
  [[nodiscard]] Reduced before_decay(const PowerTerms::Decay& decay,
                                     std::span<const double> delta_powers) const;
  template <bool with_tau>
  void add_powers(double delta, Reduced& sum) const;
  template <bool with_tau>
  void add_gaussians(double delta, Reduced& sum) const;
  template <bool with_tau>
  void add_associating(double delta, Reduced& sum) const;
  template <bool with_tau>
  void add_non_analytic(double delta, Reduced& sum) const;

  const Fluid* fluid_;
  double T_K_;
  double tau_;
  double log_tau_;
  double ideal_ = 0.0;                                    // alpha0 - ln(delta)
  double ideal_t_ = 0.0;                                  // tau alpha0_tau
  double ideal_tt_ = 0.0;                                 // tau^2 alpha0_tau_tau
  std::array<Coefficient, PowerTerms::capacity> groups_;  // the first fluid.residual.groups()
};

}  // namespace lostwork
