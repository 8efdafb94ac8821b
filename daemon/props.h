// `lostwork props`: properties of a fluid for a point or a CSV of points, as CSV.
#pragma once

#include <ostream>
#include <span>
#include <string_view>

namespace lostwork {

// The arguments after the command's name; results to `out`, one sentence to `err` for what is
// wrong with them. 0: every point has its row, which for a point without an answer holds the reason
// alone; 1: the one point of the command line has no answer; 2: bad usage or input, and then
// nothing was written to `out`. --input is read whole first.
[[nodiscard]] int props_command(std::span<const std::string_view> arguments, std::ostream& out,
                                std::ostream& err);

}  // namespace lostwork
