#include "sensors/point.h"

#include <chrono>
#include <cmath>
#include <limits>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using std::chrono::days;

constexpr Instant now{std::chrono::sys_days{std::chrono::year{2024} / 3 / 1}};

PointSpec temperature() {
  PointSpec point;
  point.id = "ch1_cold_in";
  point.role = Role::cold_in_temperature;
  point.unit = Unit::degC;
  point.accuracies = {AccuracyLimit{0.15}};
  point.range = PointRange{.min = -40.0, .max = 150.0};
  return point;
}

TEST(ReadingOf, IsInSIWithItsUncertaintyAndTime) {
  const Reading reading = reading_of(temperature(), 12.0, 0.0, now);
  EXPECT_EQ(reading.quality, Quality::good);
  EXPECT_NEAR(reading.value_SI, 285.15, 1e-12);
  EXPECT_NEAR(reading.u_SI, 0.15 / std::sqrt(3.0), 1e-15);
  EXPECT_EQ(reading.time, now);
}

TEST(ReadingOf, TakesBothEndsOfTheRange) {
  EXPECT_EQ(reading_of(temperature(), -40.0, 0.0, now).quality, Quality::good);
  EXPECT_EQ(reading_of(temperature(), 150.0, 0.0, now).quality, Quality::good);
}

TEST(ReadingOf, RefusesWhatIsOutsideTheRange) {
  EXPECT_EQ(reading_of(temperature(), -40.01, 0.0, now).quality, Quality::out_of_range);
  EXPECT_EQ(reading_of(temperature(), 150.01, 0.0, now).quality, Quality::out_of_range);
}

TEST(ReadingOf, RefusesWhatIsNotFinite) {
  PointSpec open = temperature();
  open.range.reset();
  const double nan = std::numeric_limits<double>::quiet_NaN();
  const double infinity = std::numeric_limits<double>::infinity();
  EXPECT_EQ(reading_of(open, nan, 0.0, now).quality, Quality::out_of_range);
  EXPECT_EQ(reading_of(open, infinity, 0.0, now).quality, Quality::out_of_range);
  EXPECT_EQ(reading_of(temperature(), nan, 0.0, now).quality, Quality::out_of_range);
}

TEST(ReadingOf, RefusesATemperatureBelowAbsoluteZeroWithoutARange) {
  PointSpec open = temperature();
  open.range.reset();
  EXPECT_EQ(reading_of(open, -3276.8, 0.0, now).quality, Quality::out_of_range);
}

TEST(ReadingOf, RefusesAPressureThatIsNotAboveVacuum) {
  PointSpec pressure;
  pressure.role = Role::suction_pressure;
  pressure.unit = Unit::bar_gauge;
  EXPECT_EQ(reading_of(pressure, -1.02, 0.0, now).quality, Quality::out_of_range);
  EXPECT_EQ(reading_of(pressure, -0.5, 0.0, now).quality, Quality::good);
}

// At 1500 m the atmosphere is 84.6 kPa (ISO 2533:1975, rounded): taking it for that of the sea
// would be 16.8 kPa wrong.
TEST(ReadingOf, TurnsGaugeToAbsoluteAtTheAltitudeOfTheSite) {
  PointSpec pressure;
  pressure.role = Role::suction_pressure;
  pressure.unit = Unit::kPa_gauge;
  EXPECT_NEAR(reading_of(pressure, 250.0, 1500.0, now).value_SI, 334.6e3, 50.0);
}

TEST(ReadingOf, LeavesAPowerNegative) {
  PointSpec power;
  power.role = Role::power;
  power.unit = Unit::kW;
  EXPECT_EQ(reading_of(power, -0.2, 0.0, now).value_SI, -200.0);
}

TEST(ReadingOf, AddsTheCalibrationOffsetOfItsTime) {
  PointSpec point = temperature();
  point.calibrations = {
      {.from = now - days{10},  .offset = 0.2},
      {           .from = now, .offset = -0.1}
  };
  EXPECT_NEAR(reading_of(point, 12.0, 0.0, now - days{11}).value_SI, 285.15, 1e-12);
  EXPECT_NEAR(reading_of(point, 12.0, 0.0, now - days{10}).value_SI, 285.35, 1e-12);
  EXPECT_NEAR(reading_of(point, 12.0, 0.0, now - Span{1}).value_SI, 285.35, 1e-12);
  EXPECT_NEAR(reading_of(point, 12.0, 0.0, now).value_SI, 285.05, 1e-12);
}

TEST(ReadingOf, TestsTheRangeOnWhatTheSensorSaid) {
  PointSpec point = temperature();
  point.calibrations = {
      {.from = now, .offset = 1.0}
  };
  EXPECT_EQ(reading_of(point, 150.0, 0.0, now).quality, Quality::good);
}

TEST(ReadingOf, CountsTheStepOfAnIntegerRegister) {
  PointSpec point = temperature();
  point.source = FromRegister{
      .device = "panel", .at = {.type = RawType::s16, .scale = -0.1}
  };
  const double limit = 0.15 / std::sqrt(3.0);
  const double step = 0.1 / std::sqrt(12.0);
  EXPECT_NEAR(reading_of(point, 12.0, 0.0, now).u_SI, std::hypot(limit, step), 1e-15);
}

TEST(Quantum, IsNoneForAFloatAndForAPointWithoutARegister) {
  PointSpec point = temperature();
  EXPECT_EQ(quantum(point), 0.0);
  point.source = FromRegister{
      .device = "panel", .at = {.type = RawType::f32, .scale = 0.1}
  };
  EXPECT_EQ(quantum(point), 0.0);
}

TEST(Missing, HasNoValue) {
  const Reading reading = missing(Quality::timeout, now);
  EXPECT_EQ(reading.quality, Quality::timeout);
  EXPECT_EQ(reading.time, now);
}

}  // namespace
}  // namespace lostwork
