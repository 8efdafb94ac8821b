// A synthetic history through health, as the daemon plays it.
#pragma once

#include "tests/thermo/health/synthetic_machine.h"
#include "thermo/health/health.h"

#include <optional>
#include <vector>

namespace lostwork::testing {

struct Played {
  HealthState state;
  std::vector<Finding> changed;
  std::vector<DailyResidual> days;

  // The last that was said of the kind; none: nothing was.
  [[nodiscard]] std::optional<Finding> last(FindingKind kind) const;
  // As it was when it became active; none: it never did.
  [[nodiscard]] std::optional<Finding> confirmed(FindingKind kind) const;
};

// Of the synthetic machine, with electricity at 0.20 EUR/kWh.
[[nodiscard]] HealthModel health_model();

void play(const HealthModel& model, Played& played, const std::vector<Window>& windows);
[[nodiscard]] Played played(const std::vector<Window>& windows);

}  // namespace lostwork::testing
