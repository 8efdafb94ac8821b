// SHA-256 of bytes: names a text by its content, and chains the rows of the journal.
//
// Pure. Source: FIPS 180-4.
#pragma once

#include <array>
#include <cstdint>
#include <span>
#include <string>

namespace lostwork {

using Sha256 = std::array<std::uint8_t, 32>;

[[nodiscard]] Sha256 sha256(std::span<const std::uint8_t> bytes);
[[nodiscard]] std::string hexadecimal(const Sha256& hash);  // 64 digits, lower case

}  // namespace lostwork
