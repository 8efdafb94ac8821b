// All quantities of one machine over a minute, an hour or a day, as sums that can be added to.
//
// Pure. Adding scans in another order gives the same up to rounding, and exactly the same reasons,
// counts, extremes, mode and level.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/measured.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"
#include "thermo/result.h"

#include <array>
#include <cstddef>
#include <cstdint>

namespace lostwork {

// weight: 1 for a scan; for a ratio its denominator (weight_of), so that sum / weight is the ratio
// of the sums. A ratio whose denominator is missing or not above 0 counts with weight 1.
struct QuantitySums {
  double sum = 0.0;    // of weight * value
  double u_sum = 0.0;  // of weight * u
  double weight = 0.0;
  double min = 0.0;         // of the values; means something where count > 0
  double max = 0.0;         // the same
  std::uint32_t count = 0;  // scans with a value
  // Of the newest scan; means something where count = 0.
  Reason reason{.code = ReasonCode::not_read, .blame = {}};

  // Exactly the value of the scan where there is but one. u is the mean of the scans' u, for the
  // errors of sensors do not average out.
  [[nodiscard]] Result<Measured> mean() const;
};

struct PeriodSums {
  std::uint32_t scans = 0;
  std::uint32_t steady_scans = 0;
  std::uint64_t covered_ms = 0;  // time that the scans stand for
  Instant newest{};              // of its scans; the next two are of that one
  Mode mode = Mode::unknown;
  Level level = Level::L0;
  std::array<QuantitySums, quantity_count> quantities;

  [[nodiscard]] const QuantitySums& operator[](Quantity q) const {
    return quantities.at(static_cast<std::size_t>(q));
  }
};

// u is kept to the precision of a float, seven digits. A value or u that is not finite counts as
// missing (implausible).
void add(PeriodSums& sums, const Assessment& assessment, Span covers);
void add(PeriodSums& sums, const PeriodSums& more);

}  // namespace lostwork
