#include "daemon/names.h"

#include <array>
#include <cstddef>

namespace lostwork {
namespace {

template <class Enum, std::size_t n>
std::string_view row(const std::array<std::string_view, n>& table, Enum value) {
  static_assert(n == static_cast<std::size_t>(Enum::count));
  return table.at(static_cast<std::size_t>(value));
}

std::string fluid_role(std::string_view stream, std::string_view place) {
  return std::string{stream} + ' ' + std::string{place};
}

}  // namespace

std::string text(Role role, const StreamNames& streams) {
  const std::string cold = "cold " + std::string{streams.cold};
  const std::string hot = "hot " + std::string{streams.hot};
  switch (role) {
    case Role::cold_in_temperature: return fluid_role(cold, "entering");
    case Role::cold_out_temperature: return fluid_role(cold, "leaving");
    case Role::cold_flow: return fluid_role(cold, "flow");
    case Role::hot_in_temperature: return fluid_role(hot, "entering");
    case Role::hot_out_temperature: return fluid_role(hot, "leaving");
    case Role::hot_flow: return fluid_role(hot, "flow");
    case Role::suction_pressure: return "suction pressure";
    case Role::suction_temperature: return "suction temperature";
    case Role::discharge_pressure: return "discharge pressure";
    case Role::discharge_temperature: return "discharge temperature";
    case Role::liquid_temperature: return "liquid line temperature";
    case Role::liquid_pressure: return "liquid line pressure";
    case Role::evaporator_out_temperature: return "refrigerant leaving the evaporator";
    case Role::power: return "electrical power";
    case Role::power_fan: return "fan power";
    case Role::power_pump: return "pump power";
    case Role::speed: return "compressor speed";
    case Role::ambient_temperature: return "outdoor temperature";
    case Role::ambient_humidity: return "outdoor humidity";
    case Role::mode: return "mode of operation";
    case Role::defrost: return "defrost signal";
    case Role::leak_concentration: return "refrigerant detector";
    case Role::oxygen: return "oxygen detector";
    case Role::count: break;
  }
  return std::string{lostwork::name(role)};
}

std::string text(Role role, const MachineView& machine) {
  return text(role, StreamNames{.cold = machine.cold_fluid, .hot = machine.hot_fluid});
}

std::string text(const PointView& point, const MachineView& machine) {
  if (!point.name.empty()) {
    return point.name;
  }
  std::string words = text(point.role, machine);
  return point.circuit == 1 ? words : words + ", circuit " + std::to_string(point.circuit);
}

std::string_view text(Mode mode) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(Mode::count)> texts{
      "off",      "starting", "running", "stopping", "defrosting", "starting and stopping often",
      "not known"};
  return row(texts, mode);
}

std::string_view text(Level level) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(Level::count)> texts{
      "temperatures only: how hard the work is, not how well it is done",
      "the efficiency of the whole machine",
      "the efficiency of the whole machine, both heats metered",
      "the whole machine, and how closely it follows its two streams",
      "every component by itself",
      "every component by itself, measured more than once"};
  return row(texts, level);
}

std::string_view text(Quality quality) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(Quality::count)> texts{
      "good",
      "too old",
      "the device reports no value",
      "outside the range it can have",
      "the device answers with an error",
      "no answer",
      "does not move any more",
      "in doubt",
      "set by hand"};
  return row(texts, quality);
}

std::string_view text(AlarmState state) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(AlarmState::count)> texts{
      "normal", "active, not acknowledged", "active, acknowledged", "over, not acknowledged"};
  return row(texts, state);
}

std::string_view text(AlarmKind kind) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(AlarmKind::count)> texts{
      "more power than it should",
      "a sensor in doubt",
      "a sensor is not read",
      "a device does not answer",
      "close to the high-pressure limit",
      "possible freezing of the evaporator",
      "refrigerant detector",
      "too little oxygen",
      "a detector is not seen"};
  return row(texts, kind);
}

std::string_view text(Component component) {
  static constexpr std::array<std::string_view, component_count> texts{
      "compressor", "condenser", "expansion valve", "evaporator"};
  return row(texts, component);
}

std::string_view name(Duty duty) {
  return duty == Duty::cooling ? "cooling" : "heating";
}

std::string text(const Reason& reason, const MachineView& machine) {
  std::string words{text(reason.code)};
  if (reason.blame.empty() || reason.code == ReasonCode::no_baseline) {
    return words;
  }
  const auto role = role_named(reason.blame);
  return words + ": " + (role ? text(*role, machine) : std::string{reason.blame});
}

}  // namespace lostwork
