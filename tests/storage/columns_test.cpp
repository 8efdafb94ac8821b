#include "storage/columns.h"

#include <cstdint>
#include <limits>
#include <random>
#include <string>
#include <utility>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

using Numbers = std::vector<std::uint64_t>;

struct Case {
  std::string name;
  Numbers numbers;
  std::size_t blob_bytes;  // by the layout in columns.h, with 4 for the checksum
};

class Column : public testing::TestWithParam<Case> {};

std::vector<std::uint8_t> blob_of(const Numbers& numbers, std::int64_t key) {
  ColumnWriter out;
  out.put_column(numbers, true);
  const auto sealed = out.sealed(key);
  return {sealed.begin(), sealed.end()};
}

TEST_P(Column, ComesBackAsItWas) {
  const auto blob = blob_of(GetParam().numbers, 7);
  auto in = ColumnReader::unsealed(7, blob);
  ASSERT_TRUE(in);
  Numbers numbers;
  in->get_column(GetParam().numbers.size(), numbers);
  EXPECT_TRUE(in->ok());
  EXPECT_EQ(numbers, GetParam().numbers);
}

TEST_P(Column, TakesTheBytesThatItsLayoutSays) {
  EXPECT_EQ(blob_of(GetParam().numbers, 7).size(), GetParam().blob_bytes);
}

TEST_P(Column, CanBeSkipped) {
  ColumnWriter out;
  out.put_column(GetParam().numbers, true);
  out.put(std::uint16_t{0xABCD});
  auto in = ColumnReader::unsealed(7, out.sealed(7));
  ASSERT_TRUE(in);
  in->skip_column(GetParam().numbers.size());
  EXPECT_EQ(in->get<std::uint16_t>(), 0xABCD);
  EXPECT_TRUE(in->ok());
}

constexpr std::uint64_t largest = std::numeric_limits<std::uint64_t>::max();

Case made(std::string name, Numbers numbers, std::size_t blob_bytes) {
  return {.name = std::move(name), .numbers = std::move(numbers), .blob_bytes = blob_bytes};
}

INSTANTIATE_TEST_SUITE_P(Forms, Column,
                         testing::Values(made("Empty", {}, 1 + 4), made("One", {5}, 1 + 1 + 4),
                                         made("Equal", Numbers(60, 300), 1 + 2 + 4),
                                         made("EqualAndLarge", Numbers(60, largest), 1 + 8 + 4),
                                         made("Bytes", {0, 255, 3}, 1 + 3 + 4),
                                         made("TwoBytes", {0, 65535, 3}, 1 + 3 * 2 + 4),
                                         made("FourBytes", {0, 65536, 3}, 1 + 3 * 4 + 4),
                                         made("EightBytes", {0, largest, 3}, 1 + 3 * 8 + 4),
                                         made("TwoDifferent", {largest, 1, 1, largest, 1, 1, 1},
                                              1 + 1 + 2 * 8 + 7 + 4)),
                         [](const testing::TestParamInfo<Case>& form) { return form.param.name; });

TEST(Blob, IsRefusedUnderAnotherKey) {
  EXPECT_FALSE(ColumnReader::unsealed(8, blob_of({1, 2, 3}, 7)));
}

TEST(Blob, IsRefusedWithAnyBitInverted) {
  const auto sound = blob_of({1, 2, 300, 4}, 7);
  for (std::size_t bit = 0; bit < 8 * sound.size(); ++bit) {
    auto blob = sound;
    blob[bit / 8] = static_cast<std::uint8_t>(blob[bit / 8] ^ (1U << (bit % 8)));
    EXPECT_FALSE(ColumnReader::unsealed(7, blob)) << "bit " << bit;
  }
}

TEST(Blob, IsRefusedWhenItIsShorterThanItsChecksum) {
  EXPECT_FALSE(ColumnReader::unsealed(7, std::vector<std::uint8_t>{1, 2, 3}));
}

TEST(ColumnReader, ReadsZerosPastTheEndAndSaysSo) {
  const auto blob = blob_of({1, 2, 3}, 7);
  auto in = ColumnReader::unsealed(7, blob);
  ASSERT_TRUE(in);
  Numbers numbers;
  in->get_column(1000, numbers);
  EXPECT_FALSE(in->ok());
  EXPECT_EQ(numbers, Numbers(1000, 0));
}

// Seed 1: arbitrary bytes under a right checksum, as a mistake in a later writer could leave them.
TEST(ColumnReader, SurvivesArbitraryBytes) {
  std::mt19937 random{1};
  std::uniform_int_distribution<int> byte{0, 255};
  for (int i = 0; i < 20000; ++i) {
    ColumnWriter out;
    for (int n = byte(random) % 40; n > 0; --n) {
      out.put(static_cast<std::uint8_t>(byte(random)));
    }
    auto in = ColumnReader::unsealed(7, out.sealed(7));
    ASSERT_TRUE(in);
    Numbers numbers;
    while (in->ok()) {
      in->get_column(static_cast<std::size_t>(byte(random)) % 20, numbers);
      in->skip_column(static_cast<std::size_t>(byte(random)) % 20);
    }
  }
}

TEST(Zigzag, KeepsEverySign) {
  for (const std::int64_t value :
       {std::int64_t{0}, std::int64_t{-1}, std::int64_t{1}, std::int64_t{-60000},
        std::numeric_limits<std::int64_t>::min(), std::numeric_limits<std::int64_t>::max()}) {
    EXPECT_EQ(unzigzag(zigzag(value)), value);
  }
}

}  // namespace
}  // namespace lostwork
