#include "sensors/accuracy.h"

#include <array>
#include <cmath>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

double u_SI(const Accuracy& accuracy, Unit unit, double value) {
  return standard_u_SI(std::array{accuracy}, unit, value, 0.0);
}

struct Pt100Case {
  Pt100Class grade;
  double t_degC;
  double limit_K;
};

class Pt100 : public testing::TestWithParam<Pt100Case> {};

TEST_P(Pt100, HasTheLimitOfItsClassAsARectangle) {
  const Pt100Case& c = GetParam();
  // A rounding of the product.
  EXPECT_NEAR(u_SI(c.grade, Unit::degC, c.t_degC) * std::sqrt(3.0), c.limit_K, 1e-12);
}

// IEC 60751:2008, tolerance values tabulated for the classes (from memory).
INSTANTIATE_TEST_SUITE_P(
    Iec60751, Pt100,
    testing::Values(Pt100Case{Pt100Class::aa, 0.0, 0.10}, Pt100Case{Pt100Class::aa, 100.0, 0.27},
                    Pt100Case{Pt100Class::a, 0.0, 0.15}, Pt100Case{Pt100Class::a, 100.0, 0.35},
                    Pt100Case{Pt100Class::a, -100.0, 0.35}, Pt100Case{Pt100Class::b, 0.0, 0.30},
                    Pt100Case{Pt100Class::b, 100.0, 0.80}, Pt100Case{Pt100Class::b, 200.0, 1.30},
                    Pt100Case{Pt100Class::c, 0.0, 0.60}, Pt100Case{Pt100Class::c, 100.0, 1.60}),
    [](const auto& tested) { return "Row" + std::to_string(tested.index); });

TEST(StandardU, OfAPt100DoesNotDependOnTheUnitItIsReadIn) {
  EXPECT_NEAR(u_SI(Pt100Class::b, Unit::degF, 212.0), 0.80 / std::sqrt(3.0), 1e-12);
  EXPECT_NEAR(u_SI(Pt100Class::b, Unit::K, 373.15), 0.80 / std::sqrt(3.0), 1e-12);
}

TEST(StandardU, OfALimitIsTheLimitOverRootThree) {
  EXPECT_NEAR(u_SI(AccuracyLimit{0.15}, Unit::degC, 7.0), 0.15 / std::sqrt(3.0), 1e-15);
}

TEST(StandardU, OfALimitInFahrenheitIsScaledAsADifference) {
  EXPECT_NEAR(u_SI(AccuracyLimit{1.8}, Unit::degF, 44.0), 1.0 / std::sqrt(3.0), 1e-15);
}

TEST(StandardU, OfPercentOfReadingGrowsWithTheReading) {
  EXPECT_NEAR(u_SI(PercentOfReading{0.5}, Unit::kW, 60.0), 300.0 / std::sqrt(3.0), 1e-10);
  EXPECT_NEAR(u_SI(PercentOfReading{0.5}, Unit::kW, -60.0), 300.0 / std::sqrt(3.0), 1e-10);
}

// 0.5 % of 25 bar is 12.5 kPa, whatever the pressure is.
TEST(StandardU, OfPercentOfSpanIsTheSameOverTheSpan) {
  const PercentOfSpan part{.percent = 0.5, .low = 0.0, .high = 25.0};
  EXPECT_NEAR(u_SI(part, Unit::bar_gauge, 2.0), 12500.0 / std::sqrt(3.0), 1e-9);
  EXPECT_NEAR(u_SI(part, Unit::bar_gauge, 20.0), 12500.0 / std::sqrt(3.0), 1e-9);
}

TEST(StandardU, OfACertificateIsTakenAsItIs) {
  EXPECT_NEAR(u_SI(StandardUncertainty{0.02}, Unit::degC, 7.0), 0.02, 1e-15);
}

TEST(StandardU, AddsIndependentPartsInQuadrature) {
  const std::array<Accuracy, 2> parts{StandardUncertainty{3.0}, StandardUncertainty{4.0}};
  EXPECT_NEAR(standard_u_SI(parts, Unit::W, 0.0, 0.0), 5.0, 1e-14);
}

TEST(StandardU, CountsTheStepOfTheRegisterAsARectangleOneStepWide) {
  EXPECT_NEAR(standard_u_SI({}, Unit::degC, 7.0, 0.1), 0.1 / std::sqrt(12.0), 1e-15);
}

TEST(StandardU, OfASensorOfWhichNothingIsSaidIsZero) {
  EXPECT_EQ(standard_u_SI({}, Unit::degC, 7.0, 0.0), 0.0);
}

TEST(Pt100ClassNamed, KnowsTheFourClasses) {
  EXPECT_EQ(pt100_class_named("Pt100 AA"), Pt100Class::aa);
  EXPECT_EQ(pt100_class_named("Pt100 A"), Pt100Class::a);
  EXPECT_EQ(pt100_class_named("Pt100 B"), Pt100Class::b);
  EXPECT_EQ(pt100_class_named("Pt100 C"), Pt100Class::c);
  EXPECT_EQ(pt100_class_named("Pt100 D"), std::nullopt);
}

TEST(AllowedAccuracy, GivesAPt100ClassToTemperaturesOnly) {
  EXPECT_TRUE(allowed(Accuracy{Pt100Class::a}, Unit::degF));
  EXPECT_FALSE(allowed(Accuracy{Pt100Class::a}, Unit::bar_abs));
  EXPECT_TRUE(allowed(Accuracy{AccuracyLimit{0.1}}, Unit::bar_abs));
}

}  // namespace
}  // namespace lostwork
