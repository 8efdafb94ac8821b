// `lostwork replay`: a recorded history through the same pipeline as the live loop, at full speed.
#pragma once

#include <ostream>
#include <span>
#include <string_view>

namespace lostwork {

// Returns 0 done, 1 the results could not be written, 2 bad usage or input. Nothing is written
// unless the whole input is good.
[[nodiscard]] int replay_command(std::span<const std::string_view> arguments, std::ostream& out,
                                 std::ostream& err);

}  // namespace lostwork
