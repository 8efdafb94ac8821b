// Merges the registers of one device into read requests. Pure.
#pragma once

#include "sensors/decode.h"

#include <cstddef>
#include <cstdint>
#include <span>
#include <vector>

namespace lostwork {

struct RegisterNeed {
  Table table = Table::holding;
  std::uint16_t address = 0;
  std::uint16_t count = 1;  // words that must come in one request, so that they belong together
};

struct BlockRules {
  std::uint16_t max_registers = 125;  // MODBUS Application Protocol V1.1b3, 6.3
  std::uint16_t max_bits = 2000;      // 6.1
  std::uint16_t max_gap = 10;         // unwanted words between two wanted ones
  // What is minimised: requests * request_cost + words * word_cost, for bits a sixteenth of a word
  // each. The default asks for the fewest requests, and of those plans for the fewest words.
  double request_cost = 1.0;
  double word_cost = 1e-6;
};

struct Block {
  Table table = Table::holding;
  std::uint16_t address = 0;
  std::uint16_t count = 0;
  std::vector<std::size_t> needs{};  // indices into the needs, all inside the block
};

// Every need is in exactly one block; a need larger than the limit has a block of its own.
[[nodiscard]] std::vector<Block> blocks_of(std::span<const RegisterNeed> needs,
                                           const BlockRules& rules);

// The least block around some needs of one table. which: not empty.
[[nodiscard]] Block block_around(std::span<const RegisterNeed> needs,
                                 std::vector<std::size_t> which);

}  // namespace lostwork
