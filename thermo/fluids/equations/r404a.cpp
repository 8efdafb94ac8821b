// R-404A, R125/R143a/R134a 44/52/4 % by mass, treated as one fluid.
//
// Source: E. W. Lemmon, Int. J. Thermophys. 24 (2003) 991-1006, doi:10.1023/A:1025048800563.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {    6.10984, 0.67, 1, 0},
    {   -7.79453, 0.91, 1, 0},
    {  0.0183377, 5.96, 1, 0},
    {    0.26227,  0.7, 2, 0},
    {-0.00351688,  6.0, 2, 0},
    {  0.0116181,  0.3, 4, 0},
    { 0.00105992,  0.7, 6, 0},
    {   0.850922,  1.7, 1, 1},
    {  -0.520084,  3.3, 1, 1},
    { -0.0464225,  7.0, 1, 1},
    {    0.62119, 2.05, 2, 1},
    {  -0.195505,  4.3, 2, 1},
    {   0.336159,  2.7, 3, 1},
    { -0.0376062,  1.8, 4, 1},
    {-0.00636579, 1.25, 7, 1},
    { -0.0758262, 12.0, 2, 2},
    { -0.0221041,  6.0, 3, 2},
    {  0.0310441,  8.7, 4, 2},
    {  0.0132798, 11.6, 4, 2},
    {  0.0689437, 13.0, 2, 3},
    { -0.0507525, 17.0, 3, 3},
    {  0.0161382, 16.0, 5, 3},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-18.8664, -0.3},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {0.63078, 1.19617},
    { 3.5979, 2.32861},
    { 5.0335, 5.00188},
});

// Bubble and dew line as printed.
constexpr auto bubble = std::to_array<Power>({
  // n, t
    {0.061067,  0.54},
    { -6.5646, 0.965},
    { -3.6162,   3.7},
    { -3.9771,   9.0},
});
constexpr auto dew = std::to_array<Power>({
  // n, t
    {-0.00026863,   0.1},
    {    -6.5757, 0.972},
    {    -4.1802,   3.8},
    {    -7.9102,   9.0},
});

// First guesses only, fitted to this equation for this program.
constexpr auto liquid_rho = std::to_array<Power>({
    {0.47919571, 1.0 / 3.0},
    { 46.781614, 2.0 / 3.0},
    {-163.66604, 5.0 / 6.0},
    { 193.71772,       1.0},
    {-154.43281, 4.0 / 3.0},
    { 80.553083,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {0.86756923, 1.0 / 3.0},
    {-12.779746,       0.5},
    {  15.42432, 2.0 / 3.0},
    {-12.207991,       1.0},
    { 8.0919169,       2.0},
    { -10.18038,       3.0},
});

// a1 and a2 as printed (7.00407, 7.98695), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = 7.004082520045578,
                               .a2 = 7.986948455275082,
                               .a_log_tau = -1.0,
                               .powers = ideal,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r404a{
    .name = "R404A",
    .composition = "R125/R143a/R134a 44/52/4 % by mass",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon 2003, doi:10.1023/A:1025048800563",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.0976038,
    .gas_constant_JkgK = 8.314472 / 0.0976038,
    .reducing_T_K = 345.27,
    .reducing_rho_kgm3 = 4940.0 * 0.0976038,
    // As printed.
    .critical_T_K = 345.27,
    .critical_p_Pa = 3734800.0,
    .critical_rho_kgm3 = 482.162772,
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
