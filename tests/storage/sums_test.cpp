#include "storage/sums.h"

#include "tests/storage/plant.h"

#include <cmath>
#include <limits>
#include <random>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

PeriodSums sums_of(const std::vector<ScanRow>& rows) {
  PeriodSums out;
  for (const ScanRow& row : rows) {
    add(out, row.assessment, row.covers);
  }
  return out;
}

const auto chiller = layout_of("chiller-1");

TEST(Sums, OfOneScanGiveItsValuesExactly) {
  std::mt19937 random{4};
  const ScanRow row = random_row(random, chiller, midnight);
  const PeriodSums sums = sums_of({row});
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto quantity = static_cast<Quantity>(i);
    const auto mean = sums[quantity].mean();
    const auto& given = row.assessment.values[quantity];
    ASSERT_EQ(mean.has_value(), given.has_value());
    if (given) {
      expect_same_bits(mean->value, given->value);
      expect_same_bits(mean->u, static_cast<double>(static_cast<float>(given->u)));
    } else {
      expect_same(mean.error(), given.error());
    }
  }
}

TEST(Sums, GiveTheMeanOfARate) {
  const PeriodSums sums =
      sums_of({plain_row(chiller, midnight, 1.0), plain_row(chiller, midnight + Span{10000}, 4.0)});
  EXPECT_EQ(sums[Quantity::power].mean(), (Measured{.value = 2.5, .u = 0.5}));
}

TEST(Sums, GiveARatioAsTheRatioOfTheSums) {
  ScanRow light = plain_row(chiller, midnight, 0.0);
  light.assessment.values[Quantity::power] = Measured{.value = 1000.0, .u = 1.0};
  light.assessment.values[Quantity::cop] = Measured{.value = 6.0, .u = 0.1};
  ScanRow heavy = plain_row(chiller, midnight + Span{10000}, 0.0);
  heavy.assessment.values[Quantity::power] = Measured{.value = 3000.0, .u = 1.0};
  heavy.assessment.values[Quantity::cop] = Measured{.value = 4.0, .u = 0.1};
  // (6 x 1000 + 4 x 3000) / 4000
  EXPECT_DOUBLE_EQ(sums_of({light, heavy})[Quantity::cop].mean()->value, 4.5);
}

TEST(Sums, LeaveMissingScansOutOfTheMean) {
  ScanRow missing = plain_row(chiller, midnight + Span{10000}, 4.0);
  missing.assessment.values[Quantity::lift] = tl::unexpected{
      Reason{.code = ReasonCode::machine_off, .blame = {}}
  };
  const PeriodSums sums = sums_of({plain_row(chiller, midnight, 1.0), missing});
  EXPECT_EQ(sums[Quantity::lift].mean(), (Measured{.value = 1.0, .u = 0.5}));
  EXPECT_EQ(sums[Quantity::lift].count, 1U);
}

TEST(Sums, GiveTheReasonOfTheNewestScanWhereAllAreMissing) {
  ScanRow older = plain_row(chiller, midnight, 1.0);
  older.assessment.values[Quantity::lift] = tl::unexpected{
      Reason{.code = ReasonCode::machine_off, .blame = {}}
  };
  ScanRow newer = plain_row(chiller, midnight + Span{10000}, 1.0);
  newer.assessment.values[Quantity::lift] = tl::unexpected{
      Reason{.code = ReasonCode::no_sensor, .blame = {}}
  };
  EXPECT_EQ(sums_of({newer, older})[Quantity::lift].mean().error().code, ReasonCode::no_sensor);
}

TEST(Sums, TakeAValueThatIsNotFiniteForImplausible) {
  ScanRow row = plain_row(chiller, midnight, 1.0);
  row.assessment.values[Quantity::lift] =
      Measured{.value = std::numeric_limits<double>::infinity(), .u = 1.0};
  EXPECT_EQ(sums_of({row})[Quantity::lift].mean().error().code, ReasonCode::implausible);
}

TEST(Sums, TakeModeAndLevelOfTheNewestScan) {
  ScanRow newer = plain_row(chiller, midnight + Span{10000}, 1.0);
  newer.assessment.mode = Mode::stopping;
  newer.assessment.level = Level::L2;
  const PeriodSums sums = sums_of({newer, plain_row(chiller, midnight, 1.0)});
  EXPECT_EQ(sums.mode, Mode::stopping);
  EXPECT_EQ(sums.level, Level::L2);
}

TEST(Sums, OfPartsAreThoseOfTheWhole) {
  std::mt19937 random{5};
  const auto rows = random_rows(random, chiller, midnight, Span{10000}, 40);
  const PeriodSums whole = sums_of(rows);
  PeriodSums parts = sums_of({rows.begin() + 25, rows.end()});
  add(parts, sums_of({rows.begin(), rows.begin() + 25}));
  EXPECT_EQ(parts.scans, whole.scans);
  EXPECT_EQ(parts.covered_ms, 400'000U);
  for (std::size_t i = 0; i < quantity_count; ++i) {
    const auto& a = parts[static_cast<Quantity>(i)];
    const auto& b = whole[static_cast<Quantity>(i)];
    EXPECT_EQ(a.count, b.count);
    EXPECT_EQ(a.min, b.min);
    EXPECT_EQ(a.max, b.max);
    // 40 additions, each rounded to 2^-53 of at most 40 x 400 x 400.
    EXPECT_NEAR(a.sum, b.sum, 40 * 0x1p-53 * 6.4e6);
  }
}

}  // namespace
}  // namespace lostwork
