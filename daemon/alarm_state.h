// The states of an alarm, and how it goes from one to the next.
//
// Pure. Source: ANSI/ISA-18.2-2016 and IEC 62682, states A to D (methods.md 7.1); shelving,
// suppression by an operator and latching are not part of it.
#pragma once

#include <cstdint>
#include <optional>
#include <string_view>

namespace lostwork {

// Stored in journals: the numbers are never changed.
enum class AlarmState : std::uint8_t {
  normal = 0,                   // A
  active_unacknowledged = 1,    // B
  active_acknowledged = 2,      // C
  returned_unacknowledged = 3,  // D
  count
};
[[nodiscard]] std::string_view name(AlarmState state);

enum class AlarmStimulus : std::uint8_t { occurs, returns, acknowledged, count };

// None: the standard draws no transition there, nothing happens.
[[nodiscard]] std::optional<AlarmState> after(AlarmState state, AlarmStimulus stimulus);

[[nodiscard]] constexpr bool is_active(AlarmState state) {
  return state == AlarmState::active_unacknowledged || state == AlarmState::active_acknowledged;
}
[[nodiscard]] constexpr bool is_unacknowledged(AlarmState state) {
  return state == AlarmState::active_unacknowledged || state == AlarmState::returned_unacknowledged;
}

}  // namespace lostwork
