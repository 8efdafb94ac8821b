// Whether a name that is not known is a known one, mistyped.
#pragma once

#include <string_view>

namespace lostwork {

// True where at most a third of the meant name's letters, and two at most, were changed, left out,
// added or swapped with their neighbour (large and small letters count as the same). False for the
// name itself. Engineering judgement, no published figure.
[[nodiscard]] bool is_slip_of(std::string_view written, std::string_view meant);

}  // namespace lostwork
