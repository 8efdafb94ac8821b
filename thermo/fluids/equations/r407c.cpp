// R-407C, R32/R125/R134a 23/25/52 % by mass, treated as one fluid.
//
// Source: E. W. Lemmon, Int. J. Thermophys. 24 (2003) 991-1006, doi:10.1023/A:1025048800563.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {      1.0588, 0.241, 1, 0},
    {    -1.12018,  0.69, 1, 0},
    {    0.629064,  2.58, 1, 0},
    {   -0.351953,  1.15, 2, 0},
    {  0.00455978, 0.248, 5, 0},
    {    -1.75725,  2.15, 1, 1},
    {    -1.12009,  2.43, 2, 1},
    {   0.0277353,   5.3, 2, 1},
    {    0.898881,  0.76, 3, 1},
    {    -1.17591,  1.48, 3, 1},
    {   0.0818591,  0.24, 5, 1},
    {  -0.0794097,  2.86, 5, 1},
    {-1.04047e-05,   8.0, 5, 1},
    {    0.233779,   3.3, 1, 2},
    {    -0.29179,   4.7, 1, 2},
    {   0.0154776,  0.45, 4, 2},
    {  -0.0314579,   8.4, 4, 2},
    { -0.00442552,  16.2, 2, 3},
    {  -0.0101254,  26.0, 4, 3},
    {  0.00915953,  16.0, 5, 3},
    {   -0.003615,   8.7, 6, 3},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-14.3914, -0.4},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {1.4245, 2.40437},
    {3.9419, 5.25122},
    {3.1209, 13.3632},
});

// Bubble and dew line as printed.
constexpr auto bubble = std::to_array<Power>({
  // n, t
    {0.48722,  0.54},
    {-6.6959, 0.925},
    {-1.4165,   2.7},
    {-2.5109,   4.7},
});
constexpr auto dew = std::to_array<Power>({
  // n, t
    {-0.086077,   0.4},
    {  -6.6364, 0.965},
    {  -2.4648,   3.1},
    {  -3.4776,   5.0},
});

// First guesses only, fitted to this equation for this program.
constexpr auto liquid_rho = std::to_array<Power>({
    {-0.59948797, 1.0 / 3.0},
    {  9.6183619,       0.5},
    { -56.131435,       1.0},
    {  210.98217, 4.0 / 3.0},
    { -190.30906,       1.5},
    {  30.696403,       2.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-0.3911656, 1.0 / 3.0},
    {-3.5761578,       0.5},
    {-2.9459347, 4.0 / 3.0},
    { 1.2774584,       2.0},
    {-7.6999263,       4.0},
    { 1.5079263,       5.0},
});

// a1 and a2 as printed (2.13194, 8.05008), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = 2.1319157017113177,
                               .a2 = 8.050081625698216,
                               .a_log_tau = -1.0,
                               .powers = ideal,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r407c{
    .name = "R407C",
    .composition = "R32/R125/R134a 23/25/52 % by mass",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon 2003, doi:10.1023/A:1025048800563",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.0862036,
    .gas_constant_JkgK = 8.314472 / 0.0862036,
    .reducing_T_K = 359.345,
    .reducing_rho_kgm3 = 5260.0 * 0.0862036,
    // As printed.
    .critical_T_K = 359.345,
    .critical_p_Pa = 4631700.0,
    .critical_rho_kgm3 = 453.43093600000003,
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
