// What a machine's points allow, what is missing for more, and which sensor would be worth most.
//
// Pure; for `lostwork check`. Numbers only: the sentences are made at the edge.
#pragma once

#include "thermo/cycle/assessment.h"
#include "thermo/cycle/machine_model.h"
#include "thermo/quantity.h"
#include "thermo/reading.h"
#include "thermo/result.h"
#include "thermo/role.h"

#include <cstddef>
#include <functional>
#include <optional>
#include <vector>

namespace lostwork {

// The standard uncertainty of a point (by its index in the model) when it reads that value.
using PointUncertainty = std::function<double(std::size_t point, double value_SI)>;

// A scan of the machine at its typical operating point: 80 % of rated power; cooling 12 to 7 degC
// against 30 to 35 degC, heating 10 to 7 degC against 40 to 45 degC; approaches 3 K, superheat
// 5 K, subcooling 4 K, isentropic efficiency 0.7 (engineering judgement, no published figure).
// Roles that the ledger does not use are left unread. Refuses: outside_fluid, not_converged.
[[nodiscard]] Result<Scan> typical_scan(const MachineModel& model,
                                        const PointUncertainty& uncertainty);

struct MissingQuantity {
  Quantity quantity{};
  Reason reason;  // at the typical point, all points read
};

// Every role that has to be added for a level that the points do not allow yet.
struct LevelGap {
  Level level{};
  std::vector<Role> missing;
};

enum class SensorChange { added, better };

// What the second-law efficiency would gain from one sensor, or one matched pair.
struct SensorWorth {
  SensorChange change{};
  std::vector<Role> roles;         // two for a matched pair
  double accuracy_limit_SI = 0.0;  // of the new sensor at the typical point (rectangular);
                                   // for a pair: of the difference
  std::optional<Measured> before;  // efficiency now; none where it cannot be computed
  std::optional<Measured> after;   // with the new sensor
};

struct Requirements {
  Level level = Level::L0;
  std::vector<Quantity> available;
  std::vector<MissingQuantity> missing;
  std::optional<LevelGap> next;      // none at L4
  std::vector<SensorWorth> sensors;  // the one that narrows most first
};

// Refuses as typical_scan.
[[nodiscard]] Result<Requirements> requirements(const MachineModel& model,
                                                const PointUncertainty& uncertainty);

}  // namespace lostwork
