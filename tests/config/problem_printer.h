// Shows a Problem in test messages.
#pragma once

#include "config/problem.h"

#include <ostream>

namespace lostwork {

inline void PrintTo(const Problem& problem, std::ostream* out) {
  *out << text("", problem);
}

}  // namespace lostwork
