// When a drift began, and how large it is now: a change-point regression on daily residuals.
//
// Pure. The residual is a constant, then a rise that begins at the onset: a step, a ramp that goes
// on, a ramp that stops, bent upwards or downwards. Every onset and every shape is weighed by its
// marginal likelihood (normal errors of unknown size, Bayesian linear regression; Gelman et al.,
// Bayesian Data Analysis, ch. 14), so that the interval knows of the doubt about the shape.
// Autocorrelation widens the errors by sqrt((1 + r) / (1 - r)).
#pragma once

#include "thermo/measured.h"
#include "thermo/result.h"

#include <cstdint>
#include <vector>

namespace lostwork {

struct DayValue {
  std::int64_t day;  // since any origin; its figures belong to its middle
  double residual;   // ratio
  double u;          // its own standard uncertainty, > 0: says how days compare with each other
};

struct OnsetPrior {
  double offset_u = 0.005;       // how far the baseline may be off in the mean
  double scatter = 0.01;         // of a day, from the baseline
  double scatter_days = 20.0;    // how many days that is worth
  double autocorrelation = 0.0;  // of the baseline's days
};

struct OnsetEstimate {
  double best;  // most likely onset, in days since the beginning of day 0
  double earliest;
  double latest;  // 95 % interval
  Measured size;  // of the rise on the last day, ratio
};

// Days in order, each once. Refuses: load_too_small with fewer than five days; implausible where a
// figure is not finite or u is not above 0; contradicts where no rise explains the figures.
[[nodiscard]] Result<OnsetEstimate> estimate_onset(const std::vector<DayValue>& days,
                                                   const OnsetPrior& prior);

}  // namespace lostwork
