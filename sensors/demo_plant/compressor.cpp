#include "sensors/demo_plant/compressor.h"

#include <algorithm>
#include <cmath>

namespace lostwork {

double loss_W(const LossCurve& curve, double shaft_W, double rated_shaft_W) {
  const double x = shaft_W / rated_shaft_W;
  return rated_shaft_W * (curve.constant + curve.linear * x + curve.quadratic * x * x);
}

double volumetric_efficiency(const CompressorParameters& compressor,
                             const CompressorQuestion& question) {
  constexpr double expansion_exponent = 1.08;  // R134a, heat from the walls included; from memory
  const double ratio = std::max(question.pressure_ratio, 1.0);
  const double expanded = compressor.clearance * (std::pow(ratio, 1.0 / expansion_exponent) - 1.0);
  // A gap leaks with time, not with each turn: its share grows as the speed falls.
  const double leaked =
      compressor.leakage * (ratio - 1.0) / (0.5 + 0.5 * std::max(question.capacity, 0.1));
  return std::max(0.2, (1.0 - expanded - leaked) * (1.0 - 0.5 * question.wear));
}

double isentropic_efficiency(const CompressorParameters& compressor,
                             const CompressorQuestion& question) {
  const double ratio = std::max(question.pressure_ratio, 1.05);
  const double off = std::log(ratio / compressor.best_pressure_ratio);
  const double slow = 1.0 - question.capacity;
  const double by_ratio = 1.0 / (1.0 + compressor.ratio_penalty * off * off);
  const double by_speed = 1.0 - compressor.part_speed_penalty * slow * slow;
  return compressor.best_efficiency * by_ratio * by_speed * (1.0 - question.wear);
}

}  // namespace lostwork
