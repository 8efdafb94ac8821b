// Gathering windows until they make a baseline, and adding conditions not yet seen.
//
// Pure, part of health.h.
#pragma once

#include "thermo/health/health.h"

namespace lostwork {

// Keeps the window for the baseline if it is far enough from the last one kept.
void gather(HealthState& state, const Sample& sample);

// At the end of a day: makes the baseline when enough has been seen.
void learn(const HealthModel& model, HealthState& state);

// Keeps a window outside the baseline for an extension.
void gather_newcomer(HealthState& state, const Sample& sample);

// At the end of a day: takes newcomers in, while what was learned before holds.
void extend(const HealthModel& model, HealthState& state);

}  // namespace lostwork
