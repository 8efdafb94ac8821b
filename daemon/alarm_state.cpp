#include "daemon/alarm_state.h"

#include <array>
#include <cstddef>

namespace lostwork {

std::string_view name(AlarmState state) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(AlarmState::count)> names{
      "normal", "active_unacknowledged", "active_acknowledged", "returned_unacknowledged"};
  return names.at(static_cast<std::size_t>(state));
}

std::optional<AlarmState> after(AlarmState state, AlarmStimulus stimulus) {
  using enum AlarmState;
  switch (state) {
    case normal:
      return stimulus == AlarmStimulus::occurs ? std::optional{active_unacknowledged}
                                               : std::nullopt;
    case active_unacknowledged:
      if (stimulus == AlarmStimulus::occurs) {
        return std::nullopt;
      }
      return stimulus == AlarmStimulus::returns ? returned_unacknowledged : active_acknowledged;
    case active_acknowledged:
      return stimulus == AlarmStimulus::returns ? std::optional{normal} : std::nullopt;
    case returned_unacknowledged:
      if (stimulus == AlarmStimulus::returns) {
        return std::nullopt;
      }
      return stimulus == AlarmStimulus::occurs ? active_unacknowledged : normal;
    default: return std::nullopt;
  }
}

}  // namespace lostwork
