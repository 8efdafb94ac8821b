#include "thermo/health/cusum.h"

#include <cmath>
#include <fstream>
#include <sstream>
#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

// Montgomery, Introduction to Statistical Quality Control, tabular cusum; columns of the file.
struct Row {
  double reference;
  double limit;
  double shift;
  double published;
  double recomputed;  // by an integral equation
};

std::vector<Row> rows() {
  std::ifstream file{LOSTWORK_REFERENCE "/cusum_arl.csv"};
  std::string line;
  std::getline(file, line);
  std::vector<Row> out;
  while (std::getline(file, line)) {
    std::istringstream fields{line};
    std::string name;
    std::getline(fields, name, ',');
    Row row{};
    char comma = 0;
    fields >> row.reference >> comma >> row.limit >> comma >> row.shift >> comma >> row.published >>
        comma >> row.recomputed;
    out.push_back(row);
  }
  return out;
}

TEST(RunLengthTable, IsThere) {
  EXPECT_EQ(rows().size(), 26U);
}

class RunLengths : public ::testing::TestWithParam<Row> {};

// 0.5 % is the table's own tolerance (1.8 % for the design rows: they are held to the integral
// equation), four standard uncertainties are the simulation's.
TEST_P(RunLengths, AreThoseOfTheTable) {
  const Row& row = GetParam();
  const RunLength found = run_length({.reference = row.reference, .limit = row.limit}, Sides::two,
                                     {.shift = row.shift, .autocorrelation = 0.0});
  EXPECT_NEAR(found.mean, row.recomputed, 0.005 * row.recomputed + 4.0 * found.u);
  EXPECT_LT(found.u, 0.03 * found.mean);
}

INSTANTIATE_TEST_SUITE_P(Montgomery, RunLengths, ::testing::ValuesIn(rows()));

struct OneSided {
  double limit;
  double expected;
};

class OneSidedRunLengths : public ::testing::TestWithParam<OneSided> {};

// Markov chain with independent normal figures, reference 0.5 (methods.md 5).
TEST_P(OneSidedRunLengths, AreThoseOfTheMarkovChain) {
  const RunLength found = run_length({.reference = 0.5, .limit = GetParam().limit}, Sides::one, {},
                                     {.seed = 5, .samples = 3000000});
  EXPECT_NEAR(found.mean, GetParam().expected, 0.005 * GetParam().expected + 4.0 * found.u);
}

INSTANTIATE_TEST_SUITE_P(Limits, OneSidedRunLengths,
                         ::testing::Values(OneSided{4.0, 335.0}, OneSided{5.0, 931.0},
                                           OneSided{6.0, 2553.0}));

struct Correlated {
  double autocorrelation;
  double expected;
};

class AutocorrelatedRunLengths : public ::testing::TestWithParam<Correlated> {};

// The same chart with limit 5 on figures that remember (methods.md 5): 290, 139, 85, 68, themselves
// simulated; 5 % for their own error.
TEST_P(AutocorrelatedRunLengths, AreMuchShorter) {
  const RunLength found = run_length({.reference = 0.5, .limit = 5.0}, Sides::one,
                                     {.shift = 0.0, .autocorrelation = GetParam().autocorrelation});
  EXPECT_NEAR(found.mean, GetParam().expected, 0.05 * GetParam().expected + 4.0 * found.u);
}

INSTANTIATE_TEST_SUITE_P(Correlations, AutocorrelatedRunLengths,
                         ::testing::Values(Correlated{0.2, 290.0}, Correlated{0.4, 139.0},
                                           Correlated{0.6, 85.0}, Correlated{0.8, 68.0}));

// Eight charts and one false alarm a year: 2920 days, limit 6.15 (methods.md 5). 4 % of the run
// length is 0.04 of the limit, and the limit is searched to 0.05.
TEST(LimitFor, KeepsTheBudgetOfEightCharts) {
  EXPECT_NEAR(limit_for(0.5, 2920.0, 0.0), 6.15, 0.10);
}

TEST(LimitFor, GrowsWithAutocorrelation) {
  EXPECT_GT(limit_for(0.5, 400.0, 0.4), limit_for(0.5, 400.0, 0.0) + 1.0);
}

TEST(LimitFor, IsAFunctionOfItsArguments) {
  EXPECT_EQ(limit_for(0.5, 700.0, 0.1), limit_for(0.5, 700.0, 0.1));
}

TEST(Cusum, StaysAtZeroBelowTheReference) {
  Cusum chart;
  for (int i = 0; i < 10; ++i) {
    chart = after(chart, 0.4, {.reference = 0.5, .limit = 5.0});
  }
  EXPECT_EQ(chart.sum, 0.0);
  EXPECT_EQ(chart.rising, 0U);
}

TEST(Cusum, AddsWhatIsAboveTheReference) {
  Cusum chart;
  for (int i = 0; i < 4; ++i) {
    chart = after(chart, 2.0, {.reference = 0.5, .limit = 5.0});
  }
  EXPECT_DOUBLE_EQ(chart.sum, 6.0);
  EXPECT_EQ(chart.rising, 4U);
  EXPECT_TRUE(alarmed(chart, {.reference = 0.5, .limit = 5.0}));
}

}  // namespace
}  // namespace lostwork
