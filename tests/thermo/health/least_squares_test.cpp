#include "thermo/health/least_squares.h"

#include "thermo/health/seeded_normal.h"

#include <array>
#include <cmath>
#include <cstddef>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using ::testing::DoubleNear;
using ::testing::ElementsAre;

// A' (b - A x): how the square error would fall along each coefficient.
std::vector<double> descent(const LinearSystem& s, const std::vector<double>& x) {
  std::vector<double> out(s.columns, 0.0);
  for (std::size_t i = 0; i < s.b.size(); ++i) {
    double left = s.b[i];
    for (std::size_t j = 0; j < s.columns; ++j) {
      left -= s.a[i * s.columns + j] * x[j];
    }
    for (std::size_t j = 0; j < s.columns; ++j) {
      out[j] += s.a[i * s.columns + j] * left;
    }
  }
  return out;
}

LinearSystem random_system(std::uint64_t seed, std::size_t rows, std::size_t columns) {
  SeededNormal noise{seed};
  LinearSystem s{.columns = columns, .a = {}, .b = {}};
  for (std::size_t i = 0; i < rows * columns; ++i) {
    s.a.push_back(noise());
  }
  for (std::size_t i = 0; i < rows; ++i) {
    s.b.push_back(noise());
  }
  return s;
}

// By hand: the free optimum of b = (1, -2) with unit columns has one negative coefficient.
TEST(LeastSquares, HoldsACoefficientAtZeroThatWouldBeNegative) {
  const LinearSystem s{
      .columns = 2, .a = {1.0,  0.0, 0.0, 1.0},
           .b = {1.0, -2.0    }
  };
  const auto x = least_squares(s, Sign::not_negative);
  ASSERT_TRUE(x.has_value());
  EXPECT_THAT(*x, ElementsAre(DoubleNear(1.0, 1e-14), 0.0));
}

// By hand: with the second column held at 0, the first is (1,1).b / 2 = 0.5; free it would be 2.
TEST(LeastSquares, SolvesTheOthersAgainWhenOneIsHeld) {
  const LinearSystem s{
      .columns = 2, .a = {1.0,  0.0, 1.0, 1.0},
           .b = {2.0, -1.0    }
  };
  const auto x = least_squares(s, Sign::not_negative);
  ASSERT_TRUE(x.has_value());
  EXPECT_THAT(*x, ElementsAre(DoubleNear(0.5, 1e-14), 0.0));
}

class NonNegative : public ::testing::TestWithParam<int> {};

// Karush-Kuhn-Tucker: x >= 0, descent <= 0, and descent = 0 where x > 0.
TEST_P(NonNegative, MeetsTheConditionsOfTheOptimum) {
  const auto s = random_system(static_cast<std::uint64_t>(GetParam()), 30, 8);
  const auto x = least_squares(s, Sign::not_negative);
  ASSERT_TRUE(x.has_value());
  const auto fall = descent(s, *x);
  for (std::size_t j = 0; j < s.columns; ++j) {
    EXPECT_GE((*x)[j], 0.0) << "seed " << GetParam();
    EXPECT_LE(fall[j], 1e-10) << "seed " << GetParam();
    EXPECT_NEAR((*x)[j] * fall[j], 0.0, 1e-10) << "seed " << GetParam();
  }
}

INSTANTIATE_TEST_SUITE_P(Seeds, NonNegative, ::testing::Range(1, 41));

TEST(LeastSquares, IsTheOptimumWhenTheSignIsFree) {
  const auto s = random_system(7, 40, 6);
  const auto x = least_squares(s, Sign::any);
  ASSERT_TRUE(x.has_value());
  for (const double fall : descent(s, *x)) {
    EXPECT_NEAR(fall, 0.0, 1e-10);
  }
}

TEST(LeastSquares, GivesAFiniteAnswerWhenAColumnSaysNothingNew) {
  LinearSystem s = random_system(3, 20, 2);
  for (std::size_t i = 0; i < 20; ++i) {
    s.a[2 * i + 1] = 3.0 * s.a[2 * i];
  }
  const auto x = least_squares(s, Sign::any);
  ASSERT_TRUE(x.has_value());
  EXPECT_TRUE(std::isfinite((*x)[0]) && std::isfinite((*x)[1]));
}

TEST(LeastSquares, RefusesAFigureThatIsNotFinite) {
  const LinearSystem s{
      .columns = 1, .a = {1.0, std::nan("")},
           .b = {1.0,          2.0}
  };
  const auto x = least_squares(s, Sign::any);
  ASSERT_FALSE(x.has_value());
  EXPECT_EQ(x.error().code, ReasonCode::implausible);
}

TEST(LeastSquares, RefusesSizesThatDoNotFit) {
  EXPECT_EQ(least_squares({.columns = 2, .a = {1.0}, .b = {1.0}}, Sign::any).error().code,
            ReasonCode::implausible);
}

TEST(RobustFit, RefusesTooFewRows) {
  const auto s = random_system(1, 8, 6);
  EXPECT_EQ(robust_fit(s, Sign::any).error().code, ReasonCode::load_too_small);
}

// JCGM 100:2008, H.3: correction b = y1 + y2 (t - 20 degC), to the last printed digit. None of its
// eleven residuals is beyond Huber's bound (the largest is 1.6 of the standard deviation's 1.345
// robust ones apart: 0.2 of a printed digit of y1 is left for that).
LinearSystem calibration_line() {
  constexpr std::array<double, 11> t{21.521, 22.012, 22.512, 23.003, 23.507, 23.999,
                                     24.513, 25.002, 25.503, 26.010, 26.511};
  constexpr std::array<double, 11> b{-0.171, -0.169, -0.166, -0.159, -0.164, -0.165,
                                     -0.156, -0.157, -0.159, -0.161, -0.160};
  LinearSystem s{
      .columns = 2, .a = {      },
           .b = { b.begin(),b.end()}
  };
  for (const double temperature : t) {
    s.a.push_back(1.0);
    s.a.push_back(temperature - 20.0);
  }
  return s;
}

TEST(LeastSquares, ReproducesTheCalibrationLineOfTheGum) {
  const auto x = least_squares(calibration_line(), Sign::any);
  ASSERT_TRUE(x.has_value());
  EXPECT_THAT(*x, ElementsAre(DoubleNear(-0.1712, 0.00005), DoubleNear(0.00218, 0.000005)));
}

// The same example: u(y1) = 0.0029, u(y2) = 0.00067 with s = 0.0035, so spread = (u / s)^2 to the
// 2 % that two printed digits hold.
TEST(RobustFit, HasTheSpreadOfTheCalibrationLineOfTheGum) {
  LinearSystem s = calibration_line();
  const auto x = least_squares(s, Sign::any);
  ASSERT_TRUE(x.has_value());
  for (std::size_t i = 0; i < s.b.size(); ++i) {  // exact figures: every weight is 1
    s.b[i] = (*x)[0] + (*x)[1] * s.a[2 * i + 1];
  }
  const auto fit = robust_fit(s, Sign::any);
  ASSERT_TRUE(fit.has_value());
  EXPECT_NEAR(std::sqrt(fit->spread[0]), 0.0029 / 0.0035, 0.03);
  EXPECT_NEAR(std::sqrt(fit->spread[3]), 0.00067 / 0.0035, 0.006);
}

// At 30 degC: u(b) = 0.0041 with the same s.
TEST(RobustFit, LeverageIsTheFitsOwnVariance) {
  LinearSystem s = calibration_line();
  s.b.assign(s.b.size(), 1.0);
  const auto fit = robust_fit(s, Sign::any);
  ASSERT_TRUE(fit.has_value());
  EXPECT_NEAR(std::sqrt(leverage({1.0, 10.0}, fit->spread)), 0.0041 / 0.0035, 0.03);
}

// 60 points on y = 1 + 2 x with noise 0.1, six of them 50 off: Huber's estimate stays within
// 0.15 of the truth; without weights the offset alone moves by 6 * 50 / 60 = 5.
TEST(RobustFit, IsHardlyMovedByATenthOfOutliers) {
  SeededNormal noise{11};
  LinearSystem s{.columns = 2, .a = {}, .b = {}};
  for (int i = 0; i < 60; ++i) {
    const double x = -1.0 + 2.0 * i / 59.0;
    s.a.push_back(1.0);
    s.a.push_back(x);
    s.b.push_back(1.0 + 2.0 * x + 0.1 * noise() + (i % 10 == 4 ? 50.0 : 0.0));
  }
  const auto fit = robust_fit(s, Sign::any);
  ASSERT_TRUE(fit.has_value());
  EXPECT_NEAR(fit->x[0], 1.0, 0.15);
  EXPECT_NEAR(fit->x[1], 2.0, 0.15);
}

TEST(RobustFit, ChangesInProportionWhenTheUnitChanges) {
  LinearSystem s = random_system(5, 50, 3);
  const auto before = robust_fit(s, Sign::any);
  for (std::size_t i = 0; i < s.b.size(); ++i) {
    s.a[3 * i + 1] *= 1000.0;
  }
  const auto after = robust_fit(s, Sign::any);
  ASSERT_TRUE(before.has_value() && after.has_value());
  EXPECT_NEAR(after->x[1], before->x[1] / 1000.0, 1e-12);
  EXPECT_NEAR(after->x[0], before->x[0], 1e-10);
}

}  // namespace
}  // namespace lostwork
