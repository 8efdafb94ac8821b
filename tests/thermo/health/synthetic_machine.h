// A machine of its own physics for the tests of health: exchangers by effectiveness and NTU,
// compressor by an efficiency that depends on pressure ratio and load, subcooling by charge. It has
// no formula in common with the baseline's forms. Everything random comes from the seed.
#pragma once

#include "thermo/cycle/machine_model.h"
#include "thermo/health/features.h"
#include "thermo/health/seeded_normal.h"
#include "thermo/measure/window.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"

#include <array>
#include <cstdint>
#include <functional>
#include <optional>
#include <vector>

namespace lostwork::testing {

// All 0 for a machine that is well.
struct Ills {
  double condenser_resistance = 0.0;  // added, in shares of the clean one
  double evaporator_resistance = 0.0;
  double hot_flow_missing = 0.0;  // share
  double cold_flow_missing = 0.0;
  double charge_missing = 0.0;  // share of what makes the subcooling
  double wear = 0.0;            // share of the isentropic efficiency
  std::array<double, input_count>
      bias{};  // added to the inputs, SI; flows and pressures: as a share
};

struct Weather {
  double load_W;
  double hot_in_T_K;
};

struct SyntheticOptions {
  std::uint64_t seed = 1;
  double days = 365.0;
  std::uint32_t windows_a_day = 12;
  double first_day_of_year = 60.0;  // 1 March
  double season = 1.0;              // 0: every day like the first
  bool hot_meter = true;
  bool refrigerant_side = true;
  double noise = 1.0;  // of the instruments, in units of the usual one
  std::function<Ills(double day)> ills = [](double) { return Ills{}; };
};

[[nodiscard]] MachineModel synthetic_model();

// Begins on 1 March 2025.
[[nodiscard]] Instant synthetic_start();

// One window; steady by construction. `day`: since the start.
[[nodiscard]] Window synthetic_window(const SyntheticOptions& options, const Weather& weather,
                                      double day, SeededNormal& noise);

// The power in truth, without noise; W.
[[nodiscard]] double true_power_W(const Weather& weather, const Ills& ills);

// The window's means as if one scan had given them.
[[nodiscard]] QuantityValues values_of(const Window& window);

[[nodiscard]] std::vector<Window> synthetic_history(const SyntheticOptions& options);

}  // namespace lostwork::testing
