// R-1234yf, 2,3,3,3-tetrafluoroprop-1-ene.
//
// Source: E. W. Lemmon, R. Akasaka, Int. J. Thermophys. 43 (2022) 119,
// doi:10.1007/s10765-022-03015-y.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {       0.0340387,   1.0, 4, 0},
    {        1.912859, 0.222, 1, 0},
    {-2.1984719881617,  0.61, 1, 0},
    {-0.8147645305033, 1.122, 2, 0},
    {       0.2288282,   0.5, 3, 0},
    {        -1.65436,  2.14, 1, 2},
    {       -1.446628, 2.284, 3, 2},
    {       0.5961722,  1.05, 2, 1},
    {      -0.6148209,  2.33, 2, 2},
    {      -0.0180069, 0.778, 7, 1},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    { 0.2845275,   1.0, 1,  28.1, 1016.0, 1.061,  0.96},
    {-0.3050809,   2.0, 1,  28.0, 1000.0, 1.062,  0.96},
    {  2.198935, 1.236, 1, 1.307,   1.16,   1.3, 0.853},
    {-0.4270329,   1.6, 1,  1.96,    1.2,  1.04,  1.15},
    {-0.4015581,  1.85, 1,  1.25,   1.26,   1.0,   1.3},
    { 0.1179587,   0.7, 1,   1.0,    1.6,  1.14,   1.5},
    {-0.3141002,  1.75, 1,   2.2,   0.87,   1.1, 0.762},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {8.65, 1.3918716868288703},
    {9.75,  4.268044039690091},
    {2.11, 12.233247247519369},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.5660196, 1.0},
    { 3.3121151, 1.5},
    {-5.6321025, 2.0},
    { 5.2034665, 2.5},
    {-5.4950739, 3.5},
    {-1.7368645, 9.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-1.5784075, 1.0 / 3.0},
    { 20.671705,       0.5},
    {-36.719428, 2.0 / 3.0},
    { 50.880634,       1.0},
    {-69.698671, 4.0 / 3.0},
    { 39.496437,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    { 0.3844638, 1.0 / 3.0},
    { -10.77224,       0.5},
    { 13.008634, 2.0 / 3.0},
    {-12.395545,       1.0},
    { 4.4153236, 4.0 / 3.0},
    {-5.4805622,       4.0},
});

// a1 and a2 as printed (-12.08152554, 8.528962384), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = -12.081525543189045,
                               .a2 = 8.528962383650116,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r1234yf{
    .name = "R1234yf",
    .composition = "2,3,3,3-tetrafluoroprop-1-ene CF3CF=CH2 100 %",
    .safety_class = "A2L (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon and Akasaka 2022, doi:10.1007/s10765-022-03015-y",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.1140416,
    .gas_constant_JkgK = 8.314462618 / 0.1140416,
    .reducing_T_K = 367.85,
    .reducing_rho_kgm3 = 4180.0 * 0.1140416,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 367.85 K, 3384.4 kPa and 476.6939 kg/m3.
    .critical_T_K = 367.84999999994756,
    .critical_p_Pa = 3384373.695566112,
    .critical_rho_kgm3 = 476.69388799956585,
    .min_T_K = 121.6,
    .max_T_K = 410.0,
    .max_p_Pa = 100e6,
    .densest_kgm3 = 1850.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
