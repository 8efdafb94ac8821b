// R-600, n-butane.
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
    {    2.5536998241635,  0.5,  1, 0},
    {   -4.4585951806696,  1.0,  1, 0},
    {   0.82425886369063,  1.5,  1, 0},
    {   0.11215007011442,  0.0,  2, 0},
    { -0.035910933680333,  0.5,  3, 0},
    {  0.016790508518103,  0.5,  4, 0},
    {  0.032734072508724, 0.75,  4, 0},
    {   0.95571232982005,  2.0,  1, 1},
    {   -1.0003385753419,  2.5,  1, 1},
    {  0.085581548803855,  2.5,  2, 1},
    { -0.025147918369616,  1.5,  7, 1},
    {-0.0015202958578918,  1.0,  8, 1},
    {  0.004706068232642,  1.5,  8, 1},
    { -0.097845414174006,  4.0,  1, 2},
    {  -0.04831790415876,  7.0,  2, 2},
    {   0.17841271865468,  3.0,  3, 2},
    {  0.018173836739334,  7.0,  3, 2},
    {  -0.11399068074953,  3.0,  4, 2},
    {  0.019329896666669,  1.0,  5, 2},
    {  0.001157587740101,  6.0,  5, 2},
    {0.00015253808698116,  0.0, 10, 2},
    { -0.043688558458471,  6.0,  2, 3},
    {-0.0082403190629989, 13.0,  6, 3},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {-0.028390056949441, 2.0, 1, 10.0, 150.0, 1.16, 0.85},
    {0.0014904666224681, 0.0, 2, 10.0, 200.0, 1.13,  1.0},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {5.54913289, 0.774840445},
    {11.4648996, 3.340602552},
    {7.59987584, 4.970513096},
    {9.66033239, 9.975553778},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.0920675,  1.0},
    { 1.8307057,  1.5},
    {-2.1425567,  2.5},
    {-4.2940935,  6.0},
    { 5.7149491,  9.0},
    {-5.0111947, 12.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-0.58145877, 1.0 / 3.0},
    {  13.260511,       0.5},
    { -25.181075, 2.0 / 3.0},
    {  17.661152, 5.0 / 6.0},
    {  -4.528686,       1.5},
    {  2.1620478,       2.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-0.59331577, 1.0 / 3.0},
    { -4.7104529,       0.5},
    {  3.6137699, 2.0 / 3.0},
    { -4.5130548,       1.0},
    {  1.0321767, 4.0 / 3.0},
    {  -4.189618,       4.0},
});

// a1 and a2 as printed (12.54882924, -5.46976878), moved to the IIR state.
constexpr IdealPart ideal_part{.a1 = -5.424959593897867,
                               .a2 = 4.919495128324196,
                               .a_log_tau = 3.24680487,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r600{
    .name = "R600",
    .second_name = "butane",
    .composition = "n-butane C4H10 100 %",
    .safety_class = "A3 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Buecker and Wagner 2006, doi:10.1063/1.1901687",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.0581222,
    .gas_constant_JkgK = 8.314472 / 0.0581222,
    .reducing_T_K = 425.125,
    .reducing_rho_kgm3 = 3922.76961299 * 0.0581222,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 425.125 K, 3796 kPa and 228 kg/m3.
    .critical_T_K = 425.125000000008,
    .critical_p_Pa = 3796000.017417927,
    .critical_rho_kgm3 = 228.00000000003809,
    .min_T_K = 134.895,
    .max_T_K = 575.0,
    .max_p_Pa = 12e6,
    .densest_kgm3 = 850.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
