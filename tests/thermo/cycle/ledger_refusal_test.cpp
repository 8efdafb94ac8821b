// What the ledger does not answer, and why.
#include "tests/thermo/cycle/test_machine.h"
#include "thermo/cycle/ledger.h"

#include <cmath>
#include <limits>
#include <string>

#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

using enum Quantity;

class RefusalTest : public testing::Test {
 protected:
  explicit RefusalTest(const Cycle& cycle = {}) : machine{make_machine(cycle, accuracy)} {}

  static constexpr Accuracy accuracy{.stream_T_K = 0.05,
                                     .refrigerant_T_K = 0.3,
                                     .pressure_Pa = 3e3,
                                     .flow_share = 0.01,
                                     .power_share = 0.005};
  [[nodiscard]] Assessment now(Mode mode = Mode::running) const {
    return assess(machine.model, machine.scan, mode);
  }
  void set(Role role, double value_SI) { machine.reading(role).value_SI = value_SI; }
  void expect_refused(Quantity quantity, ReasonCode code, std::string_view blame) const {
    const Reason why = reason(now(), quantity);
    EXPECT_EQ(name(why.code), name(code)) << info(quantity).name;
    EXPECT_EQ(why.blame, blame) << info(quantity).name;
  }

  TestMachine machine;
};

using LedgerReading = RefusalTest;

TEST_F(LedgerReading, IsRefusedWithoutASensor) {
  machine.remove(Role::cold_flow);
  machine.remove(Role::hot_flow);
  expect_refused(cold_heat, ReasonCode::no_sensor, "cold.flow");
  expect_refused(cop, ReasonCode::no_sensor, "cold.flow");
  expect_refused(second_law_efficiency, ReasonCode::no_sensor, "cold.flow");
}

TEST_F(LedgerReading, IsRefusedWhenTheBusDoesNotAnswer) {
  machine.reading(Role::power).quality = Quality::timeout;
  expect_refused(power, ReasonCode::not_read, "power");
  expect_refused(second_law_efficiency, ReasonCode::not_read, "power");
}

TEST_F(LedgerReading, IsRefusedWhereTheScanEndsEarly) {
  machine.scan.readings.clear();
  expect_refused(cold_heat, ReasonCode::not_read, "cold.flow");
}

TEST_F(LedgerReading, IsRefusedWhenItIsASentinel) {
  machine.reading(Role::hot_out_temperature) = {
      .value_SI = -3276.8, .u_SI = 0.1, .quality = Quality::sentinel, .time = {}};
  expect_refused(hot_mean, ReasonCode::bad_quality, "hot.out.temperature");
  expect_refused(lift, ReasonCode::bad_quality, "hot.out.temperature");
  expect_refused(reversible_power, ReasonCode::bad_quality, "hot.out.temperature");
}

TEST_F(LedgerReading, IsRefusedWhenItIsNotANumber) {
  set(Role::cold_in_temperature, std::numeric_limits<double>::quiet_NaN());
  expect_refused(cold_in, ReasonCode::implausible, "cold.in.temperature");
  expect_refused(second_law_efficiency, ReasonCode::implausible, "cold.in.temperature");
}

TEST_F(LedgerReading, IsRefusedWhenItsUncertaintyIsNotANumber) {
  machine.reading(Role::power).u_SI = std::numeric_limits<double>::quiet_NaN();
  expect_refused(power, ReasonCode::implausible, "power");
}

TEST_F(LedgerReading, IsRefusedAtAnImpossiblePressure) {
  set(Role::suction_pressure, -101e3);
  expect_refused(evaporating, ReasonCode::implausible, "suction.pressure");
}

TEST_F(LedgerReading, IsRefusedWhenThePowerFlowsBackwards) {
  set(Role::power, -50e3);
  expect_refused(power, ReasonCode::implausible, "power");
}

TEST_F(LedgerReading, IsRefusedOutsideTheFluidsRange) {
  set(Role::discharge_pressure, 5e6);  // above R134a's critical pressure
  expect_refused(condensing, ReasonCode::outside_fluid, "discharge.pressure");
  set(Role::discharge_temperature, 700.0);
  expect_refused(entropy_compressor, ReasonCode::outside_fluid, "discharge.pressure");
}

TEST_F(LedgerReading, IsRefusedWhereWaterWouldFreeze) {
  machine.model.cold.fluid = WaterStream{};
  set(Role::cold_out_temperature, 263.15);
  expect_refused(cold_mean, ReasonCode::outside_fluid, "cold.out.temperature");
}

TEST_F(LedgerReading, IsRefusedOnASecondCircuit) {
  machine.model.points.push_back(
      {.id = "c2", .role = Role::suction_pressure, .circuit = 2, .pair = std::nullopt});
  machine.scan.readings.push_back(
      {.value_SI = 350e3, .u_SI = 1e3, .quality = Quality::good, .time = {}});
  expect_refused(evaporating, ReasonCode::not_applicable, "suction.pressure");
  expect_refused(lost_compressor, ReasonCode::not_applicable, "suction.pressure");
  EXPECT_GT(value(now(), second_law_efficiency), 0.0);
}

TEST_F(LedgerReading, LeavesWhatDoesNotNeedIt) {
  machine.reading(Role::discharge_temperature).quality = Quality::stuck;
  const Assessment a = now();
  EXPECT_GT(value(a, second_law_efficiency), 0.0);
  EXPECT_GT(value(a, lost_evaporator), 0.0);
  EXPECT_GT(value(a, lost_total), 0.0);
  expect_refused(lost_compressor, ReasonCode::bad_quality, "discharge.temperature");
}

using LedgerFlow = RefusalTest;

TEST_F(LedgerFlow, OfNothingCarriesNoHeat) {
  set(Role::cold_flow, 0.0);
  expect_refused(cold_heat, ReasonCode::zero_flow, "cold.flow");
  expect_refused(second_law_efficiency, ReasonCode::zero_flow, "cold.flow");
  EXPECT_EQ(value(now(), cold_flow), 0.0);
}

TEST_F(LedgerFlow, WithinItsUncertaintyOfNothingCarriesNoHeat) {
  machine.reading(Role::hot_flow) = {
      .value_SI = -1e-4, .u_SI = 2e-4, .quality = Quality::good, .time = {}};
  expect_refused(hot_heat, ReasonCode::zero_flow, "hot.flow");
  expect_refused(energy_residual, ReasonCode::zero_flow, "hot.flow");
}

using LedgerIdle = RefusalTest;

TEST_F(LedgerIdle, HasNoBalance) {
  const Assessment a = now(Mode::off);
  for (const Quantity q :
       {cop, second_law_efficiency, reversible_power, entropy_total, lost_total, lost_compressor,
        casing, unaccounted, superheat, subcooling, lift, cop_reversible, isentropic_efficiency,
        cold_approach, hot_approach, refrigerant_flow, energy_residual}) {
    EXPECT_EQ(reason(a, q).code, ReasonCode::machine_off) << info(q).name;
  }
}

TEST_F(LedgerIdle, KeepsWhatIsPlainlyMeasured) {
  const Assessment a = now(Mode::off);
  for (const Quantity q :
       {power, cold_heat, hot_heat, cold_in, cold_out, hot_in, hot_out, cold_mean, hot_mean,
        evaporating, condensing, pressure_ratio, discharge, cold_flow, hot_flow}) {
    EXPECT_TRUE(a.values[q]) << info(q).name;
  }
}

TEST_F(LedgerIdle, IsToldFromThePower) {
  set(Role::power, 0.01 * machine.model.rated_power_W);
  expect_refused(second_law_efficiency, ReasonCode::machine_off, "power");
  EXPECT_NEAR(value(now(), power), 0.01 * machine.model.rated_power_W, 1e-9);
}

TEST_F(LedgerIdle, HasNoBalanceInADefrost) {
  EXPECT_EQ(reason(now(Mode::defrost), lost_total).code, ReasonCode::not_applicable);
}

TEST_F(LedgerIdle, HasNoBalanceWhereTheModeIsNotKnown) {
  EXPECT_EQ(reason(now(Mode::unknown), lost_total).code, ReasonCode::not_read);
  EXPECT_EQ(reason(now(Mode::unknown), lost_total).blame, "mode");
}

TEST_F(LedgerIdle, TellsLiftAndReversibleCopWithoutAnyPower) {
  machine.remove(Role::power);
  const Assessment a = now(Mode::unknown);
  EXPECT_GT(value(a, lift), 20.0);
  EXPECT_GT(value(a, cop_reversible), 10.0);
  EXPECT_EQ(reason(a, second_law_efficiency).code, ReasonCode::no_sensor);
}

TEST_F(LedgerIdle, ComputesTheBalanceWhileStarting) {
  EXPECT_GT(value(now(Mode::starting), lost_total), 0.0);
}

TEST_F(LedgerIdle, LeavesWhatTheBaselineExpectsToTheCaller) {
  EXPECT_EQ(reason(now(), power_expected).code, ReasonCode::no_baseline);
  EXPECT_EQ(reason(now(), power_residual).code, ReasonCode::no_baseline);
  EXPECT_FALSE(now().steady);
}

using LedgerEfficiency = RefusalTest;

TEST_F(LedgerEfficiency, IsRefusedAtALowLoad) {
  machine.model.rated_power_W *= 10.5;
  expect_refused(second_law_efficiency, ReasonCode::load_too_small, "power");
  EXPECT_GT(value(now(), cop), 0.0);
}

TEST_F(LedgerEfficiency, IsRefusedWhereTheProductIsNoise) {
  set(Role::cold_out_temperature, machine.reading(Role::cold_in_temperature).value_SI - 0.1);
  expect_refused(second_law_efficiency, ReasonCode::load_too_small, "product heat");
}

TEST_F(LedgerEfficiency, IsRefusedAtASmallLift) {
  set(Role::hot_in_temperature, 282.65);
  set(Role::hot_out_temperature, 287.65);
  expect_refused(second_law_efficiency, ReasonCode::lift_too_small, "lift");
  EXPECT_GT(value(now(), reversible_power), 0.0);
}

TEST_F(LedgerEfficiency, IsNotNeededWhereTheHeatWouldFlowByItself) {
  set(Role::hot_in_temperature, 275.15);
  set(Role::hot_out_temperature, 280.15);
  expect_refused(second_law_efficiency, ReasonCode::not_needed, "lift");
  expect_refused(cop_reversible, ReasonCode::not_needed, "lift");
}

TEST_F(LedgerEfficiency, LeavesTheLedgerClosedWhereNoLiftIsNeeded) {
  set(Role::hot_in_temperature, 275.15);
  set(Role::hot_out_temperature, 280.15);
  const Assessment a = now();
  EXPECT_LT(value(a, reversible_power), 0.0);
  EXPECT_NEAR(
      value(a, reversible_power) + value(a, lost_total) + value(a, casing) + value(a, unaccounted),
      value(a, power), 1e-9 * value(a, power));
}

TEST_F(LedgerEfficiency, ContradictsTheSecondLawAboveOne) {
  set(Role::power, 0.3 * machine.truth.power_W);
  machine.model.rated_power_W *= 0.3;
  expect_refused(second_law_efficiency, ReasonCode::contradicts, "second law");
}

TEST_F(LedgerEfficiency, ReportsDestroyedEntropyUnclipped) {
  set(Role::power, 0.3 * machine.truth.power_W);
  machine.model.rated_power_W *= 0.3;
  EXPECT_LT(value(now(), entropy_total), 0.0);
}

using LedgerSwap = RefusalTest;

TEST_F(LedgerSwap, OfTheColdStreamsEndsContradicts) {
  std::swap(machine.reading(Role::cold_in_temperature).value_SI,
            machine.reading(Role::cold_out_temperature).value_SI);
  expect_refused(cold_heat, ReasonCode::contradicts, "cold.out.temperature");
  expect_refused(second_law_efficiency, ReasonCode::contradicts, "cold.out.temperature");
  expect_refused(refrigerant_flow, ReasonCode::contradicts, "cold.out.temperature");
}

TEST_F(LedgerSwap, OfTheHotStreamsEndsContradicts) {
  std::swap(machine.reading(Role::hot_in_temperature).value_SI,
            machine.reading(Role::hot_out_temperature).value_SI);
  expect_refused(hot_heat, ReasonCode::contradicts, "hot.out.temperature");
  expect_refused(energy_residual, ReasonCode::contradicts, "hot.out.temperature");
}

TEST_F(LedgerSwap, OfHotAndColdStreamContradicts) {
  std::swap(machine.reading(Role::cold_in_temperature).value_SI,
            machine.reading(Role::hot_in_temperature).value_SI);
  std::swap(machine.reading(Role::cold_out_temperature).value_SI,
            machine.reading(Role::hot_out_temperature).value_SI);
  expect_refused(cold_heat, ReasonCode::contradicts, "cold.out.temperature");
  expect_refused(hot_heat, ReasonCode::contradicts, "hot.out.temperature");
  expect_refused(second_law_efficiency, ReasonCode::contradicts, "cold.out.temperature");
}

TEST_F(LedgerSwap, LeavesHeatOfADefrostWithItsSign) {
  std::swap(machine.reading(Role::hot_in_temperature).value_SI,
            machine.reading(Role::hot_out_temperature).value_SI);
  EXPECT_LT(value(now(Mode::defrost), hot_heat), 0.0);
}

TEST_F(LedgerSwap, OfThePressuresContradicts) {
  std::swap(machine.reading(Role::suction_pressure).value_SI,
            machine.reading(Role::discharge_pressure).value_SI);
  expect_refused(evaporating, ReasonCode::contradicts, "suction.pressure");
  expect_refused(pressure_ratio, ReasonCode::contradicts, "suction.pressure");
  expect_refused(lost_compressor, ReasonCode::contradicts, "suction.pressure");
  EXPECT_GT(value(now(), second_law_efficiency), 0.0);
}

TEST_F(LedgerSwap, OfSuctionAndDischargeTemperatureContradicts) {
  std::swap(machine.reading(Role::suction_temperature).value_SI,
            machine.reading(Role::discharge_temperature).value_SI);
  expect_refused(lost_compressor, ReasonCode::contradicts, "discharge.temperature");
  expect_refused(isentropic_efficiency, ReasonCode::contradicts, "discharge.temperature");
}

TEST_F(LedgerSwap, OfLiquidAndDischargeTemperatureContradicts) {
  std::swap(machine.reading(Role::liquid_temperature).value_SI,
            machine.reading(Role::discharge_temperature).value_SI);
  expect_refused(subcooling, ReasonCode::contradicts, "liquid.temperature");
  expect_refused(lost_expansion, ReasonCode::contradicts, "liquid.temperature");
}

TEST_F(LedgerSwap, OfSuctionAndLiquidTemperatureContradicts) {
  set(Role::suction_temperature, 270.0);  // 8 K below the dew temperature
  expect_refused(superheat, ReasonCode::contradicts, "suction.temperature");
  expect_refused(lost_evaporator, ReasonCode::contradicts, "suction.temperature");
}

using LedgerLines = RefusalTest;

TEST_F(LedgerLines, HaveNoSensorWithoutTheEvaporatorsOutlet) {
  expect_refused(entropy_lines, ReasonCode::no_sensor, "evaporator_out.temperature");
  expect_refused(lost_lines, ReasonCode::no_sensor, "evaporator_out.temperature");
}

// By the cold meter alone, whose flow shows the states that were taken.
class LedgerNearSaturation : public RefusalTest {
 protected:
  LedgerNearSaturation()
      : line{saturation_at_p(*machine.model.refrigerant, machine.truth.suction.p_Pa).value()} {
    machine.remove(Role::hot_flow);
  }
  [[nodiscard]] double product_flow(double h_Jkg) const {
    return machine.truth.cold_heat_W / (h_Jkg - machine.truth.valve_out.h_Jkg);
  }
  Saturation line;
};

TEST_F(LedgerNearSaturation, TakesAFloodedEvaporatorsSuctionAsDry) {
  machine.model.evaporator = EvaporatorKind::flooded;
  set(Role::suction_temperature, line.vapour.T_K + 0.2);  // below u = 0.3 K
  EXPECT_NEAR(value(now(), refrigerant_flow), product_flow(line.vapour.h_Jkg), 1e-6);
}

// The interval of quality 0.98 to 1 is 0.0115 of the evaporation enthalpy, over the enthalpy that
// the evaporator adds.
TEST_F(LedgerNearSaturation, DoubtsTheQualityOfAFloodedEvaporatorsSuction) {
  machine.model.evaporator = EvaporatorKind::flooded;
  set(Role::suction_temperature, line.vapour.T_K);
  for (Reading& reading : machine.scan.readings) {
    reading.u_SI = 0.0;
  }
  const Assessment a = now();
  const double share = 0.02 / std::sqrt(3.0) * (line.vapour.h_Jkg - line.liquid.h_Jkg) /
                       (line.vapour.h_Jkg - machine.truth.valve_out.h_Jkg);
  EXPECT_NEAR(u(a, refrigerant_flow) / value(a, refrigerant_flow), share, 1e-6);
}

TEST_F(LedgerNearSaturation, TakesADryEvaporatorsSuperheatAsItIs) {
  set(Role::suction_temperature, line.vapour.T_K + 0.2);
  const State at =
      state(*machine.model.refrigerant, GivenTp{line.vapour.T_K + 0.2, machine.truth.suction.p_Pa})
          .value();
  EXPECT_NEAR(value(now(), refrigerant_flow), product_flow(at.h_Jkg), 1e-6);
}

TEST_F(LedgerNearSaturation, TakesVapourALittleBelowItsDewTemperatureAsDry) {
  set(Role::suction_temperature, line.vapour.T_K - 0.4);  // below 2 u
  EXPECT_NEAR(value(now(), refrigerant_flow), product_flow(line.vapour.h_Jkg), 1e-6);
}

TEST_F(LedgerNearSaturation, NeverTrustsALiquidWithinItsUncertaintyOfBoiling) {
  const Saturation high =
      saturation_at_p(*machine.model.refrigerant, machine.truth.discharge.p_Pa).value();
  const double expected =
      machine.truth.cold_heat_W / (machine.truth.suction.h_Jkg - high.liquid.h_Jkg);
  for (const double above_K : {-0.2, 0.0, 0.3}) {
    set(Role::liquid_temperature, high.liquid.T_K + above_K);
    EXPECT_NEAR(value(now(), refrigerant_flow), expected, 1e-6);
  }
}

class LedgerLevel : public RefusalTest {
 protected:
  void read_no_more(std::initializer_list<Role> roles) {
    for (const Role role : roles) {
      machine.reading(role).quality = Quality::timeout;
    }
  }
};

TEST_F(LedgerLevel, IsFourWithAllSensors) {
  EXPECT_EQ(now().level, Level::L4);
}

TEST_F(LedgerLevel, IsFourWithoutAnyFlow) {
  read_no_more({Role::cold_flow, Role::hot_flow});
  EXPECT_EQ(now().level, Level::L4);
}

TEST_F(LedgerLevel, IsThreeWithoutTheLiquidTemperature) {
  read_no_more({Role::liquid_temperature});
  EXPECT_EQ(now().level, Level::L3);
}

TEST_F(LedgerLevel, IsTwoWithoutAPressure) {
  read_no_more({Role::suction_pressure});
  EXPECT_EQ(now().level, Level::L2);
}

TEST_F(LedgerLevel, IsOneWithOneFlow) {
  read_no_more({Role::suction_pressure, Role::cold_flow});
  EXPECT_EQ(now().level, Level::L1);
}

TEST_F(LedgerLevel, IsNoughtWithoutPower) {
  read_no_more({Role::suction_pressure, Role::power});
  EXPECT_EQ(now().level, Level::L0);
}

}  // namespace
}  // namespace lostwork::test
