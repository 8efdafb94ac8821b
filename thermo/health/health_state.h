// What health remembers of one machine. A value: copied, moved, archived; only thermo/health/ looks
// inside.
#pragma once

#include "thermo/archive.h"
#include "thermo/health/baseline.h"
#include "thermo/health/cusum.h"
#include "thermo/health/day.h"
#include "thermo/health/features.h"
#include "thermo/health/finding.h"
#include "thermo/reading.h"

#include <array>
#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

struct FeatureCharts {
  Cusum up;
  Cusum down;
};

// Of one open finding: what its next state depends on.
struct FindingProgress {
  std::uint32_t days = 0;          // evaluated since it was first seen
  std::uint32_t days_as_said = 0;  // in a row that the diagnosis stayed with the kind
  std::uint32_t quiet_days = 0;    // in a row without its sign
};

// Which laws (laws.h) a steady window could be held to, and which of them it broke; a bit a law.
struct LawWindow {
  Instant end{};
  std::uint32_t tested = 0;
  std::uint32_t broken = 0;
};

struct HealthState {
  // Of the layout; an archive of another one is refused with ArchiveDamaged.
  static constexpr std::uint32_t layout = 3;

  std::optional<Instant> last_window_end;
  std::optional<DaySums> today;

  // Learning.
  std::uint32_t generation = 1;             // learning sets begun
  std::uint32_t extension = 0;              // of the baseline in force
  std::vector<Sample> samples;              // what the baseline was made of, or will be
  std::vector<Sample> newcomers;            // windows outside it, for an extension
  std::vector<std::int64_t> learning_days;  // days with samples
  std::optional<Baseline> baseline;
  bool accepted = false;
  bool unattended = false;

  // Following.
  std::vector<DayRecord> days;        // closed, oldest first
  std::vector<Inputs> recent_inputs;  // of the last days
  std::int64_t history_from = 0;      // days before it belong to an earlier finding
  std::array<FeatureCharts, feature_count> charts{};
  std::vector<Finding> findings;          // not over
  std::vector<FindingProgress> progress;  // of the same
  std::vector<LawWindow> law_windows;     // of the last day or the last dozen
  std::uint32_t laws_said = 0;            // those that the open finding names; a bit a law
};

template <class Archive>
void archive(Archive& a, Cusum& c) {
  a(c.sum, c.rising);
}
template <class Archive>
void archive(Archive& a, FeatureCharts& c) {
  a(c.up, c.down);
}
template <class Archive>
void archive(Archive& a, FindingProgress& p) {
  a(p.days, p.days_as_said, p.quiet_days);
}
template <class Archive>
void archive(Archive& a, LawWindow& w) {
  a(w.end, w.tested, w.broken);
}
template <class Archive>
void archive(Archive& a, HealthState& s) {
  std::uint32_t layout = HealthState::layout;
  a(layout);
  if (layout != HealthState::layout) {
    throw ArchiveDamaged{"the stored state of the health of a machine is of another version"};
  }
  a(s.last_window_end, s.today, s.generation, s.extension, s.samples, s.newcomers, s.learning_days,
    s.baseline, s.accepted, s.unattended, s.days, s.recent_inputs, s.history_from, s.charts,
    s.findings, s.progress, s.law_windows, s.laws_said);
}

}  // namespace lostwork
