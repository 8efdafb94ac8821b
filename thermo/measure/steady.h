// When a machine runs steadily, and the closed windows that this gives.
//
// A straight line through the last ten minutes of every signal: steady when its slope and the
// scatter about it are small for all of them (methods.md 3, default detector). Pure; state in,
// state out. Nothing but sums by the minute is kept, so that state and cost are the same for every
// scan period from 1 s to 75 s; with longer ones ten minutes hold too few samples to tell.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/measure/block_sums.h"
#include "thermo/measure/operation.h"
#include "thermo/measure/steady_limits.h"
#include "thermo/measure/steady_share.h"
#include "thermo/measure/window.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"

#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

struct SteadyOptions {
  Span window{600000};
  Span after_start{900000};
  Span after_defrost{600000};
  Span after_edge{600000};         // of the machine's own mode word
  Span gap{60000};                 // or two scans, if that is longer
  double good_share = 0.8;         // of the samples due that must be good, unless there are
  std::uint32_t good_enough = 30;  // so many,
  std::uint32_t good_least = 8;    // and never fewer than these
  SteadyLimits limits;
};

// About a minute of scans.
struct SteadyBlock {
  Instant begin{};
  Instant end{};  // the last scan
  std::uint32_t scans = 0;
  std::vector<LineSums> signals;        // one a point of the model
  std::vector<ScatterSums> quantities;  // one a quantity
};

struct SteadyState {
  std::vector<SteadyBlock> blocks;  // complete ones, oldest first
  SteadyBlock open;
  std::vector<LineSums> joined;  // of all complete blocks, one a point
  std::vector<SteadySignal> signals;
  std::vector<SteadyDay> days;
  std::optional<Instant> last_scan;
  std::optional<Instant> used_until;     // last scan of the last window
  std::optional<Instant> learned_until;  // and of the last one that taught the quietest decile
  std::optional<double> mode_word;
  std::optional<Instant> edge;  // last change of the mode word
};

struct SteadyStep {
  SteadyState next;
  SteadyVerdict verdict;
  std::optional<Window> window;  // closed by this scan; overlaps no earlier one
};

// What one scan brings: the mode after it, and the quantities computed from it.
struct SteadyInput {
  const Scan& scan;
  const OperationState& operation;
  const QuantityValues& values;
};

// Scans come in the order of time. A window closes when ten steady minutes are whole and unused. A
// point without any good sample in the window does not count, but for the power.
[[nodiscard]] SteadyStep after_scan(const SteadyOptions& options, const MachineModel& model,
                                    SteadyState state, const SteadyInput& input);

template <class Archive>
void archive(Archive& a, SteadyBlock& s) {
  a(s.begin, s.end, s.scans, s.signals, s.quantities);
}
template <class Archive>
void archive(Archive& a, SteadyState& s) {
  a(s.blocks, s.open, s.joined, s.signals, s.days, s.last_scan, s.used_until, s.learned_until,
    s.mode_word, s.edge);
}

}  // namespace lostwork
