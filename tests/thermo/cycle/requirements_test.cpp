#include "thermo/cycle/requirements.h"

#include "tests/thermo/cycle/test_machine.h"
#include "thermo/cycle/ledger.h"

#include <algorithm>
#include <cmath>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

using enum Role;
using testing::Contains;
using testing::ElementsAre;
using testing::IsEmpty;
using testing::Not;

MachineModel model_with(Duty duty, const std::vector<Role>& roles) {
  MachineModel model;
  model.duty = duty;
  model.refrigerant = fluid_named("R134a");
  model.rated_power_W = 95e3;
  for (const Role role : roles) {
    model.points.push_back({.id = std::string{name(role)}, .role = role, .pair = std::nullopt});
  }
  return model;
}

const std::vector<Role> four{cold_in_temperature, cold_out_temperature, hot_in_temperature,
                             hot_out_temperature};

std::vector<Role> four_and(std::initializer_list<Role> more) {
  std::vector<Role> roles = four;
  roles.insert(roles.end(), more);
  return roles;
}

const std::vector<Role> everything =
    four_and({cold_flow, hot_flow, suction_pressure, suction_temperature, discharge_pressure,
              discharge_temperature, liquid_temperature, liquid_pressure,
              evaporator_out_temperature, power});

// Class A at 20 degC (IEC 60751) and 2 % for all else: rectangular limits.
PointUncertainty ordinary(const MachineModel& model) {
  return [roles = model.points](std::size_t point, double value_SI) {
    const bool degrees = dimension(roles.at(point).role) == Dimension::temperature;
    return (degrees ? 0.19 : 0.02 * value_SI) / std::sqrt(3.0);
  };
}

Requirements of(const MachineModel& model) {
  return requirements(model, ordinary(model)).value();
}

TEST(TypicalScan, IsOfAMachineThatObeysBothLaws) {
  for (const Duty duty : {Duty::cooling, Duty::heating}) {
    const MachineModel model = model_with(duty, everything);
    const Scan scan = typical_scan(model, ordinary(model)).value();
    const Assessment a = assess(model, scan, Mode::running);
    const double W = value(a, Quantity::power);
    EXPECT_NEAR(W, 0.8 * 95e3, 1e-6);
    EXPECT_NEAR(value(a, Quantity::isentropic_efficiency), 0.7, 1e-6);
    EXPECT_NEAR(value(a, Quantity::superheat), 5.0, 1e-6);
    // The casing's share is of the power, the suction line takes up heat.
    EXPECT_NEAR(value(a, Quantity::energy_residual), 0.0, 1e-7 * W);
    EXPECT_GT(value(a, Quantity::second_law_efficiency), 0.2);
    EXPECT_LT(value(a, Quantity::second_law_efficiency), 0.7);
  }
}

TEST(TypicalScan, LeavesOtherRolesUnread) {
  const MachineModel model = model_with(Duty::cooling, four_and({speed}));
  const Scan scan = typical_scan(model, ordinary(model)).value();
  EXPECT_EQ(scan.readings.back().quality, Quality::timeout);
}

TEST(TypicalScan, FitsAFloodedEvaporator) {
  MachineModel model = model_with(Duty::cooling, everything);
  model.evaporator = EvaporatorKind::flooded;
  const Scan scan = typical_scan(model, ordinary(model)).value();
  EXPECT_NEAR(value(assess(model, scan, Mode::running), Quantity::superheat), 0.0, 1e-6);
}

TEST(TypicalScan, RefusesAStreamWithoutAHeatCapacity) {
  MachineModel model = model_with(Duty::cooling, everything);
  model.hot.fluid = ConstantStream{.rho_cp_SI = 0.0};
  const auto scan = typical_scan(model, ordinary(model));
  ASSERT_FALSE(scan);
  EXPECT_EQ(scan.error().code, ReasonCode::implausible);
}

TEST(Requirements, TellTheLevelThatThePointsAllow) {
  EXPECT_EQ(of(model_with(Duty::cooling, four)).level, Level::L0);
  EXPECT_EQ(of(model_with(Duty::cooling, four_and({power, cold_flow}))).level, Level::L1);
  EXPECT_EQ(of(model_with(Duty::cooling, everything)).level, Level::L4);
}

TEST(Requirements, NameWhatTheNextLevelAsksFor) {
  const auto next = of(model_with(Duty::cooling, four)).next.value();
  EXPECT_EQ(next.level, Level::L1);
  EXPECT_THAT(next.missing, ElementsAre(power, cold_flow));
}

TEST(Requirements, NameTheProductsFlowOfAHeatPump) {
  EXPECT_THAT(of(model_with(Duty::heating, four_and({power}))).next->missing,
              ElementsAre(hot_flow));
}

TEST(Requirements, NameTheRefrigerantSensorsForTheComponents) {
  const auto next =
      of(model_with(Duty::cooling,
                    four_and({power, cold_flow, suction_pressure, discharge_pressure})))
          .next.value();
  EXPECT_EQ(next.level, Level::L4);
  EXPECT_THAT(next.missing,
              ElementsAre(suction_temperature, discharge_temperature, liquid_temperature));
}

TEST(Requirements, HaveNoNextLevelAtTheTop) {
  EXPECT_FALSE(of(model_with(Duty::cooling, everything)).next);
}

TEST(Requirements, SortEveryQuantityIntoAvailableOrMissing) {
  const Requirements found = of(model_with(Duty::cooling, four_and({power, cold_flow})));
  EXPECT_EQ(found.available.size() + found.missing.size(), quantity_count);
  EXPECT_THAT(found.available, Contains(Quantity::second_law_efficiency));
  EXPECT_THAT(found.available, Contains(Quantity::power_expected));
  EXPECT_THAT(found.available, Not(Contains(Quantity::lost_compressor)));
}

TEST(Requirements, SayWhyAQuantityIsMissing) {
  const Requirements found = of(model_with(Duty::cooling, four_and({power, cold_flow})));
  const auto hot = std::find_if(found.missing.begin(), found.missing.end(),
                                [](const auto& m) { return m.quantity == Quantity::hot_heat; });
  ASSERT_NE(hot, found.missing.end());
  EXPECT_EQ(hot->reason.code, ReasonCode::no_sensor);
  EXPECT_EQ(hot->reason.blame, "hot.flow");
}

// U is essentially that of the temperature difference: at 5 K, class A gives 6.2 % of the 6.8 %.
TEST(Requirements, PutTheMatchedPairOfAChillerFirst) {
  const Requirements found = of(model_with(Duty::cooling, everything));
  ASSERT_THAT(found.sensors, Not(IsEmpty()));
  EXPECT_EQ(found.sensors.front().change, SensorChange::better);
  EXPECT_THAT(found.sensors.front().roles, ElementsAre(cold_in_temperature, cold_out_temperature));
  EXPECT_EQ(found.sensors.front().limit_SI, 0.05);
  EXPECT_LT(found.sensors.front().after.u, 0.7 * found.sensors.front().before->u);
}

TEST(Requirements, PutTheOneMissingMeterFirst) {
  const Requirements found = of(model_with(Duty::cooling, four_and({power})));
  ASSERT_THAT(found.sensors, Not(IsEmpty()));
  EXPECT_EQ(found.sensors.front().change, SensorChange::added);
  EXPECT_FALSE(found.sensors.front().before);
  for (const SensorWorth& worth : found.sensors) {
    EXPECT_TRUE(worth.roles.front() == cold_flow || worth.roles.front() == hot_flow);
  }
}

TEST(Requirements, LeaveOutSensorsThatChangeNothing) {
  const Requirements found = of(model_with(Duty::cooling, everything));
  for (const SensorWorth& worth : found.sensors) {
    EXPECT_LT(worth.after.u, worth.before->u);
    EXPECT_NE(worth.roles.front(), suction_temperature);
  }
}

}  // namespace
}  // namespace lostwork::test
