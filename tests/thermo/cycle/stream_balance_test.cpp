#include "thermo/cycle/stream_balance.h"

#include "tests/thermo/cycle/test_machine.h"

#include <cmath>

#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

// The cold stream of a machine between these two temperatures.
StreamBalance cooled(double in_T_K, double out_T_K, const StreamFluid& fluid = ConstantStream{}) {
  TestMachine machine = make_machine({});
  machine.model.cold.fluid = fluid;
  machine.reading(Role::cold_in_temperature).value_SI = in_T_K;
  machine.reading(Role::cold_out_temperature).value_SI = out_T_K;
  return stream_balance(machine.model, machine.model.cold, cold_roles,
                        read_inputs(machine.model, machine.scan));
}

double mean_T_K(double in_T_K, double out_T_K) {
  return cooled(in_T_K, out_T_K).mean_T_K.value().value;
}

// (T2 - T1) / ln(T2 / T1) by log1p, which keeps its digits where the difference is small.
double logarithmic_mean_T_K(double a_T_K, double b_T_K) {
  return (b_T_K - a_T_K) / std::log1p((b_T_K - a_T_K) / a_T_K);
}

TEST(StreamBalance, HasTheLogarithmicMeanOfAConstantHeatCapacity) {
  EXPECT_NEAR(mean_T_K(285.15, 280.15), logarithmic_mean_T_K(285.15, 280.15), 1e-9);
  EXPECT_NEAR(mean_T_K(313.15, 353.15), logarithmic_mean_T_K(313.15, 353.15), 1e-9);
}

// The series takes over at 1e-3 of the temperature; there the mean is 2e-5 K from the arithmetic
// one.
TEST(StreamBalance, KeepsTheLogarithmicMeanWhereTheDifferenceIsSmall) {
  EXPECT_NEAR(mean_T_K(285.15, 284.90), logarithmic_mean_T_K(285.15, 284.90), 1e-9);
  EXPECT_NEAR(mean_T_K(285.15, 284.87), logarithmic_mean_T_K(285.15, 284.87), 1e-9);
  EXPECT_NEAR(mean_T_K(285.15, 284.86), logarithmic_mean_T_K(285.15, 284.86), 1e-9);
}

TEST(StreamBalance, HasTheTemperatureItselfWhereNothingChanges) {
  EXPECT_DOUBLE_EQ(mean_T_K(285.15, 285.15), 285.15);
}

// How far the entropic mean is below the arithmetic one: dT^2 / (12 T) to first order.
TEST(StreamBalance, LiesBelowTheArithmeticMeanByTheKnownAmount) {
  EXPECT_NEAR(282.65 - mean_T_K(285.15, 280.15), 0.0074, 0.00005);
  EXPECT_NEAR(333.15 - mean_T_K(313.15, 353.15), 0.40, 0.005);
  EXPECT_NEAR(318.15 - mean_T_K(298.15, 338.15), 0.42, 0.005);
}

TEST(StreamBalance, LetsBothEndsCountAlikeInAMeanOfASmallDifference) {
  const Number mean = cooled(285.15, 285.05).mean_T_K.value();
  EXPECT_NEAR(mean.by[static_cast<std::size_t>(Role::cold_in_temperature)], 0.5, 1e-3);
  EXPECT_NEAR(mean.by[static_cast<std::size_t>(Role::cold_out_temperature)], 0.5, 1e-3);
}

// Water's heat capacity changes by 0.1 % over 5 K: the mean moves by far less than a sensor sees.
TEST(StreamBalance, HasNearlyTheSameMeanForWater) {
  EXPECT_NEAR(cooled(285.15, 280.15, WaterStream{}).mean_T_K.value().value,
              mean_T_K(285.15, 280.15), 1e-3);
}

}  // namespace
}  // namespace lostwork::test
