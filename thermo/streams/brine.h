// Aqueous solutions that carry heat to a machine or from it: glycols, alcohols, salts.
//
// Pure. Percent is that of the solute in the solution, by mass.
// Source: A. Melinder, Properties of Secondary Working Fluids for Indirect Systems, International
// Institute of Refrigeration 2010.
#pragma once

#include <array>
#include <optional>
#include <string>
#include <string_view>

namespace lostwork {

// One solution of one concentration.
struct Brine {
  using Cubic = std::array<double, 4>;  // coefficients of T^0 to T^3, T in K
  Cubic rho_kgm3;
  Cubic cp_JkgK;
  double freezing_T_K;  // where ice or salt begins to form
  double max_T_K;       // of the published fit
};

// "propylene glycol", 30.0. nullopt where there is no such solution or the concentration is not
// above 0 or beyond the published fit.
[[nodiscard]] std::optional<Brine> brine(std::string_view name, double mass_percent);

// For people: what brine() knows, each with its highest concentration.
[[nodiscard]] std::string brine_names();

}  // namespace lostwork
