#include "thermo/measure/block_sums.h"

#include <cmath>
#include <random>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

TEST(LineFit, IsExactOnAStraightLine) {
  LineSums sums;
  for (int i = 0; i < 60; ++i) {
    sums.add(10.0 * i, 280.0 + 0.001 * 10.0 * i);
  }
  const auto line = fit(sums);
  ASSERT_TRUE(line);
  EXPECT_NEAR(line->slope, 0.001, 1e-12);
  EXPECT_NEAR(line->mean, 280.0 + 0.001 * 295.0, 1e-10);
  EXPECT_NEAR(line->scatter, 0.0, 1e-7);
}

// Anscombe, The American Statistician 27 (1973) 17, data set I: y = 3.00 + 0.500 x, residual sum of
// squares 13.75; printed to three digits.
TEST(LineFit, AgreesWithAnscombesFirstSet) {
  const std::vector<double> x{10, 8, 13, 9, 11, 14, 6, 4, 12, 7, 5};
  const std::vector<double> y{8.04, 6.95, 7.58, 8.81, 8.33, 9.96, 7.24, 4.26, 10.84, 4.82, 5.68};
  LineSums sums;
  for (std::size_t i = 0; i < x.size(); ++i) {
    sums.add(x[i], y[i]);
  }
  const auto line = fit(sums);
  ASSERT_TRUE(line);
  EXPECT_NEAR(line->slope, 0.500, 0.0005);
  EXPECT_NEAR(line->mean, 7.50, 0.005);
  EXPECT_NEAR(line->scatter * line->scatter * 9.0, 13.75, 0.02);
}

TEST(LineFit, JoinedBlocksGiveTheFitOfAllSamples) {
  std::mt19937_64 random{7};
  std::normal_distribution<double> noise{0.0, 0.1};
  LineSums all;
  LineSums joined;
  for (int block = 0; block < 10; ++block) {
    LineSums part;
    for (int i = 0; i < 6; ++i) {
      const double value = 300.0 + 0.01 * block + noise(random);
      all.add(60.0 * block + 10.0 * i, value);
      part.add(10.0 * i, value);
    }
    joined.join(part, 60.0 * block);
  }
  const auto a = fit(all);
  const auto b = fit(joined);
  ASSERT_TRUE(a && b);
  EXPECT_NEAR(a->slope, b->slope, 1e-14);
  EXPECT_NEAR(a->scatter, b->scatter, 1e-10);
}

TEST(LineFit, HasNoneForTwoSamplesOrOneTime) {
  LineSums sums;
  sums.add(0.0, 1.0);
  sums.add(1.0, 2.0);
  EXPECT_FALSE(fit(sums));
  LineSums same;
  for (int i = 0; i < 5; ++i) {
    same.add(3.0, i);
  }
  EXPECT_FALSE(fit(same));
}

ScatterSums first_order(double phi, int n, std::uint64_t seed) {
  std::mt19937_64 random{seed};
  std::normal_distribution<double> noise{0.0, 1.0};
  ScatterSums sums;
  double x = 0.0;
  for (int i = 0; i < n; ++i) {
    x = phi * x + noise(random);
    sums.add(1000.0 + x, 0.5);
  }
  return sums;
}

// n (1 - r) / (1 + r) with r = phi: a third for 0.5. The estimate of r over n samples scatters by
// 1 / sqrt(n) at most (Bartlett), here 0.007; three of them times the derivative 2 / (1 + r)^2.
TEST(Scatter, AThirdOfTheSamplesCountsWhereEachIsHalfTheLast) {
  const int n = 20000;
  const auto s = scatter(first_order(0.5, n, 11));
  ASSERT_TRUE(s);
  EXPECT_NEAR(s->n_effective / n, 1.0 / 3.0, 3.0 * 0.007 * 2.0 / (1.5 * 1.5));
}

TEST(Scatter, IndependentSamplesCountWhole) {
  const int n = 20000;
  const auto s = scatter(first_order(0.0, n, 12));
  ASSERT_TRUE(s);
  EXPECT_NEAR(s->n_effective / n, 1.0, 3.0 * 0.007 * 2.0);
}

TEST(Scatter, AlternatingSamplesCountNoMoreThanTheyAre) {
  ScatterSums sums;
  for (int i = 0; i < 60; ++i) {
    sums.add(i % 2 == 0 ? 1.0 : -1.0, 0.0);
  }
  EXPECT_EQ(scatter(sums)->n_effective, 60.0);
}

TEST(Scatter, HasMeanAndDeviationOfASmallSet) {
  // 2, 4, 4, 4, 5, 5, 7, 9: mean 5, sum of squared deviations 32.
  ScatterSums sums;
  for (const double x : {2.0, 4.0, 4.0, 4.0, 5.0, 5.0, 7.0, 9.0}) {
    sums.add(x, 0.25);
  }
  const auto s = scatter(sums);
  ASSERT_TRUE(s);
  EXPECT_DOUBLE_EQ(s->mean, 5.0);
  EXPECT_DOUBLE_EQ(s->sd, std::sqrt(32.0 / 7.0));
  EXPECT_DOUBLE_EQ(s->u, 0.25);
}

TEST(Scatter, JoinedBlocksGiveTheScatterOfAllSamples) {
  std::mt19937_64 random{13};
  std::normal_distribution<double> noise{0.0, 50.0};
  ScatterSums all;
  ScatterSums joined;
  double x = 0.0;
  for (int block = 0; block < 10; ++block) {
    ScatterSums part;
    for (int i = 0; i < 6; ++i) {
      x = 0.7 * x + noise(random);
      all.add(60e3 + x, 300.0);
      part.add(60e3 + x, 300.0);
    }
    joined.join(part);
  }
  EXPECT_NEAR(scatter(all)->mean, scatter(joined)->mean, 1e-9);
  EXPECT_NEAR(scatter(all)->sd, scatter(joined)->sd, 1e-9);
  EXPECT_NEAR(scatter(all)->n_effective, scatter(joined)->n_effective, 1e-8);
}

TEST(Scatter, HasNoneForNoSamples) {
  EXPECT_FALSE(scatter(ScatterSums{}));
}

TEST(Scatter, AConstantHasNoDeviationAndCountsOnce) {
  ScatterSums sums;
  for (int i = 0; i < 60; ++i) {
    sums.add(281.37, 0.1);
  }
  EXPECT_EQ(scatter(sums)->sd, 0.0);
  EXPECT_EQ(scatter(sums)->n_effective, 1.0);
}

}  // namespace
}  // namespace lostwork
