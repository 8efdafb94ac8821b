// R-1233zd(E), trans-1-chloro-3,3,3-trifluoroprop-1-ene.
//
// Source: R. Akasaka, E. W. Lemmon, J. Phys. Chem. Ref. Data 51 (2022) 023101,
// doi:10.1063/5.0083026.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {      0.04394257,    1.0, 4, 0},
    {        1.062919,  0.182, 1, 0},
    {-1.2879140374971,  0.865, 1, 0},
    {-0.8088618920845, 1.0924, 2, 0},
    {       0.2372427,   0.49, 3, 0},
    {         -1.9403,  1.958, 1, 2},
    {       -2.831967,   2.05, 3, 2},
    {        0.373421,  0.658, 2, 1},
    {       -1.515798,  2.051, 2, 2},
    {     -0.02755627,  0.862, 7, 1},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {    4.24023, 1.852, 1,  1.532, 0.2912, 1.7171, 0.8834},
    {-0.03152671,  1.92, 2,  0.635, 0.6245,   0.63,  1.386},
    {  -1.366494, 1.936, 3, 1.4056,  0.669, 0.7852, 0.5196},
    {   2.647143, 1.515, 1,  1.451, 0.5798,  2.251,  1.133},
    {  -2.325463, 2.668, 1,  1.395, 0.4643,  1.821, 0.9788},
    { -0.2541521, 1.755, 1,  2.259,  2.449,  2.074,  1.166},
    {  0.1330834, 0.526, 1,   24.3, 1061.4, 1.0797, 0.9244},
    { -0.1569217,  2.98, 1,   23.6,  917.8,  1.084, 0.9372},
});

constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {  13.7, 1.7340381898555348},
    {7.0974,  6.539670965683817},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.4775944, 1.0},
    { 1.5418792, 1.5},
    {-2.0448525, 2.5},
    {-4.4792178, 5.0},
    { 2.9091433, 7.5},
    {-2.1144857, 9.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    {-0.58290872,      0.25},
    {  4.7240402, 1.0 / 3.0},
    { -9.9127465,       0.5},
    {  16.738003, 2.0 / 3.0},
    { -9.4093107, 5.0 / 6.0},
    {  1.3025766,       1.5},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-2.6036234, 1.0 / 3.0},
    { 4.2058727,       0.5},
    {-8.4299536, 2.0 / 3.0},
    { 3.1558914,       1.0},
    {-2.0992064, 4.0 / 3.0},
    {-5.4586431,       4.0},
});

// a1 and a2 as printed (-17.29122993, 10.40494745), carried to the digits that give the IIR state.
constexpr IdealPart ideal_part{.a1 = -17.291229931887596,
                               .a2 = 10.404947446884158,
                               .a_log_tau = 3.0,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r1233zd_e{
    .name = "R1233zd(E)",
    .second_name = "R1233zd",
    .composition = "trans-1-chloro-3,3,3-trifluoroprop-1-ene CF3CH=CHCl (E) 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, as listed after GB/T 7778-2017)",
    .source = "Akasaka and Lemmon 2022, doi:10.1063/5.0083026",
    .reference_state = "IIR",
    .molar_mass_kgmol = 0.1304962,
    .gas_constant_JkgK = 8.314462618 / 0.1304962,
    .reducing_T_K = 438.86,
    .reducing_rho_kgm3 = 3704.0 * 0.1304962,
    // Of the equation itself, where the first two density derivatives of p vanish; the paper prints
    // 438.86 K, 3582.8 kPa and 483.3579 kg/m3.
    .critical_T_K = 438.860000000042,
    .critical_p_Pa = 3582752.889649132,
    .critical_rho_kgm3 = 483.3579248031686,
    .min_T_K = 165.75,
    .max_T_K = 450.0,
    .max_p_Pa = 100e6,
    .densest_kgm3 = 1800.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
