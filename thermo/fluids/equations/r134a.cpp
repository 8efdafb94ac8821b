// R-134a, 1,1,1,2-tetrafluoroethane.
//
// Source: R. Tillner-Roth, H. D. Baehr, J. Phys. Chem. Ref. Data 23 (1994) 657-729,
// doi:10.1063/1.555958.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {   0.05586817, -0.5,  2, 0},
    {     0.498223,  0.0,  1, 0},
    {   0.02458698,  0.0,  3, 0},
    { 0.0008570145,  0.0,  6, 0},
    { 0.0004788584,  1.5,  6, 0},
    {    -1.800808,  1.5,  1, 0},
    {    0.2671641,  2.0,  1, 0},
    {  -0.04781652,  2.0,  2, 0},
    {   0.01423987,  1.0,  5, 1},
    {    0.3324062,  3.0,  2, 1},
    { -0.007485907,  5.0,  2, 1},
    { 0.0001017263,  1.0,  4, 2},
    {   -0.5184567,  5.0,  1, 2},
    {  -0.08692288,  5.0,  4, 2},
    {    0.2057144,  6.0,  1, 2},
    { -0.005000457, 10.0,  2, 2},
    { 0.0004603262, 10.0,  4, 2},
    { -0.003497836, 10.0,  1, 3},
    {  0.006995038, 18.0,  5, 3},
    {  -0.01452184, 22.0,  3, 3},
    {-0.0001285458, 50.0, 10, 4},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-9.723916,  -0.5},
    { -3.92717, -0.75},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.7277617, 1.0},
    { 2.5683012, 1.5},
    {-2.4525489, 2.0},
    {-1.8940650, 4.0},
    {-2.5958123, 5.0},
    {0.99095697, 7.5},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {0.84662604, 1.0 / 3.0},
    { 7.1903601,       0.5},
    {-17.919166, 2.0 / 3.0},
    { 17.649998, 5.0 / 6.0},
    {-15.373193, 4.0 / 3.0},
    { 10.594094,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.9478594, 1.0 / 3.0},
    {-1.7051844, 2.0 / 3.0},
    {-2.3641867,       1.0},
    { 1.1697412,       2.0},
    {-3.8583290,       3.0},
    {-3.0790774,       5.0},
});

// a1 and a2 as printed (-1.019535, 9.047135), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{
    .a1 = -1.0195345465006602, .a2 = 9.04713537629684, .a_log_tau = -1.629789, .powers = ideal};

}  // namespace

constinit const Fluid r134a{
    .name = "R134a",
    .composition = "1,1,1,2-tetrafluoroethane CF3CH2F 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Tillner-Roth and Baehr 1994, doi:10.1063/1.555958",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.102032,
    .gas_constant_JkgK = 8.314471 / 0.102032,
    .reducing_T_K = 374.18,
    .reducing_rho_kgm3 = 508.0,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 374.21 K, 4059.28 kPa and 511.9 kg/m3.
    .critical_T_K = 374.2119665849513,
    .critical_p_Pa = 4059276.3737910655,
    .critical_rho_kgm3 = 511.9451132818318,
    .min_T_K = 169.85,
    .max_T_K = 455.0,
    .max_p_Pa = 70e6,
    .densest_kgm3 = 1900.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
