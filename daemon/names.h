// Names for people of what the program knows by an enumerator. Pure.
//
// Plain text: whoever puts it into HTML, JSON or a log escapes it there.
#pragma once

#include "daemon/plant_view.h"

#include <string>
#include <string_view>

namespace lostwork {

// Of the machine's two streams.
struct StreamNames {
  std::string_view cold = "water";
  std::string_view hot = "water";
};
// "cold water leaving", "discharge pressure"
[[nodiscard]] std::string text(Role role, const StreamNames& streams = {});
[[nodiscard]] std::string text(Role role, const MachineView& machine);
// The point's own name, or its role in words, with the circuit where that is not the first.
[[nodiscard]] std::string text(const PointView& point, const MachineView& machine);
[[nodiscard]] std::string_view text(Mode mode);
[[nodiscard]] std::string_view text(Level level);  // what the sensors of that level allow
[[nodiscard]] std::string_view text(Quality quality);
[[nodiscard]] std::string_view text(AlarmState state);
[[nodiscard]] std::string_view text(AlarmKind kind);  // "possible freezing"
[[nodiscard]] std::string_view name(Duty duty);
[[nodiscard]] std::string_view text(Component component);  // "expansion valve"
// A reason with the role at fault in words: "a sensor is missing: hot water flow".
[[nodiscard]] std::string text(const Reason& reason, const MachineView& machine);

}  // namespace lostwork
