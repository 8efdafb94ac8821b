// Aqueous solutions as coolants.
//
// Source: A. Melinder, Properties of Secondary Working Fluids for Indirect Systems, International
// Institute of Refrigeration 2010; the coefficients as a general-purpose open-source library
// (CoolProp) carries them.
#include "thermo/streams/brine.h"

#include <algorithm>
#include <array>
#include <cstddef>
#include <span>

namespace lostwork {
namespace {

// sum of c (x - x_m)^i (T - T_m)^j, x in percent by mass, T in degC: six coefficients for j = 0,
// five for j = 1, four for j = 2, three for j = 3.
using Surface = std::array<double, 18>;

struct Solution {
  std::string_view name;
  double middle_percent;  // x_m
  double middle_degC;     // T_m
  double most_percent;
  double most_degC;
  std::array<double, 6> freezing_degC;  // of (x - x_m)^i
  Surface rho_kgm3;
  Surface cp_JkgK;
};

constexpr Solution ethylene_glycol{
    .name = "ethylene glycol",
    .middle_percent = 30.8462,
    .middle_degC = 31.728,
    .most_percent = 60.0,
    .most_degC = 100.0,
    .freezing_degC = {-15.25, -0.808, -0.01334, -7.293e-05,  1.006e-06,   1.14e-09},
    .rho_kgm3 = { 1034.0, 1.311, 7.49e-05, -0.0001062, -9.623e-07, 4.891e-08,       -0.4781, -0.006876,
                      7.855e-05,1.229e-06, -7.211e-08, -0.002692, 4.805e-05, -3.995e-07, -1.153e-08,
                      4.725e-06, 1.69e-08, 4.982e-09},
    .cp_JkgK = { 3737.0, -17.99, -0.09933, 0.00261, 1.537e-05, -1.618e-06, 2.93,    0.1046, 0.0003516,
                      -1.189e-06, -4.272e-07, -0.004675, -0.0004147, 5.109e-06, -1.643e-07, -1.389e-05,
                      1.847e-07, -7.138e-08}
};
constexpr Solution propylene_glycol{
    .name = "propylene glycol",
    .middle_percent = 30.7031,
    .middle_degC = 32.7083,
    .most_percent = 60.0,
    .most_degC = 100.0,
    .freezing_degC = {-13.25, -0.6631,  -0.01094, -0.0002283, -3.409e-06,  1.465e-08},
    .rho_kgm3 = { 1018.0, 0.7604, -0.002498, -0.000155, -1.131e-06, 2.342e-08,           -0.5406, -0.00945,
                      2.7e-05,2.829e-06, -2.221e-08, -0.002666, 5.541e-05, -4.018e-07, -7.175e-09,
                      1.347e-05, -1.343e-07, 3.376e-09},
    .cp_JkgK = { 3882.0, -13.04, -0.1598, 0.0003539, 5e-05, -4.959e-07, 2.699,   0.0507, 9.534e-05,
                      3.102e-05, -7.135e-07, -0.001659, -4.752e-05, 1.167e-05, -2.95e-07, -1.032e-05,
                      1.522e-06, -4.87e-08}
};
constexpr Solution ethanol{
    .name = "ethanol",
    .middle_percent = 29.2361,
    .middle_degC = 8.1578,
    .most_percent = 60.0,
    .most_degC = 40.0,
    .freezing_degC = {-19.41, -0.954, -0.002648, 0.0003851, -2.858e-07,  -1.67e-07},
    .rho_kgm3 = { 961.9, -1.433, -0.0226, -0.000169, 1.291e-05, -8.318e-08,           -0.5222, -0.01989,
                      0.0002281,8.594e-06, -1.59e-07, -0.003281, 0.000187, -8.581e-08, -9.607e-08,
                      1.569e-05, -9.154e-07, 4.056e-09},
    .cp_JkgK = { 4204.0, -21.02, -0.3714, 0.01743, -6.292e-05, -8.29e-06, 2.319,   0.4927, -0.002335,
                      -0.0002969, 5.353e-06,  -0.03042, -0.003072, -1.96e-05, 1.901e-06, 0.000686,
                      -5.69e-05, 7.461e-07}
};
constexpr Solution methanol{
    .name = "methanol",
    .middle_percent = 30.5128,
    .middle_degC = 3.5359,
    .most_percent = 60.0,
    .most_degC = 40.0,
    .freezing_degC = {-26.29, -1.187, -0.01218, -6.823e-05,  1.297e-07,  2.363e-08},
    .rho_kgm3 = { 958.1, -1.391, -0.01105, -0.0001208, 4.927e-06, -7.727e-08,          -0.4151, -0.0151,
                      0.0001828,2.992e-06, -1.325e-07, -0.002261, 0.0001113, -1.641e-06, 1.455e-09,
                      2.998e-07, -3.264e-07, 1.51e-08},
    .cp_JkgK = { 3887.0, -18.5, -0.03769, -0.003776, -0.0001504, 6.433e-06, 7.201,  0.2984, -0.01196,
                      -5.611e-05,  7.373e-06,  -0.08979, -0.001865, 9.801e-05, -7.811e-07, -0.000439,
                      -1.718e-05, 6.66e-07}
};
constexpr Solution potassium_carbonate{
    .name = "potassium carbonate",
    .middle_percent = 22.0833,
    .middle_degC = 11.2422,
    .most_percent = 40.0,
    .most_degC = 40.0,
    .freezing_degC = { -10.3, -0.7786, -0.02766, -0.0008226, -2.372e-06,  3.251e-07},
    .rho_kgm3 = { 1216.0, 10.64, 0.04413, -0.0001333, -1.246e-05, 2.035e-07,          -0.4114, -0.007614,
                      7.806e-05,-2.381e-06,  2.708e-07, -0.003383, 5.214e-05, -1.173e-06, 1.696e-07,
                      2.99e-05, -8.087e-07, 5.658e-08},
    .cp_JkgK = { 3217.0, -37.33, 0.2023, 0.01971, 0.0003405, -3.488e-05, 1.492,  -0.01775, 0.004553,
                      0.0001367, -1.676e-05, -0.001539, 0.0005416, 3.587e-05, -3.667e-06, -3.546e-05,
                      6.59e-06, -3.707e-07}
};
constexpr Solution calcium_chloride{
    .name = "calcium chloride",
    .middle_percent = 18.7414,
    .middle_degC = 7.5257,
    .most_percent = 30.0,
    .most_degC = 40.0,
    .freezing_degC = {-16.21, -1.555, -0.05496, -0.002624, -0.0001726, -4.494e-06},
    .rho_kgm3 = { 1171.0, 9.847, 0.03389, 0.001062, 2.785e-05, -1.811e-06,          -0.1463, -0.02488,
                      -0.002302,6.291e-05,  6.423e-06, -0.001302, -0.000553, 3.526e-05, 1.806e-06,
                      -0.0001871, 1.665e-05, 2.788e-07},
    .cp_JkgK = { 3133.0, -44.8, 0.9511, 0.01472, -0.001346, -6.674e-05, 2.81,  0.03271, -0.005191,
                      0.0001615, -9.754e-06,  -0.01563, -0.001205, 0.0002282, 5.073e-06, -1.233e-05,
                      9.346e-06, -9.29e-07}
};
constexpr Solution sodium_chloride{
    .name = "sodium chloride",
    .middle_percent = 13.3897,
    .middle_degC = 12.6179,
    .most_percent = 23.0,
    .most_degC = 40.0,
    .freezing_degC = {-9.383, -0.9039, -0.02204, -0.0004827,  2.247e-06, 0.0},
    .rho_kgm3 = { 1099.0, 7.723, 0.02567, 0.0001108, -1.686e-05, 0.0, -0.3758, -0.01426, 0.0003994,
                      3.522e-07, 0.0, -0.002023, 0.0001535, -7.281e-06, 0.0, 0.0, 0.0, 0.0},
    .cp_JkgK = { 3593.0, -32.48, 0.6453, -0.01629, 0.0002331, 0.0,  1.669, -0.03331, -0.009314,
                      0.0007927, 0.0,  -0.02019, -0.001164, 0.0002236, 0.0, 0.0, 0.0, 0.0}
};
constexpr Solution potassium_acetate{
    .name = "potassium acetate",
    .middle_percent = 25.6757,
    .middle_degC = 6.7757,
    .most_percent = 45.0,
    .most_degC = 40.0,
    .freezing_degC = {-17.04, -1.228, -0.03862, -0.0004571, 2.969e-05,   8.69e-07},
    .rho_kgm3 = { 1138.0, 5.796, 0.01306, -0.001427, 9.353e-06, 2.285e-06, -0.3565, -0.0079,
                      6.845e-05, 8.304e-07,  2.322e-08,  -0.00202, 2.753e-05, -1.13e-06, 1.303e-08,
                      4.205e-06, 5.14e-08, 2.433e-08},
    .cp_JkgK = { 3327.0, -28.95, 0.04663, -0.001249, 0.0001659, -4.612e-07,     1.806, 0.04131,
                      0.0007775, 5.115e-05, -5.193e-06, -0.001766, 0.0004429, 3.463e-05, -2.987e-06,
                      4.357e-05, 1.125e-05, -7.261e-07}
};
constexpr Solution potassium_formate{
    .name = "potassium formate",
    .middle_percent = 29.1447,
    .middle_degC = 5.8908,
    .most_percent = 48.0,
    .most_degC = 40.0,
    .freezing_degC = {-20.19, -1.106,  -0.021, -0.0002638,  8.327e-07,  6.345e-08},
    .rho_kgm3 = { 1189.0, 7.044, 0.01889, -0.0002262, 2.368e-05, 1.061e-06,          -0.3515, -0.00656,
                      0.0001034,3.692e-07, 8.766e-08, -0.001918, 7.018e-05, -3.889e-06, 6.609e-08,
                      3.132e-05, -1.459e-06, 9.225e-09},
    .cp_JkgK = { 3144.0, -29.94, 0.2944, 0.001161, -0.0001429, -3.221e-06, 1.698,   0.0229, -0.002482,
                      6.758e-05, 9.949e-07, -0.001303, 3.898e-06, 3.3e-05, -1.277e-06, 5.177e-05,
                      7.391e-06, -4.871e-07}
};
constexpr std::array solutions{&ethylene_glycol, &propylene_glycol,    &ethanol,
                               &methanol,        &potassium_carbonate, &calcium_chloride,
                               &sodium_chloride, &potassium_acetate,   &potassium_formate};

constexpr double ice_point_T_K = 273.15;

double at_percent(std::span<const double> coefficients, double off_middle) {
  double sum = 0.0;
  for (std::size_t i = coefficients.size(); i-- > 0;) {
    sum = sum * off_middle + coefficients[i];
  }
  return sum;
}

// What is left of a surface at one concentration: coefficients of (T - T_m)^j.
Brine::Cubic at_percent(const Surface& surface, double off_middle) {
  Brine::Cubic out{};
  std::size_t begin = 0;
  for (std::size_t j = 0; j < out.size(); ++j) {
    const std::size_t count = 6 - j;
    out[j] = at_percent(std::span{surface}.subspan(begin, count), off_middle);
    begin += count;
  }
  return out;
}

// The same in powers of T.
Brine::Cubic about_zero(const Brine::Cubic& c, double middle) {
  return {c[0] - middle * (c[1] - middle * (c[2] - middle * c[3])),
          c[1] - middle * (2.0 * c[2] - 3.0 * middle * c[3]), c[2] - 3.0 * middle * c[3], c[3]};
}

}  // namespace

std::optional<Brine> brine(std::string_view name, double mass_percent) {
  const auto* const found =
      std::find_if(solutions.begin(), solutions.end(),
                   [name](const Solution* solution) { return solution->name == name; });
  if (found == solutions.end() || !(mass_percent > 0.0 && mass_percent <= (*found)->most_percent)) {
    return std::nullopt;
  }
  const Solution& solution = **found;
  const double off_middle = mass_percent - solution.middle_percent;
  const double middle_T_K = ice_point_T_K + solution.middle_degC;
  return Brine{.rho_kgm3 = about_zero(at_percent(solution.rho_kgm3, off_middle), middle_T_K),
               .cp_JkgK = about_zero(at_percent(solution.cp_JkgK, off_middle), middle_T_K),
               .freezing_T_K = ice_point_T_K + at_percent(solution.freezing_degC, off_middle),
               .max_T_K = ice_point_T_K + solution.most_degC};
}

std::string brine_names() {
  std::string out;
  for (const Solution* solution : solutions) {
    out += (out.empty() ? "" : ", ") + std::string{solution->name} + " up to " +
           std::to_string(static_cast<int>(solution->most_percent)) + " %";
  }
  return out;
}

}  // namespace lostwork
