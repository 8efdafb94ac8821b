// R-600a, isobutane.
//
// Source: D. Buecker, W. Wagner, J. Phys. Chem. Ref. Data 35 (2006) 929-1019,
// doi:10.1063/1.1901687.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {    2.0686820727966,  0.5,  1, 0},
    {   -3.6400098615204,  1.0,  1, 0},
    {   0.51968754427244,  1.5,  1, 0},
    {   0.17745845870123,  0.0,  2, 0},
    {  -0.12361807851599,  0.5,  3, 0},
    {  0.045145314010528,  0.5,  4, 0},
    {   0.03047647996598, 0.75,  4, 0},
    {   0.75508387706302,  2.0,  1, 1},
    {  -0.85885381015629,  2.5,  1, 1},
    {  0.036324009830684,  2.5,  2, 1},
    {  -0.01954879945055,  1.5,  7, 1},
    { -0.004445239290496,  1.0,  8, 1},
    {  0.004641076366646,  1.5,  8, 1},
    { -0.071444097992825,  4.0,  1, 2},
    { -0.080765060030713,  7.0,  2, 2},
    {   0.15560460945053,  3.0,  3, 2},
    { 0.0020318752160332,  7.0,  3, 2},
    {  -0.10624883571689,  3.0,  4, 2},
    {  0.039807690546305,  1.0,  5, 2},
    {  0.016371431292386,  6.0,  5, 2},
    {0.00053212200682628,  0.0, 10, 2},
    {-0.0078681561156387,  6.0,  2, 3},
    {-0.0030981191888963, 13.0,  6, 3},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    { -0.042276036810382, 2.0, 1, 10.0, 150.0, 1.16, 0.85},
    {-0.0053001044558079, 0.0, 2, 10.0, 200.0, 1.13,  1.0},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {4.94641014, 0.951277902},
    {4.09475197, 2.387895885},
    {15.6632824, 4.346904269},
    {9.73918122, 10.36885864},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-6.8681837,  1.0},
    {  1.436384,  1.5},
    {  -1.53511,  2.5},
    {-3.1196088,  5.0},
    { 2.8197827,  9.0},
    {-2.7784926, 12.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-2.0144917,      0.25},
    { 8.3470946, 1.0 / 3.0},
    {-15.019167,       0.5},
    { 21.137915, 2.0 / 3.0},
    {-11.065247, 5.0 / 6.0},
    { 1.3652739,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.5787723, 1.0 / 3.0},
    {-1.1076638,       0.5},
    {-2.9796047,       1.0},
    { 1.0979057,       2.0},
    {-6.2396324,       4.0},
    { 1.8103924,       5.0},
});

// a1 and a2 as printed (11.60865546, -5.29450411), moved to the IIR state.
constexpr IdealPart ideal_part{.a1 = -5.999509388699467,
                               .a2 = 5.0189458104439435,
                               .a_log_tau = 3.05956619,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r600a{
    .name = "R600a",
    .second_name = "isobutane",
    .composition = "isobutane CH(CH3)3 100 %",
    .safety_class = "A3 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Buecker and Wagner 2006, doi:10.1063/1.1901687",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.0581222,
    .gas_constant_JkgK = 8.314472 / 0.0581222,
    .reducing_T_K = 407.81,
    .reducing_rho_kgm3 = 3879.75678828 * 0.0581222,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 407.81 K, 3629 kPa and 225.5 kg/m3.
    .critical_T_K = 407.8100000000046,
    .critical_p_Pa = 3629000.0166458976,
    .critical_rho_kgm3 = 225.49999999986377,
    .min_T_K = 113.73,
    .max_T_K = 575.0,
    .max_p_Pa = 35e6,
    .densest_kgm3 = 850.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
