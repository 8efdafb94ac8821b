// Faults of the simulated plant, and the text form in which a person orders them.
//
// One fault is `KIND:KEY=VALUE,KEY=VALUE,...`; a script is a file of such lines, `#` begins a
// comment. Dates are `2026-03-01` (midnight) or `2026-03-01T06:30` or with seconds, UTC, with or
// without a closing `Z`. Pure.
//
//   kind                keys besides from= (needed) and to= (the day of the repair)
//   condenser_fouling   machine=, and rate= (percent of the clean condenser's thermal resistance
//                       added per day) or power= and days=
//   low_condenser_flow  machine=, loss= (percent of the normal water flow that is missing)
//   refrigerant_leak    machine=, rate= (percent of the full charge lost per day)
//   compressor_wear     machine=, and rate= (percent of the isentropic efficiency lost per day; the
//                       volumetric efficiency loses half of it) or power= and days=
//   sensor_drift        sensor=, rate= (kelvin per day, either sign)
//   sensor_broken       sensor=: the device shows its "no value" pattern
//   device_silent       device=, to= is needed
//
// limit= (in percent, or in K for sensor_drift) is where a growing fault stops growing. power=5,
// days=60 says: grows evenly so that after 60 days it costs 5 percent more power at the machine's
// rating point (rating.h), and then stays; the plant works out the rate.
#pragma once

#include "thermo/reading.h"

#include <cstdint>
#include <optional>
#include <span>
#include <stdexcept>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

enum class FaultKind : std::uint8_t {
  condenser_fouling,
  low_condenser_flow,
  refrigerant_leak,
  compressor_wear,
  sensor_drift,
  sensor_broken,
  device_silent,
  count
};
[[nodiscard]] std::string_view name(FaultKind kind);

// What a fault costs, for those that are ordered by cost.
struct PowerGoal {
  double extra_power;  // ratio: 0.05 is five percent more power at the rating point
  Span after;          // from `from` until it has grown to that, > 0
};

struct PlantFault {
  FaultKind kind{};
  std::string target;  // id of the machine, sensor or device
  Instant from{};
  std::optional<Instant> to;  // repaired; never before `from`
  // Per day for what grows (ratio, or K for sensor_drift), the step itself for low_condenser_flow.
  // Not used where there is a goal.
  double size = 0.0;
  std::optional<double> limit;    // in the unit of the size without the day, > 0
  std::optional<PowerGoal> goal;  // condenser_fouling and compressor_wear only

  // How far it has grown at that time: 0 before it begins and from the repair on; 1 in between for
  // what is there or not.
  [[nodiscard]] double extent(Instant time) const;
};

// What the plant has, so that a fault of something else is refused by name.
struct FaultTargets {
  std::span<const std::string_view> machines;
  std::span<const std::string_view> sensors;  // temperature sensors
  std::span<const std::string_view> devices;
};

// The message names the place, what was found there and what is allowed.
class BadFault : public std::invalid_argument {
 public:
  using std::invalid_argument::invalid_argument;
};

// Throws BadFault.
[[nodiscard]] PlantFault parse_fault(std::string_view text, const FaultTargets& targets);

// A whole script; `place` (a file's name) goes before the line's number in messages. Throws
// BadFault.
[[nodiscard]] std::vector<PlantFault> parse_fault_script(std::string_view text,
                                                         const FaultTargets& targets,
                                                         std::string_view place);

}  // namespace lostwork
