#include "sensors/demo_plant/exchanger.h"

#include <cmath>

namespace lostwork {

double conductance_WK(const ExchangerParameters& exchanger, double water_kgs, double fouling) {
  const double clean = exchanger.water_resistance_SI + exchanger.refrigerant_resistance_SI;
  const double water =
      exchanger.water_resistance_SI * std::pow(exchanger.rated_kgs / water_kgs, 0.8);
  return 1.0 / (water + exchanger.refrigerant_resistance_SI + fouling * clean);
}

double effectiveness(double ntu) {
  return -std::expm1(-ntu);
}

double counterflow_effectiveness(double ntu, double capacity_ratio) {
  const double e = std::exp(-ntu * (1.0 - capacity_ratio));
  return (1.0 - e) / (1.0 - capacity_ratio * e);
}

}  // namespace lostwork
