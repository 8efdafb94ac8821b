// R-245fa, 1,1,1,3,3-pentafluoropropane.
//
// Source: R. Akasaka, Y. Zhou, E. W. Lemmon, J. Phys. Chem. Ref. Data 44 (2015) 013104,
// doi:10.1063/1.4913493.
//
// The speeds of sound printed in the paper as check values lie 3e-5 above what this equation gives.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    { 0.057506623,  1.0, 4, 0},
    {   1.5615975, 0.27, 1, 0},
    {  -2.3614485,  0.9, 1, 0},
    { -0.51773521, 1.09, 2, 0},
    {  0.18509788,  0.4, 3, 0},
    { -0.87405626,  2.9, 1, 2},
    { -0.27530955,  1.7, 3, 2},
    {  0.57971151,  0.8, 2, 1},
    { -0.39934306,  3.6, 2, 2},
    {-0.033230277, 1.05, 7, 1},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {   0.83210508, 1.8, 1, 1.011, 1.879, 1.081, 0.709},
    {    -0.335443, 4.0, 1, 1.447, 2.454, 0.651, 0.939},
    {  -0.10117801, 4.5, 3, 1.079, 1.256, 0.468, 0.703},
    {-0.0091495867, 2.0, 3,  7.86,  21.1, 1.293, 0.777},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {5.5728, 0.5197115834815994},
    {10.385,  2.364453600524394},
    {12.554,  5.735555763648281},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.8106844, 1.0},
    { 1.7861854, 1.5},
    { -0.772562, 2.0},
    { -7.518575, 3.0},
    { 12.420686, 3.5},
    {-10.255614, 4.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {   1.2359729,      0.25},
    {-0.098307676, 1.0 / 3.0},
    {   11.816092,       1.0},
    {  -39.285067, 4.0 / 3.0},
    {   32.857709,       1.5},
    {  -3.6643794,       2.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-4.7077565, 1.0 / 3.0},
    { 14.504183,       0.5},
    {-23.682433, 2.0 / 3.0},
    { 15.789176,       1.0},
    {-8.6284519, 4.0 / 3.0},
    {-5.3827344,       4.0},
});

// a1 and a2 as printed (-13.42836385, 9.87236538), moved to the IIR state.
constexpr IdealPart ideal_part{.a1 = -13.382410670873416,
                               .a2 = 9.844362621509456,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r245fa{
    .name = "R245fa",
    .composition = "1,1,1,3,3-pentafluoropropane CF3CH2CHF2 100 %",
    .safety_class = "B1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Akasaka et al. 2015, doi:10.1063/1.4913493",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.13404794,
    .gas_constant_JkgK = 8.3144621 / 0.13404794,
    .reducing_T_K = 427.01,
    .reducing_rho_kgm3 = 3875.0 * 0.13404794,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 427.01 K, 3651 kPa and 519.4358 kg/m3.
    .critical_T_K = 427.00998969559254,
    .critical_p_Pa = 3650995.024128117,
    .critical_rho_kgm3 = 519.2846757691916,
    .min_T_K = 171.05,
    .max_T_K = 440.0,
    .max_p_Pa = 200e6,
    .densest_kgm3 = 2000.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
