// R-410A, R32/R125 50/50 % by mass, treated as one fluid.
//
// Source: E. W. Lemmon, Int. J. Thermophys. 24 (2003) 991-1006, doi:10.1023/A:1025048800563.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {    0.987252, 0.44, 1, 0},
    {    -1.03017,  1.2, 1, 0},
    {     1.17666, 2.97, 1, 0},
    {   -0.138991, 2.95, 2, 0},
    {  0.00302373,  0.2, 5, 0},
    {    -2.53639, 1.93, 1, 1},
    {     -1.9668, 1.78, 2, 1},
    {    -0.83048,  3.0, 3, 1},
    {    0.172477,  0.2, 5, 1},
    {   -0.261116, 0.74, 5, 1},
    {  -0.0745473,  3.0, 5, 1},
    {    0.679757,  2.1, 1, 2},
    {   -0.652431,  4.3, 1, 2},
    {   0.0553849, 0.25, 4, 2},
    {   -0.071097,  7.0, 4, 2},
    {-0.000875332,  4.7, 9, 2},
    {    0.020076, 13.0, 2, 3},
    {  -0.0139761, 16.0, 2, 3},
    {   -0.018511, 25.0, 4, 3},
    {   0.0171939, 17.0, 5, 3},
    { -0.00482049,  7.4, 6, 3},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-46.87575, -0.1},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {2.0623, 2.02326},
    {5.9751, 5.00154},
    {1.5612, 11.2484},
});

// Bubble and dew line as printed.
constexpr auto bubble = std::to_array<Power>({
  // n, t
    {-7.2818, 1.0},
    { 2.5093, 1.8},
    {-3.2695, 2.4},
    {-2.8022, 4.9},
});
constexpr auto dew = std::to_array<Power>({
  // n, t
    {-7.4411, 1.0},
    { 1.9883, 1.6},
    {-2.4925, 2.4},
    {-3.2633, 5.0},
});

// First guesses only, fitted to this equation for this program.
constexpr auto liquid_rho = std::to_array<Power>({
    {-1.8355475, 1.0 / 3.0},
    { 116.33868, 2.0 / 3.0},
    {-379.86755, 5.0 / 6.0},
    { 416.11256,       1.0},
    {-287.42213, 4.0 / 3.0},
    { 140.39058,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    { 1.8597116, 1.0 / 3.0},
    {-15.709811,       0.5},
    { 19.527264, 2.0 / 3.0},
    {-19.978776,       1.0},
    { 10.205779, 4.0 / 3.0},
    {-5.3332358,       3.0},
});

// a1 and a2 as printed (36.8871, 7.15807), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = 36.88706245454444,
                               .a2 = 7.15806646868749,
                               .a_log_tau = -1.0,
                               .powers = ideal,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r410a{
    .name = "R410A",
    .composition = "R32/R125 50/50 % by mass",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon 2003, doi:10.1023/A:1025048800563",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.0725854,
    .gas_constant_JkgK = 8.314472 / 0.0725854,
    .reducing_T_K = 344.494,
    .reducing_rho_kgm3 = 6324.0 * 0.0725854,
    // As printed.
    .critical_T_K = 344.494,
    .critical_p_Pa = 4901200.0,
    .critical_rho_kgm3 = 459.0300696,
    .min_T_K = 200.0,
    .max_T_K = 500.0,
    .max_p_Pa = 50e6,
    .densest_kgm3 = 1750.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = bubble,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
    .dew_pressure = dew,
};

}  // namespace lostwork
