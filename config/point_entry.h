// From a [[point]] of the plant file to what the sensors folder reads it by.
#pragma once

#include "config/plant_file.h"
#include "config/problem.h"
#include "sensors/point.h"
#include "sensors/wiring.h"

#include <optional>
#include <string_view>
#include <vector>

namespace lostwork {

// The role and the unit of an entry, where they are known and fit each other.
[[nodiscard]] std::optional<Unit> unit_of(const PointEntry& entry);

// The parts of the accuracy that stands at `key` of `place`.
[[nodiscard]] std::vector<Accuracy> accuracies(const std::vector<AccuracyEntry>& entries, Unit unit,
                                               const EntryPlace& place, std::string_view key,
                                               Problems& problems);

// Notes every problem of the entry; none where there is one. Its device is one of the file's, at
// the same place in the wiring.
[[nodiscard]] std::optional<PointSpec> point_spec(const PointEntry& entry, const PlantFile& file,
                                                  const Wiring& wiring, Problems& problems);

}  // namespace lostwork
