// R-507A, R125/R143a 50/50 % by mass, treated as one fluid.
//
// Source: E. W. Lemmon, Int. J. Thermophys. 24 (2003) 991-1006, doi:10.1023/A:1025048800563.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {    6.24982, 0.692, 1, 0},
    {   -8.07855, 0.943, 1, 0},
    {  0.0264843,   5.8, 1, 0},
    {   0.286215,  0.77, 2, 0},
    {-0.00507076,  5.84, 2, 0},
    {  0.0109552,  0.24, 4, 0},
    { 0.00116124,  0.69, 6, 0},
    {    1.38469,   2.0, 1, 1},
    {  -0.922473,   3.0, 1, 1},
    { -0.0503562,   7.0, 1, 1},
    {   0.822098,   2.2, 2, 1},
    {  -0.277727,   4.3, 2, 1},
    {   0.358172,   2.7, 3, 1},
    { -0.0126426,   1.2, 4, 1},
    { -0.0060701,  1.23, 7, 1},
    { -0.0815653,  12.0, 2, 2},
    { -0.0233323,   6.0, 3, 2},
    {  0.0352952,   8.5, 4, 2},
    {  0.0159566,  11.5, 4, 2},
    {  0.0755927,  13.0, 2, 3},
    { -0.0542007,  17.0, 3, 3},
    {  0.0170451,  16.2, 5, 3},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-21.6054, -0.25},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {0.95006, 1.05886},
    { 4.1887, 2.37081},
    { 5.5184, 5.14305},
});

// Bubble and dew line as printed.
constexpr auto bubble = std::to_array<Power>({
  // n, t
    {-7.4853, 1.0},
    { 2.0115, 1.5},
    {-2.0141, 2.2},
    {-3.7763, 4.6},
});
constexpr auto dew = std::to_array<Power>({
  // n, t
    {-7.5459, 1.0},
    {  2.338, 1.5},
    { -2.237, 2.1},
    {-4.1535, 4.7},
});

// First guesses only, fitted to this equation for this program.
constexpr auto liquid_rho = std::to_array<Power>({
    {-44.252141,      0.25},
    { 145.64646, 1.0 / 3.0},
    {-328.39793,       0.5},
    { 495.48561, 2.0 / 3.0},
    {-386.46368, 5.0 / 6.0},
    { 121.21488,       1.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    { 1.9864182, 1.0 / 3.0},
    {-19.963662,       0.5},
    { 28.760215, 2.0 / 3.0},
    {-30.140351,       1.0},
    {  16.07998, 4.0 / 3.0},
    {-6.6964816,       3.0},
});

// a1 and a2 as printed (9.93541, 7.9985), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = 9.935454173781414,
                               .a2 = 7.998489656803856,
                               .a_log_tau = -1.0,
                               .powers = ideal,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r507a{
    .name = "R507A",
    .composition = "R125/R143a 50/50 % by mass",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon 2003, doi:10.1023/A:1025048800563",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.0988592,
    .gas_constant_JkgK = 8.314472 / 0.0988592,
    .reducing_T_K = 343.765,
    .reducing_rho_kgm3 = 4964.0 * 0.0988592,
    // As printed.
    .critical_T_K = 343.765,
    .critical_p_Pa = 3704900.0,
    .critical_rho_kgm3 = 490.7370688,
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
