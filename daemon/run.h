// `lostwork run`: the daemon.
#pragma once

#include <ostream>
#include <span>
#include <string_view>

namespace lostwork {

// Returns 0 after a clean end, 2 for bad usage, a bad plant file, or where it cannot start.
[[nodiscard]] int run_command(std::span<const std::string_view> arguments, std::ostream& out,
                              std::ostream& err);

}  // namespace lostwork
