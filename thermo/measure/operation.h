// What a machine is doing, from its power and, where there is one, its compressor speed.
//
// Pure; state in, state out. Scans come in the order of time.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/reading.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>

namespace lostwork {

// All figures are engineering judgement without a published source; cycling_starts is methods.md 3.
struct OperationOptions {
  double on_above = 0.06;   // share of the rated power at which a machine that is off is on
  double off_below = 0.03;  // and the share at which one that is on is off; < on_above
  double turning_Hz = 1.0;  // speed from which a compressor turns
  Span settling{180000};    // a start is `starting` for so long
  Span stopping{30000};  // a stop is a stop when it has lasted so long; no start is counted before
  Span unknown_after{60000};         // or three scans, if that is longer
  std::uint32_t cycling_starts = 6;  // more of them within the last hour: cycling
};

struct OperationState {
  static constexpr std::size_t remembered = 16;

  Mode mode = Mode::unknown;
  Instant since{};  // when the mode began
  bool on = false;
  bool start_seen = false;               // of the present run
  Instant on_since{};                    // the start; when first seen, if it ran before that
  std::optional<Instant> low_since;      // on, but the power is gone since then
  std::optional<Instant> last_good;      // last scan that told on from off
  std::optional<Instant> defrost_ended;  // end of the last defrost
  std::array<Instant, remembered>
      starts{};  // a ring of the last starts; at starts_seen % remembered
  std::uint64_t starts_seen = 0;
  Span run_time{0};  // on, summed over scans
  std::optional<Instant> last_scan;
};

// The state after this scan. A machine that is on when first seen has not started: it is running.
// Power decides; speed does where power is missing or between the two shares. Without either the
// mode stays for unknown_after, then it is unknown. Power clearly below zero tells nothing: a
// transformer is the wrong way round.
[[nodiscard]] OperationState after_scan(const OperationOptions& options, const MachineModel& model,
                                        const OperationState& state, const Scan& scan);

[[nodiscard]] std::uint32_t starts_within_hour(const OperationState& state, Instant now);

template <class Archive>
void archive(Archive& a, OperationState& s) {
  a(s.mode, s.since, s.on, s.start_seen, s.on_since, s.low_since, s.last_good, s.defrost_ended,
    s.starts, s.starts_seen, s.run_time, s.last_scan);
}

}  // namespace lostwork
