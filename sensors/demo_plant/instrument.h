// The instruments of the simulated plant: what each measures, how well, and where its register is.
//
// A device is what answers on the bus. Measured = truth x (1 + gain error) + offset + drift +
// noise; the errors are constant for a seed and take at most 0.85 of the declared limit, so that
// noise and the register's steps fit in the rest. The two temperatures of a heat meter share most
// of theirs.
#pragma once

#include "sensors/accuracy.h"
#include "sensors/demo_plant/plant.h"
#include "sensors/point.h"
#include "thermo/role.h"

#include <cstdint>
#include <optional>
#include <span>
#include <string_view>
#include <vector>

namespace lostwork {

struct PlantDevice {
  std::string_view id;
  std::uint8_t unit;
};
[[nodiscard]] std::span<const PlantDevice> plant_devices();

struct PairError {
  std::uint64_t number;     // the same for both
  double difference_limit;  // of their difference, in the unit
};

struct Instrument {
  PointSpec point;        // as the plant file has it; its source is FromRegister
  double noise;           // standard deviation; in the point's unit, or of the reading
  bool noise_of_reading;  // noise is a share of the reading
  std::optional<PairError> pair;
  double (*truth_SI)(const Truth& truth);
};
// In the order of the plant file; the same for every seed.
[[nodiscard]] std::span<const Instrument> instruments();

inline constexpr double plant_altitude_m = 12.0;

// What the instrument of this number shows now, in the point's unit, before its register rounds it;
// nothing while it is broken. Like a real one it stops at the ends of its range.
[[nodiscard]] std::optional<double> shown(const Plant& plant, std::size_t number);

}  // namespace lostwork
