// The simulated plant of Tern Quay Dairy (an invented site): one R134a water chiller, and one R134a
// heat pump that makes hot water from the chiller's condenser loop.
//
// Its physics are its own (machine.h, site.h): nothing of the ledger is used or turned round.
// Everything random is a function of the seed and of simulated time (noise.h), so that a run can be
// repeated: the same seed, start, faults and steps give the same bits on every machine whose
// exp() and log() round alike. Values move; one thread at a time.
#pragma once

#include "sensors/demo_plant/fault.h"
#include "sensors/demo_plant/machine.h"
#include "sensors/demo_plant/site.h"
#include "thermo/reading.h"

#include <array>
#include <cstddef>
#include <cstdint>
#include <string_view>
#include <vector>

namespace lostwork {

enum class PlantMachine : std::uint8_t { chiller, heat_pump, count };
inline constexpr std::size_t plant_machine_count = static_cast<std::size_t>(PlantMachine::count);

// "chiller-1", "heatpump-1", as in config/examples/tern_quay_dairy.toml.
[[nodiscard]] std::string_view id(PlantMachine machine);

struct PlantOptions {
  std::uint64_t seed = 1;
  Instant start = std::chrono::sys_days{std::chrono::January / 5 / 2026};
  std::vector<PlantFault> faults;
};

// What a machine's meters have counted since the plant's start.
struct PlantCounters {
  double energy_J = 0.0;
  double cold_heat_J = 0.0;
  double hot_heat_J = 0.0;
  Span running{0};
  std::uint32_t starts = 0;
};

// What no instrument of a real plant could tell.
struct Truth {
  Instant time{};
  SiteTruth site;
  std::array<MachineTruth, plant_machine_count> machines;
  std::array<PlantCounters, plant_machine_count> counters;

  [[nodiscard]] const MachineTruth& operator[](PlantMachine machine) const {
    return machines.at(static_cast<std::size_t>(machine));
  }
};

// Names of everything that a fault can hit.
[[nodiscard]] FaultTargets plant_fault_targets();

class Plant {
 public:
  // Throws BadFault where a fault names something that the plant does not have.
  explicit Plant(const PlantOptions& options);

  // Goes on by dt > 0, in equal parts of at most 60 s: every time constant is treated so that 60 s
  // is stable and agrees with 10 s (tests/sensors/demo_plant/plant_test.cpp says how well).
  void step(Span dt);

  [[nodiscard]] Instant time() const { return truth_.time; }
  [[nodiscard]] std::uint64_t seed() const { return seed_; }
  [[nodiscard]] const Truth& truth() const { return truth_; }
  [[nodiscard]] const std::vector<PlantFault>& faults() const { return faults_; }

  // How much more power the machine takes now than it would without any of its faults, for the same
  // product heat and entering temperatures, both in the steady state; percent. 0 while it is off.
  // Costs some 50 steps. Throws std::runtime_error where either state does not exist.
  [[nodiscard]] double truth_extra_power_percent(PlantMachine machine) const;

  // False while a device_silent fault holds.
  [[nodiscard]] bool answers(std::string_view device) const;

  // What sensor_drift faults add to a sensor now, K; and whether it is broken.
  [[nodiscard]] double drift_K(std::string_view sensor) const;
  [[nodiscard]] bool broken(std::string_view sensor) const;

 private:
  void substep(Instant to, Span dt);
  void count(std::size_t machine, Span dt);
  [[nodiscard]] MachineHealth health(PlantMachine machine) const;
  [[nodiscard]] double refrigerant_in_air() const;
  [[nodiscard]] double flow_loss(PlantMachine machine) const;
  [[nodiscard]] double extent_of(FaultKind kind, std::string_view target) const;

  std::uint64_t seed_;
  std::vector<PlantFault> faults_;
  Site site_;
  std::array<Machine, plant_machine_count> machines_;
  Truth truth_;
};

}  // namespace lostwork
