// Matched pairs of points: which share their error, and how much of it.
#pragma once

#include "config/plant_file.h"
#include "config/problem.h"
#include "sensors/point.h"

#include <cstddef>
#include <optional>
#include <vector>

namespace lostwork {

// Share of its variance that a point of a pair has in common with the other one, where the file
// does not say how accurate their difference is: engineering judgement, no published figure.
inline constexpr double default_shared_variance = 0.5;

struct PairShare {
  std::optional<std::size_t> pair;  // index of the pair's name among all that the points use
  double variance = 0.0;            // share of u^2 that its points have in common, 0..1
};

// For each point of the file, in its order; `specs` has an empty place for a refused one. Notes a
// pair that has not two points of one machine and one unit, once and at the point that is likelier
// at fault, and a difference that would be less accurate than two sensors on their own.
[[nodiscard]] std::vector<PairShare> pair_shares(const PlantFile& file,
                                                 const std::vector<std::optional<PointSpec>>& specs,
                                                 Problems& problems);

}  // namespace lostwork
