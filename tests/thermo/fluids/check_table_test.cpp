// Every row of the independent tables, in every direction (goals.md E1).
//
// Tolerances: h and s to 1e-6 of 200 kJ/kg and 1 kJ/(kg K), density and saturation pressure to 1e-7
// and 1e-6, ten times wider above 0.95 of the critical temperature, where the densities of the two
// sources differ by more. cp and w to 1e-8 of what the table prints with nine digits.
#include "tests/thermo/fluids/reference.h"
#include "thermo/fluids/fluid.h"
#include "thermo/fluids/state.h"

#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

constexpr double h_scale_Jkg = 200e3;
constexpr double s_scale_JkgK = 1e3;

class CheckTable : public testing::TestWithParam<ReferenceState> {
 protected:
  [[nodiscard]] const Fluid& fluid() const { return *fluid_named(GetParam().fluid); }

  // What was given is exact, so that all else must agree.
  void expect_row(const Result<State>& found) const {
    ASSERT_TRUE(found) << name(found.error().code) << " " << found.error().blame;
    const ReferenceState& row = GetParam();
    const double near_critical = row.T_K > 0.95 * fluid().critical_T_K ? 10.0 : 1.0;
    const double share = 1e-6 * near_critical;
    EXPECT_NEAR(found->T_K, row.T_K, 1e-7 * row.T_K);
    EXPECT_NEAR(found->p_Pa, row.p_Pa, share * row.p_Pa);
    EXPECT_NEAR(found->rho_kgm3, row.rho_kgm3, 0.1 * share * row.rho_kgm3);
    EXPECT_NEAR(found->h_Jkg, row.h_Jkg, share * h_scale_Jkg);
    EXPECT_NEAR(found->s_JkgK, row.s_JkgK, share * s_scale_JkgK);
  }
  static void expect_single_phase(const Result<State>& found) {
    ASSERT_TRUE(found);
    const ReferenceState& row = GetParam();
    if (row.cp_JkgK && found->single) {
      EXPECT_NEAR(found->single->cp_JkgK, *row.cp_JkgK, 1e-8 * *row.cp_JkgK);
      EXPECT_NEAR(found->single->sound_speed_w, *row.sound_speed_w, 1e-8 * *row.sound_speed_w);
    }
  }
};

TEST_P(CheckTable, IsMetFromTemperatureAndPressureOrQuality) {
  const ReferenceState& row = GetParam();
  const Result<State> found = row.quality ? state(fluid(), GivenTx{row.T_K, *row.quality})
                                          : state(fluid(), GivenTp{row.T_K, row.p_Pa});
  expect_row(found);
  expect_single_phase(found);
}

class CheckTableWithQuality : public CheckTable {};

TEST_P(CheckTableWithQuality, IsMetFromPressureAndQuality) {
  const ReferenceState& row = GetParam();
  const Result<State> found = state(fluid(), GivenPx{row.p_Pa, *row.quality});
  expect_row(found);
  expect_single_phase(found);
}

TEST_P(CheckTable, IsMetFromPressureAndEnthalpy) {
  expect_row(state(fluid(), GivenPh{GetParam().p_Pa, GetParam().h_Jkg}));
}

TEST_P(CheckTable, IsMetFromPressureAndEntropy) {
  expect_row(state(fluid(), GivenPs{GetParam().p_Pa, GetParam().s_JkgK}));
}

// On the line itself the last digit of the table decides.
class CheckTableOffTheLine : public CheckTable {};

TEST_P(CheckTableOffTheLine, NamesThePhase) {
  const ReferenceState& row = GetParam();
  const Result<State> found = state(fluid(), GivenPh{row.p_Pa, row.h_Jkg});
  ASSERT_TRUE(found);
  EXPECT_EQ(name(found->phase), row.kind);
}

template <class Keep>
std::vector<ReferenceState> states_where(Keep keep) {
  std::vector<ReferenceState> kept;
  for (const ReferenceState& row : reference_states()) {
    if (keep(row)) {
      kept.push_back(row);
    }
  }
  return kept;
}
std::string test_name(const testing::TestParamInfo<ReferenceState>& tested) {
  return name_of(tested.param);
}

INSTANTIATE_TEST_SUITE_P(AllFluids, CheckTable, testing::ValuesIn(reference_states()), test_name);
INSTANTIATE_TEST_SUITE_P(AllFluids, CheckTableWithQuality,
                         testing::ValuesIn(states_where([](const ReferenceState& row) {
                           return row.quality.has_value();
                         })),
                         test_name);
INSTANTIATE_TEST_SUITE_P(AllFluids, CheckTableOffTheLine,
                         testing::ValuesIn(states_where([](const ReferenceState& row) {
                           return !row.kind.starts_with("sat");
                         })),
                         test_name);

}  // namespace
}  // namespace lostwork
