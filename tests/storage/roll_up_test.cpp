// Minutes, hours and days against sums made straight from the scans.
#include "storage/history.h"
#include "storage/key.h"
#include "storage/store.h"
#include "tests/storage/plant.h"

#include <algorithm>
#include <cmath>
#include <random>
#include <string>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

const auto chiller = layout_of("chiller-1");

// By the definition: sum(weight x) / sum(weight) over the scans in [begin, end).
struct Expected {
  double weighted = 0.0;
  double weighted_u = 0.0;
  double weight = 0.0;
  double weighted_magnitude = 0.0;
  double min = 0.0;
  double max = 0.0;
  std::uint64_t count = 0;
};

Expected expected(const std::vector<ScanRow>& rows, Quantity quantity, Instant begin, Instant end) {
  Expected out;
  for (const ScanRow& row : rows) {
    const auto& value = row.assessment.values[quantity];
    if (row.scan.time < begin || row.scan.time >= end || !value) {
      continue;
    }
    double weight = 1.0;
    if (const auto denominator = weight_of(quantity)) {
      const auto& w = row.assessment.values[*denominator];
      weight = w && w->value > 0.0 ? w->value : 1.0;
    }
    out.min = out.count == 0 ? value->value : std::min(out.min, value->value);
    out.max = out.count == 0 ? value->value : std::max(out.max, value->value);
    out.weighted += weight * value->value;
    out.weighted_magnitude += weight * std::abs(value->value);
    out.weighted_u += weight * value->u;
    out.weight += weight;
    ++out.count;
  }
  return out;
}

struct Order {
  std::string name;
  std::size_t batch;    // scans a transaction
  bool shuffled;        // within and between the batches
  Span step;            // between scans
  std::size_t count;    // scans
  bool new_store_each;  // the store is closed and opened again before each batch
};

class RollUp : public testing::TestWithParam<Order> {
 protected:
  // Rows with every 17th left out, given to the store in the order that the case says.
  RollUp() {
    std::mt19937 random{21};
    const Order& order = GetParam();
    rows_ = random_rows(random, chiller, midnight + Span{3'000}, order.step, order.count);
    std::vector<ScanRow> given = rows_;
    if (order.shuffled) {
      std::shuffle(given.begin(), given.end(), random);
    }
    auto store = std::make_unique<Store>(options());
    for (std::size_t at = 0; at < given.size(); at += order.batch) {
      if (order.new_store_each) {
        store.reset();
        store = std::make_unique<Store>(options());
      }
      const std::size_t end = std::min(given.size(), at + order.batch);
      const auto first = given.begin() + static_cast<std::ptrdiff_t>(at);
      const auto last = given.begin() + static_cast<std::ptrdiff_t>(end);
      EXPECT_TRUE(store->write(batch_of({first, last})).stored);
    }
  }

  [[nodiscard]] StoreOptions options() const {
    return {.file = folder_.file(), .durability = Durability::process};
  }

  void expect_trend(Quantity quantity, Span width) const {
    const History history{folder_.file()};
    const Instant end = begin_of(width, rows_.back().scan.time) + width;
    const auto points = static_cast<std::size_t>((end - begin_of(width, midnight)) / width);
    const auto buckets = history.trend({.machine = "chiller-1",
                                        .quantity = quantity,
                                        .from = midnight,
                                        .to = end,
                                        .max_points = points});
    ASSERT_EQ(buckets.size(), points);
    for (const Bucket& bucket : buckets) {
      ASSERT_EQ(bucket.end - bucket.begin, width);
      const Expected e = expected(rows_, quantity, bucket.begin, bucket.end);
      ASSERT_EQ(bucket.count, e.count);
      ASSERT_EQ(bucket.mean.has_value(), e.count > 0);
      if (e.count == 0) {
        continue;
      }
      // Each of the additions on both sides rounds by at most 2^-53 of the sum of magnitudes.
      const double rounding = 4.0 * static_cast<double>(e.count) * 0x1p-53;
      EXPECT_NEAR(bucket.mean->value, e.weighted / e.weight,
                  rounding * e.weighted_magnitude / e.weight);
      // u is kept as a float: 2^-24 of itself.
      EXPECT_NEAR(bucket.mean->u, e.weighted_u / e.weight,
                  (0x1p-24 + rounding) * e.weighted_u / e.weight);
      EXPECT_EQ(bucket.min_SI, e.min);
      EXPECT_EQ(bucket.max_SI, e.max);
    }
  }

  Folder folder_;
  std::vector<ScanRow> rows_;
};

TEST_P(RollUp, ByTheMinuteEqualsTheScans) {
  expect_trend(Quantity::lift, minute);
}
TEST_P(RollUp, ByTheHourEqualsTheScans) {
  expect_trend(Quantity::power, hour);
}
TEST_P(RollUp, ByTheDayEqualsTheScans) {
  expect_trend(Quantity::power, day);
}
TEST_P(RollUp, OfARatioByTheMinuteIsTheRatioOfTheSums) {
  expect_trend(Quantity::cop, minute);
}
TEST_P(RollUp, OfARatioByTheHourIsTheRatioOfTheSums) {
  expect_trend(Quantity::power_residual, hour);
}

TEST_P(RollUp, CoversTheTimeOfItsScans) {
  const History history{folder_.file()};
  const auto buckets = history.trend({.machine = "chiller-1",
                                      .quantity = Quantity::power,
                                      .from = midnight,
                                      .to = midnight + day,
                                      .max_points = 1});
  const auto covered = static_cast<double>(buckets.at(0).covered.count());
  const auto in_first_day = std::count_if(rows_.begin(), rows_.end(), [](const ScanRow& row) {
    return row.scan.time < midnight + day;
  });
  // All scans stand for 10 s; rounded to a millisecond.
  EXPECT_LE(covered, static_cast<double>(in_first_day) * 10000.0);
  EXPECT_NEAR(covered, static_cast<double>(buckets.at(0).count) * 10000.0, 0.5);
}

Order order(std::string name, std::size_t batch, bool shuffled, Span step, std::size_t count,
            bool new_store_each = false) {
  return {.name = std::move(name),
          .batch = batch,
          .shuffled = shuffled,
          .step = step,
          .count = count,
          .new_store_each = new_store_each};
}

INSTANTIATE_TEST_SUITE_P(
    Orders, RollUp,
    testing::Values(order("OneBatch", 1000, false, Span{10000}, 800),
                    order("BatchesThatCutMinutes", 7, false, Span{10000}, 400),
                    order("EachScan", 1, false, Span{20000}, 200),
                    order("ScansAMinuteApart", 1440, false, minute, 3000),
                    order("ScansAMinuteApartInSmallBatches", 50, false, minute, 1500),
                    order("LateAndMixed", 40, true, Span{10000}, 600),
                    order("LateAndMixedOverDays", 90, true, Span{97000}, 2000),
                    order("RestartBeforeEachBatch", 23, false, Span{10000}, 300, true),
                    order("LateWithRestarts", 60, true, Span{30000}, 500, true)),
    [](const testing::TestParamInfo<Order>& o) { return o.param.name; });

}  // namespace
}  // namespace lostwork
