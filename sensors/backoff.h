// How long to leave something alone that has failed. Pure.
#pragma once

#include "thermo/reading.h"

#include <algorithm>

namespace lostwork {

// first after the first failure, doubled for each further one, up to limit. failures: >= 1.
[[nodiscard]] constexpr Span backoff(Span first, Span limit, int failures) {
  Span pause = first;
  for (int i = 1; i < failures && pause < limit; ++i) {
    pause *= 2;
  }
  return std::min(pause, limit);
}

}  // namespace lostwork
