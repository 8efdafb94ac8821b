// The two machines of Tern Quay Dairy. Invented; sized like machines of their kind (common
// practice, no source) and checked against the range of published chiller measurements in the
// tests.
#pragma once

#include "sensors/demo_plant/machine.h"

namespace lostwork {

[[nodiscard]] const MachineParameters& tern_quay_chiller();
[[nodiscard]] const MachineParameters& tern_quay_heat_pump();

// Where "5 % more power" is meant when a fault is ordered by its cost.
struct RatingPoint {
  MachineInlet inlet;
  double product_heat_W;
};
[[nodiscard]] const RatingPoint& chiller_rating();
[[nodiscard]] const RatingPoint& heat_pump_rating();

// Electrical power with that health over power without, minus 1, at the rating point.
[[nodiscard]] double extra_power(const Machine& machine, const RatingPoint& rating,
                                 const MachineHealth& health);

// The fouling or the wear that costs `extra` (0.001..0.3) at the rating point, by bisection. Throws
// std::runtime_error where none does within the range of the refrigerant's tables.
[[nodiscard]] double fouling_for(const Machine& machine, const RatingPoint& rating, double extra);
[[nodiscard]] double wear_for(const Machine& machine, const RatingPoint& rating, double extra);

}  // namespace lostwork
