#include "thermo/streams/stream.h"

#include "thermo/fluids/density.h"
#include "thermo/fluids/fluids.h"
#include "thermo/fluids/state.h"

#include <cmath>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

constexpr double ice_point_T_K = 273.15;

StreamState water(double celsius) {
  return stream_state(WaterStream{}, ice_point_T_K + celsius).value();
}
State full_equation(double celsius) {
  return state(r718, GivenTp{ice_point_T_K + celsius, 300e3}).value();
}

class WaterAt : public testing::TestWithParam<double> {};

TEST_P(WaterAt, IsTheEquationOfStateAtThreeBar) {
  const State exact = full_equation(GetParam());
  const StreamState fit = water(GetParam());
  // The fit's error as stated in stream.cpp: 1e-9 of 4200 J/(kg K) times 100 K, and of its like.
  EXPECT_NEAR(fit.h_Jkg, exact.h_Jkg, 4e-4);
  EXPECT_NEAR(fit.s_JkgK, exact.s_JkgK, 1e-6);
  EXPECT_NEAR(fit.rho_kgm3, exact.rho_kgm3, 1e-6);
  EXPECT_NEAR(fit.cp_JkgK, exact.single->cp_JkgK, 1e-4);
  EXPECT_NEAR(fit.expansion_beta, exact.single->expansion_T / exact.T_K, 1e-9);
}

TEST_P(WaterAt, HasOneHeatCapacityForEnthalpyAndEntropy) {
  const double step_K = 0.05;
  const double slope =
      (water(GetParam() + step_K).s_JkgK - water(GetParam() - step_K).s_JkgK) / (2.0 * step_K);
  const double T_K = ice_point_T_K + GetParam();
  // The central difference's own error, (step / T)^2 / 3 of the slope: 1e-8.
  EXPECT_NEAR(slope * T_K, water(GetParam()).cp_JkgK, 1e-7 * 4200.0);
}

INSTANTIATE_TEST_SUITE_P(
    Loop, WaterAt, testing::Values(0.5, 1.0, 4.0, 7.0, 12.0, 14.0, 30.0, 55.5, 80.0, 111.0, 133.0),
    [](const auto& tested) {
      return "at_" + std::to_string(std::lround(10.0 * tested.param)) + "_tenths_degC";
    });

TEST(WaterStream, HasThePrintedStateOfTheIndependentTable) {
  // tests/reference/r718_states.csv, liquid at 287.15 K and 300 kPa.
  const StreamState found = stream_state(WaterStream{}, 287.15).value();
  EXPECT_NEAR(found.rho_kgm3, 999.34052704, 1e-6);
  EXPECT_NEAR(found.h_Jkg, 59078.687424, 4e-4);
  EXPECT_NEAR(found.s_JkgK, 209.85775582, 1e-6);
  EXPECT_NEAR(found.cp_JkgK, 4188.90133, 1e-4);
}

TEST(WaterStream, ServesALoopThatItsPressureKeepsLiquid) {
  // Above 133.5 degC the isobar is continued: differences of h agree with those at 600 kPa, where
  // water is still liquid, to 3e-4 (stream.h; both from the full equation, v (1 - expansion) dp).
  const double here = water(145.0).h_Jkg - water(125.0).h_Jkg;
  const double there =
      state(r718, GivenTp{418.15, 600e3})->h_Jkg - state(r718, GivenTp{398.15, 600e3})->h_Jkg;
  EXPECT_NEAR(here, there, 3e-4 * there);
}

TEST(WaterStream, RefusesIceAndSteam) {
  EXPECT_EQ(stream_state(WaterStream{}, 273.15).error().code, ReasonCode::outside_fluid);
  EXPECT_EQ(stream_state(WaterStream{}, 423.16).error().code, ReasonCode::outside_fluid);
}

TEST(WaterStream, ServesItsLimits) {
  EXPECT_TRUE(stream_state(WaterStream{}, 273.16));
  EXPECT_TRUE(stream_state(WaterStream{}, 423.15));
}

TEST(AnyStream, RefusesWhatIsNotATemperature) {
  EXPECT_EQ(stream_state(WaterStream{}, std::nan("")).error().code, ReasonCode::implausible);
  EXPECT_EQ(stream_state(ConstantStream{}, std::nan("")).error().code, ReasonCode::implausible);
  EXPECT_EQ(stream_state(ConstantStream{}, 0.0).error().code, ReasonCode::implausible);
}

TEST(ConstantStream, HasTheHeatCapacityOfItsVolume) {
  const StreamState found =
      stream_state(ConstantStream{.rho_cp_SI = 4.2e6, .rho_kgm3 = 1050.0}, 283.15).value();
  EXPECT_DOUBLE_EQ(found.cp_JkgK, 4000.0);
  EXPECT_DOUBLE_EQ(found.h_Jkg, 40000.0);
  EXPECT_DOUBLE_EQ(found.s_JkgK, 4000.0 * std::log(283.15 / 273.15));
  EXPECT_DOUBLE_EQ(found.rho_kgm3, 1050.0);
  EXPECT_DOUBLE_EQ(found.expansion_beta, 0.0);
}

TEST(ConstantStream, RefusesAHeatCapacityThatIsNoneOfALiquid) {
  EXPECT_EQ(stream_state(ConstantStream{.rho_cp_SI = 0.0}, 283.15).error().code,
            ReasonCode::implausible);
}

}  // namespace
}  // namespace lostwork
