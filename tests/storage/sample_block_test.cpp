#include "storage/sample_block.h"

#include "storage/key.h"
#include "tests/storage/plant.h"

#include <limits>
#include <random>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

std::vector<std::uint8_t> blob_of(const std::vector<Scan>& scans, std::int64_t key) {
  std::vector<const Scan*> places;
  for (const Scan& scan : scans) {
    places.push_back(&scan);
  }
  ColumnWriter out;
  encode_samples(places, 12, scans.front().readings.size(), out);
  const auto sealed = out.sealed(key);
  return {sealed.begin(), sealed.end()};
}

std::vector<Scan> random_scans(std::size_t count) {
  std::mt19937 random{2};
  std::vector<Scan> out;
  for (ScanRow& row :
       random_rows(random, layout_of("chiller-1", 5), midnight, Span{10000}, count)) {
    out.push_back(std::move(row.scan));
  }
  return out;
}

TEST(SampleBlock, GivesEveryReadingBackBitForBit) {
  const auto scans = random_scans(60);
  const std::int64_t key = key_of(1, midnight);
  const auto block = decode_samples(key, blob_of(scans, key));
  ASSERT_TRUE(block);
  ASSERT_EQ(block->scans.size(), scans.size());
  for (std::size_t i = 0; i < scans.size(); ++i) {
    EXPECT_EQ(block->scans[i].time, scans[i].time);
    for (std::size_t point = 0; point < 5; ++point) {
      expect_same(block->scans[i].readings[point], scans[i].readings[point]);
    }
  }
}

TEST(SampleBlock, KeepsTheNumberOfItsLayout) {
  const std::int64_t key = key_of(1, midnight);
  EXPECT_EQ(decode_samples(key, blob_of(random_scans(2), key))->layout, 12U);
}

TEST(SampleBlock, TellsItsTimesAlone) {
  const auto scans = random_scans(3);
  const std::int64_t key = key_of(1, midnight);
  EXPECT_EQ(decode_sample_times(key, blob_of(scans, key)),
            (std::vector<Instant>{scans[0].time, scans[1].time, scans[2].time}));
}

TEST(SampleBlock, NeverHoldsAGoodReadingThatIsNotFinite) {
  auto scans = random_scans(1);
  scans[0].readings[0] = {.value_SI = std::numeric_limits<double>::quiet_NaN(),
                          .u_SI = 0.1,
                          .quality = Quality::good,
                          .time = midnight};
  const std::int64_t key = key_of(1, midnight);
  const auto block = decode_samples(key, blob_of(scans, key));
  ASSERT_TRUE(block);
  EXPECT_EQ(block->scans[0].readings[0].quality, Quality::out_of_range);
  EXPECT_EQ(block->scans[0].readings[0].value_SI, 0.0);
}

TEST(SampleBlock, OfQuantisedValuesIsSmallerThanItsDoubles) {
  auto scans = random_scans(60);
  for (std::size_t i = 0; i < scans.size(); ++i) {
    scans[i].readings = {
        {.value_SI = 280.0 + 0.1 * static_cast<double>(i % 9),
         .u_SI = 0.0866,
         .quality = Quality::good,
         .time = scans[i].time}
    };
  }
  // 9 doubles and a byte for each scan; the rest is headers.
  EXPECT_LT(blob_of(scans, 1).size(), 9 * 8 + 60 + 60U);
}

TEST(SampleBlock, IsRefusedWhereItIsOfAnUnknownLayout) {
  ColumnWriter out;
  out.put(std::uint8_t{9});
  EXPECT_FALSE(decode_samples(1, out.sealed(1)));
}

// Seed 3: a right checksum over cut and altered content.
TEST(SampleBlock, SurvivesArbitraryContent) {
  std::mt19937 random{3};
  const auto sound = blob_of(random_scans(8), 1);
  for (int i = 0; i < 5000; ++i) {
    ColumnWriter out;
    const std::size_t size = random() % (sound.size() - 4);
    for (std::size_t at = 0; at < size; ++at) {
      out.put(at > 0 && random() % 20 == 0 ? static_cast<std::uint8_t>(random()) : sound[at]);
    }
    const auto block = decode_samples(1, out.sealed(1));
    EXPECT_TRUE(!block || block->scans.size() <= most_scans_a_block);
  }
}

}  // namespace
}  // namespace lostwork
