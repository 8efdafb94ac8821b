// The ledger against figures computed by another route: the reference case below, and machines
// built forwards from their cycle.
#include "thermo/cycle/ledger.h"

#include "tests/thermo/cycle/test_machine.h"

#include <cmath>
#include <initializer_list>
#include <random>
#include <string>

#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

using enum Quantity;

// One R134a circuit, computed for this project by an independent program with the same equation of
// state (Tillner-Roth & Baehr 1994): evaporation at 278.15 K with 3 K superheat, condensation at
// 310.0581 K with 4 K subcooling, water 12 to 7 degC and 30 to 34.93434 degC. Its figures are
// printed to seven digits: 1e-5 of each is their rounding, and more.
struct ReferenceCase {
  static constexpr double flow_kgs = 1.996131;
  static constexpr double cold_heat_W = 316000.0;
  static constexpr double hot_heat_W = 374220.3;
  static constexpr double power_W = 59408.47;
  static constexpr double casing_W = 1188.17;
};

TestMachine reference_case(Duty duty, const Accuracy& accuracy = {}) {
  using R = ReferenceCase;
  Cycle cycle;
  cycle.duty = duty;
  cycle.hot_out_T_K = 273.15 + 34.93434;
  cycle.condensing_T_K = 310.0581;
  cycle.superheat_K = 3.0;
  TestMachine machine = make_machine(cycle, accuracy);
  MachineModel& model = machine.model;
  model.casing_T_K = 298.15;
  const double rho_cp = std::get<ConstantStream>(cycle.cold_fluid).rho_cp_SI;
  machine.values[Role::cold_flow] = R::cold_heat_W / (rho_cp * 5.0);
  machine.values[Role::hot_flow] = R::hot_heat_W / (rho_cp * 4.93434);
  machine.values[Role::power] = R::power_W;
  // The discharge temperature is printed to 1 mK, 2e-5 of the enthalpy's rise: it is taken from the
  // energy balance of the compressor instead.
  const double h2 = machine.truth.suction.h_Jkg + (R::power_W - R::casing_W) / R::flow_kgs;
  machine.values[Role::discharge_temperature] =
      state(*model.refrigerant, GivenPh{machine.truth.discharge.p_Pa, h2}).value().T_K;
  machine.scan = machine.scan_of(machine.values);
  return machine;
}

struct Figure {
  Quantity quantity;
  double expected_SI;
};

void expect_figures(const Assessment& assessment, std::initializer_list<Figure> figures) {
  for (const Figure& figure : figures) {
    EXPECT_NEAR(value(assessment, figure.quantity), figure.expected_SI,
                1e-5 * std::abs(figure.expected_SI))
        << info(figure.quantity).name;
  }
}

TEST(Ledger, AgreesWithTheReferenceCaseReadAsAChiller) {
  const TestMachine machine = reference_case(Duty::cooling);
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  expect_figures(a, {
                        {            cold_mean, 282.64263},
                        {             hot_mean, 305.61053},
                        {     refrigerant_flow,  1.996131},
                        {   entropy_compressor,  56.38259},
                        {    entropy_condenser,  19.49714},
                        {    entropy_expansion,  16.63407},
                        {   entropy_evaporator,  17.95241},
                        {        entropy_total, 110.46621},
                        {     reversible_power,  25678.56},
                        {second_law_efficiency,  0.432237},
                        {                  cop,   5.31911},
                        {            reference, 305.61053},
  });
  EXPECT_NEAR(value(a, casing_heat), 1188.17, 1e-5 * 59408.47);
  EXPECT_NEAR(value(a, lost_total), 110.46621 * 305.61053, 1e-5 * 59408.47);
}

TEST(Ledger, AgreesWithTheReferenceCaseReadAsAHeatPump) {
  const TestMachine machine = reference_case(Duty::heating);
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  expect_figures(a, {
                        {     reversible_power,   28124.0},
                        {second_law_efficiency,   0.47340},
                        {           lost_total,  31222.46},
                        {        entropy_total, 110.46621},
                        {            reference, 282.64263},
  });
}

// Two meters that agree, to the printed digits, and are as sure as each other.
TEST(Ledger, AgreesWithTheReferenceCaseByBothMeters) {
  const TestMachine machine = reference_case(Duty::cooling, {.flow_share = 0.01});
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  expect_figures(a, {
                        {  refrigerant_flow,  1.996131},
                        {entropy_compressor,  56.38259},
                        { entropy_condenser,  19.49714},
                        { entropy_expansion,  16.63407},
                        {entropy_evaporator,  17.95241},
                        {     entropy_total, 110.46621},
                        {  reversible_power,  25678.56},
  });
  EXPECT_NEAR(value(a, unaccounted), 0.0, 1e-5 * 59408.47);
}

TEST(Ledger, HasTheReferenceCasesStates) {
  const TestMachine machine = reference_case(Duty::cooling);
  EXPECT_NEAR(machine.truth.suction.p_Pa, 349659.0, 0.5);
  EXPECT_NEAR(machine.truth.discharge.p_Pa, 934882.0, 0.5);
  EXPECT_NEAR(machine.truth.suction.h_Jkg, 404245.0, 0.5);
  EXPECT_NEAR(machine.truth.liquid.h_Jkg, 245938.0, 0.5);
  EXPECT_NEAR(machine.values.at(Role::discharge_temperature), 324.279, 0.0005);
}

// A machine of the seed's choosing.
Cycle random_cycle(unsigned seed, Duty duty) {
  std::mt19937_64 random{seed};
  const auto between = [&random](double low, double high) {
    return std::uniform_real_distribution{low, high}(random);
  };
  Cycle cycle;
  cycle.duty = duty;
  if (seed % 2 == 0) {
    cycle.cold_fluid = WaterStream{};
    cycle.hot_fluid = WaterStream{};
  }
  cycle.cold_out_T_K = between(277.0, 290.0);
  cycle.cold_in_T_K = cycle.cold_out_T_K + between(0.1, 8.0);
  cycle.hot_in_T_K = cycle.cold_in_T_K + between(5.0, 30.0);
  cycle.hot_out_T_K = cycle.hot_in_T_K + between(0.1, 12.0);
  cycle.evaporating_T_K = cycle.cold_out_T_K - between(0.5, 8.0);
  cycle.condensing_T_K = cycle.hot_out_T_K + between(0.5, 8.0);
  cycle.superheat_K = between(1.0, 12.0);
  cycle.line_gain_K = seed % 3 == 0 ? 0.3 * cycle.superheat_K : 0.0;
  cycle.subcooling_K = between(0.5, 8.0);
  cycle.isentropic_efficiency = between(0.4, 0.9);
  cycle.casing_share = between(0.0, 0.12);
  cycle.flow_kgs = between(0.01, 20.0);
  return cycle;
}

// The same with another refrigerant, between brines; cool enough to condense R410A, with a liquid
// that is one beyond the glide of R407C.
Cycle random_cycle(unsigned seed, Duty duty, std::string_view refrigerant) {
  Cycle cycle = random_cycle(seed, duty);
  if (refrigerant == cycle.refrigerant) {
    return cycle;
  }
  cycle.refrigerant = refrigerant;
  cycle.cold_fluid = stream_named("propylene glycol 30 %").value();
  cycle.hot_fluid = stream_named("ethylene glycol 20 %").value();
  const double less_K = 0.5 * (cycle.hot_in_T_K - cycle.cold_in_T_K);
  cycle.hot_in_T_K -= less_K;
  cycle.hot_out_T_K -= less_K;
  cycle.condensing_T_K -= less_K;
  cycle.subcooling_K += 8.0;
  return cycle;
}

struct Case {
  unsigned seed;
  Duty duty;
  bool casing_known;  // the temperature of its surroundings is
  std::string_view refrigerant = "R134a";
};

std::vector<Case> cases() {
  std::vector<Case> all;
  for (unsigned seed = 1; seed <= 60; ++seed) {
    all.push_back({seed, seed % 4 < 2 ? Duty::cooling : Duty::heating, seed % 5 != 0});
  }
  for (const std::string_view refrigerant :
       {"R1234yf", "R1234ze(E)", "R32", "R22", "R245fa", "R1233zd(E)", "R290", "R600a", "R717",
        "R410A", "R407C", "R404A", "R507A"}) {
    all.push_back({.seed = all.back().seed + 1,
                   .duty = all.back().duty == Duty::cooling ? Duty::heating : Duty::cooling,
                   .casing_known = true,
                   .refrigerant = refrigerant});
  }
  return all;
}

class AnyMachine : public testing::TestWithParam<Case> {
 protected:
  AnyMachine() {
    if (GetParam().casing_known) {
      machine.model.casing_T_K = 296.15;
    }
  }
  [[nodiscard]] Assessment now() const {
    return assess(machine.model, machine.scan, Mode::running);
  }
  [[nodiscard]] double T0_K() const {
    return GetParam().duty == Duty::cooling ? machine.truth.hot_mean_T_K
                                            : machine.truth.cold_mean_T_K;
  }
  // The cold meter reads 5 % low, the hot one 3 % high; each known to 1 %.
  void disagree() {
    for (const Role role : {Role::cold_flow, Role::hot_flow}) {
      machine.reading(role).u_SI = 0.01 * machine.values.at(role);
    }
    machine.reading(Role::cold_flow).value_SI *= 0.95;
    machine.reading(Role::hot_flow).value_SI *= 1.03;
  }
  static double sum_of_components(const Assessment& a) {
    double sum = 0.0;
    for (const Quantity part : {entropy_compressor, entropy_condenser, entropy_expansion,
                                entropy_evaporator, entropy_lines}) {
      sum += a.values[part] ? a.values[part]->value : 0.0;
    }
    return sum;
  }
  [[nodiscard]] double around_T_K() const { return machine.model.casing_T_K.value_or(T0_K()); }

  TestMachine machine =
      make_machine(random_cycle(GetParam().seed, GetParam().duty, GetParam().refrigerant));
};

INSTANTIATE_TEST_SUITE_P(Seeded, AnyMachine, testing::ValuesIn(cases()), [](const auto& param) {
  return "Seed" + std::to_string(param.param.seed);
});

TEST_P(AnyMachine, ClosesTheLedgerAtL4) {
  const Assessment a = now();
  double sum = value(a, reversible_power) + value(a, casing) + value(a, unaccounted);
  for (const Quantity part :
       {lost_compressor, lost_condenser, lost_expansion, lost_evaporator, lost_lines}) {
    sum += a.values[part] ? a.values[part]->value : 0.0;
  }
  EXPECT_NEAR(sum, value(a, power), 1e-9 * value(a, power));
}

TEST_P(AnyMachine, ClosesTheLedgerWithoutRefrigerantSensors) {
  for (const Role role :
       {Role::suction_pressure, Role::suction_temperature, Role::discharge_pressure,
        Role::discharge_temperature, Role::liquid_temperature}) {
    machine.remove(role);
  }
  const Assessment a = now();
  EXPECT_NEAR(
      value(a, reversible_power) + value(a, lost_total) + value(a, casing) + value(a, unaccounted),
      value(a, power), 1e-9 * value(a, power));
  EXPECT_NEAR(value(a, unaccounted), 0.0, 1e-9 * value(a, power));
}

// The property code solves its states to 1e-12 or so; 1e-8 is far from every sensor.
TEST_P(AnyMachine, FindsTheHeatsAndTheFlowThatItWasBuiltFrom) {
  const Assessment a = now();
  const Truth& t = machine.truth;
  EXPECT_NEAR(value(a, cold_heat), t.cold_heat_W, 1e-8 * t.cold_heat_W);
  EXPECT_NEAR(value(a, hot_heat), t.hot_heat_W, 1e-8 * t.hot_heat_W);
  EXPECT_NEAR(value(a, refrigerant_flow),
              t.cold_heat_W / (t.evaporator_out.h_Jkg - t.valve_out.h_Jkg),
              1e-7 * value(a, refrigerant_flow));
  EXPECT_NEAR(value(a, casing_heat), t.compressor_heat_W - t.line_heat_W, 1e-7 * t.power_W);
  EXPECT_NEAR(value(a, energy_residual), 0.0, 1e-7 * t.power_W);
}

TEST_P(AnyMachine, GeneratesInItsComponentsWhatItsReservoirsTell) {
  const Assessment a = now();
  const Truth& t = machine.truth;
  const double reservoirs = t.hot_heat_W / t.hot_mean_T_K - t.cold_heat_W / t.cold_mean_T_K +
                            (t.compressor_heat_W - t.line_heat_W) / around_T_K();
  EXPECT_NEAR(value(a, entropy_total), reservoirs, 1e-7 * t.power_W / T0_K());
}

// Whatever the meters read: the refrigerant's heats at the streams' means.
TEST_P(AnyMachine, GeneratesWhatTheReservoirsTellWithTheRefrigerantsHeats) {
  disagree();
  const Assessment a = now();
  const Truth& t = machine.truth;
  const double m = value(a, refrigerant_flow);
  const double cold_W = m * (t.evaporator_out.h_Jkg - t.liquid.h_Jkg);
  const double hot_W = m * (t.discharge.h_Jkg - t.liquid.h_Jkg);
  const double casing_W = t.power_W + cold_W - hot_W;
  const double reservoirs =
      hot_W / t.hot_mean_T_K - cold_W / t.cold_mean_T_K + casing_W / around_T_K();
  EXPECT_NEAR(value(a, casing_heat), casing_W, 1e-7 * t.power_W);
  EXPECT_NEAR(sum_of_components(a), reservoirs, 1e-7 * t.power_W / T0_K());
  EXPECT_NEAR(value(a, entropy_total), reservoirs, 1e-7 * t.power_W / T0_K());
}

TEST_P(AnyMachine, ClosesTheLedgerWhereItsMetersDisagree) {
  disagree();
  const Assessment a = now();
  const double lost_W = value(a, reference) * sum_of_components(a);
  const double sum = value(a, reversible_power) + lost_W + value(a, casing) + value(a, unaccounted);
  EXPECT_NEAR(sum, value(a, power), 1e-9 * value(a, power));
}

TEST_P(AnyMachine, LeavesUnaccountedWhatRefrigerantAndProductMeterDisagreeAbout) {
  disagree();
  const Assessment a = now();
  const Truth& t = machine.truth;
  const double m = value(a, refrigerant_flow);
  const bool cooling = GetParam().duty == Duty::cooling;
  const double more_W = cooling
                            ? m * (t.evaporator_out.h_Jkg - t.liquid.h_Jkg) - 0.95 * t.cold_heat_W
                            : m * (t.discharge.h_Jkg - t.liquid.h_Jkg) - 1.03 * t.hot_heat_W;
  const double worth =
      cooling ? t.hot_mean_T_K / t.cold_mean_T_K - 1.0 : 1.0 - t.cold_mean_T_K / t.hot_mean_T_K;
  EXPECT_NEAR(value(a, unaccounted), more_W * worth, 1e-7 * t.power_W);
  EXPECT_GT(std::abs(value(a, unaccounted)), 0.01 * t.cold_heat_W * worth);
}

TEST_P(AnyMachine, GeneratesTheSameWhetherComponentsOrReservoirsAreAsked) {
  const double by_components = value(now(), entropy_total);
  const Truth& t = machine.truth;
  machine.model.casing_loss.value = (t.compressor_heat_W - t.line_heat_W) / t.power_W;
  machine.remove(Role::suction_pressure);
  EXPECT_NEAR(value(now(), entropy_total), by_components, 1e-7 * t.power_W / T0_K());
}

TEST_P(AnyMachine, LosesEntropyTimesTheReferenceTemperature) {
  const Assessment a = now();
  EXPECT_DOUBLE_EQ(value(a, reference),
                   value(a, GetParam().duty == Duty::cooling ? hot_mean : cold_mean));
  EXPECT_NEAR(value(a, lost_compressor), T0_K() * value(a, entropy_compressor), 1e-3);
  EXPECT_NEAR(value(a, lost_condenser), T0_K() * value(a, entropy_condenser), 1e-3);
  EXPECT_NEAR(value(a, lost_expansion), T0_K() * value(a, entropy_expansion), 1e-3);
  EXPECT_NEAR(value(a, lost_evaporator), T0_K() * value(a, entropy_evaporator), 1e-3);
  EXPECT_NEAR(value(a, lost_total), T0_K() * value(a, entropy_total), 1e-3);
}

TEST_P(AnyMachine, GeneratesEntropyInEveryComponent) {
  const Assessment a = now();
  for (const Quantity part :
       {entropy_compressor, entropy_condenser, entropy_expansion, entropy_evaporator}) {
    EXPECT_GT(value(a, part), 0.0) << info(part).name;
  }
}

TEST_P(AnyMachine, LeavesNoEntropyInTheRefrigerantAfterACycle) {
  const Assessment a = now();
  const Truth& t = machine.truth;
  const double streams = t.hot_heat_W / t.hot_mean_T_K - t.cold_heat_W / t.cold_mean_T_K;
  const double casing_heats = t.compressor_heat_W / around_T_K() - t.line_heat_W / around_T_K();
  EXPECT_NEAR(sum_of_components(a) - streams - casing_heats, 0.0, 1e-7 * t.power_W / T0_K());
}

TEST(Ledger, FindsNoEntropyInAReversibleMachine) {
  TestMachine machine = make_machine({});
  machine.model.casing_loss.value = 0.0;
  machine.remove(Role::suction_pressure);
  const Truth& t = machine.truth;
  machine.reading(Role::power).value_SI = t.cold_heat_W * (t.hot_mean_T_K / t.cold_mean_T_K - 1.0);
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, entropy_total), 0.0, 1e-9 * value(a, power));
  EXPECT_NEAR(value(a, second_law_efficiency), 1.0, 1e-12);
}

TEST(Ledger, FindsNoEntropyInAReversibleCompressor) {
  Cycle cycle;
  cycle.isentropic_efficiency = 1.0;
  cycle.casing_share = 0.0;
  const TestMachine machine = make_machine(cycle);
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, entropy_compressor), 0.0, 1e-8 * value(a, entropy_total));
  EXPECT_NEAR(value(a, isentropic_efficiency), 1.0, 1e-8);
}

// Heat that crosses no difference of temperature makes no entropy: saturated vapour leaves at the
// mean temperature of the stream that boiled it.
TEST(Ledger, FindsNoEntropyInAnEvaporatorWithoutADifference) {
  Cycle cycle;
  cycle.superheat_K = 0.0;
  cycle.cold_out_T_K = cycle.evaporating_T_K - 1e-3;
  cycle.cold_in_T_K = cycle.evaporating_T_K + 1e-3;
  const TestMachine machine = make_machine(cycle);
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, entropy_evaporator), 0.0, 1e-6 * value(a, entropy_total));
}

TEST(Ledger, TakesTheProductFromTheEnergyBalanceWhereOnlyTheOtherStreamIsMetered) {
  for (const Duty duty : {Duty::cooling, Duty::heating}) {
    Cycle cycle;
    cycle.duty = duty;
    TestMachine machine = make_machine(cycle);
    const double expected =
        value(assess(machine.model, machine.scan, Mode::running), reversible_power);
    machine.remove(duty == Duty::cooling ? Role::cold_flow : Role::hot_flow);
    const Assessment a = assess(machine.model, machine.scan, Mode::running);
    EXPECT_NEAR(value(a, reversible_power), expected, 1e-8 * expected);
    EXPECT_EQ(reason(a, duty == Duty::cooling ? cold_heat : hot_heat).code, ReasonCode::no_sensor);
  }
}

TEST(Ledger, TakesTheFlowFromThePowerBalanceWithoutAnyMeter) {
  TestMachine machine = make_machine({});
  machine.remove(Role::cold_flow);
  machine.remove(Role::hot_flow);
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, refrigerant_flow), 2.0, 2e-8);
  EXPECT_EQ(reason(a, reversible_power).code, ReasonCode::no_sensor);
}

TEST(Ledger, KeepsItsRouteWhenTheMeterIsNotRead) {
  TestMachine machine = make_machine({});
  machine.reading(Role::cold_flow).quality = Quality::timeout;
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_EQ(reason(a, refrigerant_flow).code, ReasonCode::not_read);
  EXPECT_EQ(reason(a, refrigerant_flow).blame, "cold.flow");
}

TEST(Ledger, ReportsWhatTheCasingWouldHaveToLose) {
  TestMachine machine = make_machine({});
  machine.reading(Role::cold_flow).value_SI *= 0.7;  // 30 % of the work is then not found again
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, casing_heat) / value(a, power), 1.0 - 0.7 * 0.98, 1e-6);
}

TEST(Ledger, ConvertsAFlowWithTheDensityAtItsMeter) {
  Cycle cycle;
  cycle.cold_fluid = WaterStream{};
  TestMachine machine = make_machine(cycle);
  machine.model.cold.flow_at = FlowPlace::out;
  const double ratio = stream_state(WaterStream{}, cycle.cold_out_T_K)->rho_kgm3 /
                       stream_state(WaterStream{}, cycle.cold_in_T_K)->rho_kgm3;
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, cold_heat), ratio * machine.truth.cold_heat_W, 1e-2);
}

TEST(Ledger, TakesAMassFlowAsItIs) {
  TestMachine machine = make_machine({});
  const double kgs = 1000.0 * machine.reading(Role::cold_flow).value_SI;
  machine.point(Role::cold_flow).mass_flow = true;
  machine.reading(Role::cold_flow).value_SI = kgs;
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_DOUBLE_EQ(value(a, cold_flow), kgs);
  EXPECT_NEAR(value(a, cold_heat), machine.truth.cold_heat_W, 1e-2);
}

TEST(Ledger, MeasuresTheApproachesFromTheDewTemperatures) {
  const TestMachine machine = make_machine({});
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, cold_approach), 280.15 - 278.15, 1e-6);
  EXPECT_NEAR(value(a, hot_approach), 311.15 - 308.15, 1e-6);
  EXPECT_NEAR(value(a, superheat), 5.0, 1e-6);
  EXPECT_NEAR(value(a, subcooling), 4.0, 1e-6);
  EXPECT_NEAR(value(a, isentropic_efficiency), 0.7, 1e-7);
}

TEST(Ledger, TakesThePressureOfTheLiquidWhereItIsRead) {
  TestMachine machine = make_machine({});
  const double lower_Pa = machine.truth.liquid.p_Pa - 30e3;
  machine.model.points.push_back({.id = "p3", .role = Role::liquid_pressure, .pair = std::nullopt});
  machine.scan.readings.push_back(
      {.value_SI = lower_Pa, .u_SI = 0.0, .quality = Quality::good, .time = {}});
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  const double bubble_T_K =
      saturation_at_p(*machine.model.refrigerant, lower_Pa).value().liquid.T_K;
  EXPECT_NEAR(value(a, subcooling), bubble_T_K - machine.truth.liquid.T_K, 1e-9);
}

// Then no vapour forms in the valve: its outlet is liquid, and found by its enthalpy.
TEST(Ledger, ClosesWhereTheLiquidIsColderThanTheEvaporator) {
  Cycle cycle;
  cycle.subcooling_K = 40.0;
  const TestMachine machine = make_machine(cycle);
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, entropy_expansion),
              2.0 * (machine.truth.valve_out.s_JkgK - machine.truth.liquid.s_JkgK), 1e-6);
  EXPECT_NEAR(
      value(a, reversible_power) + value(a, lost_total) + value(a, casing) + value(a, unaccounted),
      value(a, power), 1e-9 * value(a, power));
}

// Two paths between the same states: first along the isobar and then the isotherm, or the other way
// round. Simpson's rule with 64 steps leaves less than 1e-8 of these changes.
TEST(Refrigerant, ChangesItsEntropyAlikeOnTwoPaths) {
  const Fluid& fluid = *fluid_named("R134a");
  const auto along = [&](GivenTp from, GivenTp to) {
    const auto slope = [&](double share) {
      const double T_K = from.T_K + share * (to.T_K - from.T_K);
      const double p_Pa = from.p_Pa + share * (to.p_Pa - from.p_Pa);
      const State at = state(fluid, GivenTp{T_K, p_Pa}).value();
      const SinglePhase& phase = at.single.value();
      return phase.cp_JkgK / T_K * (to.T_K - from.T_K) -
             phase.expansion_T / (at.rho_kgm3 * T_K) * (to.p_Pa - from.p_Pa);
    };
    double sum = 0.0;
    constexpr int steps = 64;
    for (int i = 0; i < steps; ++i) {
      sum +=
          (slope(double(i) / steps) + 4.0 * slope((i + 0.5) / steps) + slope((i + 1.0) / steps)) /
          (6.0 * steps);
    }
    return sum;
  };
  const GivenTp low{290.0, 200e3};
  const GivenTp high{340.0, 800e3};
  const double isobar_first = along(low, {high.T_K, low.p_Pa}) + along({high.T_K, low.p_Pa}, high);
  const double whole = state(fluid, high).value().s_JkgK - state(fluid, low).value().s_JkgK;
  const double isotherm_first =
      along({310.0, 200e3}, {310.0, 700e3}) + along({310.0, 700e3}, {340.0, 700e3});
  const double other_way =
      along({310.0, 200e3}, {340.0, 200e3}) + along({340.0, 200e3}, {340.0, 700e3});
  EXPECT_NEAR(isobar_first, whole, 1e-6);
  EXPECT_NEAR(isotherm_first, other_way, 1e-6);
}

}  // namespace
}  // namespace lostwork::test
