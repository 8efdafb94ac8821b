// R-13I1, trifluoroiodomethane.
//
// Source: E. W. Lemmon, R. Span, J. Chem. Eng. Data 60 (2015) 3745-3758,
// doi:10.1021/acs.jced.5b00684 (volume and pages from memory).
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {   1.12191,  0.25, 1, 0},
    {  -3.08087, 1.125, 1, 0},
    {   1.11307,   1.5, 1, 0},
    { -0.184885, 1.375, 2, 0},
    {  0.110971,  0.25, 3, 0},
    {  0.000325, 0.875, 7, 0},
    {  0.333357, 0.625, 2, 1},
    {-0.0288288,  1.75, 5, 1},
    { -0.371554, 3.625, 1, 2},
    {-0.0997985, 3.625, 4, 2},
    {-0.0333205,  14.5, 3, 3},
    { 0.0207882,  12.0, 4, 3},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {6.2641, 1.7505801634547473},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-6.9772336, 1.0},
    { 2.4895011, 1.5},
    {-2.5332053, 2.0},
    { 6.0855511, 3.5},
    {-9.8782064, 4.0},
    { 2.5992824, 5.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-0.56484323, 1.0 / 3.0},
    {  12.970656,       0.5},
    { -27.882264, 2.0 / 3.0},
    {  23.179407, 5.0 / 6.0},
    { -7.4421556, 4.0 / 3.0},
    {  2.4753408,       2.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-0.32466953, 1.0 / 3.0},
    { -5.6511185,       0.5},
    {  3.7211799, 2.0 / 3.0},
    { -6.7095227, 4.0 / 3.0},
    {  7.4210043,       2.0},
    { -6.6182288,       3.0},
});

// a1 and a2 follow from the IIR state alone.
constexpr IdealPart ideal_part{.a1 = -24.691499784827855,
                               .a2 = 14.21752526281531,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r13i1{
    .name = "R13I1",
    .composition = "trifluoroiodomethane CF3I 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, from memory)",
    .source = "Lemmon and Span 2015, doi:10.1021/acs.jced.5b00684",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.1959104,
    .gas_constant_JkgK = 8.3144621 / 0.1959104,
    .reducing_T_K = 396.44,
    .reducing_rho_kgm3 = 4430.6 * 0.1959104,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 396.44 K, 3952.566072 kPa and 868.0006 kg/m3.
    .critical_T_K = 396.43969044596565,
    .critical_p_Pa = 3952544.561952289,
    .critical_rho_kgm3 = 867.9997444166675,
    .min_T_K = 120.0,
    .max_T_K = 420.0,
    .max_p_Pa = 50e6,
    .densest_kgm3 = 3150.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
