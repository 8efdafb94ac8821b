// R-22, chlorodifluoromethane.
//
// Source: A. Kamei, S. W. Beyerlein, R. T. Jacobsen, Int. J. Thermophys. 16 (1995) 1155-1164,
// doi:10.1007/BF02081283.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {   0.0695645445236, -1.0, 1, 0},
    {     25.2275419999, 1.75, 1, 0},
    {    -202.351148311, 2.25, 1, 0},
    {     350.063090302,  2.5, 1, 0},
    {    -223.134648863, 2.75, 1, 0},
    {     48.8345904592,  3.0, 1, 0},
    {   0.0108874958556,  5.5, 1, 0},
    {    0.590315073614,  1.5, 2, 0},
    {   -0.689043767432, 1.75, 2, 0},
    {    0.284224445844,  3.5, 2, 0},
    {    0.125436457897,  1.0, 3, 0},
    {  -0.0113338666416,  4.5, 3, 0},
    {   -0.063138895917,  1.5, 4, 0},
    {  0.00974021015232,  0.5, 5, 0},
    {-0.000408406844722,  4.5, 6, 0},
    {  0.00074194877357,  1.0, 7, 0},
    { 0.000315912525922,  4.0, 7, 0},
    { 8.76009723338e-06,  5.0, 7, 0},
    {-0.000110343340301, -0.5, 8, 0},
    {-7.05323356879e-05,  3.5, 8, 0},
    {     0.23585073151,  5.0, 2, 2},
    {   -0.192640494729,  7.0, 2, 2},
    {  0.00375218008557, 12.0, 2, 2},
    {-4.48926036678e-05, 15.0, 2, 2},
    {   0.0198120520635,  3.5, 3, 3},
    {  -0.0356958425255,  3.5, 4, 2},
    {   0.0319594161562,  8.0, 4, 2},
    { 2.60284291078e-06, 15.0, 4, 2},
    { -0.00897629021967, 25.0, 4, 4},
    {   0.0345482791645,  3.0, 6, 2},
    { -0.00411831711251,  9.0, 6, 2},
    {  0.00567428536529, 19.0, 6, 4},
    { -0.00563368989908,  2.0, 8, 2},
    {  0.00191384919423,  7.0, 8, 2},
    { -0.00178930036389, 13.0, 8, 4},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    {-0.0222800387550675, -1.0},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {1.0, 11.78545471777306},
    {1.0, 5.240144329059424},
    {1.0, 5.111575732138263},
    {1.0, 4.589509308276581},
    {1.0,  4.34795618678834},
    {1.0, 3.147982615524174},
    {1.0, 2.322026780757931},
    {1.0, 1.640223615266927},
    {1.0, 1.437630674663887},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    { -7.066232,  1.0},
    { 1.5561095,  1.5},
    {-2.0266148,  2.5},
    {-5.2766139,  6.0},
    { 7.0664861,  9.0},
    {-5.9727949, 12.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-0.79859797,      0.25},
    {  3.7859094, 1.0 / 3.0},
    { -2.8762775,       0.5},
    {  3.0854073, 2.0 / 3.0},
    {-0.60273768, 5.0 / 6.0},
    { 0.29722611,       3.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-1.1841253, 1.0 / 3.0},
    {-3.3716138,       0.5},
    { 3.2729807, 2.0 / 3.0},
    {-5.9026779,       1.0},
    { 1.9780794, 4.0 / 3.0},
    { -4.679792,       4.0},
});

// a1 and a2 follow from the IIR state alone.
constexpr IdealPart ideal_part{.a1 = -11.853420922629606,
                               .a2 = 8.086894982107275,
                               .a_log_tau = 3.0052614044599997,
                               .powers = ideal,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r22{
    .name = "R22",
    .composition = "chlorodifluoromethane CHClF2 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Kamei et al. 1995, doi:10.1007/BF02081283",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.086468,
    .gas_constant_JkgK = 8.31451 / 0.086468,
    .reducing_T_K = 369.295,
    .reducing_rho_kgm3 = 6058.22 * 0.086468,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 369.295 K, 4990 kPa and 523.8422 kg/m3.
    .critical_T_K = 369.2950000080274,
    .critical_p_Pa = 4990000.000456495,
    .critical_rho_kgm3 = 523.842167023752,
    .min_T_K = 115.73,
    .max_T_K = 550.0,
    .max_p_Pa = 60e6,
    .densest_kgm3 = 1950.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
