// When a machine runs steadily, and the closed windows that this gives.
//
// A straight line through the last ten minutes of every signal: steady when its slope and the
// scatter about it are small for all of them (methods.md 3, default detector; its limits are
// engineering judgement). Pure; state in, state out. Costs the same for every scan period.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/measure/block_sums.h"
#include "thermo/measure/operation.h"
#include "thermo/measure/window.h"
#include "thermo/reading.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

// Largest change by the slope over the window's nominal length, and largest scatter about the line.
// Relative: of the signal's mean, for speed of the largest speed seen.
struct SteadyLimit {
  double change;
  double scatter;
  bool relative;
};

struct SteadyOptions {
  Span window{600000};
  Span after_start{900000};
  Span after_defrost{600000};
  Span after_edge{600000};  // of the machine's own mode word
  Span gap{60000};          // or two scans, if that is longer
  double good_share = 0.8;  // of the samples due; a quarter of it is enough above good_enough
  std::uint32_t good_enough = 30;
  std::uint32_t good_least = 8;
  SteadyLimit leaving_K{.change = 0.3, .scatter = 0.10, .relative = false};
  SteadyLimit entering_K{.change = 0.5, .scatter = 0.15, .relative = false};
  SteadyLimit pressure{.change = 0.02, .scatter = 0.01, .relative = true};
  SteadyLimit discharge_K{.change = 2.0, .scatter = 0.5, .relative = false};
  SteadyLimit power{.change = 0.03, .scatter = 0.03, .relative = true};
  SteadyLimit flow{.change = 0.03, .scatter = 0.02, .relative = true};
  SteadyLimit speed{.change = 0.03, .scatter = 0.02, .relative = true};
  double floor_factor = 3.0;         // of the quantisation step, and of the quietest decile
  double floor_most = 3.0;           // the learned floor never exceeds so many table limits
  std::uint32_t floor_windows = 20;  // windows until the quietest decile is believed
};

// Why a scan is not steady. Stored: the numbers are never changed.
enum class UnsteadyCause : std::uint8_t {
  none = 0,     // steady
  not_running,  // off, starting, stopping, defrost or unknown
  cycling,
  hold_off,  // too soon after a start, a defrost or a change of the mode word
  filling,   // the window is not full yet
  gap,       // samples are missing
  trend,     // a signal goes up or down
  scatter,   // a signal hunts
  count
};

struct SteadyVerdict {
  UnsteadyCause cause = UnsteadyCause::filling;
  std::optional<std::size_t> point;  // index into MachineModel::points, for gap, trend and scatter
  [[nodiscard]] bool steady() const { return cause == UnsteadyCause::none; }
};

// Of the time that the machine ran within the last seven days.
struct SteadyShare {
  Span run_time{0};
  Span steady_time{0};
  UnsteadyCause main_cause = UnsteadyCause::none;  // what most of the rest was lost to
  std::optional<std::size_t> point;                // for trend and scatter: the worst signal
  [[nodiscard]] double share() const {
    return run_time.count() > 0
               ? static_cast<double>(steady_time.count()) / static_cast<double>(run_time.count())
               : 0.0;
  }
};

// About a minute of scans.
struct SteadyBlock {
  Instant begin{};
  Instant end{};  // the last scan
  std::uint32_t scans = 0;
  std::vector<LineSums> signals;        // one a point of the model
  std::vector<ScatterSums> quantities;  // one a quantity
};

// What the detector learned and remembers of one point.
struct SteadySignal {
  static constexpr std::size_t bins = 40;

  std::optional<Instant> last_good;
  std::optional<Instant> gap_ended;  // end of the last gap that was too long
  double last_SI = 0.0;
  double largest_SI = 0.0;  // in size
  double step_SI = 0.0;     // smallest change between two scans: the quantisation; 0: none seen
  std::array<std::uint32_t, bins> scatters{};  // windows by scatter, in steps of a quarter
  std::uint32_t windows = 0;
};

struct SteadyDay {
  std::int64_t day = 0;  // since 1970, UTC
  Span run_time{0};
  Span steady_time{0};
  std::array<Span, static_cast<std::size_t>(UnsteadyCause::count)> lost{};
  std::vector<Span> lost_to;  // one a point: trend and scatter
};

struct SteadyState {
  std::vector<SteadyBlock> blocks;  // complete ones, oldest first
  SteadyBlock open;
  std::vector<LineSums> joined;  // of all complete blocks, one a point
  std::vector<SteadySignal> signals;
  std::vector<SteadyDay> days;  // at most eight
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

// `operation`: after this scan. `values`: computed from it. A scan is steady where the line through
// its last ten minutes is; a window closes when ten such minutes are whole and unused.
[[nodiscard]] SteadyStep after_scan(const SteadyOptions& options, const MachineModel& model,
                                    SteadyState state, const Scan& scan,
                                    const OperationState& operation, const QuantityValues& values);

[[nodiscard]] SteadyShare steady_share(const SteadyState& state);

template <class Archive>
void archive(Archive& a, SteadyBlock& s) {
  a(s.begin, s.end, s.scans, s.signals, s.quantities);
}
template <class Archive>
void archive(Archive& a, SteadySignal& s) {
  a(s.last_good, s.gap_ended, s.last_SI, s.largest_SI, s.step_SI, s.scatters, s.windows);
}
template <class Archive>
void archive(Archive& a, SteadyDay& s) {
  a(s.day, s.run_time, s.steady_time, s.lost, s.lost_to);
}
template <class Archive>
void archive(Archive& a, SteadyState& s) {
  a(s.blocks, s.open, s.joined, s.signals, s.days, s.last_scan, s.used_until, s.learned_until,
    s.mode_word, s.edge);
}

}  // namespace lostwork
