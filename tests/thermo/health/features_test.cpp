#include "thermo/health/features.h"

#include "tests/thermo/health/synthetic_machine.h"
#include "thermo/fluids/state.h"

#include <cmath>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

// The plant of methods.md 1.8: R134a, 278.15 / 310.0581 K, 3 K superheat, 4 K subcooling.
Inputs model_plant() {
  Inputs in;
  in[Input::power] = 59408.47;
  in[Input::cold_in] = 285.15;
  in[Input::cold_out] = 280.15;
  in[Input::cold_flow] = 316000.0 / (4190.0 * 5.0);
  in[Input::hot_in] = 303.15;
  in[Input::hot_out] = 308.08434;
  in[Input::hot_flow] = 374220.3 / (4190.0 * 4.93434);
  in[Input::suction_pressure] = 349659.0;
  in[Input::suction_temperature] = 281.15;
  in[Input::discharge_pressure] = 934882.0;
  in[Input::discharge_temperature] = 324.279;
  in[Input::liquid_temperature] = 306.0581;
  in.cold_cp_JkgK = 4190.0;
  in.hot_cp_JkgK = 4190.0;
  return in;
}

double feature(const FeatureValues& features, Feature f) {
  return features.at(static_cast<std::size_t>(f)).value();
}

TEST(Features, HaveTheApproachesOfTheModelPlant) {
  const auto f = features_of(testing::synthetic_model(), model_plant());
  // 1 mK: the printed pressures.
  EXPECT_NEAR(feature(f, Feature::cold_approach), 2.0, 0.001);
  EXPECT_NEAR(feature(f, Feature::hot_approach), 310.0581 - 308.08434, 0.001);
  EXPECT_NEAR(feature(f, Feature::superheat), 3.0, 0.001);
  EXPECT_NEAR(feature(f, Feature::subcooling), 4.0, 0.001);
  EXPECT_NEAR(feature(f, Feature::subcooling_share), 4.0 / (310.0581 - 303.15), 0.0005);
}

// Casing heat 1188.17 W of 59408.47 W; six printed digits of the enthalpies leave 1e-5 of 29 kJ/kg.
TEST(Features, GiveTheCompressorBalanceOfTheModelPlant) {
  const auto f = features_of(testing::synthetic_model(), model_plant());
  EXPECT_NEAR(feature(f, Feature::compressor_balance), 1188.17 / 59408.47, 2e-4);
}

TEST(Features, GiveTheEnergyBalanceOfTheModelPlant) {
  const auto f = features_of(testing::synthetic_model(), model_plant());
  EXPECT_NEAR(feature(f, Feature::energy_balance), 1188.17 / (59408.47 + 316000.0), 1e-5);
}

TEST(Features, LeaveOutWhatIsNotMeasured) {
  Inputs in = model_plant();
  in[Input::hot_flow].reset();
  in[Input::liquid_temperature].reset();
  const auto f = features_of(testing::synthetic_model(), in);
  EXPECT_FALSE(f.at(static_cast<std::size_t>(Feature::energy_balance)));
  EXPECT_FALSE(f.at(static_cast<std::size_t>(Feature::efficiency)));
  EXPECT_NEAR(feature(f, Feature::hot_range), 4.93434, 1e-9);
}

// Reversible power Q L against the same two temperatures by Carnot's formula.
TEST(Conditions, OfCoolingGiveTheCarnotPower) {
  const auto c = conditions_of(Duty::cooling, model_plant());
  ASSERT_TRUE(c.has_value());
  EXPECT_NEAR(c->heat_W * c->lift, 316000.0 * (303.15 / 280.15 - 1.0), 1e-6);
  EXPECT_EQ(c->reference_T_K, 303.15);
}

TEST(Conditions, OfHeatingGiveTheCarnotPower) {
  const auto c = conditions_of(Duty::heating, model_plant());
  ASSERT_TRUE(c.has_value());
  EXPECT_NEAR(c->heat_W * c->lift, 374220.3 * (1.0 - 285.15 / 308.08434), 1e-6);
  EXPECT_EQ(c->reference_T_K, 285.15);
}

TEST(Conditions, RefuseALiftThatIsNone) {
  Inputs in = model_plant();
  in[Input::hot_in] = 279.0;
  const auto c = conditions_of(Duty::cooling, in);
  ASSERT_FALSE(c.has_value());
  EXPECT_EQ(c.error().code, ReasonCode::lift_too_small);
}

TEST(Conditions, RefuseAHeatThatIsNone) {
  Inputs in = model_plant();
  in[Input::cold_in] = 280.0;
  const auto c = conditions_of(Duty::cooling, in);
  ASSERT_FALSE(c.has_value());
  EXPECT_EQ(c.error().code, ReasonCode::load_too_small);
}

TEST(Conditions, RefuseATemperatureThatIsMissing) {
  Inputs in = model_plant();
  in[Input::hot_in].reset();
  EXPECT_EQ(conditions_of(Duty::cooling, in).error().code, ReasonCode::not_read);
}

// Refrigerant inputs are made again from the window's quantities: there and back.
TEST(Inputs, OfAWindowAreThoseThatItWasMadeOf) {
  SeededNormal noise{1};
  const auto window = testing::synthetic_window(
      {.noise = 0.0}, {.load_W = 200000.0, .hot_in_T_K = 295.15}, 0.0, noise);
  const Inputs in = inputs_of(testing::synthetic_model(), window);
  EXPECT_NEAR(*in[Input::suction_temperature],
              window[Quantity::evaporating]->mean_SI + window[Quantity::superheat]->mean_SI, 1e-9);
  const auto dew =
      state(*fluid_named("R134a"), GivenPx{.p_Pa = *in[Input::suction_pressure], .quality = 1.0});
  ASSERT_TRUE(dew.has_value());
  EXPECT_NEAR(dew->T_K, window[Quantity::evaporating]->mean_SI, 1e-6);
}

}  // namespace
}  // namespace lostwork
