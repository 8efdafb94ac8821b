// R-290, propane.
//
// Source: E. W. Lemmon, M. O. McLinden, W. Wagner, J. Chem. Eng. Data 54 (2009) 3141-3180,
// doi:10.1021/je900217v.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {0.042910051,  1.0, 4, 0},
    {  1.7313671, 0.33, 1, 0},
    { -2.4516524,  0.8, 1, 0},
    { 0.34157466, 0.43, 2, 0},
    {-0.46047898,  0.9, 2, 0},
    {-0.66847295, 2.46, 1, 1},
    { 0.20889705, 2.09, 3, 1},
    { 0.19421381, 0.88, 6, 1},
    {-0.22917851, 1.09, 6, 1},
    {-0.60405866, 3.25, 2, 2},
    {0.066680654, 4.62, 3, 2},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    { 0.017534618, 0.76, 1, 0.963,  2.33, 0.684,  1.283},
    {  0.33874242,  2.5, 1, 1.977,  3.47, 0.829, 0.6936},
    {  0.22228777, 2.75, 1, 1.917,  3.15, 1.419,  0.788},
    { -0.23219062, 3.05, 2, 2.307,  3.19, 0.817,  0.473},
    { -0.09220694, 2.55, 2, 2.546,  0.92,   1.5, 0.8577},
    { -0.47575718,  8.4, 4,  3.28,  18.8, 1.426,  0.271},
    {-0.017486824, 6.75, 1,  14.6, 547.8, 1.093,  0.948},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {3.043,  1.062478},
    {5.874,  3.344237},
    {9.337,  5.363757},
    {7.922, 11.762957},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-6.7619806,  1.0},
    { 1.5526974,  1.5},
    {-1.6247205,  2.5},
    {-5.5792069,  6.0},
    { 5.0264987,  7.5},
    {-2.0415597, 12.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-1.3501232,      0.25},
    { 5.3788573, 1.0 / 3.0},
    {-5.8400503,       0.5},
    { 6.1956791, 2.0 / 3.0},
    {-1.9222599, 5.0 / 6.0},
    {0.27898367,       3.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.3192922, 1.0 / 3.0},
    {-1.5581045,       0.5},
    {-2.6053974,       1.0},
    { 1.8793984,       2.0},
    {-3.5472194,       3.0},
    {-1.5368168,       5.0},
});

// a1 and a2 as printed (-4.970583, 4.29352), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = -4.97058316343512,
                               .a2 = 4.293520087439923,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r290{
    .name = "R290",
    .second_name = "propane",
    .composition = "propane C3H8 100 %",
    .safety_class = "A3 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Lemmon et al. 2009, doi:10.1021/je900217v",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.04409562,
    .gas_constant_JkgK = 8.314472 / 0.04409562,
    .reducing_T_K = 369.89,
    .reducing_rho_kgm3 = 5000.0 * 0.04409562,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 369.89 K, 4251.2 kPa and 220.4781 kg/m3.
    .critical_T_K = 369.8900089509634,
    .critical_p_Pa = 4251165.328013044,
    .critical_rho_kgm3 = 220.47812749206838,
    .min_T_K = 85.525,
    .max_T_K = 650.0,
    .max_p_Pa = 1000e6,
    .densest_kgm3 = 1000.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
