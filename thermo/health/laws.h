// Whether the readings of steady windows keep the first and the second law. What breaks a law is a
// wrong reading, never the machine: it names a small set of sensors, before anything is learned.
//
// Pure, part of health.h. Source: methods.md 2.4, inequalities and persistence. Heat flows downhill
// against the streams' entering sides, where 2.4 has the leaving ones: that holds with a
// desuperheating condenser too. Pressures that are swapped, and states that contradict each other
// within one scan, are refused by the ledger and reach no window.
#pragma once

#include "thermo/health/health.h"

#include <cstdint>
#include <optional>
#include <vector>

namespace lostwork {

// Stored in states as bits: the numbers are never changed, new ones go to the end.
enum class Law : std::uint8_t {
  heats_close = 0,     // W + Q_L - Q_H - Q_a = 0
  cold_stream_cools,   // T_in >= T_out
  hot_stream_warms,    // T_out >= T_in
  evaporates_below,    // T_e <= cold stream's T_in
  condenses_above,     // T_c >= hot stream's T_in
  compressor_entropy,  // lost work >= 0
  condenser_entropy,   // the same
  evaporator_entropy,  // the same
  count
};
inline constexpr std::size_t law_count = static_cast<std::size_t>(Law::count);
static_assert(law_count <= 32);

struct LawCheck {
  std::uint32_t tested = 0;  // bit 1 << Law
  std::uint32_t broken = 0;
  std::array<std::optional<Evidence>, law_count>
      evidence;  // of those broken: the bound, the figure
};

// A law is broken where the figure is beyond its bound by more than two standard uncertainties; the
// balance of the heats by more than three, for a bias lasts: two would accuse one healthy plant in
// twenty for good. A law is not tested where a figure is missing or without uncertainty, or one of
// its sensors has no stated accuracy.
[[nodiscard]] LawCheck check_laws(const MachineModel& machine, const Window& window);

// The sensors there are that the figure of the law rests on.
[[nodiscard]] std::vector<Role> sensors_of(Law law, const MachineModel& machine);

// Takes the window into the finding of kind law_broken: opened when a law was broken in four of
// five windows of the last day, twelve at least (of the last month where a day has fewer); ended
// when the laws that it was opened for are whole in four of five of as many. Hands it back where it
// was opened, changed or ended. Its onset is bounded by what is remembered and is no 95 % interval.
[[nodiscard]] std::optional<Finding> follow_laws(const HealthModel& model, HealthState& state,
                                                 Instant end, const LawCheck& check);

// A window in the memory broke a law: what is said of learning has its reason there.
[[nodiscard]] bool any_broken(const HealthState& state);

}  // namespace lostwork
