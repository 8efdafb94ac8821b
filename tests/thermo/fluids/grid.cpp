#include "tests/thermo/fluids/grid.h"

#include "thermo/fluids/fluid.h"

#include <cmath>

namespace lostwork {
namespace {

std::string digits(double value) {
  return std::to_string(std::lround(1e6 * value));
}

}  // namespace

std::vector<SinglePhasePlace> single_phase_grid() {
  std::vector<SinglePhasePlace> all;
  for (const Fluid* fluid : fluids()) {
    const std::string_view name = fluid->name;
    all.insert(all.end(), {
                              {name,         "cold_liquid", 0.55,  0.1},
                              {name,              "liquid", 0.75,  0.5},
                              {name,          "hot_liquid", 0.95,  0.9},
                              {name,   "compressed_liquid",  0.8,  5.0},
                              {name,         "thin_vapour",  0.7, 1e-4},
                              {name,              "vapour", 0.85,  0.1},
                              {name,          "hot_vapour",  1.1,  0.5},
                              {name,        "dense_vapour", 1.01,  0.9},
                              {name,       "supercritical", 1.05,  1.3},
                              {name, "dense_supercritical", 1.15,  8.0}
    });
  }
  return all;
}

GivenTp given(const SinglePhasePlace& place) {
  const Fluid& fluid = *fluid_named(place.fluid);
  return {place.of_critical_T * fluid.critical_T_K, place.of_critical_p * fluid.critical_p_Pa};
}

std::vector<SaturationPlace> saturation_grid() {
  std::vector<SaturationPlace> all;
  for (const Fluid* fluid : fluids()) {
    for (const double share : {0.46, 0.5, 0.6, 0.7, 0.8, 0.9, 0.95, 0.98, 0.995, 0.9999}) {
      all.push_back({fluid->name, share});
    }
  }
  return all;
}

double temperature_K(const SaturationPlace& place) {
  return place.of_critical_T * fluid_named(place.fluid)->critical_T_K;
}

std::string name_of(const SinglePhasePlace& place) {
  return std::string{place.fluid} + "_" + std::string{place.region};
}
std::string name_of(const SaturationPlace& place) {
  return std::string{place.fluid} + "_at_" + digits(place.of_critical_T) + "_ppm";
}
void PrintTo(const SinglePhasePlace& place, std::ostream* out) {
  *out << name_of(place);
}
void PrintTo(const SaturationPlace& place, std::ostream* out) {
  *out << name_of(place);
}

}  // namespace lostwork
