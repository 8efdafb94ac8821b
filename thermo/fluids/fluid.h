// What the program knows of one fluid: the published fundamental equation, its limits and names.
//
// Plain constants, filled by name in one file a fluid, with the rows of the paper's tables as
// printed. The equation is a(rho, T)/(R T) = alpha0(tau, delta) + alphar(tau, delta) with tau =
// reducing T / T and delta = rho / reducing rho. The spans point at constants of static storage.
#pragma once

#include "thermo/fluids/residual.h"

#include <span>
#include <string_view>

namespace lostwork {

// n (tau^t) delta^d exp(-eta (delta - epsilon)^2 - beta (tau - gamma)^2)
struct GaussianTerm {
  double n;
  double t;
  int d;
  double eta;
  double beta;
  double gamma;
  double epsilon;
};

// n tau^t delta^d exp(eta (delta - epsilon)^2 + 1 / (beta (tau - gamma)^2 + b))
struct AssociatingTerm {
  double n;
  double t;
  int d;
  double eta;  // negative
  double beta;
  double gamma;
  double epsilon;
  double b;
};

// n D^b delta exp(-c_ (delta - 1)^2 - d_ (tau - 1)^2), where D = theta^2 + b_ ((delta - 1)^2)^a and
// theta = (1 - tau) + a_ ((delta - 1)^2)^(1 / (2 beta)). The papers print a_ to d_ as A to D.
struct NonAnalyticTerm {
  double n;
  double a;
  double b;
  double beta;
  double upper_a;
  double upper_b;
  double upper_c;
  double upper_d;
};

struct Power {  // n x^t: x is tau in the ideal part, theta on a saturation line
  double n;
  double t;
};

struct PlanckEinstein {  // n ln(1 - exp(-theta tau))
  double n;
  double theta;
};

// alpha0 = ln(delta) + a1 + a2 tau + a_log_tau ln(tau) + the sums below. a1 and a2 carry the
// reference state.
struct IdealPart {
  double a1;
  double a2;
  double a_log_tau;
  std::span<const Power> powers = {};
  std::span<const PlanckEinstein> planck_einstein = {};
};

struct Fluid {
  std::string_view name;              // "R134a"
  std::string_view second_name = {};  // also accepted: "propane"
  std::string_view composition;       // for people: the substance, or mass fractions
  std::string_view safety_class;      // for people, with its source; never a safety setting
  std::string_view source;            // publication of the equation
  std::string_view reference_state;
  double molar_mass_kgmol;
  double gas_constant_JkgK;  // as the paper's own equation uses it
  double reducing_T_K;
  double reducing_rho_kgm3;
  double critical_T_K;   // of the equation itself, where the first two density derivatives of p
  double critical_p_Pa;  // vanish: what the papers print differs in the last digits
  double critical_rho_kgm3;
  double min_T_K;  // limits of the equation as published
  double max_T_K;
  double max_p_Pa;
  double densest_kgm3;  // above any density within the limits: only bounds the search
  IdealPart ideal;
  PowerTerms residual;
  std::span<const GaussianTerm> gaussian = {};
  std::span<const AssociatingTerm> associating = {};
  std::span<const NonAnalyticTerm> non_analytic = {};
  // The saturation line, with theta = 1 - T / critical_T_K; what the sums mean stands in
  // thermo/fluids/ancillary.h. Of a pure fluid all three are first guesses.
  std::span<const Power> saturation_pressure;   // good to 0.05 % everywhere
  std::span<const Power> saturated_liquid_rho;  // good to 0.2 % below 0.98 of the critical
  std::span<const Power> saturated_vapour_rho;  // temperature, else 5 %
  // Of a blend that is treated as one fluid. Then saturation_pressure is its bubble line, and both
  // pressures are the published ones.
  std::span<const Power> dew_pressure = {};
};

}  // namespace lostwork
