// Source: tests/reference/secondary_coolants.csv; its README says how it was made.
#include "thermo/streams/brine.h"

#include "tests/thermo/fluids/reference.h"
#include "thermo/streams/stream.h"

#include <algorithm>
#include <array>
#include <cmath>
#include <string>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

constexpr std::array names{"ethylene glycol",   "propylene glycol",    "ethanol",
                           "methanol",          "potassium carbonate", "potassium acetate",
                           "potassium formate", "calcium chloride",    "sodium chloride"};

class BrineNamed : public testing::TestWithParam<const char*> {};

TEST_P(BrineNamed, IsThePublishedFit) {
  const ReferenceTable table{"secondary_coolants.csv"};
  std::string written = GetParam();
  std::replace(written.begin(), written.end(), ' ', '-');
  int rows = 0;
  for (std::size_t row = 0; row < table.size(); ++row) {
    if (table.text(row, "fluid") != written) {
      continue;
    }
    ++rows;
    SCOPED_TRACE("row " + std::to_string(row));
    const auto solution = brine(GetParam(), table.number(row, "x_percent").value());
    ASSERT_TRUE(solution);
    const Result<StreamState> found = stream_state(*solution, table.number(row, "T_K").value());
    ASSERT_TRUE(found);
    // To the ten digits of the table.
    const double rho = table.number(row, "rho_kg_m3").value();
    const double cp = table.number(row, "cp_J_kgK").value();
    EXPECT_NEAR(found->rho_kgm3, rho, 1e-9 * rho);
    EXPECT_NEAR(found->cp_JkgK, cp, 1e-9 * cp);
    EXPECT_NEAR(solution->freezing_T_K, table.number(row, "T_freeze_K").value(), 1e-6);
  }
  EXPECT_EQ(rows, 30);
}

TEST_P(BrineNamed, HasTheEnthalpyAndEntropyOfItsHeatCapacity) {
  const Brine solution = brine(GetParam(), 20.0).value();
  constexpr double step_K = 0.05;
  for (const double T_K : {275.0, 290.0, 312.0}) {
    const StreamState at = stream_state(solution, T_K).value();
    const StreamState above = stream_state(solution, T_K + step_K).value();
    const StreamState below = stream_state(solution, T_K - step_K).value();
    // The central difference's own error is about (step / T)^2 of the slope: 3e-8.
    const double spanned_J = 2.0 * step_K * at.cp_JkgK;
    EXPECT_NEAR(above.h_Jkg - below.h_Jkg, spanned_J, 1e-6 * spanned_J);
    EXPECT_NEAR(T_K * (above.s_JkgK - below.s_JkgK), spanned_J, 1e-6 * spanned_J);
    const double denser = (below.rho_kgm3 - above.rho_kgm3) / (2.0 * step_K * at.rho_kgm3);
    EXPECT_NEAR(at.expansion_beta, denser, 1e-4 * std::abs(denser));
  }
}

TEST_P(BrineNamed, IsRefusedWhereItFreezesAndBeyondTheFit) {
  const Brine solution = brine(GetParam(), 20.0).value();
  for (const double T_K : {solution.freezing_T_K - 0.01, solution.max_T_K + 0.01}) {
    const Result<StreamState> found = stream_state(solution, T_K);
    ASSERT_FALSE(found);
    EXPECT_EQ(found.error().code, ReasonCode::outside_fluid);
    EXPECT_EQ(found.error().blame, "temperature");
  }
  EXPECT_TRUE(stream_state(solution, solution.freezing_T_K));
  EXPECT_TRUE(stream_state(solution, solution.max_T_K));
}

INSTANTIATE_TEST_SUITE_P(All, BrineNamed, testing::ValuesIn(names),
                         [](const auto& tested) { return test_name(tested.param); });

TEST(Brine, IsNoneWithoutAPublishedFit) {
  EXPECT_FALSE(brine("treacle", 30.0));
  EXPECT_FALSE(brine("sodium chloride", 23.1));
  EXPECT_FALSE(brine("sodium chloride", 0.0));
  EXPECT_FALSE(brine("sodium chloride", -1.0));
  EXPECT_FALSE(brine("sodium chloride", std::nan("")));
}

TEST(StreamNamed, KnowsWaterAndSolutions) {
  EXPECT_TRUE(std::holds_alternative<WaterStream>(stream_named("water").value()));
  const auto glycol = stream_named("propylene glycol 30 %");
  ASSERT_TRUE(glycol && std::holds_alternative<Brine>(*glycol));
  EXPECT_EQ(std::get<Brine>(*glycol).freezing_T_K, brine("propylene glycol", 30.0)->freezing_T_K);
  EXPECT_TRUE(stream_named("calcium chloride 22.5 %"));
}

TEST(StreamNamed, IsNoneForAnythingElse) {
  for (const char* name :
       {"", "%", " %", "glycol", "propylene glycol", "propylene glycol 30", "propylene glycol 30%",
        "propylene glycol 3x %", "water 30 %", "propylene glycol 61 %", "30 %"}) {
    EXPECT_FALSE(stream_named(name)) << name;
  }
}

}  // namespace
}  // namespace lostwork
