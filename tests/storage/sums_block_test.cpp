#include "storage/sums_block.h"

#include "storage/key.h"
#include "storage/schema.h"
#include "tests/storage/plant.h"

#include <random>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

const auto chiller = layout_of("chiller-1");
const std::int64_t key = key_of(1, midnight);

class SumsBlock : public testing::Test {
 protected:
  SumsBlock() {
    database_.run("PRAGMA synchronous = OFF");
    migrate(database_, schema_scripts());
  }

  [[nodiscard]] std::vector<std::uint8_t> blob_of(const std::vector<Period>& periods) {
    ColumnWriter out;
    encode_sums(periods, minute, words_, out);
    const auto sealed = out.sealed(key);
    return {sealed.begin(), sealed.end()};
  }

  // Minutes 0, 1, 3, 4, 6 ... with so many scans each.
  [[nodiscard]] static std::vector<Period> random_periods(std::size_t count, int scans) {
    std::mt19937 random{6};
    std::vector<Period> out;
    for (std::size_t i = 0; i < count; ++i) {
      Period period{.begin = midnight + static_cast<std::int64_t>(i + i / 2) * minute, .sums = {}};
      for (int scan = 0; scan < scans; ++scan) {
        const ScanRow row = random_row(random, chiller, period.begin + scan * Span{7000});
        add(period.sums, row.assessment, row.covers);
      }
      out.push_back(period);
    }
    return out;
  }

  static void expect_same_sums(const QuantitySums& a, const QuantitySums& b) {
    ASSERT_EQ(a.count, b.count);
    if (a.count == 0) {
      expect_same(a.reason, b.reason);
      return;
    }
    expect_same_bits(a.sum, b.sum);
    expect_same_bits(a.u_sum, b.u_sum);
    expect_same_bits(a.weight, b.weight);
    expect_same_bits(a.min, b.min);
    expect_same_bits(a.max, b.max);
  }

  void expect_back(const std::vector<Period>& periods) {
    const auto back = decode_sums(key, minute, blob_of(periods), words_);
    ASSERT_TRUE(back);
    ASSERT_EQ(back->size(), periods.size());
    for (std::size_t i = 0; i < periods.size(); ++i) {
      const PeriodSums& a = (*back)[i].sums;
      const PeriodSums& b = periods[i].sums;
      EXPECT_EQ((*back)[i].begin, periods[i].begin);
      EXPECT_EQ(a.scans, b.scans);
      EXPECT_EQ(a.steady_scans, b.steady_scans);
      EXPECT_EQ(a.covered_ms, b.covered_ms);
      EXPECT_EQ(a.newest, b.newest);
      EXPECT_EQ(a.mode, b.mode);
      EXPECT_EQ(a.level, b.level);
      for (std::size_t q = 0; q < quantity_count; ++q) {
        expect_same_sums(a.quantities.at(q), b.quantities.at(q));
      }
    }
  }

  Folder folder_;
  Database database_ = Database::writer(folder_.file());
  Words words_{database_};
};

TEST_F(SumsBlock, OfMinutesWithManyScansComesBackBitForBit) {
  expect_back(random_periods(20, 6));
}
TEST_F(SumsBlock, OfMinutesWithOneScanComesBackBitForBit) {
  expect_back(random_periods(40, 1));
}
TEST_F(SumsBlock, OfOnePeriodComesBackBitForBit) {
  expect_back(random_periods(1, 3));
}

TEST_F(SumsBlock, TellsItsBeginsAlone) {
  EXPECT_EQ(decode_sums_begins(key, minute, blob_of(random_periods(4, 2))),
            (std::vector<Instant>{midnight, midnight + minute, midnight + 3 * minute,
                                  midnight + 4 * minute}));
}

class SumsBlockOfOneQuantity : public SumsBlock, public testing::WithParamInterface<std::size_t> {};

TEST_P(SumsBlockOfOneQuantity, IsReadAsInTheWhole) {
  for (const int scans : {1, 5}) {
    const auto periods = random_periods(12, scans);
    const auto quantity = static_cast<Quantity>(GetParam());
    const auto back = decode_sums_of(key, minute, blob_of(periods), quantity, words_);
    ASSERT_TRUE(back);
    for (std::size_t i = 0; i < periods.size(); ++i) {
      EXPECT_EQ((*back)[i].begin, periods[i].begin);
      EXPECT_EQ((*back)[i].scans, periods[i].sums.scans);
      EXPECT_EQ((*back)[i].covered_ms, periods[i].sums.covered_ms);
      expect_same_sums((*back)[i].sums, periods[i].sums[quantity]);
    }
  }
}

INSTANTIATE_TEST_SUITE_P(Every, SumsBlockOfOneQuantity,
                         testing::Range(std::size_t{0}, quantity_count));

TEST_F(SumsBlock, OfAnUnknownLayoutIsRefused) {
  ColumnWriter out;
  out.put(std::uint8_t{9});
  EXPECT_FALSE(decode_sums(key, minute, out.sealed(key), words_));
}

// Seed 7: a right checksum over cut and altered content.
TEST_F(SumsBlock, SurvivesArbitraryContent) {
  std::mt19937 random{7};
  for (const int scans : {1, 3}) {
    const auto sound = blob_of(random_periods(5, scans));
    for (int i = 0; i < 3000; ++i) {
      ColumnWriter out;
      const std::size_t size = random() % (sound.size() - 4);
      for (std::size_t at = 0; at < size; ++at) {
        out.put(at > 0 && random() % 50 == 0 ? static_cast<std::uint8_t>(random()) : sound[at]);
      }
      const auto back = decode_sums(key, minute, out.sealed(key), words_);
      EXPECT_TRUE(!back || back->size() <= most_periods_a_block);
    }
  }
}

}  // namespace
}  // namespace lostwork
