// What health remembers of one machine. A value: copied, moved, archived; only thermo/health/ looks
// inside.
#pragma once

#include "thermo/health/finding.h"
#include "thermo/reading.h"

#include <cstdint>
#include <vector>

namespace lostwork {

struct HealthState {
  // Of the layout; an archive of another version is refused with ArchiveDamaged.
  static constexpr std::uint32_t layout = 1;

  Instant last_window_end{};
  std::vector<Finding> findings;  // not over
};

template <class Archive>
void archive(Archive& a, HealthState& state);

}  // namespace lostwork
