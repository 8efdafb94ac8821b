// A closed steady interval of one machine: what baseline and drift work on.
#pragma once

#include "thermo/quantity.h"
#include "thermo/reading.h"

#include <array>
#include <cstdint>
#include <optional>

namespace lostwork {

struct WindowMean {
  double mean_SI;
  double u_SI;         // standard uncertainty from the sensors' accuracy: the part that stays
  double sd_SI;        // scatter of the scans within the window
  double n_effective;  // n (1 - r) / (1 + r), r = lag-one autocorrelation; >= 1
};

struct Window {
  Instant begin{};
  Instant end{};
  std::uint32_t scans = 0;
  // Ratios are made from the means of their parts, never averaged. None where it was missing in the
  // window.
  std::array<std::optional<WindowMean>, quantity_count> values{};

  [[nodiscard]] const std::optional<WindowMean>& operator[](Quantity q) const {
    return values.at(static_cast<std::size_t>(q));
  }
};

}  // namespace lostwork
