// All computed quantities of one machine at one instant.
#pragma once

#include "thermo/quantity.h"
#include "thermo/reading.h"

#include <cstdint>
#include <string_view>

namespace lostwork {

// Stored in databases: the numbers are never changed, new ones go to the end.
enum class Mode : std::uint8_t {
  off = 0,
  starting = 1,
  running = 2,
  stopping = 3,
  defrost = 4,
  cycling = 5,
  unknown = 6,
  count
};
[[nodiscard]] std::string_view name(Mode mode);

// What the present sensors allow.
enum class Level : std::uint8_t { L0 = 0, L1, L2, L3, L4, L5, count };
[[nodiscard]] std::string_view name(Level level);

struct Assessment {
  Instant time{};
  Mode mode = Mode::unknown;
  bool steady = false;
  Level level = Level::L0;
  QuantityValues values;
};

}  // namespace lostwork
