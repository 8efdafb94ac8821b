// Whether a name that is not known is a known one, mistyped.
#pragma once

#include <string_view>

namespace lostwork {

// True where the names differ in one place only, by two neighbours swapped or by a run of letters
// not longer than a third of the meant name, and two at most (large and small letters count as the
// same). False for the name itself. Engineering judgement, no published figure.
[[nodiscard]] bool is_slip_of(std::string_view written, std::string_view meant);

}  // namespace lostwork
