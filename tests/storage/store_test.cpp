#include "storage/store.h"

#include "storage/history.h"
#include "storage/key.h"
#include "storage/sums.h"
#include "tests/storage/plant.h"

#include <algorithm>
#include <cmath>
#include <map>
#include <random>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

const auto chiller = layout_of("chiller-1");
const auto heat_pump = layout_of("heat-pump-1", 2);
constexpr Instant end_of_time = last_storable;

class StoreTest : public testing::Test {
 protected:
  [[nodiscard]] StoreOptions options() const {
    return {.file = folder_.file(), .durability = Durability::process};
  }
  void write(Batch batch) {
    const WriteResult result = store_.write(std::move(batch));
    ASSERT_TRUE(result.stored) << result.why;
  }
  void write(std::vector<ScanRow> rows) { write(batch_of(std::move(rows))); }
  [[nodiscard]] History history() const { return History{folder_.file()}; }
  [[nodiscard]] std::int64_t count(const std::string& table) const {
    return Database::reader(folder_.file()).integer("SELECT count(*) FROM " + table);
  }

  Folder folder_;
  Store store_{options()};
};

TEST_F(StoreTest, GivesEveryScanBackBitForBit) {
  std::mt19937 random{11};
  const auto rows = random_rows(random, chiller, midnight, Span{10000}, 700);
  write(rows);
  const auto scans = history().scans("chiller-1", chiller->points, first_storable, end_of_time);
  ASSERT_EQ(scans.size(), rows.size());
  for (std::size_t i = 0; i < rows.size(); ++i) {
    EXPECT_EQ(scans[i].time, rows[i].scan.time);
    for (std::size_t point = 0; point < chiller->points.size(); ++point) {
      expect_same(scans[i].readings[point], rows[i].scan.readings[point]);
    }
  }
}

TEST_F(StoreTest, GivesTheReadingsOfOnePointBetweenTwoTimes) {
  std::mt19937 random{12};
  const auto rows = random_rows(random, chiller, midnight, Span{10000}, 30);
  write(rows);
  const auto readings =
      history().samples("chiller-1", "chiller-1_point_1", rows[7].scan.time, rows[20].scan.time);
  ASSERT_EQ(readings.size(), 13U);
  EXPECT_EQ(readings[0].scan_time, rows[7].scan.time);
  expect_same(readings[0].reading, rows[7].scan.readings[1]);
  expect_same(readings[12].reading, rows[19].scan.readings[1]);
}

TEST_F(StoreTest, GivesTheAssessmentsOfScansAMinuteApartBitForBit) {
  std::mt19937 random{13};
  const auto rows = random_rows(random, chiller, midnight, minute, 150);
  write(rows);
  const History history = this->history();
  const auto stored = history.assessments("chiller-1", first_storable, end_of_time);
  ASSERT_EQ(stored.size(), rows.size());
  for (std::size_t i = 0; i < rows.size(); ++i) {
    EXPECT_EQ(stored[i].mode, rows[i].assessment.mode);
    EXPECT_EQ(stored[i].level, rows[i].assessment.level);
    EXPECT_EQ(stored[i].steady, rows[i].assessment.steady);
    for (std::size_t q = 0; q < quantity_count; ++q) {
      const auto& a = stored[i].values[static_cast<Quantity>(q)];
      const auto& b = rows[i].assessment.values[static_cast<Quantity>(q)];
      ASSERT_EQ(a.has_value(), b.has_value());
      if (a) {
        expect_same_bits(a->value, b->value);
        expect_same_bits(a->u, static_cast<double>(static_cast<float>(b->u)));
      } else {
        expect_same(a.error(), b.error());
      }
    }
  }
}

TEST_F(StoreTest, TellsTheLastAssessment) {
  std::mt19937 random{14};
  write(random_rows(random, chiller, midnight, minute, 95));
  const History history = this->history();
  const auto last = history.last_assessment("chiller-1");
  ASSERT_TRUE(last);
  EXPECT_EQ(last->time, midnight + 94 * minute);
}

TEST_F(StoreTest, StoresAScanOnceHoweverOftenItIsGiven) {
  std::mt19937 random{15};
  const auto rows = random_rows(random, chiller, midnight, Span{10000}, 100);
  write(rows);
  write(rows);
  write({rows.begin() + 40, rows.begin() + 60});
  EXPECT_EQ(history().scans("chiller-1", chiller->points, first_storable, end_of_time).size(),
            100U);
  const auto day_trend = history().trend({.machine = "chiller-1",
                                          .quantity = Quantity::power,
                                          .from = midnight,
                                          .to = midnight + day,
                                          .max_points = 1});
  const auto present = std::count_if(rows.begin(), rows.end(), [](const ScanRow& row) {
    return row.assessment.values[Quantity::power].has_value();
  });
  EXPECT_EQ(day_trend.at(0).count, static_cast<std::uint64_t>(present));
}

TEST_F(StoreTest, KeepsTheFirstOfTwoScansOfOneTime) {
  write({plain_row(chiller, midnight, 1.0), plain_row(chiller, midnight, 2.0)});
  write({plain_row(chiller, midnight, 3.0)});
  const auto scans = history().scans("chiller-1", chiller->points, first_storable, end_of_time);
  ASSERT_EQ(scans.size(), 1U);
  EXPECT_EQ(scans[0].readings[0].value_SI, 1.0);
}

TEST_F(StoreTest, KnowsAfterARestartWhatItHasStored) {
  std::mt19937 random{16};
  const auto rows = random_rows(random, chiller, midnight, Span{10000}, 20);
  write({rows.begin(), rows.begin() + 10});
  {
    Folder other;
    std::filesystem::copy(folder_.path(), other.path(),
                          std::filesystem::copy_options::overwrite_existing);
    Store again{
        {.file = other.file(), .durability = Durability::process}
    };
    ASSERT_TRUE(again.write(batch_of(rows)).stored);
    const History history{other.file()};
    EXPECT_EQ(history.scans("chiller-1", chiller->points, first_storable, end_of_time).size(), 20U);
  }
}

TEST_F(StoreTest, KeepsMachinesApart) {
  std::mt19937 random{17};
  Batch batch = batch_of(random_rows(random, chiller, midnight, Span{10000}, 50));
  for (ScanRow& row : random_rows(random, heat_pump, midnight, Span{10000}, 40)) {
    batch.scans.push_back(std::move(row));
  }
  write(std::move(batch));
  const History history = this->history();
  EXPECT_EQ(history.machines(), (std::vector<std::string>{"chiller-1", "heat-pump-1"}));
  EXPECT_EQ(history.scans("chiller-1", chiller->points, first_storable, end_of_time).size(), 50U);
  EXPECT_EQ(history.scans("heat-pump-1", heat_pump->points, first_storable, end_of_time).size(),
            40U);
}

TEST_F(StoreTest, ReadsOldScansAfterAPointWasAdded) {
  write({plain_row(layout_of("chiller-1", 2), midnight, 1.0)});
  write({plain_row(chiller, midnight + minute, 2.0)});
  const auto scans = history().scans("chiller-1", chiller->points, first_storable, end_of_time);
  ASSERT_EQ(scans.size(), 2U);
  EXPECT_EQ(scans[0].readings[1].value_SI, 1.0);
  EXPECT_EQ(scans[0].readings[2].quality, Quality::timeout);
  EXPECT_EQ(scans[1].readings[2].value_SI, 2.0);
}

TEST_F(StoreTest, HasNothingOfAnUnknownMachine) {
  write({plain_row(chiller, midnight, 1.0)});
  const History history = this->history();
  EXPECT_TRUE(history.scans("no-such", chiller->points, first_storable, end_of_time).empty());
  EXPECT_TRUE(history.samples("chiller-1", "no-such", first_storable, end_of_time).empty());
  EXPECT_TRUE(history.assessments("no-such", first_storable, end_of_time).empty());
  EXPECT_FALSE(history.last_assessment("no-such"));
  EXPECT_FALSE(history.state("no-such"));
}

TEST_F(StoreTest, KeepsTheNewestState) {
  Batch batch;
  batch.states = {state_of("chiller-1", midnight, 1), state_of("chiller-1", midnight, 2)};
  write(std::move(batch));
  const auto state = history().state("chiller-1");
  ASSERT_TRUE(state);
  EXPECT_EQ(state->version, 3U);
  EXPECT_EQ(state->time, midnight);
  EXPECT_EQ(state->bytes, std::vector<std::uint8_t>(1000, 2));
  EXPECT_FALSE(state->damaged);
}

TEST_F(StoreTest, KeepsAVersionOfThePlantFileForEachChange) {
  EXPECT_TRUE(store_.keep_plant_file("a = 1", midnight));
  EXPECT_TRUE(store_.keep_plant_file("a = 1", midnight + day));
  EXPECT_TRUE(store_.keep_plant_file("a = 2", midnight + 2 * day));
  const auto versions = history().plant_files();
  ASSERT_EQ(versions.size(), 2U);
  EXPECT_EQ(versions[0].text, "a = 1");
  EXPECT_EQ(versions[1].time, midnight + 2 * day);
}

TEST_F(StoreTest, GivesWindowsBackBitForBitAndOnce) {
  Window window{.begin = midnight, .end = midnight + 10 * minute, .scans = 60, .values = {}};
  window.values[0] =
      WindowMean{.mean_SI = 0.1, .u_SI = 1.0 / 3.0, .sd_SI = 1e-300, .n_effective = 7.7};
  window.values[quantity_count - 1] =
      WindowMean{.mean_SI = -0.0, .u_SI = 0.0, .sd_SI = 2.0, .n_effective = 1.0};
  Batch batch;
  batch.windows = {
      {.machine = "chiller-1", .window = window},
      {.machine = "chiller-1", .window = window}
  };
  write(std::move(batch));
  const auto windows = history().windows("chiller-1", first_storable, end_of_time);
  ASSERT_EQ(windows.size(), 1U);
  EXPECT_EQ(windows[0].end, window.end);
  EXPECT_EQ(windows[0].scans, 60U);
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto& a = windows[0].values.at(i);
    const auto& b = window.values.at(i);
    ASSERT_EQ(a.has_value(), b.has_value());
    if (a) {
      expect_same_bits(a->mean_SI, b->mean_SI);
      expect_same_bits(a->u_SI, b->u_SI);
      expect_same_bits(a->sd_SI, b->sd_SI);
      expect_same_bits(a->n_effective, b->n_effective);
    }
  }
}

struct BadRow {
  std::string name;
  ScanRow row;
};
class BadScan : public StoreTest, public testing::WithParamInterface<BadRow> {};

TEST_P(BadScan, IsGivenUpAndTheRestIsStored) {
  const WriteResult result =
      store_.write(batch_of({GetParam().row, plain_row(chiller, midnight + minute, 1.0)}));
  EXPECT_TRUE(result.stored);
  EXPECT_EQ(result.given_up, 1U);
  EXPECT_FALSE(result.why.empty());
  EXPECT_EQ(history().scans("chiller-1", chiller->points, first_storable, end_of_time).size(), 1U);
}

BadRow bad(std::string name, ScanRow row) {
  return {.name = std::move(name), .row = std::move(row)};
}
ScanRow with_one_reading_less() {
  ScanRow row = plain_row(chiller, midnight, 1.0);
  row.scan.readings.pop_back();
  return row;
}
ScanRow that_covers_nothing() {
  ScanRow row = plain_row(chiller, midnight, 1.0);
  row.covers = Span{0};
  return row;
}
ScanRow with_another_assessment() {
  ScanRow row = plain_row(chiller, midnight, 1.0);
  row.assessment.time += minute;
  return row;
}

INSTANTIATE_TEST_SUITE_P(
    Rows, BadScan,
    testing::Values(bad("NoLayout", ScanRow{}),
                    bad("Before1970", plain_row(chiller, first_storable - Span{1}, 1.0)),
                    bad("FarInTheFuture", plain_row(chiller, last_storable + Span{1}, 1.0)),
                    bad("ReadingMissing", with_one_reading_less()),
                    bad("CoversNothing", that_covers_nothing()),
                    bad("OtherAssessment", with_another_assessment())),
    [](const testing::TestParamInfo<BadRow>& row) { return row.param.name; });

TEST(BatchDue, IsAfterEachScanWithAWindowOfZero) {
  EXPECT_TRUE(batch_of({plain_row(chiller, midnight, 1.0)}).due(Span{0}));
}
TEST(BatchDue, IsWhenItsScansLieAWindowApart) {
  EXPECT_FALSE(
      batch_of({plain_row(chiller, midnight, 1.0), plain_row(chiller, midnight + Span{59999}, 1.0)})
          .due(default_commit_window));
  EXPECT_TRUE(
      batch_of({plain_row(chiller, midnight, 1.0), plain_row(chiller, midnight + Span{60000}, 1.0)})
          .due(default_commit_window));
}
TEST(BatchDue, IsAtOnceForAnAlarm) {
  Batch batch;
  batch.alarms.push_back(alarm_at(midnight, "a"));
  EXPECT_TRUE(batch.due(default_commit_window));
}
TEST(BatchDue, IsNeverWhileThereIsNothing) {
  EXPECT_FALSE(Batch{}.due(Span{0}));
}

}  // namespace
}  // namespace lostwork
