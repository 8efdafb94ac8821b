// Which buckets answer a trend, and their figures.
//
// Pure.
#pragma once

#include "storage/history.h"
#include "storage/sums_block.h"
#include "thermo/reading.h"

#include <cstddef>
#include <span>
#include <vector>

namespace lostwork {

struct BucketPlan {
  Span width;   // a whole number of sources; buckets begin at its multiples since 1970
  Span source;  // minute, hour or day: the rows that they are made of
  Instant begin;
  std::size_t count;
};

// The narrowest buckets from a list of customary widths with which [from, to) takes at most
// `max_points` (at least 1); the last one's doubles where the list ends. from < to, both storable.
[[nodiscard]] BucketPlan plan_of(Instant from, Instant to, std::size_t max_points);

// periods: of the source's length, in any order; those outside the plan are left out.
[[nodiscard]] std::vector<Bucket> buckets_of(const BucketPlan& plan,
                                             std::span<const QuantityPeriod> periods);

}  // namespace lostwork
