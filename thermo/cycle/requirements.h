// What a machine's points allow, what is missing for more, and which sensor would be worth most.
//
// Pure; for `lostwork check`. Numbers only: the sentences are made at the edge.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/measured.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"
#include "thermo/result.h"
#include "thermo/role.h"

#include <cstddef>
#include <cstdint>
#include <functional>
#include <optional>
#include <vector>

namespace lostwork {

// The standard uncertainty of a point (by its index in the model) when it reads that value.
using PointUncertainty = std::function<double(std::size_t point, double value_SI)>;

// A scan of the machine at its typical operating point: 80 % of rated power; cooling 12 to 7 degC
// against 30 to 35 degC, heating 10 to 7 degC against 40 to 45 degC; approaches 3 K, superheat
// 5 K (none in a flooded evaporator), subcooling 4 K, isentropic efficiency 0.7 (engineering
// judgement, no published figure). Roles that the ledger does not use are left unread.
// Refuses: outside_fluid, not_converged, implausible (a stream without a heat capacity).
[[nodiscard]] Result<Scan> typical_scan(const MachineModel& model,
                                        const PointUncertainty& uncertainty);

struct MissingQuantity {
  Quantity quantity{};
  Reason reason;  // at the typical point with every point read
};

// The roles that the machine has no point for and the next level asks for.
struct LevelGap {
  Level level{};
  std::vector<Role> missing;
};

enum class SensorChange : std::uint8_t { added, better };

// What the second-law efficiency would gain from one sensor, or from one matched pair.
struct SensorWorth {
  SensorChange change{};
  std::vector<Role> roles;         // two for a matched pair
  double limit_SI = 0.0;           // of the new sensor there (rectangular); of a pair's difference
  std::optional<Measured> before;  // efficiency now; none where it cannot be computed
  Measured after;                  // with the new sensor
};

struct Requirements {
  Level level = Level::L0;
  // What is compared with a baseline counts as available where its inputs are.
  std::vector<Quantity> available;
  std::vector<MissingQuantity> missing;
  std::optional<LevelGap> next;  // none at L4
  // The one that leaves the smallest uncertainty first; none that changes nothing.
  std::vector<SensorWorth> sensors;
};

// Refuses as typical_scan.
[[nodiscard]] Result<Requirements> requirements(const MachineModel& model,
                                                const PointUncertainty& uncertainty);

}  // namespace lostwork
