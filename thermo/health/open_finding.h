// The open findings of one machine: looked up by kind, opened, ended.
//
// Pure, part of health.h. At most one of each kind is open.
#pragma once

#include "thermo/health/health.h"

#include <cstddef>
#include <optional>

namespace lostwork {

// Place in state.findings and state.progress; none: not open.
[[nodiscard]] std::optional<std::size_t> open_of(const HealthState& state, FindingKind kind);

// The place of the open one, or of a new one in the state watch.
[[nodiscard]] std::size_t opened(const HealthModel& model, HealthState& state, FindingKind kind,
                                 Instant now);

// Takes the finding out of the state and hands it back as over.
[[nodiscard]] Finding closed(HealthState& state, std::size_t at, Instant now);

}  // namespace lostwork
