#include "storage/checksum.h"

#include <array>
#include <bit>
#include <cstddef>
#include <cstring>

namespace lostwork {
namespace {

constexpr std::uint32_t reflected_polynomial = 0x82F63B78U;

using Table = std::array<std::uint32_t, 256>;

// Row k: the effect of a byte that k more bytes follow; eight bytes at a time.
constexpr std::array<Table, 8> made_tables() {
  std::array<Table, 8> tables{};
  for (std::uint32_t byte = 0; byte < 256; ++byte) {
    std::uint32_t crc = byte;
    for (int bit = 0; bit < 8; ++bit) {
      crc = (crc >> 1U) ^ ((crc & 1U) != 0 ? reflected_polynomial : 0U);
    }
    tables[0][byte] = crc;
  }
  for (std::size_t row = 1; row < tables.size(); ++row) {
    for (std::size_t byte = 0; byte < 256; ++byte) {
      const std::uint32_t crc = tables[row - 1][byte];
      tables[row][byte] = (crc >> 8U) ^ tables[0][crc & 0xFFU];
    }
  }
  return tables;
}

constexpr std::array<Table, 8> tables = made_tables();

constexpr std::uint32_t byte_of(std::uint64_t word, unsigned index) {
  return static_cast<std::uint32_t>(word >> (8 * index)) & 0xFFU;
}

std::uint32_t after_eight(std::uint32_t crc, const std::uint8_t* from) {
  static_assert(std::endian::native == std::endian::little);
  std::uint64_t word = 0;
  std::memcpy(&word, from, sizeof word);
  word ^= crc;
  return tables[7][byte_of(word, 0)] ^ tables[6][byte_of(word, 1)] ^ tables[5][byte_of(word, 2)] ^
         tables[4][byte_of(word, 3)] ^ tables[3][byte_of(word, 4)] ^ tables[2][byte_of(word, 5)] ^
         tables[1][byte_of(word, 6)] ^ tables[0][byte_of(word, 7)];
}

}  // namespace

std::uint32_t crc32c(std::span<const std::uint8_t> bytes, std::uint32_t before) {
  std::uint32_t crc = ~before;
  std::size_t at = 0;
  for (; at + 8 <= bytes.size(); at += 8) {
    crc = after_eight(crc, bytes.data() + at);
  }
  for (; at < bytes.size(); ++at) {
    crc = (crc >> 8U) ^ tables[0][(crc ^ bytes[at]) & 0xFFU];
  }
  return ~crc;
}

}  // namespace lostwork
