// CRC-32C of bytes: tells a damaged blob from a whole one.
//
// Pure. Source: Castagnoli polynomial as in RFC 3720 (iSCSI), section 12.1 and appendix B.4.
#pragma once

#include <cstdint>
#include <span>

namespace lostwork {

// `before`: the result for the bytes that come before these; 0 for none.
[[nodiscard]] std::uint32_t crc32c(std::span<const std::uint8_t> bytes, std::uint32_t before = 0);

}  // namespace lostwork
