// Whether the readings of steady windows keep the first and the second law. What breaks a law is a
// wrong reading, never the machine: it names a small set of sensors, before anything is learned.
//
// Pure, part of health.h. Source: methods.md 2.4, inequalities and persistence.
#pragma once

#include "thermo/health/health.h"

#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

// A window breaks the first law where W + Q_L - Q_H - Q_a is off zero by more than three standard
// uncertainties (the sensors' bias lasts: two would accuse one healthy plant in twenty for good);
// the second where a stream goes the wrong way, heat flows uphill, or a component destroys entropy,
// by more than two.
struct LawCheck {
  std::uint32_t tested = 0;  // a bit a law
  std::uint32_t broken = 0;
  std::vector<Evidence> evidence;  // of those broken: what the law allows, what was found
};
[[nodiscard]] LawCheck check_laws(const Window& window);

// Takes the window into the finding of kind law_broken: opened when a law was broken in four of
// five windows of the last day, twelve at least; ended when it is whole in four of five. Hands it
// back where it was opened, changed or ended.
[[nodiscard]] std::optional<Finding> follow_laws(const HealthModel& model, HealthState& state,
                                                 Instant end, const LawCheck& check);

}  // namespace lostwork
