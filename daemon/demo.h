// `lostwork demo`: the whole program against the simulated plant of Tern Quay Dairy.
#pragma once

#include <ostream>
#include <span>
#include <string_view>

namespace lostwork {

// A past season goes through the very pipeline first; then the plant runs on behind a real Modbus
// TCP server on loopback, faster than the clock. Returns as run_command does.
[[nodiscard]] int demo_command(std::span<const std::string_view> arguments, std::ostream& out,
                               std::ostream& err);

}  // namespace lostwork
