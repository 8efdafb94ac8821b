// Every row of the independent tables, in every direction (goals.md E1).
//
// Source: tests/reference/*_states.csv; its README says where two sources differ by more.
#include "tests/thermo/fluids/reference.h"
#include "thermo/fluids/fluid.h"
#include "thermo/fluids/state.h"

#include <algorithm>
#include <ostream>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {

// Shown as the parameter of a test.
void PrintTo(const Fluid* fluid, std::ostream* out) {
  *out << fluid->name;
}

namespace {

// h and s to 1e-6 of 200 kJ/kg and 1 kJ/(kg K), density and saturation pressure to 1e-7 and 1e-6,
// cp and w to 1e-8 of what the table prints with nine digits.
struct Tolerance {
  double T = 1e-7;  // shares of the value
  double p = 1e-6;
  double rho = 1e-7;
  double h_Jkg = 0.2;
  double s_JkgK = 1e-3;
  double cp = 1e-8;  // and w
};

// What the library that made the tables has differently, as tests/reference/README.md tells. The
// density of a vapour follows its gas constant twice as far where it is far from ideal.
Tolerance tolerance_of(const Fluid& fluid) {
  if (fluid.name == "R1234ze(E)") {  // its gas constant is 1.2e-6 larger
    return {.T = 2e-7, .p = 1.3e-6, .rho = 2.4e-6, .h_Jkg = 1.0, .s_JkgK = 3e-3, .cp = 1e-5};
  }
  if (fluid.name == "R717") {  // its gas constant is 3.4e-7 smaller
    return {.rho = 7e-7, .h_Jkg = 1.2, .s_JkgK = 3e-3, .cp = 3e-6};
  }
  if (fluid.name == "R123") {  // it takes the ideal gas at 456.82 K, not 456.831 K
    return {.h_Jkg = 2.3, .s_JkgK = 6e-3, .cp = 2e-5};
  }
  if (fluid.name == "R507A") {  // its reducing density is 6e-6 larger, which tells near critical
    return {.rho = 1e-5, .h_Jkg = 6.0, .s_JkgK = 2e-2, .cp = 1e-3};
  }
  if (fluid.name == "R407C") {  // one coefficient, of t 8.7, has two digits less
    return {.cp = 2e-7};
  }
  return {};
}

class CheckTable : public testing::TestWithParam<const Fluid*> {
 protected:
  [[nodiscard]] static const Fluid& fluid() { return *GetParam(); }

  // Calls `ask` for each row, and holds the state that it gives to that row.
  template <class Ask>
  static void expect_rows(Ask ask) {
    const auto rows = reference_states(fluid().name);
    ASSERT_FALSE(rows.empty());
    for (const ReferenceState& row : rows) {
      SCOPED_TRACE(row.kind + " in row " + std::to_string(row.row));
      const Result<State> found = ask(row);
      ASSERT_TRUE(found) << name(found.error().code) << " " << found.error().blame;
      expect_row(row, *found);
    }
  }

  // What was given is exact, so that all else must agree. Above 0.95 of the critical temperature
  // the densities of the two sources differ by ten times more.
  static void expect_row(const ReferenceState& row, const State& found) {
    const Tolerance at = tolerance_of(fluid());
    const double wider = row.T_K > 0.95 * fluid().critical_T_K ? 10.0 : 1.0;
    // Where the table's enthalpies are its own, so are the temperature that they lead to and, on
    // the line, the side of it.
    const bool own_enthalpy = at.h_Jkg > Tolerance{}.h_Jkg;
    const double moved = own_enthalpy && row.cp_JkgK ? at.h_Jkg / (*row.cp_JkgK * row.T_K) : 0.0;
    const double expansion = found.single ? found.single->expansion_T : 1.0;
    EXPECT_NEAR(found.T_K, row.T_K, (at.T + moved) * row.T_K);
    EXPECT_NEAR(found.p_Pa, row.p_Pa, wider * at.p * row.p_Pa);
    if (!own_enthalpy || row.quality == found.quality) {
      EXPECT_NEAR(found.rho_kgm3, row.rho_kgm3,
                  (wider * at.rho + expansion * moved) * row.rho_kgm3);
    }
    EXPECT_NEAR(found.h_Jkg, row.h_Jkg, wider * at.h_Jkg);
    EXPECT_NEAR(found.s_JkgK, row.s_JkgK, wider * at.s_JkgK);
  }
  static void expect_single_phase(const ReferenceState& row, const State& found) {
    if (row.cp_JkgK && found.single) {
      const double share = tolerance_of(fluid()).cp;
      EXPECT_NEAR(found.single->cp_JkgK, *row.cp_JkgK, share * *row.cp_JkgK);
      EXPECT_NEAR(found.single->sound_speed_w, *row.sound_speed_w, share * *row.sound_speed_w);
    }
  }
};

Result<State> by_temperature(const Fluid& fluid, const ReferenceState& row) {
  return row.quality ? state(fluid, GivenTx{row.T_K, *row.quality})
                     : state(fluid, GivenTp{row.T_K, row.p_Pa});
}
Result<State> by_pressure(const Fluid& fluid, const ReferenceState& row) {
  return row.quality ? state(fluid, GivenPx{row.p_Pa, *row.quality}) : by_temperature(fluid, row);
}

TEST_P(CheckTable, IsMetFromTemperatureAndPressureOrQuality) {
  expect_rows([](const ReferenceState& row) { return by_temperature(fluid(), row); });
}

TEST_P(CheckTable, IsMetFromPressureAndQuality) {
  expect_rows([](const ReferenceState& row) { return by_pressure(fluid(), row); });
}

TEST_P(CheckTable, IsMetFromPressureAndEnthalpy) {
  expect_rows([](const ReferenceState& row) {
    return state(fluid(), GivenPh{row.p_Pa, row.h_Jkg});
  });
}

TEST_P(CheckTable, IsMetFromPressureAndEntropy) {
  expect_rows([](const ReferenceState& row) {
    return state(fluid(), GivenPs{row.p_Pa, row.s_JkgK});
  });
}

TEST_P(CheckTable, IsMetInHeatCapacityAndSpeedOfSound) {
  for (const ReferenceState& row : reference_states(fluid().name)) {
    SCOPED_TRACE(row.kind + " in row " + std::to_string(row.row));
    const Result<State> by_T = by_temperature(fluid(), row);
    const Result<State> by_p = by_pressure(fluid(), row);
    ASSERT_TRUE(by_T && by_p);
    expect_single_phase(row, *by_T);
    expect_single_phase(row, *by_p);
  }
}

TEST_P(CheckTable, NamesThePhase) {
  for (const ReferenceState& row : reference_states(fluid().name)) {
    SCOPED_TRACE(row.kind + " in row " + std::to_string(row.row));
    const Result<State> found = state(fluid(), GivenPh{row.p_Pa, row.h_Jkg});
    ASSERT_TRUE(found);
    // Denser than critical but colder is a liquid here, whatever the table calls it; on the line
    // itself the last digit of the table decides.
    const bool is_cold = row.kind == "supercritical" && row.T_K < fluid().critical_T_K;
    if (!row.kind.starts_with("sat") && row.kind != "bubble" && row.kind != "dew") {
      EXPECT_EQ(name(found->phase), is_cold ? "liquid" : row.kind);
    }
  }
}

INSTANTIATE_TEST_SUITE_P(Fluids, CheckTable, testing::ValuesIn(fluids().begin(), fluids().end()),
                         [](const auto& tested) { return test_name(tested.param->name); });

}  // namespace
}  // namespace lostwork
