// R-125, pentafluoroethane.
//
// Source: E. W. Lemmon, R. T. Jacobsen, J. Phys. Chem. Ref. Data 34 (2005) 69-108,
// doi:10.1063/1.1797813.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l, m
    {    5.28076, 0.669, 1, 0, 0.0},
    {   -8.67658,  1.05, 1, 0, 0.0},
    {  0.7501127,  2.75, 1, 0, 0.0},
    {  0.7590023, 0.956, 2, 0, 0.0},
    { 0.01451899,   1.0, 4, 0, 0.0},
    {   4.777189,   2.0, 1, 1, 0.0},
    {  -3.330988,  2.75, 1, 1, 0.0},
    {   3.775673,  2.38, 2, 1, 0.0},
    {  -2.290919,  3.37, 2, 1, 0.0},
    {  0.8888268,  3.47, 3, 1, 0.0},
    { -0.6234864,  2.63, 4, 1, 0.0},
    {-0.04127263,  3.45, 5, 1, 0.0},
    {-0.08455389,  0.72, 1, 2, 0.0},
    { -0.1308752,  4.23, 5, 2, 0.0},
    {0.008344962,   0.2, 1, 3, 0.0},
    {  -1.532005,   4.5, 2, 2, 1.7},
    {-0.05883649,  29.0, 3, 3, 7.0},
    { 0.02296658,  24.0, 5, 3, 6.0},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-49.8651, -0.1},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {2.303, 0.92578},
    {5.086, 2.22895},
    {  7.3, 5.03283},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.6530641, 1.0},
    { 3.2733183, 1.5},
    {-5.6262854, 2.0},
    { 4.9392097, 2.5},
    {-5.6013974, 3.5},
    {-1.4726966, 9.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-1.9166422,      0.25},
    { 6.4810259, 1.0 / 3.0},
    {-24.243862, 2.0 / 3.0},
    {  49.66925, 5.0 / 6.0},
    {-31.369164,       1.0},
    { 4.2818837,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-0.56284236, 1.0 / 3.0},
    { -7.0032604,       0.5},
    {  8.4950889, 2.0 / 3.0},
    { -8.7359049,       1.0},
    {  5.8479164,       2.0},
    { -8.4517721,       3.0},
});

// a1 and a2 as printed (37.2674, 8.88404), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = 37.267451692030704,
                               .a2 = 8.884036718900735,
                               .a_log_tau = -1.0,
                               .powers = ideal,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r125{
    .name = "R125",
    .composition = "pentafluoroethane CHF2CF3 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon and Jacobsen 2005, doi:10.1063/1.1797813",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.1200214,
    .gas_constant_JkgK = 8.314472 / 0.1200214,
    .reducing_T_K = 339.173,
    .reducing_rho_kgm3 = 4779.0 * 0.1200214,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 339.173 K, 3617.7 kPa and 573.5823 kg/m3.
    .critical_T_K = 339.1772824561048,
    .critical_p_Pa = 3618276.0556197246,
    .critical_rho_kgm3 = 573.3948598942909,
    .min_T_K = 172.52,
    .max_T_K = 500.0,
    .max_p_Pa = 60e6,
    .densest_kgm3 = 2000.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
