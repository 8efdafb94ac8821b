// R-1234ze(E), trans-1,3,3,3-tetrafluoroprop-1-ene.
//
// Source: M. Thol, E. W. Lemmon, Int. J. Thermophys 37 (2016) 1-16, doi:10.1007/s10765-016-2040-6.
//
// With the gas constant below, the check values in the paper come out to their last digit.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    { 0.03982797,   1.0, 4, 0},
    {   1.812227, 0.223, 1, 0},
    {  -2.537512, 0.755, 1, 0},
    { -0.5333254,  1.24, 2, 0},
    {  0.1677031,  0.44, 3, 0},
    {  -1.323801,   2.0, 1, 2},
    { -0.6694654,   2.2, 3, 2},
    {  0.8072718,   1.2, 2, 1},
    { -0.7740229,   1.5, 2, 2},
    {-0.01843846,   0.9, 7, 1},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {    1.407916, 1.33, 1,  1.0,  1.21, 0.943, 0.728},
    {  -0.4237082, 1.75, 1, 1.61,  1.37, 0.642,  0.87},
    {  -0.2270068, 2.11, 3, 1.24,  0.98,  0.59, 0.855},
    {   -0.805213,  1.0, 3, 9.34, 171.0,   1.2,  0.79},
    {  0.00994318,  1.5, 2, 5.78,  47.4,  1.33,   1.3},
    {-0.008798793,  1.0, 1, 3.08,  15.4,  0.64,  0.71},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {9.3575, 1.34113088966911},
    {10.717, 5.15538034001459},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    { -7.5897769, 1.0},
    {  1.9190802, 1.5},
    { -5.2690227, 2.5},
    {  5.7658346, 3.0},
    { -6.2803457, 4.0},
    {-0.87605352, 9.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    { 3.6630485, 1.0 / 3.0},
    {-10.218331,       0.5},
    { 20.168722, 2.0 / 3.0},
    {-13.044214, 5.0 / 6.0},
    { 2.2656628, 4.0 / 3.0},
    {0.29930333,       5.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-3.7213102, 1.0 / 3.0},
    { 7.7802208,       0.5},
    {-10.894762, 2.0 / 3.0},
    { 3.7585773, 4.0 / 3.0},
    {-4.1970629,       2.0},
    {-5.1744238,       5.0},
});

// a1 and a2 follow from the IIR state alone.
constexpr IdealPart ideal_part{.a1 = -12.558346671052897,
                               .a2 = 8.791229309650994,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r1234ze_e{
    .name = "R1234ze(E)",
    .second_name = "R1234ze",
    .composition = "trans-1,3,3,3-tetrafluoroprop-1-ene CF3CH=CHF (E) 100 %",
    .safety_class = "A2L (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Thol and Lemmon 2016, doi:10.1007/s10765-016-2040-6",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.1140415928,
    .gas_constant_JkgK = 8.3144621 / 0.1140415928,
    .reducing_T_K = 382.513,
    .reducing_rho_kgm3 = 4290.0 * 0.1140415928,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 382.513 K, 3634.870333 kPa and 489.2384 kg/m3.
    .critical_T_K = 382.51300260465183,
    .critical_p_Pa = 3634866.1930400208,
    .critical_rho_kgm3 = 489.2107573195901,
    .min_T_K = 168.62,
    .max_T_K = 420.0,
    .max_p_Pa = 15e6,
    .densest_kgm3 = 1700.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
