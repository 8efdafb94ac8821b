// Faults of the synthetic machine, played through health: what is found, when, and whose fault it
// is said to be. The machine's physics are not those of the baseline. Goals E6 and E7.
#include "tests/thermo/health/played.h"

#include <chrono>
#include <cmath>
#include <functional>
#include <ostream>
#include <string>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

using testing::Ills;
using testing::played;
using testing::Played;
using testing::synthetic_history;
using testing::synthetic_start;
using testing::SyntheticOptions;

constexpr double fault_day = 90.0;
constexpr double fault_days = 40.0;  // until it is whole

double grown(double day) {
  return std::clamp((day - fault_day) / fault_days, 0.0, 1.0);
}

SyntheticOptions faulty(std::function<Ills(double)> ills) {
  SyntheticOptions options;
  options.days = fault_day + fault_days + 14.0;
  options.ills = std::move(ills);
  return options;
}

Instant day_of_year(double day) {
  return synthetic_start() +
         std::chrono::round<Span>(std::chrono::duration<double, std::ratio<86400>>{day});
}

struct Case {
  std::string name;
  std::function<Ills(double)> ills;
  Cause cause;
  Component component;  // whose lost work grows most: methods.md 6.4
};

std::ostream& operator<<(std::ostream& out, const Case& c) {
  return out << c.name;
}

class FaultOfTheMachine : public ::testing::TestWithParam<Case> {};

TEST_P(FaultOfTheMachine, IsFoundAndItsCauseNamed) {
  const Played all = played(synthetic_history(faulty(GetParam().ills)));
  const auto found = all.confirmed(FindingKind::efficiency_drift);
  ASSERT_TRUE(found);
  EXPECT_GT(*found->confirmed, day_of_year(fault_day));
  const auto last = all.last(FindingKind::efficiency_drift);
  ASSERT_FALSE(last->causes.empty());
  EXPECT_EQ(last->causes.front().cause, GetParam().cause) << text(last->causes.front().cause);
  EXPECT_EQ(last->component, GetParam().component);
  EXPECT_FALSE(all.confirmed(FindingKind::sensor_suspect));
  EXPECT_LE(last->onset.earliest, day_of_year(fault_day));
  EXPECT_GE(last->onset.latest, day_of_year(fault_day));
}

INSTANTIATE_TEST_SUITE_P(
    Faults, FaultOfTheMachine,
    ::testing::Values(
        Case{"CondenserFouled",
             [](double day) { return Ills{.condenser_resistance = 0.6 * grown(day)}; },
             Cause::condenser_fouled, Component::condenser},
        Case{"EvaporatorFouled",
             [](double day) { return Ills{.evaporator_resistance = 0.5 * grown(day)}; },
             Cause::evaporator_fouled, Component::evaporator},
        Case{"CondenserFlowLow",
             [](double day) { return Ills{.hot_flow_missing = 0.4 * grown(day)}; },
             Cause::hot_flow_low, Component::condenser},
        Case{"RefrigerantLost", [](double day) { return Ills{.charge_missing = 0.9 * grown(day)}; },
             Cause::refrigerant_low, Component::expansion},
        Case{"CompressorWorn", [](double day) { return Ills{.wear = 0.06 * grown(day)}; },
             Cause::compressor_worn, Component::compressor}),
    [](const auto& given) { return given.param.name; });

struct Bias {
  std::string name;
  Input input;
  double bias;  // K, or a share of the reading
};

std::ostream& operator<<(std::ostream& out, const Bias& b) {
  return out << b.name;
}

class BiasOfASensor : public ::testing::TestWithParam<Bias> {};

TEST_P(BiasOfASensor, IsFoundAndTheSensorNamed) {
  const Bias bias = GetParam();
  SyntheticOptions options = faulty([&bias](double day) {
    Ills ills;
    ills.bias.at(static_cast<std::size_t>(bias.input)) = bias.bias * grown(day);
    return ills;
  });
  options.days += 16.0;
  const Played all = played(synthetic_history(options));
  ASSERT_TRUE(all.confirmed(FindingKind::sensor_suspect));
  EXPECT_EQ(all.last(FindingKind::sensor_suspect)->suspect_sensors.at(0), role_of(bias.input));
  EXPECT_FALSE(all.confirmed(FindingKind::efficiency_drift));
}

INSTANTIATE_TEST_SUITE_P(Sensors, BiasOfASensor,
                         ::testing::Values(Bias{"ColdOutTooHigh", Input::cold_out, 0.5},
                                           Bias{"ColdInTooLow", Input::cold_in, -0.5},
                                           Bias{"HotOutTooLow", Input::hot_out, -0.6},
                                           Bias{"ColdFlowTooHigh", Input::cold_flow, 0.06},
                                           Bias{"PowerTooHigh", Input::power, 0.05},
                                           Bias{"DischargePressureTooHigh",
                                                Input::discharge_pressure, 0.03},
                                           Bias{"LiquidTooCold", Input::liquid_temperature, -1.5}),
                         [](const auto& given) { return given.param.name; });

SyntheticOptions without_refrigerant_side() {
  SyntheticOptions options =
      faulty([](double day) { return Ills{.wear = day < fault_day ? 0.0 : 0.06}; });
  options.refrigerant_side = false;
  return options;
}

// Six percent of the efficiency gone: 1 / 0.94 - 1 = 6.4 % more power at the same states.
TEST(ADriftAtLevelOne, IsFoundWithItsSize) {
  SyntheticOptions options = without_refrigerant_side();
  options.hot_meter = false;
  const Played all = played(synthetic_history(options));
  const auto found = all.last(FindingKind::efficiency_drift);
  ASSERT_TRUE(found);
  EXPECT_EQ(found->state, FindingState::active);
  EXPECT_NEAR(found->size.value, 0.064, 3.0 * found->size.u);
  EXPECT_FALSE(found->component);
  EXPECT_FALSE(found->cause_is_clear);
}

// The charts of flows and balances stay quiet in a fault of the machine: they confirm nothing.
TEST(ADriftAtLevelTwo, IsConfirmedWithoutAFeatureThatMachinesMove) {
  const Played all = played(synthetic_history(without_refrigerant_side()));
  const auto found = all.confirmed(FindingKind::efficiency_drift);
  ASSERT_TRUE(found);
  EXPECT_LE(*found->confirmed, day_of_year(fault_day + 14.0));
}

// Without the discharge temperature nothing but the power tells of a worn compressor.
TEST(ADriftThatNothingPlaces, IsConfirmedWhenItLasts) {
  SyntheticOptions options =
      faulty([](double day) { return Ills{.wear = day < fault_day ? 0.0 : 0.06}; });
  options.days = fault_day + 75.0;
  auto windows = synthetic_history(options);
  for (Window& window : windows) {
    window.values.at(static_cast<std::size_t>(Quantity::discharge)).reset();
  }
  const Played all = played(windows);
  const auto found = all.confirmed(FindingKind::efficiency_drift);
  ASSERT_TRUE(found);
  EXPECT_GT(*found->confirmed, day_of_year(fault_day + 14.0));
  EXPECT_FALSE(found->cause_is_clear);
}

}  // namespace
}  // namespace lostwork
