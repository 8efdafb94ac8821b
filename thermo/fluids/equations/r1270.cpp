// R-1270, propylene.
//
// Source: E. W. Lemmon, U. Overhoff, M. O. McLinden, W. Wagner, personal communication (2010); not
// published in a journal.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {  0.04341002,   1.0, 4, 0},
    {    1.136592, 0.205, 1, 0},
    {  -0.8528611,  0.56, 1, 0},
    {   0.5216669, 0.676, 2, 0},
    {   -1.382953,   1.0, 2, 0},
    {   0.1214347,   0.5, 3, 0},
    {  -0.5984662,   1.0, 1, 1},
    {   -1.391883,  1.94, 1, 2},
    {   -1.008434,   2.0, 3, 2},
    {   0.1961249,   1.0, 2, 1},
    {   -0.360693,  2.66, 2, 2},
    {-0.002407175,  0.83, 8, 1},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {  0.7432121,  1.6, 1, 1.07,  0.77, 1.21, 0.78},
    {  0.1475162,  2.5, 1, 0.66,  0.83, 1.08, 0.82},
    {-0.02503391,  3.0, 2,  1.2, 0.607, 0.83, 1.94},
    { -0.2734409,  2.5, 3, 1.12,   0.4, 0.56, 0.69},
    {0.006378889, 2.72, 3, 1.47,  0.66, 1.22, 1.96},
    {  0.0150294,  4.0, 2, 1.93,  0.07, 1.81,  1.3},
    {-0.03162971,  4.0, 1,  3.3,   3.1, 1.54, 0.38},
    {-0.04107194,  1.0, 2, 15.4, 387.0, 1.12, 0.91},
    {  -1.190241,  4.0, 3,  6.0,  41.0,  1.4,  0.7},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {1.544, 0.8895942187358427},
    {4.013,  2.671528317376466},
    {8.923,  5.304617378387802},
    { 6.02,  11.85301926630442},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-6.7055022,  1.0},
    { 1.4570176,  1.5},
    {-1.3894234,  2.5},
    {-2.6921373,  5.0},
    { 1.4363198,  9.0},
    {-1.7781529, 12.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-0.42302908,      0.25},
    {  3.4590567, 1.0 / 3.0},
    { -4.6261242,       0.5},
    {  6.5442541, 2.0 / 3.0},
    { -2.5111954, 5.0 / 6.0},
    { 0.38142904,       3.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {  -2.112323, 1.0 / 3.0},
    {  1.8696924,       0.5},
    { -4.3857621, 2.0 / 3.0},
    {-0.26758615, 4.0 / 3.0},
    { -3.7797335,       4.0},
    {-0.42450297,      10.0},
});

// a1 and a2 as printed (4.9916462, -0.1709449), moved to the IIR state.
constexpr IdealPart ideal_part{.a1 = -5.182327965145156,
                               .a2 = 4.363990276542784,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r1270{
    .name = "R1270",
    .second_name = "propylene",
    .composition = "propylene C3H6 100 %",
    .safety_class = "A3 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon et al. 2010, personal communication",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.04207974,
    .gas_constant_JkgK = 8.314472 / 0.04207974,
    .reducing_T_K = 364.211,
    .reducing_rho_kgm3 = 5457.0 * 0.04207974,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 364.211 K, 4555 kPa and 229.6291 kg/m3.
    .critical_T_K = 364.2110025913478,
    .critical_p_Pa = 4554993.018414992,
    .critical_rho_kgm3 = 229.62840107079316,
    .min_T_K = 87.953,
    .max_T_K = 575.0,
    .max_p_Pa = 1000e6,
    .densest_kgm3 = 1050.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
