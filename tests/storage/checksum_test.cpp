#include "storage/checksum.h"

#include <numeric>
#include <string_view>
#include <vector>

#include <gtest/gtest.h>

namespace lostwork {
namespace {

// RFC 3720, appendix B.4 (the CRC is printed there byte by byte, least significant first).
TEST(Crc32c, Of32ZerosIsThatOfTheStandard) {
  EXPECT_EQ(crc32c(std::vector<std::uint8_t>(32, 0x00)), 0x8A9136AAU);
}
TEST(Crc32c, Of32OnesIsThatOfTheStandard) {
  EXPECT_EQ(crc32c(std::vector<std::uint8_t>(32, 0xFF)), 0x62A8AB43U);
}
TEST(Crc32c, OfRisingBytesIsThatOfTheStandard) {
  std::vector<std::uint8_t> bytes(32);
  std::iota(bytes.begin(), bytes.end(), std::uint8_t{0});
  EXPECT_EQ(crc32c(bytes), 0x46DD794EU);
}
TEST(Crc32c, GoesOnFromWhatCameBefore) {
  std::vector<std::uint8_t> bytes(45);
  std::iota(bytes.begin(), bytes.end(), std::uint8_t{7});
  const std::span<const std::uint8_t> all{bytes};
  EXPECT_EQ(crc32c(all.subspan(13), crc32c(all.first(13))), crc32c(all));
}
TEST(Crc32c, OfNothingIsZero) {
  EXPECT_EQ(crc32c({}), 0U);
}

}  // namespace
}  // namespace lostwork
