#include "thermo/measure/uncertainty.h"

#include "thermo/measure/dual.h"

#include <array>
#include <cmath>
#include <cstddef>

#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

TEST(Dual, DifferentiatesAProductAndAQuotient) {
  const auto x = input<2>(3.0, 0);
  const auto y = input<2>(4.0, 1);
  const auto f = x * y / (x + 2.0 * y);  // f_x = 2 y^2 / (x + 2y)^2, f_y = x^2 / (x + 2y)^2
  EXPECT_DOUBLE_EQ(f.value, 12.0 / 11.0);
  EXPECT_DOUBLE_EQ(f.by[0], 32.0 / 121.0);
  EXPECT_DOUBLE_EQ(f.by[1], 9.0 / 121.0);
}

TEST(Dual, DifferentiatesSumsWithNumbers) {
  const auto x = input<1>(3.0, 0);
  const auto f = 1.0 - (x - 5.0) * 2.0 + (2.0 + -x);
  EXPECT_DOUBLE_EQ(f.value, 4.0);
  EXPECT_DOUBLE_EQ(f.by[0], -3.0);
}

TEST(Dual, DifferentiatesAFunctionOfTwoByTheChainRule) {
  const auto x = input<2>(3.0, 0);
  const auto y = input<2>(4.0, 1);
  const auto r = chain(5.0, 3.0 / 5.0, x * x, 4.0 / 5.0, y);  // partials given, x^2 differentiated
  EXPECT_DOUBLE_EQ(r.by[0], 0.6 * 6.0);
  EXPECT_DOUBLE_EQ(r.by[1], 0.8);
}

// JCGM 100:2008, H.1: the length of an end gauge, first order. The guide's u^2 = 1002 nm^2 is
// summed from rounded contributions: u is held to 0.5 nm.
TEST(Uncertainty, AgreesWithTheGuidesEndGauge) {
  enum : std::size_t { ls, d, alpha_s, dalpha, theta, dtheta };
  constexpr std::array<double, 6> values{50.000623e-3, 215e-9, 11.5e-6, 0.0, -0.1, 0.0};
  constexpr std::array<double, 6> u{25e-9, 9.7e-9, 1.2e-6, 0.58e-6, 0.41, 0.029};
  std::array<Dual<6>, 6> x;
  InputErrors<6> errors;
  for (std::size_t i = 0; i < 6; ++i) {
    x.at(i) = input<6>(values.at(i), i);
    errors.set_u(i, u.at(i));
  }
  const auto l = x[ls] + x[d] - x[ls] * (x[dalpha] * x[theta] + x[alpha_s] * x[dtheta]);
  EXPECT_NEAR(l.value, 50.000838e-3, 0.5e-9);
  EXPECT_NEAR(errors.u(l), 31.65e-9, 0.5e-9);
  EXPECT_NEAR(std::abs(l.by[dalpha]) * u[dalpha], 2.9e-9, 0.05e-9);
  EXPECT_NEAR(std::abs(l.by[dtheta]) * u[dtheta], 16.6e-9, 0.1e-9);
}

// JCGM 100:2008, H.2: resistance and reactance from five simultaneous observations of voltage,
// current and phase; the table's figures, to one in their last digit.
class GuidesImpedance : public testing::Test {
 protected:
  static constexpr std::size_t count = 5;
  using Row = std::array<double, count>;
  static constexpr std::array<Row, 3> observed{
      Row{    5.007,     4.994,     5.005,     4.990,     4.999},
      Row{19.663e-3, 19.639e-3, 19.640e-3, 19.685e-3, 19.678e-3},
      Row{   1.0456,    1.0438,    1.0468,    1.0428,    1.0433},
  };

  GuidesImpedance() {
    for (std::size_t i = 0; i < 3; ++i) {
      x.at(i) = input<3>(mean(observed.at(i)), i);
      errors.set_u(i, std::sqrt(covariance_of_means(i, i)));
    }
    for (std::size_t i = 0; i < 3; ++i) {
      for (std::size_t j = i + 1; j < 3; ++j) {
        errors.correlate(i, j, covariance_of_means(i, j) / (errors.u(i) * errors.u(j)));
      }
    }
    const double phi = x[2].value;
    R = x[0] / x[1] * chain(std::cos(phi), -std::sin(phi), x[2]);
    X = x[0] / x[1] * chain(std::sin(phi), std::cos(phi), x[2]);
    Z = x[0] / x[1];
  }
  static double mean(const Row& row) {
    double sum = 0.0;
    for (const double value : row) {
      sum += value;
    }
    return sum / count;
  }
  static double covariance_of_means(std::size_t i, std::size_t j) {
    double sum = 0.0;
    for (std::size_t k = 0; k < count; ++k) {
      sum += (observed.at(i).at(k) - mean(observed.at(i))) *
             (observed.at(j).at(k) - mean(observed.at(j)));
    }
    return sum / (count * (count - 1.0));
  }
  [[nodiscard]] double correlation(const Dual<3>& a, const Dual<3>& b) const {
    return errors.covariance(a, b) / (errors.u(a) * errors.u(b));
  }

  std::array<Dual<3>, 3> x;
  InputErrors<3> errors;
  Dual<3> R;
  Dual<3> X;
  Dual<3> Z;
};

TEST_F(GuidesImpedance, HasTheGuidesValues) {
  EXPECT_NEAR(R.value, 127.732, 0.001);
  EXPECT_NEAR(X.value, 219.847, 0.001);
  EXPECT_NEAR(Z.value, 254.260, 0.001);
}

TEST_F(GuidesImpedance, HasTheGuidesUncertainties) {
  EXPECT_NEAR(errors.u(R), 0.071, 0.001);
  EXPECT_NEAR(errors.u(X), 0.295, 0.001);
  EXPECT_NEAR(errors.u(Z), 0.236, 0.001);
}

TEST_F(GuidesImpedance, HasTheGuidesCorrelations) {
  EXPECT_NEAR(correlation(R, X), -0.588, 0.001);
  EXPECT_NEAR(correlation(R, Z), -0.485, 0.001);
  EXPECT_NEAR(correlation(X, Z), 0.993, 0.001);
}

// JCGM 100:2008, H.3: a thermometer's calibration line by least squares from eleven corrections of
// equal, unknown variance, and its prediction at 30 degC; to one in the last printed digit.
class GuidesCalibrationLine : public testing::Test {
 protected:
  static constexpr std::size_t count = 11;
  using Row = std::array<double, count>;
  static constexpr Row read_degC{21.521, 22.012, 22.512, 23.003, 23.507, 23.999,
                                 24.513, 25.002, 25.503, 26.010, 26.511};
  static constexpr Row correction_degC{-0.171, -0.169, -0.166, -0.159, -0.164, -0.165,
                                       -0.156, -0.157, -0.159, -0.161, -0.160};

  GuidesCalibrationLine() {
    double mean_theta = 0.0;
    for (const double t : read_degC) {
      mean_theta += (t - 20.0) / count;
    }
    double square = 0.0;
    for (const double t : read_degC) {
      square += (t - 20.0 - mean_theta) * (t - 20.0 - mean_theta);
    }
    for (std::size_t k = 0; k < count; ++k) {
      const auto b = input<count>(correction_degC.at(k), k);
      const double theta = read_degC.at(k) - 20.0 - mean_theta;
      slope += b * (theta / square);
      intercept += b * (1.0 / count - mean_theta * theta / square);
    }
    double residual = 0.0;
    for (std::size_t k = 0; k < count; ++k) {
      const double left =
          correction_degC.at(k) - intercept.value - slope.value * (read_degC.at(k) - 20.0);
      residual += left * left;
    }
    scatter = std::sqrt(residual / (count - 2.0));
    for (std::size_t k = 0; k < count; ++k) {
      errors.set_u(k, scatter);
    }
  }

  Dual<count> intercept;
  Dual<count> slope;
  double scatter = 0.0;
  InputErrors<count> errors;
};

TEST_F(GuidesCalibrationLine, HasTheGuidesInterceptAndSlope) {
  EXPECT_NEAR(intercept.value, -0.1712, 0.0001);
  EXPECT_NEAR(slope.value, 0.00218, 0.00001);
  EXPECT_NEAR(errors.u(intercept), 0.0029, 0.0001);
  EXPECT_NEAR(errors.u(slope), 0.00067, 0.00001);
}

TEST_F(GuidesCalibrationLine, HasTheGuidesCorrelation) {
  EXPECT_NEAR(errors.covariance(intercept, slope) / (errors.u(intercept) * errors.u(slope)), -0.930,
              0.001);
}

TEST_F(GuidesCalibrationLine, PredictsAsTheGuideDoes) {
  const auto b30 = intercept + slope * (30.0 - 20.0);
  EXPECT_NEAR(b30.value, -0.1494, 0.0001);
  EXPECT_NEAR(errors.u(b30), 0.0041, 0.0001);
}

TEST(Uncertainty, CancelsInTheDifferenceOfAMatchedPair) {
  InputErrors<2> errors;
  errors.set_u(0, 0.3);
  errors.set_u(1, 0.3);
  errors.correlate(0, 1, 1.0);
  EXPECT_NEAR(errors.u(input<2>(7.0, 0) - input<2>(12.0, 1)), 0.0, 1e-9);
  EXPECT_NEAR(errors.u(0.5 * (input<2>(7.0, 0) + input<2>(12.0, 1))), 0.3, 1e-12);
}

}  // namespace
}  // namespace lostwork::test
