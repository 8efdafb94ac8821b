// How still each signal must be, and what the machine itself taught about that.
//
// Pure. Table: methods.md 3, default detector (engineering judgement, no published figures).
#pragma once

#include "thermo/measure/block_sums.h"
#include "thermo/reading.h"
#include "thermo/role.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>

namespace lostwork {

// Largest change by the slope over the window's nominal length, and largest scatter about the line.
// Relative: of the signal's mean; a speed: of the largest one seen.
struct SteadyLimit {
  double change;
  double scatter;
  bool relative;
};

struct SteadyLimits {
  SteadyLimit leaving_K{.change = 0.3, .scatter = 0.10, .relative = false};
  SteadyLimit entering_K{.change = 0.5, .scatter = 0.15, .relative = false};
  SteadyLimit pressure{.change = 0.02, .scatter = 0.01, .relative = true};
  SteadyLimit discharge_K{.change = 2.0, .scatter = 0.5, .relative = false};
  SteadyLimit power{.change = 0.03, .scatter = 0.03, .relative = true};
  SteadyLimit flow{.change = 0.03, .scatter = 0.02, .relative = true};
  SteadyLimit speed{.change = 0.03, .scatter = 0.02, .relative = true};
  double floor_factor = 3.0;  // of the quantisation step, and of the quietest decile
  double floor_most = 3.0;    // the learned floor never exceeds so many limits of the table, so
                              // that a machine that always hunts is not called steady for it
  std::uint32_t floor_windows = 20;  // windows until the quietest decile is believed
};

// None: the detector does not look at this role.
[[nodiscard]] const SteadyLimit* limit_of(const SteadyLimits& limits, Role role);

// What the detector learned and remembers of one point.
struct SteadySignal {
  static constexpr std::size_t bins = 40;

  std::optional<Instant> last_good;
  std::optional<Instant> gap_ended;  // end of the last gap that was too long
  double last_SI = 0.0;
  double largest_SI = 0.0;  // in size
  double step_SI = 0.0;     // smallest change between two scans: the quantisation; 0: none seen
  double quietest = 0.0;    // quietest decile of the scatter, in limits of the table; 0: not known
  std::uint32_t windows = 0;
  std::array<std::uint32_t, bins> scatters{};  // windows by scatter over limit: 0.01 x 1.25^bin
};

// Takes up one good value.
void see(SteadySignal& signal, double value_SI, Instant time, Span longest_gap);

// How far a fitted signal is beyond its limits: above 1 it is not steady.
struct Unrest {
  double change;
  double scatter;
};
[[nodiscard]] Unrest unrest(const SteadyLimits& limits, Role role, const SteadySignal& signal,
                            const LineSums& sums, Span window);

// Takes up the scatter of one window of ordinary running, steady or not.
void learn(const SteadyLimits& limits, Role role, SteadySignal& signal, const LineSums& sums);

template <class Archive>
void archive(Archive& a, SteadySignal& s) {
  a(s.last_good, s.gap_ended, s.last_SI, s.largest_SI, s.step_SI, s.quietest, s.windows,
    s.scatters);
}

}  // namespace lostwork
