// R-227ea, 1,1,1,2,3,3,3-heptafluoropropane.
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
    {  2.024341, 0.34, 1, 0},
    {  -2.60593, 0.77, 1, 0},
    { 0.4957216, 0.36, 2, 0},
    { -0.824082,  0.9, 2, 0},
    {0.06543703,  1.0, 4, 0},
    {  -1.02461, 2.82, 1, 1},
    { 0.6247065,  2.1, 3, 1},
    { 0.2997521,  0.9, 6, 1},
    { -0.353917, 1.13, 6, 1},
    { -1.232043,  3.8, 2, 2},
    {-0.8824483, 2.75, 3, 2},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {   0.1349661, 1.5, 1, 0.83, 1.72, 0.414,  1.13},
    {  -0.2662928, 2.5, 2, 2.19,  5.2, 1.051,  0.71},
    {   0.1764733, 2.5, 1, 2.44, 2.31, 1.226,   1.2},
    {  0.01536163, 5.4, 1, 3.65, 1.02,   1.7,   1.7},
    {-0.004667185, 4.0, 4, 8.88, 5.63, 0.904, 0.546},
    {   -11.70854, 1.0, 2, 8.23, 50.9,  1.42, 0.896},
    {   0.9114512, 3.5, 1, 2.01, 1.56, 0.926, 0.747},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {11.43,  1.07495332088557},
    {12.83, 3.809015737530008},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.8610764, 1.0},
    { 2.9776934, 1.5},
    {-4.5848626, 2.0},
    { 3.3948744, 2.5},
    {-4.8275232, 3.5},
    {-1.0288178, 5.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-1.1570408,      0.25},
    { 4.4448164, 1.0 / 3.0},
    {-11.574334, 2.0 / 3.0},
    { 25.145787, 5.0 / 6.0},
    { -17.80077,       1.0},
    { 3.7537267, 4.0 / 3.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.5725464, 1.0 / 3.0},
    {-1.8906703,       0.5},
    { 1.5967616,       1.0},
    {-9.2882156, 4.0 / 3.0},
    { 10.582171,       2.0},
    {-10.925537,       3.0},
});

// a1 and a2 as printed (-15.82911241, 11.087951), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = -15.829112413683866,
                               .a2 = 11.087950996215758,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r227ea{
    .name = "R227ea",
    .composition = "1,1,1,2,3,3,3-heptafluoropropane CF3CHFCF3 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon and Span 2015, doi:10.1021/acs.jced.5b00684",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.17002886,
    .gas_constant_JkgK = 8.3144621 / 0.17002886,
    .reducing_T_K = 374.9,
    .reducing_rho_kgm3 = 3495.0 * 0.17002886,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 374.9 K, 2925.242234 kPa and 594.2509 kg/m3.
    .critical_T_K = 374.9001034452502,
    .critical_p_Pa = 2925248.665680182,
    .critical_rho_kgm3 = 594.2469253739447,
    .min_T_K = 146.35,
    .max_T_K = 475.0,
    .max_p_Pa = 60e6,
    .densest_kgm3 = 2150.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
