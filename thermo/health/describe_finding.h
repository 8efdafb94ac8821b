// Fills a finding with what is known of it on a day: causes, place, cost, onset.
//
// Pure, part of health.h. Needs a baseline.
#pragma once

#include "thermo/health/health.h"
#include "thermo/health/judgement.h"

namespace lostwork {

// At most five causes, each with a probability of 0.02 and more; none where nothing explains what
// was seen.
void describe_causes(Finding& finding, const Judgement& judgement);

// The component whose lost work grew most, if it did so beyond doubt and beyond the next one's;
// needs finding.size.
void describe_components(Finding& finding, const Judgement& judgement);

// Needs finding.onset.
void describe_cost(const HealthModel& model, const HealthState& state, Finding& finding);

// By the feature that was moved most; left as it was where no rise explains the days.
void describe_onset(Finding& finding, const HealthState& state, const Judgement& judgement);

}  // namespace lostwork
