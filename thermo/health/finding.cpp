#include "thermo/health/finding.h"

#include <array>
#include <cstddef>

namespace lostwork {
namespace {

struct CauseWords {
  std::string_view name;
  std::string_view text;
  std::string_view settle;
};

constexpr std::array<CauseWords, static_cast<std::size_t>(Cause::count)> cause_words{
    {
     {"condenser_fouled", "the condenser is fouled",
     "Look into the condenser's water side, or compare its approach before and after "
     "cleaning."},
     {"hot_flow_low", "too little water flows through the condenser",
     "Read the pump and the strainer, and compare the water flow with a second meter."},
     {"evaporator_fouled", "the evaporator is fouled",
     "Look into the evaporator's water side, and have the oil return checked by a licensed "
     "person."},
     {"cold_flow_low", "too little water flows through the evaporator",
     "Read the pump and the strainer, and compare the water flow with a second meter."},
     {"refrigerant_low", "refrigerant is missing",
     "Have a licensed person look for a leak and weigh the charge."},
     {"overcharge_or_gas", "too much refrigerant, or a gas in it that does not condense",
     "Have a licensed person compare pressure and liquid temperature with the machine standing "
     "still."},
     {"compressor_worn", "the compressor has become less efficient",
     "Have a licensed person check valves, clearances and oil, and compare with the maker's "
     "figures."},
     {"sensor", "a sensor reads wrong",
     "Compare the sensor with a calibrated one at the same place."},
     }
};

}  // namespace

std::string_view name(FindingKind kind) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(FindingKind::count)> names{
      "efficiency_drift", "sensor_suspect", "law_broken"};
  return names.at(static_cast<std::size_t>(kind));
}

std::string_view name(FindingState state) {
  static constexpr std::array<std::string_view, static_cast<std::size_t>(FindingState::count)>
      names{"watch", "active", "over"};
  return names.at(static_cast<std::size_t>(state));
}

std::string_view name(Component component) {
  static constexpr std::array<std::string_view, component_count> names{"compressor", "condenser",
                                                                       "expansion", "evaporator"};
  return names.at(static_cast<std::size_t>(component));
}

std::string_view name(Cause cause) {
  return cause_words.at(static_cast<std::size_t>(cause)).name;
}

std::string_view text(Cause cause) {
  return cause_words.at(static_cast<std::size_t>(cause)).text;
}

std::string_view what_would_settle(Cause cause) {
  return cause_words.at(static_cast<std::size_t>(cause)).settle;
}

}  // namespace lostwork
