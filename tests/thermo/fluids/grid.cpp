#include "tests/thermo/fluids/grid.h"

#include "tests/thermo/fluids/reference.h"
#include "thermo/fluids/fluid.h"
#include "thermo/fluids/pseudo_pure.h"

#include <array>
#include <cmath>

namespace lostwork {
namespace {

std::string digits(double value) {
  return std::to_string(std::lround(1e6 * value));
}

struct Region {
  std::string_view name;
  double of_critical_T;
  double of_critical_p;
};

// Not every fluid has every region: the triple point of R744 lies at 0.71 of its critical
// temperature, R600 ends at 12 MPa. The room is for the tests' differences.
bool is_inside(const Fluid& fluid, const Region& region) {
  const double T_K = region.of_critical_T * fluid.critical_T_K;
  return T_K > 1.03 * fluid.min_T_K && T_K < 0.97 * fluid.max_T_K &&
         region.of_critical_p * fluid.critical_p_Pa < 0.97 * fluid.max_p_Pa;
}

bool has_line_at(const Fluid& fluid, double of_critical_T) {
  return !is_pseudo_pure(fluid) && of_critical_T * fluid.critical_T_K > 1.001 * fluid.min_T_K;
}

}  // namespace

std::vector<SinglePhasePlace> single_phase_grid() {
  constexpr auto regions = std::to_array<Region>({
      {        "cold_liquid", 0.55,  0.1},
      {             "liquid", 0.75,  0.5},
      {         "hot_liquid", 0.95,  0.9},
      {  "compressed_liquid",  0.8,  5.0},
      {        "thin_vapour",  0.7, 1e-4},
      {             "vapour", 0.85,  0.1},
      {         "hot_vapour",  1.1,  0.5},
      {       "dense_vapour", 1.01,  0.9},
      {      "supercritical", 1.05,  1.3},
      {"dense_supercritical", 1.15,  8.0},
  });
  std::vector<SinglePhasePlace> all;
  for (const Fluid* fluid : fluids()) {
    for (const Region& region : regions) {
      if (is_inside(*fluid, region)) {
        all.push_back({fluid->name, region.name, region.of_critical_T, region.of_critical_p});
      }
    }
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
      if (has_line_at(*fluid, share)) {
        all.push_back({fluid->name, share});
      }
    }
  }
  return all;
}

double temperature_K(const SaturationPlace& place) {
  return place.of_critical_T * fluid_named(place.fluid)->critical_T_K;
}

std::string name_of(const SinglePhasePlace& place) {
  return test_name(place.fluid) + "_" + std::string{place.region};
}
std::string name_of(const SaturationPlace& place) {
  return test_name(place.fluid) + "_at_" + digits(place.of_critical_T) + "_ppm";
}
void PrintTo(const SinglePhasePlace& place, std::ostream* out) {
  *out << name_of(place);
}
void PrintTo(const SaturationPlace& place, std::ostream* out) {
  *out << name_of(place);
}

}  // namespace lostwork
