// The version of the program.
#pragma once

#include <string_view>

namespace lostwork {

inline constexpr std::string_view version = "0.1.0";

}  // namespace lostwork
