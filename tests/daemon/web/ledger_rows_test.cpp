#include "daemon/web/ledger_rows.h"

#include "tests/daemon/web/made_up_plant.h"

#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace lostwork {
namespace {

QuantityValues chiller_values() {
  return made_up_plant().machines.at(0).latest.values;
}

std::vector<std::string> texts(const LedgerTable& table) {
  std::vector<std::string> all;
  for (const LedgerRow& row : table.rows) {
    all.emplace_back(row.text);
  }
  return all;
}

TEST(LedgerTable, AddsUpToTheInput) {
  const LedgerTable table = ledger_table(chiller_values(), true);
  EXPECT_TRUE(table.complete);
  EXPECT_TRUE(table.split);
}

TEST(LedgerTable, IsNotCompleteWhenTheSumIsWrong) {
  QuantityValues values = chiller_values();
  values[Quantity::lost_condenser]->value += 1.0;
  EXPECT_FALSE(ledger_table(values, true).complete);
}

TEST(LedgerTable, HasOneRowForTheLossWhereItCannotBeSplit) {
  QuantityValues values = chiller_values();
  values[Quantity::lost_condenser] = Refusal{
      {.code = ReasonCode::bad_quality, .blame = "discharge.pressure"}
  };
  const LedgerTable table = ledger_table(values, true);
  EXPECT_FALSE(table.split);
  EXPECT_THAT(texts(table),
              testing::ElementsAre("least power for this work", "lost in the machine",
                                   "work value of the casing heat", "not accounted for"));
}

TEST(LedgerTable, CountsTheSuctionLineToTheEvaporatorWhereItHasNoSensor) {
  QuantityValues values = chiller_values();
  const double lines_W = values[Quantity::lost_lines]->value;
  values[Quantity::lost_evaporator]->value += lines_W;
  values[Quantity::lost_lines] = Refusal{
      {.code = ReasonCode::no_sensor, .blame = {}}
  };
  const LedgerTable table = ledger_table(values, true);
  EXPECT_TRUE(table.complete);
  EXPECT_THAT(texts(table), testing::Contains("evaporator and suction line"));
}

TEST(LedgerTable, IsNotCompleteWithoutThePower) {
  QuantityValues values = chiller_values();
  values[Quantity::power] = Refusal{
      {.code = ReasonCode::not_read, .blame = "power"}
  };
  const LedgerTable table = ledger_table(values, true);
  EXPECT_FALSE(table.complete);
  EXPECT_FALSE(table.rows.front().share);
}

TEST(LedgerTable, GivesTheNeededShareTheEfficiencysUncertainty) {
  const LedgerTable table = ledger_table(chiller_values(), true);
  ASSERT_TRUE(table.rows.front().share);
  EXPECT_EQ(table.rows.front().share->u, 0.008);
}

// u(part)/W + part u(W)/W^2 with the made-up condenser: 0.35/59.4 + 8.0 * 0.3/59.4^2.
TEST(LedgerTable, BoundsTheUncertaintyOfAShare) {
  const LedgerTable table = ledger_table(chiller_values(), true);
  ASSERT_TRUE(table.rows.at(2).share);
  EXPECT_NEAR(table.rows.at(2).share->u, 0.0065725, 1e-7);  // seven digits by hand
}

std::string_view note_of(const LedgerTable& table, Quantity quantity) {
  for (const LedgerRow& row : table.rows) {
    if (row.quantity == quantity) {
      return row.note;
    }
  }
  return "no such row";
}

TEST(LedgerTable, SaysThatOneMeterCannotTellWhatIsUnaccountedFor) {
  QuantityValues values = chiller_values();
  values[Quantity::energy_residual] = Refusal{
      {.code = ReasonCode::no_sensor, .blame = "hot.flow"}
  };
  EXPECT_THAT(std::string{note_of(ledger_table(values, true), Quantity::unaccounted)},
              testing::HasSubstr("annot be told without the second flow meter"));
}

TEST(LedgerTable, HasNoRemarkWhereTheFiguresStandForThemselves) {
  for (const LedgerRow& row : ledger_table(chiller_values(), true).rows) {
    EXPECT_EQ(row.note, "") << row.text;
  }
}

TEST(LedgerTable, SaysThatTheCasingCountsAsNothingWithoutItsSurroundings) {
  EXPECT_THAT(std::string{note_of(ledger_table(chiller_values(), false), Quantity::casing)},
              testing::HasSubstr("ounts as nothing"));
}

}  // namespace
}  // namespace lostwork
