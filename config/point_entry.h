// From a [[point]] of the plant file to what the sensors folder reads it by.
#pragma once

#include "config/plant_file.h"
#include "config/problem.h"
#include "sensors/point.h"
#include "sensors/wiring.h"

#include <cstddef>
#include <optional>

namespace lostwork {

// Notes every problem of the entry; none where there is one. Looks for its device in the wiring.
[[nodiscard]] std::optional<PointSpec> point_spec(const PointEntry& entry, const Wiring& wiring,
                                                  Problems& problems);

struct PairShare {
  std::size_t pair;  // index of the pair's name among all that the file's points use
  double variance;   // share of u^2 that its points have in common, 0..1
};
// For an entry that names a pair. Notes a pair that has not two points of one dimension, or a
// difference that would be less accurate than two sensors on their own.
[[nodiscard]] PairShare pair_share(const PointEntry& entry, const PointSpec& spec,
                                   const PlantFile& file, Problems& problems);

}  // namespace lostwork
