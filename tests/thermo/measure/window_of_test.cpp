#include "thermo/measure/window_of.h"

#include <gtest/gtest.h>

namespace lostwork {
namespace {

void add(WindowSums& sums, Quantity q, double value) {
  sums.quantities.at(static_cast<std::size_t>(q)).add(value, 0.01 * value);
}

// Two scans: 100 W of cold for 20 W, 300 W for 100 W. By hand: 400 / 120; the mean of the two COPs
// would be 4.
WindowSums two_scans() {
  WindowSums sums{.scans = 2};
  add(sums, Quantity::cold_heat, 100.0);
  add(sums, Quantity::power, 20.0);
  add(sums, Quantity::reversible_power, 10.0);
  add(sums, Quantity::power_expected, 24.0);
  add(sums, Quantity::cop, 5.0);
  add(sums, Quantity::cop_reversible, 10.0);
  add(sums, Quantity::second_law_efficiency, 0.5);
  add(sums, Quantity::power_residual, -1.0 / 6.0);
  add(sums, Quantity::cold_heat, 300.0);
  add(sums, Quantity::power, 100.0);
  add(sums, Quantity::reversible_power, 30.0);
  add(sums, Quantity::power_expected, 96.0);
  add(sums, Quantity::cop, 3.0);
  add(sums, Quantity::cop_reversible, 10.0);
  add(sums, Quantity::second_law_efficiency, 0.3);
  add(sums, Quantity::power_residual, 1.0 / 24.0);
  return sums;
}

TEST(WindowOf, MakesRatiosFromTheMeansOfTheirParts) {
  const Window w = window_of(two_scans(), Duty::cooling);
  EXPECT_DOUBLE_EQ(w[Quantity::cop]->mean_SI, 400.0 / 120.0);
  EXPECT_DOUBLE_EQ(w[Quantity::cop_reversible]->mean_SI, 400.0 / 40.0);
  EXPECT_DOUBLE_EQ(w[Quantity::second_law_efficiency]->mean_SI, 40.0 / 120.0);
  EXPECT_DOUBLE_EQ(w[Quantity::power_residual]->mean_SI, 0.0);
}

TEST(WindowOf, AveragesRates) {
  const Window w = window_of(two_scans(), Duty::cooling);
  EXPECT_DOUBLE_EQ(w[Quantity::power]->mean_SI, 60.0);
  EXPECT_DOUBLE_EQ(w[Quantity::power]->u_SI, 0.6);
}

TEST(WindowOf, HasNoRatioWithoutItsParts) {
  WindowSums sums = two_scans();
  sums.quantities.at(static_cast<std::size_t>(Quantity::cold_heat)) = {};
  EXPECT_FALSE(window_of(sums, Duty::cooling)[Quantity::cop]);
}

TEST(WindowOf, HeatingCountsTheHotHeat) {
  WindowSums sums = two_scans();
  add(sums, Quantity::hot_heat, 120.0);
  add(sums, Quantity::hot_heat, 400.0);
  EXPECT_DOUBLE_EQ(window_of(sums, Duty::heating)[Quantity::cop]->mean_SI, 520.0 / 120.0);
}

TEST(WindowOf, HasNoMeanWhereMoreThanAFifthIsMissing) {
  WindowSums sums{.scans = 10};
  for (int i = 0; i < 8; ++i) {
    add(sums, Quantity::power, 50.0);
    if (i < 7) {
      add(sums, Quantity::cold_heat, 200.0);
    }
  }
  const Window w = window_of(sums, Duty::cooling);
  EXPECT_TRUE(w[Quantity::power]);
  EXPECT_FALSE(w[Quantity::cold_heat]);
}

}  // namespace
}  // namespace lostwork
