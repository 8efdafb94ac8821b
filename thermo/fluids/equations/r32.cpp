// R-32, difluoromethane.
//
// Source: R. Tillner-Roth, A. Yokozeki, J. Phys. Chem. Ref. Data 26 (1997) 1273-1328,
// doi:10.1063/1.556002.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {    1.046634,  0.25, 1, 0},
    {  -0.5451165,   1.0, 2, 0},
    {-0.002448595, -0.25, 5, 0},
    { -0.04877002,  -1.0, 1, 0},
    {  0.03520158,   2.0, 1, 0},
    {  0.00162275,   2.0, 3, 0},
    {2.377225e-05,  0.75, 8, 0},
    {    0.029149,  0.25, 4, 0},
    { 0.003386203,  18.0, 4, 4},
    {-0.004202444,  26.0, 4, 3},
    {0.0004782025,  -1.0, 8, 1},
    {-0.005504323,  25.0, 3, 4},
    { -0.02418396,  1.75, 5, 1},
    {   0.4209034,   4.0, 1, 2},
    {  -0.4616537,   5.0, 1, 2},
    {   -1.200513,   1.0, 3, 1},
    {    -2.59155,   1.5, 1, 1},
    {   -1.400145,   1.0, 2, 1},
    {   0.8263017,   0.5, 3, 1},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {1.160761, 2.2718538},
    {2.645151, 11.914421},
    {5.794987, 5.1415638},
    {1.129475, 32.768217},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    { -7.5473909, 1.0},
    {  2.6587976, 1.5},
    { -3.4390979, 2.0},
    {  2.6674671, 2.5},
    { -3.4310892, 3.5},
    {-0.86962452, 5.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-3.9031789,      0.25},
    { 16.719058, 1.0 / 3.0},
    {-42.159049,       0.5},
    { 74.617763, 2.0 / 3.0},
    {-64.601483, 5.0 / 6.0},
    { 22.434666,       1.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.7429857, 1.0 / 3.0},
    {-1.1693209,       0.5},
    {-3.3901387,       1.0},
    { 1.9628988,       2.0},
    {-2.3740661,       3.0},
    {-3.1794173,       4.0},
});

// a1 and a2 as printed (-8.258096, 6.353098), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = -8.25809596345087,
                               .a2 = 6.353097759865384,
                               .a_log_tau = 3.004486,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r32{
    .name = "R32",
    .composition = "difluoromethane CH2F2 100 %",
    .safety_class = "A2L (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Tillner-Roth and Yokozeki 1997, doi:10.1063/1.556002",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.052024,
    .gas_constant_JkgK = 8.314471 / 0.052024,
    .reducing_T_K = 351.255,
    .reducing_rho_kgm3 = 8150.0846 * 0.052024,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 351.255 K, 5782 kPa and 424 kg/m3.
    .critical_T_K = 351.25500044943203,
    .critical_p_Pa = 5782645.09394967,
    .critical_rho_kgm3 = 423.99996998830204,
    .min_T_K = 136.34,
    .max_T_K = 435.0,
    .max_p_Pa = 70e6,
    .densest_kgm3 = 1650.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
