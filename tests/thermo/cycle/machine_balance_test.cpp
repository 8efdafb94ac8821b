// The refrigerant's flow from two meters, and what they disagree about.
#include "thermo/cycle/machine_balance.h"

#include "tests/thermo/cycle/test_machine.h"
#include "thermo/cycle/ledger.h"

#include <string>

#include <gtest/gtest.h>

namespace lostwork::test {
namespace {

using enum Quantity;

// Both meters of a machine of either duty; no other sensor errs unless a test says so.
class TwoMeters : public testing::TestWithParam<Duty> {
 protected:
  static Cycle cycle() {
    Cycle cycle;
    cycle.duty = GetParam();
    return cycle;
  }
  [[nodiscard]] bool cooling() const { return GetParam() == Duty::cooling; }
  [[nodiscard]] Role product_flow() const { return cooling() ? Role::cold_flow : Role::hot_flow; }
  [[nodiscard]] Role other_flow() const { return cooling() ? Role::hot_flow : Role::cold_flow; }
  void set_u_share(Role role, double share) {
    machine.reading(role).u_SI = share * machine.values.at(role);
  }
  // The disagreement of the two, in opposite senses.
  void disagree() {
    machine.reading(product_flow()).value_SI *= 0.96;
    machine.reading(other_flow()).value_SI *= 1.03;
  }
  [[nodiscard]] Assessment now() const {
    return assess(machine.model, machine.scan, Mode::running);
  }
  [[nodiscard]] Assessment without(Role role) const {
    TestMachine other = machine;
    other.remove(role);
    return assess(other.model, other.scan, Mode::running);
  }
  // Work that one watt of the product is worth.
  [[nodiscard]] double worth() const {
    const Truth& t = machine.truth;
    return cooling() ? t.hot_mean_T_K / t.cold_mean_T_K - 1.0
                     : 1.0 - t.cold_mean_T_K / t.hot_mean_T_K;
  }
  [[nodiscard]] double product_heat_W() const {
    return cooling() ? machine.truth.cold_heat_W : machine.truth.hot_heat_W;
  }

  TestMachine machine = make_machine(cycle());
};

INSTANTIATE_TEST_SUITE_P(Duties, TwoMeters, testing::Values(Duty::cooling, Duty::heating),
                         [](const auto& param) {
                           return std::string{param.param == Duty::cooling ? "Cooling" : "Heating"};
                         });

// Every state is solved to 1e-12 or so.
TEST_P(TwoMeters, ThatAgreeChangeNoFigure) {
  const Assessment product_alone = now();
  set_u_share(product_flow(), 0.02);
  set_u_share(other_flow(), 0.01);
  const Assessment both = now();
  for (const Quantity q :
       {refrigerant_flow, casing_heat, entropy_compressor, entropy_condenser, entropy_expansion,
        entropy_evaporator, entropy_total, lost_total, reversible_power, second_law_efficiency}) {
    EXPECT_NEAR(value(both, q), value(product_alone, q), 1e-9 * value(product_alone, power))
        << info(q).name;
  }
  EXPECT_NEAR(value(both, refrigerant_flow), 2.0, 1e-9);
  EXPECT_NEAR(value(both, unaccounted), 0.0, 1e-9 * value(both, power));
}

// Shares of 2 % and 1 %: variances of 4 to 1.
TEST_P(TwoMeters, CountByTheInverseOfTheirVariances) {
  set_u_share(product_flow(), 0.02);
  set_u_share(other_flow(), 0.01);
  disagree();
  EXPECT_NEAR(value(now(), refrigerant_flow), 2.0 * (0.2 * 0.96 + 0.8 * 1.03), 1e-8);
}

TEST_P(TwoMeters, CountAsTheProductMeterAloneWithoutUncertainties) {
  disagree();
  EXPECT_NEAR(value(now(), refrigerant_flow), 2.0 * 0.96, 1e-8);
  EXPECT_NEAR(value(now(), unaccounted), 0.0, 1e-9 * value(now(), power));
}

// Variances of 0.5^2 to 0.001^2: the other meter keeps a share of 4e-6.
TEST_P(TwoMeters, CountAsTheProductMeterWhereTheOtherIsUnsure) {
  set_u_share(product_flow(), 0.001);
  set_u_share(other_flow(), 0.5);
  disagree();
  EXPECT_NEAR(value(now(), refrigerant_flow), 2.0 * (0.96 + 0.07 * 4e-6), 1e-8);
}

TEST_P(TwoMeters, CountAsTheOtherMeterWhereTheProductsIsUnsure) {
  set_u_share(product_flow(), 0.5);
  set_u_share(other_flow(), 0.001);
  disagree();
  EXPECT_NEAR(value(now(), refrigerant_flow), 2.0 * (1.03 - 0.07 * 4e-6), 1e-8);
}

// Both flows fall with the liquid's enthalpy, that of the shorter difference more: no mean with
// positive weights is surer than the longer difference, the condenser's.
TEST_P(TwoMeters, AreNeverExtrapolatedWhereTheyShareTheirError) {
  machine.reading(Role::liquid_temperature).u_SI = 0.3;
  disagree();
  const double hot_meter = cooling() ? 1.03 : 0.96;
  EXPECT_NEAR(value(now(), refrigerant_flow), 2.0 * hot_meter, 1e-8);
}

TEST_P(TwoMeters, GiveASurerFlowThanEitherAlone) {
  machine = make_machine(cycle(), {.stream_T_K = 0.05,
                                   .refrigerant_T_K = 0.2,
                                   .pressure_Pa = 3e3,
                                   .flow_share = 0.01,
                                   .power_share = 0.006});
  const double both = u(now(), refrigerant_flow);
  EXPECT_LT(both, 0.95 * u(without(product_flow()), refrigerant_flow));
  EXPECT_LT(both, 0.95 * u(without(other_flow()), refrigerant_flow));
}

// Both are as sure as each other: the refrigerant's flow is 2.5 % low, and so are its heats.
TEST_P(TwoMeters, LeaveALowProductMeterUnaccounted) {
  set_u_share(product_flow(), 0.01);
  set_u_share(other_flow(), 0.01);
  machine.reading(product_flow()).value_SI *= 0.95;
  const Assessment a = now();
  EXPECT_NEAR(value(a, unaccounted), 0.025 * product_heat_W() * worth(), 1e-7 * value(a, power));
  EXPECT_GT(value(a, unaccounted), u(a, unaccounted));
}

// W + Q_L - Q_H - Q_a, of which Q_a = W - m (h2 - h1) rises by 2.5 % of the work on the gas.
TEST_P(TwoMeters, LeaveALowProductMeterInTheEnergyResidual) {
  set_u_share(product_flow(), 0.01);
  set_u_share(other_flow(), 0.01);
  machine.reading(product_flow()).value_SI *= 0.95;
  const Assessment a = now();
  const double gas_W = machine.truth.power_W - machine.truth.compressor_heat_W;
  const double product_W = (cooling() ? -0.05 : 0.05) * product_heat_W();
  EXPECT_NEAR(value(a, energy_residual), product_W - 0.025 * gas_W, 1e-7 * value(a, power));
  EXPECT_EQ(value(a, energy_residual) < 0.0, cooling());
}

TEST_P(TwoMeters, CountAsTheProductMeterAloneWhileTheOtherIsNotRead) {
  set_u_share(product_flow(), 0.02);
  set_u_share(other_flow(), 0.01);
  disagree();
  machine.reading(other_flow()).quality = Quality::timeout;
  const Assessment dead = now();
  const Assessment none = without(other_flow());
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto q = static_cast<Quantity>(i);
    ASSERT_EQ(dead.values[q].has_value(), none.values[q].has_value()) << info(q).name;
    if (dead.values[q]) {
      EXPECT_EQ(value(dead, q), value(none, q)) << info(q).name;
      EXPECT_EQ(u(dead, q), u(none, q)) << info(q).name;
    }
  }
  EXPECT_GT(value(dead, lost_compressor), 0.0);
}

TEST_P(TwoMeters, PassOnWhyTheProductsIsNotRead) {
  machine.reading(product_flow()).quality = Quality::timeout;
  for (const Quantity q : {refrigerant_flow, lost_compressor, lost_expansion}) {
    EXPECT_EQ(reason(now(), q).code, ReasonCode::not_read) << info(q).name;
    EXPECT_EQ(reason(now(), q).blame, name(product_flow())) << info(q).name;
  }
}

// The condenser's inlet is what the hot meter needs, and the compressor: not the product's flow.
TEST(TwoMetersOfAChiller, CountAsTheProductMeterAloneWithoutTheDischargeState) {
  TestMachine machine = make_machine({}, {.flow_share = 0.01});
  machine.reading(Role::hot_flow).value_SI *= 1.03;
  machine.reading(Role::discharge_temperature).quality = Quality::stuck;
  const Assessment a = assess(machine.model, machine.scan, Mode::running);
  EXPECT_NEAR(value(a, refrigerant_flow), 2.0, 1e-8);
  EXPECT_GT(value(a, lost_evaporator), 0.0);
}

}  // namespace
}  // namespace lostwork::test
