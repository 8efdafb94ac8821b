// The real bus: Modbus TCP and RTU by libmodbus.
//
// Reads only: the frames it can build carry function codes 1 to 4. Reconnects by itself: a call
// made before the next attempt is due fails at once with `connection`. Its own error recovery is
// off. After a timeout or a malformed answer TCP closes and reconnects, RTU waits until the line is
// quiet.
#pragma once

#include "sensors/bus.h"
#include "sensors/wiring.h"
#include "thermo/reading.h"

#include <chrono>
#include <cstdint>
#include <functional>
#include <memory>
#include <string>

#include <tl/expected.hpp>

namespace lostwork {

// Where a bus has its time and its jitter from. The defaults are the machine's own clocks.
struct BusClocks {
  std::function<Instant()> utc = [] {
    return std::chrono::time_point_cast<Span>(std::chrono::system_clock::now());
  };
  std::function<std::chrono::steady_clock::time_point()> steady = std::chrono::steady_clock::now;
  std::uint64_t jitter_seed = 0;  // 0: from the operating system's random device
};

// Does not connect yet. A sentence on what is wrong where the options cannot be used (a kind that
// is not supported, an address that is not numeric, a line setting out of range).
[[nodiscard]] tl::expected<std::unique_ptr<Bus>, std::string> modbus_bus(const BusOptions& options,
                                                                         BusClocks clocks = {});

}  // namespace lostwork
