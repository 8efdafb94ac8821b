// R-744, carbon dioxide.
//
// Source: R. Span, W. Wagner, J. Phys. Chem. Ref. Data 25 (1996) 1509-1596, doi:10.1063/1.555991.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {    0.388568232032,  0.0,  1, 0},
    {     2.93854759427, 0.75,  1, 0},
    {     -5.5867188535,  1.0,  1, 0},
    {   -0.767531995925,  2.0,  1, 0},
    {    0.317290055804, 0.75,  2, 0},
    {    0.548033158978,  2.0,  2, 0},
    {    0.122794112203, 0.75,  3, 0},
    {     2.16589615432,  1.5,  1, 1},
    {     1.58417351097,  1.5,  2, 1},
    {   -0.231327054055,  2.5,  4, 1},
    {   0.0581169164314,  0.0,  5, 1},
    {   -0.553691372054,  1.5,  5, 1},
    {    0.489466159094,  2.0,  5, 1},
    {  -0.0242757398435,  0.0,  6, 1},
    {   0.0624947905017,  1.0,  6, 1},
    {   -0.121758602252,  2.0,  6, 1},
    {   -0.370556852701,  3.0,  1, 2},
    {  -0.0167758797004,  6.0,  1, 2},
    {    -0.11960736638,  3.0,  4, 2},
    {  -0.0456193625088,  6.0,  4, 2},
    {   0.0356127892703,  8.0,  4, 2},
    { -0.00744277271321,  6.0,  7, 2},
    { -0.00173957049024,  0.0,  8, 2},
    {  -0.0218101212895,  7.0,  2, 3},
    {   0.0243321665592, 12.0,  3, 3},
    {  -0.0374401334235, 16.0,  3, 3},
    {    0.143387157569, 22.0,  5, 4},
    {   -0.134919690833, 24.0,  5, 4},
    {  -0.0231512250535, 16.0,  6, 4},
    {   0.0123631254929, 24.0,  7, 4},
    {  0.00210583219729,  8.0,  8, 4},
    {-0.000339585190264,  2.0, 10, 4},
    {  0.00559936517716, 28.0,  4, 5},
    {-0.000303351180556, 14.0,  8, 6},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {-213.654886883, 1.0, 2, 25.0, 325.0, 1.16, 1.0},
    { 26641.5691493, 0.0, 2, 25.0, 300.0, 1.19, 1.0},
    {-24027.2122046, 1.0, 2, 25.0, 300.0, 1.19, 1.0},
    { -283.41603424, 3.0, 3, 15.0, 275.0, 1.25, 1.0},
    { 212.472844002, 3.0, 3, 20.0, 275.0, 1.22, 1.0},
});

constexpr auto non_analytic = std::to_array<NonAnalyticTerm>({
  // n, a, b, beta, A, B, C, D
    {-0.666422765408, 3.5, 0.875, 0.3, 0.7, 0.3, 10.0, 275.0},
    { 0.726086323499, 3.5, 0.925, 0.3, 0.7, 0.3, 10.0, 275.0},
    {0.0550686686128, 3.0, 0.875, 0.3, 0.7, 1.0, 12.5, 275.0},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {1.99427042,  3.15163},
    {0.62105248,   6.1119},
    {0.41195293,  6.77708},
    {1.04028922, 11.32384},
    {0.08327678, 27.08792},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.0444282, 1.0},
    { 1.6642935, 1.5},
    {-4.2648915, 2.5},
    { 4.3468871, 3.0},
    {-5.1215901, 4.0},
    {-5.9600642, 9.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {   0.6717994,      0.25},
    {-0.067278779, 1.0 / 3.0},
    {   2.1502844,       0.5},
    {  -1.3437191,       1.0},
    {   2.8353364, 4.0 / 3.0},
    {  -1.5109479,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.8047479, 1.0 / 3.0},
    {0.63751659,       0.5},
    {-3.2868956, 2.0 / 3.0},
    {-1.0803294, 4.0 / 3.0},
    {0.14850866,       2.0},
    {-5.1743775,       4.0},
});

// a1 and a2 as printed (8.37304456, -3.70454304), moved to the IIR state.
constexpr IdealPart ideal_part{.a1 = -6.124871062431847,
                               .a2 = 5.1155963180145205,
                               .a_log_tau = 2.5,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r744{
    .name = "R744",
    .second_name = "carbon dioxide",
    .composition = "carbon dioxide CO2 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Span and Wagner 1996, doi:10.1063/1.555991",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.0440098,
    .gas_constant_JkgK = 8.31451 / 0.0440098,
    .reducing_T_K = 304.1282,
    .reducing_rho_kgm3 = 10624.9063 * 0.0440098,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 304.1282 K, 7377.3 kPa and 467.6 kg/m3.
    .critical_T_K = 304.1282000029807,
    .critical_p_Pa = 7377298.373446729,
    .critical_rho_kgm3 = 467.59996991047996,
    .min_T_K = 216.592,
    .max_T_K = 2000.0,
    .max_p_Pa = 800e6,
    .densest_kgm3 = 1800.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .non_analytic = non_analytic,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
