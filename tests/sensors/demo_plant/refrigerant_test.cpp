// The plant's tables against the equation of state that they were made from, between their nodes.
#include "sensors/demo_plant/refrigerant.h"

#include "sensors/demo_plant/noise.h"
#include "sensors/demo_plant/water.h"

#include <cmath>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

constexpr int trials = 300;
constexpr NoiseStream noise{.seed = 1, .stream = 1};

const Fluid& r134a() {
  return *fluid_named("R134a");
}

// Evenly spread over [low, high).
double drawn(int trial, int which, double low, double high) {
  return low + (high - low) * 0.5 * (1.0 + even(noise, 10 * trial + which));
}

// Of a machine at work: the edges of the tables belong to the solver alone.
double saturation_T_K(int trial) {
  return drawn(trial, 0, 255.0, 350.0);
}

// The tolerances below are what refrigerant.h promises.

TEST(PlantRefrigerant, SaturationFollowsTheEquationOfState) {
  for (int i = 0; i < trials; ++i) {
    const double T_K = saturation_T_K(i);
    const SaturationRow row = plant_r134a().saturation(T_K);
    const auto exact = saturation_at_T(r134a(), T_K);
    ASSERT_TRUE(exact);
    ASSERT_NEAR(row.p_Pa, exact->vapour.p_Pa, 2e-6 * exact->vapour.p_Pa) << T_K;
    ASSERT_NEAR(row.liquid_h_Jkg, exact->liquid.h_Jkg, 2.0) << T_K;
    ASSERT_NEAR(row.vapour_h_Jkg, exact->vapour.h_Jkg, 2.0) << T_K;
    ASSERT_NEAR(row.liquid_s_JkgK, exact->liquid.s_JkgK, 0.01) << T_K;
    ASSERT_NEAR(row.vapour_s_JkgK, exact->vapour.s_JkgK, 0.01) << T_K;
  }
}

TEST(PlantRefrigerant, VapourFollowsTheEquationOfState) {
  for (int i = 0; i < trials; ++i) {
    const double T_K = saturation_T_K(i);
    const double excess_h_Jkg = drawn(i, 1, 0.0, 60e3);
    const auto line = saturation_at_T(r134a(), T_K);
    ASSERT_TRUE(line);
    const auto exact = state(
        r134a(), GivenPh{.p_Pa = line->vapour.p_Pa, .h_Jkg = line->vapour.h_Jkg + excess_h_Jkg});
    ASSERT_TRUE(exact);
    const VapourRow row = plant_r134a().vapour(T_K, excess_h_Jkg);
    ASSERT_NEAR(T_K + row.superheat_K, exact->T_K, 2e-3) << T_K << " " << excess_h_Jkg;
    ASSERT_NEAR(row.excess_s_JkgK, exact->s_JkgK - line->vapour.s_JkgK, 0.01);
    ASSERT_NEAR(row.rho_kgm3, exact->rho_kgm3, 2e-5 * exact->rho_kgm3);
  }
}

TEST(PlantRefrigerant, IsentropicEndFollowsTheEquationOfState) {
  for (int i = 0; i < trials; ++i) {
    const double T_K = saturation_T_K(i);
    const double excess_s_JkgK = drawn(i, 2, 1.0, 150.0);
    const auto line = saturation_at_T(r134a(), T_K);
    ASSERT_TRUE(line);
    const auto exact = state(
        r134a(), GivenPs{.p_Pa = line->vapour.p_Pa, .s_JkgK = line->vapour.s_JkgK + excess_s_JkgK});
    ASSERT_TRUE(exact);
    ASSERT_NEAR(plant_r134a().excess_h_of_entropy(T_K, excess_s_JkgK),
                exact->h_Jkg - line->vapour.h_Jkg, 2.0)
        << T_K << " " << excess_s_JkgK;
  }
}

TEST(PlantRefrigerant, SubcooledLiquidFollowsTheEquationOfState) {
  for (int i = 0; i < trials; ++i) {
    const double T_K = saturation_T_K(i);
    const double subcooling_K = drawn(i, 3, 0.1, 20.0);
    const auto line = saturation_at_T(r134a(), T_K);
    ASSERT_TRUE(line);
    const auto exact =
        state(r134a(), GivenTp{.T_K = T_K - subcooling_K, .p_Pa = line->liquid.p_Pa});
    ASSERT_TRUE(exact);
    const LiquidRow row = plant_r134a().liquid(T_K, subcooling_K);
    ASSERT_NEAR(row.missing_h_Jkg, line->liquid.h_Jkg - exact->h_Jkg, 2.0);
    ASSERT_NEAR(row.missing_s_JkgK, line->liquid.s_JkgK - exact->s_JkgK, 0.01);
  }
}

TEST(PlantWater, FollowsTheEquationOfState) {
  const Fluid& water = *fluid_named("R718");
  for (int i = 0; i < trials; ++i) {
    const double T_K = drawn(i, 4, 275.0, 370.0);
    const auto exact = state(water, GivenTp{.T_K = T_K, .p_Pa = 300e3});
    ASSERT_TRUE(exact && exact->single);
    ASSERT_NEAR(plant_water().rho_kgm3(T_K), exact->rho_kgm3, 3e-6 * exact->rho_kgm3);
    ASSERT_NEAR(plant_water().cp_JkgK(T_K), exact->single->cp_JkgK, 1e-5 * exact->single->cp_JkgK);
  }
}

}  // namespace
}  // namespace lostwork
