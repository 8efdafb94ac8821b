// R-717, ammonia.
//
// Source: K. Gao, J. Wu, I. H. Bell, A. H. Harvey, E. W. Lemmon, J. Phys. Chem. Ref. Data 52 (2023)
// 013102, doi:10.1063/5.0128269.
//
// With the gas constant below, the check values in the paper come out to their last digit.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    { 0.006132232,   1.0, 4, 0},
    {   1.7395866, 0.382, 1, 0},
    {  -2.2261792,   1.0, 1, 0},
    { -0.30127553,   1.0, 2, 0},
    {  0.08967023, 0.677, 3, 0},
    {-0.076387037, 2.915, 3, 2},
    { -0.84063963,  3.51, 2, 2},
    { -0.27026327, 1.063, 3, 1},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {     6.212578,  0.655, 1, 0.42776,  1.708,   1.036, -0.0726},
    {   -5.7844357,    1.3, 1,  0.6424, 1.4865,  1.2777, -0.1274},
    {    2.4817542,    3.1, 1,  0.8175, 2.0915,   1.083,  0.7527},
    {   -2.3739168, 1.4395, 2,  0.7995,   2.43,  1.2906,    0.57},
    {   0.01493697,  1.623, 2,    0.91,  0.488,   0.928,     2.2},
    {   -3.7749264,  0.643, 1,  0.3574,    1.1,   0.934,  -0.243},
    { 0.0006254348,   1.13, 3,    1.21,   0.85,   0.919,    2.96},
    {  -1.7359e-05,    4.5, 3,    4.14,   1.14,   1.852,    3.02},
    {  -0.13462033,    1.0, 1,   22.56, 945.64, 1.05897,  0.9574},
    {0.07749072839,    4.0, 1,   22.68, 993.85, 1.05277,  0.9576},
});

constexpr auto associating = std::to_array<AssociatingTerm>({
  // n, t, d, eta, beta, gamma, epsilon, b
    {-1.6909858, 4.3315, 1, -2.8452, 0.3696, 1.108,  0.4478,  1.244},
    {0.93739074,  4.015, 1, -2.8342, 0.2962, 1.313, 0.44689, 0.6826},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    { 2.224, 4.0585856593352405},
    { 3.148,  9.776605187888352},
    {0.9579, 17.829667620080876},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.2589696, 1.0},
    { 1.4830578, 1.5},
    {-9.8073731, 3.0},
    { 20.201446, 3.5},
    {-15.337637, 4.0},
    { 2.8232577, 7.5},
});
constexpr auto liquid_rho = std::to_array<Power>({
    { 1.0561488,      0.25},
    {-1.9181296, 1.0 / 3.0},
    {  7.673598,       0.5},
    {-7.4407745, 2.0 / 3.0},
    {  3.566068, 5.0 / 6.0},
    {0.14769728,       5.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.6467798, 1.0 / 3.0},
    {0.29204768,       0.5},
    {-3.7306289, 2.0 / 3.0},
    {0.54786074,       1.0},
    {-1.0436998, 4.0 / 3.0},
    {-3.9803597,       4.0},
});

// a1 and a2 as printed (-6.594060939, 5.60101152), moved to the IIR state.
constexpr IdealPart ideal_part{.a1 = -5.6037239390779225,
                               .a2 = 4.865272476565865,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r717{
    .name = "R717",
    .second_name = "ammonia",
    .composition = "ammonia NH3 100 %",
    .safety_class = "B2L (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Gao et al. 2023, doi:10.1063/5.0128269",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.01703052,
    .gas_constant_JkgK = 8.314462618 / 0.01703052,
    .reducing_T_K = 405.56,
    .reducing_rho_kgm3 = 13696.0 * 0.01703052,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 405.56 K, 11363.39116 kPa and 233.25 kg/m3.
    .critical_T_K = 405.55999997326353,
    .critical_p_Pa = 11363395.008781692,
    .critical_rho_kgm3 = 233.24999599843926,
    .min_T_K = 195.495,
    .max_T_K = 725.0,
    .max_p_Pa = 1000e6,
    .densest_kgm3 = 1050.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .associating = associating,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
