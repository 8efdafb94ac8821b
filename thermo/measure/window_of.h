// From sums over a steady interval to the means that baseline and drift work on.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/measure/block_sums.h"
#include "thermo/measure/window.h"

#include <array>

namespace lostwork {

struct WindowSums {
  Instant begin{};
  Instant end{};
  std::uint32_t scans = 0;
  std::array<ScatterSums, quantity_count> quantities{};
};

// A quantity that was missing in more than a fifth of the scans has no mean (methods.md 9.6).
// Ratios are made from the means of their parts; their uncertainty and scatter are those of the
// scans.
[[nodiscard]] Window window_of(const WindowSums& sums, Duty duty);

}  // namespace lostwork
