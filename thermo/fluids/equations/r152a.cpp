// R-152a, 1,1-difluoroethane.
//
// Source: S. L. Outcalt, M. O. McLinden, J. Phys. Chem. Ref. Data 25 (1996) 605-636,
// doi:10.1063/1.555979.
//
// The paper prints a modified Benedict-Webb-Rubin equation for the pressure; the rows below are its
// integral to a Helmholtz energy.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {    -3.546579500185174, 3.0,  0, 0},
    {   -0.3646312799563631, 4.0,  0, 0},
    {   0.03332333306112814, 5.0,  0, 0},
    {   -0.6809684338301859, 0.0,  1, 0},
    {    7.3521264810280345, 0.5,  1, 0},
    {   -11.247306378057127, 1.0,  1, 0},
    {     5.499167142976577, 2.0,  1, 0},
    {    -2.401863270213656, 3.0,  1, 0},
    {  -0.07090364464394744, 0.0,  2, 0},
    {   -0.2132008868213696, 1.0,  2, 0},
    {   0.19783973673284622, 2.0,  2, 0},
    {     1.824947698265976, 3.0,  2, 0},
    {  -0.08605464767044602, 0.0,  3, 0},
    {    0.8881373668542004, 1.0,  3, 0},
    {   -0.9661273471407773, 2.0,  3, 0},
    {  -0.09852234785295554, 1.0,  4, 0},
    {  0.018341936863418316, 2.0,  5, 0},
    {  -0.03385502040688226, 3.0,  5, 0},
    {  0.012492110085780536, 2.0,  6, 0},
    { -0.002210567071037713, 2.0,  7, 0},
    {  0.002168791332779416, 3.0,  7, 0},
    {-0.0002335976904702689, 3.0,  8, 0},
    {     3.546579500185174, 3.0,  0, 2},
    {    0.3646312799563631, 4.0,  0, 2},
    {  -0.03332333306112814, 5.0,  0, 2},
    {    2.7613383040168675, 3.0,  2, 2},
    {  -0.06911857102367282, 4.0,  2, 2},
    {  -0.03332333306112814, 5.0,  2, 2},
    {    0.7827613268561544, 3.0,  4, 2},
    {  -0.03455928551183641, 4.0,  4, 2},
    {   0.13781353206688696, 5.0,  4, 2},
    {   0.18617312581521558, 3.0,  6, 2},
    {  -0.03411193928992716, 4.0,  6, 2},
    {   0.04593784402229564, 5.0,  6, 2},
    {  0.021647001270605898, 3.0,  8, 2},
    {  -0.00852798482248179, 4.0,  8, 2},
    {  0.006203940397171849, 5.0,  8, 2},
    { 0.0018521029114874563, 3.0, 10, 2},
    {   0.00101674662708817, 4.0, 10, 2},
    { 0.0012407880794343697, 5.0, 10, 2},
});

constexpr auto ideal = std::to_array<Power>({
  // n, t
    { -2.122650499999833, -1.0},
    {-0.6225413333328242, -2.0},
    {0.13402116666643668, -3.0},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    { -7.5871363,  1.0},
    {  3.0436619,  1.5},
    { -3.3947387,  2.0},
    {  2.4202374,  3.0},
    { -4.8444711,  4.0},
    {0.086118006, 12.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-1.2942396, 1.0 / 3.0},
    { 20.749368,       0.5},
    {-47.770512, 2.0 / 3.0},
    { 41.582213, 5.0 / 6.0},
    {-28.328015, 4.0 / 3.0},
    { 18.102326,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {0.021658241, 1.0 / 3.0},
    { -9.7458123,       0.5},
    {  11.983047, 2.0 / 3.0},
    { -11.939945,       1.0},
    {  4.2903922, 4.0 / 3.0},
    { -5.0161517,       4.0},
});

// a1 and a2 follow from the IIR state alone.
constexpr IdealPart ideal_part{
    .a1 = -7.950506771630748, .a2 = 6.8700786565429555, .a_log_tau = 2.354951, .powers = ideal};

}  // namespace

constinit const Fluid r152a{
    .name = "R152a",
    .composition = "1,1-difluoroethane CH3CHF2 100 %",
    .safety_class = "A2 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Outcalt and McLinden 1996, doi:10.1063/1.555979",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.066051,
    .gas_constant_JkgK = 8.314471 / 0.066051,
    .reducing_T_K = 386.411,
    .reducing_rho_kgm3 = 5571.45 * 0.066051,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 386.411 K, 4520 kPa and 368 kg/m3.
    .critical_T_K = 386.4109977772107,
    .critical_p_Pa = 4516749.941044934,
    .critical_rho_kgm3 = 367.999843595564,
    .min_T_K = 154.56,
    .max_T_K = 500.0,
    .max_p_Pa = 58e6,
    .densest_kgm3 = 1400.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
