// States on an isobar by Newton's method from the guessed saturation line: most questions of a
// running machine are answered here.
//
// Pure. Internal to thermo/fluids; what it does not answer, state_search.cpp settles.
#pragma once

#include "thermo/fluids/fluid.h"
#include "thermo/fluids/saturation.h"
#include "thermo/fluids/state.h"

#include <optional>
#include <string_view>

namespace lostwork {

// What is wanted on an isobar, and the word for a refusal.
struct Wanted {
  double p_Pa;  // > 0
  double value_SI;
  bool entropy;  // J/(kg K); else enthalpy, J/kg
  std::string_view blame;
};

// nullopt between the phases and near their line, near the critical point, outside the limits and
// wherever Newton's method does not converge at once. p below the critical pressure.
[[nodiscard]] std::optional<State> quick_state(const Fluid& fluid, const Wanted& wanted);

// On one side of a line that is known, for values that are known to lie there.
[[nodiscard]] std::optional<State> quick_liquid(const Fluid& fluid, const Wanted& wanted,
                                                const TwoPhases& line);
[[nodiscard]] std::optional<State> quick_vapour(const Fluid& fluid, const Wanted& wanted,
                                                const TwoPhases& line);

}  // namespace lostwork
