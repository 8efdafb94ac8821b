// R-123, 2,2-dichloro-1,1,1-trifluoroethane.
//
// Source: B. A. Younglove, M. O. McLinden, J. Phys. Chem. Ref. Data 23 (1994) 731-779,
// doi:10.1063/1.555950.
//
// The paper prints a modified Benedict-Webb-Rubin equation for the pressure; the rows below are its
// integral to a Helmholtz energy.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {   -0.2843794314511017, 0.0,  1, 0},
    {     5.939281103209252, 0.5,  1, 0},
    {      -9.3656038952803, 1.0,  1, 0},
    {     4.166607936753421, 2.0,  1, 0},
    {   -1.7402329295113845, 3.0,  1, 0},
    {   0.17701990536487813, 0.0,  2, 0},
    {   -1.5472169226048678, 1.0,  2, 0},
    {     1.618204955902326, 2.0,  2, 0},
    {     2.889035293831577, 3.0,  2, 0},
    {  -0.11849387475720602, 0.0,  3, 0},
    {    1.3095226620887583, 1.0,  3, 0},
    {   -1.1730810371070863, 2.0,  3, 0},
    {   -0.1281251319502905, 1.0,  4, 0},
    {  -0.07860873875128996, 2.0,  5, 0},
    {  -0.08160004993052974, 3.0,  5, 0},
    {  0.053645105431063045, 2.0,  6, 0},
    { -0.006800782119285551, 2.0,  7, 0},
    {  0.007012640821910758, 3.0,  7, 0},
    {-0.0009017623973110119, 3.0,  8, 0},
    {   -10.024264609507279, 3.0,  0, 0},
    {  -0.28060765935596244, 4.0,  0, 0},
    {  0.020681452051475355, 5.0,  0, 0},
    {    10.024264609507279, 3.0,  0, 2},
    {   0.28060765935596244, 4.0,  0, 2},
    { -0.020681452051475355, 5.0,  0, 2},
    {     7.989238691092167, 3.0,  2, 2},
    {   -0.5479720681527366, 4.0,  2, 2},
    { -0.020681452051475355, 5.0,  2, 2},
    {    2.4914272182002284, 3.0,  4, 2},
    {   -0.2739860340763683, 4.0,  4, 2},
    {   0.23600186106591514, 5.0,  4, 2},
    {    0.5405282468302359, 3.0,  6, 2},
    {  -0.06004575637764492, 4.0,  6, 2},
    {   0.07866728702197172, 5.0,  6, 2},
    {    0.0708085870232336, 3.0,  8, 2},
    {  -0.01501143909441123, 4.0,  8, 2},
    {  0.001822051976772171, 5.0,  8, 2},
    { 0.0031497857360693253, 3.0, 10, 2},
    {  0.007844555699191144, 4.0, 10, 2},
    { 0.0003644103953544342, 5.0, 10, 2},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-11.11626316768202, -1.0},
    {1.9431754113618924, -2.0},
    {-0.224321620547823, -3.0},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.5307519, 1.0},
    { 2.6807309, 1.5},
    {-2.5862985, 2.0},
    {-6.5087672, 5.0},
    { 10.648885, 7.5},
    { -9.829143, 9.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    { -1.9138061,      0.25},
    {  6.6877655, 1.0 / 3.0},
    { -6.0421523,       0.5},
    {  4.1318705, 2.0 / 3.0},
    {-0.26462756, 4.0 / 3.0},
    { 0.32297281,       3.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-0.48827918, 1.0 / 3.0},
    { -6.7248571,       0.5},
    {  7.3123748, 2.0 / 3.0},
    {  -7.742515,       1.0},
    {  2.0424993, 4.0 / 3.0},
    { -5.4561382,       4.0},
});

// a1 and a2 follow from the IIR state alone.
constexpr IdealPart ideal_part{.a1 = -13.232465921590089,
                               .a2 = 10.948063304347913,
                               .a_log_tau = 1.0460090000000002,
                               .powers = ideal};

}  // namespace

constinit const Fluid r123{
    .name = "R123",
    .composition = "2,2-dichloro-1,1,1-trifluoroethane CHCl2CF3 100 %",
    .safety_class = "B1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Younglove and McLinden 1994, doi:10.1063/1.555950",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.152931,
    .gas_constant_JkgK = 8.31451 / 0.152931,
    .reducing_T_K = 456.831,
    .reducing_rho_kgm3 = 3596.417 * 0.152931,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 456.831 K, 3672 kPa and 550.0036 kg/m3.
    .critical_T_K = 456.8300258131298,
    .critical_p_Pa = 3661805.2694358146,
    .critical_rho_kgm3 = 550.0128948608069,
    .min_T_K = 166.0,
    .max_T_K = 600.0,
    .max_p_Pa = 76e6,
    .densest_kgm3 = 2050.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
