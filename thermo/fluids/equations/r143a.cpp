// R-143a, 1,1,1-trifluoroethane.
//
// Source: E. W. Lemmon, R. T. Jacobsen, J. Phys. Chem. Ref. Data 29 (2000) 521-552,
// doi:10.1063/1.1318909.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {   7.7736443,  0.67, 1, 0},
    {    -8.70185, 0.833, 1, 0},
    { -0.27779799,   1.7, 1, 0},
    {   0.1460922,  1.82, 2, 0},
    {0.0089581616,  0.35, 5, 0},
    { -0.20552116,   3.9, 1, 1},
    {  0.10653258,  0.95, 3, 1},
    { 0.023270816,   0.0, 5, 1},
    {-0.013247542,  1.19, 7, 1},
    { -0.04279387,   7.2, 1, 2},
    {  0.36221685,   5.9, 2, 2},
    { -0.25671899,  7.65, 2, 2},
    {-0.092326113,   7.5, 3, 2},
    { 0.083774837,  7.45, 4, 2},
    { 0.017128445,  15.5, 2, 3},
    { -0.01725611,  22.0, 3, 3},
    {0.0049080492,  19.0, 5, 3},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-16.591049152078973, -0.33},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {4.4402, 5.178440800677737},
    {3.7515, 2.379596191489546},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    { -7.4581533, 1.0},
    {  2.5724709, 1.5},
    {  -2.469197, 2.0},
    {  1.3832034, 3.0},
    {   -4.17396, 4.0},
    {0.075356065, 7.5},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-1.3823748, 1.0 / 3.0},
    { 26.441838,       0.5},
    {-82.214817, 2.0 / 3.0},
    { 120.66563, 5.0 / 6.0},
    { -72.62826,       1.0},
    { 12.111529, 4.0 / 3.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-0.57832076, 1.0 / 3.0},
    { -6.2408346,       0.5},
    {  6.7291931, 2.0 / 3.0},
    { -8.0685084,       1.0},
    {  2.8233108, 4.0 / 3.0},
    { -4.9797611,       4.0},
});

// a1 and a2 follow from the IIR state alone.
constexpr IdealPart ideal_part{.a1 = 5.903048119431655,
                               .a2 = 7.307250621491643,
                               .a_log_tau = -1.0,
                               .powers = ideal,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r143a{
    .name = "R143a",
    .composition = "1,1,1-trifluoroethane CF3CH3 100 %",
    .safety_class = "A2L (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon and Jacobsen 2000, doi:10.1063/1.1318909",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.084041,
    .gas_constant_JkgK = 8.314472 / 0.084041,
    .reducing_T_K = 345.857,
    .reducing_rho_kgm3 = 5128.45 * 0.084041,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 345.857 K, 3761 kPa and 431.0001 kg/m3.
    .critical_T_K = 345.85700086786187,
    .critical_p_Pa = 3761818.271394984,
    .critical_rho_kgm3 = 431.00042649640847,
    .min_T_K = 161.34,
    .max_T_K = 650.0,
    .max_p_Pa = 150e6,
    .densest_kgm3 = 1650.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
