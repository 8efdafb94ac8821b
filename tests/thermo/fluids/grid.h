// Places spread over the whole range of every fluid, for tests of what holds everywhere.
#pragma once

#include "thermo/fluids/state.h"

#include <ostream>
#include <string>
#include <string_view>
#include <vector>

namespace lostwork {

struct SinglePhasePlace {
  std::string_view fluid;
  std::string_view region;
  double of_critical_T;
  double of_critical_p;
};
[[nodiscard]] std::vector<SinglePhasePlace> single_phase_grid();
[[nodiscard]] GivenTp given(const SinglePhasePlace& place);

// On the line of a pure fluid.
struct SaturationPlace {
  std::string_view fluid;
  double of_critical_T;
};
[[nodiscard]] std::vector<SaturationPlace> saturation_grid();
[[nodiscard]] double temperature_K(const SaturationPlace& place);

[[nodiscard]] std::string name_of(const SinglePhasePlace& place);
[[nodiscard]] std::string name_of(const SaturationPlace& place);
void PrintTo(const SinglePhasePlace& place, std::ostream* out);
void PrintTo(const SaturationPlace& place, std::ostream* out);

}  // namespace lostwork
