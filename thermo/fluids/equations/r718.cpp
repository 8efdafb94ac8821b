// Water.
//
// Source: IAPWS R6-95(2018), the IAPWS Formulation 1995; W. Wagner, A. Pruss, J. Phys. Chem. Ref.
// Data 31 (2002) 387-535, doi:10.1063/1.1461829. Valid from the melting curve to 1273 K and 1000
// MPa; the melting curve itself (above 600 MPa at room temperature) is not checked.
#include "thermo/fluids/fluids.h"

#include <array>

namespace lostwork {
namespace {

// Columns and order as printed in the table of the residual part.
constexpr auto residual = std::to_array<HelmholtzTerm>({
  // n, t, d, l
    {   0.012533547935523,  -0.5,  1, 0},
    {     7.8957634722828, 0.875,  1, 0},
    {    -8.7803203303561,   1.0,  1, 0},
    {    0.31802509345418,   0.5,  2, 0},
    {   -0.26145533859358,  0.75,  2, 0},
    { -0.0078199751687981, 0.375,  3, 0},
    {  0.0088089493102134,   1.0,  4, 0},
    {   -0.66856572307965,   4.0,  1, 1},
    {    0.20433810950965,   6.0,  1, 1},
    {-6.6212605039687e-05,  12.0,  1, 1},
    {   -0.19232721156002,   1.0,  2, 1},
    {   -0.25709043003438,   5.0,  2, 1},
    {    0.16074868486251,   4.0,  3, 1},
    {  -0.040092828925807,   2.0,  4, 1},
    { 3.9343422603254e-07,  13.0,  4, 1},
    {-7.5941377088144e-06,   9.0,  5, 1},
    { 0.00056250979351888,   3.0,  7, 1},
    {-1.5608652257135e-05,   4.0,  9, 1},
    { 1.1537996422951e-09,  11.0, 10, 1},
    { 3.6582165144204e-07,   4.0, 11, 1},
    {-1.3251180074668e-12,  13.0, 13, 1},
    {-6.2639586912454e-10,   1.0, 15, 1},
    {   -0.10793600908932,   7.0,  1, 2},
    {   0.017611491008752,   1.0,  2, 2},
    {    0.22132295167546,   9.0,  2, 2},
    {   -0.40247669763528,  10.0,  2, 2},
    {    0.58083399985759,  10.0,  3, 2},
    {  0.0049969146990806,   3.0,  4, 2},
    {  -0.031358700712549,   7.0,  4, 2},
    {   -0.74315929710341,  10.0,  4, 2},
    {     0.4780732991548,  10.0,  5, 2},
    {   0.020527940895948,   6.0,  6, 2},
    {   -0.13636435110343,  10.0,  6, 2},
    {   0.014180634400617,  10.0,  7, 2},
    {  0.0083326504880713,   1.0,  9, 2},
    {  -0.029052336009585,   2.0,  9, 2},
    {   0.038615085574206,   3.0,  9, 2},
    {  -0.020393486513704,   4.0,  9, 2},
    { -0.0016554050063734,   8.0,  9, 2},
    {  0.0019955571979541,   6.0, 10, 2},
    { 0.00015870308324157,   9.0, 10, 2},
    { -1.638856834253e-05,   8.0, 12, 2},
    {   0.043613615723811,  16.0,  3, 3},
    {   0.034994005463765,  22.0,  4, 3},
    {  -0.076788197844621,  23.0,  4, 3},
    {   0.022446277332006,  23.0,  5, 3},
    {-6.2689710414685e-05,  10.0, 14, 4},
    {-5.5711118565645e-10,  50.0,  3, 6},
    {   -0.19905718354408,  44.0,  6, 6},
    {    0.31777497330738,  46.0,  6, 6},
    {   -0.11841182425981,  50.0,  6, 6},
});

constexpr auto gaussian = std::to_array<GaussianTerm>({
  // n, t, d, eta, beta, gamma, epsilon
    {-31.306260323435, 0.0, 3, 20.0, 150.0, 1.21, 1.0},
    { 31.546140237781, 1.0, 3, 20.0, 150.0, 1.21, 1.0},
    {-2521.3154341695, 4.0, 3, 20.0, 250.0, 1.25, 1.0},
});
constexpr auto non_analytic = std::to_array<NonAnalyticTerm>({
  // n, a, b, beta, A, B, C, D
    {-0.14874640856724, 3.5, 0.85, 0.3, 0.32, 0.2, 28.0, 700.0},
    { 0.31806110878444, 3.5, 0.95, 0.3, 0.32, 0.2, 32.0, 800.0},
});
constexpr auto planck_einstein = std::to_array<PlanckEinstein>({
  // n, theta
    {0.012436, 1.28728967},
    { 0.97315, 3.53734222},
    {  1.2795, 7.74073708},
    { 0.96956, 9.24437796},
    { 0.24873, 27.5075105},
});

// First guesses only, fitted to this equation for this program.
constexpr auto saturation_pressure = std::to_array<Power>({
    {-7.8635200, 1.0},
    { 1.8686386, 1.5},
    {-13.154070, 3.0},
    { 27.187070, 3.5},
    {-20.180865, 4.0},
    { 2.5321606, 6.0},
});
constexpr auto liquid_rho = std::to_array<Power>({
    { 2.5253104, 1.0 / 3.0},
    {-2.9677994,       0.5},
    { 6.6346557, 2.0 / 3.0},
    {-3.4891739, 5.0 / 6.0},
    {-1.4553069,       5.0},
    {-1.8482503,       7.0},
});
constexpr auto vapour_rho = std::to_array<Power>({
    {-14.919979,       0.5},
    { 36.140978, 2.0 / 3.0},
    {-37.190346, 5.0 / 6.0},
    { 32.628651, 4.0 / 3.0},
    {-23.176425,       1.5},
    {-3.5393984,       4.0},
});

constexpr IdealPart ideal_part{.a1 = -8.3204464837497,
                               .a2 = 6.6832105275932,
                               .a_log_tau = 3.00632,
                               .planck_einstein = planck_einstein};

}  // namespace

constinit const Fluid r718{
    .name = "R718",
    .second_name = "water",
    .composition = "water H2O 100 %",
    .safety_class = "A1 (ASHRAE 34 / ISO 817, from memory)",
    .source = "IAPWS-95: Wagner and Pruss 2002, doi:10.1063/1.1461829",
    .reference_state = "IAPWS-95: u = s = 0, saturated liquid at the triple point",
    .molar_mass_kgmol = 0.018015268,
    .gas_constant_JkgK = 461.51805,
    .reducing_T_K = 647.096,
    .reducing_rho_kgm3 = 322.0,
    .critical_T_K = 647.096,
    .critical_p_Pa = 22064000.0,
    .critical_rho_kgm3 = 322.0,
    .min_T_K = 273.16,
    .max_T_K = 1273.0,
    .max_p_Pa = 1000e6,
    .densest_kgm3 = 1500.0,
    .ideal = ideal_part,
    .residual = PowerTerms{residual},
    .gaussian = gaussian,
    .non_analytic = non_analytic,
    .saturation_pressure = saturation_pressure,
    .saturated_liquid_rho = liquid_rho,
    .saturated_vapour_rho = vapour_rho,
};

}  // namespace lostwork
