// `lostwork check`: is the plant file right, and what do its sensors allow?
#pragma once

#include <ostream>
#include <span>
#include <string_view>

namespace lostwork {

// Returns 0 when all is well, 1 when a machine is below level L1 or a probed point could not be
// read, 2 for a bad plant file or bad usage.
[[nodiscard]] int check_command(std::span<const std::string_view> arguments, std::ostream& out,
                                std::ostream& err);

}  // namespace lostwork
